/* test-asked.c - measuring one dip that is asked about: unbiased, not bent by the dip itself, refused where there is no data. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "models.h"
#include "planting.h"

#define STEP_D (300 / ANT_SECONDS_PER_DAY)
#define N ((size_t) (12 / STEP_D))
#define SEEDS 40
#define SHAPE_SEEDS 16

static const Planted crossing = { 5.96, 6, 20, ANT_SHAPE_IMPACT, 150 }; /* of a sigma of 10 to 20 ppm */
static const AntScanOptions options = ANT_SCAN_OPTIONS_INIT;

/* Pulls of the planted depth over many records: mean 0 and scatter 1 within what 40 of them tell. */
static void
the_depth_is_unbiased (void)
{
  float *value = g_new (float, N);
  double sum = 0, squares = 0;
  for (unsigned long seed = 0, measured = 0; measured < SEEDS; seed++)
    {
      AntDip dip;
      AntSeries series = ant_study_record ('C', ANT_MASK_LOW_ORBIT, N, STEP_D, 8100 + seed, value);
      plant (&series, &crossing, value);
      AntStatus status = ant_scan_asked (&series, &options, crossing.mid_d, crossing.t14_h / 24, &dip);
      g_assert_cmpuint (seed, <, 2 * SEEDS);
      if (status == ANT_NO_DATA) /* the mask's gap of days fell on it */
        continue;
      g_assert_cmpint (status, ==, ANT_OK);
      double pull = (dip.depth_ppm - crossing.depth_ppm) / dip.depth_sigma_ppm;
      sum += pull / SEEDS;
      squares += pull * pull / SEEDS;
      measured++;
    }
  g_free (value);
  g_test_message ("mean pull %.2f, scatter %.2f", sum, sqrt (squares));
  g_assert_cmpfloat_with_epsilon (sum, 0, 3 / sqrt (SEEDS));
  g_assert_cmpfloat_with_epsilon (sqrt (squares), 1, 3 / sqrt (2.0 * SEEDS));
}

/* The dip is masked while the noise is fitted: a hundred times deeper, it is measured under the same noise. */
static void
a_deep_dip_does_not_widen_its_own_error (void)
{
  float *value = g_new (float, N);
  AntDip shallow, deep;
  Planted added = crossing;
  AntSeries series = ant_study_record ('C', ANT_MASK_L1, N, STEP_D, 8200, value);
  g_assert_cmpint (ant_scan_asked (&series, &options, crossing.mid_d, 0.25, &shallow), ==, ANT_OK);
  added.depth_ppm = 15000;
  plant (&series, &added, value);
  g_assert_cmpint (ant_scan_asked (&series, &options, crossing.mid_d, 0.25, &deep), ==, ANT_OK);
  g_assert_cmpfloat_with_epsilon (deep.depth_sigma_ppm / shallow.depth_sigma_ppm, 1, 0.02);
  g_assert_cmpfloat_with_epsilon (deep.depth_ppm - shallow.depth_ppm, 15000, 0.5 * shallow.depth_sigma_ppm);
  g_free (value);
}

/* A deep crossing three days away is set aside, so that it neither bends the noise nor the depth. */
static void
a_deep_dip_elsewhere_does_no_harm (void)
{
  float *value = g_new (float, N);
  AntDip alone, beside;
  Planted other = crossing;
  AntSeries series = ant_study_record ('C', ANT_MASK_L1, N, STEP_D, 8300, value);
  plant (&series, &crossing, value);
  g_assert_cmpint (ant_scan_asked (&series, &options, crossing.mid_d, 0.25, &alone), ==, ANT_OK);
  other.mid_d += 3;
  other.depth_ppm = 5000;
  plant (&series, &other, value);
  g_assert_cmpint (ant_scan_asked (&series, &options, crossing.mid_d, 0.25, &beside), ==, ANT_OK);
  g_test_message ("depth %.1f +- %.1f alone, %.1f +- %.1f beside", alone.depth_ppm, alone.depth_sigma_ppm, beside.depth_ppm,
                  beside.depth_sigma_ppm);
  g_assert_cmpfloat_with_epsilon (beside.depth_sigma_ppm / alone.depth_sigma_ppm, 1, 0.1);
  g_assert_cmpfloat_with_epsilon (beside.depth_ppm, alone.depth_ppm, alone.depth_sigma_ppm);
  g_free (value);
}

static void
what_is_told_is_what_was_asked (void)
{
  float *value = g_new (float, N);
  AntDip dip;
  AntSeries series = ant_study_record ('C', ANT_MASK_L1, N, STEP_D, 8300, value);
  series.start_d = 100;
  g_assert_cmpint (ant_scan_asked (&series, &options, 104.5, 0.2, &dip), ==, ANT_OK);
  g_assert_cmpfloat_with_epsilon (dip.mid_d, 104.5, 1e-9);
  g_assert_cmpfloat (dip.duration_d, ==, 0.2);
  g_assert_cmpfloat_with_epsilon (dip.snr * dip.depth_sigma_ppm, dip.depth_ppm, 1e-9);
  g_assert_true (isnan (dip.expected_false));
  g_assert_cmpfloat (dip.coverage, >, 0.9);
  g_free (value);
}

static void
what_was_not_observed_is_refused (void)
{
  float *value = g_new (float, N);
  AntDip dip;
  AntSeries series = ant_study_record ('C', ANT_MASK_L1, N, STEP_D, 8400, value);
  for (size_t i = 0; i < N; i++)
    if (fabs ((double) i * STEP_D - 6) < 0.2)
      value[i] = NAN;
  g_assert_cmpint (ant_scan_asked (&series, &options, 6, 0.25, &dip), ==, ANT_NO_DATA);
  g_assert_cmpint (ant_scan_asked (&series, &options, -3, 0.25, &dip), ==, ANT_BAD_ARGUMENT);
  g_assert_cmpint (ant_scan_asked (&series, &options, 13, 0.25, &dip), ==, ANT_BAD_ARGUMENT);
  g_assert_cmpint (ant_scan_asked (&series, &options, 6, 0, &dip), ==, ANT_BAD_ARGUMENT);
  g_free (value);
}

/* Two of five days of a long record asked about: only a chunk around the time is fitted, wherever it lies. */
static void
a_long_record_is_asked_at_its_ends_too (void)
{
  size_t n = (size_t) (300 / (1800 / ANT_SECONDS_PER_DAY));
  float *value = g_new (float, n);
  AntSeries series = ant_study_record ('C', ANT_MASK_L1, n, 1800 / ANT_SECONDS_PER_DAY, 8500, value);
  const double mids_d[] = { 1, 150, 298.5 };
  for (size_t k = 0; k < G_N_ELEMENTS (mids_d); k++)
    {
      AntDip dip;
      Planted planted = { mids_d[k], 8, 30, ANT_SHAPE_IMPACT, 500 };
      plant (&series, &planted, value);
      g_assert_cmpint (ant_scan_asked (&series, &options, mids_d[k], 8 / 24.0, &dip), ==, ANT_OK);
      g_assert_cmpfloat_with_epsilon (dip.mid_d, mids_d[k], 1e-9);
      g_assert_cmpfloat_with_epsilon (dip.depth_ppm, 500, 3 * dip.depth_sigma_ppm);
    }
  g_free (value);
}

/* A known shape, here one that no crossing has: a ramp over six hours, of which only the depth is free. */
static void
the_depth_of_a_known_shape_is_unbiased (void)
{
  size_t n = (size_t) (0.25 / STEP_D);
  ptrdiff_t first = (ptrdiff_t) (N / 2);
  float *value = g_new (float, N);
  double *loss = g_new (double, n), sum = 0, squares = 0, sigma = 0;
  for (size_t i = 0; i < n; i++)
    loss[i] = (double) (i + 1) / (double) n;
  for (unsigned long seed = 0, measured = 0; measured < SHAPE_SEEDS; seed++)
    {
      AntAmplitude found;
      AntSeries series = ant_study_record ('C', ANT_MASK_LOW_ORBIT, N, STEP_D, 8600 + seed, value);
      for (size_t i = 0; i < n; i++)
        value[(size_t) first + i] -= (float) (120 * loss[i]);
      AntStatus status = ant_scan_asked_shape (&series, &options, first, n, loss, &found);
      g_assert_cmpuint (seed, <, 2 * SHAPE_SEEDS);
      if (status == ANT_NO_DATA)
        continue;
      g_assert_cmpint (status, ==, ANT_OK);
      g_assert_cmpfloat_with_epsilon (found.snr * found.sigma_ppm, found.depth_ppm, 1e-9);
      double pull = (found.depth_ppm - 120) / found.sigma_ppm;
      sum += pull / SHAPE_SEEDS;
      squares += pull * pull / SHAPE_SEEDS;
      sigma = found.sigma_ppm;
      measured++;
    }
  g_test_message ("mean pull %.2f, scatter %.2f, sigma about %.1f ppm", sum, sqrt (squares), sigma);
  g_assert_cmpfloat_with_epsilon (sum, 0, 3 / sqrt (SHAPE_SEEDS));
  g_assert_cmpfloat_with_epsilon (sqrt (squares), 1, 3 / sqrt (2.0 * SHAPE_SEEDS));
  g_free (loss);
  g_free (value);
}

/* Half of the shape's light falls into a gap or beside the record: the observed part is told, measured or not. */
static void
the_observed_part_of_a_shape_is_told (void)
{
  enum { LENGTH = 60 };
  double loss[LENGTH];
  float *value = g_new (float, N);
  AntAmplitude found;
  AntSeries series = ant_study_record ('C', ANT_MASK_L1, N, STEP_D, 8700, value);
  for (size_t i = 0; i < LENGTH; i++)
    {
      loss[i] = 1;
      value[1000 + i] = i < 30 ? NAN : isfinite (value[1000 + i]) ? value[1000 + i] : 0;
      value[2000 + i] = NAN;
    }
  g_assert_cmpint (ant_scan_asked_shape (&series, &options, 1000, LENGTH, loss, &found), ==, ANT_OK);
  g_assert_cmpfloat_with_epsilon (found.coverage, 0.5, 1e-12);
  g_assert_cmpint (ant_scan_asked_shape (&series, &options, 2000 - 6, LENGTH, loss, &found), ==, ANT_NO_DATA);
  g_assert_cmpfloat (found.coverage, <=, 0.1 + 1e-12);
  g_assert_true (isnan (found.depth_ppm));
  g_assert_cmpint (ant_scan_asked_shape (&series, &options, -LENGTH - 5, LENGTH, loss, &found), ==, ANT_NO_DATA);
  g_assert_cmpfloat (found.coverage, ==, 0);
  g_assert_cmpint (ant_scan_asked_shape (&series, &options, 100, 0, loss, &found), ==, ANT_BAD_ARGUMENT);
  g_free (value);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add_func ("/search/asked/" path, function)
  TEST ("the-depth-is-unbiased", the_depth_is_unbiased);
  TEST ("the-depth-of-a-known-shape-is-unbiased", the_depth_of_a_known_shape_is_unbiased);
  TEST ("the-observed-part-of-a-shape-is-told", the_observed_part_of_a_shape_is_told);
  g_test_add_func ("/search/asked/a-deep-dip-elsewhere-does-no-harm", a_deep_dip_elsewhere_does_no_harm);
  TEST ("a-deep-dip-does-not-widen-its-own-error", a_deep_dip_does_not_widen_its_own_error);
  TEST ("what-is-told-is-what-was-asked", what_is_told_is_what_was_asked);
  TEST ("what-was-not-observed-is-refused", what_was_not_observed_is_refused);
  TEST ("a-long-record-is-asked-at-its-ends-too", a_long_record_is_asked_at_its_ends_too);
  return g_test_run ();
}
