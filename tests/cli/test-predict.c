/* test-predict.c - `antumbra-cli predict` as a program: what it prints, what a record shows, what it refuses. Its path is
 * in ANT_CLI. */
#include <gio/gio.h>
#include <glib/gstdio.h>
#include <json-glib/json-glib.h>
#include <math.h>
#include <string.h>

/* Venus before the Sun as of 2004-06-08 for the geocentre (almanac radii), in a record of an invented radiometer. */
static const char recipe_text[] = "[record]\nstart=2004-06-02T00:00:00\ndays=13\ncadence_s=300\nseed=8\n"
                                  "[noise]\npreset=quiet-sun\nwhite_ppm=10\n"
                                  "[planet it]\nmiddle=2004-06-08T08:19:44.5\nradius_ratio=0.030794\nimpact=0.6631\nduration_h=6.208\n";

typedef struct
{
  char *folder, *recipe, *record, *truth, *orbit;
} Place;

static void
run (const char *const *arguments, int expected, char **out, char **err)
{
  g_autoptr (GSubprocess) child
    = g_subprocess_newv (arguments, G_SUBPROCESS_FLAGS_STDOUT_PIPE | G_SUBPROCESS_FLAGS_STDERR_PIPE, NULL);
  g_assert_nonnull (child);
  g_assert_true (g_subprocess_communicate_utf8 (child, NULL, NULL, out, err, NULL));
  if (expected != g_subprocess_get_exit_status (child))
    g_test_message ("%s", *err);
  g_assert_cmpint (g_subprocess_get_exit_status (child), ==, expected);
}

static void
set_up (Place *place, gconstpointer unused)
{
  g_autofree char *out = NULL, *err = NULL;
  place->folder = g_dir_make_tmp (NULL, NULL);
  place->recipe = g_build_filename (place->folder, "some.recipe", NULL);
  place->record = g_build_filename (place->folder, "some.csv", NULL);
  place->truth = g_build_filename (place->folder, "some-truth.csv", NULL);
  place->orbit = g_build_filename (place->folder, "orbit.csv", NULL);
  g_assert_true (g_file_set_contents (place->recipe, recipe_text, -1, NULL));
  g_assert_true (g_file_set_contents (place->orbit, "# frame: GSE\n2004-06-01,1500000,0,0\n2004-06-16,1500000,0,0\n", -1, NULL));
  const char *const simulate[] = { g_getenv ("ANT_CLI"), "simulate", place->recipe, "--out", place->record, NULL };
  run (simulate, 0, &out, &err);
}

static void
tear_down (Place *place, gconstpointer unused)
{
  char *const files[] = { place->recipe, place->record, place->truth, place->orbit };
  for (gsize i = 0; i < G_N_ELEMENTS (files); i++)
    {
      g_unlink (files[i]);
      g_free (files[i]);
    }
  g_assert_cmpint (g_rmdir (place->folder), ==, 0);
  g_free (place->folder);
}

static JsonArray *
events_of (const char *text, JsonParser *parser)
{
  g_autoptr (GError) error = NULL;
  json_parser_load_from_data (parser, text, -1, &error);
  g_assert_no_error (error);
  return json_object_get_array_member (json_node_get_object (json_parser_get_root (parser)), "events");
}

static void
json_has_every_crossing_of_a_decade (void)
{
  static const char *const days[] = { "2003-05-07", "2004-06-08", "2006-11-08" };
  g_autofree char *out = NULL, *err = NULL;
  const char *const arguments[] = { g_getenv ("ANT_CLI"), "predict", "--from", "2003-01-01", "--to", "2010-01-01", "--json", NULL };
  run (arguments, 0, &out, &err);
  g_autoptr (JsonParser) parser = json_parser_new ();
  JsonArray *events = events_of (out, parser);
  gsize n = 0;
  for (guint i = 0; i < json_array_get_length (events); i++)
    {
      JsonObject *event = json_array_get_object_element (events, i);
      if (!g_str_equal (json_object_get_string_member (event, "kind"), "crossing"))
        {
          g_assert_true (json_object_get_null_member (event, "contact2_utc")); /* all eclipses of these years are partial here */
          continue;
        }
      g_assert_cmpuint (n, <, G_N_ELEMENTS (days));
      g_assert_true (g_str_has_prefix (json_object_get_string_member (event, "greatest_utc"), days[n++]));
      g_assert_cmpfloat (json_object_get_double_member (event, "depth_ppm"), >, 0);
      g_assert_false (json_object_has_member (event, "record"));
    }
  g_assert_cmpuint (n, ==, G_N_ELEMENTS (days));
}

static void
times_have_tenths_of_a_second (void)
{
  g_autofree char *out = NULL, *err = NULL;
  const char *const arguments[] = { g_getenv ("ANT_CLI"), "predict", "--from", "2004-06-08", "--to", "2004-06-09", "--json", NULL };
  run (arguments, 0, &out, &err);
  g_autoptr (JsonParser) parser = json_parser_new ();
  JsonArray *events = events_of (out, parser);
  g_assert_cmpuint (json_array_get_length (events), ==, 1);
  JsonObject *event = json_array_get_object_element (events, 0);
  g_assert_cmpstr (json_object_get_string_member (event, "body"), ==, "Venus");
  /* DE405, 05:13:30.03, to the second that is asked for. */
  const char *text = json_object_get_string_member (event, "contact1_utc");
  g_assert_true (g_regex_match_simple ("^2004-06-08T05:13:(29|30)\\.\\dZ$", text, 0, 0));
  g_assert_cmpfloat_with_epsilon (json_object_get_double_member (event, "separation_arcsec"), 626.890, 0.05);
}

static void
a_record_shows_what_crossed (Place *place, gconstpointer unused)
{
  g_autofree char *out = NULL, *err = NULL, *table = NULL;
  const char *const json[] = { g_getenv ("ANT_CLI"), "predict", "--record", place->record, "--json", NULL };
  run (json, 0, &out, &err);
  g_autoptr (JsonParser) parser = json_parser_new ();
  JsonArray *events = events_of (out, parser);
  g_assert_cmpuint (json_array_get_length (events), ==, 1);
  JsonObject *shown = json_object_get_object_member (json_array_get_object_element (events, 0), "record");
  double depth = json_object_get_double_member (shown, "depth_ppm"), sigma = json_object_get_double_member (shown, "depth_sigma_ppm");
  g_test_message ("depth %.1f +- %.1f", depth, sigma);
  g_assert_cmpstr (json_object_get_string_member (shown, "shows"), ==, "agrees");
  g_assert_cmpfloat_with_epsilon (depth, 1007.5, 3.5 * sigma);
  g_assert_cmpfloat (sigma, <, 30);
  g_assert_cmpfloat_with_epsilon (json_object_get_double_member (shown, "expected_depth_ppm"), 1007.5, 0.2);
  g_assert_cmpfloat (json_object_get_double_member (shown, "covered_fraction"), ==, 1);

  const char *const plain[] = { g_getenv ("ANT_CLI"), "predict", "--record", place->record, NULL };
  g_clear_pointer (&err, g_free);
  run (plain, 0, &table, &err);
  g_assert_nonnull (strstr (table, "agrees: depth"));
  g_assert_nonnull (strstr (table, "Never look at the Sun"));
}

/* The same record, taken from somewhere else: Venus is expected at another time and depth, and is not there. */
static void
the_observer_decides_what_is_expected (Place *place, gconstpointer unused)
{
  g_autofree char *out = NULL, *err = NULL;
  const char *const arguments[] = { g_getenv ("ANT_CLI"), "predict", "--record", place->record, "--observer", place->orbit, "--json", NULL };
  run (arguments, 0, &out, &err);
  g_autoptr (JsonParser) parser = json_parser_new ();
  JsonArray *events = events_of (out, parser);
  g_assert_cmpuint (json_array_get_length (events), ==, 1);
  JsonObject *event = json_array_get_object_element (events, 0);
  g_assert_cmpfloat (json_object_get_double_member (event, "separation_arcsec"), >, 640);
  g_assert_cmpstr (json_object_get_string_member (event, "certainty"), ==, "certain");
}

/* The verdict of the only dip that a scan finds, with one more pair of arguments. */
static char *
class_by_scan (const Place *place, const char *option, const char *value)
{
  g_autofree char *out = NULL, *err = NULL, *table = NULL, *results = g_build_filename (place->folder, "found", NULL);
  g_autofree char *dips = g_build_filename (results, "dips.csv", NULL);
  const char *const arguments[] = { g_getenv ("ANT_CLI"), "scan", place->record, "--out", results, "--no-report", "--no-repeats", option, value, NULL };
  run (arguments, 0, &out, &err);
  g_assert_true (g_file_get_contents (dips, &table, NULL, NULL));
  g_auto (GStrv) lines = g_strsplit (table, "\n", -1);
  guint header = 0;
  while (g_str_has_prefix (lines[header], "#"))
    header++;
  g_auto (GStrv) names = g_strsplit (lines[header], ",", -1), cells = g_strsplit (lines[header + 1], ",", -1);
  g_autoptr (GDir) folder = g_dir_open (results, 0, NULL);
  for (const char *name = g_dir_read_name (folder); name; name = g_dir_read_name (folder))
    {
      g_autofree char *file = g_build_filename (results, name, NULL);
      g_unlink (file);
    }
  g_rmdir (results);
  for (guint i = 0; names[i]; i++)
    if (g_str_equal (names[i], "class"))
      return g_strdup (cells[i]);
  return NULL;
}

/* On the Sun a planet needs a predicted crossing; where nobody knows who watched, it is only shaped like one. */
static void
a_scan_told_the_observer_names_the_planet (Place *place, gconstpointer unused)
{
  g_autofree char *placed = class_by_scan (place, "--observer", "earth"), *unplaced = class_by_scan (place, "--observer", "l1");
  g_assert_cmpstr (placed, ==, "planet");
  g_assert_cmpstr (unplaced, !=, "planet");
}

static void
a_gap_is_told_with_what_is_covered (Place *place, gconstpointer unused)
{
  g_autofree char *out = NULL, *err = NULL, *recipe = g_strconcat (recipe_text, "[gap g]\nstart=2004-06-08T06:00:00\nend=2004-06-08T13:00:00\n", NULL);
  g_assert_true (g_file_set_contents (place->recipe, recipe, -1, NULL));
  const char *const simulate[] = { g_getenv ("ANT_CLI"), "simulate", place->recipe, "--out", place->record, "--force", NULL };
  run (simulate, 0, &out, &err);
  const char *const arguments[] = { g_getenv ("ANT_CLI"), "predict", "--record", place->record, "--json", NULL };
  g_clear_pointer (&out, g_free);
  g_clear_pointer (&err, g_free);
  run (arguments, 0, &out, &err);
  g_autoptr (JsonParser) parser = json_parser_new ();
  JsonObject *shown = json_object_get_object_member (json_array_get_object_element (events_of (out, parser), 0), "record");
  g_assert_cmpstr (json_object_get_string_member (shown, "shows"), ==, "gap");
  g_assert_true (json_object_get_null_member (shown, "depth_ppm"));
  double covered = json_object_get_double_member (shown, "covered_fraction");
  g_assert_cmpfloat_with_epsilon (covered, 0.11, 0.03); /* 47 min of 373, the ingress among them */
}

static void
about_l1_nothing_is_evidence (Place *place, gconstpointer unused)
{
  g_autofree char *out = NULL, *err = NULL;
  const char *const arguments[] = { g_getenv ("ANT_CLI"), "predict", "--record", place->record, "--observer", "l1", "--json", NULL };
  run (arguments, 0, &out, &err);
  g_autoptr (JsonParser) parser = json_parser_new ();
  JsonObject *event = json_array_get_object_element (events_of (out, parser), 0);
  g_assert_cmpstr (json_object_get_string_member (event, "certainty"), ==, "possible");
  g_assert_true (g_str_has_suffix (json_object_get_string_member (event, "greatest_utc"), ":00:00.0Z"));
  g_assert_cmpstr (json_object_get_string_member (json_object_get_object_member (event, "record"), "shows"), ==, "unplaced");
}

static void
what_cannot_be_predicted_is_refused_in_one_line (Place *place, gconstpointer unused)
{
  const struct
  {
    const char *arguments[7];
    int code;
    const char *said;
  } wrong[] = {
    { { NULL }, 2, "no span" },
    { { "--from", "2000-01-01", NULL }, 2, "no span" },
    { { "--from", "1500-01-01", "--to", "1700-01-01", NULL }, 2, "1600 to 2400" },
    { { "--from", "2300-01-01", "--to", "2500-01-01", NULL }, 2, "1600 to 2400" },
    { { "--from", "2001-01-01", "--to", "2000-01-01", NULL }, 2, "ends before it begins" },
    { { "--from", "then", "--to", "2000-01-01", NULL }, 2, "is no time" },
    { { "--from", "2000-01-01", "--to", "2001-01-01", "--observer", "site:10,50,-7000", NULL }, 2, "inside the Earth" },
    { { "--from", "2000-01-01", "--to", "2001-01-01", "--observer", "nowhere.csv", NULL }, 3, "nowhere.csv" },
    { { "--from", "2004-05-01", "--to", "2004-06-10", "--observer", place->orbit, NULL }, 2, "within its positions" },
    { { "--record", "nowhere.csv", NULL }, 3, "nowhere.csv" },
    { { "--from", "2000-01-01", "--to", "2001-01-01", "--set", "radii=mine", NULL }, 2, "almanac, iau" },
    { { "a-file", NULL }, 2, "options only" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
    {
      g_autofree char *out = NULL, *err = NULL;
      const char *arguments[10] = { g_getenv ("ANT_CLI"), "predict" };
      for (int k = 0; wrong[i].arguments[k]; k++)
        arguments[2 + k] = wrong[i].arguments[k];
      run (arguments, wrong[i].code, &out, &err);
      g_test_message ("%s", err);
      g_assert_nonnull (strstr (err, wrong[i].said));
      g_assert_true (strchr (err, '\n') == err + strlen (err) - 1);
      g_assert_cmpstr (out, ==, "");
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define RECORD_TEST(name, function) g_test_add ("/cli/predict/" name, Place, NULL, set_up, function, tear_down)
  g_test_add_func ("/cli/predict/json-has-every-crossing-of-a-decade", json_has_every_crossing_of_a_decade);
  g_test_add_func ("/cli/predict/times-have-tenths-of-a-second", times_have_tenths_of_a_second);
  RECORD_TEST ("a-record-shows-what-crossed", a_record_shows_what_crossed);
  RECORD_TEST ("the-observer-decides-what-is-expected", the_observer_decides_what_is_expected);
  RECORD_TEST ("a-scan-told-the-observer-names-the-planet", a_scan_told_the_observer_names_the_planet);
  RECORD_TEST ("a-gap-is-told-with-what-is-covered", a_gap_is_told_with_what_is_covered);
  RECORD_TEST ("about-l1-nothing-is-evidence", about_l1_nothing_is_evidence);
  RECORD_TEST ("what-cannot-be-predicted-is-refused-in-one-line", what_cannot_be_predicted_is_refused_in_one_line);
  return g_test_run ();
}
