/* test-theme.c - what carries meaning stands out from the paper in every theme, and no two kinds of dip share a shape.
 */
#include "plot/theme.h"
#include <glib.h>
#include "canvas.h"
#include "plot/pen.h"

static void
assert_contrast (const AntTheme *theme, AntColour colour, double least)
{
  g_assert_cmpfloat (ant_colour_contrast (colour, theme->role[ANT_ROLE_PAPER]), >=, least);
}

static void
contrast_is_as_defined (void)
{
  AntColour black = { 0, 0, 0, 1 }, white = { 1, 1, 1, 1 }, blue = { 0, 0x72 / 255.0, 0xb2 / 255.0, 1 };
  g_assert_cmpfloat_with_epsilon (ant_colour_contrast (black, white), 21, 1e-9);
  g_assert_cmpfloat_with_epsilon (ant_colour_contrast (blue, white), 5.19, 0.01); /* worked by hand from WCAG 2.1 */
}

static void
text_is_readable (void)
{
  for (int kind = 0; kind < ANT_N_THEMES; kind++)
    {
      AntTheme theme;
      ant_theme_init (&theme, (AntThemeKind) kind);
      double least = kind >= ANT_THEME_CONTRAST ? 7 : 4.5;
      assert_contrast (&theme, theme.role[ANT_ROLE_TEXT], least);
      assert_contrast (&theme, theme.role[ANT_ROLE_QUIET], least);
    }
}

static void
marks_stand_out (void)
{
  static const AntRole roles[] = { ANT_ROLE_SERIES, ANT_ROLE_TRACE, ANT_ROLE_CURVE, ANT_ROLE_SHAPE, ANT_ROLE_THRESHOLD,
                                   ANT_ROLE_SELECTION };
  for (int kind = 0; kind < ANT_N_THEMES; kind++)
    {
      AntTheme theme;
      ant_theme_init (&theme, (AntThemeKind) kind);
      double least = kind >= ANT_THEME_CONTRAST ? 4.5 : 3;
      for (gsize r = 0; r < G_N_ELEMENTS (roles); r++)
        assert_contrast (&theme, theme.role[roles[r]], least);
      for (int look = 0; look < ANT_N_LOOKS; look++)
        assert_contrast (&theme, theme.look[look], least);
      for (int c = 0; c < ANT_N_COMPONENT_COLOURS; c++)
        assert_contrast (&theme, theme.component[c], least);
    }
}

static void
no_two_kinds_of_dip_share_a_shape (void)
{
  char *digest[ANT_N_LOOKS];
  AntTheme theme;
  ant_theme_init (&theme, ANT_THEME_LIGHT);
  for (int look = 0; look < ANT_N_LOOKS; look++)
    {
      AntCanvas canvas = ant_canvas_new (24, 24);
      AntPen pen;
      theme.look[look] = (AntColour) { 1, 1, 1, 1 };
      ant_pen_begin (&pen, canvas.cr, &theme, 1);
      ant_pen_dip (&pen, (AntDipLook) look, 12, 12, 6, FALSE);
      ant_pen_end (&pen);
      digest[look] = ant_canvas_digest (&canvas);
      ant_canvas_clear (&canvas);
      for (int other = 0; other < look; other++)
        g_assert_cmpstr (digest[look], !=, digest[other]);
    }
  for (int look = 0; look < ANT_N_LOOKS; look++)
    g_free (digest[look]);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/theme/contrast-is-as-defined", contrast_is_as_defined);
  g_test_add_func ("/plot/theme/text-is-readable", text_is_readable);
  g_test_add_func ("/plot/theme/marks-stand-out", marks_stand_out);
  g_test_add_func ("/plot/theme/no-two-kinds-of-dip-share-a-shape", no_two_kinds_of_dip_share_a_shape);
  return g_test_run ();
}
