/* event-strips.c - small strips, one a row. */
#include "plot/event-strips.h"

#include <glib.h>
#include <math.h>

#define ROW_FONTS 4.2

double
ant_event_strips_row (const AntTheme *theme)
{
  return round (ROW_FONTS * theme->font_px);
}

static void
draw_strip (AntPen *pen, const AntBox *row, const AntEventStrips *strips, const AntEventStrip *strip, const AntView *view)
{
  AntBox area = { row->x + 4, row->y + 1.4 * pen->theme->font_px, row->width - 8, row->height - 1.6 * pen->theme->font_px };
  ant_pen_colour (pen, ANT_ROLE_GRID);
  ant_pen_across (pen, area.x, area.x + area.width, ant_view_y (view, &area, 0));
  ant_pen_clip (pen, row);
  ant_pen_colour (pen, ANT_ROLE_SERIES);
  for (size_t i = 0; i < strip->n; i++)
    if (isfinite (strip->ppm[i]))
      ant_pen_add_dot (pen, ant_view_x (view, &area, strip->hours[i]), ant_view_y (view, &area, strip->ppm[i]), 1.6);
  ant_pen_fill_added (pen);
  g_autofree double *x = g_new (double, strips->n_shape + 1), *y = g_new (double, strips->n_shape + 1);
  for (size_t i = 0; i < strips->n_shape; i++)
    {
      x[i] = ant_view_x (view, &area, strips->shape_hours[i]);
      y[i] = ant_view_y (view, &area, strips->shape_ppm[i]);
    }
  ant_pen_colour (pen, ANT_ROLE_CURVE);
  ant_pen_polyline (pen, strips->n_shape, x, y, 1.3);
  cairo_restore (pen->cr);
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  ant_pen_text (pen, strip->label, ANT_TEXT_SMALL, row->x + 6, row->y + 2, 0, 0);
}

void
ant_event_strips_paint (cairo_t *cr, const AntBox *box, const AntEventStrips *strips, const AntTheme *theme, double scale)
{
  AntPen pen;
  double height = ant_event_strips_row (theme), half = strips->n_shape ? fabs (strips->shape_hours[0]) : 1;
  AntView view = { -half, half, strips->low_ppm, MAX (strips->high_ppm, strips->low_ppm + 1e-6), FALSE, FALSE };
  ant_pen_begin (&pen, cr, theme, scale);
  ant_pen_colour (&pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (&pen, box);
  for (size_t i = 0; i < strips->n; i++)
    {
      AntBox row = { box->x, box->y + (double) i * height, box->width, height };
      if (i == strips->selected)
        {
          ant_pen_colour (&pen, ANT_ROLE_WASH);
          ant_pen_fill_box (&pen, &row);
        }
      draw_strip (&pen, &row, strips, &strips->strip[i], &view);
      ant_pen_colour (&pen, ANT_ROLE_GRID);
      ant_pen_across (&pen, row.x, row.x + row.width, row.y + row.height);
    }
  ant_pen_end (&pen);
}

size_t
ant_event_strips_at (const AntBox *box, const AntEventStrips *strips, const AntTheme *theme, double y)
{
  double row = floor ((y - box->y) / ant_event_strips_row (theme));
  return row >= 0 && row < (double) strips->n ? (size_t) row : strips->n;
}
