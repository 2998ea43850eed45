/* bench-window.c - how long the window keeps its main loop waiting with a large record: bench-window RECORD [SECONDS]
 * Opens it, zooms through it, scans for some seconds, stops. To be run under with-display. */
#include <time.h>

#include "support.h"

static gint64 last_us, longest_us, last_cpu_us, busiest_us;

/* Of this thread alone: what remains of a wait on a machine that has other work too. */
static gint64
cpu_us (void)
{
  struct timespec t;
  clock_gettime (CLOCK_THREAD_CPUTIME_ID, &t);
  return (gint64) t.tv_sec * G_USEC_PER_SEC + t.tv_nsec / 1000;
}

static gboolean
tick_cb (gpointer data)
{
  gint64 now_us = g_get_monotonic_time (), now_cpu_us = cpu_us ();
  longest_us = MAX (longest_us, now_us - last_us);
  busiest_us = MAX (busiest_us, now_cpu_us - last_cpu_us);
  last_us = now_us;
  last_cpu_us = now_cpu_us;
  return G_SOURCE_CONTINUE;
}

static void
begin (void)
{
  last_us = g_get_monotonic_time ();
  last_cpu_us = cpu_us ();
  longest_us = busiest_us = 0;
}

static void
end (const char *what, gint64 began_us)
{
  g_print ("%-10s %8.2f s, the main loop waited at most %6.1f ms, busy for at most %6.1f ms of CPU\n", what,
           (double) (g_get_monotonic_time () - began_us) / 1e6, (double) longest_us / 1e3, (double) busiest_us / 1e3);
}

static void
measure (const char *path, double seconds)
{
  AntWindow *window = test_gui_window ();
  AntDesk *desk = ant_window_get_desk (window);
  g_timeout_add_full (G_PRIORITY_HIGH, 5, tick_cb, NULL, NULL);
  begin ();
  gint64 began_us = last_us;
  ant_window_open (window, path);
  test_gui_wait (test_gui_idle, desk, 600);
  test_gui_settle (200);
  end ("opening", began_us);
  begin ();
  began_us = last_us;
  for (int i = 0; i < 60; i++)
    {
      ant_desk_zoom (desk, i < 30 ? 1.5 : 1 / 1.5, 8);
      test_gui_settle (20);
    }
  end ("zooming", began_us);
  begin ();
  began_us = last_us;
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  test_gui_settle ((guint) (1000 * seconds));
  gtk_widget_activate_action (GTK_WIDGET (window), "win.stop", NULL);
  end ("scanning", began_us);
  gtk_window_close (GTK_WINDOW (window));
}

static void
add (void)
{
}

int
main (int argc, char **argv)
{
  if (argc < 2)
    return 2;
  char *path = argv[1];
  double seconds = argc > 2 ? g_ascii_strtod (argv[2], NULL) : 10;
  argc = 1;
  test_gui_run (&argc, &argv, add);
  measure (path, seconds);
  return 0;
}
