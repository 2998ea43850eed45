/* floor-chart.c - the floor, the threshold, known bodies, and the dips. */
#include "plot/floor-chart.h"
#include <glib.h>
#include <glib/gi18n.h>
#include <math.h>
#include "core/units.h"
#include "plot/axes.h"
#include "plot/labels.h"
#include "plot/number-text.h"

#define DIP_PX 5.5
#define HIT_PX 10

typedef struct
{
  AntPen pen;
  AntBox area;
  const AntFloorChart *chart;
  const AntView *view;
  AntLabelField field;
} Canvas;

static void
widen (double value, double air, double *least, double *most)
{
  *least = MIN (*least, value / air);
  *most = MAX (*most, value * air);
}

void
ant_floor_chart_view (const AntFloorChart *chart, AntView *view)
{
  double from = INFINITY, to = 0, low = ANT_MERCURY_LOW_PPM / 1.7, high = ANT_VENUS_PPM * 2.2;
  for (size_t i = 0; i < chart->n_floor; i++)
    if (chart->floor[i].sigma_ppm > 0)
      {
        widen (chart->floor[i].duration_d * ANT_HOURS_PER_DAY, 1, &from, &to);
        widen (chart->floor[i].sigma_ppm, 1.7, &low, &high);
        widen (chart->floor[i].sigma_ppm * MAX (1, chart->threshold_snr), 1.7, &low, &high);
      }
  for (size_t d = 0; d < chart->n_dips; d++)
    if (chart->dip[d].duration_d > 0 && chart->dip[d].depth_ppm != 0)
      {
        widen (chart->dip[d].duration_d * ANT_HOURS_PER_DAY, 1.08, &from, &to);
        widen (fabs (chart->dip[d].depth_ppm), 1.7, &low, &high);
      }
  *view = (AntView) { .from = to > 0 ? from : 0.5, .to = to > 0 ? MAX (to, from * 2) : 13, .low = low, .high = high,
                      .log_x = TRUE, .log_y = TRUE };
}

static void
place_of_dip (const AntBox *area, const AntView *view, const AntDipMark *dip, double *x, double *y)
{
  *x = ant_view_x (view, area, MAX (dip->duration_d * ANT_HOURS_PER_DAY, view->from * 1e-3));
  *y = ant_view_y (view, area, MAX (fabs (dip->depth_ppm), view->low * 1e-3));
}

size_t
ant_floor_chart_dip_at (const AntBox *box, const AntFloorChart *chart, const AntView *view, const AntTheme *theme,
                        double x, double y)
{
  AntBox area = ant_axes_area (box, theme, TRUE);
  size_t best = ANT_NO_DIP;
  double nearest = HIT_PX;
  for (size_t d = 0; d < chart->n_dips; d++)
    {
      double at_x, at_y;
      place_of_dip (&area, view, &chart->dip[d], &at_x, &at_y);
      if (hypot (x - at_x, y - at_y) < nearest)
        {
          best = d;
          nearest = hypot (x - at_x, y - at_y);
        }
    }
  return best;
}

/* What known bodies would do: a level, or the range between two. */
static const struct
{
  double low, high;
  const char *name;
} references[] = {
  { ANT_VENUS_PPM, ANT_VENUS_PPM, N_("Venus") },
  { ANT_EARTH_AFAR_LOW_PPM, ANT_EARTH_AFAR_HIGH_PPM, N_("an Earth from afar") },
  { ANT_MERCURY_LOW_PPM, ANT_MERCURY_MAY_PPM, N_("Mercury, May") },
  { ANT_MERCURY_NOVEMBER_PPM, ANT_MERCURY_NOVEMBER_PPM, N_("Mercury, November") },
};

static void
draw_references (Canvas *canvas)
{
  AntPen *pen = &canvas->pen;
  const AntBox *area = &canvas->area;
  AntColour wash = pen->theme->role[ANT_ROLE_QUIET], line = wash;
  wash.alpha = 0.1;
  line.alpha = 0.55;
  for (size_t r = 0; r < G_N_ELEMENTS (references); r++)
    {
      double top = ant_view_y (canvas->view, area, references[r].high),
             foot = ant_view_y (canvas->view, area, references[r].low);
      AntBox band = { area->x, top, area->width, foot - top }, edge = { area->x, top, area->width, 1 };
      ant_pen_set (pen, wash);
      if (band.height > 1)
        ant_pen_fill_box (pen, &band);
      ant_pen_set (pen, line);
      ant_pen_across (pen, area->x, area->x + area->width, top);
      ant_labels_block (&canvas->field, &edge);
    }
}

/* Each at the right above its line if it can, else at the left, below, or in the middle. */
static void
name_references (Canvas *canvas)
{
  AntPen *pen = &canvas->pen;
  const AntBox *area = &canvas->area;
  double font = pen->theme->font_px, right = area->x + area->width - 0.4 * font, left = area->x + 0.4 * font;
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  for (size_t r = 0; r < G_N_ELEMENTS (references); r++)
    {
      double y = ant_view_y (canvas->view, area, references[r].high);
      AntAnchor anchor[] = { { right, y, 1, 1 }, { left, y, 0, 1 }, { right, y + 1, 1, 0 }, { left, y + 1, 0, 0 },
                             { area->x + area->width / 2, y, 0.5, 1 } };
      ant_labels_place (&canvas->field, pen, _(references[r].name), ANT_TEXT_SMALL, G_N_ELEMENTS (anchor), anchor);
    }
}

/* The floor times a factor as a polyline. */
static size_t
floor_curve (const Canvas *canvas, double factor, double *x, double *y)
{
  size_t n = 0;
  for (size_t i = 0; i < canvas->chart->n_floor; i++)
    {
      const AntFloorPoint *point = &canvas->chart->floor[i];
      if (!(point->sigma_ppm > 0 && point->duration_d > 0))
        continue;
      x[n] = ant_view_x (canvas->view, &canvas->area, point->duration_d * ANT_HOURS_PER_DAY);
      y[n++] = ant_view_y (canvas->view, &canvas->area, point->sigma_ppm * factor);
    }
  return n;
}

static void
fill_below (Canvas *canvas, size_t n, const double *x, const double *y)
{
  cairo_t *cr = canvas->pen.cr;
  double foot = canvas->area.y + canvas->area.height;
  if (n < 2)
    return;
  ant_pen_colour (&canvas->pen, ANT_ROLE_FLOOR);
  cairo_move_to (cr, x[0], foot);
  for (size_t i = 0; i < n; i++)
    cairo_line_to (cr, x[i], MIN (y[i], foot));
  cairo_line_to (cr, x[n - 1], foot);
  cairo_close_path (cr);
  cairo_fill (cr);
}

static void
name_curve (Canvas *canvas, size_t n, const double *x, const double *y, const char *name)
{
  AntAnchor anchor[128];
  size_t count = 0;
  for (size_t i = 0; i < n && count + 2 <= G_N_ELEMENTS (anchor); i++)
    {
      anchor[count++] = (AntAnchor) { x[i] + 4, y[i] - 3, 0, 1 };
      anchor[count++] = (AntAnchor) { x[i] + 4, y[i] + 4, 0, 0 };
    }
  ant_pen_colour (&canvas->pen, ANT_ROLE_TEXT);
  ant_labels_place (&canvas->field, &canvas->pen, name, ANT_TEXT_SMALL, count, anchor);
}

/* The number of a dip beside its shape; the selected one's is written even where it covers others. */
static void
name_dip (Canvas *canvas, size_t d)
{
  AntPen *pen = &canvas->pen;
  gboolean selected = d == canvas->chart->selected;
  double x, y, off = DIP_PX + (selected ? 8 : 4), up = 0.7 * pen->theme->font_px;
  place_of_dip (&canvas->area, canvas->view, &canvas->chart->dip[d], &x, &y);
  if (!ant_box_holds (&canvas->area, x, y))
    return;
  char number[16];
  ant_dip_mark_label (&canvas->chart->dip[d], sizeof number, number);
  AntAnchor anchor[] = { { x + off, y, 0, 0.5 }, { x - off, y, 1, 0.5 }, { x, y - off + 2, 0.5, 1 },
                         { x, y + off - 2, 0.5, 0 }, { x + off, y - up, 0, 0.5 }, { x + off, y + up, 0, 0.5 },
                         { x - off, y - up, 1, 0.5 }, { x - off, y + up, 1, 0.5 } };
  ant_pen_colour (pen, ANT_ROLE_TEXT);
  if (ant_labels_place (&canvas->field, pen, number, ANT_TEXT_STRONG, G_N_ELEMENTS (anchor), anchor) || !selected)
    return;
  AntBox ground = ant_pen_text_box (pen, number, ANT_TEXT_STRONG, x + off, y, 0, 0.5);
  ant_pen_colour (pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (pen, &ground);
  ant_pen_colour (pen, ANT_ROLE_TEXT);
  ant_pen_text (pen, number, ANT_TEXT_STRONG, x + off, y, 0, 0.5);
  ant_labels_block (&canvas->field, &ground);
}

static void
draw_dip (Canvas *canvas, size_t d)
{
  double x, y;
  const AntDipMark *dip = &canvas->chart->dip[d];
  place_of_dip (&canvas->area, canvas->view, dip, &x, &y);
  if (ant_box_holds (&canvas->area, x, y))
    ant_pen_dip (&canvas->pen, dip->look, x, y, DIP_PX, d == canvas->chart->selected);
}

/* The selected dip lies on top of the others, and its number is placed first. */
static void
draw_dips (Canvas *canvas)
{
  size_t n = canvas->chart->n_dips, selected = canvas->chart->selected;
  for (size_t d = 0; d < n; d++)
    if (d != selected)
      draw_dip (canvas, d);
  if (selected < n)
    {
      draw_dip (canvas, selected);
      name_dip (canvas, selected);
    }
  for (size_t d = 0; d < n; d++)
    if (d != selected)
      name_dip (canvas, d);
}

static void
block_dips (Canvas *canvas)
{
  for (size_t d = 0; d < canvas->chart->n_dips; d++)
    {
      double x, y, r = DIP_PX + (d == canvas->chart->selected ? 7 : 2); /* with its ring */
      place_of_dip (&canvas->area, canvas->view, &canvas->chart->dip[d], &x, &y);
      AntBox box = { x - r, y - r, 2 * r, 2 * r };
      ant_labels_block (&canvas->field, &box);
    }
}

static void
draw_threshold (Canvas *canvas, size_t n, const double *x, const double *y)
{
  double dashes[] = { 5, 3 };
  AntPen *pen = &canvas->pen;
  cairo_save (pen->cr);
  cairo_set_dash (pen->cr, dashes, 2, 0);
  ant_pen_colour (pen, ANT_ROLE_THRESHOLD);
  ant_pen_polyline (pen, n, x, y, pen->theme->trace_px);
  cairo_restore (pen->cr);
}

/* The area first, known bodies over it, the curves over them; then the names, the curves' first. */
static void
draw_levels (Canvas *canvas)
{
  size_t room = canvas->chart->n_floor + 1;
  double threshold = canvas->chart->threshold_snr;
  g_autofree double *x = g_new (double, room);
  g_autofree double *floor_y = g_new (double, room);
  g_autofree double *threshold_y = g_new (double, room);
  size_t n = floor_curve (canvas, 1, x, floor_y);
  floor_curve (canvas, MAX (threshold, 1), x, threshold_y);
  fill_below (canvas, n, x, floor_y);
  draw_references (canvas);
  ant_pen_colour (&canvas->pen, ANT_ROLE_TEXT);
  ant_pen_polyline (&canvas->pen, n, x, floor_y, canvas->pen.theme->trace_px);
  ant_labels_block_curve (&canvas->field, n, x, floor_y);
  if (threshold > 0)
    {
      draw_threshold (canvas, n, x, threshold_y);
      ant_labels_block_curve (&canvas->field, n, x, threshold_y);
      char number[48], name[96];
      ant_plot_number_text (threshold, 1, sizeof number, number);
      g_snprintf (name, sizeof name, _("threshold, SNR %s"), number);
      name_curve (canvas, n, x, threshold_y, name);
    }
  name_curve (canvas, n, x, floor_y, _("noise floor, 1σ"));
  name_references (canvas);
}

void
ant_floor_chart_paint (cairo_t *cr, const AntBox *box, const AntFloorChart *chart, const AntView *view,
                       const AntTheme *theme, double scale)
{
  g_autofree Canvas *canvas = g_new0 (Canvas, 1);
  AntFrame frame;
  AntPen *pen = &canvas->pen;
  ant_pen_begin (pen, cr, theme, scale);
  ant_frame_begin (&frame, pen, box, view, FALSE);
  canvas->area = frame.area;
  canvas->chart = chart;
  canvas->view = view;
  AntBox *area = &canvas->area;
  ant_labels_begin (&canvas->field, area);
  block_dips (canvas);
  ant_pen_clip (pen, area);
  draw_levels (canvas);
  cairo_restore (cr);
  ant_frame_axes (&frame, pen, view);
  draw_dips (canvas);
  ant_axes_titles (pen, area, _("Depth, ppm"), _("Duration, hours"));
  ant_pen_end (pen);
}
