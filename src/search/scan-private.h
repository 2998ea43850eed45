/* scan-private.h - what the stages of a scan share. */
#pragma once

#include "search/false-alarm.h"
#include "search/scan.h"

#define ANT_STRONG_SNR 8.0   /* masked and subtracted before weaker ones are looked for */
#define ANT_KEEP_SNR 3.5     /* weakest first-pass peak that is ever weighed */
#define ANT_SURROGATE_SNR 4.5  /* lowest final SNR of the surrogates that the law is fitted to: below it the search keeps only a part */
#define ANT_PER_CHUNK 400    /* most events of one sign kept for a chunk */

enum
{
  ANT_STAGE_LEARN,
  ANT_STAGE_SEARCH,
  ANT_STAGE_CHANCE,
  ANT_STAGE_WEIGH,
  ANT_STAGE_TOGETHER,
  ANT_STAGE_BORDER,
  ANT_STAGE_TRACE,
  ANT_N_STAGES,
};

/* One dip or brightening on its way; places are those of the record. */
typedef struct
{
  AntPeak peak;      /* of the first pass */
  AntShapeFit fit;
  AntShapeFit border_fit; /* of the last stage for events near a chunk's border, else the same as fit */
  int sign;          /* +1 dip, -1 brightening */
  int strong;        /* subtracted from scan->residual */
  int dropped;       /* the side lobe of a stronger event, or the same event found twice */
  size_t chunk;
} AntEvent;

/* What one chunk's slice leaves for finish to merge. */
typedef struct
{
  uint8_t *spike;    /* [chunk n] */
  size_t n_events;
  AntEvent *event;   /* strong ones and candidates */
  AntChanceField chance;
} AntChunkHarvest;

/* What one chunk's tracing leaves for finish to join. */
typedef struct
{
  float *slow_ppm;   /* [chunk n] */
  size_t n_passages;
  AntPassage *passage;
} AntTrace;

/* What one surrogate showed: final SNRs of both signs, without their sign. */
typedef struct
{
  size_t n;
  double *snr;
} AntSurrogate;

struct _AntScan
{
  AntStop own_stop;
  AntStop *stop;       /* own_stop, or that of the scan whose surrogate this is */
  size_t n_finished;   /* stages */
  AntPace pace;        /* of all passes over the record, where the scan is not itself a part of another */
  size_t passed_before; /* its count when the present stage began */
  AntSeries series;
  AntScanOptions options;
  AntRefineOptions refine;
  AntTemplateBank *bank;
  double start_curvature[ANT_MAX_FREE * ANT_MAX_FREE]; /* inverse Hessian of that fit */
  AntNoiseModel start; /* fitted to a representative stretch; its priors are centred on it */
  size_t n_chunks;
  AntChunk *chunk;
  AntChunkHarvest *harvest; /* [n_chunks] */
  float *residual;     /* [n] the record less its strong events */
  uint8_t *spike;      /* [n] ANT_SPIKE_FOUND or ANT_SPIKE_DIP (strong) */
  size_t n_events, n_kept;
  AntEvent *event;     /* strong first, then candidates to weigh */
  AntChanceLaw chance;
  AntSurrogate *surrogate; /* [options.surrogates] */
  size_t n_surrogate_events;
  double threshold_snr;
  size_t n_dips, n_brightenings;
  AntDip *dip, *brightening;
  AntTrace *trace;     /* [n_chunks] */
  float *slow_ppm;     /* [n] */
  size_t n_passages;
  AntPassage *passage;
};

/* The start: one slice. */
AntStatus ant_scan_learn_noise (AntScan *scan);
/* After the chunks: spikes and masks of each chunk's own stretch, and the chance field. */
void ant_scan_merge_chunks (AntScan *scan);
/* After the surrogates: the chance law, the threshold, strong events out of the residual, candidates listed. */
AntStatus ant_scan_settle_chance (AntScan *scan);
void ant_scan_drop_side_lobes (AntScan *scan);
/* The results: events that stand, as dips and brightenings by time. */
AntStatus ant_scan_list_dips (AntScan *scan);
void ant_scan_forget_harvest (AntScan *scan);
/* One chunk: fit, strong events, candidates, floor, spectrum. */
AntStatus ant_scan_search_chunk (AntScan *scan, size_t i);
/* A noise-only record from the chunks' models through the record's gaps: value [n] out. */
AntStatus ant_scan_draw_surrogate (const AntScan *scan, size_t surrogate, float *value);
/* One surrogate: draw, search, keep its SNRs. */
AntStatus ant_scan_try_surrogate (AntScan *scan, size_t i);
/* The chance law from all surrogates. */
AntStatus ant_scan_learn_chance (AntScan *scan);
/* Every stage up to the lists of dips and brightenings, one slice after another, for a scan inside a slice. */
AntStatus ant_scan_find_alone (AntScan *scan);
/* One candidate: mask, refit, weigh. */
AntStatus ant_scan_weigh (AntScan *scan, size_t event);
/* An event that stands near its chunk's border, fitted again in a stretch centred on it, the others taken out. */
AntStatus ant_scan_weigh_at_border (AntScan *scan, size_t event);
/* All accepted events of one chunk fitted together. */
AntStatus ant_scan_fit_together (AntScan *scan, size_t i);
/* The slow part of one chunk, its events taken out, and its passages. */
AntStatus ant_scan_trace_slow (AntScan *scan, size_t i);
/* All chunks' traces as one curve and one list. */
AntStatus ant_scan_join_traces (AntScan *scan);

/* value[p] += factor * (the fit's loss) for places p of a stretch that begins at place `first` of the record. */
void ant_scan_add_shape (const AntScan *scan, const AntShapeFit *fit, double factor, size_t first, size_t n, float *value);
/* Mark the places inside a fit's contacts, and a margin of a tenth of its duration. */
void ant_scan_mask (const AntScan *scan, double centre, double duration_d, size_t first, size_t n, uint8_t *spike);
