/* cf-time.h - time as the CF conventions for NetCDF write it: "seconds since 2016-12-31 23:59:58", and a calendar.
 *
 * Only the calendar "utc" counts leap seconds. In "standard" (or "gregorian") and "proleptic_gregorian" a day has 86400 s
 * whatever the Earth did, in "tai" there are none. Calendars that no clock keeps (noleap, 360_day ...) are refused.
 * Source: CF conventions 1.12, sections 4.4 and 4.4.1 to 4.4.3. */
#pragma once

#include "data/record.h"

typedef struct
{
  AntTimeScale scale;      /* ANT_SCALE_UNKNOWN: the file says that its time has no leap seconds, and not what it is */
  gboolean scale_assumed;
  gboolean counts_leaps;   /* the numbers count SI seconds, leap seconds too */
  double unit_s;           /* seconds a unit */
  double epoch_jd;         /* midnight of the reference day, in the scale's own count */
  double epoch_second;     /* of that day, zone taken off: perhaps below 0 or beyond the day */

  /* Working state of ant_cf_time_read. */
  gboolean started;
  double origin_jd, own_zero;
  double day_jd, day_start_d, day_own; /* the day last met: its midnight, and the number there */
  double origin_s;         /* counts_leaps: SI seconds from the reference to the origin */
} AntCfTime;

/* Words of a time unit, "seconds since" and a date. */
gboolean ant_cf_time_is_unit (const char *units);
/* calendar, units_metadata and chosen_scale may be NULL. FALSE with what was found and what was expected (no file's name). */
gboolean ant_cf_time_parse (const char *units, const char *calendar, const char *units_metadata, const char *chosen_scale,
                            AntCfTime *time, GError **error);
/* Elapsed days of a number; the first finite one sets the origin, the midnight at or before it. NaN if it is no time. */
double ant_cf_time_read (AntCfTime *time, double number);
/* What it has come to mean; call after the last number. Fills all but `place`. */
void ant_cf_time_reference (const AntCfTime *time, AntTimeReference *reference);
