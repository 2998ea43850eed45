/* shortcuts.h - every key of the program in one table; menus show them, and the shortcuts window is made from it. */
#pragma once

#include <gtk/gtk.h>

typedef struct
{
  const char *action;  /* detailed: "win.page::dips" */
  const char *title;   /* N_(): what it does */
  const char *group;   /* N_(): rows of a group stand together */
  const char *keys[3]; /* as gtk_accelerator_parse; fewer: NULL */
} AntShortcut;

extern const AntShortcut ant_shortcut_table[];
extern const gsize ant_n_shortcuts;

/* Give the keys to the application. */
void ant_shortcuts_install (GtkApplication *application);
/* A toplevel that nobody has shown yet. */
GtkWidget *ant_shortcuts_window_new (void);
