/* transit-curve.h - the light that is left while a dark disc crosses a limb-darkened Sun.
 * Mandel & Agol 2002, ApJ 580, L171, quadratic law I(mu)/I(1) = 1 - u1 (1-mu) - u2 (1-mu)^2. */
#pragma once

#include <stddef.h>
#include "core/status.h"

typedef struct
{
  double u1;
  double u2;
} AntLimbDarkening;

/* Bolometric default: quadratic 0.40, 0.19 (Neckel 2005 integrated over a Planck spectrum; common practice). */
#define ANT_LIMB_DARKENING_SUN ((AntLimbDarkening){ 0.40, 0.19 })

/* Fraction of light lost (0..1) for a dark disc of radius k at centre distance z, both in stellar radii; k, z >= 0.
 * Accurate to 1e-10 of the flux, and relative to the depth for small k (no cancellation of 1 - F). */
double ant_transit_loss (double k, double z, AntLimbDarkening ld);

/* A crossing along a straight chord at uniform speed. */
typedef struct
{
  double radius_ratio; /* k */
  double impact;       /* least centre distance, in solar radii; 0 <= b < 1+k */
  double t14_d;        /* contact I to contact IV */
} AntCrossing;

/* Centre distance at `time_d` from the middle of the crossing. */
double ant_crossing_separation (const AntCrossing *crossing, double time_d);
/* Loss at `time_d` from the middle; 0 outside the contacts. */
double ant_crossing_loss (const AntCrossing *crossing, AntLimbDarkening ld, double time_d);
/* Ingress time, contact I to II (= III to IV); T14/2 if the body never lies wholly on the disc. */
double ant_crossing_ingress_d (const AntCrossing *crossing);
/* Radius ratio at which a crossing of impact `impact` and length t14_d has ingress time ingress_d
 * (0 < ingress_d <= t14_d/2). */
double ant_crossing_radius_for_ingress (double impact, double t14_d, double ingress_d);
/* Radius ratio at which the greatest loss of a crossing with this impact is `depth` (0 < depth < 1). */
double ant_crossing_radius_for_depth (double impact, AntLimbDarkening ld, double depth);
