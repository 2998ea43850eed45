/* tail-chart.c - two staircases and a curve. */
#include "plot/tail-chart.h"
#include <glib.h>
#include <glib/gi18n.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "plot/axes.h"
#include "plot/key.h"
#include "plot/labels.h"
#include "plot/number-text.h"

void
ant_tail_chart_view (const AntTailChart *chart, AntView *view)
{
  double from = INFINITY, to = 0, high = 3;
  const double *const list[] = { chart->dip_snr, chart->mirror_snr, chart->snr };
  const size_t count[] = { chart->n_dips, chart->n_mirror, chart->n_expected };
  for (int k = 0; k < 3; k++)
    for (size_t i = 0; i < count[k]; i++)
      if (list[k][i] > 0)
        {
          from = MIN (from, list[k][i]);
          to = MAX (to, list[k][i]);
        }
  high = MAX (high, (double) MAX (chart->n_dips, chart->n_mirror));
  if (chart->n_expected > 0)
    high = MAX (high, MIN (chart->expected[0], 1e6));
  if (chart->threshold_snr > 0)
    {
      from = MIN (from, chart->threshold_snr);
      to = MAX (to, chart->threshold_snr);
    }
  *view = (AntView) { .from = to > 0 ? from * 0.97 : 3, .to = to > 0 ? MAX (to * 1.15, from * 2) : 10, .low = 0.01,
                      .high = high * 2, .log_x = TRUE, .log_y = TRUE };
}

static int
falling (const void *a, const void *b)
{
  double x = *(const double *) a, y = *(const double *) b;
  return (x < y) - (x > y);
}

/* Count of SNRs at or above: steps down at each of them, from the far end of the axis; on whole pixels, to be crisp. */
static void
staircase (const AntBox *area, const AntView *view, size_t n, const double *snr, size_t *n_out, double *x, double *y)
{
  g_autofree double *sorted = g_new (double, MAX (1, n));
  if (n > 0)
    memcpy (sorted, snr, n * sizeof *sorted);
  qsort (sorted, n, sizeof *sorted, falling);
  double foot = area->y + area->height;
  size_t k = 0;
  for (size_t i = 0; i < n; i++)
    {
      double at = round (ant_view_x (view, area, MAX (sorted[i], 1e-3)));
      x[k] = at;
      y[k++] = i == 0 ? foot : round (ant_view_y (view, area, (double) i));
      x[k] = at;
      y[k++] = round (ant_view_y (view, area, (double) i + 1));
    }
  x[k] = area->x;
  y[k] = n > 0 ? y[k - 1] : foot;
  *n_out = k + 1;
}

typedef struct
{
  AntPen pen;
  AntBox area;
  const AntView *view;
  AntLabelField field;
} Canvas;

typedef struct
{
  size_t n;
  double *x, *y;
} Line;

static const AntLineStyle styles[] = {
  { N_("dips"), ANT_ROLE_CURVE, 2, { 0, 0 } },
  { N_("mirror"), ANT_ROLE_TRACE, 2, { 0, 0 } },
  { N_("noise alone"), ANT_ROLE_SHAPE, 1.3, { 4, 2.5 } },
  { NULL, ANT_ROLE_THRESHOLD, 1, { 5, 3 } },
};

static void
draw_line (Canvas *canvas, const AntLineStyle *style, const Line *line)
{
  cairo_save (canvas->pen.cr);
  ant_line_style_set (&canvas->pen, style);
  ant_pen_polyline (&canvas->pen, line->n, line->x, line->y, style->width);
  cairo_restore (canvas->pen.cr);
  ant_labels_block_curve (&canvas->field, line->n, line->x, line->y);
}

static void
draw_threshold (Canvas *canvas, double snr)
{
  AntPen *pen = &canvas->pen;
  double x = ant_view_x (canvas->view, &canvas->area, snr), top = canvas->area.y, foot = top + canvas->area.height;
  if (!(snr > canvas->view->from && snr < canvas->view->to))
    return;
  double line_x[] = { x, x }, line_y[] = { top, foot };
  Line line = { 2, line_x, line_y };
  draw_line (canvas, &styles[3], &line);
  char number[48], name[96];
  ant_plot_number_text (snr, 1, sizeof number, number);
  g_snprintf (name, sizeof name, _("threshold %s"), number);
  AntAnchor anchor[] = { { x + 5, top + 4, 0, 0 }, { x - 5, top + 4, 1, 0 }, { x + 5, foot - 4, 0, 1 } };
  ant_pen_colour (pen, ANT_ROLE_TEXT);
  ant_labels_place (&canvas->field, pen, name, ANT_TEXT_SMALL, G_N_ELEMENTS (anchor), anchor);
}

/* The dips last, on top. */
static void
draw_tails (Canvas *canvas, const AntTailChart *chart)
{
  const size_t count[] = { chart->n_dips, chart->n_mirror, chart->n_expected };
  const double *const snr[] = { chart->dip_snr, chart->mirror_snr, chart->snr };
  for (int k = 2; k >= 0; k--)
    {
      g_autofree double *x = g_new (double, 2 * count[k] + 1);
      g_autofree double *y = g_new (double, 2 * count[k] + 1);
      Line line = { count[k], x, y };
      for (size_t i = 0; k == 2 && i < count[k]; i++)
        {
          x[i] = ant_view_x (canvas->view, &canvas->area, MAX (snr[k][i], 1e-3));
          y[i] = chart->expected[i] > 0 ? ant_view_y (canvas->view, &canvas->area, chart->expected[i]) : NAN;
        }
      if (k < 2)
        staircase (&canvas->area, canvas->view, count[k], snr[k], &line.n, x, y);
      draw_line (canvas, &styles[k], &line);
    }
}

static void
draw_key (Canvas *canvas)
{
  AntLineStyle named[3];
  for (size_t k = 0; k < G_N_ELEMENTS (named); k++)
    {
      named[k] = styles[k];
      named[k].name = _(styles[k].name);
    }
  double keep = ant_pen_measure (&canvas->pen, _("At or above"), ANT_TEXT_LABEL).width;
  ant_key_paint (&canvas->pen, &canvas->area, G_N_ELEMENTS (named), named, keep + canvas->pen.theme->font_px);
}

void
ant_tail_chart_paint (cairo_t *cr, const AntBox *box, const AntTailChart *chart, const AntView *view,
                      const AntTheme *theme, double scale)
{
  g_autofree Canvas *canvas = g_new0 (Canvas, 1);
  AntFrame frame;
  AntPen *pen = &canvas->pen;
  ant_pen_begin (pen, cr, theme, scale);
  ant_frame_begin (&frame, pen, box, view, TRUE);
  canvas->area = frame.area;
  canvas->view = view;
  AntBox *area = &canvas->area;
  ant_labels_begin (&canvas->field, area);
  ant_pen_clip (pen, area);
  draw_tails (canvas, chart);
  draw_threshold (canvas, chart->threshold_snr);
  cairo_restore (cr);
  ant_frame_axes (&frame, pen, view);
  ant_axes_titles (pen, area, _("At or above"), _("Dip SNR"));
  draw_key (canvas);
  ant_pen_end (pen);
}
