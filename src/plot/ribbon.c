/* ribbon.c - the whole record and the box of the view. */
#include "plot/ribbon.h"
#include <glib.h>
#include <math.h>
#include "plot/axes.h"
#include "plot/masks.h"
#include "plot/strip-data.h"

#define EDGE_PX 5      /* an edge is caught from this near */
#define LEAST_BOX_PX 3
#define VEIL 0.6       /* what is not in view shines through paper this thick */

AntBox
ant_ribbon_area (const AntBox *box, const AntTheme *theme)
{
  AntBox area = ant_axes_area (box, theme, FALSE);
  return (AntBox) { area.x, box->y + 2, area.width, MAX (1, box->height - 4) };
}

static AntView
whole_of (const AntRibbon *ribbon)
{
  double n = (double) MAX (1, ant_pyramid_samples (ribbon->pyramid));
  AntView whole = { .from = ribbon->start_d - ribbon->step_d / 2, .low = 0, .high = 1 };
  whole.to = whole.from + n * ribbon->step_d;
  ant_view_fit_y (&whole, ribbon->pyramid, ribbon->start_d, ribbon->step_d);
  return whole;
}

static void
box_ends (const AntBox *area, const AntView *whole, const AntView *view, double *x0, double *x1)
{
  *x0 = MAX (area->x, ant_view_x (whole, area, view->from));
  *x1 = MIN (area->x + area->width, ant_view_x (whole, area, view->to));
  double middle = (*x0 + *x1) / 2;
  if (*x1 - *x0 < LEAST_BOX_PX)
    {
      *x0 = middle - LEAST_BOX_PX / 2.0;
      *x1 = middle + LEAST_BOX_PX / 2.0;
    }
}

double
ant_ribbon_time_at (const AntBox *box, const AntRibbon *ribbon, const AntTheme *theme, double x)
{
  AntBox area = ant_ribbon_area (box, theme);
  AntView whole = whole_of (ribbon);
  return ant_view_at_x (&whole, &area, CLAMP (x, area.x, area.x + area.width));
}

AntRibbonPart
ant_ribbon_part_at (const AntBox *box, const AntRibbon *ribbon, const AntView *view, const AntTheme *theme, double x)
{
  AntBox area = ant_ribbon_area (box, theme);
  AntView whole = whole_of (ribbon);
  double x0, x1;
  box_ends (&area, &whole, view, &x0, &x1);
  if (x1 - x0 < 3 * EDGE_PX) /* a small box is moved; its edges are too near to each other to be caught */
    return x >= x0 - EDGE_PX && x <= x1 + EDGE_PX ? ANT_RIBBON_INSIDE : ANT_RIBBON_OUTSIDE;
  if (fabs (x - x0) <= EDGE_PX)
    return ANT_RIBBON_FROM_EDGE;
  if (fabs (x - x1) <= EDGE_PX)
    return ANT_RIBBON_TO_EDGE;
  return x > x0 && x < x1 ? ANT_RIBBON_INSIDE : ANT_RIBBON_OUTSIDE;
}

static void
draw_dips (AntPen *pen, const AntBox *area, const AntRibbon *ribbon, const AntView *whole)
{
  for (size_t d = 0; d < ribbon->n_dips; d++)
    {
      gboolean selected = d == ribbon->selected;
      double x = ant_pen_snap (pen, ant_view_x (whole, area, ribbon->dip[d].mid_d));
      double tall = selected ? area->height / 2 : MIN (5, area->height / 3), foot = area->y + area->height - 1;
      AntBox mark = { x - 1, foot - tall, 2, tall };
      ant_pen_set (pen, pen->theme->look[ribbon->dip[d].look]);
      ant_pen_fill_box (pen, &mark);
    }
}

/* A short grip on each edge says that it can be dragged. */
static void
draw_view_box (AntPen *pen, const AntBox *area, const AntView *whole, const AntView *view)
{
  double x0, x1;
  box_ends (area, whole, view, &x0, &x1);
  x0 = ant_pen_snap (pen, x0);
  x1 = ant_pen_snap (pen, x1);
  AntColour veil = pen->theme->role[ANT_ROLE_PAPER];
  veil.alpha = VEIL;
  ant_pen_set (pen, veil);
  AntBox before = { area->x, area->y, x0 - area->x, area->height };
  AntBox after = { x1, area->y, area->x + area->width - x1, area->height };
  ant_pen_fill_box (pen, &before);
  ant_pen_fill_box (pen, &after);
  ant_pen_colour (pen, ANT_ROLE_SELECTION);
  AntBox box = { x0, area->y, x1 - x0, area->height };
  ant_pen_frame_box (pen, &box);
  double grip = round (0.45 * area->height), top = round (area->y + (area->height - grip) / 2);
  AntBox left = { x0 - 1, top, 3, grip }, right = { x1 - 2, top, 3, grip };
  if (x1 - x0 >= 12)
    {
      ant_pen_fill_box (pen, &left);
      ant_pen_fill_box (pen, &right);
    }
}

void
ant_ribbon_paint (cairo_t *cr, const AntBox *box, const AntRibbon *ribbon, const AntView *view, const AntTheme *theme,
                  double scale)
{
  AntPen pen;
  ant_pen_begin (&pen, cr, theme, scale);
  AntBox area = ant_ribbon_area (box, theme), inner = { area.x, area.y + 2, area.width, MAX (1, area.height - 4) };
  AntView whole = whole_of (ribbon);
  AntStripData data = { ribbon->pyramid, ribbon->start_d, ribbon->step_d, NULL, NULL };
  ant_pen_colour (&pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (&pen, box);
  ant_strip_data_open (&data, &pen, &area, &whole);
  ant_pen_colour (&pen, ANT_ROLE_GAP);
  ant_strip_data_gaps (&pen, &area, &data, &whole);
  ant_pen_clip (&pen, &area);
  ant_strip_data_samples (&pen, &inner, &data, &whole, &theme->role[ANT_ROLE_QUIET]);
  ant_masks_paint (&pen, &area, &whole, ribbon->n_masks, ribbon->mask);
  ant_strip_data_close (&data);
  draw_dips (&pen, &area, ribbon, &whole);
  cairo_restore (cr);
  draw_view_box (&pen, &area, &whole, view);
  ant_pen_end (&pen);
}
