/* repeat-edges.h - edges of dips under correlated noise: one array from which the numerator of every duration follows.
 *
 * A trapezoid that begins at place a, with ramps of length tau and its half depth lasting D, is the difference of two
 * smoothed steps, T(t) = R(t - a) - R(t - a - D). With z = C^-1 y its numerator is therefore, exactly and for every D,
 *   num(a, D) = Z(a) - Z(a + D),   Z(a) = (F(a + tau) - F(a)) / tau,   F(x) = sum over i < x of (x - i) z_i,
 * F being linear between places, so that a and tau may be any numbers. Its energy g = T'C^-1 T has no such form;
 * repeat-pairs.h approximates it. A box averaged over an exposure of one cadence is such a trapezoid with tau = 1 place. */
#pragma once

#include <stddef.h>
#include "core/status.h"

typedef struct
{
  size_t n;
  double ramp;    /* tau, places */
  double *moment; /* [n+1] running sums of z, their mean over the record taken off: it cancels in every difference */
  double *twice;  /* [n+1] F at places 0 .. n, of the same */
} AntRepeatEdges;

/* z [n], 0 at gaps. ramp > 0. */
AntStatus ant_repeat_edges_init (AntRepeatEdges *edges, size_t n, const double *z, double ramp);
void ant_repeat_edges_clear (AntRepeatEdges *edges);
/* Z at any place, also outside the record. */
double ant_repeat_edges_at (const AntRepeatEdges *edges, double place);
