/* spectrum-view.h - the power spectrum of one piece of the record: measured, fitted, and the parts of the fit. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_SPECTRUM_VIEW (ant_spectrum_view_get_type ())
G_DECLARE_FINAL_TYPE (AntSpectrumView, ant_spectrum_view, ANT, SPECTRUM_VIEW, AntPlotView)

void ant_spectrum_view_set_chunk (AntSpectrumView *self, guint chunk);
