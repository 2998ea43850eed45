/* time-reference.c - from elapsed days back to JD, UTC and the record's own way of writing. */
#include "data/time-reference.h"

#include <gio/gio.h>
#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "data/error.h"
#include "sky/places.h"
#include "sky/iso-time.h"

#define UNIX_EPOCH_JD 2440587.5
/* Numbers in this range are taken for a full JD (years 763 to 3501) where a person typed one. */
#define JD_LEAST 2.0e6
#define JD_MOST 3.0e6

void
ant_time_reference_clear (AntTimeReference *reference)
{
  g_clear_pointer (&reference->place, g_free);
  memset (reference, 0, sizeof *reference);
}

void
ant_time_reference_copy (const AntTimeReference *reference, AntTimeReference *copy)
{
  *copy = *reference;
  copy->place = g_strdup (reference->place);
}

/* The instant of an elapsed time in the record's scale; FALSE if it cannot be told. */
static gboolean
instant (const AntTimeReference *reference, double time_d, double *jd1, double *jd2)
{
  return reference->origin_known
         && ant_time_after (reference->scale, reference->origin_jd1, reference->origin_jd2, time_d, jd1, jd2) == ANT_OK;
}

static double
elapsed (const AntTimeReference *reference, double jd1, double jd2)
{
  return ant_time_elapsed_d (reference->scale, reference->origin_jd1, reference->origin_jd2, jd1, jd2);
}

double
ant_time_reference_jd (const AntTimeReference *reference, double time_d)
{
  double jd1, jd2;
  return instant (reference, time_d, &jd1, &jd2) ? jd1 + jd2 : (double) NAN;
}

/* Decimals that keep a tenth of a second or better in a unit of so many days. */
static int
decimals_for (double unit_d)
{
  return unit_d > 100.0 ? 9 : unit_d > 0.5 ? 7 : unit_d > 1.0 / 100.0 ? 6 : 3;
}

static char *
number_text (double number, int decimals)
{
  char format[16], text[G_ASCII_DTOSTR_BUF_SIZE + 32];
  g_snprintf (format, sizeof format, "%%.%df", decimals);
  return g_strdup (g_ascii_formatd (text, sizeof text, format, number));
}

/* Days of 86400 s since the origin: fewer than elapsed where the numbers leave leap seconds out. */
static double
even_days (const AntTimeReference *reference, double time_d)
{
  double jd1, jd2;
  if (!reference->own_skips_leaps || reference->scale != ANT_SCALE_UTC || !instant (reference, time_d, &jd1, &jd2)
      || ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_UNIX, &jd1, &jd2) != ANT_OK)
    return time_d;
  return (jd1 - reference->origin_jd1) + (jd2 - reference->origin_jd2);
}

/* The way back: elapsed days of so many even ones. */
static double
from_even_days (const AntTimeReference *reference, double days)
{
  double jd1, jd2, whole = floor (days);
  if (!reference->own_skips_leaps || reference->scale != ANT_SCALE_UTC || !reference->origin_known)
    return days;
  if (ant_time_convert (ANT_SCALE_UNIX, reference->origin_jd1 + whole, reference->origin_jd2 + (days - whole), ANT_SCALE_UTC,
                        &jd1, &jd2) != ANT_OK)
    return (double) NAN;
  return elapsed (reference, jd1, jd2);
}

/* The record's own number, for number styles. */
static double
own_number (const AntTimeReference *reference, double time_d)
{
  double jd1, jd2;
  if (reference->style == ANT_STAMP_DAYS)
    return reference->own_zero + even_days (reference, time_d) / reference->own_unit_d;
  if (!instant (reference, time_d, &jd1, &jd2))
    return reference->own_zero + time_d / reference->own_unit_d;
  if (reference->style == ANT_STAMP_UNIX)
    return ((jd1 - UNIX_EPOCH_JD) + jd2) * ANT_SECONDS_PER_DAY;
  if (reference->style == ANT_STAMP_DECIMAL_YEAR)
    return ant_time_to_decimal_year (jd1, jd2);
  return (jd1 - reference->own_offset) + jd2;
}

static gboolean
writes_numbers (AntStampStyle style)
{
  return style == ANT_STAMP_DAYS || style == ANT_STAMP_JD || style == ANT_STAMP_UNIX || style == ANT_STAMP_DECIMAL_YEAR;
}

static double
own_unit (const AntTimeReference *reference)
{
  switch (reference->style)
    {
    case ANT_STAMP_DAYS: return reference->own_unit_d;
    case ANT_STAMP_UNIX: return 1.0 / ANT_SECONDS_PER_DAY;
    case ANT_STAMP_DECIMAL_YEAR: return 365.25;
    default: return 1.0;
    }
}

char *
ant_time_reference_own_text (const AntTimeReference *reference, double time_d)
{
  double jd1, jd2;
  char text[40];
  if (!isfinite (time_d))
    return g_strdup ("");
  if (writes_numbers (reference->style))
    return number_text (own_number (reference, time_d), decimals_for (own_unit (reference)));
  if (!instant (reference, time_d, &jd1, &jd2) || ant_time_text (reference->scale, jd1, jd2, 3, sizeof text, text) != ANT_OK)
    return g_strdup ("");
  char *thousandths = strstr (text, ".000"); /* most records count whole seconds */
  if (thousandths)
    memmove (thousandths, thousandths + 4, strlen (thousandths + 4) + 1);
  return g_strdup (text);
}

char *
ant_time_reference_utc_text (const AntTimeReference *reference, double time_d, int decimals)
{
  double jd1, jd2;
  char text[40];
  if (!isfinite (time_d) || !instant (reference, time_d, &jd1, &jd2)
      || ant_time_convert (reference->scale, jd1, jd2, ANT_SCALE_UTC, &jd1, &jd2) != ANT_OK
      || ant_time_text (ANT_SCALE_UTC, jd1, jd2, decimals, sizeof text, text) != ANT_OK)
    return g_strdup ("");
  return g_strdup (text);
}

/* A typed number: the record's own if it writes numbers and this is not plainly a JD; else a JD. NaN if neither. */
static double
from_number (const AntTimeReference *reference, double number)
{
  double jd1, jd2;
  gboolean like_jd = number > JD_LEAST && number < JD_MOST;
  gboolean own_like_jd = reference->own_zero > JD_LEAST && reference->own_zero < JD_MOST;
  if (reference->origin_known && like_jd && (!writes_numbers (reference->style) || !own_like_jd))
    return elapsed (reference, floor (number), number - floor (number));
  switch (reference->style)
    {
    case ANT_STAMP_DAYS: return from_even_days (reference, (number - reference->own_zero) * reference->own_unit_d);
    case ANT_STAMP_JD: return elapsed (reference, floor (number) + reference->own_offset, number - floor (number));
    case ANT_STAMP_UNIX:
      return elapsed (reference, UNIX_EPOCH_JD + floor (number / ANT_SECONDS_PER_DAY),
                      number / ANT_SECONDS_PER_DAY - floor (number / ANT_SECONDS_PER_DAY));
    case ANT_STAMP_DECIMAL_YEAR:
      return ant_time_from_decimal_year (reference->scale, number, &jd1, &jd2) == ANT_OK ? elapsed (reference, jd1, jd2)
                                                                                        : (double) NAN;
    default: return NAN;
    }
}

static double
from_date (const AntTimeReference *reference, const AntIsoTime *iso)
{
  double jd1, jd2;
  if (!reference->origin_known)
    return NAN;
  /* A zone makes it UTC, which may be another scale than the record's; without one the record's clock is meant. */
  gboolean convert = iso->has_zone && reference->scale != ANT_SCALE_UNKNOWN;
  AntTimeScale scale = convert ? ANT_SCALE_UTC : reference->scale;
  if (ant_iso_instant (iso, scale, &jd1, &jd2) != ANT_OK
      || (convert && ant_time_convert (scale, jd1, jd2, reference->scale, &jd1, &jd2) != ANT_OK))
    return NAN;
  return elapsed (reference, jd1, jd2);
}

gboolean
ant_time_reference_parse (const AntTimeReference *reference, const char *text, double *time_d, GError **error)
{
  AntIsoTime iso;
  char *end;
  double value = NAN;
  if (ant_iso_read (text, text + strlen (text), &iso))
    value = from_date (reference, &iso);
  else
    {
      double number = g_ascii_strtod (text, &end);
      if (end != text && *end == 0 && isfinite (number))
        value = from_number (reference, number);
    }
  if (isfinite (value))
    {
      *time_d = value;
      return TRUE;
    }
  if (reference->origin_known)
    g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                 _("“%s” is no time of this record; expected one in its own numbers, a JD, or 2041-03-14T07:12:05Z"), text);
  else
    g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                 _("“%s” is no time of this record; expected its own numbers, since its origin is not known"), text);
  return FALSE;
}

double
ant_time_reference_tt_origin (const AntTimeReference *reference)
{
  double jd1, jd2;
  AntTimeScale scale = reference->scale == ANT_SCALE_UNKNOWN ? ANT_SCALE_UTC : reference->scale;
  if (!reference->origin_known
      || ant_time_convert (scale, reference->origin_jd1, reference->origin_jd2, ANT_SCALE_TT, &jd1, &jd2) != ANT_OK)
    return NAN;
  return (jd1 - ANT_J2000_JD) + jd2;
}
