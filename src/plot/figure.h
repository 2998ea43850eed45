/* figure.h - any painter's drawing as PNG, SVG or PDF.
 *
 * The bytes are the same for the same drawing: with SOURCE_DATE_EPOCH set, PDF too bears that date and not today's.
 * Fonts are embedded in PDF and drawn as outlines in SVG. One unit is one CSS pixel in SVG, scale pixels in PNG and one
 * point in PDF. */
#pragma once

#include <cairo.h>
#include <glib.h>
#include "plot/view.h"

typedef enum
{
  ANT_FIGURE_PNG,
  ANT_FIGURE_SVG,
  ANT_FIGURE_PDF,
} AntFigureFormat;

/* Draw into the box, whose corner is (0, 0). scale: as the painters take it. */
typedef void (*AntFigurePaint) (cairo_t *cr, const AntBox *box, double scale, gpointer data);

typedef struct
{
  AntFigureFormat format;
  double width, height; /* units, 16 to 10 000 */
  double scale;         /* PNG: pixels per unit, 1 to 8; fineness of the others is fixed */
  const char *title;    /* for PDF's metadata; may be NULL */
} AntFigureOptions;

/* From the ending of a path: .png, .svg, .pdf in any case. FALSE with a sentence for another. */
gboolean ant_figure_format_of (const char *path, AntFigureFormat *format, GError **error);
/* NULL with one sentence (ANT_ERROR_USAGE, ANT_ERROR_WRITE). */
GBytes *ant_figure_bytes (const AntFigureOptions *options, AntFigurePaint paint, gpointer data, GError **error);
/* Written whole or not at all. */
gboolean ant_figure_write (const char *path, const AntFigureOptions *options, AntFigurePaint paint, gpointer data,
                           GError **error);
