/* stop.c - a pipe from the signal handler to a thread that may take locks. */
#include "jobs/stop.h"

#include <errno.h>
#include <glib-unix.h>
#include <signal.h>
#include <unistd.h>

static int pipe_fd[2];

/* Cancelling takes locks, which a signal handler must not; a byte in a pipe is all it leaves. */
static void
on_signal (int number)
{
  char byte = 0;
  ssize_t written = write (pipe_fd[1], &byte, 1);
  (void) written; /* a full pipe has been heard already */
}

static gpointer
wait_for_byte (gpointer data)
{
  char byte;
  while (read (pipe_fd[0], &byte, 1) < 0 && errno == EINTR)
    ;
  g_cancellable_cancel (data);
  return NULL;
}

static GCancellable *
start_listening (void)
{
  GCancellable *cancellable = g_cancellable_new ();
  if (!g_unix_open_pipe (pipe_fd, FD_CLOEXEC, NULL))
    return cancellable; /* then Ctrl-C ends the program the plain way */
  g_thread_unref (g_thread_new ("stop", wait_for_byte, cancellable));
  /* SA_RESETHAND: the second signal has its default effect. */
  struct sigaction action = { .sa_handler = on_signal, .sa_flags = (int) SA_RESETHAND | SA_RESTART };
  sigemptyset (&action.sa_mask);
  sigaction (SIGINT, &action, NULL);
  sigaction (SIGTERM, &action, NULL);
  return cancellable;
}

GCancellable *
ant_stop_on_signals (void)
{
  static GCancellable *cancellable;
  if (g_once_init_enter (&cancellable))
    g_once_init_leave (&cancellable, start_listening ());
  return cancellable;
}
