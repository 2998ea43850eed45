/* table-record.h - from the rows of a table, whatever its format, to those of a record. */
#pragma once

#include "readers/table-rows.h"

/* Name the time columns and say how they are read. */
void ant_table_record_say_time (const AntTableLayout *layout, const AntTimeForm *form, AntRecord *record);
/* Take the rows over: the value is chosen among the candidates, its fills are flagged, errors that are none become unknown,
 * the other columns of numbers are kept. FALSE with one sentence for what is no record of irradiance. */
gboolean ant_table_record_fill (AntTableRows *rows, const AntTableLayout *layout, const AntTimeForm *form,
                                const AntValueColumns *columns, const AntReadingChoices *choices, AntRecord *record,
                                GError **error);
