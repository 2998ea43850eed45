/* dips-page.h - the page Dips: list, floor chart and inspector. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_DIPS_PAGE (ant_dips_page_get_type ())
G_DECLARE_FINAL_TYPE (AntDipsPage, ant_dips_page, ANT, DIPS_PAGE, GtkWidget)

void ant_dips_page_set_desk (AntDipsPage *self, AntDesk *desk);
void ant_dips_page_focus_note (AntDipsPage *self);
void ant_dips_page_focus_filter (AntDipsPage *self);
