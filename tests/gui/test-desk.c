/* test-desk.c - views, selection and spans, without a window. */
#include <glib/gstdio.h>
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "data/verdict-words.h"
#include "support.h"

static AntDesk *
desk_with_record (void)
{
  AntDesk *desk = ant_desk_new ();
  ant_desk_open (desk, test_gui_record ());
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_nonnull (ant_desk_get_record (desk));
  return desk;
}

static double
view_length (AntDesk *desk)
{
  return ant_desk_get_view (desk)->to - ant_desk_get_view (desk)->from;
}

static void
zooming_keeps_the_place_under_the_pointer (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  double before = view_length (desk);
  ant_desk_zoom (desk, 4, 5);
  g_assert_cmpfloat_with_epsilon (view_length (desk), before / 4, 1e-9);
  const AntView *view = ant_desk_get_view (desk);
  g_assert_cmpfloat (view->from, <, 5);
  g_assert_cmpfloat (view->to, >, 5);
}

static void
the_view_stays_within_the_record (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  double whole = view_length (desk);
  ant_desk_set_view (desk, -100, 500);
  g_assert_cmpfloat_with_epsilon (view_length (desk), whole, 1e-9);
  ant_desk_set_view (desk, 15, 15.0000001);
  g_assert_cmpfloat_with_epsilon (view_length (desk), 12 / 144.0, 1e-6);
  ant_desk_pan (desk, 1000);
  g_assert_cmpfloat (ant_desk_get_view (desk)->to, <=, 16);
}

static void
one_can_go_back_through_views (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  double whole = view_length (desk);
  g_assert_false (ant_desk_can_go (desk, -1));
  ant_desk_set_view (desk, 2, 4);
  g_assert_true (ant_desk_can_go (desk, -1));
  ant_desk_go (desk, -1);
  g_assert_cmpfloat_with_epsilon (view_length (desk), whole, 1e-9);
  ant_desk_go (desk, 1);
  g_assert_cmpfloat_with_epsilon (view_length (desk), 2, 1e-9);
  g_assert_false (ant_desk_can_go (desk, 1));
}

static void
a_long_drag_is_one_step_back (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  for (int i = 1; i < 100; i++)
    ant_desk_set_view (desk, 0.01 * i, 3 + 0.01 * i);
  ant_desk_go (desk, -1);
  g_assert_false (ant_desk_can_go (desk, -1));
}

static gboolean
has_no_witness_to_read (gpointer desk)
{
  for (guint i = 0; i < ant_desk_count_witnesses (desk); i++)
    if (!ant_desk_get_witness_strips (desk, i) && !ant_desk_get_witness_problem (desk, i))
      return FALSE;
  return test_gui_idle (desk);
}

/* The record under another name, so that it is another file. */
static char *
copy_record (void)
{
  char *path = NULL, *text = NULL;
  gsize size;
  g_close (g_file_open_tmp (NULL, &path, NULL), NULL);
  g_assert_true (g_file_get_contents (test_gui_record (), &text, &size, NULL));
  g_assert_true (g_file_set_contents (path, text, (gssize) size, NULL));
  g_free (text);
  return path;
}

/* The record as its own witness: the ratio is one throughout. */
static void
a_witness_is_compared_until_it_is_closed (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  ant_desk_open_witness (desk, test_gui_record ());
  g_assert_nonnull (ant_desk_get_witness (desk, 0));
  g_assert_null (ant_desk_get_witness_strips (desk, 0));
  test_gui_wait (has_no_witness_to_read, desk, 20);
  const AntWitnessStrips *witness = ant_desk_get_witness_strips (desk, 0);
  g_assert_nonnull (witness);
  g_assert_cmpuint (witness->comparison->n, ==, ant_desk_get_record (desk)->series.n);
  for (gsize i = 0; i < witness->comparison->n; i++)
    g_assert_true (isnan (witness->comparison->ratio_ppm[i]) || fabsf (witness->comparison->ratio_ppm[i]) < 0.01f);
  ant_desk_close_witness (desk, 0);
  g_assert_cmpuint (ant_desk_count_witnesses (desk), ==, 0);
  g_assert_null (ant_desk_get_witness (desk, 0));
}

static void
several_witnesses_are_opened_and_undone_one_by_one (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  g_autofree char *copy = copy_record ();
  ant_desk_open_witness (desk, test_gui_record ());
  ant_desk_open_witness (desk, copy);
  ant_desk_open_witness (desk, copy); /* it is there already */
  test_gui_wait (has_no_witness_to_read, desk, 20);
  g_assert_cmpuint (ant_desk_count_witnesses (desk), ==, 2);
  g_autoptr (GPtrArray) comparisons = ant_desk_get_comparisons (desk);
  g_assert_cmpuint (comparisons->len, ==, 2);
  g_assert_true (ant_desk_undo (desk));
  g_assert_cmpuint (ant_desk_count_witnesses (desk), ==, 1);
  g_assert_true (ant_desk_undo (desk));
  g_assert_cmpuint (ant_desk_count_witnesses (desk), ==, 0);
  g_assert_true (ant_desk_redo (desk));
  test_gui_wait (has_no_witness_to_read, desk, 20);
  g_assert_nonnull (ant_desk_get_witness_strips (desk, 0));
  g_unlink (copy);
}

/* The same file read in another way takes its place. */
static void
a_witness_can_be_read_in_another_way (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  g_autofree char *copy = copy_record ();
  AntReadingChoices reading = { 0 };
  ant_desk_open_witness (desk, copy);
  test_gui_wait (has_no_witness_to_read, desk, 20);
  g_assert_true (ant_reading_choices_parse_columns (&reading, "value=7", NULL)); /* there is none */
  ant_desk_open_witness_as (desk, copy, &reading);
  test_gui_wait (has_no_witness_to_read, desk, 20);
  g_assert_cmpuint (ant_desk_count_witnesses (desk), ==, 1);
  g_assert_nonnull (ant_desk_get_witness_problem (desk, 0));
  g_clear_pointer (&reading.value_column, g_free);
  g_assert_true (ant_reading_choices_parse_columns (&reading, "value=2", NULL));
  ant_desk_open_witness_as (desk, copy, &reading);
  test_gui_wait (has_no_witness_to_read, desk, 20);
  g_assert_cmpuint (ant_desk_count_witnesses (desk), ==, 1);
  g_assert_nonnull (ant_desk_get_witness_strips (desk, 0));
  g_assert_cmpstr (ant_desk_get_witness (desk, 0)->reading.value_column, ==, "2");
  ant_reading_choices_clear (&reading);
  g_unlink (copy);
}

static gboolean
is_saved (gpointer desk)
{
  return !ant_desk_is_saving (desk);
}

static void
failed_cb (AntDesk *desk, const char *sentence, char **said)
{
  g_free (*said);
  *said = g_strdup (sentence);
}

/* The file that keeps it names the witness; other bytes of it are told, and become the analysis's. */
static void
witnesses_come_back_with_the_analysis (void)
{
  g_autoptr (AntDesk) desk = desk_with_record (), other = ant_desk_new ();
  g_autofree char *copy = copy_record (), *folder = g_dir_make_tmp (NULL, NULL), *said = NULL;
  g_autofree char *path = g_build_filename (folder, "work.antumbra", NULL);
  ant_desk_open_witness (desk, copy);
  test_gui_wait (has_no_witness_to_read, desk, 20);
  ant_desk_save (desk, path);
  test_gui_wait (is_saved, desk, 20);
  FILE *file = fopen (copy, "a");
  g_assert_cmpint (fputs ("# one more remark\n", file), >, 0);
  fclose (file);
  g_signal_connect (other, "failed", G_CALLBACK (failed_cb), &said);
  ant_desk_open (other, path);
  test_gui_wait (test_gui_idle, other, 20);
  g_assert_cmpuint (ant_desk_count_witnesses (other), ==, 1);
  test_gui_wait (has_no_witness_to_read, other, 20);
  g_assert_nonnull (ant_desk_get_witness_strips (other, 0));
  g_assert_nonnull (said);
  g_assert_nonnull (strstr (said, "the bytes of this witness"));
  g_assert_true (ant_analysis_is_changed (ant_desk_get_analysis (other)));
  g_unlink (copy);
  g_unlink (path);
  g_rmdir (folder);
}

static void
another_drift_compares_anew (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  ant_desk_open_witness (desk, test_gui_record ());
  test_gui_wait (has_no_witness_to_read, desk, 20);
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("witness-drift"), "3", NULL));
  const AntWitnessStrips *before = ant_desk_get_witness_strips (desk, 0);
  for (int i = 0; i < 200 && ant_desk_get_witness_strips (desk, 0) == before; i++)
    g_main_context_iteration (NULL, TRUE);
  g_assert_cmpfloat (ant_desk_get_witness_strips (desk, 0)->comparison->drift_d, ==, 3.0);
}

static void
what_is_no_witness_is_told (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  g_autofree char *said = NULL;
  g_signal_connect (desk, "failed", G_CALLBACK (failed_cb), &said);
  ant_desk_open_witness (desk, "/nowhere/record.csv");
  test_gui_wait (has_no_witness_to_read, desk, 20);
  g_assert_nonnull (ant_desk_get_witness_problem (desk, 0));
  g_assert_null (ant_analysis_undo_name (ant_desk_get_analysis (desk)));
  ant_desk_close_witness (desk, 0);
  g_assert_cmpuint (ant_desk_count_witnesses (desk), ==, 0);
  g_assert_nonnull (said);
  g_assert_nonnull (strstr (said, "the witness: "));
}

/* Reading */

/* The second column is read instead of the first; undone, the first is there again at once. */
static void
undoing_a_choice_reads_the_record_again (void)
{
  g_autoptr (AntDesk) desk = ant_desk_new ();
  g_autofree char *path = NULL;
  g_autoptr (GString) text = g_string_new ("jd,first (W/m2),second (W/m2)\n");
  g_close (g_file_open_tmp (NULL, &path, NULL), NULL);
  for (int i = 0; i < 200; i++)
    g_string_append_printf (text, "%.8f,%.4f,%.4f\n", 2466583.5 + i / 144.0, 1361 + 0.01 * sin (i), 1300 + 0.01 * cos (i));
  g_assert_true (g_file_set_contents (path, text->str, -1, NULL));
  ant_desk_open (desk, path);
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_cmpfloat_with_epsilon (ant_desk_get_record (desk)->median, 1361, 0.1);
  AntReadingChoices reading = { 0 };
  g_assert_true (ant_reading_choices_parse_columns (&reading, "value=3", NULL));
  ant_desk_open_as (desk, path, &reading);
  ant_reading_choices_clear (&reading);
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_cmpfloat_with_epsilon (ant_desk_get_record (desk)->median, 1300, 0.1);
  g_assert_true (ant_desk_undo (desk));
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_cmpfloat_with_epsilon (ant_desk_get_record (desk)->median, 1361, 0.1);
  g_assert_true (ant_desk_redo (desk));
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_cmpfloat_with_epsilon (ant_desk_get_record (desk)->median, 1300, 0.1);
  g_unlink (path);
}

/* Columns */

static gboolean
has_column (gpointer desk)
{
  return ant_desk_get_column_strip (desk, 0) != NULL && test_gui_idle (desk);
}

static void
a_further_column_is_shown_while_there_is_one (void)
{
  g_autoptr (AntDesk) desk = ant_desk_new ();
  g_autofree char *path = NULL;
  g_autoptr (GString) text = g_string_new ("jd,tsi (W/m2),temperature (K)\n");
  g_close (g_file_open_tmp (NULL, &path, NULL), NULL);
  for (int i = 0; i < 500; i++)
    g_string_append_printf (text, "%.8f,%.4f,%.2f\n", 2466583.5 + i / 288.0, 1361 + 0.01 * sin (i), 290 + 0.5 * cos (i / 20.0));
  g_assert_true (g_file_set_contents (path, text->str, -1, NULL));
  ant_desk_open (desk, path);
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_false (ant_desk_is_column_shown (desk, 0));
  ant_desk_show_column (desk, 0, TRUE);
  ant_desk_show_column (desk, 7, TRUE); /* there is no such */
  g_assert_cmpuint (ant_desk_count_shown_columns (desk), ==, 1);
  test_gui_wait (has_column, desk, 20);
  const AntColumnStrip *strip = ant_desk_get_column_strip (desk, 0);
  g_assert_cmpfloat_with_epsilon ((double) strip->value[40], 290 + 0.5 * cos (2.0), 0.01);
  ant_desk_reload (desk); /* it stays */
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_true (ant_desk_is_column_shown (desk, 0));
  ant_desk_open (desk, test_gui_record ()); /* which has none */
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_cmpuint (ant_desk_count_shown_columns (desk), ==, 0);
  g_unlink (path);
}

static gboolean
has_item (gpointer desk)
{
  return g_list_model_get_n_items (ant_desk_get_items (desk)) > 0 && test_gui_idle (desk);
}

static void
an_asked_dip_is_measured_and_selected (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  ant_desk_ask (desk, TEST_DIP_D - 3 / 24.0, TEST_DIP_D + 3 / 24.0);
  test_gui_wait (has_item, desk, 60);
  AntDipItem *item = ant_desk_get_selected (desk);
  g_assert_nonnull (item);
  g_assert_cmpint (ant_dip_item_get_kind (item), ==, ANT_KIND_ASKED);
  g_assert_cmpfloat_with_epsilon (ant_dip_item_get_dip (item)->depth_ppm, 900, 90);
  g_assert_cmpfloat (ant_dip_item_get_upper_limit_ppm (item), >, ant_dip_item_get_dip (item)->depth_ppm);
  g_assert_nonnull (ant_dip_item_get_verdict (item));
  g_assert_cmpint (ant_verdict_class (ant_dip_item_get_verdict (item)), ==, ANT_CLASS_PLANET_SHAPED);
}

/* By the class that is shown, the shape, and what the analyst wrote; the marks of chart and strips follow. */
static void
a_filter_holds_for_the_marks_too (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  const AntDipMark *mark;
  ant_desk_ask (desk, TEST_DIP_D - 3 / 24.0, TEST_DIP_D + 3 / 24.0);
  test_gui_wait (has_item, desk, 60);
  ant_desk_note (desk, "Seen by eye");
  const char *const kept[] = { "", "PLANET-shaped", "crossing", "by eye" };
  for (gsize i = 0; i < G_N_ELEMENTS (kept); i++)
    {
      ant_desk_set_filter (desk, kept[i]);
      g_assert_cmpuint (ant_desk_get_marks (desk, &mark), ==, 1);
      g_assert_nonnull (ant_desk_get_selected (desk));
    }
  ant_desk_set_filter (desk, "instrument");
  g_assert_cmpuint (ant_desk_get_marks (desk, &mark), ==, 0);
  g_assert_null (ant_desk_get_selected (desk));
}

static void
selecting_brings_a_dip_into_view (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  ant_desk_ask (desk, TEST_DIP_D - 3 / 24.0, TEST_DIP_D + 3 / 24.0);
  test_gui_wait (has_item, desk, 60);
  ant_desk_select (desk, NULL);
  ant_desk_set_view (desk, 1, 3);
  ant_desk_select_next (desk, 1);
  const AntView *view = ant_desk_get_view (desk);
  g_assert_cmpfloat (view->from, <, TEST_DIP_D - 3 / 24.0);
  g_assert_cmpfloat (view->to, >, TEST_DIP_D + 3 / 24.0);
  g_assert_cmpfloat_with_epsilon (view_length (desk), 2, 1e-9);
  ant_desk_view_selected (desk);
  g_assert_cmpfloat_with_epsilon (view_length (desk), 1, 0.1);
}

static void
the_readout_tells_time_value_and_residual (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  g_autofree char *nothing = ant_desk_readout (desk);
  g_assert_cmpstr (nothing, ==, "");
  ant_desk_set_pointer (desk, 3);
  g_autofree char *text = ant_desk_readout (desk);
  g_assert_nonnull (strstr (text, "W/m²"));
  g_assert_nonnull (strstr (text, "residual"));
}

static void
a_span_grows_by_keys_about_the_middle_of_the_view (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  AntSpan first, second;
  ant_desk_widen_span (desk, 1);
  g_assert_true (ant_desk_get_span (desk, &first));
  ant_desk_widen_span (desk, 3);
  g_assert_true (ant_desk_get_span (desk, &second));
  g_assert_cmpfloat (second.end_d - second.start_d, >, first.end_d - first.start_d);
  g_assert_cmpfloat_with_epsilon ((second.start_d + second.end_d) / 2, 8, 0.1);
  ant_desk_set_span (desk, NULL);
  g_assert_false (ant_desk_get_span (desk, &first));
}

static void
add (void)
{
  g_test_add_func ("/gui/desk/zooming-keeps-the-place-under-the-pointer", zooming_keeps_the_place_under_the_pointer);
  g_test_add_func ("/gui/desk/the-view-stays-within-the-record", the_view_stays_within_the_record);
  g_test_add_func ("/gui/desk/one-can-go-back-through-views", one_can_go_back_through_views);
  g_test_add_func ("/gui/desk/a-long-drag-is-one-step-back", a_long_drag_is_one_step_back);
  g_test_add_func ("/gui/desk/an-asked-dip-is-measured-and-selected", an_asked_dip_is_measured_and_selected);
  g_test_add_func ("/gui/desk/a-filter-holds-for-the-marks-too", a_filter_holds_for_the_marks_too);
  g_test_add_func ("/gui/desk/selecting-brings-a-dip-into-view", selecting_brings_a_dip_into_view);
  g_test_add_func ("/gui/desk/the-readout-tells-time-value-and-residual", the_readout_tells_time_value_and_residual);
  g_test_add_func ("/gui/desk/a-span-grows-by-keys-about-the-middle-of-the-view",
                   a_span_grows_by_keys_about_the_middle_of_the_view);
  g_test_add_func ("/gui/desk/a-witness-is-compared-until-it-is-closed", a_witness_is_compared_until_it_is_closed);
  g_test_add_func ("/gui/desk/several-witnesses-are-opened-and-undone-one-by-one", several_witnesses_are_opened_and_undone_one_by_one);
  g_test_add_func ("/gui/desk/a-witness-can-be-read-in-another-way", a_witness_can_be_read_in_another_way);
  g_test_add_func ("/gui/desk/witnesses-come-back-with-the-analysis", witnesses_come_back_with_the_analysis);
  g_test_add_func ("/gui/desk/a-further-column-is-shown-while-there-is-one", a_further_column_is_shown_while_there_is_one);
  g_test_add_func ("/gui/desk/undoing-a-choice-reads-the-record-again", undoing_a_choice_reads_the_record_again);
  g_test_add_func ("/gui/desk/another-drift-compares-anew", another_drift_compares_anew);
  g_test_add_func ("/gui/desk/what-is-no-witness-is-told", what_is_no_witness_is_told);
}

int
main (int argc, char **argv)
{
  return test_gui_run (&argc, &argv, add);
}
