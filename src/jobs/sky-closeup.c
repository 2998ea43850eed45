/* sky-closeup.c - a predicted event's surroundings in the record, with the curve it should have. */
#include <glib/gi18n.h>
#include <math.h>

#include "core/robust.h"
#include "core/units.h"
#include "jobs/sky-list.h"

#define MOST_POINTS 160
#define SHAPE_POINTS 401
#define HALF_WIDTH 1.2     /* of a close-up, in lengths of the event */
#define LEAST_SAMPLES 6.0  /* on either side of the middle, where samples are longer than the event */

typedef struct
{
  const AntSkyCurve *curve;
  double origin_tt_d, mid_d, exposure_d;
} Expected;

/* Loss in ppm of the Sun's light at hours from the middle, averaged over an exposure. */
static double
expected_ppm (const Expected *expected, double hours)
{
  double at_d = expected->mid_d + hours / ANT_HOURS_PER_DAY;
  return 1e6 * ant_sky_curve_mean (expected->curve, expected->origin_tt_d + at_d, expected->exposure_d);
}

static void
add_shape (AntSkyCloseup *closeup, const Expected *expected, const char *name, double factor, double half_h)
{
  gsize at = closeup->closeup.n_shapes++;
  double *hours = closeup->curve + 2 * at * SHAPE_POINTS, *ppm = hours + SHAPE_POINTS;
  for (int i = 0; i < SHAPE_POINTS; i++)
    {
      hours[i] = half_h * (2.0 * i / (SHAPE_POINTS - 1) - 1);
      ppm[i] = -factor * expected_ppm (expected, hours[i]);
    }
  closeup->shape[at] = (AntShapeLine) { name, SHAPE_POINTS, hours, ppm };
}

/* The points stand on the level beside the event, as the curve does: the median of what the curve leaves. */
static void
level (AntSkyCloseup *closeup, const Expected *expected, double factor)
{
  double *hours = closeup->points, *ppm = hours + MOST_POINTS, left[MOST_POINTS] = { 0 };
  gsize n = closeup->closeup.n, n_left = 0;
  for (gsize i = 0; i < n; i++)
    if (isfinite (ppm[i]))
      left[n_left++] = ppm[i] + factor * expected_ppm (expected, hours[i]);
  double median = ant_median (n_left, left, left);
  for (gsize i = 0; i < n && isfinite (median); i++)
    ppm[i] -= median;
}

AntSkyCloseup *
ant_sky_closeup_new (const AntSkyList *list, gsize index, const AntLayers *layers)
{
  const AntSighting *sighting = &list->sighting[index];
  const AntSeries *series = &layers->record->series;
  AntSkyCloseup *closeup = g_new0 (AntSkyCloseup, 1);
  closeup->points = g_new (double, 3 * MOST_POINTS);
  closeup->curve = g_new (double, 4 * SHAPE_POINTS);
  double *hours = closeup->points, *ppm = hours + MOST_POINTS, *error = ppm + MOST_POINTS;
  double mid_d = (sighting->start_d + sighting->end_d) / 2;
  double half_d = fmax (HALF_WIDTH * (sighting->end_d - sighting->start_d), LEAST_SAMPLES * series->step_d);
  gsize n = ant_dip_closeup_points (series->n, layers->residual_ppm, series->start_d, series->step_d, mid_d, half_d, NAN,
                                    MOST_POINTS, hours, ppm, error);
  closeup->closeup = (AntDipCloseup) { .n = n, .hours = hours, .ppm = ppm, .error_ppm = error, .shape = closeup->shape,
                                       .contact_h = { (sighting->contact_d[ANT_CONTACT_1] - mid_d) * ANT_HOURS_PER_DAY,
                                                      (sighting->contact_d[ANT_CONTACT_4] - mid_d) * ANT_HOURS_PER_DAY } };
  const AntSkyPicture *picture = list->picture[index];
  if (!picture || n == 0 || !(picture->curve.greatest > 0))
    return closeup;
  Expected expected = { &picture->curve, list->origin_tt_d, mid_d,
                        layers->record->exposure_d > 0 ? layers->record->exposure_d : series->step_d };
  double measured = sighting->measured.depth_ppm / (1e6 * picture->curve.greatest);
  add_shape (closeup, &expected, _("predicted"), 1, half_d * ANT_HOURS_PER_DAY);
  if (isfinite (measured))
    add_shape (closeup, &expected, _("measured depth"), measured, half_d * ANT_HOURS_PER_DAY);
  level (closeup, &expected, isfinite (measured) ? measured : 1);
  return closeup;
}

void
ant_sky_closeup_free (AntSkyCloseup *closeup)
{
  if (!closeup)
    return;
  g_free (closeup->points);
  g_free (closeup->curve);
  g_free (closeup);
}
