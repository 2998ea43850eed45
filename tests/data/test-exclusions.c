/* test-exclusions.c - lists of spans are understood as people write them, and refused with the line that is wrong. */
#include <glib/gstdio.h>
#include <string.h>
#include "data/error.h"
#include "data/exclusions.h"

/* A record that counts days from an unknown origin: own numbers are elapsed days. */
static const AntTimeReference days = { .style = ANT_STAMP_DAYS, .own_unit_d = 1.0 };

static GArray *
parse (const char *text)
{
  g_autoptr (GError) error = NULL;
  GArray *spans = ant_exclusions_parse ("list.csv", text, &days, &error);
  g_assert_no_error (error);
  g_assert_nonnull (spans);
  return spans;
}

static void
assert_span (GArray *spans, guint i, double start_d, double end_d)
{
  g_assert_cmpuint (i, <, spans->len);
  g_assert_cmpfloat_with_epsilon (g_array_index (spans, AntSpan, i).start_d, start_d, 1e-6);
  g_assert_cmpfloat_with_epsilon (g_array_index (spans, AntSpan, i).end_d, end_d, 1e-6);
}

static void
refuse (const char *text, const char *fragment)
{
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_exclusions_parse ("list.csv", text, &days, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_nonnull (strstr (error->message, fragment));
}

static void
test_plain (void)
{
  g_autoptr (GArray) spans = parse ("# by hand\r\nstart,end,reason\r\n\r\n1.5, 2.25, \"door, open\"\r\n"
                                    "7,8\n \"9\",\"9.5\",\"said \"\"no\"\"\"");
  g_assert_cmpuint (spans->len, ==, 3);
  assert_span (spans, 0, 1.5, 2.25);
  assert_span (spans, 1, 7.0, 8.0);
  assert_span (spans, 2, 9.0, 9.5);
}

static void
test_empty (void)
{
  g_autoptr (GArray) nothing = parse (""), comments = parse ("# none\n\n");
  g_assert_cmpuint (nothing->len, ==, 0);
  g_assert_cmpuint (comments->len, ==, 0);
}

static void
test_flags (void)
{
  g_autoptr (GArray) spans = parse ("# x\nrow,time,flags\n5,5.0,fill\n6,6.0,dark\n7,7.0,quality|dark\n8,8.0,duplicate\n"
                                    "9,9.0,hand\n11,11.0,excluded\n12,,dark|no-time\n");
  g_assert_cmpuint (spans->len, ==, 3);
  assert_span (spans, 0, 6.0, 7.0);
  assert_span (spans, 1, 9.0, 9.0);
  assert_span (spans, 2, 11.0, 11.0);
  for (guint i = 0; i < 3; i++)
    g_assert_cmpfloat (g_array_index (spans, AntSpan, i).end_d, >, g_array_index (spans, AntSpan, i).start_d);
}

static void
test_refusals (void)
{
  refuse ("1,2,ok\n3\n", "list.csv: line 2: too few fields");
  refuse ("1,2,ok\n\n5,4,back\n", "line 3: the span ends before it begins");
  refuse ("1,2\nnoon,4\n", "line 2: ");
  refuse ("row,time,flags\nx,1.0,dark\n", "line 2: ");
  refuse ("row,time,flags\n1,1.0\n", "line 2: too few fields");
}

static void
test_no_file (void)
{
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_exclusions_read ("/nowhere/list.csv", &days, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_true (g_str_has_prefix (error->message, "/nowhere/list.csv: "));
}

static void
test_binary_file (void)
{
  g_autoptr (GError) error = NULL;
  g_autofree char *path = NULL;
  int fd = g_file_open_tmp (NULL, &path, NULL);
  g_assert_cmpint (fd, >=, 0);
  g_assert_true (g_close (fd, NULL));
  g_assert_true (g_file_set_contents (path, "1,2\0,3", 6, NULL));
  g_assert_null (ant_exclusions_read (path, &days, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_remove (path);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/exclusions/lines-of-start-end-and-reason", test_plain);
  g_test_add_func ("/data/exclusions/an-empty-list-excludes-nothing", test_empty);
  g_test_add_func ("/data/exclusions/flagged-rows-become-spans", test_flags);
  g_test_add_func ("/data/exclusions/a-wrong-line-is-named", test_refusals);
  g_test_add_func ("/data/exclusions/a-missing-file-is-named", test_no_file);
  g_test_add_func ("/data/exclusions/bytes-that-are-no-text-are-refused", test_binary_file);
  return g_test_run ();
}
