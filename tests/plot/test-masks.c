/* test-masks.c - spans that are left out are seen, and only they. */
#include "plot/masks.h"
#include <glib.h>
#include "canvas.h"

static const AntBox area = { 0, 0, 200, 60 };
static const AntView view = { 0, 20, 0, 1, 0, 0 }; /* ten pixels a day */

/* How many pixels of columns from..to are not the paper's. */
static int
marked (const AntCanvas *canvas, int from, int to)
{
  int n = 0;
  for (int x = from; x < to; x++)
    n += canvas->height - ant_canvas_count_in_column (canvas, x, 0xffffff);
  return n;
}

static AntCanvas
paint (size_t n, const AntSpan *mask)
{
  AntCanvas canvas = ant_canvas_new (200, 60);
  AntTheme theme;
  AntPen pen;
  ant_theme_init (&theme, ANT_THEME_LIGHT);
  cairo_set_source_rgb (canvas.cr, 1, 1, 1);
  cairo_paint (canvas.cr);
  ant_pen_begin (&pen, canvas.cr, &theme, 1);
  ant_masks_paint (&pen, &area, &view, n, mask);
  ant_pen_end (&pen);
  cairo_surface_flush (canvas.surface);
  return canvas;
}

static void
a_span_is_hatched_from_edge_to_edge (void)
{
  AntCanvas canvas = paint (1, &(AntSpan) { 5, 9 });
  g_assert_cmpint (marked (&canvas, 0, 50), ==, 0);
  g_assert_cmpint (marked (&canvas, 91, 200), ==, 0);
  g_assert_cmpint (marked (&canvas, 50, 51), ==, 60);
  for (int x = 55; x < 85; x++)
    g_assert_cmpint (marked (&canvas, x, x + 1), >, 5);
  ant_canvas_clear (&canvas);
}

static void
the_shortest_span_is_seen (void)
{
  AntCanvas canvas = paint (1, &(AntSpan) { 5, 5.001 });
  g_assert_cmpint (marked (&canvas, 49, 53), >=, 60);
  ant_canvas_clear (&canvas);
}

static void
spans_out_of_view_leave_no_mark (void)
{
  AntCanvas canvas = paint (2, (const AntSpan[]) { { -5, -1 }, { 25, 1e6 } });
  g_assert_cmpint (marked (&canvas, 0, 200), ==, 0);
  ant_canvas_clear (&canvas);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/masks/a-span-is-hatched-from-edge-to-edge", a_span_is_hatched_from_edge_to_edge);
  g_test_add_func ("/plot/masks/the-shortest-span-is-seen", the_shortest_span_is_seen);
  g_test_add_func ("/plot/masks/spans-out-of-view-leave-no-mark", spans_out_of_view_leave_no_mark);
  return g_test_run ();
}
