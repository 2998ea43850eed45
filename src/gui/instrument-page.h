/* instrument-page.h - the page Instrument: any strip or column by the phase of an orbit or the minutes since a gap, for those who guard
 * an instrument. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"

#define ANT_TYPE_INSTRUMENT_PAGE (ant_instrument_page_get_type ())
G_DECLARE_FINAL_TYPE (AntInstrumentPage, ant_instrument_page, ANT, INSTRUMENT_PAGE, GtkWidget)

void ant_instrument_page_set_desk (AntInstrumentPage *self, AntDesk *desk);
