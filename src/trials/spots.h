/* spots.h - dark spot groups with their bright faculae, rotating past with the Sun.
 *
 * A group of area A (fraction of the visible hemisphere) at heliocentric mu = cos (angle from disc centre) changes the
 * irradiance by dS/S = -0.32 A mu (3 mu + 2)/2: the photometric sunspot index (Hudson, Silva, Woodard & Willson 1982,
 * Solar Phys. 76, 211; coefficient from memory). Its faculae, facula_ratio times its area, add
 * +0.05 A_f mu (3 mu + 2)/2 (1 - mu): invisible at the centre, brightest between centre and limb (our own simple form
 * with the known behaviour). */
#pragma once

#include <stddef.h>
#include <stdint.h>

typedef struct
{
  double meridian_d;   /* a passage of the central meridian, days from the record's start */
  double latitude_deg;
  double area;         /* at its greatest, fraction of the hemisphere */
  double peak_d;       /* when that is */
  double growth_d;     /* from emergence to peak; 0 = it was there before the record */
  double decay_d;      /* exponential, of the spots; the faculae take three times as long; 0 = they stay */
  double facula_ratio; /* area of faculae over area of spots */
} AntSpotGroup;

typedef struct
{
  double rotation_d; /* synodic */
  /* Groups drawn at random: median area and spread in ln, cut at the greatest; latitudes either side of the equator. */
  double groups_per_30d;
  double area_median, area_spread_ln, area_max;
  double latitude_deg;
  double growth_d, decay_d, facula_ratio;
  size_t n_listed;
  const AntSpotGroup *listed; /* [n_listed] borrowed */
} AntSpotPlan;

/* How many groups the plan draws for a record of `days`, and the groups themselves [ant_spots_count]. Groups that
 * emerge up to two months before the record are among them, so that it begins with a Sun as spotted as it ends. */
size_t ant_spots_count (const AntSpotPlan *plan, double days);
void ant_spots_draw (const AntSpotPlan *plan, double days, uint64_t seed, AntSpotGroup *group);

/* Cosine of the angle from disc centre; 0 or less behind the limb. */
double ant_spot_mu (const AntSpotGroup *group, double rotation_d, double time_d);
/* Relative change of the irradiance at an instant, and its mean over start..end. */
double ant_spot_light (const AntSpotGroup *group, double rotation_d, double time_d);
double ant_spot_mean (const AntSpotGroup *group, double rotation_d, double start_d, double end_d);
