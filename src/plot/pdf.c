/* pdf.c - PDF surfaces and their metadata. */
#include "plot/pdf.h"

static cairo_status_t
append (void *closure, const unsigned char *bytes, unsigned int length)
{
  g_byte_array_append (closure, bytes, length);
  return CAIRO_STATUS_SUCCESS;
}

/* The date of the source if the builder states one, so that a figure made twice is the same file. */
static void
set_date (cairo_surface_t *surface)
{
  const char *epoch = g_getenv ("SOURCE_DATE_EPOCH");
  gint64 seconds;
  if (!epoch || !g_ascii_string_to_signed (epoch, 10, 0, G_MAXINT32 * (gint64) 16, &seconds, NULL))
    return;
  g_autoptr (GDateTime) date = g_date_time_new_from_unix_utc (seconds);
  g_autofree char *text = date ? g_date_time_format (date, "%Y-%m-%dT%H:%M:%SZ") : NULL;
  if (text)
    cairo_pdf_surface_set_metadata (surface, CAIRO_PDF_METADATA_CREATE_DATE, text);
}

cairo_surface_t *
ant_pdf_surface_new (GByteArray *bytes, double width, double height, const char *title)
{
  cairo_surface_t *surface = cairo_pdf_surface_create_for_stream (append, bytes, width, height);
  set_date (surface);
  if (title)
    cairo_pdf_surface_set_metadata (surface, CAIRO_PDF_METADATA_TITLE, title);
  cairo_pdf_surface_set_metadata (surface, CAIRO_PDF_METADATA_CREATOR, "Antumbra");
  return surface;
}
