/* fold.h - values against a clock of the instrument's own: the phase of an orbit, or the minutes since the end of the last gap. For
 * those who guard an instrument: what is locked to its orbit or to its waking shows here and nowhere in the Sun. */
#pragma once

#include <glib.h>
#include "core/status.h"
#include "noise/series.h"

typedef enum
{
  ANT_FOLD_ORBIT,     /* x is the phase, 0..1 */
  ANT_FOLD_SINCE_GAP, /* x is minutes since the end of the last gap */
} AntFoldClock;

typedef struct
{
  AntFoldClock clock;
  double period_d;    /* of the orbit; phase 0 at the time 0 */
  double gap_steps;   /* a gap is longer than so many steps */
  double reach_d;     /* how long after a gap is looked at */
  guint n_bins;
} AntFoldOptions;
#define ANT_FOLD_OPTIONS_INIT { .gap_steps = 1.5, .reach_d = 1.0 / 12.0, .n_bins = 48 }
#define ANT_MOST_FOLD_BINS 1024

typedef struct
{
  double x;           /* middle of the bin, as the clock says */
  double mean, sigma; /* mean of the values, and its error by their scatter in the bin; NaN below 1 and 2 of them */
  gsize n;
} AntFoldBin;

#define ANT_FOLD_DRIFT_TURNS 3.0
/* Take off a running median of so many turns of the orbit (or reaches after a gap): slow changes would be spread over all bins as
 * scatter. In place. */
AntStatus ant_fold_flatten (const AntSeries *series, const AntFoldOptions *options, float *value);
/* Values [series->n] (NaN where there are none) by the series' times; its own values decide where gaps are. bin [n_bins] out.
 * FALSE for a period or reach that is not positive, or more bins than ANT_MOST_FOLD_BINS. Pure. */
gboolean ant_fold (const AntSeries *series, const float *value, const AntFoldOptions *options, AntFoldBin *bin);
/* The greatest difference of two bins in units of its error, those of fewer than 5 values left out: above 5 or so there is something.
 * *swing is that of the means. NaN with fewer than two bins. */
double ant_fold_swing (const AntFoldBin *bin, guint n_bins, double *swing);
