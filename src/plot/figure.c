/* figure.c - surfaces for paper and screen, and their one way out. */
#include "plot/figure.h"
#include <cairo-svg.h>
#include <glib/gi18n.h>
#include <math.h>
#include <string.h>
#include "data/error.h"
#include "plot/pdf.h"

#define PAPER_SCALE 2 /* columns of half a unit: fine on paper, small in bytes */

static const char *const endings[] = {
  [ANT_FIGURE_PNG] = ".png", [ANT_FIGURE_SVG] = ".svg", [ANT_FIGURE_PDF] = ".pdf"
};

gboolean
ant_figure_format_of (const char *path, AntFigureFormat *format, GError **error)
{
  g_autofree char *lower = g_ascii_strdown (path, -1);
  for (int f = ANT_FIGURE_PNG; f <= ANT_FIGURE_PDF; f++)
    if (g_str_has_suffix (lower, endings[f]))
      {
        *format = (AntFigureFormat) f;
        return TRUE;
      }
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: the name of a figure must end in .png, .svg or .pdf"), path);
  return FALSE;
}

static cairo_status_t
append (void *closure, const unsigned char *bytes, unsigned int length)
{
  g_byte_array_append (closure, bytes, length);
  return CAIRO_STATUS_SUCCESS;
}

static gboolean
name_by_order (const GMatchInfo *match, GString *result, gpointer data)
{
  GHashTable *names = data;
  char *name = g_match_info_fetch (match, 0);
  const char *by_order = g_hash_table_lookup (names, name);
  if (!by_order)
    {
      char *fresh = g_strdup_printf ("surface%u", g_hash_table_size (names) + 1);
      g_hash_table_insert (names, g_strdup (name), fresh);
      by_order = fresh;
    }
  g_string_append (result, by_order);
  g_free (name);
  return FALSE;
}

/* Cairo names the parts of an SVG by a count that runs as long as the program: count anew, so that the same drawing
 * gives the same file. No words of a figure can be touched: they are outlines. */
static void
number_anew (GByteArray *svg)
{
  g_autoptr (GHashTable) names = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, g_free);
  g_autoptr (GRegex) name = g_regex_new ("\\bsurface[0-9]+\\b", 0, 0, NULL);
  g_autofree char *text =
      g_regex_replace_eval (name, (const char *) svg->data, (gssize) svg->len, 0, 0, name_by_order, names, NULL);
  g_byte_array_set_size (svg, 0);
  g_byte_array_append (svg, (const guint8 *) text, (guint) strlen (text));
}

static cairo_surface_t *
surface_new (const AntFigureOptions *options, GByteArray *bytes)
{
  switch (options->format)
    {
    case ANT_FIGURE_PNG:
      return cairo_image_surface_create (CAIRO_FORMAT_RGB24, (int) ceil (options->width * options->scale),
                                         (int) ceil (options->height * options->scale));
    case ANT_FIGURE_SVG:
      {
        cairo_surface_t *surface = cairo_svg_surface_create_for_stream (append, bytes, options->width, options->height);
        cairo_svg_surface_set_document_unit (surface, CAIRO_SVG_UNIT_PX);
        return surface;
      }
    case ANT_FIGURE_PDF:
      return ant_pdf_surface_new (bytes, options->width, options->height, options->title);
    }
  g_return_val_if_reached (NULL);
}

static cairo_status_t
draw (cairo_surface_t *surface, const AntFigureOptions *options, AntFigurePaint paint, gpointer data)
{
  AntBox box = { 0, 0, options->width, options->height };
  gboolean is_png = options->format == ANT_FIGURE_PNG;
  cairo_t *cr = cairo_create (surface);
  if (is_png)
    cairo_scale (cr, options->scale, options->scale);
  paint (cr, &box, is_png ? options->scale : PAPER_SCALE, data);
  cairo_show_page (cr);
  cairo_status_t status = cairo_status (cr);
  cairo_destroy (cr);
  return status;
}

GBytes *
ant_figure_bytes (const AntFigureOptions *options, AntFigurePaint paint, gpointer data, GError **error)
{
  if (!(options->width >= 16 && options->width <= 10000 && options->height >= 16 && options->height <= 10000
        && options->scale >= 1 && options->scale <= 8))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                   _("A figure of %g x %g at scale %g: expected 16 to 10000 each way and a scale from 1 to 8"),
                   options->width, options->height, options->scale);
      return NULL;
    }
  GByteArray *bytes = g_byte_array_new ();
  cairo_surface_t *surface = surface_new (options, bytes);
  cairo_status_t status = draw (surface, options, paint, data);
  if (status == CAIRO_STATUS_SUCCESS && options->format == ANT_FIGURE_PNG)
    status = cairo_surface_write_to_png_stream (surface, append, bytes);
  cairo_surface_finish (surface);
  if (status == CAIRO_STATUS_SUCCESS)
    status = cairo_surface_status (surface); /* what went wrong while writing shows only now */
  cairo_surface_destroy (surface);
  if (status == CAIRO_STATUS_SUCCESS && options->format == ANT_FIGURE_SVG)
    number_anew (bytes);
  if (status == CAIRO_STATUS_SUCCESS)
    return g_byte_array_free_to_bytes (bytes);
  g_byte_array_unref (bytes);
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("The figure could not be drawn: %s"),
               cairo_status_to_string (status));
  return NULL;
}

gboolean
ant_figure_write (const char *path, const AntFigureOptions *options, AntFigurePaint paint, gpointer data,
                  GError **error)
{
  g_autoptr (GBytes) bytes = ant_figure_bytes (options, paint, data, error);
  if (!bytes)
    return FALSE;
  gsize size;
  const char *contents = g_bytes_get_data (bytes, &size);
  g_autoptr (GError) why = NULL;
  if (g_file_set_contents_full (path, contents, (gssize) size, G_FILE_SET_CONTENTS_CONSISTENT, 0666, &why))
    return TRUE;
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("%s: the figure cannot be written: %s"), path, why->message);
  return FALSE;
}
