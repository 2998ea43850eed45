/* test-labels.c - words never cover each other, a curve, or the edge. */
#include "plot/labels.h"
#include <glib.h>
#include "canvas.h"
#include "core/random.h"

static void
words_never_overlap (void)
{
  AntCanvas canvas = ant_canvas_new (300, 200);
  AntTheme theme;
  AntPen pen;
  AntRandom random;
  ant_theme_init (&theme, ANT_THEME_LIGHT);
  ant_random_seed (&random, 2, 1);
  ant_pen_begin (&pen, canvas.cr, &theme, 1);
  g_autofree AntLabelField *field = g_new (AntLabelField, 1);
  AntBox within = { 0, 0, 300, 200 };
  ant_labels_begin (field, &within);
  double x[] = { 0, 150, 300 }, y[] = { 20, 180, 20 };
  ant_labels_block_curve (field, 3, x, y);
  size_t curve = field->n;
  int placed = 0;
  for (int k = 0; k < 200; k++)
    {
      double at_x = 300 * ant_random_uniform (&random), at_y = 200 * ant_random_uniform (&random);
      AntAnchor anchor[] = { { at_x, at_y, 0, 0 }, { at_x, at_y, 1, 1 } };
      placed += ant_labels_place (field, &pen, "dip 17", ANT_TEXT_LABEL, 2, anchor);
    }
  g_assert_cmpint (placed, >, 15);
  g_assert_cmpint (placed, <, 200);
  g_assert_cmpuint (field->n, ==, curve + (size_t) placed);
  for (size_t a = curve; a < field->n; a++)
    {
      g_assert_true (ant_box_holds (&within, field->taken[a].x, field->taken[a].y));
      g_assert_true (ant_box_holds (&within, field->taken[a].x + field->taken[a].width,
                                    field->taken[a].y + field->taken[a].height));
      for (size_t b = 0; b < a; b++)
        g_assert_false (ant_boxes_meet (&field->taken[a], &field->taken[b]));
    }
  ant_pen_end (&pen);
  ant_canvas_clear (&canvas);
}

static void
the_first_free_place_is_taken (void)
{
  AntCanvas canvas = ant_canvas_new (300, 200);
  AntTheme theme;
  AntPen pen;
  ant_theme_init (&theme, ANT_THEME_LIGHT);
  ant_pen_begin (&pen, canvas.cr, &theme, 1);
  g_autofree AntLabelField *field = g_new (AntLabelField, 1);
  AntBox within = { 0, 0, 300, 200 }, wall = { 90, 0, 20, 200 };
  ant_labels_begin (field, &within);
  ant_labels_block (field, &wall);
  AntAnchor anchor[] = { { 100, 100, 0.5, 0.5 }, { 10, 100, 0, 0.5 }, { 200, 100, 0, 0.5 } };
  g_assert_true (ant_labels_place (field, &pen, "here", ANT_TEXT_LABEL, 3, anchor));
  g_assert_cmpfloat (field->taken[field->n - 1].x, ==, 10);
  g_assert_false (ant_labels_place (field, &pen, "not here", ANT_TEXT_LABEL, 2, anchor));
  ant_pen_end (&pen);
  ant_canvas_clear (&canvas);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/labels/words-never-overlap", words_never_overlap);
  g_test_add_func ("/plot/labels/the-first-free-place-is-taken", the_first_free_place_is_taken);
  return g_test_run ();
}
