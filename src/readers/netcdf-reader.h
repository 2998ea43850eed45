/* netcdf-reader.h - NetCDF files, classic and 4, to the rows of a record: read by a child process, believed as little as text. */
#pragma once

#include "readers/byte-source.h"
#include "readers/reader.h"

gboolean ant_netcdf_reader_sniff (const guint8 *head, gsize n);
/* Everything but path and SHA-256, which the registry sets. Packed files and pipes are first kept in memory. */
gboolean ant_netcdf_reader_read (AntByteSource *source, const AntReadingChoices *choices, const AntSliceRunner *runner,
                                 GCancellable *cancellable, AntRecord *record, GError **error);
