/* test-save-task.c - a file is made on a thread and appears whole, or not at all with a sentence. */
#include <glib/gstdio.h>
#include <string.h>

#include "data/error.h"
#include "jobs/save-task.h"

typedef struct
{
  const char *text; /* NULL: cannot be made */
  int freed;
} Order;

static GBytes *
make (gconstpointer data, GError **error)
{
  const Order *order = data;
  if (order->text)
    return g_bytes_new (order->text, strlen (order->text));
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, "no text");
  return NULL;
}

static void
free_order (gpointer data)
{
  ((Order *) data)->freed++;
}

static void
done_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  *(GAsyncResult **) data = g_object_ref (result);
}

/* Save, and wait for the end. */
static gboolean
save (const char *path, Order *order, GError **error)
{
  GAsyncResult *result = NULL;
  ant_save_task_async (path, make, order, free_order, done_cb, &result);
  while (!result)
    g_main_context_iteration (NULL, TRUE);
  gboolean good = ant_save_task_finish (result, error);
  g_object_unref (result);
  return good;
}

static void
what_is_made_is_what_the_file_holds (void)
{
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL), *path = g_build_filename (folder, "a.txt", NULL), *read = NULL;
  g_autoptr (GError) error = NULL;
  Order order = { "first" }, again = { "second" };
  g_assert_true (save (path, &order, &error));
  g_assert_true (save (path, &again, &error));
  g_assert_no_error (error);
  g_assert_true (g_file_get_contents (path, &read, NULL, NULL));
  g_assert_cmpstr (read, ==, "second");
  g_unlink (path);
  g_assert_cmpint (g_rmdir (folder), ==, 0); /* no draft is left */
}

static void
what_cannot_be_made_leaves_the_file_as_it_was (void)
{
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL), *path = g_build_filename (folder, "a.txt", NULL), *read = NULL;
  g_autoptr (GError) error = NULL;
  Order order = { NULL };
  g_assert_true (g_file_set_contents (path, "mine", -1, NULL));
  g_assert_false (save (path, &order, &error));
  g_assert_cmpstr (error->message, ==, "no text");
  g_assert_true (g_file_get_contents (path, &read, NULL, NULL));
  g_assert_cmpstr (read, ==, "mine");
  g_unlink (path);
  g_assert_cmpint (g_rmdir (folder), ==, 0);
}

static void
a_place_that_cannot_be_written_is_named (void)
{
  g_autoptr (GError) error = NULL;
  Order order = { "text" };
  g_assert_false (save ("/dev/null/below/a.txt", &order, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_nonnull (strstr (error->message, "/dev/null/below/a.txt"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/jobs/save-task/what-is-made-is-what-the-file-holds", what_is_made_is_what_the_file_holds);
  g_test_add_func ("/jobs/save-task/what-cannot-be-made-leaves-the-file-as-it-was", what_cannot_be_made_leaves_the_file_as_it_was);
  g_test_add_func ("/jobs/save-task/a-place-that-cannot-be-written-is-named", a_place_that_cannot_be_written_is_named);
  return g_test_run ();
}
