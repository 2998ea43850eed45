/* layers.c - prepare a record for drawing. */
#include "jobs/layers.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/error.h"
#include "noise/rotation-curve.h"

const double ant_average_lengths_d[ANT_N_AVERAGES] = { 10 / ANT_MINUTES_PER_DAY, 1 / ANT_HOURS_PER_DAY,
                                                       6 / ANT_HOURS_PER_DAY, 1 };

static void
mask_dips (const AntSeries *series, gsize n, const AntDip *dip, guint8 *masked)
{
  for (gsize d = 0; d < n; d++)
    {
      double half_d = dip[d].duration_d / 2;
      double from = fmax (ceil (ant_series_place (series, dip[d].mid_d - half_d)), 0);
      double to = fmin (ant_series_place (series, dip[d].mid_d + half_d), (double) series->n - 1);
      for (double place = from; place <= to; place++)
        masked[(gsize) place] = 1;
    }
}

static gboolean
draw_curve (AntLayers *layers, const AntSettings *settings, const AntScanResults *results, GError **error)
{
  const AntSeries *series = &layers->record->series;
  AntRotationOptions options = { settings->rotation_window_d, (int) settings->rotation_harmonics };
  g_autofree guint8 *masked = results ? g_new0 (guint8, series->n) : NULL;
  if (results)
    {
      mask_dips (series, results->n_dips, results->dip, masked);
      mask_dips (series, results->n_brightenings, results->brightening, masked);
    }
  layers->curve_ppm = g_new (float, series->n);
  layers->residual_ppm = g_new (float, series->n);
  if (!ant_status_to_error (ant_rotation_curve (series, masked, &options, layers->curve_ppm),
                            _("drawing the rotation curve"), error))
    return FALSE;
  for (gsize i = 0; i < series->n; i++)
    layers->residual_ppm[i] = series->value_ppm[i] - layers->curve_ppm[i];
  return TRUE;
}

static void
average (AntLayers *layers)
{
  const AntSeries *series = &layers->record->series;
  for (guint i = 0; i < ANT_N_AVERAGES; i++)
    {
      gsize bin = (gsize) fmax (1, round (ant_average_lengths_d[i] / series->step_d));
      layers->value_averages[i] = ant_averages_new (series->n, series->value_ppm, bin);
      layers->residual_averages[i] = ant_averages_new (series->n, layers->residual_ppm, bin);
    }
}

AntLayers *
ant_layers_new (AntRecord *record, const AntSettings *settings, const AntScanResults *results, const AntLayers *earlier,
                GError **error)
{
  g_autoptr (AntLayers) layers = g_new0 (AntLayers, 1);
  layers->ref_count = 1;
  layers->record = ant_record_ref (record);
  if (earlier)
    layers->summary = earlier->summary;
  else
    ant_record_summarise (record, TRUE, &layers->summary);
  if (!draw_curve (layers, settings, results, error))
    return NULL;
  layers->values = ant_pyramid_new (record->series.n, record->series.value_ppm);
  layers->residual = ant_pyramid_new (record->series.n, layers->residual_ppm);
  average (layers);
  return g_steal_pointer (&layers);
}

AntLayers *
ant_layers_ref (AntLayers *layers)
{
  g_atomic_int_inc (&layers->ref_count);
  return layers;
}

void
ant_layers_unref (AntLayers *layers)
{
  if (!layers || !g_atomic_int_dec_and_test (&layers->ref_count))
    return;
  ant_pyramid_free (layers->values);
  ant_pyramid_free (layers->residual);
  for (guint i = 0; i < ANT_N_AVERAGES; i++)
    {
      ant_averages_free (layers->value_averages[i]);
      ant_averages_free (layers->residual_averages[i]);
    }
  g_free (layers->curve_ppm);
  g_free (layers->residual_ppm);
  ant_record_unref (layers->record);
  g_free (layers);
}
