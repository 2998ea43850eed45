/* dip-table.h - the list of dips as a widget: sortable by every column, filtered by kind and by words. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_DIP_TABLE (ant_dip_table_get_type ())
G_DECLARE_FINAL_TYPE (AntDipTable, ant_dip_table, ANT, DIP_TABLE, GtkWidget)

void ant_dip_table_set_desk (AntDipTable *self, AntDesk *desk);
void ant_dip_table_focus_filter (AntDipTable *self);
/* For tests: rows that are shown, and the column view. */
guint ant_dip_table_get_n_rows (AntDipTable *self);
GtkColumnView *ant_dip_table_get_view (AntDipTable *self);
