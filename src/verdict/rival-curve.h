/* rival-curve.h - the shapes that compete to explain an event, at continuous parameters, averaged over the exposure.
 *
 * Every shape is positive where light is lost and has 1 as its greatest value, so that its amplitude is a depth. A shape
 * has an epoch and up to three more parameters; verdict/priors.h lists them with their ranges. Times are days. */
#pragma once

#include "search/crossing-shape.h"

typedef enum
{
  ANT_RIVAL_CROSSING,  /* middle, T14, impact, radius ratio k: a dark disc crosses; its depth follows from k */
  ANT_RIVAL_TRAPEZOID, /* middle, length, edge over length: flat between straight edges */
  ANT_RIVAL_STEP,      /* onset: the level changes and stays */
  ANT_RIVAL_RECOVERY,  /* onset, time: a step that returns exponentially */
  ANT_RIVAL_THERMAL,   /* onset, length of the fall, time of return: a straight fall that returns exponentially */
  ANT_RIVAL_SPIKE,     /* middle, length: a short box */
  ANT_RIVAL_SPOT,      /* middle, width at half depth: a spot carried over the disc by rotation (Hudson et al. 1982) */
  ANT_RIVAL_ECLIPSE,   /* middle, T14: a disc as large as the Sun covers part of it */
  ANT_RIVAL_FLARE,     /* onset, length of the rise, time of decay: the same, bright and quick */
  ANT_N_RIVALS,
} AntRivalKind;

#define ANT_RIVAL_PARAMETERS 4 /* the epoch first */

/* A shape made ready to be read. */
typedef struct
{
  AntRivalKind kind;
  double parameter[ANT_RIVAL_PARAMETERS];
  double from_d, to_d;   /* nonzero between these; to_d is HUGE_VAL for a step */
  double tied_depth_ppm; /* of a crossing: the depth that its radius ratio gives; NaN where the depth is free */
  AntCrossingShape table; /* of crossing and eclipse */
} AntRivalCurve;

/* eclipse: ant_rival_eclipse of the event's depth, scaled to the T14 asked for; unused by other shapes. */
void ant_rival_curve_init (AntRivalCurve *curve, AntRivalKind kind, const double parameter[ANT_RIVAL_PARAMETERS],
                           AntLimbDarkening ld, const AntCrossingShape *eclipse);
/* Mean over an exposure (> 0) centred on time_d. */
double ant_rival_curve_mean (const AntRivalCurve *curve, double time_d, double exposure_d);
/* The same of n neighbouring exposures, the first centred on time_d, step_d apart, times `scale`; value has `stride`
 * between samples. */
void ant_rival_curve_sample (const AntRivalCurve *curve, double time_d, double step_d, double exposure_d, double scale,
                             size_t n, size_t stride, double *value);
/* An eclipse of T14 one day by a disc as large as the Sun that takes this much of its light at most. */
void ant_rival_eclipse (AntLimbDarkening ld, double depth_ppm, AntCrossingShape *eclipse);
