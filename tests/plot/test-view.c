/* test-view.c - numbers to paper and back, and the moves of a view. */
#include "plot/view.h"
#include <glib.h>
#include <math.h>

static const AntBox box = { 64, 20, 800, 120 };

static void
paper_and_numbers_are_inverse (void)
{
  AntView views[] = { { 3, 45, -1000, 200, FALSE, FALSE }, { 0.5, 13, 10, 2e4, TRUE, TRUE } };
  for (size_t v = 0; v < G_N_ELEMENTS (views); v++)
    for (double x = 64; x <= 864; x += 16)
      {
        g_assert_cmpfloat_with_epsilon (ant_view_x (&views[v], &box, ant_view_at_x (&views[v], &box, x)), x, 1e-9);
        double y = 20 + (x - 64) * 0.15;
        g_assert_cmpfloat_with_epsilon (ant_view_y (&views[v], &box, ant_view_at_y (&views[v], &box, y)), y, 1e-9);
      }
}

static void
greater_values_stand_higher (void)
{
  AntView view = { 0, 1, -5, 5, FALSE, FALSE };
  g_assert_cmpfloat (ant_view_y (&view, &box, 4), <, ant_view_y (&view, &box, 3));
  g_assert_cmpfloat (ant_view_y (&view, &box, 5), ==, box.y);
  g_assert_cmpfloat (ant_view_y (&view, &box, -5), ==, box.y + box.height);
}

static void
far_away_stays_within_reach_of_cairo (void)
{
  AntView view = { 0, 1e-9, 0, 1e-9, FALSE, FALSE };
  g_assert_cmpfloat (fabs (ant_view_x (&view, &box, 1e9)), <, 2e5);
  g_assert_cmpfloat (fabs (ant_view_y (&view, &box, -1e9)), <, 2e5);
}

static void
zooming_keeps_the_point_under_the_pointer (void)
{
  AntView view = { 10, 30, 0, 1, FALSE, FALSE };
  double x = ant_view_x (&view, &box, 17);
  for (int k = 0; k < 20; k++)
    {
      ant_view_zoom (&view, 1.3, 17, 0, 100, 0.001);
      g_assert_cmpfloat_with_epsilon (ant_view_x (&view, &box, 17), x, 1e-6);
    }
}

static void
a_view_never_leaves_the_whole (void)
{
  AntView view = { 10, 30, 0, 1, FALSE, FALSE };
  ant_view_zoom (&view, 1e-6, 17, 0, 100, 0.001);
  g_assert_cmpfloat (view.from, ==, 0);
  g_assert_cmpfloat (view.to, ==, 100);
  ant_view_zoom (&view, 1e12, 17, 0, 100, 0.5);
  g_assert_cmpfloat_with_epsilon (view.to - view.from, 0.5, 1e-12);
  ant_view_pan (&view, 1e6, 0, 100);
  g_assert_cmpfloat (view.to, ==, 100);
  g_assert_cmpfloat_with_epsilon (view.to - view.from, 0.5, 1e-9);
  ant_view_pan (&view, -1e6, 0, 100);
  g_assert_cmpfloat (view.from, ==, 0);
}

static void
fitted_values_hold_what_is_seen_and_no_more (void)
{
  float value[100];
  for (int i = 0; i < 100; i++)
    value[i] = i == 90 ? -5000.0f : (float) (i % 7);
  AntPyramid *pyramid = ant_pyramid_new (100, value);
  AntView view = { 2, 5, 7, 8, FALSE, FALSE };
  g_assert_true (ant_view_fit_y (&view, pyramid, 1, 0.1)); /* places 10 to 40 */
  g_assert_cmpfloat (view.low, <, 0);
  g_assert_cmpfloat (view.high, >, 6);
  g_assert_cmpfloat (view.high - view.low, <, 8);
  view.from = 50;
  view.to = 60;
  g_assert_false (ant_view_fit_y (&view, pyramid, 1, 0.1));
  ant_pyramid_free (pyramid);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/view/paper-and-numbers-are-inverse", paper_and_numbers_are_inverse);
  g_test_add_func ("/plot/view/greater-values-stand-higher", greater_values_stand_higher);
  g_test_add_func ("/plot/view/far-away-stays-within-reach-of-cairo", far_away_stays_within_reach_of_cairo);
  g_test_add_func ("/plot/view/zooming-keeps-the-point-under-the-pointer", zooming_keeps_the_point_under_the_pointer);
  g_test_add_func ("/plot/view/a-view-never-leaves-the-whole", a_view_never_leaves_the_whole);
  g_test_add_func ("/plot/view/fitted-values-hold-what-is-seen-and-no-more",
                   fitted_values_hold_what_is_seen_and_no_more);
  return g_test_run ();
}
