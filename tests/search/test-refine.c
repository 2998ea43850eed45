/* test-refine.c - the climb from a template to the crossing: planted shapes come back, and no climb ends lower than it began. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "models.h"
#include "noise/surrogate.h"
#include "planting.h"
#include "search/refine.h"

#define N 2880
#define STEP_D (60 / ANT_SECONDS_PER_DAY)

static const AntRefineOptions options = { .step_d = STEP_D, .exposure_d = STEP_D, .limb_darkening = { 0.40, 0.19 },
                                          .shortest_d = 0.5 / 24, .longest_d = 15 / 24.0,
                                          .least_edge_d = 4 / ANT_MINUTES_PER_DAY };

typedef struct
{
  AntSeries series;
  float value[N];
  double z[N];
  AntWhitener *whitener;
} Fixture;

static void
set_up (Fixture *f, gconstpointer data)
{
  AntStatus status;
  AntNoiseModel model;
  f->series = ant_study_record ('A', ANT_MASK_L1, N, STEP_D, 5201, f->value);
  ant_study_model ('A', &model);
  f->whitener = ant_whitener_new (&model, &f->series, &status);
  g_assert_nonnull (f->whitener);
}

static void
tear_down (Fixture *f, gconstpointer data)
{
  ant_whitener_free (f->whitener);
}

static void
clear_noise (Fixture *f)
{
  for (size_t i = 0; i < N; i++)
    if (!isnan (f->value[i]))
      f->value[i] = 0;
}

static void
a_crossing_without_noise_comes_back_whole (Fixture *f, gconstpointer data)
{
  static const Planted crossings[] = { { 1, 2.3, 14, 0.3, 200 }, { 1.003, 6.1, 9, 0.3, 500 }, { 0.9, 11.4, 30, 0.3, 100 },
                                       { 1.1, 4.7, 70, 0.3, -300 } };
  for (size_t k = 0; k < G_N_ELEMENTS (crossings); k++)
    {
      const Planted *planted = &crossings[k];
      int sign = planted->depth_ppm > 0 ? 1 : -1;
      AntShapeFit fit;
      clear_noise (f);
      plant (&f->series, planted, f->value);
      g_assert_cmpint (ant_whitener_solve (f->whitener, f->value, f->z), ==, ANT_OK);
      AntPeak peak = { .centre = planted->mid_d / STEP_D + 8, .duration_d = (planted->t14_h + 0.25) / 24,
                       .edge_d = 20 / ANT_MINUTES_PER_DAY };
      g_assert_cmpint (ant_refine (f->whitener, f->z, &peak, sign, &options, &fit), ==, ANT_OK);
      g_test_message ("middle off by %.2f min, T14 by %.2f min, edge %.1f for %.1f min, depth ratio %.4f",
                      (fit.centre * STEP_D - planted->mid_d) * ANT_MINUTES_PER_DAY,
                      fit.duration_d * ANT_MINUTES_PER_DAY - planted->t14_h * 60, fit.edge_d * ANT_MINUTES_PER_DAY,
                      planted->ingress_min, fit.depth_ppm / planted->depth_ppm);
      g_assert_cmpfloat_with_epsilon (fit.centre * STEP_D * ANT_MINUTES_PER_DAY, planted->mid_d * ANT_MINUTES_PER_DAY, 0.5);
      g_assert_cmpfloat_with_epsilon (fit.duration_d * ANT_MINUTES_PER_DAY, planted->t14_h * 60, 2);
      g_assert_cmpfloat_with_epsilon (fit.edge_d * ANT_MINUTES_PER_DAY / planted->ingress_min, 1, 0.1);
      g_assert_cmpfloat_with_epsilon (fit.depth_ppm / planted->depth_ppm, 1, 5e-3);
      g_assert_cmpfloat (fit.snr * sign, >, 0);
      g_assert_cmpfloat_with_epsilon (fit.snr * fit.sigma_ppm, fit.depth_ppm, 1e-9);
    }
}

static void
a_climb_never_ends_below_its_start (Fixture *f, gconstpointer data)
{
  AntRandom random;
  ant_random_seed (&random, 5202, 1);
  g_assert_cmpint (ant_whitener_solve (f->whitener, f->value, f->z), ==, ANT_OK);
  for (int k = 0; k < 40; k++)
    {
      double t14_h = 0.5 + 0.5 * (double) (ant_random_next (&random) % 26);
      AntPeak peak = { .centre = 300 + 2200 * ant_random_uniform (&random), .duration_d = t14_h / 24,
                       .edge_d = fmin (20 / ANT_MINUTES_PER_DAY, 0.4 * t14_h / 24) };
      AntShapeFit start = { .centre = peak.centre, .duration_d = peak.duration_d, .edge_d = peak.edge_d,
                            .impact = ANT_SHAPE_IMPACT }, fit;
      g_assert_cmpint (ant_measure (f->whitener, f->z, &options, &start), ==, ANT_OK);
      int sign = start.snr > 0 ? 1 : -1;
      g_assert_cmpint (ant_refine (f->whitener, f->z, &peak, sign, &options, &fit), ==, ANT_OK);
      g_assert_cmpfloat (sign * fit.snr, >=, sign * start.snr - 1e-9);
      g_assert_cmpfloat (fit.duration_d, >=, options.shortest_d);
      g_assert_cmpfloat (fit.duration_d, <=, options.longest_d);
      g_assert_cmpfloat (fit.edge_d, >=, options.least_edge_d);
      g_assert_cmpfloat (fit.edge_d, <=, 0.5 * fit.duration_d);
      g_assert_cmpfloat (fabs (fit.centre - peak.centre) * STEP_D, <=, 0.5 * peak.duration_d + peak.edge_d + 1e-12);
    }
}

static void
a_mirrored_record_gives_the_mirrored_fit (Fixture *f, gconstpointer data)
{
  AntShapeFit dip, brightening;
  AntPeak peak = { .centre = 1400, .duration_d = 5 / 24.0, .edge_d = 20 / ANT_MINUTES_PER_DAY };
  g_assert_cmpint (ant_whitener_solve (f->whitener, f->value, f->z), ==, ANT_OK);
  g_assert_cmpint (ant_refine (f->whitener, f->z, &peak, 1, &options, &dip), ==, ANT_OK);
  for (size_t i = 0; i < N; i++)
    f->z[i] = -f->z[i];
  g_assert_cmpint (ant_refine (f->whitener, f->z, &peak, -1, &options, &brightening), ==, ANT_OK);
  g_assert_cmpfloat (brightening.centre, ==, dip.centre);
  g_assert_cmpfloat (brightening.duration_d, ==, dip.duration_d);
  g_assert_cmpfloat (brightening.depth_ppm, ==, -dip.depth_ppm);
  g_assert_cmpfloat (brightening.snr, ==, -dip.snr);
}

/* 60 draws of the noise on one crossing of SNR 30 or so: the middle's scatter is the formal error, within its own
 * sampling error. */
static void
formal_errors_are_the_scatter (Fixture *f, gconstpointer data)
{
  enum { DRAWS = 60 };
  Planted planted = { 1, 6, 20, 0.3, 900 };
  double middle = 0, duration = 0;
  float *value = g_new (float, N);
  for (int k = 0; k < DRAWS; k++)
    {
      AntShapeFit fit;
      AntSeries series = { .n = N, .step_d = STEP_D, .value_ppm = value };
      AntRandom random;
      AntNoiseModel model;
      AntStatus status;
      ant_study_model ('C', &model);
      ant_random_seed (&random, 5300, (uint64_t) k);
      for (size_t i = 0; i < N; i++)
        value[i] = 0;
      ant_surrogate_draw (&model, &series, &random, value);
      plant (&series, &planted, value);
      AntWhitener *whitener = ant_whitener_new (&model, &series, &status);
      g_assert_cmpint (ant_whitener_solve (whitener, value, f->z), ==, ANT_OK);
      AntPeak peak = { .centre = 1 / STEP_D, .duration_d = 6 / 24.0, .edge_d = 20 / ANT_MINUTES_PER_DAY };
      g_assert_cmpint (ant_refine (whitener, f->z, &peak, 1, &options, &fit), ==, ANT_OK);
      middle += pow ((fit.centre * STEP_D - planted.mid_d) / fit.mid_sigma_d, 2) / DRAWS;
      duration += pow ((fit.duration_d - planted.t14_h / 24) / fit.duration_sigma_d, 2) / DRAWS;
      ant_whitener_free (whitener);
    }
  g_free (value);
  g_test_message ("scatter over formal error: middle %.2f, duration %.2f", sqrt (middle), sqrt (duration));
  g_assert_cmpfloat_with_epsilon (sqrt (middle), 1, 3 / sqrt (2.0 * DRAWS));
  g_assert_cmpfloat_with_epsilon (sqrt (duration), 1, 3 / sqrt (2.0 * DRAWS));
}

static void
coverage_and_edges_say_what_was_seen (Fixture *f, gconstpointer data)
{
  AntNoiseModel model;
  AntStatus status;
  ant_study_model ('A', &model);
  for (size_t i = 0; i < N; i++)
    f->value[i] = i >= 1000 && i < 1300 ? NAN : 0; /* the first part of a crossing at 1440 +- 180 */
  AntWhitener *whitener = ant_whitener_new (&model, &f->series, &status);
  g_assert_cmpint (ant_whitener_solve (whitener, f->value, f->z), ==, ANT_OK);
  AntShapeFit fit = { .centre = 1440, .duration_d = 0.25, .edge_d = 20 / ANT_MINUTES_PER_DAY, .impact = ANT_SHAPE_IMPACT };
  g_assert_cmpint (ant_measure (whitener, f->z, &options, &fit), ==, ANT_OK);
  g_assert_cmpint (fit.edges, ==, ANT_EDGES_EGRESS);
  double lost = 0, whole = 0;
  for (int i = 1250; i < 1640; i++)
    {
      double loss = planted_mean (&(Planted){ 0, 6, 20, ANT_SHAPE_IMPACT, 1 }, (i - 1440) * STEP_D, STEP_D, 40);
      whole += loss;
      lost += i < 1300 ? loss : 0;
    }
  g_assert_cmpfloat_with_epsilon (fit.coverage, 1 - lost / whole, 1e-4);
  fit.centre = 860;
  g_assert_cmpint (ant_measure (whitener, f->z, &options, &fit), ==, ANT_OK);
  g_assert_cmpint (fit.edges, ==, ANT_EDGES_INGRESS);
  fit.centre = 2000;
  g_assert_cmpint (ant_measure (whitener, f->z, &options, &fit), ==, ANT_OK);
  g_assert_cmpint (fit.edges, ==, ANT_EDGES_BOTH);
  g_assert_cmpfloat_with_epsilon (fit.coverage, 1, 1e-9);
  ant_whitener_free (whitener);
  for (size_t i = 2150; i < 2200; i++)
    f->value[i] = f->value[i - 350] = NAN; /* both ends of the crossing at 2000 +- 180 */
  whitener = ant_whitener_new (&model, &f->series, &status);
  g_assert_cmpint (ant_whitener_solve (whitener, f->value, f->z), ==, ANT_OK);
  g_assert_cmpint (ant_measure (whitener, f->z, &options, &fit), ==, ANT_OK);
  g_assert_cmpint (fit.edges, ==, ANT_EDGES_NONE);
  ant_whitener_free (whitener);
}

static void
a_place_with_no_data_is_refused (Fixture *f, gconstpointer data)
{
  AntShapeFit fit = { .centre = -1000, .duration_d = 0.1, .edge_d = 0.01, .impact = ANT_SHAPE_IMPACT };
  g_assert_cmpint (ant_whitener_solve (f->whitener, f->value, f->z), ==, ANT_OK);
  g_assert_cmpint (ant_measure (f->whitener, f->z, &options, &fit), ==, ANT_NO_DATA);
}

/* The definitions every table prints, from the transit curve itself. */
static void
a_fit_becomes_a_dip_by_the_printed_definitions (Fixture *f, gconstpointer data)
{
  AntShapeFit fit = { .centre = 1440, .duration_d = 0.25, .edge_d = 20 / ANT_MINUTES_PER_DAY, .impact = ANT_SHAPE_IMPACT,
                      .depth_ppm = 800, .sigma_ppm = 40, .snr = 20, .coverage = 1, .edges = ANT_EDGES_BOTH };
  Planted planted = { 0, 6, 20, ANT_SHAPE_IMPACT, 1 };
  AntDip dip;
  ant_shape_fit_to_dip (&fit, &options, 100, &dip);
  g_assert_cmpfloat_with_epsilon (dip.mid_d, 101, 1e-9);
  g_assert_cmpfloat_with_epsilon (dip.mean_depth_ppm / (800 * planted_mean (&planted, 0, 0.25, 20000)), 1, 1e-4);
  AntCrossing crossing = { .radius_ratio = dip.radius_ratio, .impact = ANT_SHAPE_IMPACT, .t14_d = 0.25 };
  g_assert_cmpfloat_with_epsilon (ant_crossing_loss (&crossing, options.limb_darkening, 0) * 1e6, 800, 1e-4);
  fit.depth_ppm = -800;
  ant_shape_fit_to_dip (&fit, &options, 100, &dip);
  g_assert_cmpfloat (dip.mean_depth_ppm, <, 0);
  g_assert_true (isnan (dip.radius_ratio));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add ("/search/refine/" path, Fixture, NULL, set_up, function, tear_down)
  TEST ("a-crossing-without-noise-comes-back-whole", a_crossing_without_noise_comes_back_whole);
  TEST ("a-climb-never-ends-below-its-start", a_climb_never_ends_below_its_start);
  TEST ("a-mirrored-record-gives-the-mirrored-fit", a_mirrored_record_gives_the_mirrored_fit);
  TEST ("formal-errors-are-the-scatter", formal_errors_are_the_scatter);
  TEST ("coverage-and-edges-say-what-was-seen", coverage_and_edges_say_what_was_seen);
  TEST ("a-place-with-no-data-is-refused", a_place_with_no_data_is_refused);
  TEST ("a-fit-becomes-a-dip-by-the-printed-definitions", a_fit_becomes_a_dip_by_the_printed_definitions);
  return g_test_run ();
}
