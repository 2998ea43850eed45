/* dip-closeup.c - points, shapes, residuals, witness. */
#include "plot/dip-closeup.h"
#include <glib.h>
#include <glib/gi18n.h>
#include <math.h>
#include "core/units.h"
#include "plot/axes.h"
#include "plot/key.h"

#define LEAST_FOR_BOTH 7 /* font sizes: a lower close-up shows no residual */
#define RESIDUAL_PART 0.25 /* of the height, of one panel below; of several: */
#define PANELS_PART 0.6
#define PANEL_FONTS 3.6     /* least height of a panel, in heights of the font */
#define MOST_PANELS 5

static void
add_bin (const float *value, size_t first, size_t last, double zero_h, double step_h, double sigma_ppm, size_t at,
         double *hours, double *ppm, double *error)
{
  double sum = 0, squares = 0, count = 0, time = 0;
  for (size_t i = first; i < last; i++)
    if (!isnan (value[i]))
      {
        sum += (double) value[i];
        time += zero_h + step_h * (double) i;
        count++;
      }
  for (size_t i = first; i < last && count > 1; i++)
    if (!isnan (value[i]))
      squares += ((double) value[i] - sum / count) * ((double) value[i] - sum / count);
  hours[at] = count > 0 ? time / count : NAN;
  ppm[at] = sum / count;
  error[at] = count > 1 ? sqrt (squares / (count * (count - 1))) : sigma_ppm;
}

size_t
ant_dip_closeup_points (size_t n, const float *value_ppm, double start_d, double step_d, double mid_d,
                        double half_width_d, double sigma_ppm, size_t most, double *hours, double *ppm,
                        double *error_ppm)
{
  double from = ceil ((mid_d - half_width_d - start_d) / step_d),
         to = floor ((mid_d + half_width_d - start_d) / step_d) + 1;
  size_t first = (size_t) CLAMP (from, 0, (double) n), last = (size_t) CLAMP (to, 0, (double) n), count = 0;
  if (first >= last || most == 0)
    return 0;
  size_t bin = (last - first + most - 1) / most;
  double zero_h = (start_d - mid_d) * ANT_HOURS_PER_DAY, step_h = step_d * ANT_HOURS_PER_DAY;
  for (size_t i = first; i < last; i += bin)
    {
      add_bin (value_ppm, i, MIN (i + bin, last), zero_h, step_h, sigma_ppm, count, hours, ppm, error_ppm);
      count += !isnan (hours[count]);
    }
  return count;
}

static double
shape_at (const AntShapeLine *shape, double hours)
{
  if (shape->n < 2 || hours < shape->hours[0] || hours > shape->hours[shape->n - 1])
    return NAN;
  size_t a = 0, b = shape->n - 1;
  while (b - a > 1)
    {
      size_t middle = (a + b) / 2;
      if (shape->hours[middle] <= hours)
        a = middle;
      else
        b = middle;
    }
  double width = shape->hours[b] - shape->hours[a], part = width > 0 ? (hours - shape->hours[a]) / width : 0;
  return shape->ppm[a] + part * (shape->ppm[b] - shape->ppm[a]);
}

static double
error_of (const AntDipCloseup *closeup, size_t i)
{
  double error = closeup->error_ppm ? closeup->error_ppm[i] : 0;
  return isnan (error) ? 0 : error;
}

void
ant_dip_closeup_view (const AntDipCloseup *closeup, AntView *view)
{
  double low = INFINITY, high = -INFINITY;
  *view = (AntView) { -1, 1, -1, 1, FALSE, FALSE };
  for (size_t i = 0; i < closeup->n; i++)
    if (!isnan (closeup->ppm[i]))
      {
        low = MIN (low, closeup->ppm[i] - error_of (closeup, i));
        high = MAX (high, closeup->ppm[i] + error_of (closeup, i));
      }
  for (size_t i = 0; closeup->n_shapes > 0 && i < closeup->shape[0].n; i++)
    {
      low = MIN (low, closeup->shape[0].ppm[i]);
      high = MAX (high, closeup->shape[0].ppm[i]);
    }
  if (low < high)
    {
      view->low = low - 0.08 * (high - low);
      view->high = high + 0.08 * (high - low);
    }
  if (closeup->n > 1)
    {
      double air = 0.02 * (closeup->hours[closeup->n - 1] - closeup->hours[0]);
      view->from = closeup->hours[0] - air;
      view->to = closeup->hours[closeup->n - 1] + air;
    }
}

static void
draw_points (AntPen *pen, const AntBox *area, const AntView *view, const AntDipCloseup *closeup, const double *ppm)
{
  cairo_t *cr = pen->cr;
  double apart = area->width / (double) MAX (1, closeup->n), r = CLAMP (apart / 2.2, 1.4, 2.6);
  ant_pen_colour (pen, ANT_ROLE_BAND);
  cairo_set_line_width (cr, MAX (1, r - 0.6));
  for (size_t i = 0; i < closeup->n; i++)
    if (!isnan (ppm[i]) && error_of (closeup, i) > 0)
      {
        double x = ant_view_x (view, area, closeup->hours[i]);
        cairo_move_to (cr, x, ant_view_y (view, area, ppm[i] - error_of (closeup, i)));
        cairo_line_to (cr, x, ant_view_y (view, area, ppm[i] + error_of (closeup, i)));
      }
  cairo_stroke (cr);
  ant_pen_colour (pen, ANT_ROLE_SERIES);
  for (size_t i = 0; i < closeup->n; i++)
    if (!isnan (ppm[i]))
      ant_pen_add_dot (pen, ant_view_x (view, area, closeup->hours[i]), ant_view_y (view, area, ppm[i]), r);
  ant_pen_fill_added (pen);
}

static void
draw_contacts (AntPen *pen, const AntBox *area, const AntView *view, const AntDipCloseup *closeup)
{
  double dashes[] = { 2, 3 };
  cairo_save (pen->cr);
  ant_pen_colour (pen, ANT_ROLE_FRAME);
  cairo_set_line_width (pen->cr, 1);
  cairo_set_dash (pen->cr, dashes, 2, 0);
  for (int c = 0; c < 2; c++)
    if (closeup->contact_h[c] > view->from && closeup->contact_h[c] < view->to)
      {
        double x = floor (ant_view_x (view, area, closeup->contact_h[c])) + 0.5;
        cairo_move_to (pen->cr, x, area->y);
        cairo_line_to (pen->cr, x, area->y + area->height);
        cairo_stroke (pen->cr);
      }
  cairo_restore (pen->cr);
}

static AntLineStyle
style_of (const AntPen *pen, const AntDipCloseup *closeup, size_t s)
{
  static const double dashes[][2] = { { 5, 3 }, { 2, 2 }, { 8, 3 } };
  AntLineStyle style = { closeup->shape[s].name, ANT_ROLE_CURVE, pen->theme->trace_px + 0.3, { 0, 0 } };
  if (s > 0)
    {
      const double *dash = dashes[(s - 1) % G_N_ELEMENTS (dashes)];
      style = (AntLineStyle) { closeup->shape[s].name, ANT_ROLE_SHAPE, 1.2, { dash[0], dash[1] } };
    }
  return style;
}

/* The fitted shape last, over its rivals. */
static void
draw_shapes (AntPen *pen, const AntBox *area, const AntView *view, const AntDipCloseup *closeup)
{
  for (size_t s = closeup->n_shapes; s-- > 0;)
    {
      const AntShapeLine *shape = &closeup->shape[s];
      AntLineStyle style = style_of (pen, closeup, s);
      g_autofree double *x = g_new (double, shape->n);
      g_autofree double *y = g_new (double, shape->n);
      for (size_t i = 0; i < shape->n; i++)
        {
          x[i] = ant_view_x (view, area, shape->hours[i]);
          y[i] = isnan (shape->ppm[i]) ? NAN : ant_view_y (view, area, shape->ppm[i]);
        }
      cairo_save (pen->cr);
      ant_line_style_set (pen, &style);
      ant_pen_polyline (pen, shape->n, x, y, style.width);
      cairo_restore (pen->cr);
    }
}

static void
draw_key (AntPen *pen, const AntBox *area, const AntDipCloseup *closeup, double keep_px)
{
  g_autofree AntLineStyle *style = g_new (AntLineStyle, MAX (1, closeup->n_shapes));
  for (size_t s = 0; s < closeup->n_shapes; s++)
    style[s] = style_of (pen, closeup, s);
  ant_key_paint (pen, area, closeup->n_shapes, style, keep_px);
}

/* A panel of its own below the dip: points about zero on a scale of their own, and lines over them if `shaped`. */
static void
draw_panel (AntPen *pen, const AntBox *area, const AntView *view, const AntDipCloseup *points, gboolean shaped, const AntTicks *x,
            const char *title)
{
  double most = 0;
  for (size_t i = 0; i < points->n; i++)
    most = isnan (points->ppm[i]) ? most : MAX (most, fabs (points->ppm[i]) + error_of (points, i));
  AntView below = { view->from, view->to, -1.15 * MAX (most, 1e-6), 1.15 * MAX (most, 1e-6), FALSE, FALSE };
  AntTicks y;
  AntRuler up = ant_axes_ruler_y (pen, area);
  ant_ticks_linear (below.low, below.high, &up, &y);
  ant_axes_grid (pen, area, &below, x, &y);
  ant_pen_colour (pen, ANT_ROLE_FRAME);
  ant_pen_across (pen, area->x, area->x + area->width, ant_view_y (&below, area, 0));
  ant_pen_clip (pen, area);
  draw_contacts (pen, area, &below, points);
  draw_points (pen, area, &below, points, points->ppm);
  if (shaped)
    draw_shapes (pen, area, &below, points);
  cairo_restore (pen->cr);
  ant_axes_left (pen, area, &below, &y);
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  ant_pen_text (pen, title, ANT_TEXT_SMALL, area->x, area->y - 2, 0, 1);
}

/* What a shape leaves. */
static void
draw_residual (AntPen *pen, const AntBox *area, const AntView *view, const AntDipCloseup *closeup, size_t s, const AntTicks *x)
{
  g_autofree double *left = g_new (double, MAX (1, closeup->n));
  AntDipCloseup rest = *closeup;
  for (size_t i = 0; i < closeup->n; i++)
    left[i] = s < closeup->n_shapes ? closeup->ppm[i] - shape_at (&closeup->shape[s], closeup->hours[i]) : NAN;
  rest.ppm = left;
  const char *name = s < closeup->n_shapes ? closeup->shape[s].name : NULL;
  g_autofree char *title = name && closeup->n_shapes > 1 ? g_strdup_printf (_("After the %s, ppm"), name) : g_strdup (_("After the fit, ppm"));
  draw_panel (pen, area, view, &rest, FALSE, x, title);
}

/* The witness's points with the fitted shape over them. */
static void
draw_witness (AntPen *pen, const AntBox *area, const AntView *view, const AntDipCloseup *closeup, const AntTicks *x)
{
  AntDipCloseup other = *closeup;
  other.n = closeup->witness->n;
  other.hours = closeup->witness->hours;
  other.ppm = closeup->witness->ppm;
  other.error_ppm = closeup->witness->error_ppm;
  other.n_shapes = MIN (1, closeup->n_shapes);
  draw_panel (pen, area, view, &other, TRUE, x, _("Witness, ppm"));
}

/* How many panels fit below: the witness before what rivals leave, what the fit leaves before both. */
static size_t
count_panels (const AntDipCloseup *closeup, double height, double font_px, gboolean *witness)
{
  *witness = FALSE;
  if (height <= LEAST_FOR_BOTH * font_px)
    return 0;
  size_t most = (size_t) CLAMP (PANELS_PART * height / (PANEL_FONTS * font_px), 1, MOST_PANELS);
  *witness = closeup->witness && closeup->witness->n > 0 && most > 1;
  return MIN (most, MAX (1, closeup->n_shapes) + *witness);
}

void
ant_dip_closeup_paint (cairo_t *cr, const AntBox *box, const AntDipCloseup *closeup, const AntView *view,
                       const AntTheme *theme, double scale)
{
  AntPen pen;
  AntTicks x, y;
  ant_pen_begin (&pen, cr, theme, scale);
  AntBox area = ant_axes_area (box, theme, TRUE), upper = area, lower = area;
  gboolean witness;
  size_t n_panels = count_panels (closeup, area.height, theme->font_px, &witness);
  double gap = round (1.8 * theme->font_px), share = n_panels > 1 ? PANELS_PART / (double) n_panels : RESIDUAL_PART;
  lower.height = MAX (1, round (share * area.height - (n_panels > 1 ? gap : 0)));
  upper.height = MAX (1, area.height - (double) n_panels * (lower.height + gap));
  AntRuler across = ant_axes_ruler_x (&pen, &area, theme->font_px, theme->font_px),
           up = ant_axes_ruler_y (&pen, &upper);
  ant_ticks_linear (view->from, view->to, &across, &x);
  ant_ticks_linear (view->low, view->high, &up, &y);
  ant_pen_colour (&pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (&pen, box);
  ant_axes_grid (&pen, &upper, view, &x, &y);
  ant_pen_clip (&pen, &upper);
  draw_contacts (&pen, &upper, view, closeup);
  draw_points (&pen, &upper, view, closeup, closeup->ppm);
  draw_shapes (&pen, &upper, view, closeup);
  cairo_restore (cr);
  for (size_t p = 0; p < n_panels; p++)
    {
      lower.y = area.y + area.height - (double) (n_panels - p) * (lower.height + gap) + gap;
      if (witness && p == 1)
        draw_witness (&pen, &lower, view, closeup, &x);
      else
        draw_residual (&pen, &lower, view, closeup, p - (witness && p > 1), &x);
    }
  ant_axes_bottom (&pen, &area, view, &x, TRUE);
  ant_axes_left (&pen, &upper, view, &y);
  const char *title = closeup->title ? closeup->title : _("Residual, ppm");
  ant_axes_titles (&pen, &area, title, _("Hours from the middle"));
  draw_key (&pen, &upper, closeup, 1.5 * theme->font_px + ant_pen_measure (&pen, title, ANT_TEXT_LABEL).width);
  ant_pen_end (&pen);
}
