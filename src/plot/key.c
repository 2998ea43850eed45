/* key.c - names of lines. */
#include "plot/key.h"

void
ant_line_style_set (AntPen *pen, const AntLineStyle *style)
{
  ant_pen_colour (pen, style->role);
  cairo_set_dash (pen->cr, style->dash, style->dash[0] > 0 ? 2 : 0, 0);
}

static double
width_of (AntPen *pen, const AntLineStyle *style)
{
  double font = pen->theme->font_px;
  return style->name ? ant_pen_measure (pen, style->name, ANT_TEXT_SMALL).width + 2.9 * font : 0;
}

static void
draw_name (AntPen *pen, const AntLineStyle *style, double left, double y)
{
  double font = pen->theme->font_px, line_x[] = { left, left + 1.4 * font }, line_y[] = { y, y };
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  ant_pen_text (pen, style->name, ANT_TEXT_SMALL, left + 1.8 * font, y, 0, 0.5);
  cairo_save (pen->cr);
  ant_line_style_set (pen, style);
  ant_pen_polyline (pen, 2, line_x, line_y, style->width);
  cairo_restore (pen->cr);
}

void
ant_key_paint (AntPen *pen, const AntBox *area, size_t n, const AntLineStyle *style, double keep_px)
{
  double font = pen->theme->font_px, room = area->width - keep_px + 0.9 * font, whole = 0, width;
  size_t fit = 0;
  for (; fit < n && whole + (width = width_of (pen, &style[fit])) <= room; fit++)
    whole += width;
  double left = area->x + area->width + 0.7 * font - whole, y = area->y - 0.95 * font;
  for (size_t s = 0; s < fit; s++)
    {
      if (style[s].name)
        draw_name (pen, &style[s], left, y);
      left += width_of (pen, &style[s]);
    }
}
