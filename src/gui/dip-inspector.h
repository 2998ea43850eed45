/* dip-inspector.h - the selected dip: close-up, numbers, and the analyst's verdict and note. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_DIP_INSPECTOR (ant_dip_inspector_get_type ())
G_DECLARE_FINAL_TYPE (AntDipInspector, ant_dip_inspector, ANT, DIP_INSPECTOR, GtkWidget)

void ant_dip_inspector_set_desk (AntDipInspector *self, AntDesk *desk);
void ant_dip_inspector_focus_note (AntDipInspector *self);
