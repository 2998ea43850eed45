/* pen.c - text, hairs and the shapes of dips. */
#include "plot/pen.h"
#include <glib.h>
#include <math.h>
#include <pango/pangocairo.h>

void
ant_pen_begin (AntPen *pen, cairo_t *cr, const AntTheme *theme, double scale)
{
  *pen = (AntPen) { .cr = cr, .theme = theme, .scale = scale };
  cairo_save (cr);
  cairo_font_options_t *options = cairo_font_options_create ();
  cairo_font_options_set_hint_style (options, CAIRO_HINT_STYLE_NONE);
  cairo_font_options_set_hint_metrics (options, CAIRO_HINT_METRICS_OFF);
  cairo_font_options_set_antialias (options, CAIRO_ANTIALIAS_GRAY);
  pen->layout = pango_cairo_create_layout (cr);
  pango_cairo_context_set_font_options (pango_layout_get_context (pen->layout), options);
  cairo_font_options_destroy (options);
}

void
ant_pen_end (AntPen *pen)
{
  g_clear_object (&pen->layout);
  cairo_restore (pen->cr);
}

void
ant_pen_set (AntPen *pen, AntColour colour)
{
  cairo_set_source_rgba (pen->cr, colour.red, colour.green, colour.blue, colour.alpha);
}

void
ant_pen_colour (AntPen *pen, AntRole role)
{
  ant_pen_set (pen, pen->theme->role[role]);
}

static void
lay_out (AntPen *pen, const char *text, AntTextStyle style)
{
  PangoFontDescription *font = pango_font_description_new ();
  pango_font_description_set_family_static (font, pen->theme->font);
  double px = style == ANT_TEXT_SMALL ? 0.92 * pen->theme->font_px : pen->theme->font_px;
  pango_font_description_set_absolute_size (font, px * PANGO_SCALE);
  if (style == ANT_TEXT_STRONG)
    pango_font_description_set_weight (font, PANGO_WEIGHT_BOLD);
  pango_layout_set_font_description (pen->layout, font);
  pango_font_description_free (font);
  pango_layout_set_text (pen->layout, text, -1);
}

static AntTextSize
laid_out_size (const AntPen *pen)
{
  PangoRectangle logical;
  pango_layout_get_extents (pen->layout, NULL, &logical);
  return (AntTextSize) { (double) logical.width / PANGO_SCALE, (double) logical.height / PANGO_SCALE };
}

AntTextSize
ant_pen_measure (AntPen *pen, const char *text, AntTextStyle style)
{
  lay_out (pen, text, style);
  return laid_out_size (pen);
}

AntBox
ant_pen_text_box (AntPen *pen, const char *text, AntTextStyle style, double x, double y, double align_x, double align_y)
{
  AntTextSize size = ant_pen_measure (pen, text, style);
  return (AntBox) { x - align_x * size.width, y - align_y * size.height, size.width, size.height };
}

void
ant_pen_text (AntPen *pen, const char *text, AntTextStyle style, double x, double y, double align_x, double align_y)
{
  lay_out (pen, text, style);
  AntTextSize size = laid_out_size (pen);
  cairo_move_to (pen->cr, x - align_x * size.width, y - align_y * size.height);
  pango_cairo_show_layout (pen->cr, pen->layout);
}

void
ant_pen_remark (cairo_t *cr, const AntBox *box, const char *text, const AntTheme *theme, double scale)
{
  AntPen pen;
  ant_pen_begin (&pen, cr, theme, scale);
  ant_pen_colour (&pen, ANT_ROLE_QUIET);
  ant_pen_text (&pen, text, ANT_TEXT_LABEL, box->x + box->width / 2, box->y + box->height / 2, 0.5, 0.5);
  ant_pen_end (&pen);
}

double
ant_pen_snap (const AntPen *pen, double v)
{
  return floor (v * pen->scale + 0.5) / pen->scale;
}

double
ant_pen_hair (const AntPen *pen)
{
  return pen->scale <= 1 ? 1 / pen->scale : MAX (1.0, floor (pen->scale / 2)) / pen->scale;
}

void
ant_pen_fill_box (AntPen *pen, const AntBox *box)
{
  double x0 = ant_pen_snap (pen, box->x), x1 = ant_pen_snap (pen, box->x + box->width);
  double y0 = ant_pen_snap (pen, box->y), y1 = ant_pen_snap (pen, box->y + box->height);
  cairo_rectangle (pen->cr, x0, y0, x1 - x0, y1 - y0);
  cairo_fill (pen->cr);
}

void
ant_pen_across (AntPen *pen, double x0, double x1, double y)
{
  double hair = ant_pen_hair (pen), top = floor (y * pen->scale) / pen->scale;
  cairo_rectangle (pen->cr, ant_pen_snap (pen, x0), top, ant_pen_snap (pen, x1) - ant_pen_snap (pen, x0), hair);
  cairo_fill (pen->cr);
}

void
ant_pen_down (AntPen *pen, double x, double y0, double y1)
{
  double hair = ant_pen_hair (pen), left = floor (x * pen->scale) / pen->scale;
  cairo_rectangle (pen->cr, left, ant_pen_snap (pen, y0), hair, ant_pen_snap (pen, y1) - ant_pen_snap (pen, y0));
  cairo_fill (pen->cr);
}

void
ant_pen_frame_box (AntPen *pen, const AntBox *box)
{
  double hair = ant_pen_hair (pen), right = box->x + box->width, foot = box->y + box->height;
  ant_pen_across (pen, box->x, right, box->y);
  ant_pen_across (pen, box->x, right, foot - hair);
  ant_pen_down (pen, box->x, box->y, foot);
  ant_pen_down (pen, right - hair, box->y, foot);
}

void
ant_pen_clip (AntPen *pen, const AntBox *box)
{
  cairo_save (pen->cr);
  cairo_rectangle (pen->cr, box->x, box->y, box->width, box->height);
  cairo_clip (pen->cr);
}

static void
polygon (cairo_t *cr, int n, double x, double y, double r, double turn)
{
  for (int i = 0; i < n; i++)
    cairo_line_to (cr, x + r * sin (turn + 2 * G_PI * i / n), y - r * cos (turn + 2 * G_PI * i / n));
  cairo_close_path (cr);
}

/* TRUE: to be filled; FALSE: to be stroked. */
static gboolean
trace_dip (cairo_t *cr, AntDipLook look, double x, double y, double r)
{
  switch (look)
    {
    case ANT_LOOK_PLANET:
      cairo_arc (cr, x, y, r, 0, 2 * G_PI);
      return TRUE;
    case ANT_LOOK_PLANET_SHAPED:
      cairo_arc (cr, x, y, r - 0.5, 0, 2 * G_PI);
      return FALSE;
    case ANT_LOOK_SPOT:
      polygon (cr, 3, x, y - 0.15 * r, 1.25 * r, G_PI);
      return TRUE;
    case ANT_LOOK_FLARE:
      polygon (cr, 3, x, y + 0.15 * r, 1.25 * r, 0);
      return TRUE;
    case ANT_LOOK_ECLIPSE:
      cairo_arc (cr, x, y + 0.35 * r, 1.15 * r, G_PI, 2 * G_PI);
      cairo_close_path (cr);
      return TRUE;
    case ANT_LOOK_INSTRUMENT:
      cairo_rectangle (cr, x - 0.9 * r, y - 0.9 * r, 1.8 * r, 1.8 * r);
      return TRUE;
    case ANT_LOOK_NOISE:
      cairo_move_to (cr, x - 0.8 * r, y - 0.8 * r);
      cairo_line_to (cr, x + 0.8 * r, y + 0.8 * r);
      cairo_move_to (cr, x - 0.8 * r, y + 0.8 * r);
      cairo_line_to (cr, x + 0.8 * r, y - 0.8 * r);
      return FALSE;
    case ANT_LOOK_UNDECIDED:
    case ANT_N_LOOKS:
      polygon (cr, 4, x, y, r, 0);
      return FALSE;
    }
  return FALSE;
}

void
ant_pen_dip (AntPen *pen, AntDipLook look, double x, double y, double r, int selected)
{
  cairo_t *cr = pen->cr;
  cairo_save (cr);
  cairo_new_path (cr);
  ant_pen_set (pen, pen->theme->look[look]);
  cairo_set_line_width (cr, MAX (1.5, 0.4 * r));
  if (trace_dip (cr, look, x, y, r))
    cairo_fill (cr);
  else
    cairo_stroke (cr);
  if (selected)
    {
      ant_pen_colour (pen, ANT_ROLE_SELECTION);
      cairo_set_line_width (cr, 2);
      cairo_arc (cr, x, y, 1.45 * r + 2, 0, 2 * G_PI);
      cairo_stroke (cr);
    }
  cairo_restore (cr);
}
