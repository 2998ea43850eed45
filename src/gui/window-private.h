/* window-private.h - inside of the window, shared by its files. */
#pragma once

#include "gui/dips-page.h"
#include "gui/noise-page.h"
#include "gui/repeats-page.h"
#include "gui/record-page.h"
#include "gui/settings-panel.h"
#include "gui/sky-page.h"
#include "gui/time-stack.h"
#include "gui/window.h"

struct _AntWindow
{
  GtkApplicationWindow parent_instance;

  /* From the template */
  GtkLabel *title, *subtitle, *banner_text, *welcome, *welcome_more, *status;
  GtkMenuButton *recent_button;
  GtkButton *scan, *banner_button;
  GtkWidget *welcome_open;
  GtkSpinner *spinner;
  GtkInfoBar *banner;
  GtkStack *stack, *pages;
  GtkListBox *recent;
  GtkPaned *paned;
  AntTimeStack *time_stack;
  GtkProgressBar *progress;
  AntRecordPage *record_page;
  AntNoisePage *noise_page;
  AntDipsPage *dips_page;
  AntRepeatsPage *repeats_page;
  AntSkyPage *sky_page;
  GtkRevealer *settings_revealer;
  AntSettingsPanel *settings_panel;

  /* Owned */
  AntDesk *desk;
};

/* Install the actions on a new window, and grey out those that make no sense now. */
void ant_window_add_actions (AntWindow *self);
void ant_window_update_actions (AntWindow *self);
void ant_window_complain (AntWindow *self, const char *sentence);
/* Save what the window shows, as it stands now; asks where. window-save.c. */
void ant_window_save_list (AntWindow *self);   /* dips or brightenings, whichever the list shows; wants results */
void ant_window_save_flags (AntWindow *self);  /* wants a record */
void ant_window_save_series (AntWindow *self); /* wants results with a slow part */
void ant_window_save_report (AntWindow *self); /* wants results */
void ant_window_write_report (AntWindow *self, const char *path); /* likewise, without asking */
