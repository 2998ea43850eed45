/* crossing-shape.c - a crossing tabulated and integrated, so that exposures average it exactly. */
#include "search/crossing-shape.h"
#include <math.h>
#include "core/units.h"

/* Nodes: a third over the flat part, the rest over the ingress, dense at both ends of each where the curve bends. */
static void
place_nodes (AntCrossingShape *shape)
{
  size_t inner = ANT_SHAPE_NODES / 3, outer = ANT_SHAPE_NODES - inner;
  double half = 0.5 * shape->duration_d, flat = half - shape->edge_d;
  if (flat < 1e-9 * half)
    {
      inner = 0;
      outer = ANT_SHAPE_NODES;
      flat = 0;
    }
  for (size_t i = 0; i < inner; i++)
    shape->time_d[i] = flat * sin (0.5 * ANT_PI * (double) i / (double) inner);
  for (size_t i = 0; i < outer; i++)
    shape->time_d[inner + i] = flat + (half - flat) * 0.5 * (1 - cos (ANT_PI * (double) i / (double) (outer - 1)));
}

/* shape->edge_d is set. */
static void
tabulate (AntCrossingShape *shape, const AntCrossing *crossing, AntLimbDarkening ld)
{
  shape->duration_d = crossing->t14_d;
  shape->impact = crossing->impact;
  place_nodes (shape);
  double greatest = ant_crossing_loss (crossing, ld, 0);
  for (size_t i = 0; i < ANT_SHAPE_NODES; i++)
    shape->loss[i] = ant_crossing_loss (crossing, ld, shape->time_d[i]) / greatest;
  shape->total_d[0] = 0;
  for (size_t i = 1; i < ANT_SHAPE_NODES; i++)
    {
      double width = shape->time_d[i] - shape->time_d[i - 1];
      double middle = ant_crossing_loss (crossing, ld, 0.5 * (shape->time_d[i] + shape->time_d[i - 1])) / greatest;
      shape->total_d[i] = shape->total_d[i - 1] + width / 6 * (shape->loss[i - 1] + 4 * middle + shape->loss[i]);
    }
}

void
ant_crossing_shape_init (AntCrossingShape *shape, double duration_d, double edge_d, double impact, AntLimbDarkening ld)
{
  AntCrossing crossing = { .impact = impact, .t14_d = duration_d,
                           .radius_ratio = ant_crossing_radius_for_ingress (impact, duration_d, edge_d) };
  shape->edge_d = edge_d;
  tabulate (shape, &crossing, ld);
}

void
ant_crossing_shape_of (AntCrossingShape *shape, const AntCrossing *crossing, AntLimbDarkening ld)
{
  shape->edge_d = ant_crossing_ingress_d (crossing);
  tabulate (shape, crossing, ld);
}

/* Integral of the loss from the middle to t >= 0: cubic through totals and losses at the two nodes around t. */
static double
integral (const AntCrossingShape *shape, double t)
{
  size_t low = 0, high = ANT_SHAPE_NODES - 1;
  if (t >= shape->time_d[high])
    return shape->total_d[high];
  while (high - low > 1)
    {
      size_t mid = (low + high) / 2;
      if (shape->time_d[mid] <= t)
        low = mid;
      else
        high = mid;
    }
  double width = shape->time_d[high] - shape->time_d[low], x = (t - shape->time_d[low]) / width;
  double rise = shape->total_d[high] - shape->total_d[low];
  double a = shape->loss[low] * width, b = shape->loss[high] * width;
  return shape->total_d[low] + x * (a + x * (3 * rise - 2 * a - b + x * (a + b - 2 * rise)));
}

double
ant_crossing_shape_mean (const AntCrossingShape *shape, double time_d, double exposure_d)
{
  double from = time_d - 0.5 * exposure_d, to = time_d + 0.5 * exposure_d;
  double upper = to < 0 ? -integral (shape, -to) : integral (shape, to);
  double lower = from < 0 ? -integral (shape, -from) : integral (shape, from);
  return (upper - lower) / exposure_d;
}

double
ant_crossing_shape_average (const AntCrossingShape *shape)
{
  return 2 * shape->total_d[ANT_SHAPE_NODES - 1] / shape->duration_d;
}

size_t
ant_crossing_shape_sample (const AntCrossingShape *shape, double centre, double step_d, double exposure_d, double scale,
                           ptrdiff_t *first, size_t room, size_t stride, double *value)
{
  double reach = 0.5 * (shape->duration_d + exposure_d) / step_d;
  *first = (ptrdiff_t) ceil (centre - reach);
  ptrdiff_t last = (ptrdiff_t) floor (centre + reach);
  size_t n = (size_t) (last - *first + 1);
  if (n > room)
    return 0;
  for (size_t i = 0; i < n; i++)
    value[i * stride]
      = scale * ant_crossing_shape_mean (shape, ((double) (*first + (ptrdiff_t) i) - centre) * step_d, exposure_d);
  return n;
}
