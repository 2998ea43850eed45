/* scan-results.h - what a scan of a record gave: everything that tables, window and report show, kept after the search's
 * own workspace is gone. Reference-counted, immutable once made, shared freely between threads. */
#pragma once

#include <glib.h>
#include "data/dip-list.h"
#include "data/record.h"
#include "data/repeat-results.h"
#include "data/settings.h"
#include "search/scan.h"
#include "verdict/verdict-work.h"

typedef struct
{
  AntRecord *record;         /* owned reference; NULL: read from a file, their record not yet (no flags then) */
  AntSettings settings;      /* those of the scan; its array pointers are not kept */
  AntScanReach reach;        /* below ANT_SCAN_COMPLETE: the scan was stopped */
  gsize n_dips, n_brightenings;
  AntDip *dip, *brightening; /* by time, numbered from 1 in this order */
  AntVerdict *dip_verdict, *brightening_verdict; /* [n_dips], [n_brightenings]; NULL if the scan was stopped before */
  gsize n_passages;
  AntPassage *passage;       /* by time, numbered from 1 in this order */
  float *slow_ppm;           /* [record->series.n] the slow part, dips taken out, gaps bridged; NULL unless complete,
                                or not kept by the file that they were read from */
  AntRepeatResults repeats;  /* dips that recur */
  gsize n_chunks;
  AntChunk *chunk;           /* frequency_cd and power_unmasked owned */
  gsize n_floor;             /* points of the median floor over chunks */
  AntFloorPoint floor[ANT_MAX_FLOOR];
  double threshold_snr;
  double expected_at_threshold;     /* noise-only dips of one sign expected at the threshold in this record */
  gsize n_surrogates, n_surrogate_events; /* that the false-alarm law was refitted to; 0: the built-in law */
  AntChanceLaw chance;              /* what noise alone is expected to show; all 0: not known */
  double observed_d;
  gsize n_refits;
  gsize n_mirror_dips, n_mirrored;  /* dips and brightenings of 9 h and less: the mirror's check */
  gsize n_spikes;
  guint32 *spike_row;        /* rows (from 0) that were found to be spikes */
  guint16 *flags;            /* [record->n_rows] the record's flags with the spikes found */
  GPtrArray *said;           /* char*: what the scan found out about the noise, one sentence each */
  gint ref_count;
} AntScanResults;

/* The mirror compares durations up to this: longer brightenings of the Sun (faculae) are no mirror of its spots. */
#define ANT_MIRROR_LONGEST_H 9.0

/* Copies what it needs of a scan that has run to its end or was concluded after a stop (reach above NOTHING). */
AntScanResults *ant_scan_results_new (AntRecord *record, const AntSettings *settings, const AntScan *scan);
AntScanResults *ant_scan_results_ref (AntScanResults *results);
void ant_scan_results_unref (AntScanResults *results); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntScanResults, ant_scan_results_unref)

/* Results that were read from a file get their record, once. FALSE if they do not fit it; they are as they were then. */
gboolean ant_scan_results_join (AntScanResults *results, AntRecord *record);
/* What verdicts on a record's events need to know besides these and their chunks; borrows from it. */
AntVerdictInput ant_verdict_input_of (const AntRecord *record, const AntSettings *settings);
/* What verdicts on these results need to know; borrows from them. */
AntVerdictInput ant_scan_results_verdict_input (const AntScanResults *results);
/* Copies the verdicts of a work that has run to its end: once, before the results are shared. */
void ant_scan_results_add_verdicts (AntScanResults *results, const AntVerdictWork *work);

/* The options of a search as the settings and the record's exposure give them. */
AntScanOptions ant_scan_results_options (const AntRecord *record, const AntSettings *settings);
/* A passage as lists and plots take it beside dips: start to end as its duration, depth over its uncertainty as its SNR. */
AntDip ant_passage_as_dip (const AntPassage *passage);
/* What a stopped scan lacks, as a sentence; NULL if it is complete. Static. */
const char *ant_scan_reach_words (AntScanReach reach);
/* The dips (or brightenings) as the view that tables take; valid as long as the results. */
AntDipList ant_scan_results_list (const AntScanResults *results, gboolean brightenings);
