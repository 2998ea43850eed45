/* record-options.c - the options of reading. */
#include "cli/record-options.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/error.h"
#include "jobs/record-open.h"

void
ant_record_options_add (GOptionContext *context, AntRecordOptions *options)
{
  const GOptionEntry entries[] = {
    { "column", 0, 0, G_OPTION_ARG_STRING, &options->columns, N_("columns by name or number; those not named are told by the reader"),
      N_("time=…,value=…,error=…,quality=…") },
    { "time-format", 0, 0, G_OPTION_ARG_STRING, &options->time_format,
      N_("jd, mjd, jd-OFFSET, iso, ymd, unix, year-day, year-month-day, decimal-year, days, hours or seconds"), N_("FORMAT") },
    { "time-scale", 0, 0, G_OPTION_ARG_STRING, &options->time_scale, N_("UTC, TAI, TT, TDB, GPS, Unix or unknown"), N_("SCALE") },
    { "time-zone", 0, 0, G_OPTION_ARG_STRING, &options->time_zone, N_("hours of a local clock ahead of UTC, such as +01:00"), N_("ZONE") },
    { "epoch", 0, 0, G_OPTION_ARG_STRING, &options->epoch, N_("what days, hours or seconds count from, such as 2000-01-01T12:00:00"),
      N_("TIME") },
    { "hdu", 0, 0, G_OPTION_ARG_STRING, &options->hdu, N_("table of a FITS file, 0 the primary one; without it the first with a time"),
      N_("NAME|NUMBER") },
    { "index", 0, 0, G_OPTION_ARG_STRING, &options->index, N_("NetCDF: which place along a further dimension, counted from 1"),
      N_("DIMENSION=NUMBER,…") },
    { "fill", 0, 0, G_OPTION_ARG_STRING, &options->fill, N_("values that count as missing, besides the usual ones"),
      N_("NUMBER,…") },
    { "good", 0, 0, G_OPTION_ARG_STRING, &options->good,
      N_("qualities that are good, or the bits (0x…) that must be clear; without it only 0 is good"), N_("NUMBER,…|0xMASK") },
    { NULL }
  };
  g_option_context_add_main_entries (context, entries, NULL);
}

void
ant_record_options_clear (AntRecordOptions *options)
{
  g_free (options->columns);
  g_free (options->time_format);
  g_free (options->time_scale);
  g_free (options->time_zone);
  g_free (options->epoch);
  g_free (options->hdu);
  g_free (options->index);
  g_free (options->fill);
  g_free (options->good);
  *options = (AntRecordOptions){ 0 };
}

static gboolean
parse_fill (const char *text, GArray *values, GError **error)
{
  g_auto (GStrv) parts = g_strsplit (text, ",", -1);
  for (guint i = 0; parts[i]; i++)
    {
      char *end;
      double value = g_ascii_strtod (g_strstrip (parts[i]), &end);
      if (end == parts[i] || *end || !isfinite (value))
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("--fill: found “%s”, expected numbers separated by commas"), parts[i]);
          return FALSE;
        }
      g_array_append_val (values, value);
    }
  return TRUE;
}

AntRecord *
ant_record_options_read (const AntRecordOptions *options, const char *path, GCancellable *cancellable, GError **error)
{
  AntReadingChoices choices = { .time_format = g_strdup (options->time_format), .time_scale = g_strdup (options->time_scale),
                                .time_zone = g_strdup (options->time_zone), .epoch = g_strdup (options->epoch),
                                .hdu = g_strdup (options->hdu), .index = g_strdup (options->index) };
  AntRecord *record = NULL;
  if (options->fill)
    choices.fill_values = g_array_new (FALSE, FALSE, sizeof (double));
  if ((!options->columns || ant_reading_choices_parse_columns (&choices, options->columns, error))
      && (!options->fill || parse_fill (options->fill, choices.fill_values, error)))
    record = ant_record_open (path, &choices, 0, cancellable, error);
  ant_reading_choices_clear (&choices);
  return record;
}

gboolean
ant_record_options_good (const AntRecordOptions *options, AntGridOptions *grid, GError **error)
{
  guint64 mask;
  if (!options->good)
    return TRUE;
  if (g_ascii_strncasecmp (options->good, "0x", 2) == 0)
    {
      if (!g_ascii_string_to_unsigned (options->good + 2, 16, 1, G_MAXUINT64, &mask, NULL))
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("--good: found “%s”, expected a mask of up to 64 bits such as 0x10042"),
                       options->good);
          return FALSE;
        }
      grid->good_mask = (gint64) mask;
      return TRUE;
    }
  grid->quality_is_list = TRUE;
  grid->good_values = g_array_new (FALSE, FALSE, sizeof (gint64));
  g_auto (GStrv) parts = g_strsplit (options->good, ",", -1);
  for (guint i = 0; parts[i]; i++)
    {
      gint64 value;
      if (!g_ascii_string_to_signed (g_strstrip (parts[i]), 10, G_MININT64, G_MAXINT64, &value, NULL))
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("--good: found “%s”, expected whole numbers or a mask 0x…"), parts[i]);
          return FALSE;
        }
      g_array_append_val (grid->good_values, value);
    }
  return TRUE;
}
