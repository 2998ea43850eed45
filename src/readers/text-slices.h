/* text-slices.h - the rows of a long text: batches of bytes are read one after another, the slices of each parsed at once. */
#pragma once

#include "readers/line-source.h"
#include "readers/reader.h"
#include "readers/table-rows.h"

/* Read all lines from the layout's first row on, which must still stand in the buffer of `lines`. Slices are cut by size alone, so
 * that neither rows nor digits depend on the runner (NULL: here, one after another). FALSE on a fault of the source or a cancel. */
gboolean ant_text_slices_read (AntTableRows *rows, AntLineSource *lines, const AntTableLayout *layout, AntTimeForm *form,
                               const AntValueColumns *columns, const AntSliceRunner *runner, GError **error);
