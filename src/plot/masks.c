/* masks.c - hatching of spans that are left out. */
#include "plot/masks.h"

#include <math.h>

#define HATCH_PX 7.0
#define LEAST_PX 2.0 /* a span is seen however short it is */

/* Lines from lower left to upper right; they stand still on the page, so that neighbours join. */
static void
hatch (AntPen *pen, const AntBox *box)
{
  cairo_t *cr = pen->cr;
  cairo_save (cr);
  cairo_rectangle (cr, box->x, box->y, box->width, box->height);
  cairo_clip (cr);
  cairo_set_line_width (cr, 1);
  for (double x = floor ((box->x - box->height) / HATCH_PX) * HATCH_PX; x < box->x + box->width; x += HATCH_PX)
    {
      cairo_move_to (cr, x, box->y + box->height);
      cairo_line_to (cr, x + box->height, box->y);
    }
  cairo_stroke (cr);
  cairo_restore (cr);
}

void
ant_masks_paint (AntPen *pen, const AntBox *area, const AntView *view, size_t n, const AntSpan *mask)
{
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  for (size_t i = 0; i < n; i++)
    {
      if (mask[i].end_d < view->from || mask[i].start_d > view->to)
        continue;
      double from = fmax (ant_view_x (view, area, mask[i].start_d), area->x);
      double to = fmin (fmax (ant_view_x (view, area, mask[i].end_d), from + LEAST_PX), area->x + area->width);
      AntBox box = { ant_pen_snap (pen, from), area->y, 0, area->height };
      box.width = fmax (ant_pen_snap (pen, to) - box.x, LEAST_PX);
      hatch (pen, &box);
      ant_pen_down (pen, box.x, box.y, box.y + box.height);
      ant_pen_down (pen, box.x + box.width - 1, box.y, box.y + box.height);
    }
}
