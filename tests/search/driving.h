/* driving.h - run a scan to its end on this thread. */
#pragma once

#include <glib.h>
#include "search/scan.h"

static inline AntScan *
scan_to_the_end (const AntSeries *series, const AntScanOptions *options)
{
  AntStatus status;
  const AntStages *stages = ant_scan_stages ();
  AntScan *scan = ant_scan_new (series, options, &status);
  g_assert_nonnull (scan);
  for (size_t stage = 0; stage < stages->n_stages; stage++)
    {
      size_t count = stages->count (scan, stage);
      for (size_t i = 0; i < count; i++)
        g_assert_cmpint (stages->run_slice (scan, stage, i), ==, ANT_OK);
      g_assert_cmpint (stages->finish (scan, stage), ==, ANT_OK);
    }
  return scan;
}
