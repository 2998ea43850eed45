/* view.c - numbers to paper and back. */
#include "plot/view.h"
#include <glib.h>
#include <math.h>

#define FAR 1e5 /* cairo's own numbers end at 2^23: a slanted line that leaves them draws nothing */

static double
fraction_of (double value, double from, double to, int is_log)
{
  return is_log ? log (value / from) / log (to / from) : (value - from) / (to - from);
}

static double
value_of (double fraction, double from, double to, int is_log)
{
  return is_log ? from * pow (to / from, fraction) : from + fraction * (to - from);
}

double
ant_view_x (const AntView *view, const AntBox *box, double x)
{
  double at = box->x + box->width * fraction_of (x, view->from, view->to, view->log_x);
  return CLAMP (at, box->x - FAR, box->x + box->width + FAR);
}

double
ant_view_y (const AntView *view, const AntBox *box, double y)
{
  double at = box->y + box->height * (1 - fraction_of (y, view->low, view->high, view->log_y));
  return CLAMP (at, box->y - FAR, box->y + box->height + FAR);
}

double
ant_view_at_x (const AntView *view, const AntBox *box, double x)
{
  return value_of ((x - box->x) / box->width, view->from, view->to, view->log_x);
}

double
ant_view_at_y (const AntView *view, const AntBox *box, double y)
{
  return value_of (1 - (y - box->y) / box->height, view->low, view->high, view->log_y);
}

static void
set_range (AntView *view, double from, double range, double whole_from, double whole_to)
{
  range = MIN (range, whole_to - whole_from);
  view->from = CLAMP (from, whole_from, whole_to - range);
  view->to = view->from + range;
}

void
ant_view_zoom (AntView *view, double factor, double at, double whole_from, double whole_to, double least)
{
  double range = view->to - view->from, fraction = (at - view->from) / range;
  double wanted = MAX (range / factor, MIN (least, whole_to - whole_from));
  set_range (view, at - fraction * wanted, wanted, whole_from, whole_to);
}

void
ant_view_pan (AntView *view, double fraction, double whole_from, double whole_to)
{
  double range = view->to - view->from;
  set_range (view, view->from + fraction * range, range, whole_from, whole_to);
}

int
ant_view_fit_y (AntView *view, const AntPyramid *pyramid, double start_d, double step_d)
{
  double n = (double) ant_pyramid_samples (pyramid);
  double first = CLAMP (ceil ((view->from - start_d) / step_d), 0, n);
  double last = CLAMP (floor ((view->to - start_d) / step_d) + 1, 0, n);
  AntExtent extent = ant_pyramid_extent (pyramid, (size_t) first, (size_t) last);
  if (extent.low > extent.high)
    return 0;
  double low = (double) extent.low, high = (double) extent.high;
  double air = high > low ? 0.07 * (high - low) : MAX (1, 0.01 * fabs (high));
  view->low = low - air;
  view->high = high + air;
  return 1;
}

void
ant_view_hold_y (AntView *view, double y)
{
  double air = 0.07 * (view->high - view->low);
  if (y + air > view->high)
    view->high = y + air;
  else if (y - air < view->low)
    view->low = y - air;
}

int
ant_box_holds (const AntBox *box, double x, double y)
{
  return x >= box->x && x <= box->x + box->width && y >= box->y && y <= box->y + box->height;
}

int
ant_boxes_meet (const AntBox *a, const AntBox *b)
{
  return a->x < b->x + b->width && b->x < a->x + a->width && a->y < b->y + b->height && b->y < a->y + a->height;
}
