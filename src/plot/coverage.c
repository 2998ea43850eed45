/* coverage.c - shapes as bytes of coverage. */
#include "plot/coverage.h"
#include <glib.h>
#include <math.h>
#include <string.h>

#define MOST_PX 16000 /* of a sheet, each way */

int
ant_coverage_suits (cairo_t *cr)
{
  switch (cairo_surface_get_type (cairo_get_target (cr)))
    {
    case CAIRO_SURFACE_TYPE_PDF:
    case CAIRO_SURFACE_TYPE_PS:
    case CAIRO_SURFACE_TYPE_SVG:
      return FALSE;
    default:
      return TRUE;
    }
}

AntCoverage *
ant_coverage_new (cairo_t *cr, double scale)
{
  AntCoverage *coverage = g_new0 (AntCoverage, 1);
  double x0, y0, x1, y1;
  cairo_clip_extents (cr, &x0, &y0, &x1, &y1);
  coverage->left = (int) floor (x0 * scale);
  coverage->top = (int) floor (y0 * scale);
  coverage->width = (int) CLAMP (ceil (x1 * scale) - coverage->left, 1, MOST_PX);
  coverage->height = (int) CLAMP (ceil (y1 * scale) - coverage->top, 1, MOST_PX);
  coverage->surface = cairo_image_surface_create (CAIRO_FORMAT_A8, coverage->width, coverage->height);
  coverage->byte = cairo_image_surface_get_data (coverage->surface);
  coverage->stride = cairo_image_surface_get_stride (coverage->surface);
  if (!coverage->byte) /* no memory: nothing is drawn */
    coverage->width = coverage->height = 0;
  coverage->seen_left = coverage->width;
  coverage->seen_top = coverage->height;
  return coverage;
}

void
ant_coverage_fill (AntCoverage *coverage, cairo_t *cr, double scale)
{
  int wide = coverage->seen_right - coverage->seen_left, tall = coverage->seen_foot - coverage->seen_top;
  if (wide > 0 && tall > 0)
    {
      cairo_surface_mark_dirty (coverage->surface);
      cairo_surface_set_device_scale (coverage->surface, scale, scale);
      cairo_pattern_t *mask = cairo_pattern_create_for_surface (coverage->surface);
      cairo_matrix_t place;
      cairo_matrix_init_translate (&place, -coverage->left / scale, -coverage->top / scale);
      cairo_pattern_set_matrix (mask, &place);
      cairo_pattern_set_filter (mask, CAIRO_FILTER_NEAREST);
      cairo_save (cr);
      cairo_new_path (cr);
      cairo_rectangle (cr, (coverage->left + coverage->seen_left) / scale, (coverage->top + coverage->seen_top) / scale,
                       wide / scale, tall / scale);
      cairo_clip (cr);
      cairo_mask (cr, mask);
      cairo_restore (cr);
      cairo_pattern_destroy (mask);
    }
  cairo_surface_destroy (coverage->surface);
  g_free (coverage);
}

/* Note that columns and rows of the sheet are drawn on. */
static inline void
see (AntCoverage *coverage, int left, int top, int right, int foot)
{
  coverage->seen_left = MIN (coverage->seen_left, left);
  coverage->seen_top = MIN (coverage->seen_top, top);
  coverage->seen_right = MAX (coverage->seen_right, right);
  coverage->seen_foot = MAX (coverage->seen_foot, foot);
}

static inline void
cover (unsigned char *byte, double part)
{
  unsigned char value = (unsigned char) (part * 255 + 0.5);
  *byte = MAX (*byte, value);
}

void
ant_coverage_column (AntCoverage *coverage, int column, double top, double foot)
{
  column -= coverage->left;
  top = MAX (top - coverage->top, 0);
  foot = MIN (foot - coverage->top, coverage->height);
  if (column < 0 || column >= coverage->width || foot <= top)
    return;
  int first = (int) top, last = (int) ceil (foot);
  see (coverage, column, first, column + 1, last);
  unsigned char *byte = coverage->byte + first * coverage->stride + column;
  cover (byte, MIN (foot, first + 1) - top);
  for (int row = first + 1; row < last - 1; row++)
    *(byte += coverage->stride) = 255;
  if (last - 1 > first)
    cover (byte + coverage->stride, foot - (last - 1));
}

void
ant_coverage_box (AntCoverage *coverage, int left, int top, int right, int foot)
{
  left = MAX (left - coverage->left, 0);
  top = MAX (top - coverage->top, 0);
  right = MIN (right - coverage->left, coverage->width);
  foot = MIN (foot - coverage->top, coverage->height);
  if (left >= right || top >= foot)
    return;
  see (coverage, left, top, right, foot);
  unsigned char *byte = coverage->byte + top * coverage->stride + left;
  for (int row = top; row < foot; row++, byte += coverage->stride)
    if (right - left == 1)
      *byte = 255;
    else
      memset (byte, 255, (size_t) (right - left));
}

/* Where the line of a segment runs while x is within reach of a column's middle. */
static void
rows_near (double middle, double reach, double x0, double y0, double x1, double y1, double *low, double *high)
{
  double from = y0, to = y1;
  if (x1 > x0)
    {
      double slope = (y1 - y0) / (x1 - x0);
      from = y0 + slope * (CLAMP (middle - reach, x0, x1) - x0);
      to = y0 + slope * (CLAMP (middle + reach, x0, x1) - x0);
    }
  *low = MIN (from, to);
  *high = MAX (from, to);
}

/* A pixel is covered as far as its middle lies within the line's edge, over the width of a pixel. */
void
ant_coverage_segment (AntCoverage *coverage, double x0, double y0, double x1, double y1, double radius)
{
  if (x1 < x0)
    {
      ant_coverage_segment (coverage, x1, y1, x0, y0, radius);
      return;
    }
  x0 -= coverage->left;
  x1 -= coverage->left;
  y0 -= coverage->top;
  y1 -= coverage->top;
  double dx = x1 - x0, dy = y1 - y0, square = dx * dx + dy * dy, reach = radius + 0.5;
  int first = (int) CLAMP (floor (x0 - reach), 0, coverage->width);
  int last = (int) CLAMP (ceil (x1 + reach), 0, coverage->width);
  for (int column = first; column < last; column++)
    {
      double low, high, x = column + 0.5 - x0;
      rows_near (column + 0.5, reach, x0, y0, x1, y1, &low, &high);
      int top = (int) CLAMP (floor (low - reach), 0, coverage->height);
      int foot = (int) CLAMP (ceil (high + reach), 0, coverage->height);
      if (top >= foot)
        continue;
      see (coverage, column, top, column + 1, foot);
      unsigned char *byte = coverage->byte + top * coverage->stride + column;
      for (int row = top; row < foot; row++, byte += coverage->stride)
        {
          double y = row + 0.5 - y0, along = square > 0 ? CLAMP ((x * dx + y * dy) / square, 0, 1) : 0;
          double off_x = x - along * dx, off_y = y - along * dy, off = off_x * off_x + off_y * off_y;
          if (off < reach * reach)
            cover (byte, MIN (reach - sqrt (off), 1));
        }
    }
}
