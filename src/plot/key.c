/* key.c - names of lines. */
#include "plot/key.h"

void
ant_line_style_set (AntPen *pen, const AntLineStyle *style)
{
  ant_pen_colour (pen, style->role);
  cairo_set_dash (pen->cr, style->dash, style->dash[0] > 0 ? 2 : 0, 0);
}

void
ant_key_paint (AntPen *pen, const AntBox *area, size_t n, const AntLineStyle *style, double keep_px)
{
  double font = pen->theme->font_px, x = area->x + area->width, y = area->y - 0.95 * font;
  for (size_t s = n; s-- > 0;)
    {
      if (!style[s].name)
        continue;
      double width = ant_pen_measure (pen, style[s].name, ANT_TEXT_SMALL).width, whole = width + 2 * font;
      if (x - whole < area->x + keep_px)
        return;
      ant_pen_colour (pen, ANT_ROLE_QUIET);
      ant_pen_text (pen, style[s].name, ANT_TEXT_SMALL, x, y, 1, 0.5);
      double line_x[] = { x - width - 1.8 * font, x - width - 0.4 * font }, line_y[] = { y, y };
      cairo_save (pen->cr);
      ant_line_style_set (pen, &style[s]);
      ant_pen_polyline (pen, 2, line_x, line_y, style[s].width);
      cairo_restore (pen->cr);
      x -= whole + 0.9 * font;
    }
}
