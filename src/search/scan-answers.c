/* scan-answers.c - what a scan tells of itself when its stages are done. */
#include "search/scan-private.h"

AntScanReach
ant_scan_reach (const AntScan *scan)
{
  size_t n = scan->n_finished;
  return n > ANT_STAGE_TRACE    ? ANT_SCAN_COMPLETE
         : n > ANT_STAGE_BORDER ? ANT_SCAN_DIPS
         : n > ANT_STAGE_WEIGH  ? ANT_SCAN_WEIGHED
         : n > ANT_STAGE_SEARCH ? ANT_SCAN_NOISE
                                : ANT_SCAN_NOTHING;
}

size_t
ant_scan_chunks (const AntScan *scan, const AntChunk **chunk)
{
  *chunk = scan->chunk;
  return scan->n_chunks;
}

size_t
ant_scan_dips (const AntScan *scan, const AntDip **dip)
{
  *dip = scan->dip;
  return scan->n_dips;
}

size_t
ant_scan_brightenings (const AntScan *scan, const AntDip **dip)
{
  *dip = scan->brightening;
  return scan->n_brightenings;
}

double ant_scan_threshold (const AntScan *scan) { return scan->threshold_snr; }

double
ant_scan_expected_false (const AntScan *scan, double snr)
{
  return ant_chance_law_expected (&scan->chance, snr);
}

size_t
ant_scan_surrogates (const AntScan *scan, size_t *n_events)
{
  *n_events = scan->n_surrogate_events;
  return scan->n_finished > ANT_STAGE_CHANCE ? scan->options.surrogates : 0;
}

AntChanceLaw ant_scan_chance_law (const AntScan *scan) { return scan->chance; }

AntChanceField ant_scan_chance_field (const AntScan *scan) { return scan->chance.field; }

size_t
ant_scan_refits (const AntScan *scan)
{
  size_t n = 0;
  for (size_t i = 0; i < scan->n_events; i++)
    n += !scan->event[i].strong;
  return n;
}

const uint8_t *ant_scan_spikes (const AntScan *scan) { return scan->spike; }

size_t
ant_scan_passages (const AntScan *scan, const AntPassage **passage)
{
  *passage = scan->passage;
  return scan->n_passages;
}

const float *ant_scan_slow (const AntScan *scan) { return scan->slow_ppm; }
