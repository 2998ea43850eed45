/* canvas.c - pixels of an image surface. */
#include "canvas.h"
#include <math.h>

AntCanvas
ant_canvas_new (int width, int height)
{
  AntCanvas canvas = { width, height, cairo_image_surface_create (CAIRO_FORMAT_RGB24, width, height), NULL };
  canvas.cr = cairo_create (canvas.surface);
  return canvas;
}

void
ant_canvas_clear (AntCanvas *canvas)
{
  g_assert_cmpint (cairo_status (canvas->cr), ==, CAIRO_STATUS_SUCCESS);
  cairo_destroy (canvas->cr);
  cairo_surface_destroy (canvas->surface);
}

guint32
ant_canvas_pixel (const AntCanvas *canvas, int x, int y)
{
  cairo_surface_flush (canvas->surface);
  const unsigned char *row = cairo_image_surface_get_data (canvas->surface);
  row += (gsize) y * (gsize) cairo_image_surface_get_stride (canvas->surface);
  const guint32 *pixel = (const void *) row;
  return pixel[x] & 0xffffff;
}

guint32
ant_canvas_code (AntColour c)
{
  return (guint32) lround (c.red * 255) << 16 | (guint32) lround (c.green * 255) << 8 | (guint32) lround (c.blue * 255);
}

int
ant_canvas_count_in_column (const AntCanvas *canvas, int x, guint32 code)
{
  int count = 0;
  for (int y = 0; y < canvas->height; y++)
    count += ant_canvas_pixel (canvas, x, y) == code;
  return count;
}

int
ant_canvas_count (const AntCanvas *canvas, guint32 code)
{
  int count = 0;
  for (int x = 0; x < canvas->width; x++)
    count += ant_canvas_count_in_column (canvas, x, code);
  return count;
}

static int
distance (guint32 a, guint32 b)
{
  int sum = 0;
  for (int shift = 0; shift < 24; shift += 8)
    {
      int off = (int) (a >> shift & 255) - (int) (b >> shift & 255);
      sum += off * off;
    }
  return sum;
}

int
ant_canvas_lowest (const AntCanvas *canvas, int x, int foot, guint32 code)
{
  for (int y = foot - 1; y >= 0; y--)
    {
      guint32 pixel = ant_canvas_pixel (canvas, x, y);
      if (distance (pixel, code) < distance (pixel, 0xffffff) && 4 * distance (pixel, code) < distance (code, 0xffffff))
        return y;
    }
  return -1;
}

char *
ant_canvas_digest (const AntCanvas *canvas)
{
  cairo_surface_flush (canvas->surface);
  return g_compute_checksum_for_data (G_CHECKSUM_SHA256, cairo_image_surface_get_data (canvas->surface),
                                      (gsize) canvas->height * (gsize) cairo_image_surface_get_stride (canvas->surface));
}
