/* test-text-cell.c - lines are cut where they should be, and missing is told from zero. */
#include "readers/text-cell.h"

#include <math.h>
#include <string.h>

static void
expect_cells (const char *line, char separator, const char *expected)
{
  AntCell cells[16];
  gsize n_line = strlen (line);
  g_autofree char *text = g_strconcat (line, "\n", NULL);
  g_autoptr (GString) found = g_string_new (NULL);
  guint n = ant_cell_split (text, text + n_line, separator, 16, cells);
  for (guint i = 0; i < n; i++)
    {
      const char kinds[] = { 'm', 'n', 't' };
      g_string_append_printf (found, "%s%c<", i ? " " : "", kinds[cells[i].kind]);
      g_string_append_len (found, cells[i].start, cells[i].end - cells[i].start);
      g_string_append_c (found, '>');
    }
  g_assert_cmpstr (found->str, ==, expected);
}

static void
separators_cut_where_they_should (void)
{
  expect_cells ("1,2,3", ',', "n<1> n<2> n<3>");
  expect_cells (" 1 , 2 ,3 ", ',', "n<1> n<2> n<3>");
  expect_cells ("1,,3,", ',', "n<1> m<> n<3> m<>");
  expect_cells ("1;2.5;x", ';', "n<1> n<2.5> t<x>");
  expect_cells ("1\t\t3", '\t', "n<1> m<> n<3>");
  expect_cells ("\t2", '\t', "m<> n<2>");
  expect_cells ("  1   2\t 3  ", ' ', "n<1> n<2> n<3>");
  expect_cells ("2041-03-14 07:12,5", ',', "t<2041-03-14 07:12> n<5>");
  expect_cells ("\"a, b\",\"7\"", ',', "t<a, b> n<7>");
  expect_cells ("", ',', "");
}

static void
missing_is_told_from_zero_and_words (void)
{
  expect_cells ("-,NaN,nan,NA,null,-nan,--", ',', "m<-> m<NaN> m<nan> m<NA> m<null> m<-nan> m<-->");
  expect_cells ("0,-0,1e5,-.5,5x,e,inf,-Infinity", ',', "n<0> n<-0> n<1e5> n<-.5> t<5x> t<e> n<inf> n<-Infinity>");
}

static void
integers_keep_all_their_bits (void)
{
  static const struct
  {
    const char *text;
    gboolean good;
    gint64 value;
  } cases[] = {
    { "2416017424", TRUE, 2416017424 },
    { "9223372036854775807", TRUE, G_MAXINT64 },
    { "-9223372036854775808", TRUE, G_MININT64 },
    { "18446744073709551615", TRUE, -1 },
    { "18446744073709551616", FALSE, 0 },
    { "9007199254740993", TRUE, 9007199254740993 },
    { "3.0", TRUE, 3 },
    { "1e3", TRUE, 1000 },
    { "3.5", FALSE, 0 },
    { "", FALSE, 0 },
    { "x", FALSE, 0 },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      AntCell cell = { 0 };
      gint64 value = 0;
      g_autofree char *text = g_strconcat (cases[i].text, ",1\n", NULL);
      ant_cell_next (text, text + strlen (text) - 1, ',', &cell);
      g_assert_cmpint (ant_cell_integer (&cell, &value), ==, cases[i].good);
      if (cases[i].good)
        g_assert_cmpint (value, ==, cases[i].value);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/readers/text-cell/separators-cut-where-they-should", separators_cut_where_they_should);
  g_test_add_func ("/readers/text-cell/missing-is-told-from-zero-and-words", missing_is_told_from_zero_and_words);
  g_test_add_func ("/readers/text-cell/integers-keep-all-their-bits", integers_keep_all_their_bits);
  return g_test_run ();
}
