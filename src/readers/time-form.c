/* time-form.c - dates and clocks of a row to elapsed days, one day's leap seconds looked up once. */
#include "readers/time-form.h"

#include <math.h>

#include "core/units.h"
#include "sky/iso-time.h"

#define UNIX_EPOCH_JD 2440587.5
#define GREATEST_JD 3.9e7 /* year 100 000 */
#define GREATEST_DAYS 1e9

/* Bring a JD's day into the cache; FALSE if the calendar refuses it. */
static gboolean
enter_day (AntTimeForm *form, double midnight_jd)
{
  if (midnight_jd == form->day_jd)
    return TRUE;
  if (!(midnight_jd > 0.0 && midnight_jd < GREATEST_JD))
    return FALSE;
  double origin_jd = form->started ? form->origin_jd : midnight_jd;
  double start_d = ant_time_elapsed_d (form->scale, origin_jd, 0.0, midnight_jd, 0.0);
  double end_d = ant_time_elapsed_d (form->scale, origin_jd, 0.0, midnight_jd + 1.0, 0.0);
  if (!isfinite (start_d) || !isfinite (end_d))
    return FALSE;
  form->origin_jd = origin_jd;
  form->started = TRUE;
  form->day_jd = midnight_jd;
  form->day_own = midnight_jd - form->offset;
  form->day_start_d = start_d;
  form->day_length_d = end_d - start_d;
  return TRUE;
}

/* A midnight and the part of its day: for quasi-JD the day is as long as it is, for POSIX always 86400 s. */
static double
at_fraction (AntTimeForm *form, double midnight_jd, double fraction)
{
  if (!enter_day (form, midnight_jd))
    return (double) NAN;
  return form->day_start_d + fraction * (form->scale == ANT_SCALE_UNIX ? 1.0 : form->day_length_d);
}

/* Hours beyond the day, by 24:00 or by a zone, belong to its neighbour. */
static double
at_second (AntTimeForm *form, double midnight_jd, double second, gboolean leap)
{
  double days = leap ? 0.0 : floor (second / ANT_SECONDS_PER_DAY);
  midnight_jd += days;
  second -= days * ANT_SECONDS_PER_DAY;
  if (!enter_day (form, midnight_jd))
    return (double) NAN;
  /* Second 60 is the last of a day that has one. */
  if (leap && (second < ANT_SECONDS_PER_DAY || second >= form->day_length_d * ANT_SECONDS_PER_DAY - 1e-6))
    return (double) NAN;
  return form->day_start_d + second / ANT_SECONDS_PER_DAY;
}

guint
ant_time_form_date_parts (const AntTimeForm *form)
{
  if (form->has_date)
    return 0;
  if (form->parts[0] != ANT_PART_YEAR)
    return 1;
  return form->n_parts > 1 && form->parts[1] == ANT_PART_MONTH ? 3 : 2;
}

static double
calendar_midnight (int year, int month, int day)
{
  double jd1, jd2;
  return ant_time_from_calendar (ANT_SCALE_TAI, year, month, day, 0, 0, 0.0, &jd1, &jd2) == ANT_OK ? jd1 + jd2 : (double) NAN;
}

/* A number and the rest of it. Whole days and fractions are split before the offset is added: an MJD keeps all its digits. */
static double
read_jd (AntTimeForm *form, double number, double rest)
{
  double into_day = number - form->day_own + rest;
  if (form->started && into_day >= 0.0 && into_day < 1.0)
    return form->day_start_d + into_day * form->day_length_d; /* still the day last met: what follows would say the same */
  if (!isfinite (into_day))
    return (double) NAN;
  double shifted = form->offset + 0.5, shift = shifted - floor (shifted);
  double whole = floor (number + shift), fraction = number - whole + shift + rest;
  double carry = floor (fraction);
  return at_fraction (form, whole + carry + floor (shifted) - 0.5, fraction - carry);
}

static double
read_number (AntTimeForm *form, double number, double rest)
{
  double whole;
  switch (form->style)
    {
    case ANT_STAMP_JD: return read_jd (form, number, rest + form->offset_rest - form->zone_min / ANT_MINUTES_PER_DAY);
    case ANT_STAMP_UNIX:
      if (!isfinite (number))
        return (double) NAN;
      whole = floor (number / ANT_SECONDS_PER_DAY);
      return at_fraction (form, UNIX_EPOCH_JD + whole, (number - whole * ANT_SECONDS_PER_DAY + rest) / ANT_SECONDS_PER_DAY);
    default:
      if (!(fabs (number * form->unit_d) <= GREATEST_DAYS) || !isfinite (rest))
        return (double) NAN;
      if (!form->started)
        {
          form->started = TRUE;
          form->own_zero = round (floor (number * form->unit_d) / form->unit_d);
        }
      return (number - form->own_zero) * form->unit_d + rest * form->unit_d;
    }
}

static gboolean
read_iso (const AntCell *cell, int zone_min, double *midnight_jd, double *second, gboolean *leap)
{
  AntIsoTime iso;
  if (!ant_iso_read (cell->start, cell->end, &iso))
    return FALSE;
  *midnight_jd = calendar_midnight (iso.year, iso.month, iso.day);
  *second = iso.second - 60.0 * (iso.has_zone ? iso.zone_min : zone_min);
  *leap = iso.leap;
  return isfinite (*midnight_jd);
}

static gboolean
read_year_month_day (const AntCell *const *cells, double *midnight_jd, double *second)
{
  double year = cells[0]->number, month = cells[1]->number, day = floor (cells[2]->number);
  if (!(year > -4700.0 && year < 1e5) || year != floor (year) || !(month >= 1.0 && month <= 12.0) || month != floor (month)
      || !(day >= 1.0 && day <= 31.0))
    return FALSE;
  *midnight_jd = calendar_midnight ((int) year, (int) month, (int) day);
  *second = (cells[2]->number - day) * ANT_SECONDS_PER_DAY;
  return isfinite (*midnight_jd);
}

static gboolean
read_date (AntTimeForm *form, const AntCell *const *cells, double *midnight_jd, double *second, gboolean *leap)
{
  double number = cells[0]->number, whole = floor (number), jd2;
  int date;
  if (form->has_date)
    {
      *midnight_jd = form->date_jd;
      return TRUE;
    }
  switch (form->parts[0])
    {
    case ANT_PART_ISO: return read_iso (cells[0], form->zone_min, midnight_jd, second, leap);
    case ANT_PART_YMD:
      if (!(number > 0.0 && number < 1e8))
        return FALSE;
      date = (int) whole;
      *midnight_jd = calendar_midnight (date / 10000, date / 100 % 100, date % 100);
      *second = (number - whole) * ANT_SECONDS_PER_DAY;
      return isfinite (*midnight_jd);
    case ANT_PART_YEAR:
      if (ant_time_form_date_parts (form) == 3)
        return read_year_month_day (cells, midnight_jd, second);
      if (form->n_parts < 2 || !(number > -4700.0 && number < 1e5) || number != whole)
        return FALSE;
      if (ant_time_from_day_of_year (ANT_SCALE_TAI, (int) number, cells[1]->number, midnight_jd, &jd2) != ANT_OK)
        return FALSE;
      *second = jd2 * ANT_SECONDS_PER_DAY;
      return TRUE;
    default: return FALSE;
    }
}

/* Seconds that a further cell adds; NaN if it cannot be read. */
static double
read_clock_part (AntTimePart part, const AntCell *cell, gboolean *leap)
{
  double number = cell->number, second;
  double hours = floor (number / 10000.0), minutes = floor (number / 100.0) - 100.0 * hours;
  int has_leap;
  switch (part)
    {
    case ANT_PART_CLOCK:
      if (!ant_iso_read_clock (cell->start, cell->end, &second, &has_leap))
        return (double) NAN;
      *leap = has_leap;
      return second;
    case ANT_PART_HHMMSS:
      second = number - 10000.0 * hours - 100.0 * minutes;
      *leap = second >= 60.0;
      return number >= 0.0 && number <= 240000.0 && minutes < 60.0 && second < 61.0 ? 3600.0 * hours + 60.0 * minutes + second
                                                                                  : (double) NAN;
    case ANT_PART_HHMM:
      hours = floor (number / 100.0);
      minutes = number - 100.0 * hours;
      return number >= 0.0 && number <= 2400.0 && minutes < 60.0 ? 3600.0 * hours + 60.0 * minutes : (double) NAN;
    case ANT_PART_HOUR: return number >= 0.0 && number <= 24.0 ? 3600.0 * number : (double) NAN;
    case ANT_PART_MINUTE: return number >= 0.0 && number <= 1440.0 ? 60.0 * number : (double) NAN;
    case ANT_PART_SECOND: return number >= 0.0 && number <= 86401.0 ? number : (double) NAN;
    default: return (double) NAN;
    }
}

double
ant_time_form_read (AntTimeForm *form, const AntCell *const *cells)
{
  double midnight_jd = (double) NAN, second = 0.0, jd2;
  gboolean leap = FALSE;
  if (form->parts[0] == ANT_PART_NUMBER)
    return read_number (form, cells[0]->number, form->n_parts > 1 && form->parts[1] == ANT_PART_FRACTION ? cells[1]->number : 0.0);
  if (form->parts[0] == ANT_PART_DECIMAL_YEAR)
    {
      if (ant_time_from_decimal_year (ANT_SCALE_TAI, cells[0]->number, &midnight_jd, &jd2) != ANT_OK)
        return (double) NAN;
      return at_fraction (form, midnight_jd, jd2);
    }
  if (!read_date (form, cells, &midnight_jd, &second, &leap))
    return (double) NAN;
  if (form->parts[0] != ANT_PART_ISO || form->has_date)
    second -= 60.0 * form->zone_min;
  for (guint i = ant_time_form_date_parts (form); i < form->n_parts; i++)
    second += read_clock_part (form->parts[i], cells[i], &leap);
  return at_second (form, midnight_jd, second, leap);
}

void
ant_time_form_reference (const AntTimeForm *form, AntTimeReference *reference)
{
  reference->scale = form->scale;
  reference->style = form->style;
  reference->own_offset = form->offset + form->offset_rest;
  reference->own_unit_d = form->style == ANT_STAMP_UNIX ? 1.0 / ANT_SECONDS_PER_DAY : form->unit_d;
  reference->own_zero = form->own_zero;
  reference->origin_known = form->style != ANT_STAMP_DAYS;
  if (form->style == ANT_STAMP_DAYS && form->epoch_known)
    reference->origin_known = ant_time_after (form->scale, form->epoch_jd1, form->epoch_jd2, form->own_zero * form->unit_d,
                                              &reference->origin_jd1, &reference->origin_jd2) == ANT_OK;
  if (form->style == ANT_STAMP_DAYS)
    return;
  reference->origin_jd1 = form->origin_jd;
  reference->origin_jd2 = 0.0;
  if (form->style == ANT_STAMP_JD)
    reference->own_zero = form->origin_jd - reference->own_offset;
  else if (form->style == ANT_STAMP_UNIX)
    reference->own_zero = (form->origin_jd - UNIX_EPOCH_JD) * ANT_SECONDS_PER_DAY;
  else if (form->style == ANT_STAMP_DECIMAL_YEAR)
    reference->own_zero = ant_time_to_decimal_year (form->origin_jd, 0.0);
}
