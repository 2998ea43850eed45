/* axes.c - what stands around the data. */
#include "plot/axes.h"
#include <glib.h>
#include <math.h>

#define TICK_PX 4
#define MINOR_TICK_PX 2.5
#define LABEL_GAP_PX 3

static double
width_of (void *data, const char *label, int strong)
{
  return ant_pen_measure (data, label, strong ? ANT_TEXT_STRONG : ANT_TEXT_LABEL).width;
}

static double
height_of (void *data, const char *label, int strong)
{
  AntPen *pen = data;
  return 1.2 * pen->theme->font_px;
}

AntRuler
ant_axes_ruler_x (AntPen *pen, const AntBox *area, double before, double after)
{
  return (AntRuler) { area->width, 1.6 * pen->theme->font_px, before, after, width_of, pen };
}

AntRuler
ant_axes_ruler_y (AntPen *pen, const AntBox *area)
{
  double font = pen->theme->font_px, gap = area->height > 14 * font ? 1.6 * font : 0.7 * font;
  return (AntRuler) { area->height, gap, 0.6 * font, 0.6 * font, height_of, pen };
}

void
ant_axes_grid (AntPen *pen, const AntBox *area, const AntView *view, const AntTicks *x, const AntTicks *y)
{
  ant_pen_colour (pen, ANT_ROLE_GRID);
  for (size_t i = 0; x && i < x->n_labelled; i++)
    ant_pen_down (pen, ant_view_x (view, area, x->tick[i].value), area->y, area->y + area->height);
  for (size_t i = 0; y && i < y->n_labelled; i++)
    ant_pen_across (pen, area->x, area->x + area->width, ant_view_y (view, area, y->tick[i].value));
}

void
ant_axes_bottom (AntPen *pen, const AntBox *area, const AntView *view, const AntTicks *ticks, int labelled)
{
  double foot = area->y + area->height, font = pen->theme->font_px;
  ant_pen_colour (pen, ANT_ROLE_FRAME);
  ant_pen_across (pen, area->x, area->x + area->width, foot);
  for (size_t i = 0; i < ticks->n; i++)
    {
      double x = ant_view_x (view, area, ticks->tick[i].value);
      double right = area->x + area->width - ant_pen_hair (pen);
      ant_pen_down (pen, MIN (x, right), foot, foot + (i < ticks->n_labelled ? TICK_PX : MINOR_TICK_PX));
    }
  if (!labelled)
    return;
  double text_y = foot + TICK_PX + LABEL_GAP_PX;
  for (size_t i = 0; i < ticks->n_labelled; i++)
    {
      const AntTick *tick = &ticks->tick[i];
      ant_pen_colour (pen, tick->strong ? ANT_ROLE_TEXT : ANT_ROLE_QUIET);
      ant_pen_text (pen, tick->label, tick->strong ? ANT_TEXT_STRONG : ANT_TEXT_LABEL,
                    ant_view_x (view, area, tick->value), text_y, 0.5, 0);
    }
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  if (ticks->context[0])
    ant_pen_text (pen, ticks->context, ANT_TEXT_SMALL, area->x - 0.55 * font, text_y + 0.04 * font, 1, 0);
}

void
ant_axes_left (AntPen *pen, const AntBox *area, const AntView *view, const AntTicks *ticks)
{
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  for (size_t i = 0; i < ticks->n_labelled; i++)
    ant_pen_text (pen, ticks->tick[i].label, ANT_TEXT_LABEL, area->x - 0.55 * pen->theme->font_px,
                  ant_view_y (view, area, ticks->tick[i].value), 1, 0.5);
}

void
ant_axes_titles (AntPen *pen, const AntBox *area, const char *above, const char *below)
{
  double font = pen->theme->font_px;
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  if (above)
    ant_pen_text (pen, above, ANT_TEXT_LABEL, area->x, area->y - 0.4 * font, 0, 1);
  if (below)
    ant_pen_text (pen, below, ANT_TEXT_LABEL, area->x + area->width / 2, area->y + area->height + 2.1 * font, 0.5, 0);
}

AntBox
ant_axes_area (const AntBox *box, const AntTheme *theme, int title_below)
{
  double font = theme->font_px;
  double left = round (5.7 * font), right = round (1.5 * font), top = round (1.8 * font);
  double bottom = round ((title_below ? 3.7 : 2.1) * font);
  return (AntBox) { box->x + left, box->y + top, MAX (1, box->width - left - right),
                   MAX (1, box->height - top - bottom) };
}

void
ant_frame_begin (AntFrame *frame, AntPen *pen, const AntBox *box, const AntView *view, int grid_across)
{
  double font = pen->theme->font_px;
  frame->area = ant_axes_area (box, pen->theme, TRUE);
  AntRuler across = ant_axes_ruler_x (pen, &frame->area, font, font), up = ant_axes_ruler_y (pen, &frame->area);
  ant_ticks_log (view->from, view->to, &across, &frame->x);
  ant_ticks_log (view->low, view->high, &up, &frame->y);
  ant_pen_colour (pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (pen, box);
  ant_axes_grid (pen, &frame->area, view, &frame->x, grid_across ? &frame->y : NULL);
}

void
ant_frame_axes (const AntFrame *frame, AntPen *pen, const AntView *view)
{
  ant_axes_bottom (pen, &frame->area, view, &frame->x, TRUE);
  ant_axes_left (pen, &frame->area, view, &frame->y);
}
