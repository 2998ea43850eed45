/* time-columns.h - which columns of a text table hold its time, and how it is written there. */
#pragma once

#include "data/record.h"
#include "readers/reader.h"
#include "readers/table-layout.h"
#include "readers/time-form.h"

/* Find the time's columns and form, by the user's choices where they say, else by names and contents. What was assumed is
 * said in the record, whose time.scale_assumed and time.place are set too. FALSE with one sentence if there is no time. */
gboolean ant_time_columns_find (const AntTableLayout *layout, const AntReadingChoices *choices, AntRecord *record,
                                AntTimeForm *form, GError **error);
/* The column looks like a time (of any kind) by itself: it is no candidate for the value. */
gboolean ant_time_columns_alike (const AntTableLayout *layout, guint column);
