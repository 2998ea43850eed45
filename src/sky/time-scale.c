/* time-scale.c - time scales and calendars; every conversion goes through TAI. */
#include "sky/time-scale.h"
#include "core/units.h"

#include <erfa.h>
#include <math.h>
#include <stdio.h>
#include <string.h>
#include <strings.h>

#define GPS_BEHIND_TAI_D (19.0 / ANT_SECONDS_PER_DAY) /* GPS time began at TAI - 19 s and takes no leap seconds */
#define LEAP_STEP_S 0.5 /* a day this much longer than 86400 s has a leap second; before 1972 days differ by less */

static const struct
{
  const char *name;
  AntTimeScale scale;
} scale_names[] = {
  { "unknown", ANT_SCALE_UNKNOWN }, { "UTC", ANT_SCALE_UTC }, { "TAI", ANT_SCALE_TAI }, { "TT", ANT_SCALE_TT },
  { "TDB", ANT_SCALE_TDB },         { "GPS", ANT_SCALE_GPS }, { "Unix", ANT_SCALE_UNIX }, { "TDT", ANT_SCALE_TT },
  { "ET", ANT_SCALE_TT },           { "IAT", ANT_SCALE_TAI }, { "Z", ANT_SCALE_UTC },   { "GMT", ANT_SCALE_UTC },
};

const char *
ant_time_scale_name (AntTimeScale scale)
{
  for (size_t i = 0; i < sizeof scale_names / sizeof *scale_names; i++)
    if (scale_names[i].scale == scale)
      return scale_names[i].name;
  return "unknown";
}

AntTimeScale
ant_time_scale_from_name (const char *name)
{
  for (size_t i = 0; i < sizeof scale_names / sizeof *scale_names; i++)
    if (!strcasecmp (scale_names[i].name, name))
      return scale_names[i].scale;
  return ANT_SCALE_UNKNOWN;
}

/* Seconds in the UTC day that holds the instant, and its day fraction. Negative if ERFA refuses the date. */
static double
utc_day (double jd1, double jd2, double *fraction)
{
  int year, month, day;
  double today, noon, tomorrow, unused;
  if (eraJd2cal (jd1, jd2, &year, &month, &day, fraction) != 0 || eraDat (year, month, day, 0.0, &today) < 0
      || eraDat (year, month, day, 0.5, &noon) < 0)
    return -1.0;
  if (eraJd2cal (jd1 + 1.5, jd2 - *fraction, &year, &month, &day, &unused) != 0
      || eraDat (year, month, day, 0.0, &tomorrow) < 0)
    return -1.0;
  double step = tomorrow - (2.0 * noon - today); /* the drift within the day is not a step */
  return fabs (step) > LEAP_STEP_S ? ANT_SECONDS_PER_DAY + step : ANT_SECONDS_PER_DAY;
}

/* POSIX counts 86400 s a day, so a leap second reads like the first second of the next day. `to_utc` tells the way. */
static AntStatus
posix_to_utc (double jd1, double jd2, int to_utc, double *out1, double *out2)
{
  double fraction;
  double length_s = utc_day (jd1, jd2, &fraction);
  if (length_s < 0.0)
    return ANT_BAD_ARGUMENT;
  double other = to_utc ? fraction * ANT_SECONDS_PER_DAY / length_s : fraction * length_s / ANT_SECONDS_PER_DAY;
  *out1 = jd1;
  *out2 = jd2 + (other - fraction);
  return ANT_OK;
}

/* TDB - TT, seconds, at the geocentre: there the place terms of eraDtdb vanish and its UT1 does not matter. */
static double
tdb_minus_tt_s (double jd1, double jd2)
{
  return eraDtdb (jd1, jd2, 0.0, 0.0, 0.0, 0.0);
}

static AntStatus
to_tai (AntTimeScale from, double jd1, double jd2, double *tai1, double *tai2)
{
  *tai1 = jd1;
  *tai2 = jd2;
  switch (from)
    {
    case ANT_SCALE_UNIX:
      if (posix_to_utc (jd1, jd2, 1, &jd1, &jd2) != ANT_OK)
        return ANT_BAD_ARGUMENT;
      return eraUtctai (jd1, jd2, tai1, tai2) < 0 ? ANT_BAD_ARGUMENT : ANT_OK;
    case ANT_SCALE_UTC: return eraUtctai (jd1, jd2, tai1, tai2) < 0 ? ANT_BAD_ARGUMENT : ANT_OK;
    case ANT_SCALE_TAI: return ANT_OK;
    case ANT_SCALE_GPS: *tai2 = jd2 + GPS_BEHIND_TAI_D; return ANT_OK;
    case ANT_SCALE_TT: eraTttai (jd1, jd2, tai1, tai2); return ANT_OK;
    case ANT_SCALE_TDB:
      eraTdbtt (jd1, jd2, tdb_minus_tt_s (jd1, jd2), &jd1, &jd2);
      eraTttai (jd1, jd2, tai1, tai2);
      return ANT_OK;
    case ANT_SCALE_UNKNOWN: break;
    }
  return ANT_BAD_ARGUMENT;
}

static AntStatus
from_tai (AntTimeScale to, double tai1, double tai2, double *jd1, double *jd2)
{
  double tt1, tt2;
  *jd1 = tai1;
  *jd2 = tai2;
  switch (to)
    {
    case ANT_SCALE_UNIX:
      if (eraTaiutc (tai1, tai2, &tt1, &tt2) < 0)
        return ANT_BAD_ARGUMENT;
      return posix_to_utc (tt1, tt2, 0, jd1, jd2);
    case ANT_SCALE_UTC: return eraTaiutc (tai1, tai2, jd1, jd2) < 0 ? ANT_BAD_ARGUMENT : ANT_OK;
    case ANT_SCALE_TAI: return ANT_OK;
    case ANT_SCALE_GPS: *jd2 = tai2 - GPS_BEHIND_TAI_D; return ANT_OK;
    case ANT_SCALE_TT: eraTaitt (tai1, tai2, jd1, jd2); return ANT_OK;
    case ANT_SCALE_TDB:
      eraTaitt (tai1, tai2, &tt1, &tt2);
      eraTttdb (tt1, tt2, tdb_minus_tt_s (tt1, tt2), jd1, jd2);
      return ANT_OK;
    case ANT_SCALE_UNKNOWN: break;
    }
  return ANT_BAD_ARGUMENT;
}

AntStatus
ant_time_convert (AntTimeScale from, double jd1, double jd2, AntTimeScale to, double *out1, double *out2)
{
  double tai1, tai2;
  if (from == ANT_SCALE_UNKNOWN || to == ANT_SCALE_UNKNOWN || !isfinite (jd1 + jd2))
    return ANT_BAD_ARGUMENT;
  if (from == to)
    {
      *out1 = jd1;
      *out2 = jd2;
      return ANT_OK;
    }
  AntStatus status = to_tai (from, jd1, jd2, &tai1, &tai2);
  return status == ANT_OK ? from_tai (to, tai1, tai2, out1, out2) : status;
}

/* ERFA's name of a calendar: only UTC has days of another length. */
static const char *
calendar_name (AntTimeScale scale)
{
  return scale == ANT_SCALE_UTC ? "UTC" : "TAI";
}

AntStatus
ant_time_from_calendar (AntTimeScale scale, int year, int month, int day, int hour, int minute, double second,
                        double *jd1, double *jd2)
{
  int day_over = hour == 24 && minute == 0 && second == 0.0;
  if (!isfinite (second) || second < 0.0 || year < -4700 || year > 99999)
    return ANT_BAD_ARGUMENT;
  int status = eraDtf2d (calendar_name (scale), year, month, day, day_over ? 0 : hour, minute, second, jd1, jd2);
  if (status < 0 || status >= 2) /* 1 is a year without leap-second table, 2 a second beyond the end of its minute */
    return ANT_BAD_ARGUMENT;
  if (day_over)
    *jd2 += 1.0;
  return ANT_OK;
}

AntStatus
ant_time_to_calendar (AntTimeScale scale, double jd1, double jd2, int decimals, int *year, int *month, int *day,
                      int *hour, int *minute, double *second)
{
  int hmsf[4];
  if (!isfinite (jd1 + jd2) || decimals < 0 || decimals > 9
      || eraD2dtf (calendar_name (scale), decimals, jd1, jd2, year, month, day, hmsf) < 0)
    return ANT_BAD_ARGUMENT;
  *hour = hmsf[0];
  *minute = hmsf[1];
  *second = hmsf[2] + hmsf[3] / pow (10.0, decimals);
  return ANT_OK;
}

/* JD of the midnight that begins a year, and the year's length in days. */
static AntStatus
year_start (int year, double *jd, double *length_d)
{
  double zero, mjd, next;
  if (eraCal2jd (year, 1, 1, &zero, &mjd) != 0 || eraCal2jd (year + 1, 1, 1, &zero, &next) != 0)
    return ANT_BAD_ARGUMENT;
  *jd = zero + mjd;
  *length_d = next - mjd;
  return ANT_OK;
}

AntStatus
ant_time_from_day_of_year (AntTimeScale scale, int year, double day_of_year, double *jd1, double *jd2)
{
  double start, length_d;
  if (year < -4700 || year > 99999 || year_start (year, &start, &length_d) != ANT_OK || !(day_of_year >= 1.0)
      || !(day_of_year < length_d + 1.0))
    return ANT_BAD_ARGUMENT;
  *jd1 = start + floor (day_of_year) - 1.0;
  *jd2 = day_of_year - floor (day_of_year);
  return ANT_OK;
}

AntStatus
ant_time_from_decimal_year (AntTimeScale scale, double year, double *jd1, double *jd2)
{
  double start, length_d;
  if (!(year >= -4700.0) || !(year < 100000.0) || year_start ((int) floor (year), &start, &length_d) != ANT_OK)
    return ANT_BAD_ARGUMENT;
  double elapsed_d = (year - floor (year)) * length_d;
  *jd1 = start + floor (elapsed_d);
  *jd2 = elapsed_d - floor (elapsed_d);
  return ANT_OK;
}

double
ant_time_to_decimal_year (double jd1, double jd2)
{
  int year, month, day;
  double fraction, start, length_d;
  if (!isfinite (jd1 + jd2) || eraJd2cal (jd1, jd2, &year, &month, &day, &fraction) != 0
      || year_start (year, &start, &length_d) != ANT_OK)
    return NAN;
  return year + ((jd1 - start) + jd2) / length_d;
}

AntStatus
ant_time_text (AntTimeScale scale, double jd1, double jd2, int decimals, unsigned size, char *text)
{
  int year, month, day, hour, minute;
  double second;
  if (decimals < 0 || decimals > 6 || size < 40
      || ant_time_to_calendar (scale, jd1, jd2, decimals, &year, &month, &day, &hour, &minute, &second) != ANT_OK)
    return ANT_BAD_ARGUMENT;
  int whole = (int) (second + 1e-9);
  int n = snprintf (text, size, "%04d-%02d-%02dT%02d:%02d:%02d", year, month, day, hour, minute, whole);
  if (decimals > 0)
    {
      int fraction = (int) lround ((second - whole) * pow (10.0, decimals));
      n += snprintf (text + n, size - (unsigned) n, ".%0*d", decimals, fraction);
    }
  if (scale == ANT_SCALE_UTC)
    snprintf (text + n, size - (unsigned) n, "Z");
  return ANT_OK;
}

double
ant_time_elapsed_d (AntTimeScale scale, double a1, double a2, double b1, double b2)
{
  if ((scale == ANT_SCALE_UTC || scale == ANT_SCALE_UNIX)
      && (ant_time_convert (scale, a1, a2, ANT_SCALE_TAI, &a1, &a2) != ANT_OK
          || ant_time_convert (scale, b1, b2, ANT_SCALE_TAI, &b1, &b2) != ANT_OK))
    return NAN;
  return (b1 - a1) + (b2 - a2);
}

AntStatus
ant_time_after (AntTimeScale scale, double a1, double a2, double elapsed_d, double *b1, double *b2)
{
  if (!isfinite (a1 + a2 + elapsed_d))
    return ANT_BAD_ARGUMENT;
  int stepped = scale == ANT_SCALE_UTC || scale == ANT_SCALE_UNIX;
  if (stepped && ant_time_convert (scale, a1, a2, ANT_SCALE_TAI, &a1, &a2) != ANT_OK)
    return ANT_BAD_ARGUMENT;
  double whole = floor (elapsed_d); /* whole days go to the large part: the fraction keeps its digits */
  a1 += whole;
  a2 += elapsed_d - whole;
  if (stepped)
    return ant_time_convert (ANT_SCALE_TAI, a1, a2, scale, b1, b2);
  *b1 = a1;
  *b2 = a2;
  return ANT_OK;
}
