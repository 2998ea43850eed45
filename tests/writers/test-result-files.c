/* test-result-files.c - which tables a scan leaves, by what was asked for. */
#include <string.h>
#include "writers/result-files.h"

static char *
names_of (const char *also, gboolean series)
{
  AntResultChoice choice = { .series = series };
  g_autoptr (GError) error = NULL;
  if (also)
    g_assert_true (ant_result_choice_parse (&choice, also, &error));
  g_auto (GStrv) names = ant_result_file_names (&choice);
  return g_strjoinv (" ", names);
}

static void
test_names (void)
{
  g_autofree char *plain = names_of (NULL, FALSE), *fits = names_of ("fits", FALSE), *both = names_of ("votable,fits", TRUE);
  g_assert_cmpstr (plain, ==, "dips.csv brightenings.csv passages.csv repeats.csv periods.csv floor.csv spectrum.csv chunks.csv flags.csv analysis.antumbra");
  g_assert_cmpstr (fits, ==, "dips.csv dips.fits brightenings.csv brightenings.fits passages.csv passages.fits repeats.csv repeats.fits periods.csv periods.fits floor.csv spectrum.csv chunks.csv "
                             "flags.csv flags.fits analysis.antumbra");
  g_assert_cmpstr (both, ==, "dips.csv dips.fits dips.vot brightenings.csv brightenings.fits brightenings.vot passages.csv passages.fits passages.vot repeats.csv repeats.fits repeats.vot periods.csv periods.fits "
                             "series.csv series.fits floor.csv spectrum.csv chunks.csv flags.csv flags.fits analysis.antumbra");
}

static void
test_unknown_formats (void)
{
  static const char *const wrong[] = { "", "csv", "fits,", "fits votable", "pdf" };
  for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
    {
      AntResultChoice choice = { 0 };
      g_autoptr (GError) error = NULL;
      g_assert_false (ant_result_choice_parse (&choice, wrong[i], &error));
      g_assert_nonnull (strstr (error->message, "expected fits, votable"));
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/writers/result-files/names-follow-what-is-asked-for", test_names);
  g_test_add_func ("/writers/result-files/unknown-formats-are-refused", test_unknown_formats);
  return g_test_run ();
}
