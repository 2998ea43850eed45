/* repeats-page.h - the page Repeats: periods, list, fold, and its events one by one. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_REPEATS_PAGE (ant_repeats_page_get_type ())
G_DECLARE_FINAL_TYPE (AntRepeatsPage, ant_repeats_page, ANT, REPEATS_PAGE, GtkWidget)

void ant_repeats_page_set_desk (AntRepeatsPage *self, AntDesk *desk);
