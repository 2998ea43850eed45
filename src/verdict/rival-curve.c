/* rival-curve.c - rival shapes as differences of their integrals, so that every exposure averages them exactly. */
#include "verdict/rival-curve.h"

#include <math.h>
#include "core/units.h"

#define MEMORY 14.0       /* an exponential is over after this many times: 1e-6 is left */
#define HALF_DEPTH 0.279567 /* full width at half depth of mu (3 mu + 2)/5 over the rotation period */
#define MOON 1.0          /* radius ratio of an eclipsing disc: the Moon from the Earth, 0.94 to 1.07 */

/* Integral from 0 to t of an exponential decay. */
static double
decay (double time_d, double t)
{
  return t > 0 ? -time_d * expm1 (-t / time_d) : 0;
}

/* Of a straight rise from 0 to 1. */
static double
ramp (double length_d, double t)
{
  t = fmax (0, fmin (t, length_d));
  return 0.5 * t * t / length_d;
}

/* Of a unit box with straight edges, from its start. */
static double
trapezoid (double length_d, double edge_d, double t)
{
  t = fmax (0, fmin (t, length_d));
  double rising = fmin (t, edge_d), falling = fmax (0, t - (length_d - edge_d));
  double flat = fmax (0, fmin (t, length_d - edge_d) - edge_d);
  return (edge_d > 0 ? 0.5 * (rising * rising - falling * falling) / edge_d : 0) + flat + falling;
}

/* Of mu (3 mu + 2)/5, mu the cosine of the angle from the meridian. */
static double
spot (double period_d, double t)
{
  double angle = fmax (-0.5 * ANT_PI, fmin (0.5 * ANT_PI, ANT_TAU * t / period_d));
  return (0.3 * (angle + sin (angle) * cos (angle)) + 0.4 * sin (angle)) * period_d / ANT_TAU;
}

static double
integral (const AntRivalCurve *curve, double t)
{
  const double *p = curve->parameter;
  switch (curve->kind)
    {
    case ANT_RIVAL_TRAPEZOID:
      return trapezoid (p[1], p[2] * p[1], t + 0.5 * p[1]);
    case ANT_RIVAL_STEP:
      return fmax (t, 0);
    case ANT_RIVAL_RECOVERY:
      return decay (p[1], t);
    case ANT_RIVAL_THERMAL:
    case ANT_RIVAL_FLARE:
      return ramp (p[1], t) + decay (p[2], t - p[1]);
    case ANT_RIVAL_SPIKE:
      return fmax (-0.5 * p[1], fmin (t, 0.5 * p[1]));
    case ANT_RIVAL_SPOT:
      return spot (p[1] / HALF_DEPTH, t);
    default:
      return NAN; /* crossing and eclipse have their table */
    }
}

static void
tabulate (AntRivalCurve *curve, AntLimbDarkening ld)
{
  const double *p = curve->parameter;
  AntCrossing crossing = { .radius_ratio = p[3], .impact = p[2], .t14_d = p[1] };
  ant_crossing_shape_of (&curve->table, &crossing, ld);
  curve->tied_depth_ppm = ant_transit_loss (crossing.radius_ratio, crossing.impact, ld) / ANT_PPM;
}

static void
stretch (const AntCrossingShape *unit, double t14_d, AntCrossingShape *shape)
{
  *shape = *unit;
  shape->duration_d *= t14_d;
  shape->edge_d *= t14_d;
  for (size_t i = 0; i < ANT_SHAPE_NODES; i++)
    {
      shape->time_d[i] *= t14_d;
      shape->total_d[i] *= t14_d;
    }
}

void
ant_rival_curve_init (AntRivalCurve *curve, AntRivalKind kind, const double parameter[ANT_RIVAL_PARAMETERS],
                      AntLimbDarkening ld, const AntCrossingShape *eclipse)
{
  double *p = curve->parameter, before = 0, after = HUGE_VAL;
  curve->kind = kind;
  curve->tied_depth_ppm = NAN;
  for (int i = 0; i < ANT_RIVAL_PARAMETERS; i++)
    p[i] = parameter[i];
  if (kind == ANT_RIVAL_CROSSING)
    tabulate (curve, ld);
  else if (kind == ANT_RIVAL_ECLIPSE)
    stretch (eclipse, p[1], &curve->table);
  else if (kind == ANT_RIVAL_RECOVERY)
    after = MEMORY * p[1];
  else if (kind == ANT_RIVAL_THERMAL || kind == ANT_RIVAL_FLARE)
    after = p[1] + MEMORY * p[2];
  if (kind == ANT_RIVAL_SPOT)
    before = after = 0.25 * p[1] / HALF_DEPTH;
  else if (kind != ANT_RIVAL_STEP && kind != ANT_RIVAL_RECOVERY && kind != ANT_RIVAL_THERMAL && kind != ANT_RIVAL_FLARE)
    before = after = 0.5 * p[1];
  curve->from_d = p[0] - before;
  curve->to_d = p[0] + after;
}

double
ant_rival_curve_mean (const AntRivalCurve *curve, double time_d, double exposure_d)
{
  double t = time_d - curve->parameter[0], half = 0.5 * exposure_d;
  if (curve->kind == ANT_RIVAL_CROSSING || curve->kind == ANT_RIVAL_ECLIPSE)
    return ant_crossing_shape_mean (&curve->table, t, exposure_d);
  return (integral (curve, t + half) - integral (curve, t - half)) / exposure_d;
}

void
ant_rival_curve_sample (const AntRivalCurve *curve, double time_d, double step_d, double exposure_d, double scale,
                        size_t n, size_t stride, double *value)
{
  double t = time_d - curve->parameter[0];
  int joined = fabs (exposure_d - step_d) < 1e-9 * step_d; /* one exposure ends where the next begins */
  if (!joined || curve->kind == ANT_RIVAL_CROSSING || curve->kind == ANT_RIVAL_ECLIPSE)
    {
      for (size_t i = 0; i < n; i++)
        value[i * stride] = scale * ant_rival_curve_mean (curve, time_d + (double) i * step_d, exposure_d);
      return;
    }
  double before = integral (curve, t - 0.5 * step_d);
  for (size_t i = 0; i < n; i++)
    {
      double after = integral (curve, t + ((double) i + 0.5) * step_d);
      value[i * stride] = scale * (after - before) / step_d;
      before = after;
    }
}

void
ant_rival_eclipse (AntLimbDarkening ld, double depth_ppm, AntCrossingShape *eclipse)
{
  double low = 0, high = 1 + MOON, wanted = fmin (fmax (fabs (depth_ppm), 0.01), 0.99e6) * ANT_PPM;
  for (int i = 0; i < 60; i++)
    {
      double mid = 0.5 * (low + high);
      if (ant_transit_loss (MOON, mid, ld) > wanted)
        low = mid;
      else
        high = mid;
    }
  AntCrossing crossing = { .radius_ratio = MOON, .impact = 0.5 * (low + high), .t14_d = 1 };
  ant_crossing_shape_of (eclipse, &crossing, ld);
}
