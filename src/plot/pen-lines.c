/* pen-lines.c - boxes, dots and polylines by the thousand. */
#include <glib.h>
#include <math.h>
#include "plot/coverage.h"
#include "plot/pen.h"

#define MANY 256 /* points: from here up a line can be ragged */
#define RAGGED 3

static AntCoverage *
sheet (AntPen *pen)
{
  if (!pen->added && ant_coverage_suits (pen->cr))
    pen->added = ant_coverage_new (pen->cr, pen->scale);
  return pen->added;
}

void
ant_pen_add_box (AntPen *pen, double left, double top, double right, double foot)
{
  if (sheet (pen))
    ant_coverage_box (pen->added, (int) lround (left * pen->scale), (int) lround (top * pen->scale),
                      (int) lround (right * pen->scale), (int) lround (foot * pen->scale));
  else
    cairo_rectangle (pen->cr, left, top, right - left, foot - top);
}

void
ant_pen_add_dot (AntPen *pen, double x, double y, double r)
{
  double s = pen->scale;
  if (sheet (pen))
    {
      ant_coverage_segment (pen->added, x * s, y * s, x * s, y * s, r * s);
      return;
    }
  cairo_new_sub_path (pen->cr);
  cairo_arc (pen->cr, x, y, r, 0, 2 * G_PI);
}

void
ant_pen_fill_added (AntPen *pen)
{
  if (pen->added)
    ant_coverage_fill (pen->added, pen->cr, pen->scale);
  else
    cairo_fill (pen->cr);
  pen->added = NULL;
}

/* A line that runs up and down much farther than it runs along is a ragged area: columns of pixels show it as well as
 * strokes do, at a fraction of their cost. */
static gboolean
is_ragged (size_t n, const double *x, const double *y)
{
  double travel = 0;
  for (size_t i = 1; i < n; i++)
    travel += isnan (y[i]) || isnan (y[i - 1]) ? 0 : fabs (y[i] - y[i - 1]);
  return n > MANY && x[n - 1] > x[0] && travel > RAGGED * (x[n - 1] - x[0]);
}

/* Where the line runs within each column of device pixels, from the column of x[0]. */
static void
spread_segment (AntPen *pen, double first, size_t n_columns, double x0, double y0, double x1, double y1,
                AntExtent *column)
{
  double slope = x1 > x0 ? (y1 - y0) / (x1 - x0) : 0;
  double from = CLAMP (floor (x0 * pen->scale) - first, 0, (double) n_columns - 1);
  double to = CLAMP (floor (x1 * pen->scale) - first, from, (double) n_columns - 1);
  for (size_t c = (size_t) from; c <= (size_t) to; c++)
    {
      double left = MAX (x0, (first + (double) c) / pen->scale), right = MIN (x1, (first + (double) c + 1) / pen->scale);
      double a = y0 + slope * (left - x0), b = x1 > x0 ? y0 + slope * (right - x0) : y1;
      column[c].low = MIN (column[c].low, (float) MIN (a, b));
      column[c].high = MAX (column[c].high, (float) MAX (a, b));
    }
}

static void
add_column (AntPen *pen, double column, double top, double foot)
{
  if (sheet (pen))
    ant_coverage_column (pen->added, (int) column, top * pen->scale, foot * pen->scale);
  else
    cairo_rectangle (pen->cr, column / pen->scale, top, 1 / pen->scale, foot - top);
}

static void
fill_columns (AntPen *pen, size_t n, const double *x, const double *y, double width)
{
  double first = floor (x[0] * pen->scale);
  size_t n_columns = (size_t) (floor (x[n - 1] * pen->scale) - first) + 1;
  g_autofree AntExtent *column = g_new (AntExtent, n_columns);
  for (size_t c = 0; c < n_columns; c++)
    column[c] = (AntExtent) { INFINITY, -INFINITY };
  for (size_t i = 0; i < n; i++)
    if (!isnan (y[i]))
      {
        gboolean joined = i + 1 < n && !isnan (y[i + 1]);
        spread_segment (pen, first, n_columns, x[i], y[i], x[joined ? i + 1 : i], y[joined ? i + 1 : i], column);
      }
  for (size_t c = 0; c < n_columns; c++)
    if (column[c].low <= column[c].high)
      add_column (pen, first + (double) c, (double) column[c].low - width / 2, (double) column[c].high + width / 2);
  ant_pen_fill_added (pen);
}

static void
draw_segments (AntPen *pen, size_t n, const double *x, const double *y, double width)
{
  AntCoverage *coverage = sheet (pen);
  double s = pen->scale, radius = width / 2 * s;
  for (size_t i = 0; i < n; i++)
    if (!isnan (y[i]))
      {
        size_t next = i + 1 < n && !isnan (y[i + 1]) ? i + 1 : i;
        ant_coverage_segment (coverage, x[i] * s, y[i] * s, x[next] * s, y[next] * s, radius);
      }
  ant_pen_fill_added (pen);
}

/* For paper, and for dashes. */
static void
stroke_line (AntPen *pen, size_t n, const double *x, const double *y, double width)
{
  cairo_t *cr = pen->cr;
  cairo_save (cr);
  cairo_set_line_width (cr, width);
  cairo_set_line_join (cr, CAIRO_LINE_JOIN_ROUND);
  cairo_set_line_cap (cr, CAIRO_LINE_CAP_ROUND);
  gboolean in_path = FALSE;
  for (size_t i = 0; i < n; i++)
    {
      if (isnan (y[i]))
        in_path = FALSE;
      else if (in_path)
        cairo_line_to (cr, x[i], y[i]);
      else
        {
          cairo_move_to (cr, x[i], y[i]);
          if (i + 1 == n || isnan (y[i + 1])) /* alone: the round cap makes it a dot */
            cairo_line_to (cr, x[i], y[i]);
          in_path = TRUE;
        }
    }
  cairo_stroke (cr);
  cairo_restore (cr);
}

void
ant_pen_polyline (AntPen *pen, size_t n, const double *x, const double *y, double width)
{
  gboolean dashed = cairo_get_dash_count (pen->cr) > 0;
  if (n == 0)
    return;
  if (!dashed && is_ragged (n, x, y))
    fill_columns (pen, n, x, y, width);
  else if (!dashed && ant_coverage_suits (pen->cr))
    draw_segments (pen, n, x, y, width);
  else
    stroke_line (pen, n, x, y, width);
}
