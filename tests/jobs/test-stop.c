/* test-stop.c - promises of jobs/stop.h; each signal is met in a child of its own. */
#include "jobs/stop.h"

#include <poll.h>
#include <signal.h>

static void
expect_cancel_on (int signal_number)
{
  GCancellable *cancellable = ant_stop_on_signals ();
  g_assert_false (g_cancellable_is_cancelled (cancellable));
  raise (signal_number);
  struct pollfd heard = { .fd = g_cancellable_get_fd (cancellable), .events = POLLIN };
  g_assert_cmpint (poll (&heard, 1, 10000), ==, 1);
  g_assert_true (g_cancellable_is_cancelled (cancellable));
}

static void
ctrl_c_cancels (void)
{
  if (g_test_subprocess ())
    {
      expect_cancel_on (SIGINT);
      return;
    }
  g_test_trap_subprocess (NULL, 20 * G_USEC_PER_SEC, G_TEST_SUBPROCESS_DEFAULT);
  g_test_trap_assert_passed ();
}

static void
sigterm_cancels (void)
{
  if (g_test_subprocess ())
    {
      expect_cancel_on (SIGTERM);
      return;
    }
  g_test_trap_subprocess (NULL, 20 * G_USEC_PER_SEC, G_TEST_SUBPROCESS_DEFAULT);
  g_test_trap_assert_passed ();
}

static void
a_second_signal_ends_the_program (void)
{
  if (g_test_subprocess ())
    {
      expect_cancel_on (SIGINT);
      raise (SIGINT);
      exit (0); /* never reached */
    }
  g_test_trap_subprocess (NULL, 20 * G_USEC_PER_SEC, G_TEST_SUBPROCESS_DEFAULT);
  g_test_trap_assert_failed ();
}

static void
asked_twice_it_is_the_same (void)
{
  g_assert_true (ant_stop_on_signals () == ant_stop_on_signals ());
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/jobs/stop/ctrl-c-cancels", ctrl_c_cancels);
  g_test_add_func ("/jobs/stop/sigterm-cancels", sigterm_cancels);
  g_test_add_func ("/jobs/stop/a-second-signal-ends-the-program", a_second_signal_ends_the_program);
  g_test_add_func ("/jobs/stop/asked-twice-it-is-the-same", asked_twice_it_is_the_same);
  return g_test_run ();
}
