/* spectrum-chart.c - dots, the fit, and its components. */
#include "plot/spectrum-chart.h"
#include <glib.h>
#include <glib/gi18n.h>
#include <math.h>
#include "core/units.h"
#include "plot/axes.h"
#include "plot/number-text.h"

#define LEAST_ROWS 3 /* fewer names than these are no key */
#define CURVE_PX 3 /* spectra of models are smooth */

static const struct
{
  const char *role, *title;
} titles[] = {
  { "rotation", N_("rotation") }, { "days", N_("days") }, { "hours", N_("hours") },
  { "granulation", N_("granulation") }, { "oscillations", N_("5-min oscillations") }, { "line", N_("line") },
};

/* Periods that people know their way by. */
static const struct
{
  const char *title;
  double days;
} periods[] = {
  { N_("1 yr"), 365.25 }, { N_("27 d"), 27.275 }, { N_("7 d"), 7 }, { N_("1 d"), 1 }, { N_("6 h"), 0.25 },
  { N_("1 h"), 1 / 24.0 }, { N_("5 min"), 5 / 1440.0 }, { N_("1 min"), 1 / 1440.0 },
};

const char *
ant_part_title (const AntNoisePart *part)
{
  const char *role = ant_noise_part_role (part);
  for (size_t i = 0; i < G_N_ELEMENTS (titles); i++)
    if (g_str_equal (titles[i].role, role))
      return _(titles[i].title);
  return role;
}

void
ant_spectrum_chart_view (const AntSpectrumChart *chart, AntView *view)
{
  double low = INFINITY, high = 0;
  for (size_t i = 0; i < chart->n; i++)
    if (chart->power[i] > 0)
      {
        low = MIN (low, chart->power[i]);
        high = MAX (high, chart->power[i]);
      }
  gboolean any = chart->n > 0 && high > 0;
  *view = (AntView) { .from = any ? 0.8 * chart->frequency_cd[0] : 0.01,
                      .to = any ? 1.25 * chart->frequency_cd[chart->n - 1] : 1000,
                      .low = any ? low / 3 : 1, .high = any ? high * 12 : 1000, .log_x = TRUE, .log_y = TRUE };
  if (any && chart->white_psd > 0)
    view->low = MIN (view->low, chart->white_psd / 3);
}

static void
draw_periods (AntPen *pen, const AntBox *area, const AntView *view)
{
  double last = -INFINITY, font = pen->theme->font_px;
  for (size_t i = 0; i < G_N_ELEMENTS (periods); i++)
    {
      double f = 1 / periods[i].days, x = ant_view_x (view, area, f);
      const char *title = _(periods[i].title);
      double half = ant_pen_measure (pen, title, ANT_TEXT_SMALL).width / 2;
      if (f < view->from || f > view->to || x - half < MAX (last, area->x) || x + half > area->x + area->width)
        continue;
      last = x + half + font;
      ant_pen_colour (pen, ANT_ROLE_FRAME);
      ant_pen_down (pen, x, area->y, area->y + 0.5 * font);
      ant_pen_colour (pen, ANT_ROLE_QUIET);
      ant_pen_text (pen, title, ANT_TEXT_SMALL, x, area->y + 0.6 * font, 0.5, 0);
    }
}

static void
draw_measured (AntPen *pen, const AntBox *area, const AntSpectrumChart *chart, const AntView *view)
{
  cairo_t *cr = pen->cr;
  ant_pen_colour (pen, ANT_ROLE_BAND);
  cairo_set_line_width (cr, 2);
  for (size_t i = 0; chart->ordinates && i < chart->n; i++)
    if (chart->power[i] > 0 && chart->ordinates[i] > 0)
      {
        double x = ant_view_x (view, area, chart->frequency_cd[i]), part = exp (1 / sqrt (chart->ordinates[i]));
        cairo_move_to (cr, x, ant_view_y (view, area, chart->power[i] * part));
        cairo_line_to (cr, x, ant_view_y (view, area, chart->power[i] / part));
      }
  cairo_stroke (cr);
  ant_pen_colour (pen, ANT_ROLE_SERIES);
  for (size_t i = 0; i < chart->n; i++)
    if (chart->power[i] > 0)
      ant_pen_add_dot (pen, ant_view_x (view, area, chart->frequency_cd[i]), ant_view_y (view, area, chart->power[i]),
                       2.2);
  ant_pen_fill_added (pen);
}

typedef struct
{
  size_t n;
  double *x, *frequency_cd, *y; /* [n] */
} Curve;

static Curve
curve_new (const AntBox *area, const AntView *view)
{
  Curve curve = { .n = (size_t) (area->width / CURVE_PX) + 2 };
  curve.x = g_new (double, curve.n);
  curve.frequency_cd = g_new (double, curve.n);
  curve.y = g_new (double, curve.n);
  for (size_t i = 0; i < curve.n; i++)
    {
      curve.x[i] = MIN (area->x + (double) i * CURVE_PX, area->x + area->width);
      curve.frequency_cd[i] = ant_view_at_x (view, area, curve.x[i]);
    }
  return curve;
}

static void
curve_clear (Curve *curve)
{
  g_free (curve->x);
  g_free (curve->frequency_cd);
  g_free (curve->y);
}

/* part NULL: of the whole model and the white noise. */
static void
curve_set (Curve *curve, const AntBox *area, const AntView *view, const AntSpectrumChart *chart,
           const AntNoisePart *part)
{
  for (size_t i = 0; i < curve->n; i++)
    {
      double f = curve->frequency_cd[i];
      double psd = part ? ant_noise_part_psd (part, f) : ant_noise_model_psd (chart->model, f) + chart->white_psd;
      curve->y[i] = psd > 0 ? ant_view_y (view, area, psd) : NAN;
    }
}

/* "hours, 8.2 h": what the part is and, if there is room, its time. */
static void
title_of (const AntNoisePart *part, gboolean with_time, size_t size, char *text)
{
  char number[48];
  const char *name = ant_part_title (part);
  double hours = part->time_d * ANT_HOURS_PER_DAY;
  double value = hours >= 36 ? part->time_d : hours >= 1.5 ? hours : 60 * hours;
  ant_plot_number_text (value, value < 9.95 ? 1 : 0, sizeof number, number);
  if (!with_time)
    g_strlcpy (text, name, size);
  else if (hours >= 36)
    g_snprintf (text, size, _("%s, %s d"), name, number);
  else if (hours >= 1.5)
    g_snprintf (text, size, _("%s, %s h"), name, number);
  else
    g_snprintf (text, size, _("%s, %s min"), name, number);
}

static void
set_dash (cairo_t *cr, size_t style)
{
  static const double dashes[][4] = { { 7, 3, 7, 3 }, { 2, 2, 2, 2 }, { 9, 3, 2, 3 }, { 4, 2, 4, 2 } };
  cairo_set_dash (cr, dashes[style % G_N_ELEMENTS (dashes)], 4, 0);
}

/* part == n: the white noise. */
static void
set_component (AntPen *pen, size_t part, size_t n)
{
  if (part < n)
    {
      ant_pen_set (pen, pen->theme->component[part % ANT_N_COMPONENT_COLOURS]);
      set_dash (pen->cr, part);
      return;
    }
  ant_pen_colour (pen, ANT_ROLE_SHAPE);
  cairo_set_dash (pen->cr, NULL, 0, 0);
}

static void
set_white (Curve *curve, const AntBox *area, const AntView *view, const AntSpectrumChart *chart)
{
  for (size_t i = 0; i < curve->n; i++)
    curve->y[i] = ant_view_y (view, area, chart->white_psd);
}

/* Components, the white part last, then the sum of all. */
static void
draw_model (AntPen *pen, const AntBox *area, const AntSpectrumChart *chart, const AntView *view)
{
  Curve curve = curve_new (area, view);
  size_t n = chart->model->n_parts, n_curves = n + (chart->white_psd > 0);
  ant_pen_clip (pen, area);
  for (size_t p = 0; p < n_curves; p++)
    {
      if (p < n)
        curve_set (&curve, area, view, chart, &chart->model->part[p]);
      else
        set_white (&curve, area, view, chart);
      set_component (pen, p, n);
      ant_pen_polyline (pen, curve.n, curve.x, curve.y, 1.3);
    }
  curve_set (&curve, area, view, chart, NULL);
  ant_pen_colour (pen, ANT_ROLE_CURVE);
  cairo_set_dash (pen->cr, NULL, 0, 0);
  ant_pen_polyline (pen, curve.n, curve.x, curve.y, pen->theme->trace_px + 0.3);
  cairo_restore (pen->cr);
  curve_clear (&curve);
}

typedef char Name[96];

/* Names of the fit, its parts and the white noise; returns the width of the widest. */
static double
name_rows (AntPen *pen, const AntSpectrumChart *chart, gboolean with_times, size_t rows, Name *name)
{
  size_t n = chart->model->n_parts;
  double widest = 0;
  g_strlcpy (name[0], _("fit"), sizeof (Name));
  g_strlcpy (name[n + 1], _("white"), sizeof (Name));
  for (size_t p = 0; p < n; p++)
    title_of (&chart->model->part[p], with_times, sizeof (Name), name[p + 1]);
  for (size_t r = 0; r < rows; r++)
    widest = MAX (widest, ant_pen_measure (pen, name[r], ANT_TEXT_SMALL).width);
  return widest;
}

static void
draw_row (AntPen *pen, size_t r, size_t n_parts, const char *name, double x, double y)
{
  double font = pen->theme->font_px;
  double line_x[] = { x - 2.6 * font, x - 0.4 * font }, line_y[] = { y, y };
  cairo_save (pen->cr);
  if (r == 0)
    ant_pen_colour (pen, ANT_ROLE_CURVE);
  else
    set_component (pen, r - 1, n_parts);
  ant_pen_polyline (pen, 2, line_x, line_y, r == 0 ? pen->theme->trace_px + 0.3 : 1.3);
  cairo_restore (pen->cr);
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  ant_pen_text (pen, name, ANT_TEXT_SMALL, x, y, 0, 0.5);
}

/* How far down the corner right of x is free of the fit and of what was measured. */
static double
free_down_to (const AntBox *area, const AntSpectrumChart *chart, const AntView *view, double x)
{
  double foot = area->y + area->height;
  for (double at = x; at <= area->x + area->width; at += 3)
    {
      double power = ant_noise_model_psd (chart->model, ant_view_at_x (view, area, at)) + chart->white_psd;
      foot = MIN (foot, ant_view_y (view, area, power));
    }
  for (size_t i = 0; i < chart->n; i++)
    if (!isnan (chart->power[i]) && ant_view_x (view, area, chart->frequency_cd[i]) >= x)
      foot = MIN (foot, ant_view_y (view, area, chart->power[i]) - 3);
  return foot;
}

/* Spectra of the Sun fall: the upper right corner is free for the names, the fit first. Rows that would reach the curve
 * are left out; in a small chart the times, then all, to keep its room for the curves. */
static void
draw_key (AntPen *pen, const AntBox *area, const AntSpectrumChart *chart, const AntView *view)
{
  double font = pen->theme->font_px, row = round (1.35 * font), most = 0.45 * area->width, beside = 3.8 * font;
  size_t n = chart->model->n_parts, rows = n + 2;
  g_autofree Name *name = g_new (Name, n + 2);
  double widest = name_rows (pen, chart, TRUE, rows, name);
  if (widest + beside > most)
    widest = name_rows (pen, chart, FALSE, rows, name);
  if (widest + beside > most)
    return;
  double x = area->x + area->width - widest - 0.6 * font, top = area->y + 2.2 * font;
  double room = free_down_to (area, chart, view, x - 3.2 * font) - top;
  row = CLAMP (floor (room / (double) rows), round (1.1 * font), row);
  rows = MIN (rows, (size_t) MAX (0, room / row));
  if (rows < LEAST_ROWS)
    return;
  AntColour ground = pen->theme->role[ANT_ROLE_PAPER];
  ground.alpha = 0.8;
  ant_pen_set (pen, ground);
  AntBox back = { x - 3.2 * font, top, widest + beside, (double) rows * row };
  ant_pen_fill_box (pen, &back);
  for (size_t r = 0; r < rows; r++)
    draw_row (pen, r, n, name[r], x, top + ((double) r + 0.5) * row);
}

void
ant_spectrum_chart_paint (cairo_t *cr, const AntBox *box, const AntSpectrumChart *chart, const AntView *view,
                          const AntTheme *theme, double scale)
{
  AntPen pen;
  AntFrame frame;
  ant_pen_begin (&pen, cr, theme, scale);
  ant_frame_begin (&frame, &pen, box, view, TRUE);
  AntBox area = frame.area;
  ant_pen_clip (&pen, &area);
  draw_measured (&pen, &area, chart, view);
  cairo_restore (cr);
  draw_periods (&pen, &area, view);
  if (chart->model)
    {
      draw_model (&pen, &area, chart, view);
      draw_key (&pen, &area, chart, view);
    }
  ant_frame_axes (&frame, &pen, view);
  ant_axes_titles (&pen, &area, _("Power, ppm² per cycle/day"), _("Frequency, cycles per day"));
  ant_pen_end (&pen);
}
