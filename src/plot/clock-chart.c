/* clock-chart.c - a dot and its error for every bin, on a line at zero. */
#include "plot/clock-chart.h"

#include <glib.h>
#include <glib/gi18n.h>
#include <math.h>

#include "plot/axes.h"

#define DOT_PX 2.5

void
ant_clock_chart_view (const AntClockChart *chart, AntView *view)
{
  double low = 0, high = 0, half = chart->n > 1 ? 0.5 * (chart->bin[1].x - chart->bin[0].x) : 0.5;
  for (size_t b = 0; b < chart->n; b++)
    {
      double error = isfinite (chart->bin[b].sigma) ? chart->bin[b].sigma : 0;
      if (!isfinite (chart->bin[b].mean))
        continue;
      low = MIN (low, chart->bin[b].mean - error);
      high = MAX (high, chart->bin[b].mean + error);
    }
  double air = high > low ? 0.1 * (high - low) : 1;
  *view = (AntView) { .from = 0, .to = chart->n ? chart->bin[chart->n - 1].x + half : 1, .low = low - air, .high = high + air };
}

static void
draw_bins (AntPen *pen, const AntBox *area, const AntClockChart *chart, const AntView *view)
{
  ant_pen_colour (pen, ANT_ROLE_TRACE);
  for (size_t b = 0; b < chart->n; b++)
    {
      const AntFoldBin *bin = &chart->bin[b];
      if (isfinite (bin->mean) && isfinite (bin->sigma))
        ant_pen_down (pen, ant_view_x (view, area, bin->x), ant_view_y (view, area, bin->mean + bin->sigma),
                      ant_view_y (view, area, bin->mean - bin->sigma));
    }
  for (size_t b = 0; b < chart->n; b++)
    if (isfinite (chart->bin[b].mean))
      ant_pen_add_dot (pen, ant_view_x (view, area, chart->bin[b].x), ant_view_y (view, area, chart->bin[b].mean), DOT_PX);
  ant_pen_fill_added (pen);
}

void
ant_clock_chart_paint (cairo_t *cr, const AntBox *box, const AntClockChart *chart, const AntView *view, const AntTheme *theme,
                       double scale)
{
  AntPen pen;
  AntTicks x, y;
  ant_pen_begin (&pen, cr, theme, scale);
  AntBox area = ant_axes_area (box, theme, TRUE);
  AntRuler across = ant_axes_ruler_x (&pen, &area, theme->font_px, theme->font_px), up = ant_axes_ruler_y (&pen, &area);
  ant_ticks_linear (view->from, view->to, &across, &x);
  ant_ticks_linear (view->low, view->high, &up, &y);
  ant_pen_colour (&pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (&pen, box);
  ant_axes_grid (&pen, &area, view, &x, &y);
  ant_pen_clip (&pen, &area);
  ant_pen_colour (&pen, ANT_ROLE_FRAME);
  ant_pen_across (&pen, area.x, area.x + area.width, ant_view_y (view, &area, 0));
  draw_bins (&pen, &area, chart, view);
  cairo_restore (cr);
  ant_axes_bottom (&pen, &area, view, &x, TRUE);
  ant_axes_left (&pen, &area, view, &y);
  ant_axes_titles (&pen, &area, chart->title, chart->clock == ANT_FOLD_ORBIT ? _("Phase of the orbit") : _("Minutes since a gap"));
  ant_pen_end (&pen);
}
