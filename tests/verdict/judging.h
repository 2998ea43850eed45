/* judging.h - run a scan's events through all stages of verdicts on this thread. */
#pragma once

#include "driving.h"
#include "verdict/verdict-work.h"

static const AntCauseRates rates = { { 50, 1, 20, 20, 10, 110, 0 } };

static inline AntVerdictWork *
judge (const AntSeries *series, const AntScan *scan, AntVerdictInput *input, int backwards)
{
  AntStatus status;
  *input = (AntVerdictInput) { .series = series, .exposure_d = series->step_d, .limb_darkening = ANT_LIMB_DARKENING_SUN,
                               .options = { .target_star = 1, .rates = rates } };
  input->n_chunks = ant_scan_chunks (scan, &input->chunk);
  input->n_dips = ant_scan_dips (scan, &input->dip);
  input->n_brightenings = ant_scan_brightenings (scan, &input->brightening);
  AntVerdictWork *work = ant_verdict_work_new (input, &status);
  const AntStages *stages = ant_verdict_work_stages ();
  g_assert_nonnull (work);
  for (size_t stage = 0; stage < stages->n_stages; stage++)
    {
      size_t count = stages->count (work, stage);
      for (size_t i = 0; i < count; i++)
        g_assert_cmpint (stages->run_slice (work, stage, backwards ? count - 1 - i : i), ==, ANT_OK);
      g_assert_cmpint (stages->finish (work, stage), ==, ANT_OK);
    }
  return work;
}

