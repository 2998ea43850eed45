/* models.c - invented noises for the studies. */
#include "models.h"
#include <math.h>
#include <stdlib.h>
#include "core/units.h"
#include "noise/surrogate.h"

static void
add (AntNoiseModel *model, AntPartKind kind, double rms_ppm, double time_s, double quality)
{
  model->part[model->n_parts++] = (AntNoisePart){ .kind = kind, .rms_ppm = rms_ppm, .quality = quality,
                                                  .time_d = time_s / ANT_SECONDS_PER_DAY };
}

void
ant_study_model (char name, AntNoiseModel *model)
{
  double round = sqrt (0.5); /* quality of Harvey's exponent 4: time scale 1/w0 */
  *model = (AntNoiseModel){ .error_scale = 1, .white_ppm = name == 'A' ? 10 : name == 'B' ? 5 : 100 };
  if (name == 'C')
    {
      add (model, ANT_OSCILLATOR, 30, ANT_TAU * 3600, round);
      return;
    }
  add (model, ANT_OSCILLATOR, 40, ANT_TAU * 250, round);
  add (model, ANT_OSCILLATOR, 3, 1 / 3.1e-3, 4);
  if (name == 'A')
    {
      add (model, ANT_OSCILLATOR, 40 / sqrt (2), ANT_TAU * 3 * 3600, round);
      add (model, ANT_EXPONENTIAL, 40 / sqrt (2), 3 * 3600, 0);
    }
  else
    add (model, ANT_EXPONENTIAL, 50, 10 * 3600, 0);
}

AntSeries
ant_study_record (char name, AntMask mask, size_t n, double step_d, unsigned long seed, float *value)
{
  AntNoiseModel model;
  AntRandom random;
  unsigned char *seen = malloc (n);
  float *drawn = malloc (n * sizeof *drawn);
  AntSeries series = { .n = n, .step_d = step_d, .value_ppm = value };
  ant_random_seed (&random, seed, 77);
  ant_mask_make (mask, n, step_d, &random, seen);
  ant_study_model (name, &model);
  for (size_t i = 0; i < n; i++)
    value[i] = seen[i] ? 0 : NAN;
  ant_surrogate_draw (&model, &series, &random, drawn);
  for (size_t i = 0; i < n; i++)
    value[i] = drawn[i];
  free (seen);
  free (drawn);
  return series;
}
