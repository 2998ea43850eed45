/* netcdf-process.c - start, wait within a limit, end: the child is given no more than a file, a place to write and time. */
#include "readers/netcdf-process.h"

#include <errno.h>
#include <glib/gi18n.h>
#include <poll.h>
#include <signal.h>
#include <string.h>
#include <sys/mman.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>

#include "config.h"
#include "data/error.h"

#define PROGRAM "antumbra-netcdf"
#define MOST_WORDS 1024
#define LIBRARY_BYTES (G_GUINT64_CONSTANT (1) << 30) /* what the library may need beside what it writes */

struct AntNetcdfProcess
{
  pid_t child;
  int output, complaints; /* what it writes, in memory; its standard error */
  guint seconds;
};

/* Beside this program in the build tree, or where it was installed; tests say where by the environment. */
static char *
find_program (void)
{
  const char *folder = g_getenv ("ANTUMBRA_LIBEXEC");
  if (folder)
    return g_build_filename (folder, PROGRAM, NULL);
  g_autofree char *self = g_file_read_link ("/proc/self/exe", NULL);
  g_autofree char *here = self ? g_path_get_dirname (self) : NULL;
  g_autofree char *beside = here ? g_build_filename (here, "..", "readers", PROGRAM, NULL) : NULL;
  if (beside && g_file_test (beside, G_FILE_TEST_IS_EXECUTABLE))
    return g_steal_pointer (&beside);
  return g_build_filename (ANT_LIBEXEC_DIR, PROGRAM, NULL);
}

AntNetcdfProcess *
ant_netcdf_process_start (int file, const char *name, const char *const *asked, guint seconds, guint64 most_bytes, GError **error)
{
  /* No lock files beside a read-only file, no code loaded from elsewhere, no words in another language. */
  const char *const environment[] = { "HDF5_USE_FILE_LOCKING=FALSE", "HDF5_PLUGIN_PRELOAD=::", "LC_ALL=C",
                                      "ASAN_OPTIONS=detect_leaks=0", NULL };
  struct stat status;
  guint64 file_bytes = fstat (file, &status) == 0 ? (guint64) status.st_size : 0; /* one kept in memory is mapped */
  g_autofree char *program = find_program ();
  g_autoptr (GPtrArray) command = g_ptr_array_new_with_free_func (g_free);
  g_ptr_array_add (command, g_strdup (program));
  g_ptr_array_add (command, g_strdup (asked[0]));
  g_ptr_array_add (command, g_strdup_printf ("%u", seconds));
  g_ptr_array_add (command, g_strdup_printf ("%" G_GUINT64_FORMAT, (most_bytes + file_bytes + LIBRARY_BYTES) >> 20));
  for (guint i = 1; asked[i]; i++)
    g_ptr_array_add (command, g_strdup (asked[i]));
  g_ptr_array_add (command, NULL);

  g_autofree AntNetcdfProcess *process = g_new0 (AntNetcdfProcess, 1);
  process->seconds = seconds;
  process->output = memfd_create (PROGRAM, MFD_CLOEXEC);
  if (process->output < 0)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: no memory for what is read: %s"), name, g_strerror (errno));
      return NULL;
    }
  g_autoptr (GError) failure = NULL;
  if (!g_spawn_async_with_pipes_and_fds (NULL, (const char *const *) command->pdata, environment,
                                         G_SPAWN_DO_NOT_REAP_CHILD | G_SPAWN_CLOEXEC_PIPES, NULL, NULL, file, process->output, -1,
                                         NULL, NULL, 0, &process->child, NULL, NULL, &process->complaints, &failure))
    {
      close (process->output);
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: the part that reads NetCDF cannot be started: %s"), name, failure->message);
      return NULL;
    }
  return g_steal_pointer (&process);
}

typedef enum { ENDED, CANCELLED, TOO_LONG } Ending;

/* Collect its words until it closes them, which it does by ending. */
static Ending
listen (AntNetcdfProcess *process, GCancellable *cancellable, char words[MOST_WORDS])
{
  gint64 until = g_get_monotonic_time () + (2 * (gint64) process->seconds + 2) * G_USEC_PER_SEC;
  GPollFD stop = { .fd = -1 };
  gboolean watched = cancellable && g_cancellable_make_pollfd (cancellable, &stop);
  Ending ending = TOO_LONG;
  gsize n = 0;
  for (gint64 now; (now = g_get_monotonic_time ()) < until;)
    {
      struct pollfd heard[2] = { { process->complaints, POLLIN, 0 }, { stop.fd, POLLIN, 0 } };
      char lost[256];
      if (poll (heard, watched ? 2 : 1, (int) ((until - now) / 1000) + 1) < 0 && errno != EINTR)
        break;
      if (watched && g_cancellable_is_cancelled (cancellable))
        {
          ending = CANCELLED;
          break;
        }
      if (!heard[0].revents)
        continue;
      gsize room = MOST_WORDS - 1 - n;
      gssize got = read (process->complaints, room ? words + n : lost, room ? room : sizeof lost);
      if (got > 0 && room)
        n += (gsize) got;
      if (got == 0 || (got < 0 && errno != EINTR))
        {
          ending = ENDED;
          break;
        }
    }
  words[n] = 0;
  if (watched)
    g_cancellable_release_fd (cancellable);
  return ending;
}

/* The one sentence for a child that did not succeed. */
static void
explain (Ending ending, int status, const char *words, guint seconds, const char *name, GError **error)
{
  g_autofree char *plain = g_utf8_make_valid (words, -1);
  g_strdelimit (plain, "\n\r\t", ' ');
  g_strstrip (plain);
  if (ending == CANCELLED)
    g_set_error_literal (error, G_IO_ERROR, G_IO_ERROR_CANCELLED, _("stopped"));
  else if (ending == TOO_LONG || (WIFSIGNALED (status) && (WTERMSIG (status) == SIGXCPU || WTERMSIG (status) == SIGALRM)))
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
                 _("%s: found a NetCDF file that takes more than %u s to read, expected one that is not damaged"), name, seconds);
  else if (WIFSIGNALED (status) && WTERMSIG (status) == SIGXFSZ)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found more numbers than its size allows, expected a record"), name);
  else if (*plain)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found a NetCDF file that cannot be read (%s), expected one that is not damaged"),
                 name, plain);
  else
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
                 _("%s: found a NetCDF file that the library fails on, expected one that is not damaged"), name);
}

static gboolean
map_output (int file, AntNetcdfOutput *output)
{
  struct stat status;
  *output = (AntNetcdfOutput){ 0 };
  if (fstat (file, &status) != 0 || status.st_size <= 0)
    return FALSE;
  void *bytes = mmap (NULL, (gsize) status.st_size, PROT_READ, MAP_PRIVATE, file, 0);
  if (bytes == MAP_FAILED)
    return FALSE;
  *output = (AntNetcdfOutput){ bytes, (gsize) status.st_size };
  return TRUE;
}

gboolean
ant_netcdf_process_finish (AntNetcdfProcess *process, const char *name, GCancellable *cancellable, AntNetcdfOutput *output,
                           GError **error)
{
  char words[MOST_WORDS];
  int status = 0;
  Ending ending = listen (process, cancellable, words);
  kill (process->child, SIGKILL); /* one that has ended keeps the status it ended with */
  while (waitpid (process->child, &status, 0) < 0 && errno == EINTR)
    ;
  gboolean done = ending == ENDED && WIFEXITED (status) && WEXITSTATUS (status) == 0 && map_output (process->output, output);
  if (!done)
    explain (ending, status, words, process->seconds, name, error);
  close (process->output);
  close (process->complaints);
  g_free (process);
  return done;
}

void
ant_netcdf_output_clear (AntNetcdfOutput *output)
{
  if (output->bytes)
    munmap ((void *) (guintptr) output->bytes, output->n);
  *output = (AntNetcdfOutput){ 0 };
}
