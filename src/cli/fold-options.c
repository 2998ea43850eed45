/* fold-options.c - a fold by the command. */
#include "cli/fold-options.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "data/error.h"
#include "data/fold.h"

void
ant_fold_options_add (GOptionContext *context, AntFoldWish *wish)
{
  const GOptionEntry entries[] = {
    { "fold", 0, 0, G_OPTION_ARG_STRING, &wish->clock,
      N_("print the record by phase of an orbit of so many hours (without them: the setting line-period), or by minutes since a gap"),
      N_("orbit[=HOURS]|gap") },
    { "fold-column", 0, 0, G_OPTION_ARG_STRING, &wish->column, N_("fold this further column instead of the value"), N_("NAME") },
    { NULL }
  };
  g_option_context_add_main_entries (context, entries, NULL);
}

void
ant_fold_options_clear (AntFoldWish *wish)
{
  g_free (wish->clock);
  g_free (wish->column);
  *wish = (AntFoldWish){ 0 };
}

static gboolean
parse (const AntFoldWish *wish, const AntSettings *settings, AntFoldOptions *options, GError **error)
{
  char *end = NULL;
  if (!strcmp (wish->clock, "gap"))
    {
      options->clock = ANT_FOLD_SINCE_GAP;
      return TRUE;
    }
  double hours = !strcmp (wish->clock, "orbit")              ? settings->line_period_h
                 : g_str_has_prefix (wish->clock, "orbit=") ? g_ascii_strtod (wish->clock + strlen ("orbit="), &end)
                                                             : -1.0;
  if (hours > 0.0 && hours < 1e5 && (!end || *end == 0))
    {
      options->period_d = hours / ANT_HOURS_PER_DAY;
      return TRUE;
    }
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
               _("--fold: found “%s”, expected orbit=HOURS, orbit with the setting line-period above 0, or gap"), wish->clock);
  return FALSE;
}

/* The values to fold: the record in ppm, or a column on its grid. NULL with one sentence. */
static float *
pick (const AntFoldWish *wish, const AntRecord *record, GError **error)
{
  if (!wish->column)
    return g_memdup2 (record->series.value_ppm, record->series.n * sizeof (float));
  for (guint i = 0; i < record->columns->len; i++)
    {
      const AntColumn *column = g_ptr_array_index (record->columns, i);
      if (!g_ascii_strcasecmp (column->name, wish->column))
        return ant_record_column_on_grid (record, column);
    }
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("--fold-column: found “%s”, expected one of the %u further columns that info lists"),
               wish->column, record->columns->len);
  return NULL;
}

gboolean
ant_fold_options_print (const AntFoldWish *wish, const AntRecord *record, const AntSettings *settings, GError **error)
{
  AntFoldOptions options = ANT_FOLD_OPTIONS_INIT;
  AntFoldBin bin[ANT_MOST_FOLD_BINS];
  double swing;
  if (!wish->clock)
    return TRUE;
  g_autofree float *value = parse (wish, settings, &options, error) ? pick (wish, record, error) : NULL;
  if (!value || !ant_status_to_error (ant_fold_flatten (&record->series, &options, value), _("the running median"), error)
      || !ant_fold (&record->series, value, &options, bin))
    return FALSE;
  double significance = ant_fold_swing (bin, options.n_bins, &swing);
  gboolean by_orbit = options.clock == ANT_FOLD_ORBIT;
  g_print ("# %s by %s, about a running median of %g turns; greatest difference %.5g, %.3g times its error\n",
           wish->column ? wish->column : "relative irradiance, ppm,", by_orbit ? "phase" : "minutes since a gap", ANT_FOLD_DRIFT_TURNS, swing,
           significance);
  g_print ("%s,mean,sigma,samples\n", by_orbit ? "phase" : "minutes");
  for (guint b = 0; b < options.n_bins; b++)
    {
      char text[3][G_ASCII_DTOSTR_BUF_SIZE];
      g_print ("%s,%s,%s,%zu\n", g_ascii_formatd (text[0], sizeof text[0], "%.5f", bin[b].x),
               isfinite (bin[b].mean) ? g_ascii_formatd (text[1], sizeof text[1], "%.5g", bin[b].mean) : "",
               isfinite (bin[b].sigma) ? g_ascii_formatd (text[2], sizeof text[2], "%.4g", bin[b].sigma) : "", bin[b].n);
    }
  return TRUE;
}
