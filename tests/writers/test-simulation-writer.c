/* test-simulation-writer.c - the text of a simulated record and of its truth. */
#include <glib.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "writers/simulation-writer.h"

G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntSimulated, ant_simulated_free)

typedef void (*Write) (const AntRecipe *recipe, const AntSimulated *simulated, FILE *stream);

/* The text that a writer makes of a recipe; a list of lines without comments if `rows`. */
static char *
text_of (const char *recipe_text, Write write)
{
  g_autoptr (GError) error = NULL;
  AntStatus status;
  g_autoptr (AntRecipe) recipe = ant_recipe_parse ("some.recipe", recipe_text, strlen (recipe_text), &error);
  g_assert_no_error (error);
  g_autoptr (AntSimulated) simulated = ant_simulate (&recipe->scenario, &status);
  g_assert_cmpint (status, ==, ANT_OK);
  char *buffer = NULL, *text;
  size_t size = 0;
  FILE *stream = open_memstream (&buffer, &size);
  write (recipe, simulated, stream);
  fclose (stream);
  text = g_strdup (buffer);
  free (buffer);
  return text;
}

static GStrv
rows_of (const char *recipe_text, Write write)
{
  g_autofree char *text = text_of (recipe_text, write);
  g_auto (GStrv) lines = g_strsplit (text, "\n", -1);
  g_autoptr (GPtrArray) rows = g_ptr_array_new ();
  for (gsize i = 0; lines[i]; i++)
    if (lines[i][0] != '#' && lines[i][0] != '\0')
      g_ptr_array_add (rows, g_strdup (lines[i]));
  g_ptr_array_add (rows, NULL);
  return (GStrv) g_ptr_array_free (g_steal_pointer (&rows), FALSE);
}

#define TINY "[record]\nstart=2041-03-03T00:00:00\ndays=0.005\ncadence_s=60\n"

static void
rows_hold_time_value_and_flag (void)
{
  g_auto (GStrv) rows = rows_of (TINY "[spike s]\ntime=2041-03-03T00:02:00\nsize_ppm=1000\nflagged=yes\n",
                                 ant_simulation_write_record);
  g_assert_cmpuint (g_strv_length (rows), ==, 8); /* 7.2 samples */
  g_assert_cmpstr (rows[0], ==, "time_utc,irradiance,flag");
  g_assert_cmpstr (rows[1], ==, "2041-03-03T00:00:30Z,1361.00000,0");
  g_assert_cmpstr (rows[3], ==, "2041-03-03T00:02:30Z,1362.36100,1");
}

static void
missing_samples_have_no_row (void)
{
  g_auto (GStrv) rows = rows_of (TINY "[gap g]\nstart=2041-03-03T00:01:00\nend=2041-03-03T00:04:00\n",
                                 ant_simulation_write_record);
  g_assert_cmpuint (g_strv_length (rows), ==, 5);
  g_assert_true (g_str_has_prefix (rows[2], "2041-03-03T00:04:30Z,"));
}

static void
stamps_uncertainty_and_digits_are_as_asked (void)
{
  g_auto (GStrv) rows = rows_of ("[record]\nstart=2041-03-03T00:00:00\ndays=0.005\ncadence_s=60\nexposure_s=0.5\n"
                                 "stamp=middle\nuncertainty_ppm=100\ndecimals=2\nlevel_w_m2=1000\n",
                                 ant_simulation_write_record);
  g_assert_cmpstr (rows[0], ==, "time_utc,irradiance,uncertainty,flag");
  g_assert_cmpstr (rows[1], ==, "2041-03-03T00:00:00.250Z,1000.00,0.100,0");
  g_auto (GStrv) ends = rows_of (TINY "stamp=end\n", ant_simulation_write_record);
  g_assert_true (g_str_has_prefix (ends[1], "2041-03-03T00:01:00Z,"));
}

static void
quantisation_is_below_a_tenth_of_a_ppm (void)
{
  const char *recipe_text = "[record]\nstart=2041-03-03T00:00:00\ndays=1\n[noise]\npreset=a\n";
  g_auto (GStrv) rows = rows_of (recipe_text, ant_simulation_write_record);
  g_autoptr (AntRecipe) recipe = ant_recipe_parse ("some.recipe", recipe_text, strlen (recipe_text), NULL);
  AntStatus status;
  g_autoptr (AntSimulated) simulated = ant_simulate (&recipe->scenario, &status);
  g_assert_cmpuint (g_strv_length (rows), ==, simulated->n + 1);
  for (gsize i = 0; i < simulated->n; i++)
    {
      double read = g_ascii_strtod (strchr (rows[i + 1], ',') + 1, NULL);
      g_assert_cmpfloat_with_epsilon (read, simulated->irradiance_w_m2[i], 1361 * 0.05e-6);
    }
}

static char *
field (const char *row, int index)
{
  g_auto (GStrv) fields = g_strsplit (row, ",", -1);
  g_assert_cmpuint (g_strv_length (fields), ==, 14);
  return g_strdup (fields[index]);
}

static double
number (const char *row, int index)
{
  g_autofree char *text = field (row, index);
  g_assert_cmpstr (text, !=, "");
  return g_ascii_strtod (text, NULL);
}

#define TEN_DAYS "[record]\nstart=2041-03-03T00:00:00\ndays=10\n"

static void
the_truth_of_a_crossing_is_its_shape (void)
{
  g_auto (GStrv) rows =
      rows_of (TEN_DAYS "[planet p]\nmiddle=2041-03-05T12:00:00\nduration_h=6\nradius_ratio=0.0306\nimpact=0.6\n"
                        "[gap g]\nstart=2041-03-05T09:00:00\nend=2041-03-05T10:30:00\n",
               ant_simulation_write_truth);
  g_assert_cmpuint (g_strv_length (rows), ==, 2);
  g_assert_true (
      g_str_has_prefix (rows[1], "planet,p,2041-03-05T09:00:00Z,2041-03-05T12:00:00Z,2041-03-05T15:00:00Z,"));
  g_assert_cmpfloat_with_epsilon (number (rows[1], 6), 2466584.0, 1e-7);
  g_assert_cmpfloat_with_epsilon (number (rows[1], 8), 6, 1e-4);
  g_assert_cmpfloat_with_epsilon (number (rows[1], 9), ant_transit_loss (0.0306, 0.6, ANT_LIMB_DARKENING_SUN) * 1e6,
                                  1e-3);
  g_assert_cmpfloat (number (rows[1], 10), <, number (rows[1], 9));
  g_assert_cmpfloat_with_epsilon (number (rows[1], 11), 0.0306, 1e-7);
  g_assert_cmpfloat_with_epsilon (number (rows[1], 13), 0.75, 0.003);
}

static void
a_repeating_planet_has_a_row_for_each_crossing (void)
{
  g_auto (GStrv) rows =
      rows_of (TEN_DAYS "[planet p]\nmiddle=2041-03-01T00:00:00\nduration_h=6\ndepth_ppm=84\nperiod_d=3\n",
               ant_simulation_write_truth);
  g_assert_cmpuint (g_strv_length (rows), ==, 5); /* March 4, 7, 10, and the ingress of that of March 13 */
  g_assert_cmpfloat_with_epsilon (number (rows[3], 9), 84, 1e-3);
  g_assert_nonnull (strstr (rows[3], "2041-03-10T00:00:00Z"));
}

static void
a_passage_is_deepest_at_the_meridian (void)
{
  g_auto (GStrv) rows = rows_of (TEN_DAYS "[spot s]\nmeridian=2041-03-08T00:00:00\narea_millionths=1000\n",
                                 ant_simulation_write_truth);
  g_assert_cmpuint (g_strv_length (rows), ==, 2);
  g_assert_nonnull (strstr (rows[1], ",2041-03-08T00:00:00Z,"));
  g_assert_cmpfloat_with_epsilon (number (rows[1], 9), 800, 0.01);
  g_assert_cmpfloat_with_epsilon (number (rows[1], 8) / 24, 13.64, 0.005);
}

static void
faults_and_flares_are_told (void)
{
  g_auto (GStrv) rows = rows_of (TEN_DAYS "[step s]\ntime=2041-03-04T00:00:00\nsize_ppm=-190\nrecovery_h=10\n"
                                          "[flare f]\nstart=2041-03-05T00:00:00\nsize_ppm=200\n"
                                          "[spike k]\ntime=2041-03-06T00:00:00\nsize_ppm=-400\n"
                                          "[gap g]\nstart=2041-03-07T00:00:00\nend=2041-03-08T00:00:00\n"
                                          "[warm-up]\nsize_ppm=-80\n",
                                 ant_simulation_write_truth);
  static const char *const kinds[] = { "step,s,", "flare,f,", "spike,k,", "warm-up,,2041-03-08T00:00:00Z," };
  static const double depths[] = { 190, -200, 400, 80 };
  g_assert_cmpuint (g_strv_length (rows), ==, 5);
  for (int i = 0; i < 4; i++)
    {
      g_assert_true (g_str_has_prefix (rows[i + 1], kinds[i]));
      g_assert_cmpfloat (number (rows[i + 1], 9), ==, depths[i]);
    }
}

static void
the_recipe_stands_above_the_truth (void)
{
  g_autofree char *text = text_of (TEN_DAYS "[noise]\npreset=b\n", ant_simulation_write_truth);
  g_assert_nonnull (strstr (text, "#   [record]\n"));
  g_assert_nonnull (strstr (text, "#   preset = b\n"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/writers/simulation/rows-hold-time-value-and-flag", rows_hold_time_value_and_flag);
  g_test_add_func ("/writers/simulation/missing-samples-have-no-row", missing_samples_have_no_row);
  g_test_add_func ("/writers/simulation/stamps-uncertainty-and-digits-are-as-asked",
                   stamps_uncertainty_and_digits_are_as_asked);
  g_test_add_func ("/writers/simulation/quantisation-is-below-a-tenth-of-a-ppm",
                   quantisation_is_below_a_tenth_of_a_ppm);
  g_test_add_func ("/writers/simulation/the-truth-of-a-crossing-is-its-shape", the_truth_of_a_crossing_is_its_shape);
  g_test_add_func ("/writers/simulation/a-repeating-planet-has-a-row-for-each-crossing",
                   a_repeating_planet_has_a_row_for_each_crossing);
  g_test_add_func ("/writers/simulation/a-passage-is-deepest-at-the-meridian", a_passage_is_deepest_at_the_meridian);
  g_test_add_func ("/writers/simulation/faults-and-flares-are-told", faults_and_flares_are_told);
  g_test_add_func ("/writers/simulation/the-recipe-stands-above-the-truth", the_recipe_stands_above_the_truth);
  return g_test_run ();
}
