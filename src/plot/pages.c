/* pages.c - the paper of a document: its pages, its text, its way into a PDF. */
#include <cairo-pdf.h>
#include <glib/gi18n.h>
#include <pango/pangocairo.h>

#include "data/error.h"
#include "plot/pages-private.h"
#include "plot/pdf.h"

#define FONT_PX 8.6
#define FIGURE_PX 8.0

static const struct
{
  double width, height;
} papers[ANT_N_PAPERS] = { [ANT_PAPER_A4] = { 595.276, 841.89 }, [ANT_PAPER_LETTER] = { 612, 792 } };

static const struct
{
  double size;
  gboolean bold;
} faces[N_FACES] = { [FACE_BODY] = { 1, FALSE },    [FACE_STRONG] = { 1, TRUE },      [FACE_SMALL] = { 0.86, FALSE },
                     [FACE_HEADING] = { 1.5, TRUE }, [FACE_SUBHEADING] = { 1.15, TRUE }, [FACE_TITLE] = { 2.3, TRUE } };

static void
mark_clear (gpointer data)
{
  g_free (((Mark *) data)->text);
}

static void
begin_page (AntPages *pages)
{
  cairo_rectangle_t whole = { 0, 0, pages->width, pages->height };
  pages->surface = cairo_recording_surface_create (CAIRO_CONTENT_COLOR_ALPHA, &whole);
  pages->cr = cairo_create (pages->surface);
  pages->y = TOP;
}

static void
end_page (AntPages *pages)
{
  cairo_destroy (pages->cr);
  g_ptr_array_add (pages->page, pages->surface);
  pages->cr = NULL;
  pages->surface = NULL;
}

AntPages *
ant_pages_new (AntPaper paper, const char *title, const char *foot)
{
  AntPages *pages = g_new0 (AntPages, 1);
  pages->width = papers[paper].width;
  pages->height = papers[paper].height;
  pages->title = g_strdup (title);
  pages->foot = g_strdup (foot);
  pages->page = g_ptr_array_new_with_free_func ((GDestroyNotify) cairo_surface_destroy);
  pages->outline = g_array_new (FALSE, FALSE, sizeof (Mark));
  g_array_set_clear_func (pages->outline, mark_clear);
  ant_theme_init (&pages->theme, ANT_THEME_LIGHT);
  pages->theme.role[ANT_ROLE_PAPER] = (AntColour) { 1, 1, 1, 1 };
  pages->theme.font_px = FIGURE_PX;
  pages->theme.trace_px = 1;
  begin_page (pages);
  return pages;
}

void
ant_pages_free (AntPages *pages)
{
  if (!pages)
    return;
  g_clear_pointer (&pages->cr, cairo_destroy);
  g_clear_pointer (&pages->surface, cairo_surface_destroy);
  g_ptr_array_unref (pages->page);
  g_array_unref (pages->outline);
  g_free (pages->title);
  g_free (pages->foot);
  g_free (pages);
}

const AntTheme *
ant_pages_theme (const AntPages *pages)
{
  return &pages->theme;
}

double
ant_pages_width (const AntPages *pages)
{
  return pages->width - 2 * MARGIN;
}

double
ant_pages_left_height (const AntPages *pages)
{
  return pages->height - BOTTOM - pages->y;
}

void
ant_pages_turn (AntPages *pages)
{
  end_page (pages);
  begin_page (pages);
}

void
ant_pages_keep (AntPages *pages, double height)
{
  if (height > ant_pages_left_height (pages) && pages->y > TOP)
    ant_pages_turn (pages);
}

void
ant_pages_space (AntPages *pages, double height)
{
  if (pages->y > TOP)
    pages->y += height;
}

double
ant_pages_fit (const AntPages *pages, double above, double least, double most)
{
  double left = ant_pages_left_height (pages) - above;
  return left < least ? most : MIN (left, most);
}

double
ant_pages_share (const AntPages *pages, guint n)
{
  return (pages->height - TOP - BOTTOM) / n;
}

guint
ant_pages_count (const AntPages *pages)
{
  return pages->page->len + (pages->cr ? 1 : 0);
}

PangoLayout *
ant_pages_lay_out (AntPages *pages, Face face, const char *text, double width, double align)
{
  AntPen pen; /* whose layout has the pen's options: no hinting, so that lines break alike everywhere */
  ant_pen_begin (&pen, pages->cr, &pages->theme, 2);
  PangoLayout *layout = g_object_ref (pen.layout);
  ant_pen_end (&pen);
  PangoFontDescription *font = pango_font_description_new ();
  pango_font_description_set_family_static (font, pages->theme.font);
  pango_font_description_set_absolute_size (font, FONT_PX * faces[face].size * PANGO_SCALE);
  pango_font_description_set_weight (font, faces[face].bold ? PANGO_WEIGHT_BOLD : PANGO_WEIGHT_NORMAL);
  pango_layout_set_font_description (layout, font);
  pango_font_description_free (font);
  pango_layout_set_wrap (layout, PANGO_WRAP_WORD_CHAR);
  pango_layout_set_width (layout, width < 0 ? -1 : (int) (width * PANGO_SCALE));
  pango_layout_set_alignment (layout, align > 0.5 ? PANGO_ALIGN_RIGHT : PANGO_ALIGN_LEFT);
  pango_layout_set_spacing (layout, (int) (0.18 * FONT_PX * PANGO_SCALE));
  pango_layout_set_text (layout, text, -1);
  return layout;
}

double
ant_pages_layout_height (PangoLayout *layout)
{
  PangoRectangle logical;
  pango_layout_get_extents (layout, NULL, &logical);
  return (double) logical.height / PANGO_SCALE;
}

double
ant_pages_text_width (AntPages *pages, Face face, const char *text)
{
  g_autoptr (PangoLayout) layout = ant_pages_lay_out (pages, face, text, -1, 0);
  PangoRectangle logical;
  pango_layout_get_extents (layout, NULL, &logical);
  return (double) logical.width / PANGO_SCALE;
}

void
ant_pages_show (AntPages *pages, PangoLayout *layout, AntRole role, double x, double y)
{
  AntColour colour = pages->theme.role[role];
  cairo_set_source_rgba (pages->cr, colour.red, colour.green, colour.blue, colour.alpha);
  cairo_move_to (pages->cr, x, y);
  pango_cairo_show_layout (pages->cr, layout);
}

void
ant_pages_rule (AntPages *pages, double y, AntRole role, double thickness)
{
  AntColour colour = pages->theme.role[role];
  cairo_set_source_rgba (pages->cr, colour.red, colour.green, colour.blue, colour.alpha);
  cairo_rectangle (pages->cr, MARGIN, y, ant_pages_width (pages), thickness);
  cairo_fill (pages->cr);
}

/* The foot of a page, drawn onto it while it is put on paper. */
static void
draw_foot (AntPages *pages, cairo_t *cr, guint number)
{
  cairo_t *own = pages->cr;
  pages->cr = cr;
  g_autofree char *count = g_strdup_printf (_("%u of %u"), number, pages->page->len);
  g_autoptr (PangoLayout) left = ant_pages_lay_out (pages, FACE_SMALL, pages->foot, -1, 0);
  g_autoptr (PangoLayout) right = ant_pages_lay_out (pages, FACE_SMALL, count, ant_pages_width (pages), 1);
  double y = pages->height - 0.62 * BOTTOM;
  ant_pages_rule (pages, y - 5, ANT_ROLE_GRID, 0.5);
  ant_pages_show (pages, left, ANT_ROLE_QUIET, MARGIN, y);
  ant_pages_show (pages, right, ANT_ROLE_QUIET, MARGIN, y);
  pages->cr = own;
}

static void
add_outline (const AntPages *pages, cairo_surface_t *surface)
{
  int parent = CAIRO_PDF_OUTLINE_ROOT;
  for (guint i = 0; i < pages->outline->len; i++)
    {
      const Mark *mark = &g_array_index (pages->outline, Mark, i);
      g_autofree char *target = g_strdup_printf ("page=%u pos=[0 %d]", mark->page, (int) mark->y);
      gboolean top = mark->level <= 1;
      int id = cairo_pdf_surface_add_outline (surface, top ? CAIRO_PDF_OUTLINE_ROOT : parent, mark->text, target,
                                              top ? CAIRO_PDF_OUTLINE_FLAG_OPEN : 0);
      if (top)
        parent = id;
    }
}

GBytes *
ant_pages_finish (AntPages *pages, GError **error)
{
  GByteArray *bytes = g_byte_array_new ();
  end_page (pages);
  cairo_surface_t *surface = ant_pdf_surface_new (bytes, pages->width, pages->height, pages->title);
  cairo_t *cr = cairo_create (surface);
  for (guint i = 0; i < pages->page->len; i++)
    {
      cairo_set_source_surface (cr, g_ptr_array_index (pages->page, i), 0, 0);
      cairo_paint (cr);
      draw_foot (pages, cr, i + 1);
      cairo_show_page (cr);
    }
  add_outline (pages, surface);
  cairo_status_t status = cairo_status (cr);
  cairo_destroy (cr);
  cairo_surface_finish (surface);
  if (status == CAIRO_STATUS_SUCCESS)
    status = cairo_surface_status (surface); /* what went wrong while writing shows only now */
  cairo_surface_destroy (surface);
  if (status == CAIRO_STATUS_SUCCESS)
    return g_byte_array_free_to_bytes (bytes);
  g_byte_array_unref (bytes);
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("The report could not be drawn: %s"), cairo_status_to_string (status));
  return NULL;
}
