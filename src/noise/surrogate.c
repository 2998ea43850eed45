/* surrogate.c - noise-only records, stepped exactly from one grid place to the next. */
#include "noise/surrogate.h"
#include <math.h>
#include "core/units.h"

/* One part as a Markov process of two numbers: its value x and, for an oscillator, its rate v = x'/w0, which in the
 * stationary state have equal variances and no covariance. A step is (x, v) <- A (x, v) + L (two normals). */
typedef struct
{
  double x, v;
  double xx, xv, vx, vv;         /* A */
  double noise_xx, noise_xv, noise_v; /* L: x gets noise_xx and the share noise_xv of the normal that drives v */
  int oscillator;
} Process;

static void
start_process (Process *process, const AntNoisePart *part, double step_d, AntRandom *random)
{
  double variance = part->rms_ppm * part->rms_ppm;
  *process = (Process){ .oscillator = part->kind == ANT_OSCILLATOR };
  process->x = part->rms_ppm * ant_random_normal (random);
  if (!process->oscillator)
    {
      process->xx = exp (-step_d / part->time_d);
      process->noise_xx = sqrt (-variance * expm1 (-2 * step_d / part->time_d));
      return;
    }
  process->v = part->rms_ppm * ant_random_normal (random);
  double phase = ANT_TAU * step_d / part->time_d;
  double damping = 0.5 / part->quality;
  double eta = sqrt (1 - damping * damping);
  double decay = exp (-phase * damping);
  double c = decay * cos (eta * phase);
  double s = decay * sin (eta * phase) / eta;
  process->xx = c + damping * s;
  process->xv = s;
  process->vx = -s;
  process->vv = c - damping * s;
  /* The step's own covariance is variance (I - A A'). Its x corner goes as the cube of a small step and drowns in
   * rounding below 1e-16 of the variance: nothing, then, is as good as the truth. */
  double cov_xx = variance * (1 - process->xx * process->xx - process->xv * process->xv);
  double cov_xv = -variance * (process->xx * process->vx + process->xv * process->vv);
  double cov_vv = variance * (1 - process->vx * process->vx - process->vv * process->vv);
  process->noise_v = sqrt (fmax (cov_vv, 0));
  process->noise_xv = process->noise_v > 0 ? cov_xv / process->noise_v : 0;
  process->noise_xx = sqrt (fmax (cov_xx - process->noise_xv * process->noise_xv, 0));
}

static void
step_process (Process *process, AntRandom *random)
{
  double x = process->xx * process->x + process->noise_xx * ant_random_normal (random);
  if (process->oscillator)
    {
      double push = ant_random_normal (random);
      double v = process->vx * process->x + process->vv * process->v + process->noise_v * push;
      x += process->xv * process->v + process->noise_xv * push;
      process->v = v;
    }
  process->x = x;
}

AntStatus
ant_surrogate_draw (const AntNoiseModel *model, const AntSeries *series, AntRandom *random, float *value_ppm)
{
  if (ant_noise_model_check (model) != ANT_OK || !(series->step_d > 0))
    return ANT_BAD_ARGUMENT;
  Process process[ANT_MAX_PARTS];
  for (size_t p = 0; p < model->n_parts; p++)
    start_process (&process[p], &model->part[p], series->step_d, random);
  for (size_t i = 0; i < series->n; i++)
    {
      double error_ppm = series->error_ppm ? (double) series->error_ppm[i] : 0;
      double count = series->bin_count ? (double) series->bin_count[i] : 1;
      /* Drawn at gaps too, so that the draw elsewhere does not depend on where the gaps are. */
      double sum = sqrt (ant_noise_model_variance (model, error_ppm, count)) * ant_random_normal (random);
      for (size_t p = 0; p < model->n_parts; p++)
        {
          sum += process[p].x;
          step_process (&process[p], random);
        }
      value_ppm[i] = isnan (series->value_ppm[i]) ? NAN : (float) sum;
    }
  return ANT_OK;
}
