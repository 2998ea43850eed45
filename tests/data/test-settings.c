/* test-settings.c - promises of data/settings.h, over the whole table. */
#include "data/settings.h"

#include <glib/gstdio.h>
#include <math.h>
#include <string.h>

#include "data/error.h"

#define EACH(setting) \
  (const AntSetting *setting = ant_setting_table; setting < ant_setting_table + ant_n_settings; setting++)

static void
keys_are_unique_words (void)
{
  for EACH (setting)
    {
      g_assert_true (ant_setting_find (setting->key) == setting);
      g_assert_cmpuint (strspn (setting->key, "abcdefghijklmnopqrstuvwxyz0123456789-"), ==, strlen (setting->key));
      g_assert_cmpuint (strlen (setting->help), >, 10);
    }
}

static void
no_two_share_a_place (void)
{
  for EACH (setting)
    for EACH (other)
      g_assert_true (setting == other || setting->offset != other->offset);
}

static void
groups_stand_together (void)
{
  for EACH (setting)
    for EACH (other)
      if (other > setting + 1 && g_str_equal (other->group, setting->group))
        g_assert_cmpstr (setting[1].group, ==, setting->group);
}

static void
defaults_are_in_range (void)
{
  for EACH (setting)
    {
      g_assert_cmpfloat (setting->minimum, <, setting->maximum);
      g_assert_cmpfloat (setting->fallback, >=, setting->minimum);
      g_assert_cmpfloat (setting->fallback, <=, setting->maximum);
    }
}

static void
defaults_are_those_of_the_numeric_rooms (void)
{
  AntSettings settings;
  ant_settings_init (&settings);
  AntBankOptions bank = ANT_BANK_OPTIONS_INIT;
  g_assert_cmpfloat (settings.bank.duration_min_h, ==, bank.duration_min_h);
  g_assert_cmpfloat (settings.bank.duration_max_h, ==, bank.duration_max_h);
  g_assert_cmpfloat (settings.bank.duration_step_h, ==, bank.duration_step_h);
  g_assert_cmpfloat (settings.bank.edge_h, ==, bank.edge_h);
  g_assert_cmpfloat (settings.bank.sharp_edge_h, ==, bank.sharp_edge_h);
  g_assert_cmpfloat (settings.bank.limb_darkening.u1, ==, bank.limb_darkening.u1);
  g_assert_cmpfloat (settings.bank.limb_darkening.u2, ==, bank.limb_darkening.u2);
  AntGridOptions grid = ANT_GRID_OPTIONS_INIT;
  g_assert_cmpfloat (settings.grid.dark_fraction, ==, grid.dark_fraction);
  g_assert_true (isnan (settings.grid.from_d) && isnan (settings.grid.to_d));
}

/* A number inside the range that no default has. */
static double
inner_value (const AntSetting *setting)
{
  double value = setting->minimum + 0.3 * (setting->maximum - setting->minimum);
  return setting->kind == ANT_SETTING_REAL ? value : ceil (value);
}

static void
what_is_set_is_got (void)
{
  for EACH (setting)
    {
      AntSettings settings, untouched;
      ant_settings_init (&settings);
      ant_settings_init (&untouched);
      g_autofree char *text = ant_setting_format (setting, inner_value (setting));
      g_autoptr (GError) error = NULL;
      g_assert_true (ant_setting_set_text (setting, &settings, text, &error));
      g_assert_no_error (error);
      g_autofree char *got = ant_setting_format (setting, ant_setting_get (setting, &settings));
      g_assert_cmpstr (got, ==, text);
      for EACH (other)
        if (other != setting)
          g_assert_cmpfloat (ant_setting_get (other, &settings), ==, ant_setting_get (other, &untouched));
    }
}

static void
units_reach_the_rooms_as_days (void)
{
  AntSettings settings;
  ant_settings_init (&settings);
  g_assert_true (ant_settings_assign (&settings, "exposure=86.4", NULL));
  g_assert_cmpfloat_with_epsilon (settings.grid.exposure_d, 0.001, 1e-15);
  g_assert_true (ant_settings_assign (&settings, " stamp = end ", NULL));
  g_assert_cmpint (ant_settings_grid (&settings).stamp, ==, ANT_AT_END);
}

static void
out_of_range_is_refused_with_key_value_and_range (void)
{
  for EACH (setting)
    {
      AntSettings settings, untouched;
      ant_settings_init (&settings);
      ant_settings_init (&untouched);
      g_autofree char *text = g_strdup_printf ("%.17g", setting->maximum * 1.001 + 1);
      g_autoptr (GError) error = NULL;
      g_assert_false (ant_setting_set_text (setting, &settings, text, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
      g_autofree char *range = ant_setting_range (setting);
      g_assert_nonnull (strstr (error->message, setting->key));
      g_assert_nonnull (strstr (error->message, text));
      g_assert_nonnull (strstr (error->message, range));
      g_assert_null (strchr (error->message, '\n'));
      g_assert_cmpfloat (ant_setting_get (setting, &settings), ==, ant_setting_get (setting, &untouched));
    }
}

static void
what_is_no_number_is_refused (void)
{
  const char *const awkward[] = { "", " ", "nan", "inf", "-inf", "1,5", "1 2", "5h", "0x", "--1", "one", "1e400" };
  for EACH (setting)
    for (gsize i = 0; i < G_N_ELEMENTS (awkward); i++)
      {
        AntSettings settings;
        ant_settings_init (&settings);
        g_autoptr (GError) error = NULL;
        g_assert_false (ant_setting_set_text (setting, &settings, awkward[i], &error));
        g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
      }
}

static void
whole_numbers_only_where_said (void)
{
  AntSettings settings;
  ant_settings_init (&settings);
  g_assert_true (ant_settings_assign (&settings, "line-harmonics=3", NULL));
  g_assert_false (ant_settings_assign (&settings, "line-harmonics=3.5", NULL));
  g_assert_cmpfloat (settings.line_harmonics, ==, 3);
}

static void
an_unknown_key_is_offered_the_nearest (void)
{
  AntSettings settings;
  ant_settings_init (&settings);
  g_autoptr (GError) error = NULL;
  g_assert_false (ant_settings_assign (&settings, "duration-mox=5", &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
  g_assert_nonnull (strstr (error->message, "duration-mox"));
  g_assert_nonnull (strstr (error->message, "“duration-max”"));
}

static void
an_assignment_needs_an_equals_sign (void)
{
  AntSettings settings;
  ant_settings_init (&settings);
  g_autoptr (GError) error = NULL;
  g_assert_false (ant_settings_assign (&settings, "threshold", &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
}

/* Load `text` from a file; the file's path is in *path (caller frees). */
static gboolean
load_text (AntSettings *settings, const char *text, char **path, GError **error)
{
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL);
  *path = g_build_filename (folder, "settings.ini", NULL);
  g_assert_true (g_file_set_contents (*path, text, -1, NULL));
  gboolean loaded = ant_settings_load (settings, *path, error);
  g_remove (*path);
  g_rmdir (folder);
  return loaded;
}

static void
a_written_key_file_loads_back (void)
{
  AntSettings settings, again;
  ant_settings_init (&settings);
  ant_settings_init (&again);
  for EACH (setting)
    {
      g_autofree char *text = ant_setting_format (setting, inner_value (setting));
      g_assert_true (ant_setting_set_text (setting, &settings, text, NULL));
    }
  g_autofree char *file = ant_settings_to_key_file (&settings);
  g_autofree char *path = NULL;
  g_autoptr (GError) error = NULL;
  g_assert_true (load_text (&again, file, &path, &error));
  g_assert_no_error (error);
  g_autofree char *file_again = ant_settings_to_key_file (&again);
  g_assert_cmpstr (file_again, ==, file);
}

static void
a_bad_key_file_changes_nothing_and_is_named (void)
{
  const char *const bad[] = { "", "[other]\nthreshold=5\n", "[settings]\nthreshold=7\nedge=0\n", "no key file at all\n",
                              "[settings]\nthreshold=7\nthreshhold=8\n" };
  for (gsize i = 0; i < G_N_ELEMENTS (bad); i++)
    {
      AntSettings settings;
      ant_settings_init (&settings);
      g_autofree char *path = NULL;
      g_autoptr (GError) error = NULL;
      g_assert_false (load_text (&settings, bad[i], &path, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
      g_assert_true (g_str_has_prefix (error->message, path));
      g_assert_cmpfloat (settings.threshold_snr, ==, 0);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/settings/keys-are-unique-words", keys_are_unique_words);
  g_test_add_func ("/data/settings/no-two-share-a-place", no_two_share_a_place);
  g_test_add_func ("/data/settings/groups-stand-together", groups_stand_together);
  g_test_add_func ("/data/settings/defaults-are-in-range", defaults_are_in_range);
  g_test_add_func ("/data/settings/defaults-are-those-of-the-numeric-rooms", defaults_are_those_of_the_numeric_rooms);
  g_test_add_func ("/data/settings/what-is-set-is-got", what_is_set_is_got);
  g_test_add_func ("/data/settings/units-reach-the-rooms-as-days", units_reach_the_rooms_as_days);
  g_test_add_func ("/data/settings/out-of-range-is-refused-with-key-value-and-range",
                   out_of_range_is_refused_with_key_value_and_range);
  g_test_add_func ("/data/settings/what-is-no-number-is-refused", what_is_no_number_is_refused);
  g_test_add_func ("/data/settings/whole-numbers-only-where-said", whole_numbers_only_where_said);
  g_test_add_func ("/data/settings/an-unknown-key-is-offered-the-nearest", an_unknown_key_is_offered_the_nearest);
  g_test_add_func ("/data/settings/an-assignment-needs-an-equals-sign", an_assignment_needs_an_equals_sign);
  g_test_add_func ("/data/settings/a-written-key-file-loads-back", a_written_key_file_loads_back);
  g_test_add_func ("/data/settings/a-bad-key-file-changes-nothing-and-is-named",
                   a_bad_key_file_changes_nothing_and_is_named);
  return g_test_run ();
}
