/* units.h - constants and conversion factors, each with its source. Names carry their unit. */
#pragma once

#define ANT_SECONDS_PER_DAY 86400.0
#define ANT_HOURS_PER_DAY 24.0
#define ANT_MINUTES_PER_DAY 1440.0
#define ANT_PPM 1e-6

#define ANT_PI 3.14159265358979323846
#define ANT_TAU (2.0 * ANT_PI)

#define ANT_AU_KM 149597870.700          /* exact: IAU 2012 resolution B2 */
#define ANT_LIGHT_KM_S 299792.458        /* exact: SI */
#define ANT_SUN_RADIUS_KM 695700.0       /* nominal: IAU 2015 resolution B3 */
#define ANT_TSI_W_M2 1361.0              /* nominal total solar irradiance at 1 au: IAU 2015 resolution B3 */
#define ANT_EARTH_RADIUS_KM 6378.1       /* nominal equatorial: IAU 2015 resolution B3 */
/* 1/(1/25.38 - 1/365.256363): Carrington's sidereal 25.38 d seen from the Earth */
#define ANT_SYNODIC_ROTATION_D 27.275232

#define ANT_MAD_TO_SIGMA 1.482602218505602 /* 1/Phi^-1(3/4): a median absolute deviation as a Gaussian sigma */
