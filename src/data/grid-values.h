/* grid-values.h - the values of the grid. Inside the data room only. */
#pragma once

#include "data/row-order.h"

/* Rows have places, record->series its length, step and start: find the median, flag and list what is dark or covered,
 * fill series.value_ppm, error_ppm, bin_count and spike. FALSE with one sentence if the values allow no record. */
gboolean ant_grid_values_make (AntRecord *record, const AntRowOrder *order, const AntGridOptions *options,
                               double shift_d, GError **error);
