/* test-exit-code.c - promises of cli/exit-code.h. */
#include "cli/exit-code.h"

#include <gio/gio.h>

#include "data/error.h"

static int
code_of (GQuark domain, int code)
{
  g_autoptr (GError) error = g_error_new_literal (domain, code, "");
  return ant_exit_code (error);
}

static void
every_kind_of_error_has_its_code (void)
{
  g_assert_cmpint (code_of (ANT_ERROR, ANT_ERROR_USAGE), ==, 2);
  g_assert_cmpint (code_of (ANT_ERROR, ANT_ERROR_READ), ==, 3);
  g_assert_cmpint (code_of (ANT_ERROR, ANT_ERROR_WRITE), ==, 4);
  g_assert_cmpint (code_of (ANT_ERROR, ANT_ERROR_STOPPED), ==, 5);
  g_assert_cmpint (code_of (ANT_ERROR, ANT_ERROR_NUMERIC), ==, 3);
  g_assert_cmpint (code_of (G_IO_ERROR, G_IO_ERROR_CANCELLED), ==, 5);
  g_assert_cmpint (code_of (G_OPTION_ERROR, G_OPTION_ERROR_UNKNOWN_OPTION), ==, 2);
  g_assert_cmpint (code_of (G_IO_ERROR, G_IO_ERROR_NOT_FOUND), ==, 3);
}

static void
an_error_is_one_line (void)
{
  if (g_test_subprocess ())
    {
      g_autoptr (GError) error = g_error_new_literal (ANT_ERROR, ANT_ERROR_READ, "first\nsecond");
      exit (ant_cli_fail (error) == ANT_EXIT_READ ? 0 : 1);
    }
  g_test_trap_subprocess (NULL, 20 * G_USEC_PER_SEC, G_TEST_SUBPROCESS_DEFAULT);
  g_test_trap_assert_passed ();
  g_test_trap_assert_stderr ("antumbra-cli: first second\n");
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/cli/exit-code/every-kind-of-error-has-its-code", every_kind_of_error_has_its_code);
  g_test_add_func ("/cli/exit-code/an-error-is-one-line", an_error_is_one_line);
  return g_test_run ();
}
