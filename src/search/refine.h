/* refine.h - the best crossing near a peak at continuous epoch, duration and edge, under the exact noise of the series.
 *
 * The amplitude is linear (generalised least squares, Aitken 1936); epoch, duration and edge are found by a shrinking
 * pattern search on the SNR (Hooke & Jeeves 1961, J. ACM 8, 212), eight trial shapes to one pass. The edge stays within
 * [least edge, half the duration], the duration within [shortest, longest]. */
#pragma once

#include "core/status.h"
#include "search/crossing-shape.h"
#include "search/dip-map.h"
#include "search/dip.h"

typedef struct
{
  double step_d, exposure_d;
  AntLimbDarkening limb_darkening;
  double shortest_d, longest_d; /* of T14 */
  double least_edge_d;
  double wander_d;              /* how far the middle may move from the peak; 0: half its duration plus its edge */
} AntRefineOptions;

typedef struct
{
  double centre;           /* places */
  double duration_d, edge_d, impact;
  double depth_ppm, sigma_ppm, snr; /* signed like the peak */
  double coverage;
  AntEdges edges;
  double mid_sigma_d, duration_sigma_d; /* from the curvature of the SNR; NaN if it cannot be had */
} AntShapeFit;

/* z = C^-1 y on the whitener's grid. sign +1 for dips, -1 for brightenings. */
AntStatus ant_refine (const AntWhitener *whitener, const double *z, const AntPeak *peak, int sign,
                      const AntRefineOptions *options, AntShapeFit *fit);
/* The amplitude of one given shape, with no search: coverage, edges, depth, sigma, snr are filled. */
AntStatus ant_measure (const AntWhitener *whitener, const double *z, const AntRefineOptions *options, AntShapeFit *fit);
/* Write a fit as a dip of the record whose place 0 is at start_d. */
void ant_shape_fit_to_dip (const AntShapeFit *fit, const AntRefineOptions *options, double start_d, AntDip *dip);
