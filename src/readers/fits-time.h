/* fits-time.h - the keywords of time of a FITS header (Rots et al. 2015, A&A 574, A36): scale, unit, epoch, place, stamp. */
#pragma once

#include "data/reading-choices.h"
#include "data/record.h"
#include "readers/fits-table.h"
#include "readers/time-form.h"

/* Before the columns are told: the unit that plain times are in, and whether the header says what they count from. */
void ant_fits_time_prepare (AntFitsTable *table);
/* The scale by TIMESYS; UTC where it is absent, as the standard has it, which is said; "unknown" for scales not known here. */
const char *ant_fits_time_scale (AntFitsTable *table, AntRecord *record);
/* After they are told: the column's own scale and unit, the epoch, a time in two parts, the place of the clock, what stamps
 * mark and how long samples take. What the user chose stands. */
void ant_fits_time_apply (AntFitsTable *table, const AntReadingChoices *choices, AntRecord *record, AntTimeForm *form);
