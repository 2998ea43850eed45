/* record-page.h - the page Record: what the file holds, what was assumed, what was left out and why. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_RECORD_PAGE (ant_record_page_get_type ())
G_DECLARE_FINAL_TYPE (AntRecordPage, ant_record_page, ANT, RECORD_PAGE, GtkWidget)

void ant_record_page_set_desk (AntRecordPage *self, AntDesk *desk);
