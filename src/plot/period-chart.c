/* period-chart.c - a column for every pixel of the spectrum, marks for what stands in it. */
#include "plot/period-chart.h"

#include <glib.h>
#include <glib/gi18n.h>
#include <math.h>

#include "plot/axes.h"
#include "plot/dip-mark.h"

#define LOWEST_SNR 3.5
#define NEAR_PX 5

void
ant_period_chart_view (const AntPeriodChart *chart, AntView *view)
{
  double high = MAX (chart->threshold_snr, 7);
  for (size_t i = 0; i < chart->n; i++)
    high = MAX (high, chart->snr[i]);
  for (size_t i = 0; i < chart->n_repeats; i++)
    high = MAX (high, chart->repeat_snr[i]);
  gboolean any = chart->from_d > 0 && chart->to_d > chart->from_d;
  *view = (AntView) { .from = any ? 0.95 * chart->from_d : 0.5, .to = any ? 1.05 * chart->to_d : 100, .low = LOWEST_SNR,
                      .high = high + 0.12 * (high - LOWEST_SNR), .log_x = TRUE };
}

static double
at_x (const AntBox *area, const AntView *view, double period_d)
{
  return period_d >= view->from && period_d <= view->to ? ant_view_x (view, area, period_d) : NAN;
}

/* What of a column of pixels the spectrum reaches: its highest value. */
static void
draw_spectrum (AntPen *pen, const AntBox *area, const AntPeriodChart *chart, const AntView *view)
{
  double foot = area->y + area->height, px = -INFINITY, top = foot;
  ant_pen_colour (pen, ANT_ROLE_TRACE);
  for (size_t i = 0; i <= chart->n; i++)
    {
      double x = i < chart->n ? floor (ant_view_x (view, area, chart->period_d[i])) : INFINITY;
      if (x != px && px > -INFINITY)
        ant_pen_add_box (pen, px, top, px + 1, foot);
      if (x != px)
        top = foot;
      px = x;
      top = i < chart->n ? MIN (top, ant_view_y (view, area, chart->snr[i])) : top;
    }
  ant_pen_fill_added (pen);
}

static void
draw_line (AntPen *pen, const AntBox *area, double x, double dash)
{
  double dashes[] = { dash, dash };
  if (isnan (x))
    return;
  cairo_save (pen->cr);
  cairo_set_line_width (pen->cr, 1);
  cairo_set_dash (pen->cr, dashes, dash > 0 ? 2 : 0, 0);
  cairo_move_to (pen->cr, floor (x) + 0.5, area->y);
  cairo_line_to (pen->cr, floor (x) + 0.5, area->y + area->height);
  cairo_stroke (pen->cr);
  cairo_restore (pen->cr);
}

static void
draw_marks (AntPen *pen, const AntBox *area, const AntPeriodChart *chart, const AntView *view)
{
  ant_pen_colour (pen, ANT_ROLE_SHAPE);
  for (size_t i = 0; i < chart->n_aliases; i++)
    draw_line (pen, area, at_x (area, view, chart->alias_d[i]), 3);
  ant_pen_colour (pen, ANT_ROLE_SELECTION);
  draw_line (pen, area, at_x (area, view, chart->chosen_d), 0);
  if (chart->threshold_snr > 0)
    {
      double y = ant_view_y (view, area, chart->threshold_snr);
      ant_pen_colour (pen, ANT_ROLE_THRESHOLD);
      ant_pen_across (pen, area->x, area->x + area->width, y);
      ant_pen_text (pen, _("threshold"), ANT_TEXT_SMALL, area->x + area->width - 4, y - 2, 1, 1);
    }
  for (size_t i = 0; i < chart->n_repeats; i++)
    {
      char number[16];
      double x = at_x (area, view, chart->repeat_d[i]), y = ant_view_y (view, area, chart->repeat_snr[i]);
      if (isnan (x))
        continue;
      ant_pen_dip (pen, ANT_LOOK_UNDECIDED, x, y, 5, chart->repeat_d[i] == chart->chosen_d);
      g_snprintf (number, sizeof number, "%zu", i + 1);
      ant_pen_colour (pen, ANT_ROLE_TEXT);
      ant_pen_text (pen, number, ANT_TEXT_STRONG, x + 9, y, 0, 0.5);
    }
}

void
ant_period_chart_paint (cairo_t *cr, const AntBox *box, const AntPeriodChart *chart, const AntView *view, const AntTheme *theme,
                        double scale)
{
  AntPen pen;
  AntTicks x, y;
  ant_pen_begin (&pen, cr, theme, scale);
  AntBox area = ant_axes_area (box, theme, TRUE);
  AntRuler across = ant_axes_ruler_x (&pen, &area, theme->font_px, theme->font_px), up = ant_axes_ruler_y (&pen, &area);
  ant_ticks_log (view->from, view->to, &across, &x);
  ant_ticks_linear (view->low, view->high, &up, &y);
  ant_pen_colour (&pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (&pen, box);
  ant_axes_grid (&pen, &area, view, &x, &y);
  ant_pen_clip (&pen, &area);
  draw_spectrum (&pen, &area, chart, view);
  draw_marks (&pen, &area, chart, view);
  cairo_restore (cr);
  ant_axes_bottom (&pen, &area, view, &x, TRUE);
  ant_axes_left (&pen, &area, view, &y);
  ant_axes_titles (&pen, &area, _("Train SNR"), _("Period, days"));
  ant_pen_end (&pen);
}

double
ant_period_chart_at (const AntBox *box, const AntPeriodChart *chart, const AntView *view, const AntTheme *theme, double x, double y)
{
  AntBox area = ant_axes_area (box, theme, TRUE);
  if (!ant_box_holds (&area, x, y))
    return NAN;
  double best_d = ant_view_at_x (view, &area, x), best_snr = -1;
  for (size_t i = 0; i < chart->n; i++)
    if (fabs (ant_view_x (view, &area, chart->period_d[i]) - x) <= NEAR_PX && chart->snr[i] > best_snr)
      {
        best_d = chart->period_d[i];
        best_snr = chart->snr[i];
      }
  for (size_t i = 0; i < chart->n_repeats; i++)
    if (fabs (ant_view_x (view, &area, chart->repeat_d[i]) - x) <= NEAR_PX)
      best_d = chart->repeat_d[i];
  return best_d;
}
