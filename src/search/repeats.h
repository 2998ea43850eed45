/* repeats.h - dips that recur: every period searched, the best refined, what survives listed.
 *
 * White noise: box least squares with a jointly fitted level (repeat-box.h). Fitted noise: its generalised form on the
 * whitened numerators and energies (repeat-edges.h, repeat-pairs.h, repeat-shared.h). Both fold by a tree (repeat-tree.h), keep the best
 * of every bin of ln P, climb from the peaks at full resolution (repeat-train.h), and judge by the law of repeat-chance.h.
 * The same search for brightenings stands beside it.
 *
 * A repeat is listed if its SNR reaches the threshold, at least least_events of its events are observed (half and more of
 * each), its SNR without its largest event is 5 and more, and its events agree: depths that scatter by more than half the
 * depth, beyond what noise explains, are several things that are not one.
 *
 * Known single dips are not counted twice: (1) a dip may be an event of a repeat; the event names it, and snr_unlisted is
 * the train's SNR without such events, the part of the evidence that the list of dips has not yet given. (2) Events of a listed
 * repeat are gaps for every later round, so that no dip belongs to two repeats. (3) When no more is found, one round is
 * made with all known dips as gaps, so that no strong dip hides a train of weak ones.
 *
 * Driven like a scan: ant_repeats_stages () with the repeats as work. After a stop they hold what was found until then. */
#pragma once

#include "core/stages.h"
#include "search/chunk.h"
#include "search/dip.h"
#include "search/repeat-grid.h"

#define ANT_MOST_REPEATS 4
#define ANT_REPEAT_ALIASES 5

typedef struct
{
  AntRepeatGrid grid;        /* period_max_d 0: as long as least_events allow */
  size_t least_events;       /* 2 or more */
  double false_alarms;       /* noise-only repeats a record: sets the threshold */
  int white;                 /* take the noise for white, with the stated errors or the record's own scatter */
  double edge_d;             /* of the trapezoids, fitted noise; at least the exposure */
  double exposure_d;
  AntLimbDarkening limb_darkening;
  size_t n_dips;
  const AntDip *dip;         /* known single dips, borrowed */
} AntRepeatOptions;

typedef struct
{
  double mid_d;              /* days from the record's origin */
  double depth_ppm, sigma_ppm, snr;
  double coverage;           /* observed part of its energy */
  long number;               /* event 0 is the one at epoch_d */
  size_t dip;                /* which of the known single dips this is, from 1; 0: none */
} AntRepeatEvent;

typedef struct
{
  int numerator, denominator; /* of its period in periods of the repeat: 1/2, 2, 1/3, 3, 3/2 */
  double period_d, snr;
} AntRepeatAlias;

typedef struct
{
  double period_d, period_sigma_d;
  double epoch_d;            /* middle of the event nearest to the middle of the record */
  double epoch_sigma_d;
  double duration_d;         /* contact I to IV; of the box in white noise */
  double depth_ppm, depth_sigma_ppm; /* greatest depth of the crossing, less what the choice of the best
                                        train adds; of the box in white noise, as it is */
  double snr;                /* train SNR */
  double snr_without_largest, snr_unlisted;
  double odd_even;           /* difference of odd and even events' depths, in sigma */
  double chi2;               /* of the events' depths, n_observed - 1 degrees of freedom */
  double expected_false;
  size_t n_observed;         /* events at least half observed; 2: nothing shows that the period is not a multiple */
  size_t n_events;           /* with any data at all */
  AntRepeatEvent *event;     /* [n_events] by time */
  AntRepeatAlias alias[ANT_REPEAT_ALIASES];
} AntRepeat;

/* Set numerator, denominator and period of the aliases of a period; their SNRs stay. */
void ant_repeat_name_aliases (AntRepeat *repeat);

typedef struct _AntRepeats AntRepeats;

/* chunk [n_chunks]: the fitted noise of the record, borrowed, not needed in white noise. ANT_NO_DATA: the record allows no
 * period of the range (ant_repeats_limits says which it does). The series' arrays must outlive the repeats. */
AntRepeats *ant_repeats_new (const AntSeries *series, const AntRepeatOptions *options, size_t n_chunks, const AntChunk *chunk,
                             AntStatus *status);
void ant_repeats_free (AntRepeats *repeats);
const AntStages *ant_repeats_stages (void);
/* Shortest and longest period that a record allows: eight edges (and three shortest dips), and least_events within the
 * observed span. */
void ant_repeats_limits (const AntSeries *series, const AntRepeatOptions *options, double *shortest_d, double *longest_d);

/* By SNR, strongest first. */
size_t ant_repeats_list (const AntRepeats *repeats, const AntRepeat **repeat);
/* Best SNR of every bin of ln P in the first round; power 0: below 4 and 0.6 of the threshold, or not reached. */
const AntRepeatBins *ant_repeats_spectrum (const AntRepeats *repeats);
AntRepeatGrid ant_repeats_grid (const AntRepeats *repeats);
double ant_repeats_threshold (const AntRepeats *repeats);
double ant_repeats_expected_false (const AntRepeats *repeats, double snr);
/* Brightenings at or above the threshold that pass the same tests (one at most is looked for), and the SNR of the best. */
size_t ant_repeats_mirrored (const AntRepeats *repeats, double *best_snr);
/* After a stop: keep the spectrum as far as the first round got. */
void ant_repeats_end_early (AntRepeats *repeats);
/* Part of the folding of the first round that was done, 0..1. */
double ant_repeats_done (const AntRepeats *repeats);
