/* time-header.c - the clock's particulars out of names and prose. */
#include "readers/time-header.h"

#include <glib/gi18n.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "data/error.h"
#include "sky/iso-time.h"

/* "JD - 2454833.0" in a text; the sign may stand in blanks, the words before JD do not matter. */
static gboolean
offset_in (const char *text, double *offset)
{
  for (const char *at = text; (at = strcasestr (at, "JD"));)
    {
      at += 2;
      const char *number = at;
      while (*number == ' ' || *number == '_' || *number == '(' || *number == ')')
        number++;
      if (*number != '-')
        continue;
      for (number++; *number == ' ';)
        number++;
      char *end;
      double value = g_ascii_strtod (number, &end);
      if (end != number && value >= 2.0e6 && value < 3.0e6)
        {
          *offset = value;
          return TRUE;
        }
    }
  return FALSE;
}

gboolean
ant_time_header_jd_offset (const AntTableLayout *layout, const AntTableColumn *column, double *offset)
{
  if (offset_in (column->name, offset))
    return TRUE;
  for (guint i = 0; i < layout->header->len; i++)
    if (offset_in (g_ptr_array_index (layout->header, i), offset))
      return TRUE;
  return FALSE;
}

static AntTimeScale
scale_in_name (const AntTableColumn *column)
{
  static const char *const words[] = { "utc", "tai", "tt", "tdb", "gps", "tdt", "gmt", "ut", NULL };
  for (gsize i = 0; words[i]; i++)
    {
      const char *const one[] = { words[i], NULL };
      if (ant_table_column_has_word (column, one))
        return strcmp (words[i], "ut") ? ant_time_scale_from_name (words[i]) : ANT_SCALE_UTC;
    }
  return ANT_SCALE_UNKNOWN;
}

/* "Time scale: TT" in a header line. */
static AntTimeScale
scale_in_header (const AntTableLayout *layout)
{
  static const char *const keys[] = { "time scale", "timescale", "time system", "timesys" };
  for (guint i = 0; i < layout->header->len; i++)
    for (gsize k = 0; k < G_N_ELEMENTS (keys); k++)
      {
        const char *found = strcasestr (g_ptr_array_index (layout->header, i), keys[k]);
        if (!found)
          continue;
        found += strlen (keys[k]);
        found += strspn (found, " :='\"");
        g_autofree char *word = g_strndup (found, strspn (found, "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz"));
        AntTimeScale scale = ant_time_scale_from_name (word);
        if (scale != ANT_SCALE_UNKNOWN)
          return scale;
      }
  return ANT_SCALE_UNKNOWN;
}

static gboolean
is_local (const AntTableLayout *layout, const AntTimeForm *form)
{
  static const char *const local_words[] = { "mst", "est", "pst", "cst", "cet", "local", "lst", "lt", NULL };
  for (guint i = 0; i < form->n_parts; i++)
    if (ant_table_column_has_word (&layout->columns[form->columns[i]], local_words))
      return TRUE;
  return FALSE;
}

static void
set_place (const AntTableColumn *column, AntRecord *record)
{
  static const char *const bary[] = { "bjd", "bkjd", "btjd", "barycentric", NULL };
  static const char *const helio[] = { "hjd", "heliocentric", NULL };
  const char *place = ant_table_column_has_word (column, bary)    ? "barycentre"
                      : ant_table_column_has_word (column, helio) ? "heliocentre"
                                                                 : NULL;
  if (!place)
    return;
  record->time.place = g_strdup (place);
  ant_record_say (record, _("The name %s puts the clock at the %s."), column->label, place);
}

static gboolean
is_calendar (AntStampStyle style)
{
  return style == ANT_STAMP_ISO || style == ANT_STAMP_YMD || style == ANT_STAMP_YEAR_DAY;
}

/* No word about the scale: calendars are kept in UTC, bare counts of days in none that could be told. */
static void
assume_scale (const AntTableLayout *layout, AntRecord *record, AntTimeForm *form)
{
  const char *label = layout->columns[form->columns[0]].label;
  if (is_local (layout, form))
    ant_record_say (record, _("The clock is a local one: its time scale counts as unknown, nothing is converted; --time-zone takes "
                              "it to UTC."));
  else if (is_calendar (form->style))
    {
      form->scale = ANT_SCALE_UTC;
      record->time.scale_assumed = TRUE;
      ant_record_say (record, _("The file does not name the time scale of %s; UTC is assumed."), label);
    }
  else
    ant_record_say (record, _("The file does not name the time scale of %s; it counts as unknown, nothing is converted."), label);
}

/* "+07:00", "-7", "UTC-0730", "Z": minutes ahead of UTC. */
static gboolean
parse_zone (const char *text, int *minutes)
{
  const char *at = text;
  if (!g_ascii_strncasecmp (at, "UTC", 3) || !g_ascii_strncasecmp (at, "GMT", 3))
    at += 3;
  if (*at == 0 || !g_ascii_strcasecmp (at, "Z"))
    {
      *minutes = 0;
      return at > text || *at;
    }
  if (*at != '+' && *at != '-')
    return FALSE;
  char *end;
  gint64 hours = g_ascii_strtoll (at + 1, &end, 10), minute = 0;
  if (end - at == 4 || end - at == 5)
    {
      minute = hours % 100;
      hours /= 100;
    }
  else if (*end == ':')
    minute = g_ascii_strtoll (end + 1, &end, 10);
  *minutes = (int) ((*at == '-' ? -1 : 1) * (60 * hours + minute));
  return g_ascii_isdigit (at[1]) && *end == 0 && hours >= 0 && hours <= 15 && minute >= 0 && minute < 60;
}

static gboolean
set_zone (const char *zone, AntRecord *record, AntTimeForm *form, GError **error)
{
  if (!is_calendar (form->style) && form->style != ANT_STAMP_JD)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: a time zone was given, but the times are no dates"), record->path);
      return FALSE;
    }
  if (!parse_zone (zone, &form->zone_min))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("“%s” is no time zone; expected hours ahead of UTC such as +01:00 or -7"), zone);
      return FALSE;
    }
  form->scale = ANT_SCALE_UTC;
  ant_record_say (record, _("The clock is taken as UTC%+03d:%02d; times are given in UTC."), form->zone_min / 60, abs (form->zone_min) % 60);
  return TRUE;
}

gboolean
ant_time_header_origin (const AntReadingChoices *choices, const AntRecord *record, AntTimeForm *form, GError **error)
{
  AntIsoTime iso;
  char *end;
  if (!choices || !choices->epoch)
    return TRUE;
  if (form->style != ANT_STAMP_DAYS)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: an epoch was given, but the times have an origin of their own"), record->path);
      return FALSE;
    }
  form->epoch_known = TRUE;
  double jd = g_ascii_strtod (choices->epoch, &end);
  form->epoch_jd1 = floor (jd);
  form->epoch_jd2 = jd - floor (jd);
  if (ant_iso_read (choices->epoch, choices->epoch + strlen (choices->epoch), &iso)
          ? ant_iso_instant (&iso, form->scale, &form->epoch_jd1, &form->epoch_jd2) == ANT_OK
          : *end == 0 && jd > 0.0 && jd < 1e7)
    return TRUE;
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("“%s” is no epoch; expected a time such as 2000-01-01T12:00:00, or a JD"), choices->epoch);
  return FALSE;
}

gboolean
ant_time_header_scale (const AntTableLayout *layout, const AntReadingChoices *choices, AntRecord *record, AntTimeForm *form,
                       GError **error)
{
  const char *chosen = choices ? choices->time_scale : NULL;
  form->scale = ANT_SCALE_UNKNOWN;
  set_place (&layout->columns[form->columns[0]], record);
  if (choices && choices->time_zone)
    return set_zone (choices->time_zone, record, form, error);
  if (chosen)
    {
      form->scale = ant_time_scale_from_name (chosen);
      if (form->scale != ANT_SCALE_UNKNOWN || !g_ascii_strcasecmp (chosen, "unknown"))
        return TRUE;
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                   _("“%s” is no time scale; expected UTC, TAI, TT, TDB, GPS, Unix or unknown"), chosen);
      return FALSE;
    }
  if (form->style == ANT_STAMP_UNIX)
    {
      form->scale = ANT_SCALE_UNIX;
      return TRUE;
    }
  for (guint i = 0; i < form->n_parts && form->scale == ANT_SCALE_UNKNOWN; i++)
    form->scale = scale_in_name (&layout->columns[form->columns[i]]);
  if (form->scale == ANT_SCALE_UNKNOWN)
    form->scale = scale_in_header (layout);
  if (form->scale == ANT_SCALE_UNKNOWN && layout->columns[form->columns[0]].has_zone)
    form->scale = ANT_SCALE_UTC;
  if (form->scale == ANT_SCALE_UNKNOWN)
    assume_scale (layout, record, form);
  return TRUE;
}
