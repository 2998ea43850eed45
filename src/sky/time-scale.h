/* time-scale.h - instants in the time scales of the trade, and calendars, by ERFA (IAU SOFA algorithms).
 *
 * An instant is two doubles jd1 + jd2 in a stated scale. UTC is ERFA's quasi-JD: a day with a leap second is 86401 s long
 * and its fraction runs to 1 over them, so 23:59:60 survives. All functions are pure and thread-safe. */
#pragma once

#include "core/status.h"

typedef enum
{
  ANT_SCALE_UNKNOWN, /* the record does not say; nothing is converted */
  ANT_SCALE_UTC,
  ANT_SCALE_TAI,
  ANT_SCALE_TT,
  ANT_SCALE_TDB,
  ANT_SCALE_GPS,
  ANT_SCALE_UNIX, /* seconds since 1970 with leap seconds ignored (POSIX) */
} AntTimeScale;

const char *ant_time_scale_name (AntTimeScale scale); /* "UTC"...; "unknown" */
/* Names in any case; "TDT" and "ET" count as TT. ANT_SCALE_UNKNOWN if not recognised. */
AntTimeScale ant_time_scale_from_name (const char *name);

/* Between any two known scales. TDB - TT by eraDtdb at the geocentre. ANT_BAD_ARGUMENT for unknown scales or years that
 * ERFA refuses; before 1972 UTC follows ERFA's drift rates. */
AntStatus ant_time_convert (AntTimeScale from, double jd1, double jd2, AntTimeScale to, double *out1, double *out2);

/* Calendar (proleptic Gregorian) to a JD in the same scale; second may be 60.x only in UTC on a leap day.
 * hour 24, minute 0, second 0 means midnight at the end of the day. ANT_BAD_ARGUMENT for impossible dates. */
AntStatus ant_time_from_calendar (AntTimeScale scale, int year, int month, int day, int hour, int minute, double second,
                                  double *jd1, double *jd2);
AntStatus ant_time_to_calendar (AntTimeScale scale, double jd1, double jd2, int decimals, int *year, int *month, int *day,
                                int *hour, int *minute, double *second);
/* Day of year (1..366) and fraction from midnight; decimal year = year + elapsed/length of that calendar year. */
AntStatus ant_time_from_day_of_year (AntTimeScale scale, int year, double day_of_year, double *jd1, double *jd2);
AntStatus ant_time_from_decimal_year (AntTimeScale scale, double year, double *jd1, double *jd2);
double ant_time_to_decimal_year (double jd1, double jd2);

/* "2041-03-14T07:12:05.3Z" (Z only for UTC) with 0..6 decimals into text[size >= 40]. */
AntStatus ant_time_text (AntTimeScale scale, double jd1, double jd2, int decimals, unsigned size, char *text);
/* Elapsed SI days from a to b, both in `scale` (leap seconds counted in UTC). Unknown scale: the plain difference. */
double ant_time_elapsed_d (AntTimeScale scale, double a1, double a2, double b1, double b2);
/* The instant `elapsed_d` SI days after a, in the same scale. */
AntStatus ant_time_after (AntTimeScale scale, double a1, double a2, double elapsed_d, double *b1, double *b2);
