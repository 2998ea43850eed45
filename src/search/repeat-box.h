/* repeat-box.h - box least squares in white noise: the coarse search over all periods, phases and durations.
 *
 * With weights w = 1/sigma^2, W their sum and the record's weighted mean as level, a train of boxes has
 *   num = sum of w (level - y) inside,  den = sum of w inside,
 *   SNR = num / sqrt (den - den^2/W),   depth = num / (den - den^2/W):
 * the drop of chi^2 is SNR^2 when depth and level are fitted jointly (Kovacs, Zucker & Mazeh 2002, A&A 391, 369).
 *
 * For the coarse search, starts of boxes are taken at a sixth of the duration and folded by the tree; single boxes are cut at
 * 5 sigma there, lest one glitch fill the spectrum. What is lost on the way is measured in docs/search.md. */
#pragma once

#include "noise/series.h"
#include "search/repeat-edges.h"
#include "search/repeat-grid.h"
#include "search/repeat-pairs.h"
#include "search/repeat-tree.h"

typedef struct
{
  size_t n;
  double step_d;
  double *moment; /* [n+1] running sums of w (level - y) */
  double *weight; /* [n+1] running sums of w */
  double total;   /* W */
  double typical; /* median w of observed samples */
} AntRepeatBox;

/* Weights 1/sigma^2: sigma from the stated errors if there are any, else equal, scaled so that the MAD of the values about
 * their median is that of a Gaussian. weight [series->n] out, 0 at gaps. ANT_NO_DATA if that MAD is 0 or nothing is seen. */
AntStatus ant_repeat_white_weights (const AntSeries *series, double *weight);
/* weight [n]: 0 leaves a sample out. ANT_NO_DATA if all are. */
AntStatus ant_repeat_box_init (AntRepeatBox *box, const AntSeries *series, const double *weight);
void ant_repeat_box_clear (AntRepeatBox *box);

/* SNR and depth of sums over a train's samples. */
double ant_repeat_box_snr (const AntRepeatBox *box, double num, double den);
double ant_repeat_box_depth (const AntRepeatBox *box, double num, double den);

/* One duration's boxes, ready to fold. */
typedef struct
{
  double duration_d;
  double step_d;     /* between starts */
  size_t lead;       /* start 0 lies this many steps before place 0 */
  float inverse_total; /* 1/W in units of the arrays */
  AntFoldArrays arrays;
} AntRepeatBoxes;

/* steps: starts to a duration (6). longest_d: longest period that will be asked. */
AntStatus ant_repeat_boxes_init (AntRepeatBoxes *boxes, const AntRepeatBox *box, double duration_d, double steps, double longest_d);
/* The same for trapezoids under correlated noise, with exact energies from the table: a tree for each duration, where the
 * shared fold (repeat-shared.h) does not describe the energies. The level is out already. */
AntStatus ant_repeat_boxes_init_edges (AntRepeatBoxes *boxes, const AntRepeatEdges *edges, const AntRepeatPairs *pairs,
                                       double cadence_d, double duration_d, double step_d, double longest_d);
void ant_repeat_boxes_clear (AntRepeatBoxes *boxes);
/* Fold at periods from..to and keep the best in bins (which must hold them). least_events: rows that must be half full, about. */
AntStatus ant_repeat_boxes_search (const AntRepeatBoxes *boxes, double from_d, double to_d, double least_events,
                                   const AntStop *stop, AntRepeatBins *bins);
/* Where a range of periods that begins at from_d should end. */
double ant_repeat_boxes_chunk_end (const AntRepeatBoxes *boxes, double from_d);
