/* strip.c - layout of a strip: words above, data, marks of the dips, axes. */
#include "plot/strip.h"
#include <glib.h>
#include <glib/gi18n.h>
#include <math.h>
#include "plot/axes.h"
#include "plot/masks.h"
#include "plot/labels.h"
#include "plot/number-text.h"
#include "plot/strip-data.h"
#include "plot/time-ticks.h"

#define LEAST_BRACKET_PX 9
#define HIT_PX 4

AntBox
ant_strip_area (const AntBox *box, const AntTheme *theme, int time_axis)
{
  AntBox area = ant_axes_area (box, theme, FALSE);
  if (!time_axis)
    area.height = MAX (1, box->y + box->height - area.y - round (0.6 * theme->font_px));
  return area;
}

double
ant_strip_extra_height (const AntTheme *theme, int time_axis)
{
  AntBox box = { 0, 0, 1000, 1000 };
  return 1000 - ant_strip_area (&box, theme, time_axis).height;
}

static void
dip_span (const AntBox *area, const AntView *view, const AntDipMark *dip, double least, double *x0, double *x1)
{
  double from = ant_view_x (view, area, dip->mid_d - dip->duration_d / 2);
  double to = ant_view_x (view, area, dip->mid_d + dip->duration_d / 2);
  double short_of = MAX (0, least - (to - from)) / 2;
  *x0 = from - short_of;
  *x1 = to + short_of;
}

size_t
ant_strip_dip_at (const AntBox *box, const AntStrip *strip, const AntView *view, const AntTheme *theme, double x,
                  double y)
{
  AntBox area = ant_strip_area (box, theme, strip->time_axis);
  size_t best = ANT_NO_DIP;
  double nearest = INFINITY;
  if (x < area.x || x > area.x + area.width || y < box->y || y > area.y + area.height)
    return ANT_NO_DIP;
  for (size_t d = 0; d < strip->n_dips; d++)
    {
      double x0, x1;
      dip_span (&area, view, &strip->dip[d], LEAST_BRACKET_PX, &x0, &x1);
      double off = fabs (x - (x0 + x1) / 2);
      if (x >= x0 - HIT_PX && x <= x1 + HIT_PX && off < nearest)
        {
          best = d;
          nearest = off;
        }
    }
  return best;
}

static void
draw_wash (AntPen *pen, const AntBox *area, const AntStrip *strip, const AntView *view)
{
  if (strip->selected >= strip->n_dips)
    return;
  double x0, x1;
  dip_span (area, view, &strip->dip[strip->selected], LEAST_BRACKET_PX, &x0, &x1);
  x0 = MAX (x0, area->x);
  x1 = MIN (x1, area->x + area->width);
  AntBox wash = { x0, area->y, x1 - x0, area->height };
  ant_pen_colour (pen, ANT_ROLE_WASH);
  if (x1 > x0)
    ant_pen_fill_box (pen, &wash);
}

/* A bracket hangs from the top edge of the area. */
static void
draw_bracket (AntPen *pen, const AntBox *area, double x0, double x1, AntDipLook look, gboolean selected)
{
  double width = selected ? 2 : 1, tall = 0.45 * pen->theme->font_px, far = area->x + area->width;
  double a = ant_pen_snap (pen, MAX (x0, area->x)), b = ant_pen_snap (pen, MIN (x1, far));
  AntBox bar = { a, area->y, b - a, width }, left = { a, area->y, width, tall },
         right = { b - width, area->y, width, tall };
  ant_pen_set (pen, pen->theme->look[look]);
  ant_pen_fill_box (pen, &bar);
  if (x0 >= area->x)
    ant_pen_fill_box (pen, &left);
  if (x1 <= far)
    ant_pen_fill_box (pen, &right);
}

static void
draw_words (AntPen *pen, const AntDipMark *dip, const char *number, const AntBox *box)
{
  double font = pen->theme->font_px, y = box->y + box->height / 2;
  ant_pen_dip (pen, dip->look, box->x + 0.45 * font, y, 0.33 * font, FALSE);
  ant_pen_colour (pen, ANT_ROLE_TEXT);
  ant_pen_text (pen, number, ANT_TEXT_STRONG, box->x + font, y, 0, 0.5);
}

/* Bracket, and above it shape and number if there is room in the line of words. */
static void
mark_dip (AntPen *pen, const AntBox *area, const AntStrip *strip, const AntView *view, size_t d, AntLabelField *lane)
{
  double x0, x1, font = pen->theme->font_px, far = area->x + area->width;
  const AntDipMark *dip = &strip->dip[d];
  dip_span (area, view, dip, LEAST_BRACKET_PX, &x0, &x1);
  if (x1 < area->x || x0 > far)
    return;
  draw_bracket (pen, area, x0, x1, dip->look, d == strip->selected);
  char number[16];
  ant_dip_mark_label (dip, sizeof number, number);
  AntTextSize size = { ant_pen_measure (pen, number, ANT_TEXT_STRONG).width + 1.4 * font, 1.3 * font };
  double half = size.width / 2, middle = CLAMP ((MAX (x0, area->x) + MIN (x1, far)) / 2, area->x + half, far - half);
  double y = area->y - 0.1 * font;
  AntAnchor anchor[] = { { middle, y, 0.5, 1 }, { middle, y, 0.2, 1 }, { middle, y, 0.8, 1 },
                         { MAX (lane->within.x, area->x) + 1, y, 0, 1 } };
  AntBox words;
  if (ant_labels_reserve (lane, size, d == strip->selected ? 4 : 3, anchor, &words))
    draw_words (pen, dip, number, &words);
}

/* The selected dip's words come first, so that the others give way to them. */
static void
draw_brackets (AntPen *pen, const AntBox *area, const AntStrip *strip, const AntView *view, double title_end)
{
  double font = pen->theme->font_px;
  g_autofree AntLabelField *lane = g_new (AntLabelField, 1);
  AntBox within = { title_end, area->y - 2 * font, area->x + area->width - title_end + 0.1, 2 * font };
  ant_labels_begin (lane, &within);
  if (strip->selected < strip->n_dips)
    mark_dip (pen, area, strip, view, strip->selected, lane);
  for (size_t d = 0; d < strip->n_dips; d++)
    if (d != strip->selected)
      mark_dip (pen, area, strip, view, d, lane);
}

static void
duration_text (double days, size_t size, char *text)
{
  double minutes = days * 1440;
  char number[48];
  if (minutes < 59.5)
    {
      ant_plot_number_text (minutes, minutes < 9.95 && fabs (minutes - round (minutes)) > 0.05 ? 1 : 0, sizeof number,
                       number);
      g_snprintf (text, size, _("%s min averages"), number);
    }
  else if (minutes < 36 * 60)
    {
      double hours = minutes / 60;
      ant_plot_number_text (hours, fabs (hours - round (hours)) > 0.05 ? 1 : 0, sizeof number, number);
      g_snprintf (text, size, _("%s h averages"), number);
    }
  else
    {
      ant_plot_number_text (days, fabs (days - round (days)) > 0.05 ? 1 : 0, sizeof number, number);
      g_snprintf (text, size, _("%s d averages"), number);
    }
}

/* Whether the number of a dip would stand left of x: quiet words give way to it. */
static gboolean
dips_left_of (const AntBox *area, const AntStrip *strip, const AntView *view, double x)
{
  for (size_t d = 0; strip->brackets && d < strip->n_dips; d++)
    {
      double x0, x1;
      dip_span (area, view, &strip->dip[d], LEAST_BRACKET_PX, &x0, &x1);
      if (x1 > area->x && (MAX (x0, area->x) + MIN (x1, area->x + area->width)) / 2 < x)
        return TRUE;
    }
  return FALSE;
}

/* Title in text colour, the rest quiet where there is room; returns where the words end. */
static double
draw_title (AntPen *pen, const AntBox *area, const AntStrip *strip, const AntView *view, size_t averaged)
{
  double font = pen->theme->font_px, x = area->x, y = area->y - 0.75 * font;
  g_autoptr (GString) quiet = g_string_new (strip->caption ? strip->caption : "");
  if (averaged > 0)
    {
      char text[96];
      duration_text ((double) averaged * strip->step_d, sizeof text, text);
      g_string_append_printf (quiet, "%s%s", quiet->len ? " · " : "", text);
    }
  if (strip->title)
    {
      ant_pen_colour (pen, ANT_ROLE_TEXT);
      ant_pen_text (pen, strip->title, ANT_TEXT_LABEL, x, y, 0, 0.5);
      x += ant_pen_measure (pen, strip->title, ANT_TEXT_LABEL).width + 0.9 * font;
    }
  double width = ant_pen_measure (pen, quiet->str, ANT_TEXT_SMALL).width, end = x + width + 0.9 * font;
  if (quiet->len && end < area->x + area->width && !dips_left_of (area, strip, view, end + font))
    {
      ant_pen_colour (pen, ANT_ROLE_QUIET);
      ant_pen_text (pen, quiet->str, ANT_TEXT_SMALL, x, y, 0, 0.5);
      x = end;
    }
  return x;
}

static void
draw_line (AntPen *pen, const AntBox *area, const AntView *view, double level)
{
  if (isnan (level) || level < view->low || level > view->high)
    return;
  double dashes[] = { 5, 3 }, y = ant_pen_snap (pen, ant_view_y (view, area, level)) + ant_pen_hair (pen) / 2;
  cairo_save (pen->cr);
  ant_pen_colour (pen, ANT_ROLE_THRESHOLD);
  cairo_set_line_width (pen->cr, 1);
  cairo_set_dash (pen->cr, dashes, 2, 0);
  cairo_move_to (pen->cr, area->x, y);
  cairo_line_to (pen->cr, area->x + area->width, y);
  cairo_stroke (pen->cr);
  cairo_restore (pen->cr);
}

/* Short marks from both edges: they say when something should have happened without covering what did. */
static void
draw_ticks (AntPen *pen, const AntBox *area, const AntStrip *strip, const AntView *view)
{
  double length = MIN (0.6 * pen->theme->font_px, area->height / 4);
  ant_pen_colour (pen, ANT_ROLE_TEXT);
  for (size_t i = 0; i < strip->n_ticks; i++)
    if (strip->tick_d[i] >= view->from && strip->tick_d[i] <= view->to)
      {
        double x = ant_view_x (view, area, strip->tick_d[i]);
        ant_pen_down (pen, x, area->y, area->y + length);
        ant_pen_down (pen, x, area->y + area->height - length, area->y + area->height);
      }
}

/* Ticks of the labels' own unit, brought back to the values'. */
static void
value_ticks (AntPen *pen, const AntBox *area, const AntStrip *strip, const AntView *view, AntTicks *ticks)
{
  AntRuler ruler = ant_axes_ruler_y (pen, area);
  double zero = strip->label_per != 0 ? strip->label_zero : 0, per = strip->label_per != 0 ? strip->label_per : 1;
  double low = zero + per * view->low, high = zero + per * view->high;
  ant_ticks_linear (MIN (low, high), MAX (low, high), &ruler, ticks);
  for (size_t i = 0; i < ticks->n; i++)
    ticks->tick[i].value = (ticks->tick[i].value - zero) / per;
}

void
ant_strip_paint (cairo_t *cr, const AntBox *box, const AntStrip *strip, const AntView *view, const AntTheme *theme,
                 double scale)
{
  AntPen pen;
  AntTicks x, y;
  ant_pen_begin (&pen, cr, theme, scale);
  AntBox area = ant_strip_area (box, theme, strip->time_axis);
  AntStripData data = { strip->pyramid, strip->start_d, strip->step_d, strip->averages, strip->curve };
  AntRuler ruler = ant_axes_ruler_x (&pen, &area, area.x - box->x, box->x + box->width - area.x - area.width);
  ruler.before_px = 0.5 * theme->font_px; /* the context stands there */
  ant_ticks_time (strip->time, view->from, view->to, &ruler, &x);
  value_ticks (&pen, &area, strip, view, &y);

  ant_pen_colour (&pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (&pen, box);
  ant_pen_clip (&pen, &area);
  ant_axes_grid (&pen, &area, view, &x, &y);
  ant_strip_data_open (&data, &pen, &area, view);
  ant_pen_colour (&pen, ANT_ROLE_GAP);
  ant_strip_data_gaps (&pen, &area, &data, view);
  draw_wash (&pen, &area, strip, view);
  ant_strip_data_samples (&pen, &area, &data, view, NULL);
  size_t averaged = ant_strip_data_averages (&pen, &area, &data, view);
  if (strip->curve)
    ant_strip_data_curve (&pen, &area, &data, view);
  ant_strip_data_close (&data);
  draw_line (&pen, &area, view, strip->line);
  draw_ticks (&pen, &area, strip, view);
  ant_masks_paint (&pen, &area, view, strip->n_masks, strip->mask);
  cairo_restore (cr);

  ant_axes_bottom (&pen, &area, view, &x, strip->time_axis);
  ant_axes_left (&pen, &area, view, &y);
  double title_end = draw_title (&pen, &area, strip, view, averaged);
  if (strip->brackets)
    draw_brackets (&pen, &area, strip, view, title_end);
  ant_pen_end (&pen);
}
