/* test-chunk-fit.c - the noise of one chunk: what is called a spike and what is not, and whether the fit tells the truth. */
#include <glib.h>
#include <math.h>
#include <stdlib.h>
#include "core/robust.h"
#include "core/units.h"
#include "models.h"
#include "planting.h"
#include "noise/whitener.h"
#include "search/chunk.h"
#include "search/crossing-shape.h"

#define STEP_D (120 / ANT_SECONDS_PER_DAY)
#define N ((size_t) (12 / STEP_D))

typedef struct
{
  AntSeries series;
  AntNoiseModel truth;
  float *value;
  uint8_t *spike;
  AntChunk chunk;
} Fixture;

static void
set_up (Fixture *f, gconstpointer model)
{
  f->value = g_new (float, N);
  f->spike = g_new0 (uint8_t, N);
  f->series = ant_study_record (((const char *) model)[0], ANT_MASK_L1, N, STEP_D, 6101, f->value);
  ant_study_model (((const char *) model)[0], &f->truth);
  f->chunk = (AntChunk){ .n = N };
}

static void
tear_down (Fixture *f, gconstpointer model)
{
  g_free (f->value);
  g_free (f->spike);
}

static void
fit (Fixture *f)
{
  ant_noise_model_default (&f->chunk.model, STEP_D, 60, 25, 0, 0, NULL);
  AntStatus status = ant_chunk_fit (&f->chunk, &f->series, f->spike, 40, 0);
  g_assert_true (status == ANT_OK || status == ANT_NOT_CONVERGED);
}

/* 1-sigma of one sample's departure from what all the others foretell, under the true noise. */
static double
forecast_sigma (const Fixture *f)
{
  AntStatus status;
  AntWhitener *whitener = ant_whitener_new (&f->truth, &f->series, &status);
  double *copy = g_memdup2 (ant_whitener_precision (whitener), ant_whitener_observed (whitener) * sizeof *copy);
  double precision = ant_median (ant_whitener_observed (whitener), copy, copy);
  g_free (copy);
  ant_whitener_free (whitener);
  return 1 / sqrt (precision);
}

static int
seen (const Fixture *f, size_t from, size_t n)
{
  for (size_t i = from; i < from + n; i++)
    if (isnan (f->value[i]))
      return 0;
  return 1;
}

/* The first of n places in a row, none of them a gap. */
static size_t
clear_place (const Fixture *f, size_t from, size_t n)
{
  while (!seen (f, from - 3, n + 6))
    from++;
  return from;
}

static void
isolated_outliers_are_found_on_both_sides (Fixture *f, gconstpointer model)
{
  double sigma = forecast_sigma (f);
  size_t place[6];
  for (size_t k = 0; k < 6; k++)
    {
      place[k] = clear_place (f, 500 + 1200 * k, 1);
      f->value[place[k]] += (float) ((k % 2 ? -10 : 10) * sigma);
    }
  fit (f);
  g_assert_cmpuint (f->chunk.health.spikes, ==, 6);
  for (size_t k = 0; k < 6; k++)
    g_assert_cmpint (f->spike[place[k]], ==, ANT_SPIKE_FOUND);
}

/* Sharp dips 15 sigma deep, of 2 to 60 samples: none of their samples is a spike. */
static void
samples_of_dips_are_no_spikes (Fixture *f, gconstpointer model)
{
  static const size_t lengths[] = { 2, 3, 5, 15, 60 };
  double sigma = forecast_sigma (f);
  for (size_t k = 0; k < G_N_ELEMENTS (lengths); k++)
    {
      size_t first = clear_place (f, 600 + 1500 * k, lengths[k]);
      for (size_t i = 0; i < lengths[k]; i++)
        f->value[first + i] -= (float) (15 * sigma);
    }
  fit (f);
  g_assert_cmpuint (f->chunk.health.spikes, ==, 0);
}

static void
noise_alone_has_hardly_a_spike (Fixture *f, gconstpointer model)
{
  fit (f);
  g_assert_cmpuint (f->chunk.health.spikes, ==, 0); /* 8 600 samples beyond 5.5 sigma: 3e-4 expected */
}

static void
masked_samples_do_not_move_the_fit (Fixture *f, gconstpointer model)
{
  for (size_t i = 4000; i < 4200; i++)
    f->spike[i] = ANT_SPIKE_DIP;
  fit (f);
  AntNoiseModel quiet = f->chunk.model;
  for (size_t i = 4000; i < 4200; i++)
    f->value[i] -= 3000;
  fit (f);
  g_assert_cmpfloat_with_epsilon (f->chunk.model.white_ppm / quiet.white_ppm, 1, 1e-9);
  for (size_t i = 0; i < quiet.n_parts; i++)
    g_assert_cmpfloat_with_epsilon (f->chunk.model.part[i].rms_ppm / quiet.part[i].rms_ppm, 1, 1e-9);
  for (size_t i = 4000; i < 4200; i++)
    g_assert_cmpint (f->spike[i], ==, ANT_SPIKE_DIP);
}

/* Median 1-sigma depth of crossings of one length under a model. */
static double
depth_sigma (const Fixture *f, const AntNoiseModel *model, double t14_h)
{
  AntStatus status;
  AntCrossingShape shape;
  double sample[1000], sigma[40];
  ptrdiff_t first;
  AntWhitener *whitener = ant_whitener_new (model, &f->series, &status);
  ant_crossing_shape_init (&shape, t14_h / 24, 0.3 * t14_h / 24, 0.3, ANT_LIMB_DARKENING_SUN);
  for (size_t k = 0; k < 40; k++)
    {
      size_t n = ant_crossing_shape_sample (&shape, 600 + 180.0 * (double) k, STEP_D, STEP_D, -1, &first, 1000, 1, sample);
      sigma[k] = 1 / sqrt (shape_energy (whitener, first, n, sample));
    }
  ant_whitener_free (whitener);
  return ant_median (40, sigma, sigma);
}

/* 12 days tell the sigma of 13 h dips to about 1/sqrt(2*22) = 15 %, of shorter ones better. */
static void
the_fit_tells_the_noise_floor_of_the_true_model (Fixture *f, gconstpointer model)
{
  static const double t14_h[] = { 0.5, 2, 6, 13 };
  fit (f);
  for (size_t k = 0; k < G_N_ELEMENTS (t14_h); k++)
    {
      double ratio = depth_sigma (f, &f->chunk.model, t14_h[k]) / depth_sigma (f, &f->truth, t14_h[k]);
      g_test_message ("%g h: sigma %.3f of the true one", t14_h[k], ratio);
      g_assert_cmpfloat_with_epsilon (ratio, 1, 2 / sqrt (2 * 12 * 24 / t14_h[k]));
    }
}

/* As likely as the truth: a maximum over free numbers lies above it by about half their count, the priors pull a little. */
static void
the_fit_is_as_likely_as_the_true_model (Fixture *f, gconstpointer model)
{
  double fitted, true_one;
  fit (f);
  g_assert_cmpint (ant_noise_log_likelihood (&f->chunk.model, &f->series, &fitted), ==, ANT_OK);
  g_assert_cmpint (ant_noise_log_likelihood (&f->truth, &f->series, &true_one), ==, ANT_OK);
  g_test_message ("ln L beyond the truth's: %.2f", fitted - true_one);
  g_assert_cmpfloat (fitted, >, true_one - 2);
}

static void
innovations_are_as_large_as_stated_and_independent (Fixture *f, gconstpointer model)
{
  fit (f);
  const AntChunkHealth *health = &f->chunk.health;
  double known = 3 / sqrt ((double) health->observed);
  g_assert_cmpuint (health->observed, ==, ant_series_observed (&f->series, 0));
  g_assert_cmpfloat_with_epsilon (health->innovation_rms, 1, known / sqrt (2));
  g_assert_cmpfloat_with_epsilon (health->lag1, 0, known);
  g_assert_cmpfloat (health->quietest, <=, health->innovation_rms);
  g_assert_cmpfloat (health->loudest, >=, health->innovation_rms);
}

/* Four of twelve days twice as noisy. */
static void
a_loud_stretch_is_told (Fixture *f, gconstpointer model)
{
  AntRandom random;
  ant_random_seed (&random, 6102, 1);
  for (size_t i = N / 3; i < 2 * N / 3; i++)
    f->value[i] += (float) (200 * ant_random_normal (&random));
  fit (f);
  g_assert_cmpfloat (f->chunk.health.loudest, >, 1.3);
  g_assert_cmpfloat (f->chunk.health.quietest, <, 0.8);
}

static void
a_refit_changes_nothing_where_nothing_changed (Fixture *f, gconstpointer model)
{
  AntNoiseModel again;
  fit (f);
  AntSeries part = f->series;
  part.spike = f->spike;
  g_assert_cmpint (ant_chunk_refit (&f->chunk, &part, &again), ==, ANT_OK);
  double before, after;
  ant_noise_log_likelihood (&f->chunk.model, &part, &before);
  ant_noise_log_likelihood (&again, &part, &after);
  g_assert_cmpfloat (after - ant_noise_model_penalty (&again), >=, before - ant_noise_model_penalty (&f->chunk.model) - 1e-6);
  g_assert_cmpfloat_with_epsilon (depth_sigma (f, &again, 6) / depth_sigma (f, &f->chunk.model, 6), 1, 0.02);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, model, function) g_test_add ("/search/chunk-fit/" path, Fixture, model, set_up, function, tear_down)
  TEST ("isolated-outliers-are-found-on-both-sides", "C", isolated_outliers_are_found_on_both_sides);
  TEST ("isolated-outliers-are-found-in-correlated-noise", "A", isolated_outliers_are_found_on_both_sides);
  TEST ("samples-of-dips-are-no-spikes", "C", samples_of_dips_are_no_spikes);
  TEST ("samples-of-dips-are-no-spikes-in-correlated-noise", "A", samples_of_dips_are_no_spikes);
  TEST ("noise-alone-has-hardly-a-spike", "A", noise_alone_has_hardly_a_spike);
  TEST ("masked-samples-do-not-move-the-fit", "C", masked_samples_do_not_move_the_fit);
  TEST ("the-fit-tells-the-noise-floor-of-the-true-model", "A", the_fit_tells_the_noise_floor_of_the_true_model);
  TEST ("the-fit-is-as-likely-as-the-true-model", "A", the_fit_is_as_likely_as_the_true_model);
  TEST ("innovations-are-as-large-as-stated-and-independent", "A", innovations_are_as_large_as_stated_and_independent);
  TEST ("a-loud-stretch-is-told", "C", a_loud_stretch_is_told);
  TEST ("a-refit-changes-nothing-where-nothing-changed", "A", a_refit_changes_nothing_where_nothing_changed);
  return g_test_run ();
}
