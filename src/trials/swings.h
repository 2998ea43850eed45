/* swings.h - an instrument's swing locked to its orbit: a period and its harmonics. */
#pragma once

#define ANT_SWING_HARMONICS 4

typedef struct
{
  double period_d;
  double phase;                           /* cycles of the fundamental at the record's start */
  double amplitude_ppm;                   /* of the fundamental */
  double relative[ANT_SWING_HARMONICS];   /* harmonics 1.. relative to it; relative[0] is 1 */
} AntTrialSwing;

/* Mean over start..end (days), closed form; the value at start where end <= start. */
double ant_swing_mean_ppm (const AntTrialSwing *swing, double start_d, double end_d);
