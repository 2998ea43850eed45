/* bench-noise.c - what the factor, the solver, the likelihood and the energies cost at a million samples. Prints CPU seconds and ratios. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
#include "core/random.h"
#include "masks.h"
#include "noise/whitener.h"

static double
cpu_s (void)
{
  struct timespec t;
  clock_gettime (CLOCK_THREAD_CPUTIME_ID, &t);
  return (double) t.tv_sec + 1e-9 * (double) t.tv_nsec;
}

int
main (int argc, char **argv)
{
  size_t n = argc > 1 ? (size_t) atof (argv[1]) : 1000000;
  double step_d = 1 / 1440.0;
  float *value = malloc (n * sizeof *value);
  unsigned char *seen = malloc (n);
  double *z = malloc (n * sizeof *z), log_likelihood = 0;
  AntRandom random;
  AntNoiseModel model;
  AntStatus status;
  ant_random_seed (&random, 1, 1);
  for (int m = 0; m < 2; m++)
    {
      ant_mask_make ((AntMask) m, n, step_d, &random, seen);
      for (size_t i = 0; i < n; i++)
        value[i] = seen[i] ? (float) (50 * ant_random_normal (&random)) : NAN;
      AntSeries series = { .n = n, .step_d = step_d, .value_ppm = value };
      ant_noise_model_default (&model, step_d, 400, 20, 0, 0, NULL);
      double t0 = cpu_s ();
      ant_noise_log_likelihood (&model, &series, &log_likelihood);
      double t1 = cpu_s (), eight[ANT_LANES];
      AntNoiseModel models[ANT_LANES];
      for (int l = 0; l < ANT_LANES; l++)
        models[l] = model;
      ant_noise_log_likelihoods (ANT_LANES, models, &series, eight);
      double t1b = cpu_s ();
      AntWhitener *whitener = ant_whitener_new (&model, &series, &status);
      double t2 = cpu_s ();
      ant_whitener_solve (whitener, value, z);
      double t3 = cpu_s ();
      size_t starts = 0;
      double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES], sum = 0;
      double *shape = calloc (480 * ANT_LANES, sizeof *shape);
      for (size_t i = 0; i < 480 * ANT_LANES; i++)
        shape[i] = -1;
      for (size_t i = 0; i + 480 < n; i += 100, starts++)
        {
          ant_whitener_energies (whitener, z, (ptrdiff_t) i, 480, shape, energy, moment, weight);
          sum += energy[0];
        }
      double t4 = cpu_s ();
      printf ("%s n %zu observed %zu: likelihood %.3f s, eight at once %.3f s, factor with tails %.3f s, solve %.3f s, "
              "8 shapes of 8 h %.1f us a start (%g)\n",
              m ? "low orbit" : "L1", n, ant_whitener_observed (whitener), t1 - t0, t1b - t1, t2 - t1b, t3 - t2,
              1e6 * (t4 - t3) / (double) starts, sum);
      ant_whitener_free (whitener);
      free (shape);
    }
  free (value);
  free (seen);
  free (z);
  return 0;
}
