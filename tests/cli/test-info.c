/* test-info.c - `antumbra-cli info` tells what is in a record, and refuses in one line. The command's path is in ANT_CLI. */
#include <gio/gio.h>
#include <glib/gstdio.h>
#include <json-glib/json-glib.h>
#include <string.h>

typedef struct
{
  char *folder, *path;
} Place;

static void
set_up (Place *place, gconstpointer unused)
{
  /* 200 rows a minute apart: five fills, a doubled row, a gap of ten, quality 4 in every 20th row. */
  g_autoptr (GString) text = g_string_new ("utc,tsi (W/m2),tsi_error,flag\n");
  for (int i = 0; i < 210; i++)
    if (i < 100 || i >= 110)
      {
        const char *value = i < 5 ? "-99" : i % 2 ? "1361.05" : "1360.95";
        g_string_append_printf (text, "2041-03-14T%02d:%02d:00Z,%s,0.05,%d\n", i / 60, i % 60, value, i % 20 == 19 ? 4 : 0);
      }
  g_string_append (text, "2041-03-14T03:29:00Z,1361,0.05,0\n");
  place->folder = g_dir_make_tmp (NULL, NULL);
  place->path = g_build_filename (place->folder, "record.csv", NULL);
  g_assert_true (g_file_set_contents (place->path, text->str, -1, NULL));
}

static void
tear_down (Place *place, gconstpointer unused)
{
  g_unlink (place->path);
  g_rmdir (place->folder);
  g_free (place->path);
  g_free (place->folder);
}

static int
ask (char **out, char **err, const char *path, const char *first, const char *second)
{
  const char *arguments[] = { g_getenv ("ANT_CLI"), "info", path, first, second, NULL };
  g_autoptr (GSubprocess) child
      = g_subprocess_newv (arguments, G_SUBPROCESS_FLAGS_STDOUT_PIPE | G_SUBPROCESS_FLAGS_STDERR_PIPE, NULL);
  g_assert_nonnull (child);
  g_assert_true (g_subprocess_communicate_utf8 (child, NULL, NULL, out, err, NULL));
  return g_subprocess_get_exit_status (child);
}

static JsonNode *
ask_json (const char *path, const char *option)
{
  g_autofree char *out = NULL, *err = NULL;
  g_assert_cmpint (ask (&out, &err, path, "--json", option), ==, 0);
  JsonNode *root = json_from_string (out, NULL);
  g_assert_nonnull (root);
  return root;
}

static void
json_counts_what_was_planted (Place *place, gconstpointer unused)
{
  g_autoptr (JsonNode) root = ask_json (place->path, NULL);
  JsonObject *info = json_node_get_object (root);
  JsonObject *flags = json_object_get_object_member (info, "flags");
  g_assert_cmpint (json_object_get_int_member (info, "rows"), ==, 201);
  g_assert_cmpint (json_object_get_int_member (flags, "fill"), ==, 5);
  g_assert_cmpint (json_object_get_int_member (flags, "quality"), ==, 10);
  g_assert_cmpint (json_object_get_int_member (flags, "duplicate"), ==, 1);
  g_assert_cmpstr (json_object_get_string_member (info, "unit"), ==, "W/m2");
  g_assert_cmpstr (json_object_get_string_member (info, "error_column"), ==, "tsi_error");
  g_assert_cmpstr (json_object_get_string_member (info, "time_scale"), ==, "UTC");
  g_assert_cmpfloat_with_epsilon (json_object_get_double_member (info, "cadence_s"), 60.0, 1e-6);
  g_assert_cmpfloat_with_epsilon (json_object_get_double_member (info, "median"), 1361.0, 0.051);
  g_assert_true (json_object_get_null_member (info, "refused"));
}

static void
good_takes_a_list_or_a_mask (Place *place, gconstpointer unused)
{
  static const char *const options[] = { "--good=0,4", "--good=0x3", "--good=0x4" };
  static const int left_out[] = { 0, 0, 10 };
  for (gsize i = 0; i < G_N_ELEMENTS (options); i++)
    {
      g_autoptr (JsonNode) root = ask_json (place->path, options[i]);
      JsonObject *flags = json_object_get_object_member (json_node_get_object (root), "flags");
      g_assert_cmpint (json_object_get_int_member (flags, "quality"), ==, left_out[i]);
    }
}

static void
settings_of_the_record_are_obeyed (Place *place, gconstpointer unused)
{
  g_autoptr (JsonNode) start = ask_json (place->path, "--set=stamp=start"), cadence = ask_json (place->path, "--set=cadence=60");
  g_assert_cmpstr (json_object_get_string_member (json_node_get_object (start), "stamp"), ==, "start");
  g_assert_cmpstr (json_object_get_string_member (json_node_get_object (cadence), "stamp"), !=, "start");
}

static void
plain_words_tell_the_assumptions (Place *place, gconstpointer unused)
{
  g_autofree char *out = NULL, *err = NULL;
  g_assert_cmpint (ask (&out, &err, place->path, NULL, NULL), ==, 0);
  static const char *const words[] = { "5 fill", "60 s", "exposure", "unknown", "2041-03-14T00:00:00Z", "Assumed or found" };
  for (gsize i = 0; i < G_N_ELEMENTS (words); i++)
    g_assert_nonnull (strstr (out, words[i]));
  g_assert_cmpstr (err, ==, "");
}

static void
what_cannot_be_read_is_one_line_and_code_3 (Place *place, gconstpointer unused)
{
  g_autofree char *missing = g_build_filename (place->folder, "none.csv", NULL);
  const char *const paths[] = { missing, place->folder };
  for (gsize i = 0; i < G_N_ELEMENTS (paths); i++)
    {
      g_autofree char *out = NULL, *err = NULL;
      g_assert_cmpint (ask (&out, &err, paths[i], NULL, NULL), ==, 3);
      g_assert_cmpstr (out, ==, "");
      g_assert_true (g_str_has_prefix (err, "antumbra-cli: "));
      g_assert_true (strchr (err, '\n') == err + strlen (err) - 1);
    }
}

static void
wrong_choices_are_usage (Place *place, gconstpointer unused)
{
  static const char *const options[] = { "--good=x", "--good=0xfffffffffffffffff", "--fill=a", "--column=tsi", "--column=value=none such",
                                         "--time-format=stardate", "--time-scale=MARS" };
  for (gsize i = 0; i < G_N_ELEMENTS (options); i++)
    {
      g_autofree char *out = NULL, *err = NULL;
      g_test_message ("%s", options[i]);
      g_assert_cmpint (ask (&out, &err, place->path, options[i], NULL), ==, 2);
      g_assert_cmpstr (out, ==, "");
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define ADD(path, function) g_test_add ("/cli/info/" path, Place, NULL, set_up, function, tear_down)
  ADD ("json-counts-what-was-planted", json_counts_what_was_planted);
  ADD ("good-takes-a-list-or-a-mask", good_takes_a_list_or_a_mask);
  ADD ("settings-of-the-record-are-obeyed", settings_of_the_record_are_obeyed);
  ADD ("plain-words-tell-the-assumptions", plain_words_tell_the_assumptions);
  ADD ("what-cannot-be-read-is-one-line-and-code-3", what_cannot_be_read_is_one_line_and_code_3);
  ADD ("wrong-choices-are-usage", wrong_choices_are_usage);
  return g_test_run ();
}
