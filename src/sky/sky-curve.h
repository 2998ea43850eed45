/* sky-curve.h - the light that an event takes, as it should stand in a record: loss against time, averaged over exposures.
 *
 * Follows the observer through the event, so the curve of somebody who circles the Earth wobbles as theirs does. */
#pragma once

#include "sky/sky-events.h"

typedef struct
{
  size_t n;            /* nodes, evenly spaced from the event's start to its end */
  double start_tt_d, step_d;
  double *loss;        /* [n] 0..1 */
  double *total_d;     /* [n] integral of the loss from the start */
  double greatest;     /* loss */
} AntSkyCurve;

/* One thread (places.h). On an error nothing is held. */
AntStatus ant_sky_curve_init (AntSkyCurve *curve, const AntSkyOptions *options, const AntSkyEvent *event);
void ant_sky_curve_clear (AntSkyCurve *curve);
/* Mean loss over an exposure (> 0) centred at tt_d. Pure. */
double ant_sky_curve_mean (const AntSkyCurve *curve, double tt_d, double exposure_d);
