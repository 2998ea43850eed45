/* settings-row.h - one setting: its name and meaning, its value, a mark and a way back if it was changed. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_SETTINGS_ROW (ant_settings_row_get_type ())
G_DECLARE_FINAL_TYPE (AntSettingsRow, ant_settings_row, ANT, SETTINGS_ROW, GtkWidget)

GtkWidget *ant_settings_row_new (AntDesk *desk, const AntSetting *setting);
