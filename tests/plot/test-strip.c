/* test-strip.c - a strip shows what the series holds, at any density of samples: dips, gaps, averages, brackets, lines.
 */
#include "plot/strip.h"
#include <glib.h>
#include <math.h>
#include "canvas.h"
#include "core/random.h"

#define WIDTH 700
#define HEIGHT 160
#define STEP_D (60 / 86400.0)

static const AntBox box = { 0, 0, WIDTH, HEIGHT };

typedef struct
{
  float *value;
  AntPyramid *pyramid;
  AntAverages *averages;
  AntStrip strip;
  AntTheme theme;
  AntCanvas canvas;
  AntBox area;
  guint32 series, gap;
} Scene;

static void
scene_open (Scene *scene, size_t n)
{
  scene->value = g_new0 (float, n);
  scene->averages = NULL;
  scene->strip = (AntStrip) ANT_STRIP_INIT;
  scene->strip.step_d = STEP_D;
  ant_theme_init (&scene->theme, ANT_THEME_LIGHT);
  scene->canvas = ant_canvas_new (WIDTH, HEIGHT);
  scene->area = ant_strip_area (&box, &scene->theme, FALSE);
  scene->series = ant_canvas_code (scene->theme.role[ANT_ROLE_SERIES]);
  scene->gap = ant_canvas_code (scene->theme.role[ANT_ROLE_GAP]);
}

static void
scene_paint (Scene *scene, size_t n, const AntView *view)
{
  scene->pyramid = ant_pyramid_new (n, scene->value);
  scene->strip.pyramid = scene->pyramid;
  ant_strip_paint (scene->canvas.cr, &box, &scene->strip, view, &scene->theme, 1);
  ant_pyramid_free (scene->pyramid);
}

static void
scene_close (Scene *scene)
{
  g_free (scene->value);
  ant_averages_free (scene->averages);
  ant_canvas_clear (&scene->canvas);
}

static AntView
view_of_places (double from, double to)
{
  return (AntView) { from * STEP_D, to * STEP_D, -10, 5, FALSE, FALSE };
}

static void
a_dip_of_one_sample_darkens_one_column (void)
{
  static const size_t lengths[] = { 650, 1300, 2600, 10000, 100000, 1000000 };
  for (size_t k = 0; k < G_N_ELEMENTS (lengths); k++)
    for (double part = 0.013; part < 1; part += 0.19)
      {
        Scene scene;
        size_t n = lengths[k], at = (size_t) (part * (double) n);
        scene_open (&scene, n);
        scene.value[at] = -9;
        AntView view = view_of_places (-0.5, (double) n - 0.5);
        scene_paint (&scene, n, &view);
        int y = (int) ant_view_y (&view, &scene.area, -8.5), columns = 0, where = -1;
        for (int x = 0; x < WIDTH; x++)
          if (ant_canvas_pixel (&scene.canvas, x, y) == scene.series)
            {
              columns++;
              where = x;
            }
        g_assert_cmpint (columns, ==, 1);
        double middle = ant_view_x (&view, &scene.area, (double) at * STEP_D);
        g_assert_cmpfloat (fabs (where + 0.5 - middle), <=, 1.01);
        scene_close (&scene);
      }
}

static void
a_long_dip_is_lower_than_its_surroundings (void)
{
  static const double places_in_view[] = { 40, 350, 700, 1400, 2800, 20000 };
  for (size_t k = 0; k < G_N_ELEMENTS (places_in_view); k++)
    {
      Scene scene;
      size_t n = 20000;
      double seen = places_in_view[k];
      scene_open (&scene, n);
      for (size_t i = 0; i < n; i++)
        if (fabs ((double) i - 10000) < seen / 8)
          scene.value[i] = -6;
      AntView view = view_of_places (10000 - seen / 2, 10000 + seen / 2);
      scene_paint (&scene, n, &view);
      int middle = (int) (scene.area.x + scene.area.width / 2), side = (int) (scene.area.x + scene.area.width / 5);
      int foot = (int) (scene.area.y + scene.area.height);
      int low = ant_canvas_lowest (&scene.canvas, middle, foot, scene.series);
      int high = ant_canvas_lowest (&scene.canvas, side, foot, scene.series);
      g_assert_cmpint (high, >, 0);
      g_assert_cmpint (low, >, high + 20);
      scene_close (&scene);
    }
}

static void
a_gap_is_shaded_and_empty (void)
{
  static const double places_in_view[] = { 60, 700, 3000, 30000 };
  for (size_t k = 0; k < G_N_ELEMENTS (places_in_view); k++)
    {
      Scene scene;
      size_t n = 30000;
      double seen = places_in_view[k];
      scene_open (&scene, n);
      for (size_t i = 0; i < n; i++)
        if (fabs ((double) i - 15000) < seen / 10)
          scene.value[i] = NAN;
      AntView view = view_of_places (15000 - seen / 2, 15000 + seen / 2);
      scene_paint (&scene, n, &view);
      int middle = (int) (scene.area.x + scene.area.width / 2), side = (int) (scene.area.x + scene.area.width / 8);
      g_assert_cmpint (ant_canvas_count_in_column (&scene.canvas, middle, scene.gap), >=, (int) scene.area.height - 2);
      g_assert_cmpint (ant_canvas_count_in_column (&scene.canvas, side, scene.gap), ==, 0);
      int foot = (int) (scene.area.y + scene.area.height);
      g_assert_cmpint (ant_canvas_lowest (&scene.canvas, side, foot, scene.series), >, 0);
      scene_close (&scene);
    }
}

static void
single_missing_samples_are_not_shaded (void)
{
  static const double places_in_view[] = { 30, 650, 1300 };
  for (size_t k = 0; k < G_N_ELEMENTS (places_in_view); k++)
    {
      Scene scene;
      size_t n = 2000;
      scene_open (&scene, n);
      for (size_t i = 0; i < n; i += 7)
        scene.value[i] = NAN;
      AntView view = view_of_places (300, 300 + places_in_view[k]);
      scene_paint (&scene, n, &view);
      g_assert_cmpint (ant_canvas_count (&scene.canvas, scene.gap), ==, 0);
      scene_close (&scene);
    }
}

static void
beyond_the_record_is_paper (void)
{
  Scene scene;
  scene_open (&scene, 1000);
  AntView view = view_of_places (-1000, 2000);
  scene_paint (&scene, 1000, &view);
  for (int x = (int) scene.area.x; x < scene.area.x + scene.area.width / 3 - 2; x++)
    g_assert_cmpint (ant_canvas_count_in_column (&scene.canvas, x, scene.series)
                     + ant_canvas_count_in_column (&scene.canvas, x, scene.gap), ==, 0);
  scene_close (&scene);
}

static void
neighbouring_columns_are_joined (void)
{
  Scene scene;
  size_t n = 1300;
  scene_open (&scene, n);
  for (size_t i = 0; i < n; i++)
    scene.value[i] = (float) (4 - 13.0 * (double) i / (double) n); /* steep for its density: many pixels a column */
  for (size_t i = 600; i < n; i++)
    scene.value[i] -= 0.05f;
  AntView view = view_of_places (0, 1299);
  scene_paint (&scene, n, &view);
  int last_low = 0, foot = (int) (scene.area.y + scene.area.height);
  for (int x = (int) scene.area.x + 2; x < scene.area.x + scene.area.width - 2; x++)
    {
      int low = ant_canvas_lowest (&scene.canvas, x, foot, scene.series);
      int count = ant_canvas_count_in_column (&scene.canvas, x, scene.series);
      g_assert_cmpint (count, >, 0);
      if (last_low > 0)
        g_assert_cmpint (low - count + 1, <=, last_low + 1);
      last_low = low;
    }
  scene_close (&scene);
}

static void
averages_show_a_dip_that_the_envelope_hides (void)
{
  Scene scene;
  AntRandom random;
  size_t n = 60000;
  scene_open (&scene, n);
  ant_random_seed (&random, 6, 1);
  for (size_t i = 0; i < n; i++)
    scene.value[i] = (float) (ant_random_normal (&random) - (fabs ((double) i - 30000) < 2000 ? 0.5 : 0));
  scene.averages = ant_averages_new (n, scene.value, 60);
  scene.strip.averages = scene.averages;
  AntView view = view_of_places (0, (double) n);
  view.low = -1.5;
  view.high = 1.5;
  scene_paint (&scene, n, &view);
  guint32 trace = ant_canvas_code (scene.theme.role[ANT_ROLE_TRACE]);
  double inside = 0, outside = 0, n_inside = 0, n_outside = 0;
  for (int x = (int) scene.area.x; x < scene.area.x + scene.area.width; x++)
    for (int y = 0; y < HEIGHT; y++)
      if (ant_canvas_pixel (&scene.canvas, x, y) == trace)
        {
          double place = ant_view_at_x (&view, &scene.area, x + 0.5) / STEP_D;
          double *sum = fabs (place - 30000) < 1800 ? &inside : &outside;
          *sum += y;
          *(sum == &inside ? &n_inside : &n_outside) += 1;
        }
  g_assert_cmpfloat (n_inside, >, 10);
  g_assert_cmpfloat (inside / n_inside, >, outside / n_outside + 5);
  scene_close (&scene);
}

static void
labels_may_be_in_another_unit (void)
{
  Scene scene;
  size_t n = 100;
  scene_open (&scene, n);
  AntView view = view_of_places (0, 99);
  scene_paint (&scene, n, &view);
  g_autofree char *plain = ant_canvas_digest (&scene.canvas);
  scene.strip.label_zero = 1361;
  scene.strip.label_per = 1361e-6;
  scene_paint (&scene, n, &view);
  g_autofree char *scaled = ant_canvas_digest (&scene.canvas);
  g_assert_cmpstr (plain, !=, scaled);
  scene_close (&scene);
}

static const AntDipMark dips[] = {
  { 200 * STEP_D, 60 * STEP_D, 500, 1, ANT_LOOK_PLANET }, { 230 * STEP_D, 60 * STEP_D, 300, 2, ANT_LOOK_SPOT },
  { 700 * STEP_D, 1 * STEP_D, 100, 3, ANT_LOOK_INSTRUMENT },
};

static void
a_bracket_spans_its_dip (void)
{
  Scene scene;
  scene_open (&scene, 1000);
  scene.strip.dip = dips;
  scene.strip.n_dips = 1;
  scene.strip.brackets = TRUE;
  AntView view = view_of_places (0, 999);
  scene_paint (&scene, 1000, &view);
  guint32 code = ant_canvas_code (scene.theme.look[ANT_LOOK_PLANET]);
  int from = (int) lround (ant_view_x (&view, &scene.area, 170 * STEP_D));
  int to = (int) lround (ant_view_x (&view, &scene.area, 230 * STEP_D)), row = (int) scene.area.y;
  for (int x = from; x < to; x++)
    g_assert_cmphex (ant_canvas_pixel (&scene.canvas, x, row), ==, code);
  g_assert_cmphex (ant_canvas_pixel (&scene.canvas, from - 1, row), !=, code);
  g_assert_cmphex (ant_canvas_pixel (&scene.canvas, to, row), !=, code);
  scene_close (&scene);
}

static void
the_dip_under_a_point_is_found (void)
{
  Scene scene;
  scene_open (&scene, 1000);
  scene.strip.dip = dips;
  scene.strip.n_dips = G_N_ELEMENTS (dips);
  AntView view = view_of_places (0, 999);
  double y = scene.area.y + 20;
  double at[] = { 185, 240, 700, 450 };
  size_t expected[] = { 0, 1, 2, ANT_NO_DIP };
  for (size_t k = 0; k < G_N_ELEMENTS (at); k++)
    {
      double x = ant_view_x (&view, &scene.area, at[k] * STEP_D);
      g_assert_cmpuint (ant_strip_dip_at (&box, &scene.strip, &view, &scene.theme, x, y), ==, expected[k]);
    }
  double x = ant_view_x (&view, &scene.area, 200 * STEP_D);
  g_assert_cmpuint (ant_strip_dip_at (&box, &scene.strip, &view, &scene.theme, x, HEIGHT + 1), ==, ANT_NO_DIP);
  scene_close (&scene);
}

static void
a_level_is_drawn_dashed_where_it_belongs (void)
{
  Scene scene;
  scene_open (&scene, 1000);
  scene.strip.line = -5;
  AntView view = view_of_places (0, 999);
  scene_paint (&scene, 1000, &view);
  guint32 code = ant_canvas_code (scene.theme.role[ANT_ROLE_THRESHOLD]);
  int row = (int) lround (ant_view_y (&view, &scene.area, -5)), found = 0;
  for (int x = (int) scene.area.x; x < scene.area.x + scene.area.width; x++)
    found += ant_canvas_pixel (&scene.canvas, x, row) == code;
  g_assert_cmpint (found, >, (int) (0.4 * scene.area.width));
  g_assert_cmpint (found, <, (int) (0.9 * scene.area.width));
  scene_close (&scene);
}

static void
painting_twice_gives_the_same_picture (void)
{
  Scene scene;
  size_t n = 5000;
  scene_open (&scene, n);
  scene.averages = ant_averages_new (n, scene.value, 20);
  scene.strip.averages = scene.averages;
  scene.strip.curve = scene.value;
  scene.strip.dip = dips;
  scene.strip.n_dips = 3;
  scene.strip.brackets = scene.strip.time_axis = TRUE;
  AntView view = view_of_places (0, 4999);
  scene_paint (&scene, n, &view);
  g_autofree char *first = ant_canvas_digest (&scene.canvas);
  scene_paint (&scene, n, &view);
  g_autofree char *second = ant_canvas_digest (&scene.canvas);
  g_assert_cmpstr (first, ==, second);
  scene_close (&scene);
}

static void
odd_boxes_and_empty_series_are_drawn_too (void)
{
  static const AntBox boxes[] = { { 0, 0, 1, 1 }, { 0, 0, 60, 30 }, { 5, 7, 90, 12 }, { 0, 0, WIDTH, HEIGHT } };
  static const double ends[][2] = { { 0, 1000 }, { 500, 500.0001 }, { -1e7, 1e7 }, { 1e6, 1e6 + 1 } };
  Scene scene;
  scene_open (&scene, 1000);
  scene.averages = ant_averages_new (1000, scene.value, 10);
  for (size_t n = 0; n <= 1000; n += 500)
    {
      AntPyramid *pyramid = ant_pyramid_new (n, scene.value);
      scene.strip.pyramid = pyramid;
      scene.strip.averages = n == 1000 ? scene.averages : NULL;
      scene.strip.curve = scene.value;
      scene.strip.time_axis = TRUE;
      for (size_t b = 0; b < G_N_ELEMENTS (boxes); b++)
        for (size_t e = 0; e < G_N_ELEMENTS (ends); e++)
          {
            AntView view = view_of_places (ends[e][0], ends[e][1]);
            ant_strip_paint (scene.canvas.cr, &boxes[b], &scene.strip, &view, &scene.theme, 1 + (double) b / 2);
          }
      ant_pyramid_free (pyramid);
    }
  g_assert_cmpint (cairo_status (scene.canvas.cr), ==, CAIRO_STATUS_SUCCESS);
  scene_close (&scene);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/strip/a-dip-of-one-sample-darkens-one-column", a_dip_of_one_sample_darkens_one_column);
  g_test_add_func ("/plot/strip/a-long-dip-is-lower-than-its-surroundings", a_long_dip_is_lower_than_its_surroundings);
  g_test_add_func ("/plot/strip/a-gap-is-shaded-and-empty", a_gap_is_shaded_and_empty);
  g_test_add_func ("/plot/strip/single-missing-samples-are-not-shaded", single_missing_samples_are_not_shaded);
  g_test_add_func ("/plot/strip/beyond-the-record-is-paper", beyond_the_record_is_paper);
  g_test_add_func ("/plot/strip/neighbouring-columns-are-joined", neighbouring_columns_are_joined);
  g_test_add_func ("/plot/strip/averages-show-a-dip-that-the-envelope-hides",
                   averages_show_a_dip_that_the_envelope_hides);
  g_test_add_func ("/plot/strip/labels-may-be-in-another-unit", labels_may_be_in_another_unit);
  g_test_add_func ("/plot/strip/a-bracket-spans-its-dip", a_bracket_spans_its_dip);
  g_test_add_func ("/plot/strip/the-dip-under-a-point-is-found", the_dip_under_a_point_is_found);
  g_test_add_func ("/plot/strip/a-level-is-drawn-dashed-where-it-belongs", a_level_is_drawn_dashed_where_it_belongs);
  g_test_add_func ("/plot/strip/painting-twice-gives-the-same-picture", painting_twice_gives_the_same_picture);
  g_test_add_func ("/plot/strip/odd-boxes-and-empty-series-are-drawn-too", odd_boxes_and_empty_series_are_drawn_too);
  return g_test_run ();
}
