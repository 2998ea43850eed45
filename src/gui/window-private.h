/* window-private.h - inside of the window, shared by its files. */
#pragma once

#include "gui/dips-page.h"
#include "gui/instrument-page.h"
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
  GtkInfoBar *banner, *offer;
  GtkLabel *offer_text;
  GtkButton *offer_yes, *offer_no;
  GMenu *edit_section;
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
  AntInstrumentPage *instrument_page;
  GtkRevealer *settings_revealer;
  AntSettingsPanel *settings_panel;

  /* Owned */
  AntDesk *desk;

  /* Leaving the analysis, once it is saved: for this path (owned), or to close */
  gboolean asking, leave_when_saved, may_close;
  char *going_to;
};

/* Install the actions on a new window, and grey out those that make no sense now. */
void ant_window_add_actions (AntWindow *self);
void ant_window_update_actions (AntWindow *self);
void ant_window_complain (AntWindow *self, const char *sentence);
/* Keeping the work. window-keep.c. */
void ant_window_save (AntWindow *self);
void ant_window_save_as (AntWindow *self);
void ant_window_save_tables (AntWindow *self);
void ant_window_save_tables_into (AntWindow *self, const char *folder, gboolean replace);
void ant_window_find_record (AntWindow *self);
void ant_window_accept_offer (AntWindow *self);
void ant_window_decline_offer (AntWindow *self);
/* Leave for another file, or (NULL) close: TRUE if nothing stands against it. Else the user is asked, and it is done after
 * the answer. */
gboolean ant_window_leave (AntWindow *self, const char *path);
void ant_window_stay (AntWindow *self);
void ant_window_show_kept (AntWindow *self);
/* Save what the window shows, as it stands now; asks where. window-save.c. */
void ant_window_save_list (AntWindow *self);   /* dips or brightenings, whichever the list shows; wants results */
void ant_window_save_flags (AntWindow *self);  /* wants a record */
void ant_window_save_series (AntWindow *self); /* wants results with a slow part */
void ant_window_save_report (AntWindow *self); /* wants results */
void ant_window_write_report (AntWindow *self, const char *path); /* likewise, without asking */
