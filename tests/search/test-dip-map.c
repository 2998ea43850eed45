/* test-dip-map.c - the map of dip SNR against dense algebra through the gaps of a low orbit, and the laws of its peaks. */
#include <glib.h>
#include <math.h>
#include "core/dense.h"
#include "core/units.h"
#include "models.h"
#include "planting.h"
#include "search/dip-map.h"

#define N 1500
#define LEAST_COVERAGE 0.3

typedef struct
{
  AntSeries series;
  AntNoiseModel model;
  float value[N];
  AntTemplateBank *bank;
  AntWhitener *whitener;
  double z[N];
  AntDipMap *map;
} Fixture;

static void
set_up (Fixture *f, gconstpointer data)
{
  AntStatus status;
  AntBankOptions options = ANT_BANK_OPTIONS_INIT;
  f->series = ant_study_record ('A', ANT_MASK_LOW_ORBIT, N, 60 / ANT_SECONDS_PER_DAY, 4101, f->value);
  ant_study_model ('A', &f->model);
  f->bank = ant_template_bank_new (&options, f->series.step_d, &status);
  f->whitener = ant_whitener_new (&f->model, &f->series, &status);
  g_assert_nonnull (f->whitener);
  g_assert_cmpint (ant_whitener_solve (f->whitener, f->value, f->z), ==, ANT_OK);
  f->map = ant_dip_map_new (f->bank, f->whitener, f->z, LEAST_COVERAGE, NULL, &status);
  g_assert_nonnull (f->map);
}

static void
tear_down (Fixture *f, gconstpointer data)
{
  ant_dip_map_free (f->map);
  ant_whitener_free (f->whitener);
  ant_template_bank_free (f->bank);
}

/* The covariance of the observed samples by the model's own formula, factored. */
static double *
dense_factor (const Fixture *f, const unsigned *place, size_t m)
{
  double *factor = g_new (double, m * m);
  for (size_t i = 0; i < m; i++)
    for (size_t j = 0; j < m; j++)
      factor[i * m + j] = ant_noise_model_covariance (&f->model, ((double) place[i] - (double) place[j]) * f->series.step_d)
                          + (i == j ? ant_noise_model_variance (&f->model, 0, 1) : 0);
  g_assert_cmpint (ant_cholesky (m, factor), ==, ANT_OK);
  return factor;
}

/* The template of a cell at the observed places; its covered fraction. */
static double
lay (const Fixture *f, size_t family, size_t start, size_t member, const unsigned *place, size_t m, double *s)
{
  const AntFamily *of = &f->bank->family[family];
  ptrdiff_t first = f->map->family[family].first_start + (ptrdiff_t) (start * of->stride);
  double whole = 0, seen = 0;
  for (size_t j = 0; j < of->member[member].length; j++)
    whole += of->shape[member / ANT_LANES][j * ANT_LANES + member % ANT_LANES];
  for (size_t i = 0; i < m; i++)
    {
      ptrdiff_t j = (ptrdiff_t) place[i] - first;
      s[i] = j >= 0 && j < (ptrdiff_t) of->member[member].length
               ? of->shape[member / ANT_LANES][(size_t) j * ANT_LANES + member % ANT_LANES] : 0;
      seen += s[i];
    }
  return seen / whole;
}

static void
random_cells_equal_dense_algebra (Fixture *f, gconstpointer data)
{
  AntRandom random;
  size_t m = ant_whitener_observed (f->whitener), good = 0, bare = 0;
  const unsigned *place = ant_whitener_places (f->whitener);
  double *factor = dense_factor (f, place, m), *s = g_new (double, 2 * m), *solved = s + m, worst = 0;
  ant_random_seed (&random, 4102, 1);
  for (int k = 0; k < 300; k++)
    {
      size_t family = ant_random_next (&random) % f->bank->n_families;
      const AntFamily *of = &f->bank->family[family];
      const AntFamilyMap *in = &f->map->family[family];
      size_t start = ant_random_next (&random) % in->n_starts, member = ant_random_next (&random) % 26;
      double coverage = lay (f, family, start, member, place, m, s), energy = 0, moment = 0;
      double snr = (double) in->snr[start * of->n_members + member];
      double sigma = (double) in->sigma_ppm[start * of->n_members + member];
      if (coverage < LEAST_COVERAGE)
        {
          g_assert_cmpfloat (snr, ==, 0);
          g_assert_true (isnan (sigma));
          bare++;
          continue;
        }
      ant_cholesky_solve (m, factor, s, solved);
      for (size_t i = 0; i < m; i++)
        {
          energy += s[i] * solved[i];
          moment += solved[i] * (double) f->value[place[i]];
        }
      worst = fmax (worst, fabs (snr - moment / sqrt (energy)));
      g_assert_cmpfloat_with_epsilon (sigma * sqrt (energy), 1, 1e-6);
      good++;
    }
  g_test_message ("%zu cells, %zu not covered, worst error of the SNR %.2g", good, bare, worst);
  g_assert_cmpuint (good, >, 150);
  g_assert_cmpuint (bare, >, 10);
  g_assert_cmpfloat (worst, <, 1e-6);
  g_free (factor);
  g_free (s);
}

/* A template that lies at more than two thirds on either side of the record is not judged, one at less is. */
static void
starts_reach_over_both_ends (Fixture *f, gconstpointer data)
{
  const AntFamily *family = &f->bank->family[0];
  size_t last = f->map->family[0].n_starts - 1;
  for (size_t m = 0; m < 26; m++)
    {
      double length = family->member[m].duration_d / f->series.step_d;
      g_assert_cmpfloat (ant_dip_map_centre (f->map, 0, 0, m), <, 0.2 * length);
      g_assert_cmpfloat (ant_dip_map_centre (f->map, 0, last, m), >, (double) N - 0.2 * length - (double) family->stride);
    }
}

static int
clash (const AntPeak *a, const AntPeak *b, double step_d)
{
  double apart_d = fabs (a->centre - b->centre) * step_d;
  return apart_d < 1.5 * a->duration_d || apart_d < 0.5 * (a->duration_d + b->duration_d);
}

static void
peaks_come_in_order_and_keep_their_distance (Fixture *f, gconstpointer data)
{
  AntPeak peak[100];
  for (int sign = 1; sign >= -1; sign -= 2)
    {
      size_t n = ant_dip_map_peaks (f->map, sign, 1.2, 0, NULL, 100, peak);
      g_test_message ("%zu peaks", n);
      g_assert_cmpuint (n, >, 4);
      for (size_t i = 0; i < n; i++)
        {
          g_assert_cmpfloat (sign * peak[i].snr, >=, 1.2);
          if (i)
            g_assert_cmpfloat (fabs (peak[i].snr), <=, fabs (peak[i - 1].snr));
          for (size_t j = 0; j < i; j++)
            g_assert_false (clash (&peak[j], &peak[i], f->series.step_d));
        }
    }
}

/* Whatever is above the cut and not listed lies within the reach of something stronger that is. */
static void
no_peak_is_forgotten (Fixture *f, gconstpointer data)
{
  AntPeak peak[100];
  size_t n = ant_dip_map_peaks (f->map, 1, 1.2, 0, NULL, 100, peak), looked_at = 0;
  for (size_t family = 0; family < f->bank->n_families; family++)
    for (size_t i = 0; i < f->map->family[family].n_starts * f->bank->family[family].n_members; i++)
      {
        size_t members = f->bank->family[family].n_members, member = i % members;
        double snr = (double) f->map->family[family].snr[i];
        if (snr < 1.2)
          continue;
        AntPeak here = { .snr = snr, .centre = ant_dip_map_centre (f->map, family, i / members, member),
                         .duration_d = f->bank->family[family].member[member].duration_d };
        int explained = 0;
        for (size_t k = 0; k < n && !explained; k++)
          explained = peak[k].snr >= snr && clash (&peak[k], &here, f->series.step_d);
        g_assert_true (explained);
        looked_at++;
      }
  g_assert_cmpuint (looked_at, >, 100);
}

static void
avoided_peaks_and_a_small_room_hold (Fixture *f, gconstpointer data)
{
  AntPeak all[100], less[100];
  size_t n = ant_dip_map_peaks (f->map, 1, 1.2, 0, NULL, 100, all);
  g_assert_cmpuint (ant_dip_map_peaks (f->map, 1, 1.2, 0, NULL, 2, less), ==, 2);
  for (int i = 0; i < 2; i++)
    g_assert_cmpfloat (less[i].centre, ==, all[i].centre);
  size_t left = ant_dip_map_peaks (f->map, 1, 1.2, 1, &all[0], 100, less);
  g_assert_cmpuint (left, >=, n - 1);
  for (size_t i = 0; i < left; i++)
    g_assert_false (clash (&all[0], &less[i], f->series.step_d));
}

static void
a_mirrored_record_has_mirrored_peaks (Fixture *f, gconstpointer data)
{
  AntPeak dips[100], brightenings[100];
  AntStatus status;
  double mirrored[N];
  for (size_t i = 0; i < N; i++)
    mirrored[i] = -f->z[i];
  AntDipMap *map = ant_dip_map_new (f->bank, f->whitener, mirrored, LEAST_COVERAGE, NULL, &status);
  size_t n = ant_dip_map_peaks (f->map, 1, 1.2, 0, NULL, 100, dips);
  g_assert_cmpuint (ant_dip_map_peaks (map, -1, 1.2, 0, NULL, 100, brightenings), ==, n);
  for (size_t i = 0; i < n; i++)
    {
      g_assert_cmpfloat (brightenings[i].snr, ==, -dips[i].snr);
      g_assert_cmpfloat (brightenings[i].centre, ==, dips[i].centre);
    }
  ant_dip_map_free (map);
}

/* The floor's figures against a plain loop over the same cells. */
static void
floor_sums_up_the_stretch_it_is_asked_for (Fixture *f, gconstpointer data)
{
  AntFloorPoint point[64];
  AntPeak avoid = { .centre = 700, .duration_d = 1 / 24.0 };
  const AntFamily *family = &f->bank->family[0];
  size_t n = ant_dip_map_floor (f->map, 200, 1400, 1, &avoid, 64, point);
  g_assert_cmpuint (n, ==, 26);
  for (size_t m = 0; m < n; m++)
    {
      double sum = 0, squares = 0, smallest = HUGE_VAL, largest = 0;
      size_t count = 0;
      for (size_t i = 0; i < f->map->family[0].n_starts; i++)
        {
          AntPeak here = { .centre = ant_dip_map_centre (f->map, 0, i, m), .duration_d = family->member[m].duration_d };
          double sigma = (double) f->map->family[0].sigma_ppm[i * family->n_members + m];
          if (here.centre < 200 || here.centre >= 1400 || isnan (sigma) || clash (&avoid, &here, f->series.step_d))
            continue;
          double snr = (double) f->map->family[0].snr[i * family->n_members + m];
          sum += snr;
          squares += snr * snr;
          smallest = fmin (smallest, sigma);
          largest = fmax (largest, sigma);
          count++;
        }
      g_assert_cmpuint (count, >, 5);
      g_assert_cmpuint (point[m].starts, ==, count);
      g_assert_cmpfloat (point[m].duration_d, ==, family->member[m].duration_d);
      g_assert_cmpfloat_with_epsilon (point[m].snr_mean, sum / (double) count, 1e-12);
      g_assert_cmpfloat_with_epsilon (point[m].snr_sd, sqrt (squares / (double) count), 1e-12);
      g_assert_cmpfloat (point[m].sigma_ppm, >=, smallest);
      g_assert_cmpfloat (point[m].sigma_ppm, <=, largest);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add ("/search/dip-map/" path, Fixture, NULL, set_up, function, tear_down)
  TEST ("random-cells-equal-dense-algebra", random_cells_equal_dense_algebra);
  TEST ("starts-reach-over-both-ends", starts_reach_over_both_ends);
  TEST ("peaks-come-in-order-and-keep-their-distance", peaks_come_in_order_and_keep_their_distance);
  TEST ("no-peak-is-forgotten", no_peak_is_forgotten);
  TEST ("avoided-peaks-and-a-small-room-hold", avoided_peaks_and_a_small_room_hold);
  TEST ("a-mirrored-record-has-mirrored-peaks", a_mirrored_record_has_mirrored_peaks);
  TEST ("floor-sums-up-the-stretch-it-is-asked-for", floor_sums_up_the_stretch_it_is_asked_for);
  return g_test_run ();
}
