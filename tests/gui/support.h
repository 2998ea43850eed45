/* support.h - what every test of the window needs: a small record with one dip, waiting, and proof that nothing is left. */
#pragma once

#include "gui/window.h"

/* GTK, GSL and FFTW made ready, then the tests. */
int test_gui_run (int *argc, char ***argv, void (*add) (void));

/* A record of 16 days at 10 min with a crossing-like dip of 900 ppm, 6 h, at day 8, and a spot group's passage at day 3; and one of seven rows that is none.
 * Paths live as long as the program. */
const char *test_gui_record (void);
const char *test_gui_bad_record (void);
#define TEST_DIP_D 8.0
#define TEST_SPOT_D 3.0

/* Run the main loop until the condition holds; fails the test after `seconds`. */
void test_gui_wait (gboolean (*holds) (gpointer data), gpointer data, double seconds);
void test_gui_settle (guint milliseconds);
/* A window on the screen; and one with the record open, or scanned too. */
AntWindow *test_gui_window (void);
AntWindow *test_gui_window_with_record (void);
AntWindow *test_gui_window_scanned (void);
/* The question that a window asks now, or NULL. */
GtkDialog *test_gui_question (void);
/* Close it, letting unsaved work go, and prove that it is finalised. */
void test_gui_close (AntWindow *window);
gboolean test_gui_idle (gpointer desk); /* a condition: no work is running */
/* First descendant of this type that is not in a popover, or NULL. */
gpointer test_gui_find (gpointer widget, GType type);
