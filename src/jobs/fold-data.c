/* fold-data.c - fold the residual of a record, and cut out its events. */
#include "jobs/fold-data.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/robust.h"
#include "core/units.h"
#include "search/crossing-shape.h"

#define BINS 90
#define SHAPE_POINTS 181
#define EVENT_POINTS 60
#define MOST_EVENTS 400
#define HALF_WIDTH 1.6 /* durations to each side */

typedef struct
{
  double sum, squares, count, hours;
} Bin;

static double
half_width_d (const AntFold *fold)
{
  return fmin (HALF_WIDTH * fold->duration_d, 0.5 * fold->period_d);
}

static void
add_samples (const AntSeries *series, const float *value, const AntFold *fold, Bin *bin)
{
  double half_d = half_width_d (fold);
  for (gsize i = 0; i < series->n; i++)
    {
      double time_d = ant_series_time (series, (double) i) - fold->epoch_d;
      time_d -= fold->period_d * floor (time_d / fold->period_d + 0.5);
      if (isnan (value[i]) || fabs (time_d) >= half_d)
        continue;
      Bin *at = &bin[MIN ((gsize) ((time_d + half_d) / (2 * half_d) * BINS), BINS - 1)];
      at->sum += (double) value[i];
      at->squares += (double) value[i] * (double) value[i];
      at->hours += time_d * ANT_HOURS_PER_DAY;
      at->count++;
    }
}

/* Median of those points that lie outside the dip; 0 if there are none. */
static double
level_of (gsize n, const double *hours, const double *ppm, double duration_d)
{
  g_autofree double *outside = g_new (double, n + 1);
  gsize count = 0;
  for (gsize i = 0; i < n; i++)
    if (isfinite (ppm[i]) && fabs (hours[i]) > 0.55 * duration_d * ANT_HOURS_PER_DAY)
      outside[count++] = ppm[i];
  double median = ant_median (count, outside, outside);
  return isfinite (median) ? median : 0;
}

static void
make_points (AntFoldData *data, const AntSeries *series, const float *value, const AntFold *fold)
{
  g_autofree Bin *bin = g_new0 (Bin, BINS);
  double *hours = data->numbers, *ppm = hours + BINS, *error = ppm + BINS;
  gsize n = 0;
  add_samples (series, value, fold, bin);
  for (gsize b = 0; b < BINS; b++)
    if (bin[b].count > 0)
      {
        double mean = bin[b].sum / bin[b].count, variance = bin[b].squares / bin[b].count - mean * mean;
        hours[n] = bin[b].hours / bin[b].count;
        ppm[n] = mean;
        error[n++] = bin[b].count > 1 ? sqrt (fmax (variance, 0) / (bin[b].count - 1)) : NAN;
      }
  double level = level_of (n, hours, ppm, fold->duration_d), half_h = 0.5 * fold->duration_d * ANT_HOURS_PER_DAY;
  for (gsize i = 0; i < n; i++)
    ppm[i] -= level;
  data->closeup = (AntDipCloseup) { .n = n, .hours = hours, .ppm = ppm, .error_ppm = error, .n_shapes = 1,
                                    .shape = data->shape, .contact_h = { -half_h, half_h } };
}

static void
shape_of (const AntFold *fold, const AntSettings *settings, AntCrossingShape *shape)
{
  double edge_d = fmin (settings->bank.edge_h / ANT_HOURS_PER_DAY, 0.5 * fold->duration_d);
  ant_crossing_shape_init (shape, fold->duration_d, edge_d, ANT_SHAPE_IMPACT, settings->bank.limb_darkening);
}

/* Depth of the crossing that fits the folded points best. */
static double
depth_of (const AntDipCloseup *closeup, const AntCrossingShape *shape, double exposure_d)
{
  double up = 0, down = 0;
  for (gsize i = 0; i < closeup->n; i++)
    {
      double loss = ant_crossing_shape_mean (shape, closeup->hours[i] / ANT_HOURS_PER_DAY, exposure_d);
      up -= loss * closeup->ppm[i];
      down += loss * loss;
    }
  return down > 0 ? up / down : 0;
}

static void
make_shape (AntFoldData *data, const AntSettings *settings, const AntFold *fold, double exposure_d)
{
  AntCrossingShape shape;
  double *hours = data->numbers + 3 * BINS, *ppm = hours + SHAPE_POINTS, half_h = half_width_d (fold) * ANT_HOURS_PER_DAY;
  shape_of (fold, settings, &shape);
  double depth = isfinite (fold->depth_ppm) ? fold->depth_ppm : depth_of (&data->closeup, &shape, exposure_d);
  for (int i = 0; i < SHAPE_POINTS; i++)
    {
      hours[i] = half_h * (2.0 * i / (SHAPE_POINTS - 1) - 1);
      ppm[i] = -depth * ant_crossing_shape_mean (&shape, hours[i] / ANT_HOURS_PER_DAY, exposure_d);
    }
  data->shape[0] = (AntShapeLine) { _("common crossing"), SHAPE_POINTS, hours, ppm };
}

static void
add_event (AntFoldData *data, const AntLayers *layers, const AntFold *fold, double mid_d)
{
  const AntSeries *series = &layers->record->series;
  double *hours = g_new (double, 3 * EVENT_POINTS), *ppm = hours + EVENT_POINTS;
  gsize n = ant_dip_closeup_points (series->n, layers->residual_ppm, series->start_d, series->step_d, mid_d, half_width_d (fold),
                                    NAN, EVENT_POINTS, hours, ppm, ppm + EVENT_POINTS);
  g_ptr_array_add (data->owned, hours);
  if (n == 0)
    return;
  double level = level_of (n, hours, ppm, fold->duration_d);
  for (gsize i = 0; i < n; i++)
    {
      ppm[i] -= level;
      data->strips.low_ppm = isfinite (ppm[i]) ? fmin (data->strips.low_ppm, ppm[i]) : data->strips.low_ppm;
      data->strips.high_ppm = isfinite (ppm[i]) ? fmax (data->strips.high_ppm, ppm[i]) : data->strips.high_ppm;
    }
  char *label = ant_time_reference_utc_text (&layers->record->time, mid_d, 0);
  if (!*label)
    {
      g_free (label);
      label = ant_time_reference_own_text (&layers->record->time, mid_d);
    }
  g_ptr_array_add (data->owned, label);
  data->mid_d[data->strips.n] = mid_d;
  data->strip[data->strips.n++] = (AntEventStrip) { label, n, hours, ppm };
}

AntFoldData *
ant_fold_data_new (const AntLayers *layers, const AntSettings *settings, const AntFold *fold)
{
  const AntSeries *series = &layers->record->series;
  double exposure_d = layers->record->exposure_d > 0 ? layers->record->exposure_d : series->step_d;
  double end_d = ant_series_time (series, (double) series->n), half_d = 0.5 * fold->duration_d;
  AntFoldData *data = g_new0 (AntFoldData, 1);
  data->numbers = g_new (double, 3 * BINS + 2 * SHAPE_POINTS);
  data->strip = g_new0 (AntEventStrip, MOST_EVENTS);
  data->mid_d = g_new0 (double, MOST_EVENTS);
  data->owned = g_ptr_array_new_with_free_func (g_free);
  make_points (data, series, layers->residual_ppm, fold);
  make_shape (data, settings, fold, exposure_d);
  double mid_d = fold->epoch_d + fold->period_d * ceil ((series->start_d - half_d - fold->epoch_d) / fold->period_d);
  for (; mid_d < end_d + half_d && data->strips.n < MOST_EVENTS; mid_d += fold->period_d)
    add_event (data, layers, fold, mid_d);
  data->strips.strip = data->strip;
  data->strips.n_shape = SHAPE_POINTS;
  data->strips.shape_hours = data->shape[0].hours;
  data->strips.shape_ppm = data->shape[0].ppm;
  data->strips.selected = data->strips.n;
  return data;
}

void
ant_fold_data_free (AntFoldData *data)
{
  if (!data)
    return;
  g_ptr_array_unref (data->owned);
  g_free (data->numbers);
  g_free (data->strip);
  g_free (data->mid_d);
  g_free (data);
}
