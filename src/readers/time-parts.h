/* time-parts.h - times spread over columns: year, month and day or day of year; hour, minute and second; a date in the header. */
#pragma once

#include "readers/table-layout.h"
#include "readers/time-form.h"

/* The column begins a date in parts (with the clock behind it), told by names, or where there are none by what such columns
 * can hold. Fills the form's style and parts. */
gboolean ant_time_parts_find (const AntTableLayout *layout, guint column, AntTimeForm *form);
/* The table has only a clock and its header the date: "2016 162 06 10" or an ISO date on a line of its own. */
gboolean ant_time_parts_in_header (const AntTableLayout *layout, AntTimeForm *form);
/* Clocks in the columns from `next` on: one, or hour, minute and second. */
void ant_time_parts_add_clocks (const AntTableLayout *layout, guint next, AntTimeForm *form);
/* The kind of clock in a column that stands beside a date; FALSE if it is none. */
gboolean ant_time_parts_clock (const AntTableColumn *column, AntTimePart *part);
