/* netcdf-rows.h - the columns that the NetCDF child read, to the rows of a record. */
#pragma once

#include "data/record.h"
#include "readers/netcdf-columns.h"
#include "readers/reader.h"

/* `bytes` are what the child wrote for the columns, and for the two edges of the bounds behind them if there are any. runner: takes
 * the columns side by side, or NULL. FALSE with one sentence. */
gboolean ant_netcdf_rows_fill (const AntNetcdfContents *contents, const AntNetcdfColumns *columns, const guint8 *bytes, gsize n,
                               const AntReadingChoices *choices, const AntSliceRunner *runner, AntRecord *record, GError **error);
