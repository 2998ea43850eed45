/* scan.h - the whole search for single dips in one record: noise, first pass, mask and refit, joint fit, threshold.
 *
 * A dip left in the noise fit hides itself, so every candidate that a refit could lift to the threshold is masked, the
 * noise refitted, and the candidate weighed anew; dips above 8 are masked and subtracted before anything weaker is
 * looked for. Brightenings go through exactly the same steps: they are the mirror that shows what noise alone does.
 *
 * Run by driving ant_scan_stages () (core/stages.h) with the scan as work. Results are valid after the last finish;
 * after a stop, and ant_scan_conclude (), they are those of the stages that finished. The series' arrays must outlive the
 * scan. */
#pragma once

#include <stdint.h>
#include "core/stages.h"
#include "noise/noise-model.h"
#include "search/chunk.h"
#include "search/dip.h"
#include "search/false-alarm.h"
#include "search/passages.h"
#include "search/refine.h"

#define ANT_MAX_LINES 4

typedef struct
{
  AntBankOptions bank;
  AntChunkOptions chunk;
  double threshold_snr;         /* 0: from false_alarms_per_year */
  double false_alarms_per_year; /* of observed time */
  double least_coverage;
  size_t surrogates;            /* noise-only records to send through the search, to refit the chance law; 0: none */
  uint64_t seed;                /* of the surrogates */
  size_t n_lines;
  AntNoiseLine line[ANT_MAX_LINES];
} AntScanOptions;
#define ANT_SCAN_OPTIONS_INIT { .bank = ANT_BANK_OPTIONS_INIT, .chunk = { 0, 20 }, .false_alarms_per_year = 0.1, \
                                .least_coverage = 0.3 }

typedef struct _AntScan AntScan;

AntScan *ant_scan_new (const AntSeries *series, const AntScanOptions *options, AntStatus *status);
void ant_scan_free (AntScan *scan);
const AntStages *ant_scan_stages (void);

/* How far a scan came. */
typedef enum
{
  ANT_SCAN_NOTHING,
  ANT_SCAN_NOISE,    /* noise, floor, threshold by the built-in law; dips of SNR 8 and more from the first pass */
  ANT_SCAN_WEIGHED,  /* every dip, each weighed alone */
  ANT_SCAN_DIPS,     /* every dip as it stays; no passages */
  ANT_SCAN_COMPLETE,
} AntScanReach;
AntScanReach ant_scan_reach (const AntScan *scan);
/* After a stop, with no slice running: bring what the finished stages found into the lists. No stage may be run after it.
 * ANT_NO_DATA if they found nothing that can be told. */
AntStatus ant_scan_conclude (AntScan *scan);

size_t ant_scan_chunks (const AntScan *scan, const AntChunk **chunk);
/* Dips at or above the threshold by time, and brightenings likewise. */
size_t ant_scan_dips (const AntScan *scan, const AntDip **dip);
size_t ant_scan_brightenings (const AntScan *scan, const AntDip **dip);
double ant_scan_threshold (const AntScan *scan);
/* Dips of one sign expected from noise alone in this record with a final SNR of at least `snr`. */
double ant_scan_expected_false (const AntScan *scan, double snr);
/* The law that this comes from, and what it is computed from. */
AntChanceLaw ant_scan_chance_law (const AntScan *scan);
AntChanceField ant_scan_chance_field (const AntScan *scan);
/* Surrogates that the chance law was refitted to (0: none), and the events of both signs in them (SNR 4 and more). */
size_t ant_scan_surrogates (const AntScan *scan, size_t *n_events);
/* Candidates that were masked and refitted. */
size_t ant_scan_refits (const AntScan *scan);
/* [series->n] ANT_SPIKE_FOUND where an isolated outlier was left out of the fits. */
const uint8_t *ant_scan_spikes (const AntScan *scan);

/* Spot groups and the like, by time: they last days and carry no false-alarm claim. */
size_t ant_scan_passages (const AntScan *scan, const AntPassage **passage);
/* [series->n] the slow part of the record, ppm, its dips taken out and its gaps bridged; NULL before the last stage. */
const float *ant_scan_slow (const AntScan *scan);

/* Measure one asked dip (middle, T14) under the noise of a chunk centred on it, the dip masked while fitting; no search.
 * dip->snr etc. are filled; expected_false is NaN. ANT_NO_DATA if less than `least_coverage` of it is observed. */
AntStatus ant_scan_asked (const AntSeries *series, const AntScanOptions *options, double mid_d, double duration_d,
                          AntDip *dip);

#define ANT_ASKED_OTHERS 64

/* Under what an asked dip was measured: the chunk centred on it (no spectrum, no floor), and the strong events around it that were taken
 * out, of both signs. */
typedef struct
{
  AntChunk chunk;
  size_t n_others;
  AntDip other[ANT_ASKED_OTHERS];
} AntAskedScene;
/* The same, telling that too; scene NULL: not. */
AntStatus ant_scan_asked_scene (const AntSeries *series, const AntScanOptions *options, double mid_d, double duration_d,
                                AntDip *dip, AntAskedScene *scene);

typedef struct
{
  double depth_ppm, sigma_ppm, snr;
  double coverage; /* observed fraction of the shape, weighted by it */
} AntAmplitude;

/* The same for a shape that is known: loss [n] is the mean over the exposure of place first + i of the series, scaled so
 * that the amplitude sought is the depth. Only the depth is free. Places outside the series count as not observed; on
 * ANT_NO_DATA (too little of it observed) found->coverage holds what there is, if it could be told. */
AntStatus ant_scan_asked_shape (const AntSeries *series, const AntScanOptions *options, ptrdiff_t first, size_t n,
                                const double *loss, AntAmplitude *found);
