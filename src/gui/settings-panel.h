/* settings-panel.h - every setting of the table, group by group, at the side of the window. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_SETTINGS_PANEL (ant_settings_panel_get_type ())
G_DECLARE_FINAL_TYPE (AntSettingsPanel, ant_settings_panel, ANT, SETTINGS_PANEL, GtkWidget)

void ant_settings_panel_set_desk (AntSettingsPanel *self, AntDesk *desk);
/* The first setting gets the keys. */
void ant_settings_panel_focus (AntSettingsPanel *self);
