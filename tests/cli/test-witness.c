/* test-witness.c - `--witness` in info and scan: compared, written, and refused in one line. The command's path is in ANT_CLI. */
#include <gio/gio.h>
#include <glib/gstdio.h>
#include <math.h>
#include <string.h>

typedef struct
{
  char *folder, *record, *witness;
} Place;

/* Twenty days of 10-minute means of one Sun, dipped by 900 ppm for 5 h at noon of the fourth day; the witness is hourly and has its value in
 * the third column. */
static char *
write_record (const char *folder, const char *name, int step_min, double level, gboolean third, guint seed)
{
  g_autoptr (GRand) random = g_rand_new_with_seed (seed);
  g_autoptr (GString) text = g_string_new (third ? "utc,temperature,tsi (W/m2)\n" : "utc,tsi (W/m2)\n");
  char *path = g_build_filename (folder, name, NULL);
  for (int i = 0; i < 20 * 1440 / step_min; i++)
    {
      int minute = i * step_min;
      double noise = 0.0, dip = abs (minute - 3 * 1440 - 720) < 150 ? -900e-6 : 0.0;
      for (int k = 0; k < 12; k++)
        noise += (g_rand_double (random) - 0.5) * 30e-6;
      g_string_append_printf (text, "2041-03-%02dT%02d:%02d:00Z,%s%.5f\n", 1 + minute / 1440, minute / 60 % 24, minute % 60,
                              third ? "20.5," : "", level * (1.0 + dip + noise));
    }
  g_assert_true (g_file_set_contents (path, text->str, -1, NULL));
  return path;
}

static void
set_up (Place *place, gconstpointer unused)
{
  place->folder = g_dir_make_tmp (NULL, NULL);
  place->record = write_record (place->folder, "record.csv", 10, 1361.0, FALSE, 1);
  place->witness = write_record (place->folder, "other.csv", 60, 1365.0, TRUE, 2);
}

static void
tear_down (Place *place, gconstpointer unused)
{
  g_unlink (place->record);
  g_unlink (place->witness);
  g_rmdir (place->folder);
  g_free (place->record);
  g_free (place->witness);
  g_free (place->folder);
}

static int
run (char **out, char **err, const char *const *arguments)
{
  g_autoptr (GSubprocess) child
      = g_subprocess_newv (arguments, G_SUBPROCESS_FLAGS_STDOUT_PIPE | G_SUBPROCESS_FLAGS_STDERR_PIPE, NULL);
  g_assert_nonnull (child);
  g_assert_true (g_subprocess_communicate_utf8 (child, NULL, NULL, out, err, NULL));
  return g_subprocess_get_exit_status (child);
}

static void
info_tells_of_the_comparison (Place *place, gconstpointer unused)
{
  g_autofree char *out = NULL, *err = NULL, *witness = g_strconcat (place->witness, "::value=3", NULL);
  const char *const arguments[] = { g_getenv ("ANT_CLI"), "info", place->record, "--witness", witness, NULL };
  g_assert_cmpint (run (&out, &err, arguments), ==, 0);
  g_assert_nonnull (strstr (out, "averages of 1 h in common"));
  g_assert_nonnull (strstr (out, "correlation"));
}

static void
an_asked_dip_is_measured_in_both (Place *place, gconstpointer unused)
{
  g_autofree char *out = NULL, *err = NULL, *witness = g_strconcat (place->witness, "::value=3", NULL);
  const char *const arguments[] = { g_getenv ("ANT_CLI"), "scan", place->record, "--at", "2041-03-04T12:00:00", "--hours", "5",
                                    "--witness", witness, NULL };
  g_assert_cmpint (run (&out, &err, arguments), ==, 0);
  const char *line = strstr (out, "Witness 1");
  g_assert_nonnull (line);
  line = strstr (line, "depth ");
  g_assert_nonnull (line);
  g_assert_cmpfloat (fabs (g_ascii_strtod (line + strlen ("depth "), NULL) - 1000.0), <, 250.0);
}

static void
an_analysis_goes_on_with_its_witness (Place *place, gconstpointer unused)
{
  g_autofree char *witness = g_strconcat (place->witness, "::value=3", NULL), *out = NULL, *err = NULL, *more = NULL, *text = NULL;
  g_autofree char *analysis = g_build_filename (place->folder, "work.antumbra", NULL), *tables = g_build_filename (place->folder, "out", NULL);
  const char *const first[] = { g_getenv ("ANT_CLI"), "scan", place->record, "--no-repeats", "--witness", witness, "--save", analysis, NULL };
  const char *const again[] = { g_getenv ("ANT_CLI"), "scan", "--no-repeats", "--from", analysis, "--no-report", "--out", tables, NULL };
  const char *const remove[] = { "rm", "-r", tables, analysis, NULL };
  g_assert_cmpint (run (&out, &err, first), ==, 0);
  g_assert_true (g_file_get_contents (analysis, &text, NULL, NULL));
  g_assert_nonnull (strstr (text, "\"path\" : \"other.csv\""));
  g_clear_pointer (&out, g_free);
  g_clear_pointer (&err, g_free);
  g_assert_cmpint (run (&out, &err, again), ==, 0);
  g_assert_cmpstr (err, ==, "");
  g_assert_nonnull (strstr (out, "Witness 1, "));
  g_assert_nonnull (strstr (out, "witness-1.csv"));
  g_clear_pointer (&err, g_free);
  g_assert_cmpint (run (&more, &err, remove), ==, 0);
}

static void
what_is_no_witness_is_refused_in_one_line (Place *place, gconstpointer unused)
{
  g_autofree char *out = NULL, *err = NULL, *missing = g_build_filename (place->folder, "none.csv", NULL);
  const char *const arguments[] = { g_getenv ("ANT_CLI"), "info", place->record, "--witness", missing, NULL };
  g_assert_cmpint (run (&out, &err, arguments), ==, 3);
  g_assert_nonnull (strstr (err, "the witness: "));
  g_assert_true (strchr (err, '\n') == err + strlen (err) - 1);
  const char *const five[] = { g_getenv ("ANT_CLI"), "info", place->record, "--witness", "a", "--witness", "b", "--witness", "c",
                               "--witness", "d", "--witness", "e", NULL };
  g_autofree char *more_out = NULL, *more_err = NULL;
  g_assert_cmpint (run (&more_out, &more_err, five), ==, 2);
  g_assert_nonnull (strstr (more_err, "4 at most"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add ("/cli/witness/info-tells-of-the-comparison", Place, NULL, set_up, info_tells_of_the_comparison, tear_down);
  g_test_add ("/cli/witness/an-asked-dip-is-measured-in-both", Place, NULL, set_up, an_asked_dip_is_measured_in_both, tear_down);
  g_test_add ("/cli/witness/an-analysis-goes-on-with-its-witness", Place, NULL, set_up, an_analysis_goes_on_with_its_witness, tear_down);
  g_test_add ("/cli/witness/what-is-no-witness-is-refused-in-one-line", Place, NULL, set_up, what_is_no_witness_is_refused_in_one_line,
              tear_down);
  return g_test_run ();
}
