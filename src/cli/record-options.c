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

static void
choose (char **place, const char *chosen)
{
  if (!chosen)
    return;
  g_free (*place);
  *place = g_strdup (chosen);
}

gboolean
ant_record_options_choose (const AntRecordOptions *options, AntReadingChoices *choices, GError **error)
{
  choose (&choices->time_format, options->time_format);
  choose (&choices->time_scale, options->time_scale);
  choose (&choices->time_zone, options->time_zone);
  choose (&choices->epoch, options->epoch);
  choose (&choices->hdu, options->hdu);
  choose (&choices->index, options->index);
  if (options->fill)
    g_clear_pointer (&choices->fill_values, g_array_unref);
  return (!options->columns || ant_reading_choices_parse_columns (choices, options->columns, error))
         && (!options->fill || ant_reading_choices_parse_fills (choices, options->fill, error));
}

AntRecord *
ant_record_options_read (const AntRecordOptions *options, const char *path, GCancellable *cancellable, GError **error)
{
  AntReadingChoices choices = { 0 };
  AntRecord *record = NULL;
  if (ant_record_options_choose (options, &choices, error))
    record = ant_record_open (path, &choices, 0, cancellable, error);
  ant_reading_choices_clear (&choices);
  return record;
}

gboolean
ant_record_options_good (const AntRecordOptions *options, AntGridOptions *grid, GError **error)
{
  return !options->good || ant_grid_options_parse_good (grid, "--good", options->good, error);
}
