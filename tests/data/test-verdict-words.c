/* test-verdict-words.c - verdicts in words: classes, sentences by weight, the tables' short form. */
#include <glib.h>
#include <math.h>
#include <string.h>
#include "data/verdict-words.h"

static AntVerdict
example (void)
{
  AntVerdict verdict = { .sign = 1, .cause = ANT_CAUSE_INSTRUMENT, .shape = ANT_CAUSE_PLANET };
  verdict.probability[ANT_CAUSE_INSTRUMENT] = 0.9;
  verdict.probability[ANT_CAUSE_PLANET] = 0.1;
  verdict.shape_probability[ANT_CAUSE_PLANET] = 0.75;
  verdict.rival[ANT_RIVAL_CROSSING] = (AntRivalFit) { .kind = ANT_RIVAL_CROSSING, .fitted = 1, .chi2 = 1 };
  verdict.rival[ANT_RIVAL_STEP] = (AntRivalFit) { .kind = ANT_RIVAL_STEP, .fitted = 1, .chi2 = 1.2 };
  verdict.rival_probability[ANT_RIVAL_CROSSING] = 0.75;
  verdict.rival_probability[ANT_RIVAL_STEP] = 0.25;
  AntEvidence gap = { .kind = ANT_EVIDENCE_GAP, .number = { 5, 0.1 } }, edges = { .kind = ANT_EVIDENCE_EDGES, .number = { 1, 0 } };
  AntEvidence chance = { .kind = ANT_EVIDENCE_CHANCE, .number = { 1e-5 } };
  gap.weight[ANT_CAUSE_INSTRUMENT] = 3;
  chance.weight[ANT_CAUSE_NOISE] = -9;
  ant_verdict_add (&verdict, &edges);
  ant_verdict_add (&verdict, &gap);
  ant_verdict_add (&verdict, &chance);
  return verdict;
}

static void
test_classes (void)
{
  AntVerdict verdict = example ();
  g_assert_cmpint (ant_verdict_class (&verdict), ==, ANT_CLASS_INSTRUMENT);
  /* Half a crossing, its egress not seen, is named only when nearly sure. */
  g_assert_cmpint (ant_verdict_shape_class (&verdict), ==, ANT_CLASS_UNDECIDED);
  verdict.shape_probability[ANT_CAUSE_PLANET] = 0.995;
  g_assert_cmpint (ant_verdict_shape_class (&verdict), ==, ANT_CLASS_PLANET);
  g_assert_cmpfloat (ant_verdict_probability (&verdict), ==, 0.9);
  verdict.probability[ANT_CAUSE_INSTRUMENT] = 0.45;
  g_assert_cmpint (ant_verdict_class (&verdict), ==, ANT_CLASS_UNDECIDED);
  for (int cause = 0; cause < ANT_N_CAUSES; cause++)
    g_assert_cmpint (ant_cause_class ((AntCause) cause), !=, ANT_CLASS_UNDECIDED);
}

static void
test_heaviest_first (void)
{
  AntVerdict verdict = example ();
  g_autoptr (GPtrArray) lines = ant_verdict_lines (&verdict);
  g_assert_cmpuint (lines->len, ==, 4);
  for (guint i = 1; i < lines->len; i++)
    {
      const AntEvidenceLine *before = g_ptr_array_index (lines, i - 1), *line = g_ptr_array_index (lines, i);
      g_assert_cmpfloat (fabs (before->weight), >=, fabs (line->weight));
    }
  const AntEvidenceLine *first = g_ptr_array_index (lines, 0), *second = g_ptr_array_index (lines, 1), *third = g_ptr_array_index (lines, 2);
  g_assert_cmpstr (first->text, ==, "Noise alone would show 1e-05 dips as strong in this record");
  g_assert_cmpfloat (first->weight, ==, 9);
  g_assert_cmpstr (second->text, ==, "Its onset is 5 min after a gap; 10 % of the record's time is as near one");
  g_assert_cmpfloat (second->weight, ==, 3);
  /* The shape speaks against the class that was found. */
  g_assert_nonnull (strstr (third->text, "that of a crossing rather than a step"));
  g_assert_cmpfloat_with_epsilon (third->weight, -log (3), 1e-12);
}

static void
test_table_text (void)
{
  AntVerdict verdict = example ();
  g_autofree char *text = ant_verdict_table_text (&verdict);
  g_assert_cmpstr (text, ==, "shape crossing 0.750 step 0.250; chance 1e-05 (+9.0); gap 5 (+3.0); edges 1 (+0.0)");
}

static void
test_probabilities (void)
{
  static const struct { double value; const char *words; } known[]
      = { { 0.9999, "> 99.9 %" }, { 0.995, "99.5 %" }, { 0.87, "87 %" }, { 0.012, "1.2 %" }, { 1e-9, "< 0.1 %" } };
  for (gsize i = 0; i < G_N_ELEMENTS (known); i++)
    {
      g_autofree char *words = ant_probability_words (known[i].value);
      g_assert_cmpstr (words, ==, known[i].words);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/verdict-words/undecided-below-the-least-probability", test_classes);
  g_test_add_func ("/data/verdict-words/heaviest-evidence-comes-first", test_heaviest_first);
  g_test_add_func ("/data/verdict-words/short-form-of-tables", test_table_text);
  g_test_add_func ("/data/verdict-words/probabilities-as-people-read-them", test_probabilities);
  return g_test_run ();
}
