/* comparison.h - a record beside its witness, a second record of another instrument on the same Sun: both averaged onto the coarser
 * of the two grids, their ratio and difference, and how much of their noise they share.
 *
 * Reference-counted, immutable once made, shared freely between threads. docs/data.md gives the rules. */
#pragma once

#include <gio/gio.h>
#include "data/record.h"
#include "data/witness.h"
#include "noise/rebin.h"

#define ANT_N_COMMON_SCALES 3
extern const double ant_common_scales_h[ANT_N_COMMON_SCALES]; /* 1 h, 6 h, 1 d: of a dip */

typedef struct
{
  AntRecord *record, *witness; /* owned references */
  double shift_d;              /* add to the witness's time to get the record's */
  gboolean scales_known;       /* else the two clocks were taken to be one */

  gsize n;                     /* bins from the record's first sample to its last */
  double start_d, step_d;      /* middle of the first, in the record's time */
  float *record_ppm, *witness_ppm; /* [n] averages, each about the record's own median; NaN = not observed */
  float *ratio_ppm;            /* [n] record over witness about the median of that, ppm */
  float *difference_ppm;       /* [n] record less witness about the median of that, ppm of the record's median */
  gsize n_both;                /* bins that both have */
  double drift_d;              /* a running median so long was taken out of ratio and difference; 0 = nothing was */
  double ratio_scatter_ppm;    /* robust sigma of the ratio */
  double level_ratio;          /* median of record over witness */
  AntCommonNoise common[ANT_N_COMMON_SCALES]; /* NaN where the step is longer or too little is in common */
  gint ref_count;
} AntComparison;

/* Both gridded. drift_d: length of the running median that is taken out, 0 = none. NULL with one sentence: no common clock, no
 * overlap. */
AntComparison *ant_comparison_new (AntRecord *record, AntRecord *witness, double drift_d, GError **error);
AntComparison *ant_comparison_ref (AntComparison *comparison);
void ant_comparison_unref (AntComparison *comparison); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntComparison, ant_comparison_unref)

/* The correlation of the two noises for a dip of so many days: at the nearest of the scales that was measured, NaN if none was. */
double ant_comparison_correlation (const AntComparison *comparison, double duration_d, double *sigma);
/* What there is to tell, one sentence each. Caller unrefs (char*). */
GPtrArray *ant_comparison_words (const AntComparison *comparison);
