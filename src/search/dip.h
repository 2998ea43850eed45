/* dip.h - one dip (or brightening) as the search leaves it, and the definitions every table prints.
 *
 * duration = contact I to IV of the fitted shape; depth = its greatest depth before exposure smearing, relative to the
 * undimmed level at that time; mean depth = average of the shape over I..IV; radius ratio = of the dark disc whose
 * crossing is that deep. Brightenings have negative depth and SNR. */
#pragma once

#include <stddef.h>

typedef enum
{
  ANT_EDGES_NONE,
  ANT_EDGES_INGRESS,
  ANT_EDGES_EGRESS,
  ANT_EDGES_BOTH,
} AntEdges;

typedef struct
{
  double mid_d;           /* middle, days from the record's origin */
  double duration_d;      /* contact I to IV */
  double edge_d;          /* ingress, contact I to II, of the fitted shape */
  double depth_ppm;
  double depth_sigma_ppm;
  double mean_depth_ppm;
  double radius_ratio;
  double snr;             /* final: after mask and refit, -num/sqrt(den) of the fitted shape */
  double first_snr;       /* of the best template on the first pass */
  double mid_sigma_d;     /* formal error of the middle */
  double duration_sigma_d;
  double expected_false;  /* noise-only dips expected to reach this SNR in this record */
  double coverage;        /* observed fraction of I..IV, weighted by the shape */
  AntEdges edges;         /* which of ingress and egress have data */
  size_t chunk;           /* chunk whose noise model measured it */
} AntDip;

const char *ant_edges_text (AntEdges edges); /* "both", "ingress", "egress", "none" */
