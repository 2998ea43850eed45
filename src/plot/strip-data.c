/* strip-data.c - a long series on a few hundred columns of pixels. */
#include "plot/strip-data.h"
#include <glib.h>
#include <math.h>

#define DOTS_PX 5         /* samples this far apart are drawn as dots too */
#define LEAST_AVERAGE_PX 1.5
#define BAR_PX 14         /* averages wider than this are bars, each over its own bin */
#define CURVE_PX 2        /* between points of a curve: it is smooth */
#define GUESS_PX 24       /* a curve is not drawn across longer gaps */

static double
place_of (const AntStripData *data, double time_d)
{
  return (time_d - data->start_d) / data->step_d;
}

static size_t
columns_of (const AntPen *pen, const AntBox *area)
{
  return (size_t) MAX (1, floor (area->width * pen->scale + 0.5));
}

/* Places per column of device pixels. */
static double
density (const AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view)
{
  return (view->to - view->from) / data->step_d / (double) columns_of (pen, area);
}

/* First and last sample worth drawing, one beyond each edge. */
static void
samples_in_view (const AntStripData *data, const AntView *view, size_t *first, size_t *last)
{
  double n = (double) ant_pyramid_samples (data->pyramid);
  *first = (size_t) CLAMP (floor (place_of (data, view->from)) - 1, 0, n);
  *last = (size_t) CLAMP (ceil (place_of (data, view->to)) + 2, 0, n);
}

static void
gap_box (AntPen *pen, const AntBox *area, double x0, double x1)
{
  x0 = MAX (ant_pen_snap (pen, x0), area->x);
  x1 = MIN (ant_pen_snap (pen, x1), area->x + area->width);
  if (x1 > x0)
    ant_pen_add_box (pen, x0, area->y, x1, area->y + area->height);
}

/* Columns without a sample, in runs that hold at least two places. */
static void
gaps_by_column (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view, size_t n_columns,
                const AntExtent *column)
{
  double from = place_of (data, view->from), to = place_of (data, view->to);
  double n = (double) ant_pyramid_samples (data->pyramid);
  for (size_t c = 0; c < n_columns;)
    {
      size_t end = c;
      while (end < n_columns && column[end].low > column[end].high)
        end++;
      double first = MAX (ant_pyramid_column_start (from, to, n_columns, c), 0);
      double last = MIN (ant_pyramid_column_start (from, to, n_columns, end), n);
      if (end > c && last - first >= 2)
        gap_box (pen, area, area->x + (double) c / pen->scale, area->x + (double) end / pen->scale);
      c = MAX (end, c + 1);
    }
}

static void
gaps_by_sample (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view)
{
  const float *value = ant_pyramid_values (data->pyramid);
  size_t first, last;
  samples_in_view (data, view, &first, &last);
  for (size_t i = first; i < last;)
    {
      size_t end = i;
      while (end < last && isnan (value[end]))
        end++;
      if (end - i >= 2)
        gap_box (pen, area, ant_view_x (view, area, data->start_d + ((double) i - 0.5) * data->step_d),
                 ant_view_x (view, area, data->start_d + ((double) end - 0.5) * data->step_d));
      i = MAX (end, i + 1);
    }
}

void
ant_strip_data_open (AntStripData *data, AntPen *pen, const AntBox *area, const AntView *view)
{
  size_t n_columns = columns_of (pen, area);
  data->column = NULL;
  if (density (pen, area, data, view) < 1)
    return;
  data->column = g_new (AntExtent, n_columns);
  ant_pyramid_columns (data->pyramid, place_of (data, view->from), place_of (data, view->to), n_columns, data->column);
}

void
ant_strip_data_close (AntStripData *data)
{
  g_clear_pointer (&data->column, g_free);
}

void
ant_strip_data_gaps (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view)
{
  cairo_new_path (pen->cr);
  if (data->column)
    gaps_by_column (pen, area, data, view, columns_of (pen, area), data->column);
  else
    gaps_by_sample (pen, area, data, view);
  ant_pen_fill_added (pen);
}

/* Where two neighbours leave a step between them the lower one is drawn up to the other: the line stays whole, and a
 * dip of one sample stays in its own column. */
static void
bridge (size_t n, AntExtent *column)
{
  for (size_t c = 1; c < n; c++)
    {
      AntExtent *a = &column[c - 1], *b = &column[c];
      if (a->low > a->high || b->low > b->high)
        continue;
      if (a->high < b->low)
        a->high = b->low;
      else if (b->high < a->low)
        b->high = a->low;
    }
}

/* Boxes on whole pixels: cairo needs no antialiasing for them. */
static void
draw_extents (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view)
{
  size_t n_columns = columns_of (pen, area);
  AntExtent *column = data->column;
  if (density (pen, area, data, view) < 16)
    bridge (n_columns, column);
  double pixel = 1 / pen->scale, foot = area->y + area->height;
  cairo_new_path (pen->cr);
  for (size_t c = 0; c < n_columns; c++)
    {
      if (column[c].low > column[c].high)
        continue;
      double top = ant_pen_snap (pen, ant_view_y (view, area, (double) column[c].high) - pixel / 2);
      double low = ant_pen_snap (pen, ant_view_y (view, area, (double) column[c].low) + pixel / 2);
      top = MAX (top, area->y);
      low = MIN (MAX (low, top + pixel), foot);
      if (low > top)
        ant_pen_add_box (pen, area->x + (double) c * pixel, top, area->x + (double) (c + 1) * pixel, low);
    }
  ant_pen_fill_added (pen);
}

static void
draw_samples (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view)
{
  const float *value = ant_pyramid_values (data->pyramid);
  size_t first, last;
  samples_in_view (data, view, &first, &last);
  size_t n = last - first;
  g_autofree double *x = g_new (double, n);
  g_autofree double *y = g_new (double, n);
  for (size_t i = 0; i < n; i++)
    {
      x[i] = ant_view_x (view, area, data->start_d + (double) (first + i) * data->step_d);
      y[i] = isnan (value[first + i]) ? NAN : ant_view_y (view, area, (double) value[first + i]);
    }
  ant_pen_polyline (pen, n, x, y, 1);
  double apart = 1 / density (pen, area, data, view) / pen->scale, r = CLAMP (apart / 6, 1.2, 2.5);
  if (apart < DOTS_PX)
    return;
  for (size_t i = 0; i < n; i++)
    if (!isnan (y[i]))
      ant_pen_add_dot (pen, x[i], y[i], r);
  ant_pen_fill_added (pen);
}

/* Behind averages the extent is a pale ground; single samples keep their full colour. */
void
ant_strip_data_samples (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view,
                        const AntColour *colour)
{
  gboolean pale = data->averages && data->column;
  ant_pen_set (pen, colour ? *colour : pen->theme->role[pale ? ANT_ROLE_ENVELOPE : ANT_ROLE_SERIES]);
  if (data->column)
    draw_extents (pen, area, data, view);
  else
    draw_samples (pen, area, data, view);
}

/* Error as boxes on whole pixels, each as wide as its bin. */
static void
draw_band (AntPen *pen, const AntBox *area, const AntView *view, const AntAverageLevel *level, size_t first,
           size_t last, const double *edge)
{
  double foot = area->y + area->height;
  ant_pen_colour (pen, ANT_ROLE_BAND);
  for (size_t b = first; b < last; b++)
    {
      double mean = (double) level->mean[b], error = (double) level->error[b];
      if (isnan (mean) || error == 0)
        continue;
      double top = MAX (ant_pen_snap (pen, ant_view_y (view, area, mean + error)), area->y);
      double low = MIN (ant_pen_snap (pen, ant_view_y (view, area, mean - error)), foot);
      double left = MAX (ant_pen_snap (pen, edge[b - first]), area->x);
      double right = MIN (ant_pen_snap (pen, edge[b - first + 1]), area->x + area->width);
      if (low > top && right > left)
        ant_pen_add_box (pen, left, top, right, low);
    }
  ant_pen_fill_added (pen);
}

static void
draw_bars (AntPen *pen, size_t n, const double *edge, const double *y)
{
  cairo_set_line_width (pen->cr, pen->theme->trace_px);
  for (size_t b = 0; b < n; b++)
    if (!isnan (y[b]))
      {
        cairo_move_to (pen->cr, edge[b] + 1, y[b]);
        cairo_line_to (pen->cr, edge[b + 1] - 1, y[b]);
      }
  cairo_stroke (pen->cr);
}

size_t
ant_strip_data_averages (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view)
{
  double places_per_px = density (pen, area, data, view) * pen->scale;
  const AntAverageLevel *level =
      data->averages ? ant_averages_level (data->averages, LEAST_AVERAGE_PX * places_per_px) : NULL;
  if (!level || level->samples < 2)
    return 0;
  double bin_d = (double) level->samples * data->step_d, zero_d = data->start_d - 0.5 * data->step_d;
  size_t first = (size_t) CLAMP (floor ((view->from - zero_d) / bin_d) - 1, 0, (double) level->n);
  size_t last = (size_t) CLAMP (ceil ((view->to - zero_d) / bin_d) + 1, 0, (double) level->n), n = last - first;
  g_autofree double *edge = g_new (double, n + 1);
  g_autofree double *x = g_new (double, n);
  g_autofree double *y = g_new (double, n);
  for (size_t b = 0; b <= n; b++)
    edge[b] = ant_view_x (view, area, zero_d + (double) (first + b) * bin_d);
  for (size_t b = 0; b < n; b++)
    {
      x[b] = (edge[b] + edge[b + 1]) / 2;
      y[b] = isnan (level->mean[first + b]) ? NAN : ant_view_y (view, area, (double) level->mean[first + b]);
    }
  draw_band (pen, area, view, level, first, last, edge);
  ant_pen_colour (pen, ANT_ROLE_TRACE);
  if (n > 0 && edge[1] - edge[0] > BAR_PX)
    draw_bars (pen, n, edge, y);
  else
    ant_pen_polyline (pen, n, x, y, pen->theme->trace_px);
  return level->samples;
}

/* Strike out the points of gaps too wide for a guess: seen[i] tells whether a sample stands at point i. */
static void
break_at_gaps (size_t n, const guint8 *seen, double *y)
{
  for (size_t i = 0; i < n;)
    {
      size_t end = i;
      while (end < n && !seen[end])
        end++;
      for (size_t k = i; CURVE_PX * (end - i) > GUESS_PX && k < end; k++)
        y[k] = NAN;
      i = MAX (end, i + 1);
    }
}

static double
curve_at (const AntStripData *data, double place)
{
  size_t samples = ant_pyramid_samples (data->pyramid);
  if (!(place >= 0 && place <= (double) samples - 1))
    return NAN;
  size_t at = (size_t) place, next = MIN (at + 1, samples - 1);
  double part = place - (double) at, value = (double) data->curve[at];
  return part > 0 ? value + part * ((double) data->curve[next] - value) : value;
}

/* Whether a sample stands near a point of a curve. */
static gboolean
is_seen (const AntPen *pen, const AntBox *area, const AntStripData *data, double x, double place)
{
  if (!data->column)
    {
      double samples = (double) ant_pyramid_samples (data->pyramid);
      AntExtent extent = ant_pyramid_extent (data->pyramid, (size_t) CLAMP (place - 1, 0, samples),
                                             (size_t) CLAMP (place + 2, 0, samples));
      return extent.low <= extent.high;
    }
  double n = (double) columns_of (pen, area), from = (x - CURVE_PX) * pen->scale, to = (x + CURVE_PX) * pen->scale;
  for (size_t c = (size_t) CLAMP (from, 0, n); c < (size_t) CLAMP (to, 0, n); c++)
    if (data->column[c].low <= data->column[c].high)
      return TRUE;
  return FALSE;
}

void
ant_strip_data_curve (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view)
{
  size_t n = (size_t) ceil (area->width / CURVE_PX) + 1;
  g_autofree double *x = g_new (double, n);
  g_autofree double *y = g_new (double, n);
  g_autofree guint8 *seen = g_new (guint8, n);
  for (size_t i = 0; i < n; i++)
    {
      x[i] = area->x + MIN (area->width, CURVE_PX * (double) i);
      double place = place_of (data, ant_view_at_x (view, area, x[i])), value = curve_at (data, place);
      y[i] = isnan (value) ? NAN : ant_view_y (view, area, value);
      seen[i] = is_seen (pen, area, data, x[i] - area->x, place);
    }
  break_at_gaps (n, seen, y);
  ant_pen_colour (pen, ANT_ROLE_CURVE);
  ant_pen_polyline (pen, n, x, y, pen->theme->trace_px);
}
