/* canvas.h - a small image to paint on and read back. */
#pragma once

#include <cairo.h>
#include <glib.h>
#include "plot/theme.h"

typedef struct
{
  int width, height; /* pixels */
  cairo_surface_t *surface;
  cairo_t *cr;
} AntCanvas;

AntCanvas ant_canvas_new (int width, int height); /* black all over */
void ant_canvas_clear (AntCanvas *canvas);
guint32 ant_canvas_pixel (const AntCanvas *canvas, int x, int y); /* 0xRRGGBB */
guint32 ant_canvas_code (AntColour colour);                       /* of an opaque colour */
/* How many pixels of a column, or of all, have exactly this colour. */
int ant_canvas_count_in_column (const AntCanvas *canvas, int x, guint32 code);
int ant_canvas_count (const AntCanvas *canvas, guint32 code);
/* Lowest (greatest y) pixel of a column above row `foot` in this colour, or nearer to it than to white; -1 if none. */
int ant_canvas_lowest (const AntCanvas *canvas, int x, int foot, guint32 code);
char *ant_canvas_digest (const AntCanvas *canvas); /* of all pixels; caller frees */
