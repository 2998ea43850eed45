/* sky-curve.c - an event's loss of light tabulated and integrated, so that exposures average it. */
#include "sky/sky-curve.h"

#include <math.h>
#include <stdlib.h>

#define NODES 4097 /* 5 s in a crossing of six hours */

AntStatus
ant_sky_curve_init (AntSkyCurve *curve, const AntSkyOptions *options, const AntSkyEvent *event)
{
  AntWatch watch;
  AntLook look;
  AntStatus status = ANT_OK;
  *curve = (AntSkyCurve){ .n = NODES, .start_tt_d = event->start_tt_d,
                          .step_d = (event->end_tt_d - event->start_tt_d) / (NODES - 1) };
  if (!(curve->step_d > 0))
    return ANT_BAD_ARGUMENT;
  curve->loss = malloc (NODES * sizeof *curve->loss);
  curve->total_d = malloc (NODES * sizeof *curve->total_d);
  if (!curve->loss || !curve->total_d)
    status = ANT_NO_MEMORY;
  ant_watch_init (&watch, event->body, options->observer, options->radii);
  for (size_t i = 0; i < NODES && !status; i++)
    {
      status = ant_watch_look (&watch, fmin (event->start_tt_d + (double) i * curve->step_d, event->end_tt_d), &look);
      if (status)
        break;
      curve->loss[i] = ant_look_loss (&look, options->limb_darkening);
      curve->total_d[i] = i ? curve->total_d[i - 1] + 0.5 * curve->step_d * (curve->loss[i - 1] + curve->loss[i]) : 0;
      curve->greatest = fmax (curve->greatest, curve->loss[i]);
    }
  if (status)
    ant_sky_curve_clear (curve);
  return status;
}

void
ant_sky_curve_clear (AntSkyCurve *curve)
{
  free (curve->loss);
  free (curve->total_d);
  *curve = (AntSkyCurve){ 0 };
}

/* Integral of the loss from the event's start to a time: the loss is straight between nodes. */
static double
total_to (const AntSkyCurve *curve, double tt_d)
{
  double place = (tt_d - curve->start_tt_d) / curve->step_d;
  if (!(place > 0))
    return 0;
  if (place >= (double) (curve->n - 1))
    return curve->total_d[curve->n - 1];
  size_t i = (size_t) place;
  double x = place - (double) i;
  return curve->total_d[i] + curve->step_d * x * (curve->loss[i] + 0.5 * x * (curve->loss[i + 1] - curve->loss[i]));
}

double
ant_sky_curve_mean (const AntSkyCurve *curve, double tt_d, double exposure_d)
{
  return (total_to (curve, tt_d + 0.5 * exposure_d) - total_to (curve, tt_d - 0.5 * exposure_d)) / exposure_d;
}
