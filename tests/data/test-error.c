/* test-error.c - every status becomes one sentence with the right code. */
#include <gio/gio.h>
#include <string.h>
#include "data/error.h"

static void
test_ok (void)
{
  g_autoptr (GError) error = NULL;
  g_assert_true (ant_status_to_error (ANT_OK, "counting", &error));
  g_assert_no_error (error);
}

static void
test_names_the_work (void)
{
  for (AntStatus status = ANT_BAD_ARGUMENT; status < ANT_STOPPED; status++)
    {
      g_autoptr (GError) error = NULL;
      g_assert_false (ant_status_to_error (status, "fitting the noise", &error));
      g_assert_true (error->domain == ANT_ERROR);
      g_assert_true (g_str_has_prefix (error->message, "fitting the noise: "));
      g_assert_cmpuint (strlen (error->message), >, strlen ("fitting the noise: "));
    }
}

static void
test_stop_is_a_cancellation (void)
{
  g_autoptr (GError) error = NULL;
  g_assert_false (ant_status_to_error (ANT_STOPPED, "scanning", &error));
  g_assert_error (error, G_IO_ERROR, G_IO_ERROR_CANCELLED);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/error/done-sets-nothing", test_ok);
  g_test_add_func ("/data/error/a-failure-names-the-work", test_names_the_work);
  g_test_add_func ("/data/error/a-stop-is-a-cancellation", test_stop_is_a_cancellation);
  return g_test_run ();
}
