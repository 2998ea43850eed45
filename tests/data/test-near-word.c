/* test-near-word.c - promises of data/near-word.h. */
#include "data/near-word.h"

#include <glib.h>

static const char *const words[] = { "scan", "simulate", "settings", "edge", NULL };

static void
a_slip_finds_its_word (void)
{
  g_assert_cmpstr (ant_near_word ("scna", words), ==, NULL); /* two changes are half of a short word */
  g_assert_cmpstr (ant_near_word ("scam", words), ==, "scan");
  g_assert_cmpstr (ant_near_word ("simluate", words), ==, "simulate");
  g_assert_cmpstr (ant_near_word ("seting", words), ==, "settings");
  g_assert_cmpstr (ant_near_word ("edgee", words), ==, "edge");
}

static void
another_word_finds_nothing (void)
{
  g_assert_null (ant_near_word ("", words));
  g_assert_null (ant_near_word ("planet", words));
  g_assert_null (ant_near_word ("settingssettings", words));
}

static void
a_very_long_word_finds_nothing (void)
{
  g_autofree char *text = g_strnfill (100000, 's');
  g_assert_null (ant_near_word (text, words));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/near-word/a-slip-finds-its-word", a_slip_finds_its_word);
  g_test_add_func ("/data/near-word/another-word-finds-nothing", another_word_finds_nothing);
  g_test_add_func ("/data/near-word/a-very-long-word-finds-nothing", a_very_long_word_finds_nothing);
  return g_test_run ();
}
