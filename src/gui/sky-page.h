/* sky-page.h - what crossed the Sun over the record for whoever was watching, and what the record shows of it. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_SKY_PAGE (ant_sky_page_get_type ())
G_DECLARE_FINAL_TYPE (AntSkyPage, ant_sky_page, ANT, SKY_PAGE, GtkWidget)

void ant_sky_page_set_desk (AntSkyPage *self, AntDesk *desk);
