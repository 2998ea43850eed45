/* test-fold-data.c - a fold shows what was planted, and every event once. */
#include <glib.h>
#include <math.h>

#include "jobs/fold-data.h"

#define N 4000
#define STEP_D 0.01
#define PERIOD_D 3.7
#define EPOCH_D 12.4

/* Layers of a record that is nothing but dips: what a fold reads of them. */
static AntLayers *
make_layers (float *residual)
{
  AntLayers *layers = g_new0 (AntLayers, 1);
  layers->record = ant_record_new ();
  layers->record->series = (AntSeries) { .n = N, .step_d = STEP_D, .value_ppm = residual };
  layers->residual_ppm = residual;
  for (int i = 0; i < N; i++)
    {
      double t = i * STEP_D - EPOCH_D;
      t -= PERIOD_D * floor (t / PERIOD_D + 0.5);
      residual[i] = i > 1000 && i < 1100 ? NAN : fabs (t) < 0.12 ? -80 : 20;
    }
  return layers;
}

static void
free_layers (AntLayers *layers)
{
  layers->record->series = (AntSeries) { 0 };
  ant_record_unref (layers->record);
  g_free (layers);
}

static void
test_fold (void)
{
  g_autofree float *residual = g_new (float, N);
  AntLayers *layers = make_layers (residual);
  AntSettings settings;
  ant_settings_init (&settings);
  AntFold fold = { .period_d = PERIOD_D, .epoch_d = EPOCH_D, .duration_d = 0.25, .depth_ppm = NAN };
  AntFoldData *data = ant_fold_data_new (layers, &settings, &fold);
  double deepest = 0;
  g_assert_cmpuint (data->closeup.n, >, 40);
  for (gsize i = 0; i < data->closeup.n; i++)
    {
      if (fabs (data->closeup.hours[i]) < 2.5)
        g_assert_cmpfloat (fabs (data->closeup.ppm[i] + 100), <, 1e-3); /* below the level beside it */
      if (fabs (data->closeup.hours[i]) > 3.2)
        g_assert_cmpfloat (fabs (data->closeup.ppm[i]), <, 1e-3);
    }
  for (gsize i = 0; i < data->shape[0].n; i++)
    deepest = fmin (deepest, data->shape[0].ppm[i]);
  g_assert_cmpfloat (deepest, <, -95);
  g_assert_cmpfloat (deepest, >, -125);
  ant_fold_data_free (data);
  free_layers (layers);
}

static void
test_events (void)
{
  g_autofree float *residual = g_new (float, N);
  AntLayers *layers = make_layers (residual);
  AntSettings settings;
  ant_settings_init (&settings);
  AntFold fold = { .period_d = PERIOD_D, .epoch_d = EPOCH_D, .duration_d = 0.25, .depth_ppm = 100 };
  AntFoldData *data = ant_fold_data_new (layers, &settings, &fold);
  g_assert_cmpuint (data->strips.n, ==, 11); /* 1.3, 5.0, ... 38.3 */
  for (gsize i = 0; i < data->strips.n; i++)
    {
      g_assert_cmpfloat (fabs (data->mid_d[i] - (1.3 + PERIOD_D * (double) i)), <, 1e-9);
      g_assert_cmpuint (data->strip[i].n, >, 0);
    }
  ant_fold_data_free (data);
  free_layers (layers);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/jobs/fold-data/a-fold-shows-what-was-planted", test_fold);
  g_test_add_func ("/jobs/fold-data/every-event-stands-once", test_events);
  return g_test_run ();
}
