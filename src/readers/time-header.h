/* time-header.h - what names and header of a text table say of its clock: offset from JD, time scale, place. */
#pragma once

#include "data/reading-choices.h"
#include "data/record.h"
#include "readers/table-layout.h"
#include "readers/time-form.h"

/* "BJD-2454833" in the column's name or "time = JD - 2450000" in the header. */
gboolean ant_time_header_jd_offset (const AntTableLayout *layout, const AntTableColumn *column, double *offset);
/* Set the form's scale, and the zone of a local clock: as chosen, as the names or the header say, or as is usual for the style, which is said. Also sets
 * the record's time.scale_assumed and time.place. FALSE if the chosen scale is none. */
gboolean ant_time_header_scale (const AntTableLayout *layout, const AntReadingChoices *choices, AntRecord *record,
                                AntTimeForm *form, GError **error);
/* The epoch of plain numbers as chosen, in the form's scale. FALSE if it is none, or if the times need none. */
gboolean ant_time_header_origin (const AntReadingChoices *choices, const AntRecord *record, AntTimeForm *form, GError **error);
