/* test-analysis-text.c - an analysis as text and back: nothing lost, nothing unknown dropped, nothing wrong let in. */
#include <math.h>
#include <string.h>

#include "data/analysis-text.h"
#include "data/error.h"
#include "rows.h"
#include "worked.h"

#define HERE "/somewhere/work.antumbra"

static AntAnalysis *
read_text (const char *text)
{
  g_autoptr (GError) error = NULL;
  g_autofree char *newer = NULL;
  AntAnalysis *analysis = ant_analysis_parse (HERE, text, strlen (text), &newer, &error);
  g_assert_no_error (error);
  g_assert_null (newer);
  return analysis;
}

static char *
worked_text (void)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  return ant_analysis_to_text (analysis, HERE);
}

/* The text with its first `old` replaced. */
static char *
changed_text (const char *old, const char *new)
{
  g_autofree char *text = worked_text ();
  char *at = strstr (text, old);
  g_assert_nonnull (at);
  return g_strdup_printf ("%.*s%s%s", (int) (at - text), text, new, at + strlen (old));
}

static void
what_is_read_is_written_the_same (void)
{
  g_autofree char *text = worked_text ();
  g_autoptr (AntAnalysis) analysis = read_text (text);
  g_autofree char *again = ant_analysis_to_text (analysis, HERE);
  g_assert_cmpstr (again, ==, text);
  g_assert_false (ant_analysis_is_changed (analysis));
  g_assert_cmpstr (ant_analysis_get_path (analysis), ==, HERE);
}

static void
what_was_found_comes_back_to_the_last_digit (void)
{
  g_autofree char *text = worked_text ();
  g_autoptr (AntAnalysis) analysis = read_text (text), first = test_worked_analysis ();
  g_autoptr (AntRecord) record = test_results_record ();
  g_assert_null (ant_analysis_get_results (analysis)); /* no record yet */
  g_assert_null (ant_analysis_take_record (analysis, record));
  const AntScanResults *back = ant_analysis_get_results (analysis), *results = ant_analysis_get_results (first);
  g_assert_cmpuint (back->n_dips, ==, results->n_dips);
  for (gsize i = 0; i < back->n_dips; i++)
    {
      g_assert_cmpfloat (back->dip[i].depth_sigma_ppm, ==, results->dip[i].depth_sigma_ppm);
      g_assert_cmpfloat (back->dip[i].radius_ratio, ==, results->dip[i].radius_ratio);
      g_assert_true (isnan (back->dip[i].duration_sigma_d));
      g_assert_cmpint (back->dip[i].edges, ==, ANT_EDGES_INGRESS);
    }
  g_assert_cmpfloat (back->chunk[1].model.part[2].time_d, ==, results->chunk[1].model.part[2].time_d);
  g_assert_cmpfloat (back->chunk[1].power_unmasked[4], ==, results->chunk[1].power_unmasked[4]);
  g_assert_true (isnan (back->chunk[1].power_unmasked[2]));
  g_assert_cmpuint (back->flags[170], ==, ANT_FLAG_SPIKE);
  g_assert_cmpstr (g_ptr_array_index (back->said, 0), ==, g_ptr_array_index (results->said, 0));
  g_assert_false (ant_analysis_is_stale (analysis));
}

static void
settings_come_back_to_the_last_bit (void)
{
  g_autofree char *text = worked_text ();
  g_autoptr (AntAnalysis) analysis = read_text (text), first = test_worked_analysis ();
  const AntSettings *back = &ant_analysis_get_treatment (analysis)->settings;
  const AntSettings *given = &ant_analysis_get_treatment (first)->settings;
  for (gsize i = 0; i < ant_n_settings; i++)
    g_assert_cmpfloat (ant_setting_get (&ant_setting_table[i], back), ==, ant_setting_get (&ant_setting_table[i], given));
}

static void
the_record_is_named_from_the_file (void)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  const char *const at[][2] = { { "/somewhere/records/a.antumbra", "\"path\" : \"ten days.txt\"" },
                                { "/somewhere/notes/of/a.antumbra", "\"path\" : \"../../records/ten days.txt\"" },
                                { "/elsewhere/a.antumbra", "\"path\" : \"/somewhere/records/ten days.txt\"" } };
  for (gsize i = 0; i < G_N_ELEMENTS (at); i++)
    {
      g_autofree char *newer = NULL, *text = ant_analysis_to_text (analysis, at[i][0]);
      g_assert_nonnull (strstr (text, at[i][1]));
      g_autoptr (AntAnalysis) back = ant_analysis_parse (at[i][0], text, strlen (text), &newer, NULL);
      g_assert_cmpstr (ant_analysis_get_record_path (back), ==, "/somewhere/records/ten days.txt");
    }
}

static void
witnesses_come_back_and_may_be_absent (void)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  g_autofree char *newer = NULL, *text = ant_analysis_to_text (analysis, "/somewhere/notes/a.antumbra");
  g_assert_nonnull (strstr (text, "\"path\" : \"../records/other instrument.nc\""));
  g_autoptr (AntAnalysis) back = ant_analysis_parse ("/moved/notes/a.antumbra", text, strlen (text), &newer, NULL);
  const AntTreatment *treatment = ant_analysis_get_treatment (back);
  g_assert_cmpuint (treatment->witnesses->len, ==, 1);
  const AntWitness *witness = g_ptr_array_index (treatment->witnesses, 0);
  g_assert_cmpstr (witness->path, ==, "/moved/records/other instrument.nc");
  g_assert_cmpstr (witness->sha256, ==, "5f70bf18a086007016e948b04aed3b82103a36bea41755b6cddfaf10ace3c6ef");
  g_assert_cmpstr (witness->reading.value_column, ==, "tsi");
  g_assert_cmpuint (witness->reading.fill_values->len, ==, 2);
  g_autofree char *hidden = changed_text ("\"witnesses\" :", "\"before\" :");
  g_autoptr (AntAnalysis) older = read_text (hidden);
  g_assert_cmpuint (ant_analysis_get_treatment (older)->witnesses->len, ==, 0);
}

static void
what_is_not_known_is_written_again (void)
{
  const char *const places[] = { "\"antumbra_analysis\" : 1", "\"sha256\" :", "\"from_d\" : null", "\"stamp\" : \"start\"",
                                 "\"kind\" : \"hand\"", "\"class\" : \"instrument\"", "\"who\" :", "\"reach\" : \"complete\"" };
  for (gsize i = 0; i < G_N_ELEMENTS (places); i++)
    {
      g_autofree char *new = g_strdup_printf ("\"weather\" : { \"wind\" : [ 3, null ] }, %s", places[i]);
      g_autofree char *text = changed_text (places[i], new);
      g_autoptr (AntAnalysis) analysis = read_text (text);
      ant_analysis_mask (analysis, (AntSpan) { 0, 1 }, "one more");
      ant_analysis_judge (analysis, "dip 2", 4.5, 0.3, ANT_CLASS_NOISE);
      g_autofree char *again = ant_analysis_to_text (analysis, HERE);
      g_assert_nonnull (strstr (again, "\"weather\""));
      g_autoptr (AntAnalysis) back = read_text (again);
    }
}

static void
a_setting_back_at_its_default_does_not_come_again (void)
{
  g_autofree char *text = worked_text ();
  g_autoptr (AntAnalysis) analysis = read_text (text);
  g_assert_nonnull (strstr (text, "\"stamp\" : \"start\""));
  ant_analysis_reset_settings (analysis);
  ant_analysis_drop_results (analysis);
  g_autofree char *again = ant_analysis_to_text (analysis, HERE);
  g_assert_null (strstr (again, "\"stamp\""));
}

static void
a_newer_file_is_read_and_left_alone (void)
{
  g_autofree char *text = changed_text ("\"antumbra_analysis\" : 1", "\"antumbra_analysis\" : 2"), *newer = NULL;
  g_autoptr (AntAnalysis) analysis = ant_analysis_parse (HERE, text, strlen (text), &newer, NULL);
  g_assert_nonnull (analysis);
  g_assert_nonnull (newer);
  g_assert_null (ant_analysis_get_path (analysis));
}

/* What is no analysis */

static guint
expect_sentence (const char *text, gsize length)
{
  g_autoptr (GError) error = NULL;
  g_autofree char *newer = NULL;
  g_autofree char *copy = g_memdup2 (length ? text : "", MAX (length, 1)); /* a step beyond the end is seen by sanitizers */
  g_autoptr (AntAnalysis) analysis = ant_analysis_parse (HERE, copy, length, &newer, &error);
  g_assert_true ((analysis != NULL) == (error == NULL));
  if (analysis)
    return 0;
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_true (g_str_has_prefix (error->message, HERE ": "));
  g_assert_null (strchr (error->message, '\n'));
  g_assert_true (g_utf8_validate (error->message, -1, NULL));
  g_assert_cmpuint (strlen (error->message), <, 400);
  return 1;
}

static void
refuse (const char *text, const char *fragment)
{
  g_autoptr (GError) error = NULL;
  g_autofree char *newer = NULL;
  g_autoptr (AntAnalysis) analysis = ant_analysis_parse (HERE, text, strlen (text), &newer, &error);
  g_assert_null (analysis);
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  if (!strstr (error->message, fragment))
    g_error ("“%s” does not hold “%s”", error->message, fragment);
}

static void
the_sentence_names_the_place (void)
{
  g_autofree char *number = changed_text ("\"snr\" : 25.0", "\"snr\" : \"many\"");
  refuse (number, "work.antumbra: results.dips[0].snr: found “many”, expected a number or null");
  g_autofree char *class = changed_text ("\"class\" : \"planet\"", "\"class\" : \"comet\"");
  refuse (class, "judgements[0].class: found “comet”, expected a class of dips");
  g_autofree char *setting = changed_text ("\"stamp\" : \"start\"", "\"stamp\" : \"midnight\"");
  refuse (setting, "treatment.settings.setting “stamp”: found “midnight”");
  g_autofree char *chunk = changed_text ("\"chunk\" : 1", "\"chunk\" : 7");
  refuse (chunk, "results.dips[2].");
}

static void
every_wrong_value_is_refused_or_harmless (void)
{
  static const char *const wrong[] = { "null", "\"x\"", "-1", "1e999", "{}", "[]", "true", "[[[]]]", "99999999999999999999" };
  g_autofree char *text = worked_text ();
  guint n_tried = 0, n_refused = 0;
  for (const char *at = strstr (text, " : "); at; at = strstr (at + 3, " : "))
    for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
      {
        /* The member's value ends where its line does, or opens a bracket: then all of it goes. */
        const char *value = at + 3, *end = value + strcspn (value, "\n,");
        g_autofree char *changed = g_strdup_printf ("%.*s%s%s", (int) (value - text), text, wrong[i], end);
        n_refused += expect_sentence (changed, strlen (changed));
        n_tried++;
      }
  g_test_message ("%u files with one wrong value, %u of them refused", n_tried, n_refused);
  g_assert_cmpuint (n_refused, >, 200);
}

static void
every_cut_is_refused (void)
{
  g_autofree char *text = worked_text ();
  gsize length = strlen (text), whole = strlen (g_strchomp (text));
  for (gsize cut = 0; cut < whole; cut += 1 + length / 150)
    g_assert_cmpuint (expect_sentence (text, cut), ==, 1);
}

static void
every_flipped_bit_is_survived (void)
{
  g_autofree char *text = worked_text ();
  gsize length = strlen (text);
  for (gsize i = 0; i < 400; i++)
    {
      gsize at = (i * 7919) % length;
      char kept = text[at];
      text[at] = (char) (text[at] ^ (1 << i % 8));
      expect_sentence (text, length);
      text[at] = kept;
    }
}

static void
what_the_parser_cannot_survive_never_reaches_it (void)
{
  g_autoptr (GString) deep = g_string_new ("{\"antumbra_analysis\":1,\"x\":");
  for (int i = 0; i < 200000; i++)
    g_string_append_c (deep, '[');
  refuse (deep->str, "nested too deeply");
  refuse ("{\"a\":\"\\ud800\"}", "half of a pair");
  refuse ("{\"a\":\"\\udc00\\ud800\"}", "half of a pair");
  refuse ("{\"a\":\"\\u0000\"}", "no character");
  refuse ("{\"a\":\"\\uD83D\\uDE00\"}", "antumbra_analysis");
  refuse ("{\"a\":\"\\q\"}", "unknown escape");
  refuse ("{\"a\":\"\xff\"}", "no text");
  refuse ("{\"a\": /* note */ 1}", "no place there");
  refuse ("[]", "found no object");
  refuse ("", "expected an analysis");
  refuse ("}{", "closes nothing");
  refuse ("{\"antumbra_analysis\":0}", "1 or more");
}

static void
too_much_is_refused (void)
{
  g_autofree char *many = g_strnfill (5 << 20, ',');
  refuse (many, "too many values");
  g_autofree char *long_text = g_strnfill (65 << 20, ' ');
  refuse (long_text, "more than 64 MB");
}

static void
a_file_that_is_not_there_is_one_sentence (void)
{
  g_autofree char *newer = NULL;
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_analysis_load ("/nowhere/at/all.antumbra", &newer, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_true (g_str_has_prefix (error->message, "/nowhere/at/all.antumbra: cannot be read: "));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/analysis-text/what-is-read-is-written-the-same", what_is_read_is_written_the_same);
  g_test_add_func ("/data/analysis-text/what-was-found-comes-back-to-the-last-digit", what_was_found_comes_back_to_the_last_digit);
  g_test_add_func ("/data/analysis-text/settings-come-back-to-the-last-bit", settings_come_back_to_the_last_bit);
  g_test_add_func ("/data/analysis-text/the-record-is-named-from-the-file", the_record_is_named_from_the_file);
  g_test_add_func ("/data/analysis-text/witnesses-come-back-and-may-be-absent", witnesses_come_back_and_may_be_absent);
  g_test_add_func ("/data/analysis-text/what-is-not-known-is-written-again", what_is_not_known_is_written_again);
  g_test_add_func ("/data/analysis-text/a-setting-back-at-its-default-does-not-come-again",
                   a_setting_back_at_its_default_does_not_come_again);
  g_test_add_func ("/data/analysis-text/a-newer-file-is-read-and-left-alone", a_newer_file_is_read_and_left_alone);
  g_test_add_func ("/data/analysis-text/the-sentence-names-the-place", the_sentence_names_the_place);
  g_test_add_func ("/data/analysis-text/every-wrong-value-is-refused-or-harmless", every_wrong_value_is_refused_or_harmless);
  g_test_add_func ("/data/analysis-text/every-cut-is-refused", every_cut_is_refused);
  g_test_add_func ("/data/analysis-text/every-flipped-bit-is-survived", every_flipped_bit_is_survived);
  g_test_add_func ("/data/analysis-text/what-the-parser-cannot-survive-never-reaches-it", what_the_parser_cannot_survive_never_reaches_it);
  g_test_add_func ("/data/analysis-text/too-much-is-refused", too_much_is_refused);
  g_test_add_func ("/data/analysis-text/a-file-that-is-not-there-is-one-sentence", a_file_that_is_not_there_is_one_sentence);
  return g_test_run ();
}
