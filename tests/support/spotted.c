/* spotted.c - spots and faculae for the studies, drawn as the simulator draws them. */
#include "spotted.h"
#include <math.h>
#include <stdlib.h>
#include "core/units.h"
#include "trials/spots.h"

void
ant_study_add_spots (size_t n, double step_d, unsigned long seed, float *value)
{
  double days = (double) n * step_d;
  AntSpotPlan plan = { .rotation_d = ANT_SYNODIC_ROTATION_D, .groups_per_30d = 10, .area_median = 500e-6, .area_spread_ln = 0.9,
                       .area_max = 4000e-6, .latitude_deg = 18, .growth_d = 3, .decay_d = 12, .facula_ratio = 8 };
  size_t groups = ant_spots_count (&plan, days);
  AntSpotGroup *group = malloc ((groups + 1) * sizeof *group);
  ant_spots_draw (&plan, days, seed, group);
  for (size_t i = 0; i < n; i++)
    if (!isnan (value[i]))
      {
        double light = 0;
        for (size_t g = 0; g < groups; g++)
          light += ant_spot_light (&group[g], plan.rotation_d, ((double) i + 0.5) * step_d);
        value[i] += (float) (1e6 * light);
      }
  free (group);
}
