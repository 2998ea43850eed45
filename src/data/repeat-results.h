/* repeat-results.h - what a search for repeats gave, kept after its workspace is gone; a part of AntScanResults. */
#pragma once

#include <glib.h>
#include "data/record.h"
#include "data/settings.h"
#include "search/repeats.h"

typedef struct
{
  gsize searched;              /* 0: not asked for, or the record allows no period */
  double done;                 /* part of the periods that was folded, 0..1; below 1: the search was stopped */
  double period_min_d, period_max_d;
  gsize least_events;
  gsize white;                 /* 1: the noise was taken for white */
  double threshold_snr, expected_at_threshold;
  gsize n;
  AntRepeat *repeat;           /* strongest first, numbered from 1 in this order; events owned */
  gsize n_mirrored;            /* brightenings that recur at or above the threshold */
  double best_mirrored_snr;    /* of the strongest that passes the other tests; 0: none was followed up */
  gsize n_periods;
  double *period_d, *period_snr, *period_duration_h; /* [n_periods] the best of each bin of ln P, rising; SNR 4 and more */
} AntRepeatResults;

/* The options as settings and record give them; dips are left to the caller. */
AntRepeatOptions ant_repeat_results_options (const AntRecord *record, const AntSettings *settings);
/* FALSE with one sentence if the settings contradict each other or ask for more than the record allows. */
gboolean ant_repeat_results_check (const AntRecord *record, const AntSettings *settings, GError **error);
/* Take over what a search found; it may have been stopped. */
void ant_repeat_results_take (AntRepeatResults *results, const AntRepeatOptions *options, AntRepeats *repeats);
void ant_repeat_results_clear (AntRepeatResults *results);
/* Add the sentences that people should read beside the list. */
void ant_repeat_results_say (const AntRepeatResults *results, const AntRecord *record, const AntSettings *settings, GPtrArray *said);
