/* test-status.c - every outcome has its own phrase. */
#include <glib.h>
#include "core/status.h"

static void
every_status_has_a_phrase_of_its_own (void)
{
  for (int a = ANT_OK; a <= ANT_STOPPED + 1; a++) /* one past the last: the phrase for an unknown status */
    {
      g_assert_nonnull (ant_status_text ((AntStatus)a));
      for (int b = ANT_OK; b < a; b++)
        g_assert_cmpstr (ant_status_text ((AntStatus)a), !=, ant_status_text ((AntStatus)b));
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/core/status/every-status-has-a-phrase-of-its-own", every_status_has_a_phrase_of_its_own);
  return g_test_run ();
}
