/* test-recipe.c - recipes read, refused and written again; samples and manual held to the table of keys. */
#include <glib.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "data/error.h"
#include "data/recipe.h"

#define HEAD "[record]\nstart=2041-03-03T00:00:00\ndays=10\n"

static AntRecipe *
parse (const char *text)
{
  g_autoptr (GError) error = NULL;
  AntRecipe *recipe = ant_recipe_parse ("some.recipe", text, strlen (text), &error);
  g_assert_no_error (error);
  g_assert_nonnull (recipe);
  return recipe;
}

static void
assert_refused (const char *text, const char *const *parts)
{
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_recipe_parse ("some.recipe", text, strlen (text), &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_true (g_str_has_prefix (error->message, "some.recipe: "));
  g_assert_null (strchr (error->message, '\n'));
  g_assert_nonnull (strstr (error->message, "expected"));
  for (gsize i = 0; parts[i]; i++)
    if (!strstr (error->message, parts[i]))
      g_error ("“%s” does not tell of “%s”", error->message, parts[i]);
}

static void
defaults_stand_where_nothing_is_said (void)
{
  g_autoptr (AntRecipe) recipe = parse (HEAD);
  const AntScenario *scenario = &recipe->scenario;
  g_assert_cmpfloat (scenario->days, ==, 10);
  g_assert_cmpfloat_with_epsilon (scenario->cadence_d, 60.0 / 86400, 1e-15);
  g_assert_cmpfloat (scenario->exposure_d, ==, scenario->cadence_d);
  g_assert_cmpfloat (scenario->level_w_m2, ==, 1361);
  g_assert_cmpuint (scenario->seed, ==, 1);
  g_assert_cmpint (recipe->stamp, ==, ANT_AT_MIDDLE);
  g_assert_cmpuint (scenario->noise.n_parts + scenario->n_planets + scenario->gaps.n_listed, ==, 0);
  g_assert_cmpfloat (ant_time_reference_jd (&recipe->time, 0), ==, 2466581.5);
}

static void
times_count_from_the_start (void)
{
  g_autoptr (AntRecipe) recipe = parse ("[spike a]\ntime = 2041-03-03T12:00:00Z\nsize_ppm=5\n" HEAD
                                        "[gap b]\nstart=2041-03-02T00:00\nend=2041-03-04 06:00:30.5\n");
  g_assert_cmpfloat_with_epsilon (recipe->scenario.spikes.listed[0].time_d, 0.5, 1e-9);
  g_assert_cmpfloat_with_epsilon (recipe->scenario.gaps.listed[0].start_d, -1, 1e-9);
  g_assert_cmpfloat_with_epsilon (recipe->scenario.gaps.listed[0].end_d, 1.25 + 30.5 / 86400, 1e-9);
}

static void
units_become_days_and_fractions (void)
{
  g_autoptr (AntRecipe) recipe = parse (
      HEAD "cadence_s=120\nexposure_s=50\n[gaps]\nmask=low-orbit\norbit_gap_min=30\ndropped_percent=2\n"
           "[oscillator x]\nrms_ppm=12\nperiod_s=86400\n[exponential y]\nrms_ppm=3\ntime_s=3600\n"
           "[spot s]\nmeridian=2041-03-05T00:00:00\narea_millionths=1000\n"
           "[step t]\ntime=2041-03-05T00:00:00\nsize_ppm=-190\nrecovery_h=12\nflagged=yes\n"
           "[swing o]\nperiod_min=96\namplitude_ppm=30\nharmonic_3=0.5\n[noise]\npreset=c\nwhite_ppm=7\n");
  const AntScenario *scenario = &recipe->scenario;
  g_assert_cmpfloat_with_epsilon (scenario->exposure_d * 86400, 50, 1e-9);
  g_assert_cmpfloat_with_epsilon (scenario->gaps.orbit_gap_d * 1440, 30, 1e-9);
  g_assert_cmpfloat_with_epsilon (scenario->gaps.orbit_period_d * 1440, 96, 1e-9); /* the mask's own */
  g_assert_cmpfloat_with_epsilon (scenario->gaps.dropped_fraction, 0.02, 1e-12);
  g_assert_cmpuint (scenario->noise.n_parts, ==, 3); /* [noise] comes first wherever it stands */
  g_assert_cmpfloat (scenario->noise.part[1].time_d, ==, 1);
  g_assert_cmpint (scenario->noise.part[2].kind, ==, ANT_EXPONENTIAL);
  g_assert_cmpfloat (scenario->noise.white_ppm, ==, 7);
  g_assert_cmpfloat_with_epsilon (scenario->spots.listed[0].area, 1e-3, 1e-15);
  g_assert_cmpfloat_with_epsilon (scenario->spots.listed[0].peak_d, 2, 1e-9);
  g_assert_cmpfloat_with_epsilon (scenario->step[0].recovery_d, 0.5, 1e-12);
  g_assert_cmpint (scenario->step[0].flagged, ==, 1);
  g_assert_cmpfloat (scenario->swing[0].relative[2], ==, 0.5);
}

static void
a_depth_gives_the_radius (void)
{
  g_autoptr (AntRecipe) recipe =
      parse (HEAD "[planet p]\nmiddle=2041-03-05T00:00:00\nduration_h=6\nimpact=0.4\ndepth_ppm=300\n");
  const AntCrossing *crossing = &recipe->scenario.planet[0].crossing;
  g_assert_cmpfloat_with_epsilon (ant_crossing_loss (crossing, ANT_LIMB_DARKENING_SUN, 0), 300e-6, 1e-9);
  g_assert_cmpfloat_with_epsilon (crossing->t14_d, 0.25, 1e-12);
}

static void
what_is_wrong_is_told_with_its_place (void)
{
  static const struct
  {
    const char *text, *parts[4];
  } wrong[] = {
    { "", { "recipe" } },
    { "days = 3\n", { "recipe" } },
    { "[gaps]\n", { "[record]" } },
    { "[record]\ndays=3\n", { "[record]", "start" } },
    { "[record]\nstart=2041-03-03T00:00:00\n", { "[record]", "days" } },
    { "[record]\nstart=yesterday\ndays=3\n", { "[record] start", "yesterday" } },
    { "[record]\nstart=2466582.5\ndays=3\n", { "[record] start", "2466582.5" } },
    { "[record]\nstart=2041-02-30T00:00:00\ndays=3\n", { "[record] start", "2041-02-30" } },
    { HEAD "cadence=60\n", { "[record]", "“cadence”", "cadence_s" } },
    { HEAD "seed=1.5\n", { "[record] seed", "1.5", "whole" } },
    { HEAD "cadence_s=1e-9\n", { "[record] cadence_s", "1e-9" } },
    { HEAD "cadence_s=sixty\n", { "[record] cadence_s", "sixty" } },
    { HEAD "cadence_s=nan\n", { "[record] cadence_s", "nan" } },
    { HEAD "cadence_s=\n", { "[record] cadence_s" } },
    { HEAD "exposure_s=61\n", { "[record]", "exposure_s" } },
    { HEAD "days=11\n", { "days", "second time" } },
    { HEAD "[gaps]\n[gaps]\n", { "[gaps]", "second time" } },
    { HEAD "[gaps]\nmask=moon\n", { "[gaps] mask", "moon", "low-orbit" } },
    { HEAD "[gaps x]\n", { "[gaps x]" } },
    { HEAD "[planet]\n", { "[planet]", "[planet NAME]" } },
    { HEAD "[planets 1]\n", { "[planets 1]" } },
    { HEAD "[planet a,b]\n", { "[planet a,b]", "commas" } },
    { HEAD "[planet p]\nmiddle=2041-03-05T00:00:00\nduration_h=6\n", { "[planet p]", "radius_ratio", "depth_ppm" } },
    { HEAD "[planet p]\nmiddle=2041-03-05T00:00:00\nduration_h=6\nradius_ratio=0.1\nimpact=1.2\n",
      { "[planet p]", "misses" } },
    { HEAD "[planet p]\nmiddle=2041-03-05T00:00:00\nduration_h=6\nradius_ratio=0.1\nperiod_d=0.1\n",
      { "[planet p]", "period" } },
    { HEAD "[gap g]\nstart=2041-03-05T00:00:00\nend=2041-03-04T00:00:00\n", { "[gap g]", "end" } },
    { HEAD "[step s]\ntime=2041-03-05T00:00:00\nsize_ppm=5\nflagged=yes\n", { "[step s]", "recover" } },
    { HEAD "[step s]\ntime=2041-03-05T00:00:00\nsize_ppm=5\nflagged=1\n", { "[step s] flagged", "yes" } },
    { HEAD "[oscillator o]\nrms_ppm=5\n", { "[oscillator o]", "period_s" } },
    { HEAD "[spikes]\nsize_min_ppm=600\n", { "[spikes]", "size_min_ppm" } },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
    assert_refused (wrong[i].text, wrong[i].parts);
}

static void
bytes_that_are_no_recipe_are_refused (void)
{
  static const char *const texts[] = { "\0\0", "\xff\xfe\x00[record]", "[record\n", "[record]\nstart\n",
                                       "\x89PNG\r\n\x1a\n" };
  static const gsize lengths[] = { 2, 11, 8, 15, 8 };
  for (gsize i = 0; i < G_N_ELEMENTS (texts); i++)
    {
      g_autoptr (GError) error = NULL;
      g_assert_null (ant_recipe_parse ("some.recipe", texts[i], lengths[i], &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
    }
}

static void
a_missing_file_is_told_by_name (void)
{
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_recipe_load ("no/such/file.recipe", &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_nonnull (strstr (error->message, "no/such/file.recipe"));
}

static void
endless_files_and_folders_are_refused (void)
{
  static const char *const paths[] = { "/dev/zero", "/" };
  for (gsize i = 0; i < G_N_ELEMENTS (paths); i++)
    {
      g_autoptr (GError) error = NULL;
      g_assert_null (ant_recipe_load (paths[i], &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
      g_assert_true (g_str_has_prefix (error->message, paths[i]));
    }
}

static void
another_seed_is_taken_if_it_is_whole (void)
{
  g_autoptr (AntRecipe) recipe = parse (HEAD);
  g_autoptr (GError) error = NULL;
  g_assert_true (ant_recipe_set_seed (recipe, "77", &error));
  g_assert_cmpuint (recipe->scenario.seed, ==, 77);
  g_assert_false (ant_recipe_set_seed (recipe, "-1", &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
  g_assert_cmpuint (recipe->scenario.seed, ==, 77);
}

static AntRecipe *
load_sample (const char *name)
{
  g_autofree char *path = g_test_build_filename (G_TEST_DIST, "samples", name, NULL);
  g_autoptr (GError) error = NULL;
  AntRecipe *recipe = ant_recipe_load (path, &error);
  g_assert_no_error (error);
  return recipe;
}

static const char *const sample_names[] = { "larkspur.recipe", "low-orbit.recipe", "quiet.recipe" };

static void
a_recipe_written_and_read_again_is_the_same (void)
{
  for (gsize i = 0; i < G_N_ELEMENTS (sample_names); i++)
    {
      g_autoptr (AntRecipe) first = load_sample (sample_names[i]);
      g_autofree char *text = ant_recipe_to_text (first);
      g_autoptr (AntRecipe) second = parse (text);
      g_autofree char *again = ant_recipe_to_text (second);
      g_assert_cmpstr (text, ==, again);
      g_assert_cmpstr (first->title, ==, second->title);
      g_assert_cmpuint (first->items->len, ==, second->items->len);
      for (guint k = 0; k < first->items->len; k++)
        {
          const AntRecipeItem *a = g_ptr_array_index (first->items, k), *b = g_ptr_array_index (second->items, k);
          g_assert_cmpint (a->group, ==, b->group);
          g_assert_cmpstr (a->name, ==, b->name);
          for (gsize v = 0; v < ant_recipe_group_table[a->group].n_keys; v++)
            g_assert_true (a->value[v] == b->value[v] || (isnan (a->value[v]) && isnan (b->value[v]))
                           || fabs (a->value[v] - b->value[v]) < 1e-11);
        }
    }
}

static void
the_samples_hold_what_they_promise (void)
{
  g_autoptr (AntRecipe) larkspur = load_sample ("larkspur.recipe");
  g_autoptr (AntRecipe) low_orbit = load_sample ("low-orbit.recipe");
  g_autoptr (AntRecipe) quiet = load_sample ("quiet.recipe");
  g_assert_cmpuint (larkspur->scenario.n_planets, ==, 2);
  g_assert_cmpuint (larkspur->scenario.spots.n_listed, ==, 3);
  g_assert_cmpuint (larkspur->scenario.n_steps, ==, 1);
  g_assert_cmpuint (low_orbit->scenario.n_planets, ==, 1);
  g_assert_cmpuint (low_orbit->scenario.n_swings, ==, 1);
  g_assert_cmpuint (quiet->scenario.n_planets + quiet->scenario.n_steps + quiet->scenario.n_swings
                        + quiet->scenario.n_flares + quiet->scenario.spikes.n_listed + quiet->scenario.spots.n_listed,
                    ==, 0);
}

static char *
manual_range (const AntRecipeKey *key)
{
  switch (key->kind)
    {
    case ANT_KEY_WORD: return g_strjoinv (", ", (char **) (gsize) key->words);
    case ANT_KEY_SWITCH: return g_strdup ("yes, no");
    case ANT_KEY_TIME: return g_strdup ("time");
    case ANT_KEY_TEXT: return g_strdup ("text");
    default: return g_strdup_printf ("%.16g to %.16g", key->minimum, key->maximum);
    }
}

/* Its line in the manual: "| `key` | takes | default | help |". */
static char *
manual_line (const AntRecipeKey *key)
{
  char number[G_ASCII_DTOSTR_BUF_SIZE];
  const char *fallback = key->required ? "needed" : "";
  if (!isnan (key->fallback))
    switch (key->kind)
      {
      case ANT_KEY_WORD: fallback = key->words[(gsize) key->fallback]; break;
      case ANT_KEY_SWITCH: fallback = "no"; break;
      default: fallback = g_ascii_formatd (number, sizeof number, "%.8g", key->fallback); break;
      }
  g_autofree char *range = manual_range (key);
  return g_strdup_printf ("| `%s` | %s | %s | %s |\n", key->name, range, fallback, key->help);
}

static void
the_manual_tells_every_key (void)
{
  g_autofree char *path = g_test_build_filename (G_TEST_DIST, "docs", "recipes.md", NULL);
  g_autofree char *manual = NULL;
  g_assert_true (g_file_get_contents (path, &manual, NULL, NULL));
  const char *place = manual;
  for (gsize g = 0; g < ANT_N_RECIPE_GROUPS; g++)
    {
      const AntRecipeGroup *group = &ant_recipe_group_table[g];
      g_autofree char *heading =
          g_strdup_printf ("### [%s%s]: %s\n", group->name, group->many ? " NAME" : "", group->help);
      place = strstr (place, heading);
      if (!place)
        g_error ("docs/recipes.md lacks, or has out of order: %s", heading);
      for (gsize k = 0; k < group->n_keys; k++)
        {
          g_autofree char *line = manual_line (&group->key[k]);
          place = strstr (place, line);
          if (!place)
            g_error ("docs/recipes.md lacks, or has out of order: %s", line);
        }
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/recipe/defaults-stand-where-nothing-is-said", defaults_stand_where_nothing_is_said);
  g_test_add_func ("/data/recipe/times-count-from-the-start", times_count_from_the_start);
  g_test_add_func ("/data/recipe/units-become-days-and-fractions", units_become_days_and_fractions);
  g_test_add_func ("/data/recipe/a-depth-gives-the-radius", a_depth_gives_the_radius);
  g_test_add_func ("/data/recipe/what-is-wrong-is-told-with-its-place", what_is_wrong_is_told_with_its_place);
  g_test_add_func ("/data/recipe/bytes-that-are-no-recipe-are-refused", bytes_that_are_no_recipe_are_refused);
  g_test_add_func ("/data/recipe/a-missing-file-is-told-by-name", a_missing_file_is_told_by_name);
  g_test_add_func ("/data/recipe/endless-files-and-folders-are-refused", endless_files_and_folders_are_refused);
  g_test_add_func ("/data/recipe/another-seed-is-taken-if-it-is-whole", another_seed_is_taken_if_it_is_whole);
  g_test_add_func ("/data/recipe/a-recipe-written-and-read-again-is-the-same",
                   a_recipe_written_and_read_again_is_the_same);
  g_test_add_func ("/data/recipe/the-samples-hold-what-they-promise", the_samples_hold_what_they_promise);
  g_test_add_func ("/data/recipe/the-manual-tells-every-key", the_manual_tells_every_key);
  return g_test_run ();
}
