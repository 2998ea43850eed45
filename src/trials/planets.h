/* planets.h - planets crossing the Sun, once or again and again, as the exposures see them. */
#pragma once

#include <stddef.h>
#include "core/transit-curve.h"

typedef struct
{
  double mid_d;         /* middle of a crossing, days from the record's start; any of them if it repeats */
  double period_d;      /* 0 = crosses once */
  AntCrossing crossing;
} AntTrialPlanet;

/* Mean loss over start..end (days from the middle of a crossing); the loss at start where end <= start. Within 1e-4 of
 * the greatest loss for any exposure: pieces of an eighth of the ingress or shorter. */
double ant_crossing_mean_loss (const AntCrossing *crossing, AntLimbDarkening ld, double start_d, double end_d);

/* Multiply value [n] by the light left, exposures of exposure_d starting every cadence_d from time 0. */
void ant_planet_dim (const AntTrialPlanet *planet, AntLimbDarkening ld, size_t n, double cadence_d, double exposure_d,
                     double *value);
