/* pulses.c - means of steps and flares over an exposure. */
#include "trials/pulses.h"

#include <math.h>

/* Integral over start..end of exp (-t/decay_d) for t >= 0, of 1 if decay_d is 0, of nothing before 0. */
static double
decay_integral (double decay_d, double start_d, double end_d)
{
  const double from_d = fmax (0, start_d);

  if (end_d <= from_d)
    return 0;
  if (!(decay_d > 0))
    return end_d - from_d;
  return -decay_d * exp (-from_d / decay_d) * expm1 (-(end_d - from_d) / decay_d);
}

/* Integral over start..end of t/rise_d for t in 0..rise_d. */
static double
rise_integral (double rise_d, double start_d, double end_d)
{
  const double from_d = fmax (0, start_d), to_d = fmin (end_d, rise_d);

  return to_d > from_d ? (to_d - from_d) * (to_d + from_d) / (2 * rise_d) : 0;
}

double
ant_step_mean_ppm (const AntTrialStep *step, double start_d, double end_d)
{
  const double since_d = start_d - step->time_d;

  if (end_d > start_d)
    return step->size_ppm * decay_integral (step->recovery_d, since_d, end_d - step->time_d) / (end_d - start_d);
  if (since_d < 0)
    return 0;
  return step->recovery_d > 0 ? step->size_ppm * exp (-since_d / step->recovery_d) : step->size_ppm;
}

double
ant_flare_mean_ppm (const AntTrialFlare *flare, double start_d, double end_d)
{
  const double since_d = start_d - flare->start_d, until_d = end_d - flare->start_d;

  if (end_d > start_d)
    return flare->size_ppm
           * (rise_integral (flare->rise_d, since_d, until_d)
              + decay_integral (flare->decay_d, since_d - flare->rise_d, until_d - flare->rise_d))
           / (end_d - start_d);
  if (since_d < 0)
    return 0;
  return flare->size_ppm * (since_d < flare->rise_d ? since_d / flare->rise_d
                                                    : exp (-(since_d - flare->rise_d) / flare->decay_d));
}
