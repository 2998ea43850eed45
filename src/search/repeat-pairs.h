/* repeat-pairs.h - the energy of a dip as that of its two edges: g(a, D) = k(D) (A(a) + A(a + D)), near enough to fold.
 *
 * Under noise that is redder than white, what a sharp-edged dip tells is told at its edges. The exact energies of
 * trapezoids (repeat-edges.h) of many durations are tabulated, chunk by chunk, and A and k fitted to all of them by
 * alternating multiplicative least squares (Lee & Seung 2001, NIPS 13, 556), which keeps both positive. The fit finds
 * candidates; each is then held against the table, since the fit can be off by a third for short dips in a low orbit. */
#pragma once

#include <stddef.h>
#include "core/stages.h"
#include "noise/whitener.h"

#define ANT_PAIR_DURATIONS 32

typedef struct
{
  size_t stride;       /* places between starts: half a ramp, at least 1 */
  double ramp;         /* tau, places */
  size_t lead;         /* start 0 lies this many strides before place 0 */
  size_t n_starts;
  size_t n_durations;
  size_t strides[ANT_PAIR_DURATIONS]; /* D of each column in strides, rising */
  float *energy;       /* [n_starts][n_durations] exact g */
  float *edge;         /* [n_starts] A */
  double scale[ANT_PAIR_DURATIONS];   /* k */
  double full[ANT_PAIR_DURATIONS];    /* g of a well observed dip: 0.9 quantile of those above 0 */
  double typical;      /* median A where something is observed */
  double misfit;       /* rms of fit/exact - 1 where g is half of a full one and more and D three ramps and more */
} AntRepeatPairs;

/* Plan the table for a record of n places and durations up to `longest` places. */
AntStatus ant_repeat_pairs_init (AntRepeatPairs *pairs, size_t n, double ramp, double longest);
void ant_repeat_pairs_clear (AntRepeatPairs *pairs);
/* Exact energies of starts in places [from, to) of the record under the whitener of a stretch that begins at place `first`.
 * Disjoint ranges may be filled from several threads. */
AntStatus ant_repeat_pairs_tabulate (AntRepeatPairs *pairs, const AntWhitener *whitener, size_t first, double from, double to,
                                     const AntStop *stop);
/* Fit A and k. ANT_NO_DATA if nothing is observed. */
AntStatus ant_repeat_pairs_fit (AntRepeatPairs *pairs);
/* Table value of a dip that begins at a place (first contact) and whose half depth lasts `duration` places, linear between
 * starts and durations; 0 outside. */
double ant_repeat_pairs_energy (const AntRepeatPairs *pairs, double place, double duration);
/* The same of a well observed dip. */
double ant_repeat_pairs_full (const AntRepeatPairs *pairs, double duration);
/* A at any place and k of any duration (places), linear between the tabulated ones. */
double ant_repeat_pairs_edge (const AntRepeatPairs *pairs, double place);
double ant_repeat_pairs_scale (const AntRepeatPairs *pairs, double duration);
