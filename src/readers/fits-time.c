/* fits-time.c - from keywords to the form of the times. */
#include "readers/fits-time.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "readers/text-names.h"
#include "sky/iso-time.h"

#define MJD_ZERO_JD 2400000.5
#define FARTHEST_START_D 4000.0 /* numbers beyond count from elsewhere than the start of the observation */
#define MOST_FROM_START_D 2.0 /* an epoch that puts the first row farther from DATE-OBS is doubtful */

typedef struct
{
  double jd1, jd2;
  const char *keys; /* that said so */
} Epoch;

/* "s", "d", "min", ... in days; NAN for what is no unit of time (ibid., table 5). */
static double
unit_in_days (const char *unit)
{
  static const struct
  {
    const char *name;
    double days;
  } units[] = { { "s", 1.0 / 86400.0 }, { "sec", 1.0 / 86400.0 }, { "seconds", 1.0 / 86400.0 }, { "second", 1.0 / 86400.0 },
                { "ms", 1e-3 / 86400.0 }, { "min", 1.0 / 1440.0 }, { "minute", 1.0 / 1440.0 }, { "minutes", 1.0 / 1440.0 },
                { "h", 1.0 / 24.0 }, { "hr", 1.0 / 24.0 }, { "hour", 1.0 / 24.0 }, { "hours", 1.0 / 24.0 }, { "d", 1.0 },
                { "day", 1.0 }, { "days", 1.0 }, { "a", 365.25 }, { "yr", 365.25 }, { "cy", 36525.0 } };
  for (gsize i = 0; unit && i < G_N_ELEMENTS (units); i++)
    if (!g_ascii_strcasecmp (unit, units[i].name))
      return units[i].days;
  return NAN;
}

/* A pair such as MJDREFI and MJDREFF, which goes before the single MJDREF. */
static gboolean
reference_pair (AntFitsTable *table, const char *stem, double *whole, double *fraction)
{
  g_autofree char *whole_key = g_strconcat (stem, "I", NULL), *fraction_key = g_strconcat (stem, "F", NULL);
  *fraction = 0.0;
  if (ant_fits_number (table, whole_key, whole))
    {
      ant_fits_number (table, fraction_key, fraction);
      return TRUE;
    }
  return ant_fits_number (table, stem, whole);
}

/* DATE-OBS, also in the manners of before 2000, with TIME-OBS; in the scale of the times, whose days may have leap seconds. */
static gboolean
date_of (AntFitsTable *table, const char *date_key, const char *clock_key, AntTimeScale scale, double *jd1, double *jd2)
{
  AntIsoTime iso;
  g_autofree char *date = ant_fits_text (table, date_key);
  g_autofree char *clock = clock_key ? ant_fits_text (table, clock_key) : NULL;
  int day, month, year, leap;
  double second = 0.0;
  if (!date)
    return FALSE;
  if (!ant_iso_read (date, date + strlen (date), &iso))
    {
      if (sscanf (date, "%2d/%2d/%4d", &day, &month, &year) != 3)
        return FALSE;
      year += year < 100 ? 1900 : 0;
      if (ant_time_from_calendar (scale, year, month, day, 0, 0, 0.0, jd1, jd2) != ANT_OK)
        return FALSE;
      iso = (AntIsoTime){ .has_time = 0 };
    }
  else if (ant_iso_instant (&iso, scale, jd1, jd2) != ANT_OK)
    return FALSE;
  if (!iso.has_time && clock && ant_iso_read_clock (clock, clock + strlen (clock), &second, &leap))
    return ant_time_after (scale, *jd1, *jd2, second / ANT_SECONDS_PER_DAY, jd1, jd2) == ANT_OK;
  return TRUE;
}

static gboolean
start_of_observation (AntFitsTable *table, AntTimeScale scale, double *jd1, double *jd2)
{
  return date_of (table, "DATE-OBS", "TIME-OBS", scale, jd1, jd2) || date_of (table, "DATE_OBS", "TIME_OBS", scale, jd1, jd2)
         || date_of (table, "DATE-BEG", NULL, scale, jd1, jd2);
}

/* The epoch by the keywords in their order of precedence (ibid., 4.2); no offset yet. */
static gboolean
stated_epoch (AntFitsTable *table, AntTimeScale scale, Epoch *epoch)
{
  double whole, fraction;
  g_autofree char *system = ant_fits_text (table, "TIMESYS");
  if (system && !g_ascii_strcasecmp (system, "MJD") && ant_fits_number (table, "TIMEZERO", &whole))
    *epoch = (Epoch){ MJD_ZERO_JD, whole, "TIMESYS = 'MJD', TIMEZERO" };
  else if (reference_pair (table, "MJDREF", &whole, &fraction))
    *epoch = (Epoch){ MJD_ZERO_JD + whole, fraction, "MJDREF" };
  else if (reference_pair (table, "JDREF", &whole, &fraction))
    *epoch = (Epoch){ whole, fraction, "JDREF" };
  else if (reference_pair (table, "BJDREF", &whole, &fraction))
    *epoch = (Epoch){ whole, fraction, "BJDREF" };
  else if (date_of (table, "DATEREF", NULL, scale, &epoch->jd1, &epoch->jd2))
    epoch->keys = "DATEREF";
  else
    return FALSE;
  return TRUE;
}

static gboolean
names_time (const AntTableColumn *column)
{
  return ant_table_column_has_word (column, ant_time_words);
}

void
ant_fits_time_prepare (AntFitsTable *table)
{
  Epoch epoch;
  g_autofree char *general = ant_fits_text (table, "TIMEUNIT");
  table->layout->has_epoch = stated_epoch (table, ANT_SCALE_TAI, &epoch);
  for (guint c = 0; c < table->layout->n_columns; c++)
    {
      AntTableColumn *column = &table->layout->columns[c];
      char *own = ant_fits_column_text (table, "TCUNI", c);
      if (!own && !column->unit && general && names_time (column))
        own = g_strdup (general);
      if (own)
        {
          g_free (column->unit);
          column->unit = own;
        }
      if (column->unit && names_time (column)) /* "BJD - 2454833, days" */
        g_ptr_array_add (table->layout->header, g_strdup (column->unit));
    }
}

const char *
ant_fits_time_scale (AntFitsTable *table, AntRecord *record)
{
  g_autofree char *system = ant_fits_text (table, "TIMESYS");
  if (!system || !g_ascii_strcasecmp (system, "MJD") || !g_ascii_strcasecmp (system, "JD"))
    {
      ant_record_say (record, system ? _("TIMESYS is %s, which is no time scale; UTC, the standard's own, is assumed.")
                                     : _("The header has no TIMESYS%s; UTC, as the FITS standard has it, is assumed."),
                      system ? system : "");
      record->time.scale_assumed = TRUE;
      return "UTC";
    }
  AntTimeScale scale = ant_time_scale_from_name (system);
  if (scale == ANT_SCALE_UNKNOWN)
    ant_record_say (record, _("TIMESYS is %s, which is not converted here: the time scale counts as unknown."), system);
  return ant_time_scale_name (scale);
}

/* The column's own scale, where it names one. */
static void
own_scale (AntFitsTable *table, guint column, AntRecord *record, AntTimeForm *form)
{
  g_autofree char *name = ant_fits_column_text (table, "TCTYP", column);
  AntTimeScale scale = name ? ant_time_scale_from_name (name) : ANT_SCALE_UNKNOWN;
  if (scale == ANT_SCALE_UNKNOWN)
    return;
  form->scale = scale;
  record->time.scale_assumed = FALSE;
  ant_record_say (record, _("TCTYP puts the time of this column in %s."), ant_time_scale_name (scale));
}

static void
set_place (AntFitsTable *table, guint column, AntRecord *record)
{
  static const struct
  {
    const char *start, *place;
  } places[] = { { "TOPO", "observer" }, { "GEO", "geocentre" }, { "BARY", "barycentre" }, { "HELIO", "heliocentre" },
                 { "SOLARSYS", "barycentre" } };
  g_autofree char *position = ant_fits_column_text (table, "TRPOS", column);
  if (!position)
    position = ant_fits_text (table, "TREFPOS");
  if (!position)
    position = ant_fits_text (table, "TIMEREF"); /* before the standard */
  for (gsize i = 0; position && i < G_N_ELEMENTS (places); i++)
    if (!g_ascii_strncasecmp (position, places[i].start, strlen (places[i].start)))
      {
        g_free (record->time.place);
        record->time.place = g_strdup (places[i].place);
        ant_record_say (record, _("The header puts the clock at the %s (%s)."), places[i].place, position);
      }
}

/* What a stamp marks of its exposure, and how long that is. */
static void
set_exposure (AntFitsTable *table, double general_unit_d, AntRecord *record)
{
  double place, length;
  if (ant_fits_number (table, "TIMEPIXR", &place) && (place == 0.0 || place == 0.5 || place == 1.0))
    {
      record->stamp = place == 0.0 ? ANT_AT_START : place == 0.5 ? ANT_AT_MIDDLE : ANT_AT_END;
      ant_record_say (record, _("TIMEPIXR = %g: stamps mark the %s of each exposure."), place,
                      place == 0.0 ? _("start") : place == 0.5 ? _("middle") : _("end"));
    }
  if (ant_fits_number (table, "TIMEDEL", &length) && length > 0.0 && length * general_unit_d < 1e4)
    {
      record->exposure_d = length * general_unit_d;
      record->exposure_known = TRUE;
      ant_record_say (record, _("TIMEDEL, %g s, is taken as the exposure of a sample."), record->exposure_d * ANT_SECONDS_PER_DAY);
    }
}

/* No word of an epoch: the start of the observation, if that is stated. */
static gboolean
epoch_of_start (AntFitsTable *table, const AntTimeForm *form, AntRecord *record, Epoch *epoch)
{
  double first_d = table->layout->columns[form->columns[0]].least * form->unit_d;
  if (!(fabs (first_d) < FARTHEST_START_D) || !start_of_observation (table, form->scale, &epoch->jd1, &epoch->jd2))
    return FALSE;
  epoch->keys = "DATE-OBS";
  ant_record_say (record, _("The header names no epoch; the times are assumed to count from DATE-OBS."));
  return TRUE;
}

/* An epoch far from where DATE-OBS puts the first row is told. */
static void
doubt_epoch (AntFitsTable *table, const AntTimeForm *form, const Epoch *epoch, AntRecord *record)
{
  double start1, start2, first = table->layout->columns[form->columns[0]].least;
  if (!start_of_observation (table, form->scale, &start1, &start2) || isnan (first))
    return;
  double off_d = (epoch->jd1 - start1) + (epoch->jd2 - start2) + first * form->unit_d;
  if (fabs (off_d) > MOST_FROM_START_D)
    ant_record_say (record, _("By %s the first row is %.1f d from DATE-OBS; check the epoch."), epoch->keys, off_d);
}

static void
set_epoch (AntFitsTable *table, const Epoch *stated, double general_unit_d, AntRecord *record, AntTimeForm *form)
{
  double offset = 0.0, zero = 0.0;
  Epoch epoch = *stated;
  gboolean is_mjd = g_str_has_prefix (epoch.keys, "TIMESYS"), is_start = !strcmp (epoch.keys, "DATE-OBS");
  if (!is_start && ant_fits_number (table, "TIMEOFFS", &offset) && offset != 0.0)
    {
      epoch.jd2 += offset * general_unit_d;
      ant_record_say (record, _("TIMEOFFS moves all times by %g s."), offset * general_unit_d * ANT_SECONDS_PER_DAY);
    }
  if (!is_start && !is_mjd && ant_fits_number (table, "TIMEZERO", &zero) && zero != 0.0)
    {
      epoch.jd2 += zero * form->unit_d;
      ant_record_say (record, _("TIMEZERO moves all times by %g s."), zero * form->unit_d * ANT_SECONDS_PER_DAY);
    }
  doubt_epoch (table, form, &epoch, record);
  if (!strcmp (epoch.keys, "BJDREF") && !record->time.place)
    record->time.place = g_strdup ("barycentre");
  if (form->unit_d == 1.0 && (form->scale == ANT_SCALE_UTC || epoch.jd2 == 0.0))
    {
      /* Days of a calendar, not of 86400 s each: a JD with its own zero. */
      form->style = ANT_STAMP_JD;
      form->offset = epoch.jd1;
      form->offset_rest = epoch.jd2;
      return;
    }
  form->epoch_known = TRUE;
  form->epoch_jd1 = epoch.jd1;
  form->epoch_jd2 = epoch.jd2;
}

/* A cell of two numbers is one time, kept in two parts. */
static void
join_parts (const AntFitsTable *table, AntTimeForm *form)
{
  guint c = form->columns[0];
  if (form->n_parts != 1 || form->parts[0] != ANT_PART_NUMBER || table->series[c].per_sample != 2 || table->series[c].element != 0
      || c + 1 >= table->layout->n_columns || table->series[c + 1].column != table->series[c].column)
    return;
  form->parts[1] = ANT_PART_FRACTION;
  form->columns[1] = c + 1;
  form->n_parts = 2;
}

void
ant_fits_time_apply (AntFitsTable *table, const AntReadingChoices *choices, AntRecord *record, AntTimeForm *form)
{
  Epoch epoch;
  guint column = form->columns[0];
  g_autofree char *general = ant_fits_text (table, "TIMEUNIT");
  double general_unit_d = general ? unit_in_days (general) : (double) NAN, unit_d = unit_in_days (table->layout->columns[column].unit);
  gboolean stated;
  if (isnan (general_unit_d))
    general_unit_d = 1.0 / ANT_SECONDS_PER_DAY; /* the standard's default */
  if (!choices || !choices->time_scale)
    own_scale (table, column, record, form);
  stated = stated_epoch (table, form->scale, &epoch);
  set_place (table, column, record);
  set_exposure (table, general_unit_d, record);
  if (choices && (choices->time_format || choices->epoch))
    return;
  if (form->style == ANT_STAMP_DAYS)
    {
      form->unit_d = !isnan (unit_d) ? unit_d : stated ? general_unit_d : form->unit_d;
      if (stated || epoch_of_start (table, form, record, &epoch))
        set_epoch (table, &epoch, general_unit_d, record, form);
    }
  join_parts (table, form);
}
