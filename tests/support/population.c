/* population.c - draw events of known cause and add them to noise. */
#include "population.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/units.h"
#include "models.h"
#include "noise/whitener.h"
#include "trials/planets.h"
#include "trials/pulses.h"
#include "trials/spots.h"

#define HOUR (1.0 / 24)
#define HALF_WINDOW_D 6.0

const char *const ant_truth_name[ANT_N_TRUTHS] = { "crossing", "spot",    "step",     "recovery", "spike",
                                                   "thermal",  "eclipse", "gap edge", "noise" };
const double ant_truth_share[ANT_N_TRUTHS] = { 0.25, 0.10, 0.13, 0.13, 0.09, 0.12, 0.09, 0.09, 0 };

static double
uniform (AntRandom *random, double low, double high)
{
  return low + (high - low) * ant_random_uniform (random);
}

static double
log_uniform (AntRandom *random, double low, double high)
{
  return low * pow (high / low, ant_random_uniform (random));
}

static double
hit_depth (double k, double impact)
{
  return ant_transit_loss (k, impact, ANT_LIMB_DARKENING_SUN);
}

/* Impact of a disc as large as the Sun that takes this much light. */
static double
grazing_impact (double depth)
{
  double low = 0, high = 2;
  for (int i = 0; i < 60; i++)
    *(hit_depth (1, 0.5 * (low + high)) > depth ? &low : &high) = 0.5 * (low + high);
  return 0.5 * (low + high);
}

/* Relative change over an exposure, in units of the event's depth: negative where it is dark. */
static double
change (const AntPlantedEvent *event, double start_d, double end_d)
{
  const double *p = event->parameter, depth = event->depth_ppm * ANT_PPM;
  switch (event->truth)
    {
    case ANT_TRUTH_CROSSING:
      {
        AntCrossing crossing = { ant_crossing_radius_for_depth (p[2], ANT_LIMB_DARKENING_SUN, depth), p[2], p[1] };
        return -ant_crossing_mean_loss (&crossing, ANT_LIMB_DARKENING_SUN, start_d - p[0], end_d - p[0]) / depth;
      }
    case ANT_TRUTH_ECLIPSE:
      {
        AntCrossing crossing = { 1, grazing_impact (depth), p[1] };
        return -ant_crossing_mean_loss (&crossing, ANT_LIMB_DARKENING_SUN, start_d - p[0], end_d - p[0]) / depth;
      }
    case ANT_TRUTH_SPOT:
      {
        AntSpotGroup group = { .meridian_d = p[0], .latitude_deg = p[2], .area = 1e-4, .facula_ratio = p[3] };
        if (fabs (0.5 * (start_d + end_d) - p[0]) > 0.3 * p[1])
          return 0; /* the far side, and the next rotations */
        return -ant_spot_mean (&group, p[1], start_d, end_d) / ant_spot_light (&group, p[1], p[0]);
      }
    case ANT_TRUTH_THERMAL:
      {
        AntTrialFlare fall = { .start_d = p[0], .size_ppm = -1, .rise_d = p[1], .decay_d = p[2] };
        return ant_flare_mean_ppm (&fall, start_d, end_d);
      }
    case ANT_TRUTH_SPIKE:
      return end_d > p[0] && start_d < p[0] + p[1] ? -1 : 0;
    default:
      {
        AntTrialStep step = { .time_d = p[0], .size_ppm = p[2], .recovery_d = p[1] };
        return ant_step_mean_ppm (&step, start_d, end_d);
      }
    }
}

/* Parameters at random; from_d and to_d say where a dip of its making may lie. */
static void
draw_parameters (AntPlantedEvent *event, double time_d, double step_d, AntRandom *random)
{
  double *p = event->parameter, before = 0, after = 1;
  p[0] = time_d;
  p[2] = -1;
  switch (event->truth)
    {
    case ANT_TRUTH_CROSSING:
      p[1] = log_uniform (random, 0.8 * HOUR, 12 * HOUR);
      p[2] = uniform (random, 0, 0.95);
      before = after = 0.5 * p[1];
      break;
    case ANT_TRUTH_SPOT:
      p[1] = log_uniform (random, 1.5, 8);
      p[2] = uniform (random, 0, 40);
      p[3] = uniform (random, 0, 2);
      before = after = 0.25 * p[1];
      break;
    case ANT_TRUTH_STEP:
      p[1] = 0;
      p[2] = ant_random_uniform (random) < 0.7 ? -1 : 1;
      before = p[2] > 0 ? 1 : 0.1;
      break;
    case ANT_TRUTH_SPIKE:
      p[1] = step_d * floor (uniform (random, 0, 3)) + 0.5 * step_d;
      after = p[1];
      break;
    case ANT_TRUTH_THERMAL:
      p[1] = log_uniform (random, 0.3 * HOUR, 4 * HOUR);
      p[2] = fmax (0.7 * p[1], log_uniform (random, 0.5 * HOUR, 36 * HOUR));
      break;
    case ANT_TRUTH_ECLIPSE:
      p[1] = log_uniform (random, 0.8 * HOUR, 6 * HOUR);
      before = after = 0.5 * p[1];
      break;
    case ANT_TRUTH_GAP_EDGE:
      p[1] = log_uniform (random, 0.2 * HOUR, 24 * HOUR);
      break;
    default:
      p[1] = log_uniform (random, 0.5 * HOUR, 72 * HOUR);
    }
  event->from_d = time_d - before;
  event->to_d = time_d + after;
}

/* The end of the next gap of a quarter of an hour and more after a time; one is made if there is none within a day. */
static double
gap_end (const AntSeries *series, double time_d, AntRandom *random, float *value)
{
  size_t place = (size_t) ant_series_place (series, time_d), run = 0, least = (size_t) ceil (0.25 * HOUR / series->step_d);
  for (size_t i = place; i < series->n && (double) (i - place) * series->step_d < 1; i++)
    {
      if (!isnan (value[i]) && run >= least)
        return ant_series_time (series, (double) i - 0.5);
      run = isnan (value[i]) ? run + 1 : 0;
    }
  size_t length = (size_t) (uniform (random, 0.25, 3) * HOUR / series->step_d);
  for (size_t i = place; i < place + length && i < series->n; i++)
    value[i] = NAN;
  return ant_series_time (series, (double) (place + length) - 0.5);
}

/* s'Cinv s of the event's shape under the true noise, in the stretch around it. */
static double
energy_of (const AntWhitener *whitener, const AntSeries *window, const float *shape, float *work)
{
  double *z = malloc (window->n * sizeof *z), energy = 0;
  for (size_t i = 0; i < window->n; i++)
    work[i] = isnan (window->value_ppm[i]) ? NAN : shape[i];
  ant_whitener_solve (whitener, work, z);
  for (size_t i = 0; i < window->n; i++)
    energy += isnan (work[i]) ? 0 : (double) shape[i] * z[i];
  free (z);
  return energy;
}

static void
fill (const AntPlantedEvent *event, const AntSeries *window, float *shape)
{
  double half = 0.5 * window->step_d;
  for (size_t i = 0; i < window->n; i++)
    {
      double middle = ant_series_time (window, (double) i);
      shape[i] = (float) change (event, middle - half, middle + half);
    }
}

void
ant_population_plant (char model, const AntSeries *series, AntTruth truth, double time_d, double snr, AntRandom *random,
                      float *value, AntPlantedEvent *event)
{
  AntNoiseModel noise;
  AntStatus status;
  *event = (AntPlantedEvent){ .truth = truth, .depth_ppm = 300, .snr = snr };
  if (truth == ANT_TRUTH_GAP_EDGE)
    time_d = gap_end (series, time_d, random, value);
  draw_parameters (event, time_d, series->step_d, random);
  double from = fmax (0, floor (ant_series_place (series, time_d - HALF_WINDOW_D)));
  AntSeries window = ant_series_part (series, (size_t) from, (size_t) (2 * HALF_WINDOW_D / series->step_d));
  window.value_ppm = value + (size_t) from;
  float *shape = malloc (2 * window.n * sizeof *shape);
  ant_study_model (model, &noise);
  AntWhitener *whitener = ant_whitener_new_free_level (&noise, &window, &status);
  for (int pass = 0; pass < 2 && whitener; pass++) /* the shapes of discs depend a little on their depth */
    {
      fill (event, &window, shape);
      double energy = energy_of (whitener, &window, shape, shape + window.n);
      event->depth_ppm = energy > 0 ? fmin (snr / sqrt (energy), 3e5) : 0;
    }
  if (whitener && event->depth_ppm > 0)
    {
      fill (event, &window, shape);
      for (size_t i = (size_t) from; i < series->n; i++)
        {
          double middle = ant_series_time (series, (double) i), half = 0.5 * series->step_d;
          double unit = i - (size_t) from < window.n ? (double) shape[i - (size_t) from] : change (event, middle - half, middle + half);
          value[i] += (float) (event->depth_ppm * unit);
        }
    }
  ant_whitener_free (whitener);
  free (shape);
}

static AntTruth
draw_truth (AntRandom *random)
{
  double u = ant_random_uniform (random);
  int truth = 0;
  while (truth < ANT_TRUTH_NOISE - 1 && u >= ant_truth_share[truth])
    u -= ant_truth_share[truth++];
  return (AntTruth) truth;
}

AntSeries
ant_population_record (char model, AntMask mask, size_t n, double step_d, unsigned long seed, double snr_low,
                       double snr_high, float *value, AntPlantedEvent *event)
{
  AntRandom random;
  AntSeries series = ant_study_record (model, mask, n, step_d, seed, value);
  ant_random_seed (&random, seed, 501);
  for (size_t k = 0; k < ANT_POPULATION_EVENTS; k++)
    {
      double time_d = ANT_POPULATION_DAYS * ((double) k + uniform (&random, 0.3, 0.7)) / ANT_POPULATION_EVENTS;
      AntTruth truth = draw_truth (&random);
      ant_population_plant (model, &series, truth, time_d, log_uniform (&random, snr_low, snr_high), &random, value,
                            &event[k]);
    }
  return series;
}
