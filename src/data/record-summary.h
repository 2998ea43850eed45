/* record-summary.h - what there is to tell of a record: the numbers behind `info`. */
#pragma once

#include "data/record.h"

typedef struct
{
  gsize n_good;                  /* rows that no flag leaves out */
  gsize n_flagged[ANT_N_FLAGS];
  gboolean has_times;
  double first_d, last_d;        /* least and greatest time of all rows */

  /* With a grid only. */
  gsize n_places, n_observed;
  double jitter_rms_d, jitter_most_d; /* stamps about their places on the grid */
  double longest_gap_d, longest_gap_start_d;
  double scatter_ppm;            /* robust: 1.48 MAD of the values */
  double sample_scatter_ppm;     /* the same of differences of neighbours, over sqrt 2 */
} AntRecordSummary;

void ant_record_summarise (const AntRecord *record, gboolean gridded, AntRecordSummary *summary);
