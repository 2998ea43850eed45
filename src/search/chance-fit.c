/* chance-fit.c - the chance law's two constants from surrogates of the record at hand. */
#include <math.h>
#include "search/false-alarm.h"

#define PRIOR_EVENTS 2.0     /* the calibrated yield counts as much as this many events */
#define PRIOR_SOFTNESS 0.15  /* how far the softness of one record may lie from the calibrated one, 1 sigma */
#define SOFTNESS_STEP 0.002
#define SOFTNESS_STEPS 300   /* to each side: 4 sigma */

/* ln probability density of one SNR of the events above `lowest`, the yield left out. */
static double
log_density (const AntChanceLaw *law, double snr, double lowest)
{
  const double h = 1e-4;
  double between = ant_chance_law_expected (law, snr - h) - ant_chance_law_expected (law, snr + h);
  return log (between / (2 * h) / ant_chance_law_expected (law, lowest));
}

void
ant_chance_law_fit (AntChanceLaw *law, size_t n, const double *snr, size_t n_records, double lowest)
{
  AntChanceLaw best = *law;
  double highest = -HUGE_VAL;
  for (int step = -SOFTNESS_STEPS; step <= SOFTNESS_STEPS; step++)
    {
      AntChanceLaw trial = *law;
      trial.softness += SOFTNESS_STEP * step;
      double away = SOFTNESS_STEP * step / PRIOR_SOFTNESS, log_posterior = -0.5 * away * away;
      if (trial.softness < -0.5 || trial.softness > 0.8)
        continue;
      for (size_t i = 0; i < n; i++)
        log_posterior += log_density (&trial, snr[i], lowest);
      if (log_posterior > highest)
        {
          highest = log_posterior;
          best = trial;
        }
    }
  double expected = 2 * (double) n_records * ant_chance_law_expected (&best, lowest);
  best.yield *= ((double) n + PRIOR_EVENTS) / (expected + PRIOR_EVENTS);
  *law = best;
}
