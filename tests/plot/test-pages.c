/* test-pages.c - documents: blocks that do not fit turn the page, nothing runs over the edge, the same twice. What is on the
 * pages is read back in tests/outside/check-report.py. */
#include <string.h>

#include "data/dip-words.h"
#include "plot/pages.h"

static void
paint (cairo_t *cr, const AntBox *box, double scale, gpointer data)
{
  *(AntBox *) data = *box;
  cairo_rectangle (cr, box->x, box->y, box->width, box->height);
  cairo_fill (cr);
}

static void
a_block_that_does_not_fit_begins_the_next_page (void)
{
  g_autoptr (AntPages) pages = ant_pages_new (ANT_PAPER_A4, "title", "foot");
  double half = ant_pages_share (pages, 2) + 5;
  AntBox box;
  g_assert_cmpuint (ant_pages_count (pages), ==, 1);
  ant_pages_figure (pages, half, paint, &box);
  g_assert_cmpuint (ant_pages_count (pages), ==, 1);
  ant_pages_figure (pages, half, paint, &box);
  g_assert_cmpuint (ant_pages_count (pages), ==, 2);
  g_assert_cmpfloat_with_epsilon (box.width, ant_pages_width (pages), 1);
}

static void
a_heading_stays_with_what_follows (void)
{
  g_autoptr (AntPages) pages = ant_pages_new (ANT_PAPER_LETTER, "title", "foot");
  AntBox box;
  ant_pages_figure (pages, ant_pages_share (pages, 1) - 60, paint, &box);
  ant_pages_heading (pages, 1, "Heading", 5);
  g_assert_cmpuint (ant_pages_count (pages), ==, 1);
  ant_pages_heading (pages, 1, "Heading", 50);
  g_assert_cmpuint (ant_pages_count (pages), ==, 2);
}

static void
a_page_is_never_left_empty (void)
{
  g_autoptr (AntPages) pages = ant_pages_new (ANT_PAPER_A4, "title", "foot");
  ant_pages_keep (pages, 1e6);
  ant_pages_heading (pages, 1, "Heading", 1e6);
  g_assert_cmpuint (ant_pages_count (pages), ==, 1);
}

static void
what_may_be_lower_takes_what_is_left (void)
{
  g_autoptr (AntPages) pages = ant_pages_new (ANT_PAPER_A4, "title", "foot");
  double all = ant_pages_share (pages, 1);
  AntBox box;
  g_assert_cmpfloat (ant_pages_fit (pages, 0, 100, 200), ==, 200);
  ant_pages_figure (pages, all - 160, paint, &box);
  double left = ant_pages_fit (pages, 0, 100, 200);
  g_assert_cmpfloat (left, <, 160);
  g_assert_cmpfloat (left, >, 140);
  g_assert_cmpfloat (ant_pages_fit (pages, 50, 120, 200), ==, 200); /* on the next page */
}

/* Rows of two lines each over several pages. */
static GBytes *
long_table (AntPaper paper, guint *count)
{
  const AntPagesColumn columns[] = { { "Number", 1 }, { "Words", 0 } };
  g_autoptr (AntPages) pages = ant_pages_new (paper, "A table", "foot");
  g_autoptr (GPtrArray) cells = g_ptr_array_new_with_free_func (g_free);
  g_autoptr (GError) error = NULL;
  for (int i = 0; i < 200; i++)
    {
      g_ptr_array_add (cells, g_strdup_printf ("%d", i));
      g_ptr_array_add (cells, g_strdup ("words that are long enough to be broken once, even though the column may take nearly all of the width that the "
                                        "paper has between its margins"));
    }
  ant_pages_table (pages, ANT_PAGES_BODY, 2, columns, 200, (const char *const *) cells->pdata);
  *count = ant_pages_count (pages);
  GBytes *bytes = ant_pages_finish (pages, &error);
  g_assert_no_error (error);
  return bytes;
}

static void
a_long_table_runs_over_pages (void)
{
  guint a4, letter;
  g_autoptr (GBytes) one = long_table (ANT_PAPER_A4, &a4), two = long_table (ANT_PAPER_LETTER, &letter);
  g_assert_cmpuint (a4, >=, 6);
  g_assert_cmpuint (letter, >=, a4);
  g_assert_cmpmem (g_bytes_get_data (one, NULL), 5, "%PDF-", 5);
}

static void
the_same_document_has_the_same_bytes (void)
{
  guint count;
  g_setenv ("SOURCE_DATE_EPOCH", "2240000000", TRUE);
  g_autoptr (GBytes) one = long_table (ANT_PAPER_A4, &count), two = long_table (ANT_PAPER_A4, &count);
  g_unsetenv ("SOURCE_DATE_EPOCH");
  g_assert_true (g_bytes_equal (one, two));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/pages/a-block-that-does-not-fit-begins-the-next-page", a_block_that_does_not_fit_begins_the_next_page);
  g_test_add_func ("/plot/pages/a-heading-stays-with-what-follows", a_heading_stays_with_what_follows);
  g_test_add_func ("/plot/pages/a-page-is-never-left-empty", a_page_is_never_left_empty);
  g_test_add_func ("/plot/pages/what-may-be-lower-takes-what-is-left", what_may_be_lower_takes_what_is_left);
  g_test_add_func ("/plot/pages/a-long-table-runs-over-pages", a_long_table_runs_over_pages);
  g_test_add_func ("/plot/pages/the-same-document-has-the-same-bytes", the_same_document_has_the_same_bytes);
  return g_test_run ();
}
