/* test-charts.c - floor chart, spectrum, tails and close-up: what is asked for is seen where it belongs, and found
 * there. */
#include <glib.h>
#include <math.h>
#include "canvas.h"
#include "core/random.h"
#include "plot/clock-chart.h"
#include "plot/dip-closeup.h"
#include "plot/floor-chart.h"
#include "plot/spectrum-chart.h"
#include "plot/tail-chart.h"

#define WIDTH 420
#define HEIGHT 340

static const AntBox box = { 0, 0, WIDTH, HEIGHT };

static const AntFloorPoint floor_points[] = {
  { 0.5 / 24, 100, 1, 0, 40 }, { 2 / 24.0, 100, 1, 0, 22 }, { 5 / 24.0, 100, 1, 0, NAN }, { 13 / 24.0, 100, 1, 0, 20 },
};
static const AntDipMark dips[] = {
  { 10, 6.3 / 24, 1021, 1, ANT_LOOK_PLANET }, { 20, 7.4 / 24, 168, 2, ANT_LOOK_PLANET_SHAPED },
  { 30, 9 / 24.0, -190, 3, ANT_LOOK_FLARE }, { 40, 16 / 24.0, 4, 4, ANT_LOOK_NOISE },
};
static const AntFloorChart floor_chart = {
  G_N_ELEMENTS (floor_points), floor_points, 5.1, G_N_ELEMENTS (dips), dips, 1
};

typedef struct
{
  AntTheme theme;
  AntCanvas canvas;
} Scene;

static void
scene_open (Scene *scene)
{
  ant_theme_init (&scene->theme, ANT_THEME_LIGHT);
  scene->canvas = ant_canvas_new (WIDTH, HEIGHT);
}

static int
seen (const Scene *scene, AntColour colour)
{
  return ant_canvas_count (&scene->canvas, ant_canvas_code (colour));
}

static void
every_dip_is_within_the_floor_chart_and_found_where_it_stands (void)
{
  AntView view;
  AntTheme theme;
  ant_theme_init (&theme, ANT_THEME_LIGHT);
  ant_floor_chart_view (&floor_chart, &view);
  for (size_t d = 0; d < G_N_ELEMENTS (dips); d++)
    {
      double hours = dips[d].duration_d * 24, ppm = fabs (dips[d].depth_ppm);
      g_assert_true (hours > view.from && hours < view.to && ppm > view.low && ppm < view.high);
      size_t hits = 0;
      for (int x = 0; x < WIDTH; x += 2)
        for (int y = 0; y < HEIGHT; y += 2)
          hits += ant_floor_chart_dip_at (&box, &floor_chart, &view, &theme, x, y) == d;
      g_assert_cmpuint (hits, >, 20);
    }
  g_assert_cmpuint (ant_floor_chart_dip_at (&box, &floor_chart, &view, &theme, -500, -500), ==, ANT_NO_DIP);
}

static void
the_floor_chart_shows_floor_and_dips_and_selection (void)
{
  Scene scene;
  AntView view;
  scene_open (&scene);
  ant_floor_chart_view (&floor_chart, &view);
  ant_floor_chart_paint (scene.canvas.cr, &box, &floor_chart, &view, &scene.theme, 1);
  g_assert_cmpint (seen (&scene, scene.theme.role[ANT_ROLE_FLOOR]), >, 1000);
  g_assert_cmpint (seen (&scene, scene.theme.look[ANT_LOOK_PLANET]), >, 40);
  g_assert_cmpint (seen (&scene, scene.theme.look[ANT_LOOK_FLARE]), >, 20);
  g_assert_cmpint (seen (&scene, scene.theme.role[ANT_ROLE_SELECTION]), >, 5);
  AntFloorChart none = floor_chart;
  none.selected = ANT_NO_DIP;
  ant_floor_chart_paint (scene.canvas.cr, &box, &none, &view, &scene.theme, 1);
  g_assert_cmpint (seen (&scene, scene.theme.role[ANT_ROLE_SELECTION]), ==, 0);
  ant_canvas_clear (&scene.canvas);
}

static void
empty_charts_are_drawn_too (void)
{
  Scene scene;
  AntView view;
  scene_open (&scene);
  AntFloorChart floor = { .selected = ANT_NO_DIP };
  ant_floor_chart_view (&floor, &view);
  ant_floor_chart_paint (scene.canvas.cr, &box, &floor, &view, &scene.theme, 1);
  AntSpectrumChart spectrum = { 0 };
  ant_spectrum_chart_view (&spectrum, &view);
  ant_spectrum_chart_paint (scene.canvas.cr, &box, &spectrum, &view, &scene.theme, 1);
  AntTailChart tail = { 0 };
  ant_tail_chart_view (&tail, &view);
  ant_tail_chart_paint (scene.canvas.cr, &box, &tail, &view, &scene.theme, 1);
  AntDipCloseup closeup = { .contact_h = { NAN, NAN } };
  ant_dip_closeup_view (&closeup, &view);
  ant_dip_closeup_paint (scene.canvas.cr, &box, &closeup, &view, &scene.theme, 1);
  g_assert_cmpint (cairo_status (scene.canvas.cr), ==, CAIRO_STATUS_SUCCESS);
  g_assert_cmpint (seen (&scene, scene.theme.role[ANT_ROLE_PAPER]), >, WIDTH * HEIGHT / 2);
  ant_canvas_clear (&scene.canvas);
}

static void
the_spectrum_shows_points_fit_and_each_component (void)
{
  Scene scene;
  AntView view;
  AntNoiseModel model;
  double frequency[60], power[60];
  scene_open (&scene);
  ant_noise_model_default (&model, 60 / 86400.0, 300, 25, FALSE, 0, NULL);
  double white = ant_noise_white_psd (625, 60 / 86400.0);
  for (int i = 0; i < 60; i++)
    {
      frequency[i] = 0.03 * pow (1.18, i);
      power[i] = 3 * (white + ant_noise_model_psd (&model, frequency[i])); /* clear of the fit */
    }
  AntSpectrumChart chart = { 60, frequency, power, NULL, &model, white };
  ant_spectrum_chart_view (&chart, &view);
  for (int i = 0; i < 60; i++)
    g_assert_true (frequency[i] > view.from && frequency[i] < view.to && power[i] > view.low && power[i] < view.high);
  ant_spectrum_chart_paint (scene.canvas.cr, &box, &chart, &view, &scene.theme, 1);
  g_assert_cmpint (seen (&scene, scene.theme.role[ANT_ROLE_SERIES]), >, 60);
  g_assert_cmpint (seen (&scene, scene.theme.role[ANT_ROLE_CURVE]), >, 20);
  for (size_t p = 0; p < model.n_parts; p++)
    {
      AntNoiseModel without = model;
      without.part[p].rms_ppm = 1e-9;
      AntSpectrumChart other = chart;
      other.model = &without;
      g_autofree char *with = ant_canvas_digest (&scene.canvas);
      ant_spectrum_chart_paint (scene.canvas.cr, &box, &other, &view, &scene.theme, 1);
      g_autofree char *changed = ant_canvas_digest (&scene.canvas);
      g_assert_cmpstr (with, !=, changed);
      ant_spectrum_chart_paint (scene.canvas.cr, &box, &chart, &view, &scene.theme, 1);
    }
  ant_canvas_clear (&scene.canvas);
}

static void
a_tail_steps_at_each_snr (void)
{
  Scene scene;
  AntView view;
  double snr[] = { 40, 8, 12 }, mirror[] = { 4.2, 4.9 }, grid[] = { 4, 5, 6 }, expected[] = { 2, 0.1, 0.003 };
  AntTailChart chart = { 3, 2, snr, mirror, 3, grid, expected, 5.1 };
  scene_open (&scene);
  ant_tail_chart_view (&chart, &view);
  for (int i = 0; i < 3; i++)
    g_assert_true (snr[i] > view.from && snr[i] < view.to);
  ant_tail_chart_paint (scene.canvas.cr, &box, &chart, &view, &scene.theme, 1);
  g_assert_cmpint (seen (&scene, scene.theme.role[ANT_ROLE_CURVE]), >, 100);
  g_assert_cmpint (seen (&scene, scene.theme.role[ANT_ROLE_TRACE]), >, 50);
  g_assert_cmpfloat (snr[0], ==, 40); /* the lists are left in their order */
  ant_canvas_clear (&scene.canvas);
}

static void
closeup_points_average_every_sample_once (void)
{
  enum { n = 1000, most = 60 };
  float value[n];
  AntRandom random;
  ant_random_seed (&random, 12, 1);
  for (int i = 0; i < n; i++)
    value[i] = i % 11 == 0 ? NAN : (float) (5 + ant_random_normal (&random));
  double hours[most], ppm[most], error[most], step_d = 1 / 1440.0;
  size_t count = ant_dip_closeup_points (n, value, 2, step_d, 2.3, 0.2, NAN, most, hours, ppm, error);
  g_assert_cmpuint (count, >, most / 2);
  g_assert_cmpuint (count, <=, most);
  double sum = 0, seen_places = 0, mean = 0;
  for (int i = 144; i <= 720; i++) /* 2.1 to 2.5 d */
    if (!isnan (value[i]))
      {
        sum += (double) value[i];
        seen_places++;
      }
  for (size_t k = 0; k < count; k++)
    {
      mean += ppm[k] / (double) count;
      g_assert_true (fabs (hours[k]) <= 4.8 && error[k] > 0);
      if (k > 0)
        g_assert_cmpfloat (hours[k], >, hours[k - 1]);
    }
  g_assert_cmpfloat_with_epsilon (mean, sum / seen_places, 0.1);
}

static void
closeup_points_are_single_samples_where_there_is_room (void)
{
  float value[] = { 1, 2, NAN, 4, 5 };
  double hours[10], ppm[10], error[10];
  size_t count = ant_dip_closeup_points (5, value, 0, 1 / 24.0, 2 / 24.0, 1, 7, 10, hours, ppm, error);
  g_assert_cmpuint (count, ==, 4);
  g_assert_cmpfloat (ppm[2], ==, 4);
  g_assert_cmpfloat_with_epsilon (hours[2], 1, 1e-9);
  g_assert_cmpfloat (error[2], ==, 7);
  g_assert_cmpuint (ant_dip_closeup_points (5, value, 0, 1 / 24.0, 99, 1, 7, 10, hours, ppm, error), ==, 0);
}

static void
the_closeup_shows_the_shape_lower_in_the_dip (void)
{
  Scene scene;
  AntView view;
  double hours[] = { -4, -3, -2, -1, 0, 1, 2, 3, 4 }, ppm[] = { 0, 2, -1, -98, -101, -99, 1, 0, -2 };
  double shape_h[] = { -4, -1.5, -1.5, 1.5, 1.5, 4 }, shape[] = { 0, 0, -100, -100, 0, 0 };
  AntShapeLine line = { NULL, 6, shape_h, shape };
  AntDipCloseup closeup = { 9, hours, ppm, NULL, 1, &line, { -1.5, 1.5 } };
  scene_open (&scene);
  ant_dip_closeup_view (&closeup, &view);
  ant_dip_closeup_paint (scene.canvas.cr, &box, &closeup, &view, &scene.theme, 1);
  guint32 curve = ant_canvas_code (scene.theme.role[ANT_ROLE_CURVE]);
  int left = WIDTH / 5 + 20, middle = (62 + WIDTH - 17) / 2 + 12;
  g_assert_cmpint (ant_canvas_lowest (&scene.canvas, left, HEIGHT / 2 + 60, curve), >, 0);
  g_assert_cmpint (ant_canvas_lowest (&scene.canvas, middle, HEIGHT / 2 + 60, curve), >,
                   ant_canvas_lowest (&scene.canvas, left, HEIGHT / 2 + 60, curve) + 80);
  ant_canvas_clear (&scene.canvas);
}

/* Fitted shape, witness with that shape over it, one rival: each below the other, in a picture high enough. */
static void
the_closeup_has_a_panel_for_the_witness (void)
{
  Scene scene;
  AntView view;
  double hours[] = { -4, -3, -2, -1, 0, 1, 2, 3, 4 }, ppm[] = { 0, 2, -1, -98, -101, -99, 1, 0, -2 };
  double shape_h[] = { -4, -1.5, -1.5, 1.5, 1.5, 4 }, shape[] = { 0, 0, -100, -100, 0, 0 };
  AntShapeLine line[2] = { { "fitted", 6, shape_h, shape }, { "rival", 6, shape_h, shape } };
  struct AntDipCloseupWitness witness = { 9, hours, ppm, NULL };
  AntDipCloseup closeup = { 9, hours, ppm, NULL, 2, line, { -1.5, 1.5 } };
  int lines[2];
  for (int with = 0; with < 2; with++)
    {
      scene_open (&scene);
      closeup.witness = with ? &witness : NULL;
      ant_dip_closeup_view (&closeup, &view);
      ant_dip_closeup_paint (scene.canvas.cr, &box, &closeup, &view, &scene.theme, 1);
      lines[with] = seen (&scene, scene.theme.role[ANT_ROLE_CURVE]);
      ant_canvas_clear (&scene.canvas);
    }
  g_assert_cmpint (lines[0], >, 100);
  g_assert_cmpint (lines[1], >, lines[0] + 50);
}

static void
the_clock_chart_has_a_dot_for_every_bin_with_values (void)
{
  Scene scene;
  AntView view;
  AntFoldBin bin[8];
  for (int b = 0; b < 8; b++)
    bin[b] = (AntFoldBin) { (b + 0.5) / 8, b == 5 ? NAN : b < 4 ? 80 : -80, 4, b == 5 ? 0 : 100 };
  AntClockChart chart = { "Residual, ppm", ANT_FOLD_ORBIT, 8, bin };
  scene_open (&scene);
  ant_clock_chart_view (&chart, &view);
  g_assert_cmpfloat (view.from, ==, 0);
  g_assert_cmpfloat_with_epsilon (view.to, 1, 1e-9);
  g_assert_cmpfloat (view.low, <, -84);
  g_assert_cmpfloat (view.high, >, 84);
  ant_clock_chart_paint (scene.canvas.cr, &box, &chart, &view, &scene.theme, 1);
  guint32 dot = ant_canvas_code (scene.theme.role[ANT_ROLE_TRACE]);
  int runs = 0, inside = 0;
  for (int x = 0; x < WIDTH; x++)
    {
      int seen = ant_canvas_count_in_column (&scene.canvas, x, dot) > 0;
      runs += seen && !inside;
      inside = seen;
    }
  g_assert_cmpint (runs, ==, 7);
  ant_canvas_clear (&scene.canvas);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/charts/every-dip-is-within-the-floor-chart-and-found-where-it-stands",
                   every_dip_is_within_the_floor_chart_and_found_where_it_stands);
  g_test_add_func ("/plot/charts/the-floor-chart-shows-floor-and-dips-and-selection",
                   the_floor_chart_shows_floor_and_dips_and_selection);
  g_test_add_func ("/plot/charts/empty-charts-are-drawn-too", empty_charts_are_drawn_too);
  g_test_add_func ("/plot/charts/the-spectrum-shows-points-fit-and-each-component",
                   the_spectrum_shows_points_fit_and_each_component);
  g_test_add_func ("/plot/charts/the-clock-chart-has-a-dot-for-every-bin-with-values",
                   the_clock_chart_has_a_dot_for_every_bin_with_values);
  g_test_add_func ("/plot/charts/a-tail-steps-at-each-snr", a_tail_steps_at_each_snr);
  g_test_add_func ("/plot/charts/closeup-points-average-every-sample-once", closeup_points_average_every_sample_once);
  g_test_add_func ("/plot/charts/closeup-points-are-single-samples-where-there-is-room",
                   closeup_points_are_single_samples_where_there_is_room);
  g_test_add_func ("/plot/charts/the-closeup-shows-the-shape-lower-in-the-dip",
                   the_closeup_shows_the_shape_lower_in_the_dip);
  g_test_add_func ("/plot/charts/the-closeup-has-a-panel-for-the-witness", the_closeup_has_a_panel_for_the_witness);
  return g_test_run ();
}
