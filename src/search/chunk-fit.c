/* chunk-fit.c - the noise of one chunk: fit, set isolated spikes aside, fit again, and say how well it went. */
#include <math.h>
#include <stdlib.h>
#include "core/robust.h"
#include "noise/whitener.h"
#include "search/chunk.h"

#define SPIKE_SIGMAS 5.5
#define SPIKE_ROUNDS 3
#define WINDOW_D 4.0
#define WINDOW_SAMPLES 400 /* a window is longer where the cadence is coarse: its rms must be known to 4 % */

/* A sample that departs from both its neighbours on the side of its own forecast error is a spike; the first sample of a
 * dip departs from one neighbour only. */
static int
stands_alone (const AntSeries *part, const unsigned *place, size_t observed, size_t i, double departure)
{
  double y = (double) part->value_ppm[place[i]];
  for (int side = -1; side <= 1; side += 2)
    {
      if ((side < 0 && i == 0) || (side > 0 && i + 1 == observed))
        return 0;
      double rise = y - (double) part->value_ppm[place[side < 0 ? i - 1 : i + 1]];
      if (rise * departure <= 0 || fabs (rise) < 0.5 * fabs (departure))
        return 0;
    }
  return 1;
}

/* part holds only samples that the fit used. */
static AntStatus
find_spikes (const AntWhitener *whitener, const AntSeries *part, uint8_t *spike, size_t *found)
{
  size_t m = ant_whitener_observed (whitener);
  const unsigned *place = ant_whitener_places (whitener);
  const double *precision = ant_whitener_precision (whitener);
  double *z = malloc ((part->n + m) * sizeof *z), *pull = z + part->n;
  *found = 0;
  if (!z)
    return ANT_NO_MEMORY;
  AntStatus status = ant_whitener_solve (whitener, part->value_ppm, z);
  for (size_t i = 0; i < m && !status; i++)
    pull[i] = z[place[i]] / sqrt (precision[i]);
  double sigma = status ? 0 : ant_mad_sigma (m, pull, pull);
  for (size_t i = 0; i < m && !status; i++)
    {
      double departure = z[place[i]] / precision[i];
      if (fabs (departure) * sqrt (precision[i]) > SPIKE_SIGMAS * fmax (sigma, 1)
          && stands_alone (part, place, m, i, departure))
        {
          spike[place[i]] = ANT_SPIKE_FOUND;
          ++*found;
        }
    }
  free (z);
  return status;
}

static void
window_rms (const AntWhitener *whitener, const AntSeries *part, const double *pull, AntChunkHealth *health)
{
  const unsigned *place = ant_whitener_places (whitener);
  double window_d = fmax (WINDOW_D, WINDOW_SAMPLES * part->step_d);
  size_t m = ant_whitener_observed (whitener), windows = 0, least = (size_t) (0.3 * window_d / part->step_d) + 20;
  double low = HUGE_VAL, high = 0;
  for (size_t i = 0; i < m;)
    {
      double end = (floor ((double) place[i] * part->step_d / window_d) + 1) * window_d, sum = 0;
      size_t n = 0;
      for (; i < m && (double) place[i] * part->step_d < end; i++, n++)
        sum += pull[i] * pull[i];
      if (n < least)
        continue;
      windows++;
      low = fmin (low, sqrt (sum / (double) n));
      high = fmax (high, sqrt (sum / (double) n));
    }
  health->quietest = windows >= 3 ? low : NAN;
  health->loudest = windows >= 3 ? high : NAN;
}

/* Innovations over their stated sigma: rms and correlation of neighbours. */
static AntStatus
judge (const AntWhitener *whitener, const AntSeries *part, AntChunkHealth *health)
{
  size_t m = ant_whitener_observed (whitener);
  double *pull = malloc (m * sizeof *pull), squares = 0, products = 0;
  if (!pull)
    return ANT_NO_MEMORY;
  ant_whitener_innovations (whitener, part->value_ppm, pull);
  for (size_t i = 0; i < m; i++)
    {
      pull[i] /= sqrt (ant_whitener_variance (whitener)[i]);
      squares += pull[i] * pull[i];
      products += i ? pull[i] * pull[i - 1] : 0;
    }
  health->innovation_rms = sqrt (squares / (double) m);
  health->lag1 = products / squares;
  window_rms (whitener, part, pull, health);
  free (pull);
  return ANT_OK;
}

/* Look at the samples that the fit used, and at no other: a dip that is still in the data would spoil its neighbours. */
static AntStatus
look (AntChunk *chunk, const AntSeries *part, uint8_t *spike, size_t *found)
{
  AntStatus status;
  AntSeries used = *part;
  float *value = malloc (part->n * sizeof *value);
  *found = 0;
  if (!value)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < part->n; i++)
    value[i] = spike[i] ? NAN : part->value_ppm[i];
  used.value_ppm = value;
  AntWhitener *whitener = ant_whitener_new (&chunk->model, &used, &status);
  if (whitener)
    status = find_spikes (whitener, &used, spike, found);
  if (whitener && !status)
    status = judge (whitener, &used, &chunk->health);
  ant_whitener_free (whitener);
  free (value);
  return status;
}

AntStatus
ant_chunk_fit (AntChunk *chunk, const AntSeries *part, uint8_t *spike, size_t max_steps, int warm)
{
  AntFitOptions options = { .max_steps = max_steps, .settled_lnl = 0.02, .curvature = chunk->curvature,
                            .warm = warm, .stop = chunk->stop };
  AntSeries own = *part;
  own.spike = spike;
  AntStatus status = ANT_OK;
  for (int round = 0; round < SPIKE_ROUNDS; round++)
    {
      status = ant_noise_fit (&chunk->model, &own, &options, &chunk->fit);
      if (status && status != ANT_NOT_CONVERGED)
        return status;
      size_t found;
      status = look (chunk, &own, spike, &found);
      if (status || !found)
        break;
      options.warm = 1;
      options.max_steps = 8;
    }
  chunk->health.observed = ant_series_observed (part, 0);
  chunk->health.spikes = 0;
  for (size_t i = 0; i < part->n; i++)
    chunk->health.spikes += spike[i] == ANT_SPIKE_FOUND;
  return status;
}

AntStatus
ant_chunk_refit (const AntChunk *chunk, const AntSeries *part, AntNoiseModel *model)
{
  double curvature[ANT_MAX_FREE * ANT_MAX_FREE];
  size_t free_parameters = ant_noise_model_get (&chunk->model, NULL);
  for (size_t i = 0; i < free_parameters * free_parameters; i++)
    curvature[i] = chunk->curvature[i];
  /* Masking a few hours moves a fit to months of data by less than one Newton step finds; a fit to days needs more. */
  double days = (double) chunk->health.observed * part->step_d;
  AntFitOptions options = { .max_steps = days > 60 ? 1 : days > 15 ? 2 : 6, .settled_lnl = 0.02, .curvature = curvature, .warm = 1,
                            .stop = chunk->stop };
  *model = chunk->model;
  AntStatus status = ant_noise_fit (model, part, &options, NULL);
  return status == ANT_NOT_CONVERGED ? ANT_OK : status;
}
