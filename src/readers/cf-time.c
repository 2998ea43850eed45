/* cf-time.c - units and reference date taken apart, and numbers to elapsed days, one day's leap seconds looked up once. */
#include "readers/cf-time.h"

#include <gio/gio.h>
#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "data/error.h"

#define GREGORIAN_FIRST 15821015 /* YYYYMMDD: the day after 1582-10-04 in the standard calendar */
#define JULIAN_LAST 15821004
#define GREATEST_DAYS 1e7        /* 27 000 years */
#define UTC_FIRST_YEAR 1958

static const struct
{
  const char *names; /* between blanks */
  double seconds;
} units_known[] = {
  { " s sec secs second seconds ", 1.0 },
  { " min mins minute minutes ", 60.0 },
  { " h hr hrs hour hours ", 3600.0 },
  { " d day days ", 86400.0 },
  { " week weeks ", 604800.0 },
  { " ms msec msecs millisecond milliseconds ", 1e-3 },
  { " us microsecond microseconds ", 1e-6 },
  { " ns nanosecond nanoseconds ", 1e-9 },
  { " common_year common_years ", 365.0 * 86400.0 },
  { " year years yr yrs ", 365.242198781 * 86400.0 },            /* CF 4.4: the tropical year of UDUNITS */
  { " month months ", 365.242198781 * 86400.0 / 12.0 },
};

/* Seconds of the unit before " since "; 0 if it is none. *date stands at what follows. */
static double
unit_seconds (const char *units, const char **date)
{
  g_autofree char *lower = g_ascii_strdown (units, -1);
  const char *since = strstr (lower, " since ");
  if (!since)
    return 0.0;
  g_autofree char *word = g_strndup (lower, (gsize) (since - lower));
  g_strstrip (word);
  g_autofree char *framed = g_strdup_printf (" %s ", word);
  *date = units + (since - lower) + strlen (" since ");
  for (gsize i = 0; i < G_N_ELEMENTS (units_known); i++)
    if (*word && !strchr (word, ' ') && strstr (units_known[i].names, framed))
      return units_known[i].seconds;
  return 0.0;
}

gboolean
ant_cf_time_is_unit (const char *units)
{
  const char *date;
  return unit_seconds (units, &date) > 0.0;
}

/* A whole number of at most `most` digits. */
static gboolean
take_whole (const char **at, int most, int *number)
{
  int n = 0;
  *number = 0;
  for (; n < most && g_ascii_isdigit ((*at)[n]); n++)
    *number = 10 * *number + ((*at)[n] - '0');
  *at += n;
  return n > 0;
}

static void
skip_blanks (const char **at)
{
  while (**at == ' ' || **at == '\t')
    (*at)++;
}

/* H[:M[:S[.f]]] as seconds of the day; *leap if it names a second 60. */
static gboolean
take_clock (const char **at, double *second, gboolean *leap)
{
  int hour, minute = 0, whole = 0;
  double fraction = 0.0;
  if (!take_whole (at, 2, &hour))
    return FALSE;
  if (**at == ':' && (++*at, !take_whole (at, 2, &minute)))
    return FALSE;
  if (**at == ':')
    {
      ++*at;
      if (!take_whole (at, 2, &whole))
        return FALSE;
      if (**at == '.')
        {
          char *end;
          fraction = g_ascii_isdigit ((*at)[1]) ? g_ascii_strtod (*at, &end) : 0.0;
          ++*at;
          *at += strspn (*at, "0123456789");
        }
    }
  *leap = whole == 60;
  *second = 3600.0 * hour + 60.0 * minute + whole + fraction;
  return hour <= 24 && minute < 60 && whole <= 60 && (hour < 24 || *second == ANT_SECONDS_PER_DAY);
}

/* Z, H, H:M, HHMM or HMM with or without a sign, or the name of a scale. *minutes is to be taken off. */
static gboolean
take_zone (const char **at, int *minutes, AntTimeScale *scale)
{
  int number, sign = **at == '-' ? -1 : 1;
  const char *digits;
  if (g_ascii_isalpha (**at))
    {
      gsize n = strspn (*at, "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz");
      g_autofree char *name = g_strndup (*at, n);
      *scale = ant_time_scale_from_name (name);
      *at += n;
      return *scale != ANT_SCALE_UNKNOWN;
    }
  *at += **at == '+' || **at == '-';
  digits = *at;
  if (!take_whole (at, 4, &number))
    return FALSE;
  if (*at - digits > 2)
    number = number / 100 * 60 + number % 100;
  else if (**at == ':')
    {
      int minute;
      ++*at;
      if (!take_whole (at, 2, &minute))
        return FALSE;
      number = 60 * number + minute;
    }
  else
    number *= 60;
  *minutes = sign * number;
  return number <= 24 * 60;
}

/* JD of a midnight of the Julian calendar, by the usual count of months from March; NaN if there is no such day. */
static double
julian_midnight (int year, int month, int day)
{
  static const int lengths[] = { 31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31 };
  int before_march = month < 3, y = year + 4800 - before_march, m = month + 12 * before_march - 3;
  if (month < 1 || month > 12 || year < 0 || day < 1 || day > lengths[month - 1] + (month == 2 && year % 4 == 0))
    return (double) NAN;
  return day + (153 * m + 2) / 5 + 365.0 * y + y / 4 - 32083 - 0.5;
}

static double
midnight (int year, int month, int day, gboolean mixed)
{
  int date = 10000 * year + 100 * month + day;
  double jd1, jd2;
  if (mixed && date <= JULIAN_LAST)
    return julian_midnight (year, month, day);
  if (mixed && date < GREGORIAN_FIRST)
    return (double) NAN;
  return ant_time_from_calendar (ANT_SCALE_TAI, year, month, day, 0, 0, 0.0, &jd1, &jd2) == ANT_OK ? jd1 + jd2 : (double) NAN;
}

typedef struct
{
  double jd, second;
  gboolean leap;
  AntTimeScale scale; /* named behind it */
} Reference;

static gboolean
parse_reference (const char *text, gboolean mixed, Reference *reference)
{
  int year, month, day, zone_min = 0, negative;
  *reference = (Reference){ .scale = ANT_SCALE_UNKNOWN };
  skip_blanks (&text);
  negative = *text == '-';
  text += negative || *text == '+';
  if (!take_whole (&text, 5, &year) || *text++ != '-' || !take_whole (&text, 2, &month) || *text++ != '-'
      || !take_whole (&text, 2, &day))
    return FALSE;
  reference->jd = midnight (negative ? -year : year, month, day, mixed);
  if (*text == 'T' || *text == 't')
    text++;
  skip_blanks (&text);
  if (g_ascii_isdigit (*text) && !take_clock (&text, &reference->second, &reference->leap))
    return FALSE;
  skip_blanks (&text);
  if (*text && !take_zone (&text, &zone_min, &reference->scale))
    return FALSE;
  skip_blanks (&text);
  reference->second -= 60.0 * zone_min;
  return *text == 0 && isfinite (reference->jd);
}

/* The scale that calendar, leap seconds and zone amount to. FALSE for a calendar that no clock keeps. */
static gboolean
find_scale (const char *calendar, const char *units_metadata, AntTimeScale named, AntCfTime *time, GError **error)
{
  time->scale = named == ANT_SCALE_UNKNOWN ? ANT_SCALE_UTC : named;
  time->scale_assumed = named == ANT_SCALE_UNKNOWN;
  if (!g_ascii_strcasecmp (calendar, "utc") || !g_ascii_strcasecmp (calendar, "tai"))
    {
      time->counts_leaps = !g_ascii_strcasecmp (calendar, "utc");
      time->scale = time->counts_leaps ? ANT_SCALE_UTC : ANT_SCALE_TAI;
      time->scale_assumed = FALSE;
      return TRUE;
    }
  if (g_ascii_strcasecmp (calendar, "standard") && g_ascii_strcasecmp (calendar, "gregorian")
      && g_ascii_strcasecmp (calendar, "proleptic_gregorian"))
    return ant_refuse (error, _("found the calendar “%s”, expected one that clocks keep: standard, proleptic_gregorian, utc or tai"),
                   calendar);
  if (units_metadata && strstr (units_metadata, "leap_seconds: utc"))
    time->scale_assumed = FALSE;
  else if (units_metadata && strstr (units_metadata, "leap_seconds: none"))
    {
      time->scale = ANT_SCALE_UNKNOWN;
      time->scale_assumed = FALSE;
    }
  return TRUE;
}

gboolean
ant_cf_time_parse (const char *units, const char *calendar, const char *units_metadata, const char *chosen_scale,
                   AntCfTime *time, GError **error)
{
  const char *date = NULL;
  Reference reference;
  double unit_s = unit_seconds (units, &date), days, length_d;
  calendar = calendar ? calendar : "standard";
  *time = (AntCfTime){ .unit_s = unit_s };
  if (unit_s <= 0.0 || !parse_reference (date, g_ascii_strcasecmp (calendar, "standard") == 0 || g_ascii_strcasecmp (calendar, "gregorian") == 0,
                                         &reference))
    return ant_refuse (error, _("found the time unit “%s”, expected one such as “days since 2003-02-25 00:00:00”"), units);
  if (!find_scale (calendar, units_metadata, reference.scale, time, error))
    return FALSE;
  if (chosen_scale)
    {
      time->scale = ant_time_scale_from_name (chosen_scale);
      time->scale_assumed = FALSE;
      time->counts_leaps = FALSE;
      if (time->scale == ANT_SCALE_UNKNOWN && g_ascii_strcasecmp (chosen_scale, "unknown"))
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("time scale “%s”: expected UTC, TAI, TT, TDB, GPS, Unix or unknown"), chosen_scale);
          return FALSE;
        }
    }
  days = floor (reference.second / ANT_SECONDS_PER_DAY);
  time->epoch_jd = reference.jd + (reference.leap ? 0.0 : days);
  time->epoch_second = reference.second - (reference.leap ? 0.0 : days * ANT_SECONDS_PER_DAY);
  length_d = ant_time_elapsed_d (time->scale, time->epoch_jd, 0.0, time->epoch_jd + 1.0, 0.0);
  if (reference.leap && (!time->counts_leaps || time->epoch_second >= length_d * ANT_SECONDS_PER_DAY))
    return ant_refuse (error, _("found the time unit “%s”, expected no second 60 but a leap second's in the calendar utc"), units);
  if (time->counts_leaps && !(time->epoch_jd >= 2436204.5)) /* 1958-01-01 */
    return ant_refuse (error, _("found the time unit “%s” in the calendar utc, expected a date from %d on"), units, UTC_FIRST_YEAR);
  return TRUE;
}

static double
day_start (AntCfTime *time, double midnight_jd)
{
  if (!time->started)
    {
      time->started = TRUE;
      time->origin_jd = time->day_jd = midnight_jd;
      time->own_zero = ((midnight_jd - time->epoch_jd) * ANT_SECONDS_PER_DAY - time->epoch_second) / time->unit_s;
    }
  if (midnight_jd != time->day_jd)
    {
      time->day_start_d = ant_time_elapsed_d (time->scale, time->origin_jd, 0.0, midnight_jd, 0.0);
      time->day_jd = midnight_jd;
    }
  return time->day_start_d;
}

/* A number that counts days of 86400 s: its whole days are split off exactly. */
static double
read_even (AntCfTime *time, double number)
{
  double into_day_s = (number - time->day_own) * time->unit_s;
  if (time->started && into_day_s >= 0.0 && into_day_s < ANT_SECONDS_PER_DAY)
    return time->day_start_d + into_day_s / ANT_SECONDS_PER_DAY; /* still the day last met: the rest below would say the same */
  double unit_d = time->unit_s / ANT_SECONDS_PER_DAY, per_day = ANT_SECONDS_PER_DAY / time->unit_s, days, rest_s;
  if (unit_d > 1.0)
    {
      days = floor (number * unit_d);
      rest_s = (number * unit_d - days) * ANT_SECONDS_PER_DAY;
    }
  else
    {
      double rest = fmod (number, per_day);
      days = round ((number - rest) / per_day);
      rest_s = rest * time->unit_s;
    }
  double second = rest_s + time->epoch_second, more = floor (second / ANT_SECONDS_PER_DAY);
  double start_d = day_start (time, time->epoch_jd + days + more);
  time->day_own = ((days + more) * ANT_SECONDS_PER_DAY - time->epoch_second) / time->unit_s;
  return start_d + (second - more * ANT_SECONDS_PER_DAY) / ANT_SECONDS_PER_DAY;
}

/* SI seconds from the reference to the midnight, in UTC, at or before so many of them. */
static gboolean
start_counting (AntCfTime *time, double elapsed_s)
{
  double length_d = ant_time_elapsed_d (time->scale, time->epoch_jd, 0.0, time->epoch_jd + 1.0, 0.0), jd1, jd2;
  double fraction = time->epoch_second / ANT_SECONDS_PER_DAY / length_d;
  if (ant_time_after (time->scale, time->epoch_jd, fraction, elapsed_s / ANT_SECONDS_PER_DAY, &jd1, &jd2) != ANT_OK)
    return FALSE;
  time->started = TRUE;
  time->origin_jd = floor (jd1 + jd2 - 0.5) + 0.5;
  double epoch_d = ant_time_elapsed_d (time->scale, time->epoch_jd, 0.0, time->origin_jd, 0.0);
  time->origin_s = round (epoch_d * ANT_SECONDS_PER_DAY) - time->epoch_second;
  time->own_zero = time->origin_s / time->unit_s;
  return isfinite (time->origin_s);
}

double
ant_cf_time_read (AntCfTime *time, double number)
{
  if (!(fabs (number * time->unit_s) < GREATEST_DAYS * ANT_SECONDS_PER_DAY))
    return (double) NAN;
  double elapsed_d;
  if (!time->counts_leaps)
    elapsed_d = read_even (time, number);
  else if (time->started || start_counting (time, number * time->unit_s))
    elapsed_d = (number * time->unit_s - time->origin_s) / ANT_SECONDS_PER_DAY;
  else
    return (double) NAN;
  return isfinite (elapsed_d) ? elapsed_d : (double) NAN;
}

void
ant_cf_time_reference (const AntCfTime *time, AntTimeReference *reference)
{
  reference->scale = time->scale;
  reference->scale_assumed = time->scale_assumed;
  reference->style = ANT_STAMP_DAYS;
  reference->own_unit_d = time->unit_s / ANT_SECONDS_PER_DAY;
  reference->own_zero = time->own_zero;
  reference->own_skips_leaps = !time->counts_leaps;
  reference->origin_known = time->started;
  reference->origin_jd1 = time->origin_jd;
  reference->origin_jd2 = 0.0;
}
