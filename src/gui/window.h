/* window.h - one window for one analysis. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_WINDOW (ant_window_get_type ())
G_DECLARE_FINAL_TYPE (AntWindow, ant_window, ANT, WINDOW, GtkApplicationWindow)

AntWindow *ant_window_new (GtkApplication *application);
void ant_window_open (AntWindow *self, const char *path);
AntDesk *ant_window_get_desk (AntWindow *self);
/* Nothing is open or being opened in it. */
gboolean ant_window_is_empty (AntWindow *self);
