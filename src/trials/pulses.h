/* pulses.h - what changes the level at one instant: steps of the instrument that stay or return, flares of the Sun.
 * Means over an exposure start..end (days) are closed forms; where end <= start the value at start is given. */
#pragma once

typedef struct
{
  double time_d;
  double size_ppm;    /* negative: a drop */
  double recovery_d;  /* exponential return; 0 = it stays */
  int flagged;        /* the record's own quality marks it, for three recovery times */
} AntTrialStep;

typedef struct
{
  double start_d;
  double size_ppm;    /* at its peak */
  double rise_d;      /* linear, >= 0 */
  double decay_d;     /* exponential, > 0 */
} AntTrialFlare;

double ant_step_mean_ppm (const AntTrialStep *step, double start_d, double end_d);
double ant_flare_mean_ppm (const AntTrialFlare *flare, double start_d, double end_d);
