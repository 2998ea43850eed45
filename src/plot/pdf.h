/* pdf.h - a surface for PDF in memory, whose bytes depend on the drawing and on SOURCE_DATE_EPOCH only: with that set, the
 * file bears that date and not today's. Fonts are embedded. */
#pragma once

#include <cairo.h>
#include <cairo-pdf.h>
#include <glib.h>

/* Points. title: of the metadata, may be NULL. bytes is complete after cairo_surface_finish. */
cairo_surface_t *ant_pdf_surface_new (GByteArray *bytes, double width, double height, const char *title);
