/* test-ribbon.c - the band stands for the whole record, and its box for the view. */
#include "plot/ribbon.h"
#include <glib.h>
#include <math.h>
#include "canvas.h"

#define N 10000

static const AntBox box = { 0, 0, 600, 28 };

typedef struct
{
  float *value;
  AntPyramid *pyramid;
  AntRibbon ribbon; /* days 100 to 200 */
  AntTheme theme;
} Scene;

static void
scene_open (Scene *scene)
{
  scene->value = g_new0 (float, N);
  scene->value[5000] = -50;
  scene->pyramid = ant_pyramid_new (N, scene->value);
  scene->ribbon = (AntRibbon) { scene->pyramid, 100, 0.01, 0, NULL, ANT_NO_DIP };
  ant_theme_init (&scene->theme, ANT_THEME_LIGHT);
}

static void
scene_close (Scene *scene)
{
  ant_pyramid_free (scene->pyramid);
  g_free (scene->value);
}

static void
its_ends_are_those_of_the_record (void)
{
  Scene scene;
  scene_open (&scene);
  AntBox area = ant_ribbon_area (&box, &scene.theme);
  g_assert_cmpfloat_with_epsilon (ant_ribbon_time_at (&box, &scene.ribbon, &scene.theme, area.x), 100, 0.01);
  g_assert_cmpfloat_with_epsilon (ant_ribbon_time_at (&box, &scene.ribbon, &scene.theme, area.x + area.width), 200,
                                  0.01);
  g_assert_cmpfloat_with_epsilon (ant_ribbon_time_at (&box, &scene.ribbon, &scene.theme, 1e6), 200, 0.01);
  scene_close (&scene);
}

static void
parts_of_the_box_are_told_apart (void)
{
  Scene scene;
  scene_open (&scene);
  AntBox area = ant_ribbon_area (&box, &scene.theme);
  AntView view = { .from = 120, .to = 150 };
  static const struct { double part; AntRibbonPart expected; } cases[] = {
    { 0.1, ANT_RIBBON_OUTSIDE }, { 0.2, ANT_RIBBON_FROM_EDGE }, { 0.35, ANT_RIBBON_INSIDE },
    { 0.5, ANT_RIBBON_TO_EDGE }, { 0.9, ANT_RIBBON_OUTSIDE },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    g_assert_cmpint (ant_ribbon_part_at (&box, &scene.ribbon, &view, &scene.theme, area.x + cases[i].part * area.width),
                     ==, cases[i].expected);
  scene_close (&scene);
}

static void
a_tiny_view_can_still_be_moved (void)
{
  Scene scene;
  scene_open (&scene);
  AntBox area = ant_ribbon_area (&box, &scene.theme);
  AntView view = { .from = 150, .to = 150.001 };
  g_assert_cmpint (ant_ribbon_part_at (&box, &scene.ribbon, &view, &scene.theme, area.x + 0.5 * area.width), ==,
                   ANT_RIBBON_INSIDE);
  scene_close (&scene);
}

static void
it_shows_the_dip_and_the_box (void)
{
  Scene scene;
  scene_open (&scene);
  AntCanvas canvas = ant_canvas_new (600, 28);
  AntView view = { .from = 130, .to = 170 };
  ant_ribbon_paint (canvas.cr, &box, &scene.ribbon, &view, &scene.theme, 1);
  AntBox area = ant_ribbon_area (&box, &scene.theme);
  guint32 ink = ant_canvas_code (scene.theme.role[ANT_ROLE_QUIET]),
          edge = ant_canvas_code (scene.theme.role[ANT_ROLE_SELECTION]);
  int middle = (int) (area.x + area.width / 2), deep = 0;
  for (int x = middle - 2; x <= middle + 2; x++)
    deep = MAX (deep, ant_canvas_count_in_column (&canvas, x, ink));
  g_assert_cmpint (deep, >, 10);
  g_assert_cmpint (ant_canvas_count_in_column (&canvas, (int) lround (area.x + 0.3 * area.width), edge), >, 10);
  ant_canvas_clear (&canvas);
  scene_close (&scene);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/ribbon/its-ends-are-those-of-the-record", its_ends_are_those_of_the_record);
  g_test_add_func ("/plot/ribbon/parts-of-the-box-are-told-apart", parts_of_the_box_are_told_apart);
  g_test_add_func ("/plot/ribbon/a-tiny-view-can-still-be-moved", a_tiny_view_can_still_be_moved);
  g_test_add_func ("/plot/ribbon/it-shows-the-dip-and-the-box", it_shows_the_dip_and_the_box);
  return g_test_run ();
}
