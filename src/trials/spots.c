/* spots.c - the light that a rotating, growing and decaying spot group takes and its faculae give. */
#include "trials/spots.h"

#include <math.h>
#include "core/random.h"
#include "core/units.h"
#include "trials/streams.h"

#define SPOT_CONTRAST 0.32
#define FACULA_CONTRAST 0.05
#define FACULA_LIFE 3.0    /* decay time of faculae over that of spots */
#define LEAD_D 60.0        /* groups this long before the record are drawn too */
#define SMOOTH_D 0.1       /* the light curve is a low polynomial over it */
#define INSTANT_D (600.0 / 86400) /* over ten minutes the middle is the mean within 0.01 ppm */
#define LATITUDE_SCATTER_DEG 6.0

size_t
ant_spots_count (const AntSpotPlan *plan, double days)
{
  return (size_t)round (plan->groups_per_30d * (days + LEAD_D) / 30);
}

void
ant_spots_draw (const AntSpotPlan *plan, double days, uint64_t seed, AntSpotGroup *group)
{
  const size_t count = ant_spots_count (plan, days);
  AntRandom random;

  ant_random_seed (&random, seed, ANT_STREAM_SPOTS);
  for (size_t i = 0; i < count; i++)
    {
      const double area = plan->area_median * exp (plan->area_spread_ln * ant_random_normal (&random));
      const double side = ant_random_uniform (&random) < 0.5 ? -1 : 1;

      group[i].area = fmin (area, plan->area_max);
      group[i].latitude_deg = side * plan->latitude_deg + LATITUDE_SCATTER_DEG * ant_random_normal (&random);
      group[i].peak_d = (days + LEAD_D) * ant_random_uniform (&random) - LEAD_D;
      group[i].meridian_d = group[i].peak_d + plan->rotation_d * (ant_random_uniform (&random) - 0.5);
      group[i].growth_d = plan->growth_d;
      group[i].decay_d = plan->decay_d;
      group[i].facula_ratio = plan->facula_ratio;
    }
}

double
ant_spot_mu (const AntSpotGroup *group, double rotation_d, double time_d)
{
  return cos (group->latitude_deg * (ANT_PI / 180)) * cos (ANT_TAU * (time_d - group->meridian_d) / rotation_d);
}

/* Fraction of the greatest area: half a cosine up, an exponential down. */
static double
growth (const AntSpotGroup *group, double decay_d, double time_d)
{
  const double since_d = time_d - group->peak_d;

  if (since_d < 0 && group->growth_d > 0)
    return since_d <= -group->growth_d ? 0 : 0.5 * (1 + cos (ANT_PI * since_d / group->growth_d));
  if (since_d > 0 && decay_d > 0)
    return exp (-since_d / decay_d);
  return 1;
}

double
ant_spot_light (const AntSpotGroup *group, double rotation_d, double time_d)
{
  const double mu = ant_spot_mu (group, rotation_d, time_d);
  double spots, faculae;

  if (mu <= 0)
    return 0;
  spots = -SPOT_CONTRAST * growth (group, group->decay_d, time_d);
  faculae = FACULA_CONTRAST * group->facula_ratio * growth (group, FACULA_LIFE * group->decay_d, time_d) * (1 - mu);
  return group->area * (spots + faculae) * mu * (3 * mu + 2) / 2;
}

double
ant_spot_mean (const AntSpotGroup *group, double rotation_d, double start_d, double end_d)
{
  /* Gauss-Legendre, three points on pieces short against a disc passage. */
  const double node = sqrt (0.6);
  const int pieces = (int)ceil ((end_d - start_d) / SMOOTH_D);
  double sum = 0;

  if (end_d - start_d <= INSTANT_D)
    return ant_spot_light (group, rotation_d, (start_d + end_d) / 2);
  for (int i = 0; i < pieces; i++)
    {
      const double half_d = (end_d - start_d) / (2 * pieces);
      const double mid_d = start_d + (2 * i + 1) * half_d;

      sum += 5 * ant_spot_light (group, rotation_d, mid_d - node * half_d)
             + 8 * ant_spot_light (group, rotation_d, mid_d)
             + 5 * ant_spot_light (group, rotation_d, mid_d + node * half_d);
    }
  return sum / (18 * pieces);
}
