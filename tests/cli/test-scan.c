/* test-scan.c - `antumbra-cli scan` as a program: its tables, its refusals, its exit codes. Its path is in ANT_CLI. */
#include <gio/gio.h>
#include <glib/gstdio.h>
#include <signal.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

static const char *const tables[] = { "dips.csv", "brightenings.csv", "passages.csv", "repeats.csv", "periods.csv", "floor.csv", "spectrum.csv", "chunks.csv", "flags.csv" };

typedef struct
{
  char *folder, *record, *out;
} Place;

/* What the command did. */
typedef struct
{
  int code;
  char *said, *complained;
} Run;

static void
run_clear (Run *run)
{
  g_free (run->said);
  g_free (run->complained);
}
G_DEFINE_AUTO_CLEANUP_CLEAR_FUNC (Run, run_clear)

/* Run a verb with the words of `arguments`; %R and %O stand for record and folder of results. `input`: standard input, or NULL. */
static Run
command (const Place *place, const char *arguments, const char *input)
{
  Run run = { 0 };
  g_auto (GStrv) words = g_strsplit (arguments, " ", 0);
  g_autoptr (GPtrArray) argv = g_ptr_array_new_with_free_func (g_free);
  g_ptr_array_add (argv, g_strdup (g_getenv ("ANT_CLI")));
  for (char **word = words; *word; word++)
    {
      g_autoptr (GString) text = g_string_new (*word);
      g_string_replace (text, "%R", place->record, 0);
      g_string_replace (text, "%O", place->out, 0);
      g_ptr_array_add (argv, g_strdup (text->str));
    }
  g_ptr_array_add (argv, NULL);
  g_autoptr (GError) error = NULL;
  g_autoptr (GSubprocess) child = g_subprocess_newv ((const char *const *) argv->pdata,
                                                     (input ? G_SUBPROCESS_FLAGS_STDIN_PIPE : 0)
                                                       | G_SUBPROCESS_FLAGS_STDOUT_PIPE | G_SUBPROCESS_FLAGS_STDERR_PIPE,
                                                     &error);
  g_assert_no_error (error);
  g_subprocess_communicate_utf8 (child, input, NULL, &run.said, &run.complained, &error);
  g_assert_no_error (error);
  run.code = g_subprocess_get_exit_status (child);
  return run;
}

static void
simulate_recipe (const Place *place, const char *text)
{
  g_autofree char *recipe = g_build_filename (place->folder, "small.recipe", NULL);
  g_assert_true (g_file_set_contents (recipe, text, -1, NULL));
  g_autofree char *arguments = g_strdup_printf ("simulate %s --out %%R --force", recipe);
  g_auto (Run) run = command (place, arguments, NULL);
  g_assert_cmpint (run.code, ==, 0);
  g_unlink (recipe);
}

/* Simulate a record: so many days at a cadence, quiet noise, one planet on its third day. */
static void
simulate (const Place *place, double days, int cadence_s)
{
  g_autofree char *text = g_strdup_printf ("[record]\nstart = 2043-09-01T00:00:00\ndays = %g\ncadence_s = %d\nseed = 7\n"
                                           "[noise]\npreset = quiet-sun\nwhite_ppm = 15\n[gaps]\nmask = l1\n[planet crossing]\n"
                                           "middle = 2043-09-03T17:00:00\ndepth_ppm = 900\nimpact = 0.3\nduration_h = 6\n",
                                           days, cadence_s);
  simulate_recipe (place, text);
}

static void
place_make (Place *place, gconstpointer unused)
{
  place->folder = g_dir_make_tmp (NULL, NULL);
  place->record = g_build_filename (place->folder, "small.csv", NULL);
  place->out = g_build_filename (place->folder, "out", NULL);
  simulate (place, 6, 300);
}

static void
remove_all (const char *path)
{
  GDir *dir = g_dir_open (path, 0, NULL);
  for (const char *name; dir && (name = g_dir_read_name (dir));)
    {
      g_autofree char *child = g_build_filename (path, name, NULL);
      remove_all (child);
    }
  if (dir)
    g_dir_close (dir);
  g_remove (path);
}

static void
place_clear (Place *place, gconstpointer unused)
{
  remove_all (place->folder);
  g_free (place->folder);
  g_free (place->record);
  g_free (place->out);
}

static char *
table (const Place *place, const char *name)
{
  g_autofree char *path = g_build_filename (place->out, name, NULL);
  char *text = NULL;
  g_assert_true (g_file_get_contents (path, &text, NULL, NULL));
  return text;
}

/* Line k of a table, comment lines not counted; the header is line 0. NULL beyond the end. */
static char *
row (const char *text, guint k)
{
  g_auto (GStrv) lines = g_strsplit (text, "\n", 0);
  for (char **line = lines; *line && **line; line++)
    if (**line != '#' && k-- == 0)
      return g_strdup (*line);
  return NULL;
}

/* The cell of row k under a column's name. */
static char *
cell (const char *text, guint k, const char *column)
{
  g_autofree char *header = row (text, 0), *line = row (text, k);
  g_assert_nonnull (line);
  g_auto (GStrv) names = g_strsplit (header, ",", 0), cells = g_strsplit (line, ",", 0);
  for (guint i = 0; names[i]; i++)
    if (strcmp (names[i], column) == 0)
      return g_strdup (cells[i]);
  g_error ("no column %s in %s", column, header);
}

static void
check_one_line (const Run *run)
{
  g_assert_true (g_str_has_prefix (run->complained, "antumbra-cli: "));
  g_assert_true (strchr (run->complained, '\n') == run->complained + strlen (run->complained) - 1);
}

static gboolean
is_there (const char *path)
{
  return g_file_test (path, G_FILE_TEST_EXISTS);
}

static void
all_tables_are_written_with_their_headers (Place *place, gconstpointer unused)
{
  g_auto (Run) run = command (place, "scan %R --out %O", NULL);
  g_assert_cmpint (run.code, ==, 0);
  g_assert_cmpstr (run.complained, ==, "");
  for (gsize i = 0; i < G_N_ELEMENTS (tables); i++)
    {
      g_autofree char *text = table (place, tables[i]), *header = row (text, 0);
      g_assert_nonnull (header);
      g_assert_true (g_str_has_suffix (text, "\n"));
    }
  const char *columns = "dip,start_jd,mid_jd,end_jd,mid_time,mid_utc,duration_h,depth_ppm,depth_sigma_ppm,mean_depth_ppm,radius_ratio,"
                        "snr,first_snr,expected_false,coverage,edges,class,probability,evidence";
  g_autofree char *dips = table (place, "dips.csv"), *brightenings = table (place, "brightenings.csv");
  g_autofree char *header = row (dips, 0), *mirror_header = row (brightenings, 0), *class = cell (dips, 1, "class");
  g_assert_cmpstr (header, ==, columns);
  g_assert_cmpstr (mirror_header, ==, columns);
  g_assert_cmpstr (class, ==, "planet-shaped"); /* no almanac was asked */
  static const char *const told[] = { "# record: ", "# SHA-256: ", "# Dips (Antumbra ", "# time scale: ", "# limb darkening: ", "# threshold: ",
                                      "# mirrored search", "# duration_h: ", "# depth_ppm: " };
  for (gsize i = 0; i < G_N_ELEMENTS (told); i++)
    g_assert_nonnull (strstr (dips, told[i]));
}

/* Venus in June 2012, and something of its shape two days before. */
static void
only_a_predicted_crossing_is_a_planet (Place *place, gconstpointer unused)
{
  simulate_recipe (place, "[record]\nstart = 2012-06-02T00:00:00\ndays = 8\ncadence_s = 300\nseed = 5\n"
                          "[noise]\npreset = sun\nwhite_ppm = 12\n[planet venus]\nmiddle = 2012-06-06T01:29:37\n"
                          "radius_ratio = 0.030575\nimpact = 0.5865\nduration_h = 6.666\n[planet other]\n"
                          "middle = 2012-06-04T12:00:00\nradius_ratio = 0.02\nimpact = 0.3\nduration_h = 4\n");
  g_auto (Run) run = command (place, "scan %R --out %O --no-repeats --no-report --observer earth", NULL);
  g_assert_cmpint (run.code, ==, 0);
  g_autofree char *dips = table (place, "dips.csv"), *first = cell (dips, 1, "class"), *second = cell (dips, 2, "class");
  g_assert_cmpstr (first, ==, "planet-shaped");
  g_assert_cmpstr (second, ==, "planet");
  g_auto (Run) wrong = command (place, "scan %R --observer nobody", NULL);
  g_assert_cmpint (wrong.code, ==, 3);
}

static void
the_planted_crossing_is_listed (Place *place, gconstpointer unused)
{
  g_auto (Run) run = command (place, "scan %R --out %O", NULL);
  g_assert_cmpint (run.code, ==, 0);
  g_autofree char *dips = table (place, "dips.csv"), *second = row (dips, 2);
  g_autofree char *depth = cell (dips, 1, "depth_ppm"), *sigma = cell (dips, 1, "depth_sigma_ppm"), *jd = cell (dips, 1, "mid_jd"),
                  *utc = cell (dips, 1, "mid_utc"), *length = cell (dips, 1, "duration_h");
  g_assert_null (second);
  g_assert_cmpfloat_with_epsilon (g_ascii_strtod (depth, NULL), 900, 3 * g_ascii_strtod (sigma, NULL));
  g_assert_cmpfloat_with_epsilon (g_ascii_strtod (length, NULL), 6, 0.2);
  /* 2043-09-03T17:00 UTC is JD 2467496.2083333 */
  g_assert_cmpfloat_with_epsilon (g_ascii_strtod (jd, NULL), 2467496.2083333, 5 / 1440.0);
  g_assert_true (g_str_has_prefix (utc, "2043-09-03T"));
}

static void
two_runs_and_any_threads_give_the_same_bytes (Place *place, gconstpointer unused)
{
  char *first[G_N_ELEMENTS (tables)];
  g_auto (Run) run = command (place, "scan %R --out %O --threads 1", NULL);
  for (gsize i = 0; i < G_N_ELEMENTS (tables); i++)
    first[i] = table (place, tables[i]);
  g_auto (Run) again = command (place, "scan %R --out %O --threads 2 --force", NULL);
  g_assert_cmpint (again.code, ==, 0);
  g_assert_cmpstr (run.said, ==, again.said);
  for (gsize i = 0; i < G_N_ELEMENTS (tables); i++)
    {
      g_autofree char *second = table (place, tables[i]);
      g_assert_cmpstr (first[i], ==, second);
      g_free (first[i]);
    }
}

static void
results_that_are_there_stay_unless_forced (Place *place, gconstpointer unused)
{
  g_autofree char *mine = g_build_filename (place->out, "floor.csv", NULL);
  g_assert_cmpint (g_mkdir (place->out, 0700), ==, 0);
  g_assert_true (g_file_set_contents (mine, "mine\n", -1, NULL));
  g_auto (Run) run = command (place, "scan %R --out %O", NULL);
  g_assert_cmpint (run.code, ==, 4);
  check_one_line (&run);
  g_assert_nonnull (strstr (run.complained, "floor.csv"));
  g_assert_nonnull (strstr (run.complained, "--force"));
  g_autofree char *kept = table (place, "floor.csv"), *dips = g_build_filename (place->out, "dips.csv", NULL);
  g_assert_cmpstr (kept, ==, "mine\n");
  g_assert_false (is_there (dips));
  g_auto (Run) forced = command (place, "scan %R --out %O --force", NULL);
  g_assert_cmpint (forced.code, ==, 0);
  g_autofree char *replaced = table (place, "floor.csv");
  g_assert_cmpstr (replaced, !=, "mine\n");
}

static void
wrong_options_are_usage (Place *place, gconstpointer unused)
{
  static const char *const wrong[] = { "scan",
                                       "scan %R %R --out %O",
                                       "scan %R --out %O --bright",
                                       "scan %R --out %O --threads -1",
                                       "scan %R --out %O --threads many",
                                       "scan %R --out %O --at 2043-09-03T17:00:00",
                                       "scan %R --out %O --hours 6",
                                       "scan %R --out %O --at 2043-09-03T17:00:00 --hours 0",
                                       "scan %R --also fits",
                                       "scan %R --series",
                                       "scan %R --out %O --also csv",
                                       "scan %R --out %O --at 2043-09-03T17:00:00 --hours 6 --also fits",
                                       "scan %R --out %O --set no-such-key=1",
                                       "scan %R --out %O --set threshold=high",
                                       "scan %R --out %O --good x" };
  for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
    {
      g_auto (Run) run = command (place, wrong[i], NULL);
      g_test_message ("%s: %s", wrong[i], run.complained);
      g_assert_cmpint (run.code, ==, 2);
      check_one_line (&run);
      g_assert_cmpstr (run.said, ==, "");
      g_assert_false (is_there (place->out));
    }
}

static void
what_cannot_be_read_leaves_nothing (Place *place, gconstpointer unused)
{
  static const char *const contents[] = { "", "only words\nand more words\n", "time,value\n2043-09-01T00:00:00,1361\n" };
  g_auto (Run) missing = command (place, "scan no/such/file --out %O", NULL);
  g_assert_cmpint (missing.code, ==, 3);
  check_one_line (&missing);
  g_assert_false (is_there (place->out));
  for (gsize i = 0; i < G_N_ELEMENTS (contents); i++)
    {
      g_assert_true (g_file_set_contents (place->record, contents[i], -1, NULL));
      g_auto (Run) run = command (place, "scan %R --out %O", NULL);
      g_test_message ("%s", run.complained);
      g_assert_cmpint (run.code, ==, 3);
      check_one_line (&run);
      g_assert_nonnull (strstr (run.complained, "small.csv"));
      g_assert_false (is_there (place->out));
    }
}

static void
an_asked_dip_is_marked_and_nothing_else_is_written (Place *place, gconstpointer unused)
{
  g_auto (Run) run = command (place, "scan %R --out %O --at 2043-09-03T17:00:00 --hours 6", NULL);
  g_assert_cmpint (run.code, ==, 0);
  g_autofree char *dips = table (place, "dips.csv"), *second = row (dips, 2), *asked = cell (dips, 1, "asked");
  g_autofree char *depth = cell (dips, 1, "depth_ppm"), *sigma = cell (dips, 1, "depth_sigma_ppm"), *limit = cell (dips, 1, "upper_limit_ppm");
  g_assert_null (second);
  g_assert_cmpstr (asked, ==, "asked");
  double depth_ppm = g_ascii_strtod (depth, NULL), sigma_ppm = g_ascii_strtod (sigma, NULL);
  g_assert_cmpfloat_with_epsilon (depth_ppm, 900, 3 * sigma_ppm);
  g_assert_cmpfloat_with_epsilon (g_ascii_strtod (limit, NULL), depth_ppm + 1.6449 * sigma_ppm, 0.02);
  g_autofree char *floor = g_build_filename (place->out, "floor.csv", NULL);
  g_assert_false (is_there (floor));
}

/* Outside the record the question is wrong; in an excluded span the record has no answer. */
static void
an_asked_time_without_data_is_refused (Place *place, gconstpointer unused)
{
  g_autofree char *spans = g_build_filename (place->folder, "spans.txt", NULL);
  g_assert_true (g_file_set_contents (spans, "2043-09-03T00:00:00,2043-09-04T12:00:00,swapped detectors\n", -1, NULL));
  g_autofree char *excluding = g_strdup_printf ("scan %%R --out %%O --at 2043-09-03T17:00:00 --hours 6 --exclude %s", spans);
  g_auto (Run) outside = command (place, "scan %R --out %O --at 2044-01-01T00:00:00 --hours 6", NULL);
  g_auto (Run) hidden = command (place, excluding, NULL);
  g_assert_cmpint (outside.code, ==, 2);
  g_assert_nonnull (strstr (outside.complained, "2044-01-01T00:00:00Z"));
  g_assert_nonnull (strstr (outside.complained, "2043-09-01T00:02:30Z"));
  g_assert_cmpint (hidden.code, ==, 3);
  check_one_line (&outside);
  check_one_line (&hidden);
  g_assert_false (is_there (place->out));
}

/* The days observed, from the first line of the summary. */
static double
observed_d (const Run *run)
{
  g_assert_cmpint (run->code, ==, 0);
  const char *at = strstr (run->said, ": ");
  g_assert_nonnull (at);
  return g_ascii_strtod (at + 2, NULL);
}

static void
limits_and_exclusions_shorten_the_record (Place *place, gconstpointer unused)
{
  g_autofree char *spans = g_build_filename (place->folder, "spans.txt", NULL);
  g_assert_true (g_file_set_contents (spans, "2043-09-03T00:00:00,2043-09-04T12:00:00,swapped detectors\n", -1, NULL));
  g_autofree char *excluding = g_strdup_printf ("scan %%R --out %%O --exclude %s", spans);
  g_auto (Run) whole = command (place, "scan %R", NULL);
  g_auto (Run) from = command (place, "scan %R --from 2043-09-03T00:00:00", NULL);
  g_auto (Run) between = command (place, "scan %R --from 2043-09-03T00:00:00 --to 2043-09-06T00:00:00", NULL);
  g_auto (Run) without = command (place, excluding, NULL);
  g_assert_cmpfloat_with_epsilon (observed_d (&whole) - observed_d (&from), 2, 0.15); /* less the gaps of the mask */
  g_assert_cmpfloat_with_epsilon (observed_d (&between), 3, 0.15);
  g_assert_cmpfloat_with_epsilon (observed_d (&whole) - observed_d (&without), 1.5, 0.15);
  g_autofree char *dips = table (place, "dips.csv"), *flags = table (place, "flags.csv"), *first = row (dips, 1);
  g_assert_null (first); /* the crossing lay in the excluded span */
  g_assert_nonnull (strstr (flags, "excluded"));
}

/* An earlier flags.csv excludes the same rows again. */
static void
flags_of_an_earlier_scan_exclude (Place *place, gconstpointer unused)
{
  g_autofree char *spans = g_build_filename (place->folder, "spans.txt", NULL), *saved = g_build_filename (place->folder, "flags.csv", NULL);
  g_assert_true (g_file_set_contents (spans, "2043-09-03T00:00:00,2043-09-04T12:00:00,swapped detectors\n", -1, NULL));
  g_autofree char *excluding = g_strdup_printf ("scan %%R --out %%O --exclude %s", spans);
  g_auto (Run) first = command (place, excluding, NULL);
  g_autofree char *flags = table (place, "flags.csv");
  g_assert_true (g_file_set_contents (saved, flags, -1, NULL));
  g_autofree char *again = g_strdup_printf ("scan %%R --out %%O --force --exclude %s", saved);
  g_auto (Run) second = command (place, again, NULL);
  g_assert_cmpfloat_with_epsilon (observed_d (&first), observed_d (&second), 0.01);
}

/* All lines but the one that names the record. */
static char *
without_path (const char *text)
{
  g_autoptr (GString) kept = g_string_new (NULL);
  g_auto (GStrv) lines = g_strsplit (text, "\n", 0);
  for (char **line = lines; *line; line++)
    if (!g_str_has_prefix (*line, "# record: "))
      g_string_append_printf (kept, "%s\n", *line);
  return g_strdup (kept->str);
}

static void
standard_input_is_read_like_a_file (Place *place, gconstpointer unused)
{
  g_autofree char *bytes = NULL;
  g_assert_true (g_file_get_contents (place->record, &bytes, NULL, NULL));
  char *of_file[G_N_ELEMENTS (tables)];
  g_auto (Run) run = command (place, "scan %R --out %O", NULL);
  for (gsize i = 0; i < G_N_ELEMENTS (tables); i++)
    {
      g_autofree char *text = table (place, tables[i]);
      of_file[i] = without_path (text);
    }
  g_auto (Run) piped = command (place, "scan - --out %O --force", bytes);
  g_assert_cmpint (piped.code, ==, 0);
  for (gsize i = 0; i < G_N_ELEMENTS (tables); i++)
    {
      g_autofree char *text = table (place, tables[i]), *kept = without_path (text);
      g_assert_cmpstr (kept, ==, of_file[i]);
      g_free (of_file[i]);
    }
}

static void
a_place_that_cannot_be_written_is_told_at_once (Place *place, gconstpointer unused)
{
  /* A file stands where the folder's parent should be: no one can make it, root neither. */
  g_autofree char *arguments = g_strdup_printf ("scan %%R --out %s/below", place->record);
  g_auto (Run) run = command (place, arguments, NULL);
  g_assert_cmpint (run.code, ==, 4);
  check_one_line (&run);
  g_assert_nonnull (strstr (run.complained, "small.csv: "));
}

/* Ctrl-C as soon as the search says that it is at work. */
static void
an_interrupt_leaves_nothing (Place *place, gconstpointer unused)
{
  simulate (place, 40, 60);
  g_autoptr (GError) error = NULL;
  g_autoptr (GSubprocess) child = g_subprocess_new (G_SUBPROCESS_FLAGS_STDOUT_SILENCE | G_SUBPROCESS_FLAGS_STDERR_PIPE, &error,
                                                    g_getenv ("ANT_CLI"), "scan", place->record, "--out", place->out, "--progress", NULL);
  g_assert_no_error (error);
  g_autoptr (GDataInputStream) said = g_data_input_stream_new (g_subprocess_get_stderr_pipe (child));
  g_autofree char *line = g_data_input_stream_read_line (said, NULL, NULL, &error);
  g_assert_nonnull (line);
  g_subprocess_send_signal (child, SIGINT);
  g_assert_true (g_subprocess_wait (child, NULL, &error));
  g_assert_true (g_subprocess_get_if_exited (child));
  g_assert_cmpint (g_subprocess_get_exit_status (child), ==, 5);
  g_assert_false (is_there (place->out));
}

/* Going on with an analysis */

static void
expect_same_tables (const Place *place, const char *one, const char *other)
{
  for (gsize i = 0; i < G_N_ELEMENTS (tables); i++)
    {
      g_autofree char *a = g_build_filename (place->folder, one, tables[i], NULL), *b = g_build_filename (place->folder, other, tables[i], NULL);
      g_autofree char *text_a = NULL, *text_b = NULL;
      g_assert_true (g_file_get_contents (a, &text_a, NULL, NULL) && g_file_get_contents (b, &text_b, NULL, NULL));
      g_assert_cmpstr (text_a, ==, text_b);
    }
}

static char *
beside (const Place *place, const char *name)
{
  return g_build_filename (place->folder, name, NULL);
}

/* What a hand or another program may write into an analysis. */
static void
replace_in (const char *path, const char *old, const char *new)
{
  g_autofree char *text = NULL;
  g_assert_true (g_file_get_contents (path, &text, NULL, NULL));
  g_autoptr (GString) changed = g_string_new (text);
  g_assert_cmpuint (g_string_replace (changed, old, new, 1), ==, 1);
  g_assert_true (g_file_set_contents (path, changed->str, -1, NULL));
}

static void
an_analysis_gives_the_same_tables (Place *place, gconstpointer unused)
{
  g_autofree char *list = beside (place, "out.list"), *again = beside (place, "again");
  g_assert_true (g_file_set_contents (list, "2043-09-05T00:00:00,2043-09-05T03:00:00,cold\n", -1, NULL));
  g_autofree char *first = g_strdup_printf ("scan %%R --out %%O --set duration-max=9.7 --set exposure=250.3 --from 2043-09-01T06:00:00 --exclude %s", list);
  g_autofree char *second = g_strdup_printf ("scan --from %%O/analysis.antumbra --out %s --threads 1", again);
  g_auto (Run) run = command (place, first, NULL), rerun = command (place, second, NULL);
  g_assert_cmpint (run.code, ==, 0);
  g_assert_cmpstr (rerun.complained, ==, "");
  g_assert_cmpint (rerun.code, ==, 0);
  expect_same_tables (place, "out", "again");
}

static void
verdicts_and_notes_are_carried_over_and_said (Place *place, gconstpointer unused)
{
  g_autofree char *saved = beside (place, "work.antumbra"), *save = g_strdup_printf ("scan %%R --save %s", saved);
  g_auto (Run) run = command (place, save, NULL);
  g_assert_cmpint (run.code, ==, 0);
  replace_in (saved, "\"judgements\" : []", "\"judgements\" : [ { \"mid_d\" : 2.7, \"duration_d\" : 0.25, \"class\" : \"planet\", "
              "\"note\" : \"seen, twice\" }, { \"mid_d\" : 4.5, \"duration_d\" : 0.1, \"class\" : \"noise\", \"note\" : \"\" } ]");
  g_autofree char *again = g_strdup_printf ("scan --from %s --out %%O --set duration-max=8", saved);
  g_auto (Run) rerun = command (place, again, NULL);
  g_assert_cmpint (rerun.code, ==, 0);
  g_assert_nonnull (strstr (rerun.said, "Verdicts and notes carried over: 1; kept of dips that are no longer found: 1."));
  g_autofree char *dips = table (place, "dips.csv"), *header = row (dips, 0);
  g_assert_true (g_str_has_suffix (header, ",analyst_class,analyst_note"));
  g_assert_nonnull (strstr (dips, ",planet,\"seen, twice\"\n"));
  g_autofree char *kept = table (place, "analysis.antumbra");
  g_assert_nonnull (strstr (kept, "\"noise\""));
}

static void
a_record_that_changed_or_is_gone_is_said (Place *place, gconstpointer unused)
{
  g_autofree char *saved = beside (place, "work.antumbra"), *save = g_strdup_printf ("scan %%R --save %s", saved);
  g_autofree char *again = g_strdup_printf ("scan --from %s", saved), *named = g_strdup_printf ("scan %%R.moved --from %s", saved);
  g_autofree char *moved = g_strconcat (place->record, ".moved", NULL);
  g_auto (Run) run = command (place, save, NULL);
  g_assert_cmpint (run.code, ==, 0);
  replace_in (place->record, "# ", "# another ");
  g_auto (Run) changed = command (place, again, NULL);
  g_assert_cmpint (changed.code, ==, 0);
  check_one_line (&changed);
  g_assert_nonnull (strstr (changed.complained, "the bytes are not those"));
  g_assert_cmpint (g_rename (place->record, moved), ==, 0);
  g_auto (Run) gone = command (place, again, NULL);
  g_assert_cmpint (gone.code, ==, 3);
  check_one_line (&gone);
  g_assert_nonnull (strstr (gone.complained, "the record of "));
  g_auto (Run) found = command (place, named, NULL);
  g_assert_cmpint (found.code, ==, 0);
}

static void
an_analysis_is_saved_over_another_only_by_force (Place *place, gconstpointer unused)
{
  g_autofree char *saved = beside (place, "work.antumbra"), *save = g_strdup_printf ("scan %%R --save %s", saved);
  g_autofree char *force = g_strdup_printf ("%s --force", save), *from = g_strdup_printf ("scan --from %s", saved);
  g_assert_true (g_file_set_contents (saved, "{}", -1, NULL));
  g_auto (Run) refused = command (place, save, NULL);
  g_assert_cmpint (refused.code, ==, 4);
  check_one_line (&refused);
  g_auto (Run) wrong = command (place, from, NULL);
  g_assert_cmpint (wrong.code, ==, 3);
  check_one_line (&wrong);
  g_auto (Run) forced = command (place, force, NULL);
  g_assert_cmpint (forced.code, ==, 0);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add ("/cli/scan/" path, Place, NULL, place_make, function, place_clear)
  TEST ("all-tables-are-written-with-their-headers", all_tables_are_written_with_their_headers);
  TEST ("only-a-predicted-crossing-is-a-planet", only_a_predicted_crossing_is_a_planet);
  TEST ("the-planted-crossing-is-listed", the_planted_crossing_is_listed);
  TEST ("two-runs-and-any-threads-give-the-same-bytes", two_runs_and_any_threads_give_the_same_bytes);
  TEST ("results-that-are-there-stay-unless-forced", results_that_are_there_stay_unless_forced);
  TEST ("wrong-options-are-usage", wrong_options_are_usage);
  TEST ("what-cannot-be-read-leaves-nothing", what_cannot_be_read_leaves_nothing);
  TEST ("an-asked-dip-is-marked-and-nothing-else-is-written", an_asked_dip_is_marked_and_nothing_else_is_written);
  TEST ("an-asked-time-without-data-is-refused", an_asked_time_without_data_is_refused);
  TEST ("limits-and-exclusions-shorten-the-record", limits_and_exclusions_shorten_the_record);
  TEST ("flags-of-an-earlier-scan-exclude", flags_of_an_earlier_scan_exclude);
  TEST ("standard-input-is-read-like-a-file", standard_input_is_read_like_a_file);
  TEST ("a-place-that-cannot-be-written-is-told-at-once", a_place_that_cannot_be_written_is_told_at_once);
  TEST ("an-interrupt-leaves-nothing", an_interrupt_leaves_nothing);
  TEST ("an-analysis-gives-the-same-tables", an_analysis_gives_the_same_tables);
  TEST ("verdicts-and-notes-are-carried-over-and-said", verdicts_and_notes_are_carried_over_and_said);
  TEST ("a-record-that-changed-or-is-gone-is-said", a_record_that_changed_or_is_gone_is_said);
  TEST ("an-analysis-is-saved-over-another-only-by-force", an_analysis_is_saved_over_another_only_by_force);
  return g_test_run ();
}
