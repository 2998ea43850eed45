/* grid-values.c - the values of the grid: ppm of the median, dark stretches set aside, errors and averages. */
#include "data/grid-values.h"
#include <glib/gi18n.h>
#include <math.h>
#include "core/robust.h"
#include "core/running-median.h"
#include "core/units.h"
#include "data/error.h"
#include "data/plain-text.h"

#define WILD_RATIO 1e6 /* a value this many times the median is no irradiance, and too large for float ppm */
#define MOST_DARK 0.25 /* of the good rows; above it the median is not the record's usual level */
#define DARK_WINDOW_D 5.0
#define SHORT_D 1.0     /* in less, a median of five days tells nothing of what is usual */
#define OTHER_RATIO 100 /* a value so many times above or below the median is of another state: night beside day */
#define DARK_JOIN_D 0.5 /* dark rows with no good row between them and no longer pause are one span */

/* The value that 0 ppm stands for: the median of the good rows. */
static gboolean
find_median (AntRecord *record, const AntRowOrder *order, GError **error)
{
  double *work = g_new (double, order->n);
  gsize n = 0;
  for (gsize k = 0; k < order->n; k++)
    if (ant_row_used (record, order->row[k]))
      work[n++] = record->value[order->row[k]];
  record->median = ant_median (n, work, work);
  g_free (work);
  if (record->median > 0.0 && isfinite (record->median))
    return TRUE;
  char median[ANT_N_NUMBER_TEXT];
  return ant_record_refuse (record, error,
                            _("the median of the good values is %s: expected irradiance or flux with a level above 0 "
                              "(is the right column read, and are fill values known?)"),
                            ant_number_text (median, "%.6g", record->median));
}

static void
drop_wild (AntRecord *record, const AntRowOrder *order)
{
  gsize n_wild = 0;
  guint32 first = 0;
  for (gsize k = 0; k < order->n; k++)
    {
      guint32 row = order->row[k];
      if (!ant_row_used (record, row) || fabs (record->value[row] / record->median) <= WILD_RATIO)
        continue;
      record->flags[row] |= ANT_FLAG_FILL;
      if (n_wild++ == 0)
        first = row;
    }
  if (n_wild == 0)
    return;
  g_autofree char *place = ant_record_row_text (record, record->line[first]);
  ant_record_say (record, _("Values more than a million times the median, taken as fill: %zu, first at %s."), n_wild, place);
}

static double
row_ppm (const AntRecord *record, guint32 row)
{
  return (record->value[row] / record->median - 1.0) / ANT_PPM;
}

/* Lay the used rows on the grid; rows that share a place are averaged. Returns the number of shared places. */
static gsize
fill_values (const AntRecord *record, const AntRowOrder *order, float *value_ppm, float *bin_count)
{
  gsize n_shared = 0;
  gint64 current = -1;
  double sum = 0.0, count = 0.0;
  for (gsize i = 0; i < record->series.n; i++)
    value_ppm[i] = NAN;
  for (gsize k = 0; k < order->n; k++)
    {
      guint32 row = order->row[k];
      gint64 place = record->place[row];
      if (!ant_row_used (record, row))
        continue;
      if (place != current)
        sum = count = 0.0;
      current = place;
      sum += row_ppm (record, row);
      count += 1.0;
      n_shared += count == 2.0;
      value_ppm[place] = (float) (sum / count);
      if (bin_count)
        bin_count[place] = (float) count;
    }
  return n_shared;
}

/* A dark or covered stretch of rows in the order of time, as a span from edge to edge of their exposures. */
static void
list_dark_spans (AntRecord *record, const AntRowOrder *order, double shift_d)
{
  double join_d = fmax (DARK_JOIN_D, 3.0 * record->cadence_d);
  gboolean open = FALSE;
  for (gsize k = 0; k < order->n; k++)
    {
      guint32 row = order->row[k];
      if (ant_row_used (record, row))
        open = FALSE;
      if (!(record->flags[row] & ANT_FLAG_DARK))
        continue;
      double middle_d = order->time_d[k] + shift_d, half_d = 0.5 * record->cadence_d;
      AntSpan span = { middle_d - half_d, middle_d + half_d };
      AntSpan *last = open ? &g_array_index (record->dark_spans, AntSpan, record->dark_spans->len - 1) : NULL;
      if (last && span.start_d - last->end_d <= join_d)
        last->end_d = span.end_d;
      else
        g_array_append_val (record->dark_spans, span);
      open = TRUE;
    }
}

static gboolean
refuse_level (const AntRecord *record, gsize n_off, gsize n_good, double dark_fraction, GError **error)
{
  char percent[ANT_N_NUMBER_TEXT], fraction[ANT_N_NUMBER_TEXT];
  return ant_record_refuse (record, error,
                            _("%s %% of the good values are far from the running 5-day median (dark fraction %s): the "
                              "median is not the usual level "
                              "of this record (half of it night?); expected a quarter at most: use a quality column, "
                              "exclude spans, or raise the dark fraction"),
                            ant_number_text (percent, "%.0f", 100.0 * (double) n_off / (double) n_good),
                            ant_number_text (fraction, "%g", dark_fraction));
}

/* Less than a day, by its limits or as a whole, and one state of affairs: the Sun's arc over a station, a transit, a flare. */
static gboolean
is_short (const AntRecord *record, const AntRowOrder *order, gsize n_good)
{
  gsize n_other = 0;
  if (!(order->time_d[order->n - 1] - order->time_d[0] < SHORT_D))
    return FALSE;
  for (gsize k = 0; k < order->n; k++)
    {
      guint32 row = order->row[k];
      double ratio = record->value[row] / record->median;
      gboolean good = (record->flags[row] & ~(ANT_FLAG_SPIKE | ANT_FLAG_DARK)) == 0;
      n_other += good && !(ratio > 1.0 / OTHER_RATIO && ratio < OTHER_RATIO);
    }
  return (double) n_other <= MOST_DARK * (double) n_good;
}

static void
use_dark (AntRecord *record, gsize n_dark, gsize n_good)
{
  char percent[ANT_N_NUMBER_TEXT];
  for (gsize i = 0; i < record->n_rows; i++)
    record->flags[i] &= (guint16) ~ANT_FLAG_DARK;
  ant_record_say (record,
                  _("%s %% of the good values are far from their median; in less than a day that tells nothing, so nothing is taken for dark or covered."),
                  ant_number_text (percent, "%.0f", 100.0 * (double) n_dark / (double) n_good));
}

static void
say_dark (AntRecord *record, const AntRowOrder *order, const AntGridOptions *options, gsize n_dark, double shift_d)
{
  list_dark_spans (record, order, shift_d);
  AntSpan first = g_array_index (record->dark_spans, AntSpan, 0);
  char percent[ANT_N_NUMBER_TEXT];
  g_autofree char *when = ant_time_reference_own_text (&record->time, first.start_d),
                  *length = ant_length_text (first.end_d - first.start_d);
  ant_record_say (record,
                  _("Dark or covered (more than %s %% from the running 5-day median): %zu "
                    "rows in %u spans set aside; the first begins at %s and lasts %s."),
                  ant_number_text (percent, "%g", 100.0 * options->dark_fraction), n_dark, record->dark_spans->len,
                  when, length);
}

/* Flag the rows far from the running median, before anything is fitted. A median that itself jumps by a factor of two
 * for a good part of the record has flipped between two levels, and what it calls dark means nothing. */
static gboolean
set_dark_aside (AntRecord *record, const AntRowOrder *order, const AntGridOptions *options, const float *value_ppm,
                double shift_d, GError **error)
{
  gsize n = record->series.n, n_good = ant_row_order_count_good (order, record), n_dark = 0, n_flipped = 0;
  gsize half_width = (gsize) fmin (0.5 * DARK_WINDOW_D / record->cadence_d, (double) n);
  g_autofree float *median = g_new (float, n);
  if (!ant_status_to_error (ant_running_median (n, value_ppm, half_width, median), _("the running median"), error))
    return FALSE;
  for (gsize k = 0; k < order->n; k++)
    {
      guint32 row = order->row[k];
      if (!ant_row_used (record, row))
        continue;
      double level_ppm = (double) median[record->place[row]], level = 1.0 + level_ppm * ANT_PPM;
      n_flipped += level < 0.5 || level > 2.0;
      if (fabs (row_ppm (record, row) - level_ppm) * ANT_PPM > options->dark_fraction * fabs (level))
        {
          record->flags[row] |= ANT_FLAG_DARK;
          n_dark++;
        }
    }
  gsize n_off = MAX (n_dark, n_flipped);
  if ((double) n_off > MOST_DARK * (double) n_good && !is_short (record, order, n_good))
    return refuse_level (record, n_off, n_good, options->dark_fraction, error);
  if ((double) n_off > MOST_DARK * (double) n_good)
    use_dark (record, n_off, n_good);
  else if (n_dark > 0)
    say_dark (record, order, options, n_dark, shift_d);
  return TRUE;
}

/* Errors are kept if most are stated; the few that are not get the median of the others. */
static float *
fill_errors (AntRecord *record, const AntRowOrder *order)
{
  if (!record->error)
    return NULL;
  g_autofree double *work = g_new (double, order->n);
  gsize n_used = 0, n_stated = 0;
  for (gsize k = 0; k < order->n; k++)
    {
      guint32 row = order->row[k];
      if (!ant_row_used (record, row))
        continue;
      n_used++;
      if (record->error[row] > 0.0 && record->error[row] <= record->median)
        work[n_stated++] = record->error[row];
    }
  if (2 * n_stated <= n_used)
    {
      ant_record_say (record,
                      _("The error column is not used: %zu of %zu "
                        "good rows state an error above 0 and below the median value."),
                      n_stated, n_used);
      return NULL;
    }
  double usual = ant_median (n_stated, work, work);
  if (n_stated < n_used)
    ant_record_say (record, _("Good rows without a usable error, given the median of the others: %zu."),
                    n_used - n_stated);

  float *error_ppm = g_new (float, record->series.n);
  for (gsize i = 0; i < record->series.n; i++)
    error_ppm[i] = NAN;
  gint64 current = -1;
  double variance = 0.0, count = 0.0;
  for (gsize k = 0; k < order->n; k++)
    {
      guint32 row = order->row[k];
      gint64 place = record->place[row];
      if (!ant_row_used (record, row))
        continue;
      double stated = record->error[row];
      double error = (stated > 0.0 && stated <= record->median ? stated : usual) / record->median / ANT_PPM;
      if (place != current)
        variance = count = 0.0;
      current = place;
      variance += error * error;
      count += 1.0;
      error_ppm[place] = (float) (sqrt (variance) / count);
    }
  return error_ppm;
}

static guint8 *
fill_spikes (const AntRecord *record, const AntRowOrder *order)
{
  guint8 *spike = NULL;
  for (gsize k = 0; k < order->n; k++)
    {
      guint32 row = order->row[k];
      if (record->flags[row] != ANT_FLAG_SPIKE)
        continue;
      if (!spike)
        spike = g_new0 (guint8, record->series.n);
      spike[record->place[row]] = 1;
    }
  return spike;
}

static gboolean
refuse_constant (const AntRecord *record, const float *value_ppm, GError **error)
{
  float low = INFINITY, high = -INFINITY;
  for (gsize i = 0; i < record->series.n; i++)
    if (!isnan (value_ppm[i]))
      {
        low = MIN (low, value_ppm[i]);
        high = MAX (high, value_ppm[i]);
      }
  if (low < high)
    return TRUE;
  char value[ANT_N_NUMBER_TEXT];
  return ant_record_refuse (record, error, _("every good value is %s: expected a record that varies"),
                            ant_number_text (value, "%.9g", record->median));
}

/* The grid of values, twice: once to tell what is dark, then about the median of what is not. */
gboolean
ant_grid_values_make (AntRecord *record, const AntRowOrder *order, const AntGridOptions *options,
                      double shift_d, GError **error)
{
  if (!find_median (record, order, error))
    return FALSE;
  drop_wild (record, order);
  float *value_ppm = g_new (float, record->series.n);
  record->series.value_ppm = value_ppm;
  fill_values (record, order, value_ppm, NULL);
  if (!set_dark_aside (record, order, options, value_ppm, shift_d, error) ||
      !ant_row_order_require_good (order, record, error) || !find_median (record, order, error))
    return FALSE;
  gsize n_shared = fill_values (record, order, value_ppm, NULL);
  if (!refuse_constant (record, value_ppm, error))
    return FALSE;
  if (n_shared > 0)
    {
      float *bin_count = g_new0 (float, record->series.n);
      fill_values (record, order, value_ppm, bin_count);
      record->series.bin_count = bin_count;
      ant_record_say (record, _("Places that hold the average of several rows: %zu."), n_shared);
    }
  record->series.error_ppm = fill_errors (record, order);
  record->series.spike = fill_spikes (record, order);
  return TRUE;
}
