/* test-analysis.c - changes of an analysis, undone and done again; what it knows of its record and of what was found. */
#include <math.h>

#include "core/random.h"
#include "data/analysis-text.h"
#include "rows.h"
#include "worked.h"

static double
duration_max (const AntAnalysis *analysis)
{
  return ant_setting_get (ant_setting_find ("duration-max"), &ant_analysis_get_treatment (analysis)->settings);
}

static void
set (AntAnalysis *analysis, const char *key, const char *text)
{
  g_assert_true (ant_analysis_set_setting (analysis, ant_setting_find (key), text, NULL));
}

static char *
text_of (const AntAnalysis *analysis)
{
  return ant_analysis_to_text (analysis, "/somewhere/work.antumbra");
}

static void
a_change_can_be_undone_and_done_again (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  g_assert_null (ant_analysis_undo_name (analysis));
  g_assert_false (ant_analysis_undo (analysis));
  set (analysis, "duration-max", "9");
  g_assert_cmpstr (ant_analysis_undo_name (analysis), ==, "Set duration-max");
  g_assert_true (ant_analysis_undo (analysis));
  g_assert_cmpfloat (duration_max (analysis), ==, 13);
  g_assert_cmpstr (ant_analysis_redo_name (analysis), ==, "Set duration-max");
  g_assert_true (ant_analysis_redo (analysis));
  g_assert_cmpfloat (duration_max (analysis), ==, 9);
  g_assert_false (ant_analysis_redo (analysis));
}

static void
every_change_has_its_name (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  set (analysis, "seed", "7");
  ant_analysis_judge (analysis, "dip 3", 5, 0.2, ANT_CLASS_SPOT);
  g_assert_cmpstr (ant_analysis_undo_name (analysis), ==, "Verdict of dip 3");
  ant_analysis_note (analysis, "dip 3", 5, 0.2, "dark");
  g_assert_cmpstr (ant_analysis_undo_name (analysis), ==, "Note on dip 3");
  ant_analysis_mask (analysis, (AntSpan) { 1, 2 }, "");
  g_assert_cmpstr (ant_analysis_undo_name (analysis), ==, "Mask a span");
  g_assert_true (ant_analysis_unmask (analysis, (AntSpan) { 0, 3 }));
  g_assert_cmpstr (ant_analysis_undo_name (analysis), ==, "Unmask a span");
  ant_analysis_reset_settings (analysis);
  g_assert_cmpstr (ant_analysis_undo_name (analysis), ==, "Reset all settings");
  g_autoptr (AntWitness) witness = ant_witness_new ("/records/other.csv", NULL, NULL);
  g_assert_true (ant_analysis_add_witness (analysis, witness));
  g_assert_cmpstr (ant_analysis_undo_name (analysis), ==, "Witness other.csv");
  ant_analysis_remove_witness (analysis, 0);
  g_assert_cmpstr (ant_analysis_undo_name (analysis), ==, "Without witness other.csv");
}

static void
what_changes_nothing_is_no_change (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  set (analysis, "duration-max", "13");
  ant_analysis_reset_settings (analysis);
  ant_analysis_judge (analysis, "dip 1", 5, 0.2, ANT_CLASS_UNDECIDED);
  ant_analysis_note (analysis, "dip 1", 5, 0.2, "");
  ant_analysis_mask (analysis, (AntSpan) { 2, 1 }, "");
  g_assert_false (ant_analysis_unmask (analysis, (AntSpan) { 0, 3 }));
  g_assert_null (ant_analysis_undo_name (analysis));
  g_assert_false (ant_analysis_is_changed (analysis));
}

static void
a_new_change_ends_what_could_be_done_again (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  set (analysis, "duration-max", "9");
  ant_analysis_undo (analysis);
  set (analysis, "seed", "3");
  g_assert_null (ant_analysis_redo_name (analysis));
}

static void
what_is_typed_in_one_go_is_one_change (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  ant_analysis_note (analysis, "dip 1", 5, 0.2, "d");
  ant_analysis_note (analysis, "dip 1", 5, 0.2, "da");
  ant_analysis_note (analysis, "dip 1", 5, 0.2, "dark");
  g_assert_cmpuint (ant_analysis_get_history (analysis)->len, ==, 1);
  ant_analysis_undo (analysis);
  g_assert_cmpuint (ant_judgements_count (ant_analysis_get_judgements (analysis)), ==, 0);
  ant_analysis_redo (analysis);
  g_assert_cmpstr (ant_judgements_note (ant_analysis_get_judgements (analysis), 5, 0.2), ==, "dark");
}

static void
a_wrong_setting_changes_nothing (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  g_autoptr (GError) error = NULL;
  g_assert_false (ant_analysis_set_setting (analysis, ant_setting_find ("duration-max"), "-1", &error));
  g_assert_nonnull (error);
  g_assert_null (ant_analysis_undo_name (analysis));
}

static void
the_stack_is_bounded_and_the_history_is_not (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  for (int i = 0; i < ANT_MOST_UNDONE + 20; i++)
    ant_analysis_mask (analysis, (AntSpan) { i, i + 0.5 }, "");
  int n = 0;
  g_assert_cmpuint (ant_analysis_get_history (analysis)->len, ==, ANT_MOST_UNDONE + 20);
  while (ant_analysis_undo (analysis))
    n++;
  g_assert_cmpint (n, ==, ANT_MOST_UNDONE);
  g_assert_cmpuint (ant_analysis_get_treatment (analysis)->masks->len, ==, 20);
}

static void
undoing_to_what_was_saved_is_no_change (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  set (analysis, "duration-max", "9");
  ant_analysis_set_saved (analysis);
  g_assert_false (ant_analysis_is_changed (analysis));
  set (analysis, "seed", "3");
  g_assert_true (ant_analysis_is_changed (analysis));
  ant_analysis_undo (analysis);
  g_assert_false (ant_analysis_is_changed (analysis));
  ant_analysis_undo (analysis);
  g_assert_true (ant_analysis_is_changed (analysis));
  ant_analysis_redo (analysis);
  g_assert_false (ant_analysis_is_changed (analysis));
  ant_analysis_set_unsaved (analysis);
  g_assert_true (ant_analysis_is_changed (analysis));
}

/* One change of some kind. */
static void
step (AntAnalysis *analysis, AntRandom *random, guint number)
{
  double at_d = floor (20 * ant_random_uniform (random)) / 2;
  g_autofree char *text = g_strdup_printf ("%.3f", 1 + 12 * ant_random_uniform (random));
  g_autofree char *dip = g_strdup_printf ("dip %u", number % 60);
  g_autofree char *path = g_strdup_printf ("/records/%u.csv", number % 7);
  g_autoptr (AntWitness) witness = ant_witness_new (path, number % 3 ? "5f70bf" : NULL, NULL);
  switch ((int) (8 * ant_random_uniform (random)))
    {
    case 0:
      set (analysis, number % 2 ? "duration-max" : "false-alarms-per-year", text);
      break;
    case 1:
      ant_analysis_judge (analysis, dip, at_d, 0.2, (AntDipClass) (ANT_N_CLASSES * ant_random_uniform (random)));
      break;
    case 2:
      ant_analysis_note (analysis, dip, at_d, 0.2, number % 5 ? text : "");
      break;
    case 3:
      ant_analysis_mask (analysis, (AntSpan) { at_d, at_d + 2 * ant_random_uniform (random) }, text);
      break;
    case 4:
      ant_analysis_unmask (analysis, (AntSpan) { at_d, at_d + 3 * ant_random_uniform (random) });
      break;
    case 5:
      ant_analysis_add_witness (analysis, witness);
      break;
    case 6:
      ant_analysis_remove_witness (analysis, number % ANT_MOST_WITNESSES);
      break;
    default:
      if (number % 16 == 0)
        ant_analysis_reset_settings (analysis);
      else if (ant_random_uniform (random) < 0.7)
        ant_analysis_undo (analysis);
      else
        ant_analysis_redo (analysis);
    }
}

static void
a_random_walk_undone_and_done_again_gives_the_same_bytes (void)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  AntRandom random;
  while (ant_analysis_undo (analysis))
    ;
  g_autofree char *start = text_of (analysis);
  ant_random_seed (&random, 5005, 0);
  for (guint number = 0; number < 2000; number++)
    step (analysis, &random, number);
  while (ant_analysis_redo (analysis))
    ;
  g_autofree char *end = text_of (analysis);
  guint n_undone = 0, n_redone = 0;
  while (ant_analysis_undo (analysis))
    n_undone++;
  g_autofree char *back = text_of (analysis);
  while (ant_analysis_redo (analysis))
    n_redone++;
  g_autofree char *again = text_of (analysis);
  g_assert_cmpuint (n_undone, >, 500);
  g_assert_cmpuint (n_redone, ==, n_undone);
  g_assert_cmpstr (back, ==, start);
  g_assert_cmpstr (again, ==, end);
}

static void
a_span_can_be_unmasked_in_its_middle (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  ant_analysis_mask (analysis, (AntSpan) { 1, 5 }, "cold");
  ant_analysis_unmask (analysis, (AntSpan) { 2, 3 });
  const GPtrArray *masks = ant_analysis_get_treatment (analysis)->masks;
  g_assert_cmpuint (masks->len, ==, 2);
  const AntMask *first = g_ptr_array_index (masks, 0), *second = g_ptr_array_index (masks, 1);
  g_assert_cmpfloat (first->span.end_d, ==, 2);
  g_assert_cmpfloat (second->span.start_d, ==, 3);
  g_assert_cmpstr (second->reason, ==, "cold");
}

static void
a_reason_can_be_given_and_undone (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  ant_analysis_mask (analysis, (AntSpan) { 1, 5 }, "");
  ant_analysis_set_reason (analysis, 0, "cold");
  const AntMask *mask = g_ptr_array_index (ant_analysis_get_treatment (analysis)->masks, 0);
  g_assert_cmpstr (mask->reason, ==, "cold");
  g_assert_cmpstr (ant_analysis_undo_name (analysis), ==, "Reason of a mask");
  ant_analysis_undo (analysis);
  mask = g_ptr_array_index (ant_analysis_get_treatment (analysis)->masks, 0);
  g_assert_cmpstr (mask->reason, ==, "");
}

static void
a_snapshot_stays_as_it_was (void)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  g_autoptr (AntAnalysis) snapshot = ant_analysis_snapshot (analysis);
  g_autofree char *before = text_of (analysis);
  ant_analysis_mask (analysis, (AntSpan) { 1, 5 }, "");
  ant_analysis_drop_results (analysis);
  g_autofree char *kept = text_of (snapshot);
  g_assert_cmpstr (kept, ==, before);
}

static void
only_what_nobody_can_compute_again_would_be_lost (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  g_autoptr (AntScanResults) results = test_results ();
  ant_analysis_set_results (analysis, results, ant_analysis_get_treatment (analysis));
  set (analysis, "duration-max", "9");
  g_assert_true (ant_analysis_is_changed (analysis));
  g_assert_false (ant_analysis_would_lose (analysis));
  ant_analysis_judge (analysis, "dip 1", 2, 0.3, ANT_CLASS_SPOT);
  g_assert_true (ant_analysis_would_lose (analysis));
  ant_analysis_undo (analysis);
  g_assert_false (ant_analysis_would_lose (analysis));
  ant_analysis_set_path (analysis, "/somewhere/work.antumbra"); /* of a file, every change counts */
  g_assert_true (ant_analysis_would_lose (analysis));
}

static void
results_are_stale_once_the_treatment_differs (void)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  g_assert_nonnull (ant_analysis_get_results (analysis));
  g_assert_false (ant_analysis_is_stale (analysis));
  set (analysis, "threads", "3");
  g_assert_false (ant_analysis_is_stale (analysis));
  ant_analysis_mask (analysis, (AntSpan) { 7, 7.5 }, "");
  g_assert_true (ant_analysis_is_stale (analysis));
  ant_analysis_undo (analysis);
  g_assert_false (ant_analysis_is_stale (analysis));
}

static void
witnesses_are_few_and_none_twice (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  const AntTreatment *before = ant_analysis_get_treatment (analysis);
  g_autoptr (AntTreatment) without = ant_treatment_copy (before);
  for (int i = 0; i < ANT_MOST_WITNESSES; i++)
    {
      g_autofree char *path = g_strdup_printf ("/records/%d.csv", i);
      g_autoptr (AntWitness) witness = ant_witness_new (path, "5f", NULL), again = ant_witness_new (path, NULL, NULL);
      g_assert_true (ant_analysis_add_witness (analysis, witness));
      g_assert_false (ant_analysis_add_witness (analysis, again));
    }
  g_autoptr (AntWitness) more = ant_witness_new ("/records/more.csv", NULL, NULL);
  g_assert_false (ant_analysis_add_witness (analysis, more));
  g_autoptr (AntWitness) other = ant_witness_new ("/records/2.csv", "60", NULL);
  g_autoptr (AntTreatment) with = ant_treatment_copy (ant_analysis_get_treatment (analysis));
  g_assert_true (ant_analysis_update_witness (analysis, other));
  g_assert_false (ant_analysis_update_witness (analysis, other));
  g_assert_false (ant_treatment_same (with, ant_analysis_get_treatment (analysis)));
  g_assert_false (ant_treatment_same (without, ant_analysis_get_treatment (analysis)));
  g_assert_true (ant_treatment_same_grid (without, ant_analysis_get_treatment (analysis)));
}

static void
verdicts_are_carried_over_and_counted (void)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  gsize n_given, n_lost;
  ant_analysis_note (analysis, "dip at 9.2", 9.2, 0.2, "weak");
  ant_analysis_count_carried (analysis, &n_given, &n_lost);
  g_assert_cmpuint (n_given, ==, 3);
  g_assert_cmpuint (n_lost, ==, 1);
  g_autofree char *words = ant_analysis_carried_words (analysis);
  g_assert_cmpstr (words, ==, "Verdicts and notes carried over: 2; kept of dips that are no longer found: 1");
}

static void
of_another_record_only_the_words_are_kept (void)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  g_autoptr (AntRecord) record = test_results_record ();
  g_autoptr (AntRecord) same = test_results_record ();
  g_assert_null (ant_analysis_take_record (analysis, same));
  g_assert_nonnull (ant_analysis_get_results (analysis));
  g_free (record->sha256);
  record->sha256 = g_strdup ("another");
  g_autofree char *sentence = ant_analysis_take_record (analysis, record);
  g_assert_nonnull (sentence);
  g_assert_null (ant_analysis_get_results (analysis));
  g_assert_cmpint (ant_judgements_class (ant_analysis_get_judgements (analysis), 2, 0.3), ==, ANT_CLASS_PLANET);
  g_assert_cmpstr (ant_analysis_get_record_sha256 (analysis), ==, "another");
  g_assert_true (ant_analysis_is_changed (analysis));
}

static void
times_follow_a_record_that_begins_earlier (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  ant_analysis_set_record (analysis, "/r.txt", "old", 2466000.5);
  ant_analysis_judge (analysis, "dip 1", 5, 0.2, ANT_CLASS_SPOT);
  ant_analysis_mask (analysis, (AntSpan) { 1, 2 }, "");
  g_autoptr (AntRecord) record = test_results_record ();
  record->time.origin_known = TRUE;
  record->time.style = ANT_STAMP_JD;
  record->time.scale = ANT_SCALE_TT;
  record->time.origin_jd1 = 2465990.5;
  g_autofree char *sentence = ant_analysis_take_record (analysis, record);
  g_assert_nonnull (sentence);
  g_assert_cmpint (ant_judgements_class (ant_analysis_get_judgements (analysis), 15, 0.2), ==, ANT_CLASS_SPOT);
  const AntMask *mask = g_ptr_array_index (ant_analysis_get_treatment (analysis)->masks, 0);
  g_assert_cmpfloat (mask->span.start_d, ==, 11);
}

static void
masked_rows_are_flagged_by_hand (void)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  g_autoptr (AntRecord) record = test_rows (200, 0, 0.05);
  AntGridOptions grid;
  ant_analysis_mask (analysis, (AntSpan) { 2, 3 }, "");
  g_assert_true (ant_treatment_grid (ant_analysis_get_treatment (analysis), &grid, NULL));
  test_grid (record, &grid);
  ant_grid_options_clear (&grid);
  for (gsize i = 0; i < record->n_rows; i++)
    g_assert_cmpuint (record->flags[i], ==, record->time_d[i] >= 2 && record->time_d[i] <= 3 ? ANT_FLAG_HAND : 0);
  g_assert_true (test_said (record, "masked by hand: 21"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_setenv ("SOURCE_DATE_EPOCH", "2240000000", TRUE);
  g_test_add_func ("/data/analysis/a-change-can-be-undone-and-done-again", a_change_can_be_undone_and_done_again);
  g_test_add_func ("/data/analysis/every-change-has-its-name", every_change_has_its_name);
  g_test_add_func ("/data/analysis/what-changes-nothing-is-no-change", what_changes_nothing_is_no_change);
  g_test_add_func ("/data/analysis/a-new-change-ends-what-could-be-done-again", a_new_change_ends_what_could_be_done_again);
  g_test_add_func ("/data/analysis/what-is-typed-in-one-go-is-one-change", what_is_typed_in_one_go_is_one_change);
  g_test_add_func ("/data/analysis/a-wrong-setting-changes-nothing", a_wrong_setting_changes_nothing);
  g_test_add_func ("/data/analysis/the-stack-is-bounded-and-the-history-is-not", the_stack_is_bounded_and_the_history_is_not);
  g_test_add_func ("/data/analysis/undoing-to-what-was-saved-is-no-change", undoing_to_what_was_saved_is_no_change);
  g_test_add_func ("/data/analysis/a-random-walk-undone-and-done-again-gives-the-same-bytes",
                   a_random_walk_undone_and_done_again_gives_the_same_bytes);
  g_test_add_func ("/data/analysis/a-span-can-be-unmasked-in-its-middle", a_span_can_be_unmasked_in_its_middle);
  g_test_add_func ("/data/analysis/a-reason-can-be-given-and-undone", a_reason_can_be_given_and_undone);
  g_test_add_func ("/data/analysis/a-snapshot-stays-as-it-was", a_snapshot_stays_as_it_was);
  g_test_add_func ("/data/analysis/only-what-nobody-can-compute-again-would-be-lost", only_what_nobody_can_compute_again_would_be_lost);
  g_test_add_func ("/data/analysis/results-are-stale-once-the-treatment-differs", results_are_stale_once_the_treatment_differs);
  g_test_add_func ("/data/analysis/witnesses-are-few-and-none-twice", witnesses_are_few_and_none_twice);
  g_test_add_func ("/data/analysis/verdicts-are-carried-over-and-counted", verdicts_are_carried_over_and_counted);
  g_test_add_func ("/data/analysis/of-another-record-only-the-words-are-kept", of_another_record_only_the_words_are_kept);
  g_test_add_func ("/data/analysis/times-follow-a-record-that-begins-earlier", times_follow_a_record_that_begins_earlier);
  g_test_add_func ("/data/analysis/masked-rows-are-flagged-by-hand", masked_rows_are_flagged_by_hand);
  return g_test_run ();
}
