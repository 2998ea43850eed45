/* test-sun-disc.c - the way of a body stands where it should on the drawn Sun. */
#include "canvas.h"
#include "plot/sun-disc.h"

#include <math.h>

#define SIZE 200
#define POINTS 3

/* A way from east to west at a height above the middle, in solar radii. */
typedef struct
{
  double east[POINTS], north[POINTS];
  AntSunDisc disc;
  AntTheme theme;
  AntCanvas canvas;
} Fixture;

static void
set_up (Fixture *f, gconstpointer unused)
{
  for (int i = 0; i < POINTS; i++)
    {
      f->east[i] = 1 - i;
      f->north[i] = 0.5;
    }
  f->disc = (AntSunDisc){ .n = POINTS, .east = f->east, .north = f->north, .radius_ratio = 0.01, .mark = { NAN, NAN, NAN, NAN, NAN } };
  ant_theme_init (&f->theme, ANT_THEME_LIGHT);
  f->theme.font_px = 10;
  f->theme.trace_px = 4; /* so that its middle is not blended */
  f->canvas = ant_canvas_new (SIZE, SIZE);
}

static void
tear_down (Fixture *f, gconstpointer unused)
{
  ant_canvas_clear (&f->canvas);
}

static void
paint (Fixture *f)
{
  AntBox box = { 0, 0, SIZE, SIZE };
  ant_sun_disc_paint (f->canvas.cr, &box, &f->disc, &f->theme, 1);
}

/* Rows of a column that hold the way's colour. */
static void
way_in_column (const Fixture *f, int x, int *top, int *bottom)
{
  guint32 code = ant_canvas_code (f->theme.role[ANT_ROLE_CURVE]);
  *top = *bottom = -1;
  for (int y = 0; y < SIZE; y++)
    if (ant_canvas_pixel (&f->canvas, x, y) == code)
      {
        *top = *top < 0 ? y : *top;
        *bottom = y;
      }
}

static void
north_is_up (Fixture *f, gconstpointer unused)
{
  int top, bottom;
  paint (f);
  way_in_column (f, SIZE / 2, &top, &bottom);
  g_assert_cmpint (top, >, 0);
  g_assert_cmpint (bottom, <, SIZE / 2 - 20);
  g_assert_cmpint (bottom - top, <, 6); /* one line, and nothing else in its colour */
}

/* A way that is slanted: its eastern half is at the left. */
static void
east_is_left (Fixture *f, gconstpointer unused)
{
  int left_top, right_top, bottom;
  f->north[0] = 0.6;
  f->north[2] = -0.6;
  f->north[1] = 0;
  paint (f);
  way_in_column (f, SIZE / 2 - 40, &left_top, &bottom);
  way_in_column (f, SIZE / 2 + 40, &right_top, &bottom);
  g_assert_cmpint (left_top, <, SIZE / 2);
  g_assert_cmpint (right_top, >, SIZE / 2);
}

static void
contacts_that_do_not_occur_are_not_drawn (Fixture *f, gconstpointer unused)
{
  paint (f);
  g_autofree char *bare = ant_canvas_digest (&f->canvas);
  f->disc.mark[0] = 0;
  paint (f);
  g_autofree char *marked = ant_canvas_digest (&f->canvas);
  g_assert_cmpstr (bare, !=, marked);
  f->disc.mark[0] = NAN;
  paint (f);
  g_autofree char *again = ant_canvas_digest (&f->canvas);
  g_assert_cmpstr (bare, ==, again);
}

/* The greatest phase is a filled disc of the body's size: its area by counting. */
static void
the_body_is_drawn_to_scale (Fixture *f, gconstpointer unused)
{
  f->disc.radius_ratio = 0.2;
  f->disc.mark[4] = 0.5;
  paint (f);
  double inked = ant_canvas_count (&f->canvas, ant_canvas_code (f->theme.role[ANT_ROLE_TEXT]));
  /* Both bodies at the ends stick out by 0.2: 2.4 radii across, less the margin of 1.8 lines on either side. */
  double radius = 0.2 * (SIZE - 2 * 1.8 * 10) / 2.4, area = 3.14159265 * radius * radius;
  g_assert_cmpfloat_with_epsilon (inked, area, 0.12 * area); /* the rim is blended */
}

static void
a_body_as_large_as_the_sun_stays_in_the_box (Fixture *f, gconstpointer unused)
{
  f->disc.radius_ratio = 1.03;
  f->disc.mark[0] = 0;
  f->disc.mark[3] = 1;
  paint (f);
  guint32 paper = ant_canvas_code (f->theme.role[ANT_ROLE_PAPER]);
  for (int i = 0; i < SIZE; i++)
    {
      g_assert_cmphex (ant_canvas_pixel (&f->canvas, 0, i), ==, paper);
      g_assert_cmphex (ant_canvas_pixel (&f->canvas, SIZE - 1, i), ==, paper);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(name, function) g_test_add ("/plot/sun-disc/" name, Fixture, NULL, set_up, function, tear_down)
  TEST ("north-is-up", north_is_up);
  TEST ("east-is-left", east_is_left);
  TEST ("contacts-that-do-not-occur-are-not-drawn", contacts_that_do_not_occur_are_not_drawn);
  TEST ("the-body-is-drawn-to-scale", the_body_is_drawn_to_scale);
  TEST ("a-body-as-large-as-the-sun-stays-in-the-box", a_body_as_large_as_the_sun_stays_in_the_box);
  return g_test_run ();
}
