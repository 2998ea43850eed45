/* study-crossing-fit.c - the fit of a crossing on planted ones: radius ratio, impact, epoch, T14 and depth, their bias and spread.
 * Arguments: venus or mercury, pairs, seed, cadence in seconds. Noise: the Sun's without active regions and 10 ppm of white,
 * L1 gaps; its model is known. Injections come in pairs on one draw of noise and its negative, whose errors of first order
 * cancel: what is left of their mean is bias, told in the pair's mean stated error; the scatter is of errors each in its own. Prints one
 * line per quantity. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include "core/units.h"
#include "masks.h"
#include "noise/surrogate.h"
#include "trials/noise-presets.h"
#include "trials/planets.h"
#include "verdict/rival-fit.h"

#define DAYS 6.0
#define WHITE_PPM 10

enum { EPOCH, T14, IMPACT, RADIUS, DEPTH, N_QUANTITIES };
static const char *const name[N_QUANTITIES] = { "epoch", "T14", "impact", "radius ratio", "depth" };

typedef struct
{
  double paired, paired_squares; /* of the means of pairs, in their mean stated error */
  double sum, squares;           /* of single ones, each in its own sigma */
  size_t pairs, n, covered;
} Tally;

/* 6 d of noise with gaps. */
static void
draw_noise (const AntNoiseModel *noise, size_t n, double step_d, unsigned long seed, float *value)
{
  AntRandom random;
  unsigned char *seen = malloc (n);
  float *drawn = malloc (n * sizeof *drawn);
  AntSeries series = { .n = n, .step_d = step_d, .value_ppm = value };
  ant_random_seed (&random, seed, 41);
  ant_mask_make (ANT_MASK_L1, n, step_d, &random, seen);
  for (size_t i = 0; i < n; i++)
    value[i] = seen[i] ? 0 : NAN;
  ant_surrogate_draw (noise, &series, &random, drawn);
  memcpy (value, drawn, n * sizeof *value);
  free (seen);
  free (drawn);
}

/* Errors of one fit and what it states for them; returns its SNR, 0 if there was none. */
static double
fit_one (const AntNoiseModel *noise, const AntSeries *series, const AntTrialPlanet *planet, double *error, double *sigma)
{
  AntStatus status;
  AntWhitener *whitener = ant_whitener_new_free_level (noise, series, &status);
  double *z = malloc (series->n * sizeof *z), *buffer = malloc (series->n * ANT_LANES * sizeof *buffer);
  double depth = ant_transit_loss (planet->crossing.radius_ratio, planet->crossing.impact, ANT_LIMB_DARKENING_SUN) / ANT_PPM;
  AntRivalBench bench = { .whitener = whitener, .z = z, .window = *series, .exposure_d = series->step_d,
                          .limb_darkening = ANT_LIMB_DARKENING_SUN, .sign = 1, .buffer = buffer };
  AntDip dip = { .mid_d = planet->mid_d, .duration_d = planet->crossing.t14_d, .edge_d = 0.01, .depth_ppm = depth };
  AntRivalFit fit = { 0 };
  ant_whitener_solve (whitener, series->value_ppm, z);
  ant_rival_fit (&bench, &dip, ANT_RIVAL_CROSSING, &fit);
  error[EPOCH] = fit.mean[0] - planet->mid_d;
  error[T14] = log (fit.mean[1] / planet->crossing.t14_d);
  error[IMPACT] = fit.mean[2] - planet->crossing.impact;
  error[RADIUS] = log (fit.mean[3] / planet->crossing.radius_ratio);
  error[DEPTH] = fit.depth_ppm - depth;
  memcpy (sigma, fit.sigma, ANT_RIVAL_PARAMETERS * sizeof *sigma);
  sigma[DEPTH] = fit.depth_sigma_ppm;
  ant_whitener_free (whitener);
  free (z);
  free (buffer);
  return fit.fitted ? sqrt (2 * fit.log_gain) : 0;
}

static void
note (Tally *tally, const double error[2], const double sigma[2])
{
  double mean = (error[0] + error[1]) / (sigma[0] + sigma[1]);
  tally->paired += mean;
  tally->paired_squares += mean * mean;
  tally->pairs++;
  for (int i = 0; i < 2; i++)
    {
      tally->sum += error[i] / sigma[i];
      tally->squares += error[i] * error[i] / (sigma[i] * sigma[i]);
      tally->covered += fabs (error[i]) < sigma[i];
      tally->n++;
    }
}

int
main (int argc, char **argv)
{
  if (argc < 5)
    return 2;
  int venus = !strcmp (argv[1], "venus");
  size_t pairs = (size_t) atol (argv[2]);
  double step_d = atof (argv[4]) / 86400, snr = 0;
  size_t n = (size_t) (DAYS / step_d);
  AntNoiseModel noise;
  ant_noise_preset (ANT_PRESET_SUN, &noise);
  noise.white_ppm = WHITE_PPM;
  noise.error_scale = 1;
  AntTrialPlanet planet = { .crossing = { venus ? 0.0306 : 0.00636, venus ? 0.6 : 0.335, (venus ? 6.3 : 7.5) / 24 } };
  float *drawn = malloc (n * sizeof *drawn), *value = malloc (n * sizeof *value);
  Tally tally[N_QUANTITIES] = { 0 };
  for (size_t r = 0; r < pairs; r++)
    {
      double error[2][N_QUANTITIES], sigma[2][N_QUANTITIES];
      AntRandom random;
      AntSeries series = { .n = n, .step_d = step_d, .start_d = 0.5 * step_d, .value_ppm = value };
      ant_random_seed (&random, strtoul (argv[3], NULL, 10) + r, 42);
      planet.mid_d = 0.5 * DAYS + 0.2 * (ant_random_uniform (&random) - 0.5);
      draw_noise (&noise, n, step_d, strtoul (argv[3], NULL, 10) + r, drawn);
      for (int side = 0; side < 2; side++)
        {
          for (size_t i = 0; i < n; i++)
            {
              double start_d = (double) i * step_d - planet.mid_d;
              double loss = ant_crossing_mean_loss (&planet.crossing, ANT_LIMB_DARKENING_SUN, start_d, start_d + step_d);
              value[i] = (float) ((side ? -1 : 1) * (double) drawn[i] - loss / ANT_PPM);
            }
          snr += fit_one (&noise, &series, &planet, error[side], sigma[side]) / (double) (2 * pairs);
        }
      for (int q = 0; q < N_QUANTITIES; q++)
        note (&tally[q], (double[2]){ error[0][q], error[1][q] }, (double[2]){ sigma[0][q], sigma[1][q] });
    }
  for (int q = 0; q < N_QUANTITIES; q++)
    {
      double count = (double) tally[q].pairs, mean = tally[q].paired / count, all = (double) tally[q].n;
      double error = sqrt ((tally[q].paired_squares / count - mean * mean) / count);
      double spread = sqrt (tally[q].squares / all - (tally[q].sum / all) * (tally[q].sum / all));
      printf ("%s %s: bias %+.3f +- %.3f sigma, scatter/formal %.3f +- %.3f, 68 %% intervals cover %.1f %% (mean SNR %.1f, %zu injections)\n",
              argv[1], name[q], mean, error, spread, spread / sqrt (2 * all), 100 * (double) tally[q].covered / all, snr, tally[q].n);
    }
  free (drawn);
  free (value);
  return 0;
}
