/* test-figure.c - figures in three formats: whole, of the size asked for, the same twice, and honest about failure. */
#include "plot/figure.h"
#include <glib/gstdio.h>
#include <string.h>
#include "data/error.h"
#include "plot/pen.h"

static void
paint (cairo_t *cr, const AntBox *box, double scale, gpointer data)
{
  AntPen pen;
  AntTheme theme;
  ant_theme_init (&theme, ANT_THEME_LIGHT);
  ant_pen_begin (&pen, cr, &theme, scale);
  ant_pen_colour (&pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (&pen, box);
  ant_pen_colour (&pen, ANT_ROLE_TEXT);
  ant_pen_text (&pen, "Residual", ANT_TEXT_LABEL, 10, 10, 0, 0);
  ant_pen_end (&pen);
  if (data)
    *(double *) data = scale;
}

static GBytes *
figure (AntFigureFormat format, double scale)
{
  AntFigureOptions options = { format, 300, 120, scale, "A figure" };
  g_autoptr (GError) error = NULL;
  GBytes *bytes = ant_figure_bytes (&options, paint, NULL, &error);
  g_assert_no_error (error);
  return bytes;
}

static gboolean
contains (GBytes *bytes, const char *text)
{
  gsize size;
  const char *data = g_bytes_get_data (bytes, &size);
  return memmem (data, size, text, strlen (text)) != NULL;
}

static guint32
big_endian (GBytes *bytes, gsize at)
{
  const guint8 *b = g_bytes_get_data (bytes, NULL);
  return (guint32) b[at] << 24 | (guint32) b[at + 1] << 16 | (guint32) b[at + 2] << 8 | b[at + 3];
}

static void
png_has_the_pixels_asked_for (void)
{
  g_autoptr (GBytes) bytes = figure (ANT_FIGURE_PNG, 2);
  g_assert_cmpmem (g_bytes_get_data (bytes, NULL), 8, "\211PNG\r\n\032\n", 8);
  g_assert_cmpuint (big_endian (bytes, 16), ==, 600); /* IHDR: PNG specification, 11.2.2 */
  g_assert_cmpuint (big_endian (bytes, 20), ==, 240);
}

static void
svg_is_whole (void)
{
  g_autoptr (GBytes) bytes = figure (ANT_FIGURE_SVG, 1);
  g_assert_true (contains (bytes, "viewBox=\"0 0 300 120\""));
  g_assert_true (contains (bytes, "</svg>"));
}

static void
pdf_holds_its_fonts (void)
{
  g_autoptr (GBytes) bytes = figure (ANT_FIGURE_PDF, 1);
  g_assert_cmpmem (g_bytes_get_data (bytes, NULL), 5, "%PDF-", 5);
  g_assert_true (contains (bytes, "/FontFile"));
  g_assert_true (contains (bytes, "%%EOF"));
}

static void
the_same_drawing_gives_the_same_bytes (void)
{
  g_setenv ("SOURCE_DATE_EPOCH", "1700000000", TRUE);
  for (int format = ANT_FIGURE_PNG; format <= ANT_FIGURE_PDF; format++)
    {
      g_autoptr (GBytes) first = figure ((AntFigureFormat) format, 1);
      if (format == ANT_FIGURE_PDF)
        g_usleep (1100000); /* a clock would have moved on */
      g_autoptr (GBytes) second = figure ((AntFigureFormat) format, 1);
      g_assert_true (g_bytes_equal (first, second));
      if (format == ANT_FIGURE_PDF)
        g_assert_true (contains (first, "20231114221320"));
    }
  g_unsetenv ("SOURCE_DATE_EPOCH");
}

static void
paper_is_drawn_finer_than_one_unit (void)
{
  AntFigureOptions options = { ANT_FIGURE_PDF, 300, 120, 1, NULL };
  double scale = 0;
  g_autoptr (GBytes) bytes = ant_figure_bytes (&options, paint, &scale, NULL);
  g_assert_nonnull (bytes);
  g_assert_cmpfloat (scale, >, 1);
}

static void
endings_name_formats (void)
{
  AntFigureFormat format;
  g_autoptr (GError) error = NULL;
  g_assert_true (ant_figure_format_of ("a.b/dip 1.PDF", &format, NULL));
  g_assert_cmpint (format, ==, ANT_FIGURE_PDF);
  g_assert_false (ant_figure_format_of ("dip.jpg", &format, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
  g_assert_nonnull (strstr (error->message, "dip.jpg"));
}

static void
senseless_sizes_are_refused (void)
{
  static const AntFigureOptions wrong[] = {
    { ANT_FIGURE_PNG, 0, 100, 1, NULL }, { ANT_FIGURE_PNG, 100, 1e9, 1, NULL }, { ANT_FIGURE_SVG, 100, 100, 0, NULL },
    { ANT_FIGURE_PDF, 0.0 / 0.0, 100, 1, NULL },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
    {
      g_autoptr (GError) error = NULL;
      g_assert_null (ant_figure_bytes (&wrong[i], paint, NULL, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
    }
}

static void
a_place_that_cannot_be_written_is_named (void)
{
  AntFigureOptions options = { ANT_FIGURE_PNG, 100, 100, 1, NULL };
  g_autoptr (GError) error = NULL;
  g_assert_false (ant_figure_write ("no-such-folder-here/dip.png", &options, paint, NULL, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_nonnull (strstr (error->message, "no-such-folder-here/dip.png"));
}

static void
what_is_written_is_what_was_drawn (void)
{
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL);
  g_autofree char *path = g_build_filename (folder, "dip.svg", NULL);
  AntFigureOptions options = { ANT_FIGURE_SVG, 300, 120, 1, "A figure" };
  g_autoptr (GError) error = NULL;
  g_assert_true (ant_figure_write (path, &options, paint, NULL, &error));
  g_autofree char *text = NULL;
  gsize length;
  g_assert_true (g_file_get_contents (path, &text, &length, &error));
  g_autoptr (GBytes) bytes = figure (ANT_FIGURE_SVG, 1);
  g_assert_cmpmem (text, length, g_bytes_get_data (bytes, NULL), g_bytes_get_size (bytes));
  g_unlink (path);
  g_rmdir (folder);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/figure/png-has-the-pixels-asked-for", png_has_the_pixels_asked_for);
  g_test_add_func ("/plot/figure/svg-is-whole", svg_is_whole);
  g_test_add_func ("/plot/figure/pdf-holds-its-fonts", pdf_holds_its_fonts);
  g_test_add_func ("/plot/figure/the-same-drawing-gives-the-same-bytes", the_same_drawing_gives_the_same_bytes);
  g_test_add_func ("/plot/figure/paper-is-drawn-finer-than-one-unit", paper_is_drawn_finer_than_one_unit);
  g_test_add_func ("/plot/figure/endings-name-formats", endings_name_formats);
  g_test_add_func ("/plot/figure/senseless-sizes-are-refused", senseless_sizes_are_refused);
  g_test_add_func ("/plot/figure/a-place-that-cannot-be-written-is-named", a_place_that_cannot_be_written_is_named);
  g_test_add_func ("/plot/figure/what-is-written-is-what-was-drawn", what_is_written_is_what_was_drawn);
  return g_test_run ();
}
