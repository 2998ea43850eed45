/* test-coverage.c - lines, dots and boxes of coverage look as cairo's own do. */
#include "plot/coverage.h"
#include <glib.h>
#include <math.h>
#include "canvas.h"
#include "plot/pen.h"

#define WIDTH 120
#define HEIGHT 80

static AntCanvas
white_canvas (void)
{
  AntCanvas canvas = ant_canvas_new (WIDTH, HEIGHT);
  cairo_set_source_rgb (canvas.cr, 1, 1, 1);
  cairo_paint (canvas.cr);
  cairo_set_source_rgb (canvas.cr, 0, 0, 0);
  return canvas;
}

static int
darkness (const AntCanvas *canvas, int x, int y)
{
  return 255 - (int) (ant_canvas_pixel (canvas, x, y) & 255);
}

/* Greatest difference of a pixel, and that of all ink together as a part of it. */
static void
compare (const AntCanvas *a, const AntCanvas *b, int *worst, double *ink)
{
  double sum_a = 0, sum_b = 0;
  *worst = 0;
  for (int y = 0; y < HEIGHT; y++)
    for (int x = 0; x < WIDTH; x++)
      {
        int at_a = darkness (a, x, y), at_b = darkness (b, x, y);
        *worst = MAX (*worst, ABS (at_a - at_b));
        sum_a += at_a;
        sum_b += at_b;
      }
  *ink = sum_a / sum_b - 1;
}

static void
a_line_looks_like_a_stroke_with_round_ends (void)
{
  static const double x[] = { 9.3, 12, 40, 58.4, 95, 110.8 }, y[] = { 9, 70.2, 68, 20.5, 12, 12 };
  for (double width = 1; width <= 6; width += 0.5)
    {
      AntCanvas ours = white_canvas (), cairos = white_canvas ();
      AntCoverage *coverage = ant_coverage_new (ours.cr, 1);
      for (size_t i = 0; i + 1 < G_N_ELEMENTS (x); i++)
        ant_coverage_segment (coverage, x[i], y[i], x[i + 1], y[i + 1], width / 2);
      ant_coverage_fill (coverage, ours.cr, 1);
      cairo_set_line_width (cairos.cr, width);
      cairo_set_line_join (cairos.cr, CAIRO_LINE_JOIN_ROUND);
      cairo_set_line_cap (cairos.cr, CAIRO_LINE_CAP_ROUND);
      for (size_t i = 0; i < G_N_ELEMENTS (x); i++)
        cairo_line_to (cairos.cr, x[i], y[i]);
      cairo_stroke (cairos.cr);
      int worst;
      double ink;
      compare (&ours, &cairos, &worst, &ink);
      g_test_message ("width %g: a pixel at most %d of 255 off, ink %+.1f %%", width, worst, 100 * ink);
      g_assert_cmpint (worst, <=, 64);
      g_assert_cmpfloat (fabs (ink), <, 0.03);
      ant_canvas_clear (&ours);
      ant_canvas_clear (&cairos);
    }
}

static void
a_dot_looks_like_a_disc (void)
{
  for (double r = 1.3; r <= 4; r += 0.3)
    {
      AntCanvas ours = white_canvas (), cairos = white_canvas ();
      AntCoverage *coverage = ant_coverage_new (ours.cr, 1);
      ant_coverage_segment (coverage, 30.4, 30.9, 30.4, 30.9, r);
      ant_coverage_fill (coverage, ours.cr, 1);
      cairo_arc (cairos.cr, 30.4, 30.9, r, 0, 2 * G_PI);
      cairo_fill (cairos.cr);
      int worst;
      double ink;
      compare (&ours, &cairos, &worst, &ink);
      g_assert_cmpint (worst, <=, 40);
      g_assert_cmpfloat (fabs (ink), <, 0.1);
      ant_canvas_clear (&ours);
      ant_canvas_clear (&cairos);
    }
}

static void
a_column_ends_within_pixels (void)
{
  AntCanvas canvas = white_canvas ();
  AntCoverage *coverage = ant_coverage_new (canvas.cr, 1);
  ant_coverage_column (coverage, 7, 10.25, 20.5);
  ant_coverage_column (coverage, 9, 10.25, 10.75);
  ant_coverage_column (coverage, 11, -5, 500);
  ant_coverage_fill (coverage, canvas.cr, 1);
  g_assert_cmpint (ABS (darkness (&canvas, 7, 10) - 191), <=, 1);
  g_assert_cmpint (ABS (darkness (&canvas, 7, 20) - 128), <=, 1);
  g_assert_cmpint (ABS (darkness (&canvas, 9, 10) - 128), <=, 1);
  g_assert_cmpint (ant_canvas_count_in_column (&canvas, 7, 0), ==, 9);
  g_assert_cmpint (ant_canvas_count_in_column (&canvas, 11, 0), ==, HEIGHT);
  g_assert_cmpint (ant_canvas_count (&canvas, 0xffffff), ==, HEIGHT * (WIDTH - 1) - 11 - 1);
  ant_canvas_clear (&canvas);
}

static void
shapes_far_outside_leave_no_mark (void)
{
  AntCanvas canvas = white_canvas ();
  AntCoverage *coverage = ant_coverage_new (canvas.cr, 1);
  ant_coverage_segment (coverage, -1e5, -1e5, -10, 1e5, 1);
  ant_coverage_segment (coverage, 300, 20, 1e5, 20, 1);
  ant_coverage_box (coverage, -50, 0, -10, 20);
  ant_coverage_column (coverage, WIDTH, 0, 20);
  ant_coverage_column (coverage, 5, -20, -10);
  ant_coverage_fill (coverage, canvas.cr, 1);
  g_assert_cmpint (ant_canvas_count (&canvas, 0xffffff), ==, WIDTH * HEIGHT);
  ant_canvas_clear (&canvas);
}

static void
paint_mixture (cairo_t *cr, double scale)
{
  AntTheme theme;
  AntPen pen;
  static const double x[] = { 2, 20, 38, 50 }, y[] = { 5, 33, NAN, 12 };
  ant_theme_init (&theme, ANT_THEME_LIGHT);
  ant_pen_begin (&pen, cr, &theme, scale);
  ant_pen_clip (&pen, &(AntBox) { 1, 1, 55, 38 });
  ant_pen_colour (&pen, ANT_ROLE_BAND);
  ant_pen_add_box (&pen, 10, 10, 30, 20);
  ant_pen_add_box (&pen, 20, 12, 45, 30);
  ant_pen_fill_added (&pen);
  ant_pen_colour (&pen, ANT_ROLE_CURVE);
  ant_pen_polyline (&pen, G_N_ELEMENTS (x), x, y, 1.5);
  cairo_restore (cr);
  ant_pen_end (&pen);
}

/* The window keeps drawings and plays them back, shifted, on a doubled display too. */
static void
a_drawing_that_is_played_back_is_the_same (void)
{
  AntCanvas direct = white_canvas (), played = white_canvas ();
  cairo_translate (direct.cr, 6, 4);
  cairo_scale (direct.cr, 2, 2);
  paint_mixture (direct.cr, 2);
  cairo_rectangle_t extents = { 0, 0, WIDTH / 2, HEIGHT / 2 };
  cairo_surface_t *record = cairo_recording_surface_create (CAIRO_CONTENT_COLOR_ALPHA, &extents);
  cairo_t *cr = cairo_create (record);
  paint_mixture (cr, 2);
  cairo_destroy (cr);
  cairo_translate (played.cr, 6, 4);
  cairo_scale (played.cr, 2, 2);
  cairo_set_source_surface (played.cr, record, 0, 0);
  cairo_paint (played.cr);
  cairo_surface_destroy (record);
  int worst;
  double ink;
  compare (&played, &direct, &worst, &ink);
  g_assert_cmpint (ant_canvas_count (&direct, 0xffffff), <, WIDTH * HEIGHT - 1000);
  g_assert_cmpint (worst, <=, 2);
  ant_canvas_clear (&direct);
  ant_canvas_clear (&played);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/coverage/a-line-looks-like-a-stroke-with-round-ends", a_line_looks_like_a_stroke_with_round_ends);
  g_test_add_func ("/plot/coverage/a-dot-looks-like-a-disc", a_dot_looks_like_a_disc);
  g_test_add_func ("/plot/coverage/a-column-ends-within-pixels", a_column_ends_within_pixels);
  g_test_add_func ("/plot/coverage/shapes-far-outside-leave-no-mark", shapes_far_outside_leave_no_mark);
  g_test_add_func ("/plot/coverage/a-drawing-that-is-played-back-is-the-same", a_drawing_that_is_played_back_is_the_same);
  return g_test_run ();
}
