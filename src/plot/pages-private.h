/* pages-private.h - inside of a document, shared by its two files. */
#pragma once

#include <pango/pango.h>
#include "plot/pages.h"
#include "plot/pen.h"

typedef enum
{
  FACE_BODY,
  FACE_STRONG,
  FACE_SMALL,
  FACE_HEADING,
  FACE_SUBHEADING,
  FACE_TITLE,
  N_FACES,
} Face;

struct _AntPages
{
  double width, height;     /* of the paper */
  char *title, *foot;
  GPtrArray *page;          /* of cairo_surface_t: those that are full */
  GArray *outline;          /* of Mark */
  cairo_surface_t *surface; /* the page in work */
  cairo_t *cr;
  double y;                 /* where the next block begins */
  AntTheme theme;
};

typedef struct
{
  int level;
  guint page; /* from 1 */
  double y;
  char *text;
} Mark;

#define MARGIN 50.0
#define TOP 46.0
#define BOTTOM 56.0

/* Text of one face broken at a width; the caller unrefs. Height by layout_height. */
PangoLayout *ant_pages_lay_out (AntPages *pages, Face face, const char *text, double width, double align);
double ant_pages_layout_height (PangoLayout *layout);
double ant_pages_text_width (AntPages *pages, Face face, const char *text);
/* Draw it with its top left corner there, in a role's colour. */
void ant_pages_show (AntPages *pages, PangoLayout *layout, AntRole role, double x, double y);
double ant_pages_left_height (const AntPages *pages); /* on this page */
void ant_pages_rule (AntPages *pages, double y, AntRole role, double thickness);
void ant_pages_turn (AntPages *pages); /* begin the next page */
