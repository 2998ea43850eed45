/* repeat-shared.h - the coarse search under correlated noise: one fold for all durations.
 *
 * Z and A of repeat-edges.h and repeat-pairs.h are folded together; at every trial period and phase
 *   SNR^2(phase, D) = (Z(phase) - Z(phase + D))^2 / (k(D) (A(phase) + A(phase + D))).
 * Only where Z less its least value within the durations' reach, over the least A and k there, exceeds what the bin of that
 * period already has are the single durations evaluated: an upper bound, so no maximum is lost. What wins there is held
 * against the table of energies, event by event, before it is kept. */
#pragma once

#include "search/repeat-edges.h"
#include "search/repeat-grid.h"
#include "search/repeat-pairs.h"
#include "search/repeat-tree.h"

typedef struct
{
  const AntRepeatEdges *edges; /* borrowed */
  const AntRepeatPairs *pairs; /* borrowed */
  double step_d;    /* between phases */
  double step;      /* the same in places */
  size_t n;         /* places of the record */
  size_t lead;
  double drift_top, drift_inner;
  size_t n_widths;  /* durations are 1 .. n_widths-1 steps */
  float *scale;     /* [n_widths] k of each */
  double shortest;  /* least D, steps */
  float typical;    /* median A in units of the arrays */
  double ramp_d;
  AntFoldArrays arrays;
} AntRepeatShared;

/* steps: phases to a ramp (2 or 4). Single edges are cut at 3.7 of their own scatter. longest_d: of the dips, contact I to IV;
 * period_d: longest that will be asked. */
AntStatus ant_repeat_shared_init (AntRepeatShared *shared, const AntRepeatEdges *edges, const AntRepeatPairs *pairs,
                                  double cadence_d, double steps, double drift_top, double longest_d, double period_d);
void ant_repeat_shared_clear (AntRepeatShared *shared);
/* Fold at periods from..to, with the durations that the grid has for each, and keep the best in bins. all: evaluate every
 * duration at every phase, for tests of the bound. */
AntStatus ant_repeat_shared_search (const AntRepeatShared *shared, const AntRepeatGrid *grid, double from_d, double to_d,
                                    double least_events, int all, const AntStop *stop, AntRepeatBins *bins);
double ant_repeat_shared_chunk_end (const AntRepeatShared *shared, double from_d);
