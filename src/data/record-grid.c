/* record-grid.c - from judged rows to the uniform grid in ppm of the median. docs/data.md gives the rules. */
#include <glib/gi18n.h>
#include <math.h>
#include "core/units.h"
#include "data/cadence.h"
#include "data/error.h"
#include "data/grid-values.h"
#include "data/plain-text.h"
#include "data/record-distance.h"
#include "data/record-slip.h"

#define MOST_PLACES 2e8
#define SNAP_STEPS 0.25
#define UNSAID_JITTER_D (1e-3 / ANT_SECONDS_PER_DAY)

static gboolean
check_options (const AntGridOptions *options, GError **error)
{
  const char *wrong = NULL;
  if (!(options->dark_fraction > 0.0) || !isfinite (options->dark_fraction))
    wrong = _("the dark fraction must be a number above 0");
  else if (!(options->exposure_d >= 0.0) || !isfinite (options->exposure_d))
    wrong = _("the exposure must be a number, 0 or more");
  else if (!(options->cadence_d >= 0.0) || !isfinite (options->cadence_d))
    wrong = _("the cadence must be a number, 0 or more");
  else if (options->from_d >= options->to_d)
    wrong = _("the scan ends before it begins");
  if (wrong)
    g_set_error_literal (error, ANT_ERROR, ANT_ERROR_USAGE, wrong);
  return wrong == NULL;
}

/* Exposure and stamp: as stated, or assumed and said. Returns the way from a stamp to the middle of its exposure. */
static double
settle_exposure (AntRecord *record, const AntGridOptions *options)
{
  if (options->exposure_d > 0.0)
    {
      record->exposure_d = options->exposure_d;
      record->exposure_known = TRUE;
    }
  if (options->stamp != ANT_AT_UNKNOWN)
    record->stamp = options->stamp;

  if (!record->exposure_known)
    {
      record->exposure_d = record->cadence_d;
      g_autofree char *length = ant_length_text (record->exposure_d);
      ant_record_say (record, _("The exposure of a sample is unknown: taken as the cadence, %s."), length);
    }
  switch (record->stamp)
    {
    case ANT_AT_START:
      return 0.5 * record->exposure_d;
    case ANT_AT_END:
      return -0.5 * record->exposure_d;
    case ANT_AT_MIDDLE:
      return 0.0;
    case ANT_AT_UNKNOWN:
      break;
    }
  ant_record_say (record, _("What the time stamps mark is unknown: taken as the middle of each exposure."));
  return 0.0;
}

static void
say_jitter (AntRecord *record, const AntRowOrder *order, const AntCadence *cadence)
{
  double square = 0.0, largest = 0.0;
  gsize n_coarse = 0;
  for (gsize k = 0; k < order->n; k++)
    {
      double place = (double) record->place[order->row[k]];
      double off = (order->time_d[k] - cadence->start_d) / cadence->step_d - place;
      square += off * off;
      largest = fmax (largest, fabs (off));
      n_coarse += fabs (off) >= SNAP_STEPS;
    }
  g_autofree char *step = ant_length_text (cadence->step_d);
  g_autofree char *rms = ant_length_text (cadence->step_d * sqrt (square / (double) order->n));
  g_autofree char *most = ant_length_text (cadence->step_d * largest);
  if (cadence->step_d * largest < UNSAID_JITTER_D)
    ant_record_say (record, _("Cadence %s; the times lie on an even grid to a millisecond."), step);
  else if (n_coarse == 0)
    ant_record_say (record,
                    _("Cadence %s; the times lie within %s rms (%s at most) of an even grid and were snapped to it."),
                    step, rms, most);
  else if (record->slip_d)
    ant_record_say (record,
                    _("Cadence %s; the clock wanders against an even grid, by as much as the steps themselves: %zu of %zu times lie a quarter "
                      "step or more from it. Each sample went into the nearest bin; times of dips are told by the stamps, not by the bins."),
                    step, n_coarse, order->n);
  else
    ant_record_say (record,
                    _("Cadence %s; %zu of %zu times lie a quarter step or more from an even grid (%s rms, %s at most): "
                      "each sample went into the nearest bin of that width."),
                    step, n_coarse, order->n, rms, most);
}

/* The grid runs from the first good row to the last; rows between them get a place, the others none. */
static gboolean
place_rows (AntRecord *record, const AntRowOrder *order, AntCadence *cadence, GError **error)
{
  double span_d = order->time_d[order->n - 1] - order->time_d[0], n_steps = span_d / cadence->step_d;
  if (!(n_steps < MIN (MOST_PLACES, 1000.0 * (double) record->n_rows + 1e6)))
    {
      char count[ANT_N_NUMBER_TEXT];
      g_autofree char *step = ant_length_text (cadence->step_d), *span = ant_length_text (span_d);
      g_autofree char *rows = ant_record_rows_text (record, record->line[order->row[0]], record->line[order->row[order->n - 1]]);
      return ant_record_refuse (record, error,
                                _("%s: the good rows span %s, %s steps of the cadence %s for %zu rows: "
                                  "expected times and a cadence that belong together"),
                                rows, span,
                                ant_number_text (count, "%.3g", n_steps), step, record->n_rows);
    }
  record->place = g_new (gint64, record->n_rows);
  for (gsize i = 0; i < record->n_rows; i++)
    record->place[i] = -1;
  g_autofree gint64 *place = g_new (gint64, order->n);
  ant_cadence_place (cadence, order->n, order->time_d, place);
  for (gsize k = 0; k < order->n; k++)
    record->place[order->row[k]] = place[k] - place[0];
  cadence->start_d += (double) place[0] * cadence->step_d;
  record->series.n = (size_t) (place[order->n - 1] - place[0]) + 1;
  ant_record_find_slip (record, order, cadence);
  say_jitter (record, order, cadence);
  return TRUE;
}

static void
list_gaps (AntRecord *record)
{
  const AntSeries *series = &record->series;
  double longest_d = 0.0;
  gsize n_observed = 0;
  for (gsize i = 0, next; i < series->n; i = next)
    {
      for (next = i; next < series->n && isnan (series->value_ppm[next]); next++)
        ;
      if (next - i > 1)
        {
          AntSpan gap = { ant_series_time (series, (double) i - 0.5), ant_series_time (series, (double) next - 0.5) };
          g_array_append_val (record->gaps, gap);
          longest_d = fmax (longest_d, gap.end_d - gap.start_d);
        }
      if (next == i)
        {
          n_observed++;
          next++;
        }
    }
  char percent[ANT_N_NUMBER_TEXT];
  g_autofree char *span = ant_length_text ((double) series->n * series->step_d), *longest = ant_length_text (longest_d);
  ant_number_text (percent, "%.1f", 100.0 * (double) n_observed / (double) series->n);
  ant_record_say (record, _("Observed: %zu of %zu places of the grid over %s, a duty cycle of %s %%."), n_observed,
                  series->n, span, percent);
  if (record->gaps->len > 0)
    ant_record_say (record, _("Gaps longer than one sample: %u, the longest %s."), record->gaps->len, longest);
}

static gboolean
lay_grid (AntRecord *record, AntRowOrder *order, const AntGridOptions *options, GError **error)
{
  AntCadence cadence;
  if (!ant_row_order_make (order, record, options, error))
    return FALSE;
  ant_row_order_judge_spans (order, record, options);
  if (!ant_row_order_require_good (order, record, error))
    return FALSE;
  if (!ant_record_settle_distance (record, order, options, error))
    return FALSE;
  ant_row_order_trim (order, record);
  if (!ant_cadence_find (order->n, order->time_d, options->cadence_d, &cadence))
    {
      g_autofree char *rows = ant_record_rows_text (record, record->line[order->row[0]], record->line[order->row[order->n - 1]]);
      return ant_record_refuse (record, error,
                                _("%s: no cadence can be found in %zu different times: expected times that grow in "
                                  "steps"),
                                rows, order->n);
    }
  record->cadence_d = cadence.step_d;
  double shift_d = settle_exposure (record, options);
  if (!place_rows (record, order, &cadence, error))
    return FALSE;
  record->series.step_d = cadence.step_d;
  record->series.start_d = cadence.start_d + shift_d;
  if (!ant_grid_values_make (record, order, options, shift_d, error))
    return FALSE;
  list_gaps (record);
  return TRUE;
}

gboolean
ant_record_make_grid (AntRecord *record, const AntGridOptions *options, GError **error)
{
  g_return_val_if_fail (record->place == NULL, FALSE);
  if (!check_options (options, error))
    return FALSE;
  AntRowOrder order;
  gboolean made = lay_grid (record, &order, options, error);
  ant_row_order_clear (&order);
  return made;
}
