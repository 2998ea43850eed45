/* solar-limb.h - the Sun's limb darkening at one wavelength. */
#pragma once

#include "core/transit-curve.h"

/* Quadratic law at a wavelength, between 300 nm and 10 um (the nearest of these beyond): Cox 2000, Allen's Astrophysical
 * Quantities, section 14.7, I = 1 - u2 - v2 + u2 mu + v2 mu^2, between its rows by straight lines. */
AntLimbDarkening ant_solar_limb (double wavelength_nm);
