/* closeup-data.c - collect a dip's surroundings. */
#include "jobs/closeup-data.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/robust.h"
#include "core/units.h"
#include "data/verdict-words.h"
#include "search/crossing-shape.h"

#define MOST_POINTS 160
#define SHAPE_POINTS 241
#define HALF_WIDTH 1.4 /* of a close-up, in durations */
#define PASSAGE_HALF_WIDTH 2.0 /* its duration is that at half depth */

static void
draw_shape (AntCloseupData *data, const AntSettings *settings, const AntDip *dip, double exposure_d)
{
  double *hours = data->curve, *ppm = data->curve + SHAPE_POINTS;
  AntCrossingShape shape;
  double edge_d = CLAMP (dip->edge_d, 1e-6 * dip->duration_d, dip->duration_d / 2);
  ant_crossing_shape_init (&shape, dip->duration_d, edge_d, ANT_SHAPE_IMPACT, settings->bank.limb_darkening);
  for (int i = 0; i < SHAPE_POINTS; i++)
    {
      double time_d = HALF_WIDTH * dip->duration_d * (2.0 * i / (SHAPE_POINTS - 1) - 1);
      hours[i] = time_d * ANT_HOURS_PER_DAY;
      ppm[i] = -dip->depth_ppm * ant_crossing_shape_mean (&shape, time_d, exposure_d);
    }
  data->shape[0] = (AntShapeLine) { _("fitted crossing"), SHAPE_POINTS, hours, ppm };
}

/* The likeliest other shapes, as they were fitted. */
static gsize
draw_rivals (AntCloseupData *data, const AntSettings *settings, const AntDip *dip, const AntVerdict *verdict, double exposure_d)
{
  AntRivalKind ranking[ANT_N_RIVALS];
  AntCrossingShape eclipse;
  gsize n = verdict ? ant_verdict_ranking (verdict, ranking) : 0, drawn = 0;
  ant_rival_eclipse (settings->bank.limb_darkening, dip->depth_ppm, &eclipse);
  for (gsize r = 0; r < n && drawn < ANT_CLOSEUP_RIVALS; r++)
    {
      const AntRivalFit *rival = &verdict->rival[ranking[r]];
      double *hours = data->curve, *ppm = data->curve + (2 + drawn) * SHAPE_POINTS;
      AntRivalCurve curve;
      if (ranking[r] == ANT_RIVAL_CROSSING)
        continue; /* the search's own is there */
      ant_rival_curve_init (&curve, rival->kind, rival->parameter, settings->bank.limb_darkening, &eclipse);
      for (int i = 0; i < SHAPE_POINTS; i++)
        ppm[i] = -rival->depth_ppm * ant_rival_curve_mean (&curve, dip->mid_d + hours[i] / ANT_HOURS_PER_DAY, exposure_d);
      data->shape[1 + drawn++] = (AntShapeLine) { ant_rival_title (ranking[r]), SHAPE_POINTS, hours, ppm };
    }
  return drawn;
}

/* The rotation curve is for looking only: what it leaves beside the dip is not quite zero, and the shape stands on
 * that. */
static void
level (AntCloseupData *data, const AntSettings *settings, const AntDip *dip, double exposure_d)
{
  gsize n = data->closeup.n;
  double *ppm = data->points + MOST_POINTS;
  AntCrossingShape shape;
  double edge_d = CLAMP (dip->edge_d, 1e-6 * dip->duration_d, dip->duration_d / 2);
  ant_crossing_shape_init (&shape, dip->duration_d, edge_d, ANT_SHAPE_IMPACT, settings->bank.limb_darkening);
  double above[MOST_POINTS];
  gsize n_above = 0;
  for (gsize i = 0; i < n; i++)
    if (isfinite (ppm[i]))
      above[n_above++] =
          ppm[i] + dip->depth_ppm * ant_crossing_shape_mean (&shape, data->points[i] / ANT_HOURS_PER_DAY, exposure_d);
  double median = ant_median (n_above, above, above);
  for (gsize i = 0; i < n && isfinite (median); i++)
    ppm[i] -= median;
}

static AntCloseupData *
data_new (void)
{
  AntCloseupData *data = g_new0 (AntCloseupData, 1);
  data->points = g_new (double, 3 * MOST_POINTS);
  data->curve = g_new (double, (2 + ANT_CLOSEUP_RIVALS) * SHAPE_POINTS);
  return data;
}

AntCloseupData *
ant_closeup_data_new (const AntLayers *layers, const AntSettings *settings, const AntDip *dip, const AntVerdict *verdict)
{
  const AntSeries *series = &layers->record->series;
  double exposure_d = layers->record->exposure_d > 0 ? layers->record->exposure_d : series->step_d;
  AntCloseupData *data = data_new ();
  double *hours = data->points, *ppm = hours + MOST_POINTS, *error = ppm + MOST_POINTS;
  gsize n = ant_dip_closeup_points (series->n, layers->residual_ppm, series->start_d, series->step_d, dip->mid_d,
                                    HALF_WIDTH * dip->duration_d, NAN, MOST_POINTS, hours, ppm, error);
  double half_h = dip->duration_d / 2 * ANT_HOURS_PER_DAY;
  data->closeup = (AntDipCloseup) { .n = n, .hours = hours, .ppm = ppm, .error_ppm = error, .n_shapes = 1,
                                    .shape = data->shape, .contact_h = { -half_h, half_h } };
  draw_shape (data, settings, dip, exposure_d);
  data->closeup.n_shapes += draw_rivals (data, settings, dip, verdict, exposure_d);
  level (data, settings, dip, exposure_d);
  return data;
}

/* Less the straight line through what is farther from the middle than half the dip. */
static void
straighten (gsize n, const double *hours, double half_h, double *ppm)
{
  double m = 0, t = 0, tt = 0, v = 0, tv = 0;
  for (gsize i = 0; i < n; i++)
    if (isfinite (ppm[i]) && fabs (hours[i]) > half_h)
      {
        m++;
        t += hours[i];
        tt += hours[i] * hours[i];
        v += ppm[i];
        tv += hours[i] * ppm[i];
      }
  double spread = tt * m - t * t, slope = m > 1 && spread > 0 ? (tv * m - t * v) / spread : 0, middle = m > 0 ? (v - slope * t) / m : 0;
  for (gsize i = 0; i < n; i++)
    ppm[i] -= middle + slope * hours[i];
}

void
ant_closeup_data_add_witness (AntCloseupData *data, const AntComparison *comparison, const AntDip *dip)
{
  g_free (data->other);
  data->other = g_new (double, 3 * MOST_POINTS);
  double *hours = data->other, *ppm = hours + MOST_POINTS, *error = ppm + MOST_POINTS;
  gsize n = ant_dip_closeup_points (comparison->n, comparison->witness_ppm, comparison->start_d, comparison->step_d, dip->mid_d,
                                    HALF_WIDTH * dip->duration_d, NAN, MOST_POINTS, hours, ppm, error);
  straighten (n, hours, dip->duration_d / 2 * ANT_HOURS_PER_DAY, ppm);
  data->witness = (struct AntDipCloseupWitness) { n, hours, ppm, error };
  data->closeup.witness = &data->witness;
}

/* The slow part at even steps through the close-up, as far as the record goes. */
static gsize
draw_slow (AntCloseupData *data, const AntScanResults *results, const AntDip *passage)
{
  const AntSeries *series = &results->record->series;
  double *hours = data->curve, *ppm = data->curve + SHAPE_POINTS;
  gsize n = 0;
  for (int i = 0; results->slow_ppm && i < SHAPE_POINTS; i++)
    {
      double time_d = PASSAGE_HALF_WIDTH * passage->duration_d * (2.0 * i / (SHAPE_POINTS - 1) - 1);
      double place = round (ant_series_place (series, passage->mid_d + time_d));
      if (!(place >= 0 && place < (double) series->n))
        continue;
      hours[n] = time_d * ANT_HOURS_PER_DAY;
      ppm[n++] = (double) results->slow_ppm[(gsize) place];
    }
  return n;
}

AntCloseupData *
ant_closeup_data_new_passage (const AntScanResults *results, const AntDip *passage)
{
  const AntSeries *series = &results->record->series;
  AntCloseupData *data = data_new ();
  double *hours = data->points, *ppm = hours + MOST_POINTS, *error = ppm + MOST_POINTS;
  gsize n = ant_dip_closeup_points (series->n, series->value_ppm, series->start_d, series->step_d, passage->mid_d,
                                    PASSAGE_HALF_WIDTH * passage->duration_d, NAN, MOST_POINTS, hours, ppm, error);
  double half_h = passage->duration_d / 2 * ANT_HOURS_PER_DAY;
  data->closeup = (AntDipCloseup) { .title = _("Irradiance, ppm"), .n = n, .hours = hours, .ppm = ppm,
                                    .error_ppm = error, .n_shapes = results->slow_ppm != NULL,
                                    .shape = data->shape, .contact_h = { -half_h, half_h } };
  data->shape[0] = (AntShapeLine) { _("slow part"), draw_slow (data, results, passage), data->curve,
                                    data->curve + SHAPE_POINTS };
  return data;
}

void
ant_closeup_data_free (AntCloseupData *data)
{
  if (!data)
    return;
  g_free (data->points);
  g_free (data->curve);
  g_free (data->other);
  g_free (data);
}
