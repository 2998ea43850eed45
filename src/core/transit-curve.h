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

/* All functions: dimensionless radii in solar (stellar) radii, times in days; no allocation; safe from any thread. */

/* Fraction of light lost (0..1) for a dark disc of radius k at centre distance z, both in stellar radii; k, z >= 0.
 * Within 1e-11 of k^2 down to k = 1e-4 for laws with |u1|, |u2| of order 1: no cancellation of 1 - F. NaN for a NaN
 * argument. */
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
/* Least radius ratio at which a crossing of impact `impact` and length t14_d has ingress time ingress_d.
 * 0 <= impact < 1 (a body with b >= 1 never has a contact II), 0 < ingress_d <= t14_d/2; NaN outside. */
double ant_crossing_radius_for_ingress (double impact, double t14_d, double ingress_d);
/* Radius ratio at which the greatest loss of a crossing with this impact is `depth` (impact >= 0, 0 < depth < 1;
 * NaN outside). */
double ant_crossing_radius_for_depth (double impact, AntLimbDarkening ld, double depth);
