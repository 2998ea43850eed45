/* iso-time.c - a small hand-written reader of ISO 8601 times. */
#include "sky/iso-time.h"
#include "core/units.h"

#include <string.h>
#include <strings.h>

static int
is_digit (char c)
{
  return c >= '0' && c <= '9';
}

/* Exactly n digits. -1 if they are not there. */
static int
digits (const char **at, const char *end, int n)
{
  int value = 0;
  if (end - *at < n)
    return -1;
  for (int i = 0; i < n; i++)
    {
      if (!is_digit ((*at)[i]))
        return -1;
      value = 10 * value + ((*at)[i] - '0');
    }
  *at += n;
  return value;
}

static int
count_digits (const char *at, const char *end)
{
  int n = 0;
  while (at + n < end && n < 32 && is_digit (at[n]))
    n++;
  return n;
}

static int
month_length (int year, int month)
{
  static const int days[] = { 31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31 };
  int leap = year % 4 == 0 && (year % 100 != 0 || year % 400 == 0);
  return days[month - 1] + (month == 2 && leap);
}

static int
set_day_of_year (AntIsoTime *time, int day_of_year)
{
  for (time->month = 1; time->month <= 12; time->month++)
    {
      int length = month_length (time->year, time->month);
      if (day_of_year <= length)
        {
          time->day = day_of_year;
          return day_of_year >= 1;
        }
      day_of_year -= length;
    }
  return 0;
}

static int
read_date (const char **at, const char *end, AntIsoTime *time)
{
  int n = count_digits (*at, end);
  if ((n != 4 && n != 8) || (time->year = digits (at, end, 4)) < 0)
    return 0;
  char separator = n == 8 ? 0 : *at < end ? *(*at)++ : 'x';
  if (n == 4 && separator != '-' && separator != '/')
    return 0;
  n = count_digits (*at, end);
  if (separator == '-' && n == 3)
    return set_day_of_year (time, digits (at, end, 3));
  if (separator ? n != 2 : n != 4)
    return 0;
  time->month = digits (at, end, 2);
  if (separator && (*at >= end || *(*at)++ != separator))
    return 0;
  time->day = digits (at, end, 2);
  return time->month >= 1 && time->month <= 12 && time->day >= 1 && time->day <= month_length (time->year, time->month)
         && (*at >= end || !is_digit (**at));
}

/* Fraction digits after a dot or comma; as many as wanted, the first 17 count. */
static double
read_fraction (const char **at, const char *end)
{
  double value = 0.0, scale = 1.0;
  if (*at >= end || (**at != '.' && **at != ','))
    return 0.0;
  (*at)++;
  for (int i = 0; *at < end && is_digit (**at); i++, (*at)++)
    if (i < 15)
      {
        value = 10.0 * value + (**at - '0');
        scale *= 10.0;
      }
  return value / scale;
}

static int
read_clock (const char **at, const char *end, double *second, int *leap)
{
  int basic = count_digits (*at, end), minute = 0, whole = 0;
  int hour = digits (at, end, 2);
  double fraction = 0.0;
  if (hour < 0 || (basic != 2 && basic != 4 && basic != 6))
    return 0;
  if (basic > 2 || (*at < end && **at == ':'))
    {
      *at += basic == 2;
      minute = digits (at, end, 2);
      int seconds_follow = basic == 2 ? *at < end && **at == ':' : basic == 6;
      if (seconds_follow)
        {
          *at += basic == 2;
          whole = digits (at, end, 2);
          fraction = read_fraction (at, end);
        }
    }
  if (minute < 0 || minute > 59 || whole < 0 || whole > 60 || hour > 24 || (*at < end && is_digit (**at))
      || (hour == 24 && (minute > 0 || whole > 0 || fraction > 0.0)) )
    return 0;
  *leap = whole == 60;
  *second = hour * 3600 + minute * 60 + whole + fraction;
  return 1;
}

static int
read_zone (const char **at, const char *end, AntIsoTime *time)
{
  while (*at < end && **at == ' ')
    (*at)++;
  if (*at >= end)
    return 1;
  time->has_zone = 1;
  if (**at == 'Z' || **at == 'z')
    {
      (*at)++;
      return 1;
    }
  if (end - *at >= 3 && !strncasecmp (*at, "UTC", 3))
    {
      *at += 3;
      return 1;
    }
  int sign = **at == '+' ? 1 : **at == '-' ? -1 : 0;
  (*at)++;
  int hour = sign ? digits (at, end, 2) : -1, minute = 0;
  if (hour < 0 || hour > 24)
    return 0;
  if (*at < end && **at == ':')
    (*at)++;
  if (*at < end && (minute = digits (at, end, 2)) < 0)
    return 0;
  time->zone_min = sign * (60 * hour + minute);
  return minute < 60;
}

static void
trim (const char **text, const char **end)
{
  while (*text < *end && ((*text)[0] == ' ' || (*text)[0] == '\t'))
    (*text)++;
  while (*text < *end && ((*end)[-1] == ' ' || (*end)[-1] == '\t'))
    (*end)--;
}

int
ant_iso_read (const char *text, const char *end, AntIsoTime *time)
{
  trim (&text, &end);
  memset (time, 0, sizeof *time);
  if (!read_date (&text, end, time))
    return 0;
  if (text == end)
    return 1;
  if (!strchr ("Tt_ \t", *text) || *text == 0)
    return 0;
  for (text++; text < end && *text == ' ';)
    text++;
  time->has_time = 1;
  return read_clock (&text, end, &time->second, &time->leap) && read_zone (&text, end, time) && text == end;
}

int
ant_iso_read_clock (const char *text, const char *end, double *second, int *leap)
{
  trim (&text, &end);
  return read_clock (&text, end, second, leap) && text == end;
}

AntStatus
ant_iso_instant (const AntIsoTime *time, AntTimeScale scale, double *jd1, double *jd2)
{
  double of_minute = time->leap ? 60.0 + (time->second - (int) time->second) : time->second - 60 * (int) (time->second / 60.0);
  int minutes = (int) ((time->second - of_minute + 0.5) / 60.0);
  AntStatus status = ant_time_from_calendar (scale, time->year, time->month, time->day, minutes / 60, minutes % 60, of_minute,
                                             jd1, jd2);
  if (status != ANT_OK || time->zone_min == 0)
    return status;
  return ant_time_after (scale, *jd1, *jd2, -time->zone_min / ANT_MINUTES_PER_DAY, jd1, jd2);
}
