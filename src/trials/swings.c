/* swings.c - mean of a sum of sines over an exposure. */
#include "trials/swings.h"

#include <math.h>
#include "core/units.h"

double
ant_swing_mean_ppm (const AntTrialSwing *swing, double start_d, double end_d)
{
  const double cycles = (start_d + end_d) / 2 / swing->period_d + swing->phase;
  const double half_angle = ANT_PI * (end_d - start_d) / swing->period_d;
  double sum = 0;

  for (int h = 1; h <= ANT_SWING_HARMONICS; h++)
    {
      const double a = h * half_angle;
      const double smearing = a > 1e-6 ? sin (a) / a : 1;

      sum += swing->relative[h - 1] * sin (ANT_TAU * fmod (h * cycles, 1)) * smearing;
    }
  return swing->amplitude_ppm * sum;
}
