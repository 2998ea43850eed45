/* series-table.h - the record with its slow part taken out, row by row, beside the noise floor: series.csv, series.fits. */
#pragma once

#include "data/scan-results.h"
#include "writers/table.h"

/* Noise floor of the table: the 1-sigma depth of a crossing of the searched length nearest to this. */
#define ANT_SERIES_FLOOR_H 6.0

/* row, time, jd, value, residual_ppm, slow_ppm, floor_ppm, flags of every row of the record. residual = value - slow, in ppm
 * of the median; slow is the conditional mean of the noise model's parts slower than half a day, dips taken out, so dips
 * keep their depth in the residual. Rows without a place on the grid have neither. The floor is that of the row's chunk: it
 * knows of the noise and the usual gaps there, not of the gaps beside this very row.
 * NULL if the scan was stopped before the slow part was known. The results must outlive the table. Caller frees. */
AntTable *ant_series_table_new (const AntScanResults *results);
