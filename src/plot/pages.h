/* pages.h - a document on pages of paper: headings, paragraphs, facts, tables and figures follow each other, and a block
 * that does not fit begins the next page.
 *
 * Pages are drawn into memory and put on paper at the end, when their number is known; so a document costs what its
 * drawings cost. PDF with an outline from the headings, embedded fonts, text that can be searched; the same document gives
 * the same bytes under SOURCE_DATE_EPOCH. One thread at a time. */
#pragma once

#include <cairo.h>
#include <glib.h>
#include "plot/figure.h"
#include "plot/theme.h"

typedef enum
{
  ANT_PAPER_A4,
  ANT_PAPER_LETTER,
  ANT_N_PAPERS,
} AntPaper;

typedef enum
{
  ANT_PAGES_BODY,
  ANT_PAGES_QUIET, /* captions, remarks */
  ANT_PAGES_SMALL,
} AntPagesStyle;

typedef struct _AntPages AntPages;

/* title: of the file; foot: quiet words at the left below every page. Both are copied. */
AntPages *ant_pages_new (AntPaper paper, const char *title, const char *foot);
void ant_pages_free (AntPages *pages); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntPages, ant_pages_free)
/* What figures should be painted with. */
const AntTheme *ant_pages_theme (const AntPages *pages);
double ant_pages_width (const AntPages *pages); /* of text and figures, points */

/* Begin a new page unless so much height is left, points. */
void ant_pages_keep (AntPages *pages, double height);
void ant_pages_space (AntPages *pages, double height);
/* A height for what may be higher or lower: what is left on this page below `above`, from `least` to `most`; `most` if that is not
 * enough, since it will stand on the next page. */
double ant_pages_fit (const AntPages *pages, double above, double least, double most);
/* The same share for n blocks that fill a page. */
double ant_pages_share (const AntPages *pages, guint n);

/* The title of the document, with quiet words under it, or NULL. */
void ant_pages_title (AntPages *pages, const char *text, const char *below);
/* Level 1 or 2, both in the outline. `keep`: height of what must stand below it on the same page. */
void ant_pages_heading (AntPages *pages, int level, const char *text, double keep);
void ant_pages_text (AntPages *pages, AntPagesStyle style, const char *text);
/* A paragraph behind a dot. */
void ant_pages_item (AntPages *pages, const char *text);
/* Facts (of AntFact) in columns that are filled one after the other. */
void ant_pages_facts (AntPages *pages, const GPtrArray *facts, guint n_columns);
/* At full width. */
void ant_pages_figure (AntPages *pages, double height, AntFigurePaint paint, gpointer data);
/* A figure with facts at its right and as high as the higher of both, on one page. */
void ant_pages_figure_facts (AntPages *pages, double height, AntFigurePaint paint, gpointer data, const GPtrArray *facts);

typedef struct
{
  const char *title;
  double align; /* 0 left .. 1 right */
} AntPagesColumn;

/* cell [n_rows][n_columns]. The header stands again on every page; columns are as wide as they need, the widest give way. */
void ant_pages_table (AntPages *pages, AntPagesStyle style, gsize n_columns, const AntPagesColumn *column, gsize n_rows, const char *const *cell);

/* How high it would be on one page. */
double ant_pages_table_height (AntPages *pages, AntPagesStyle style, gsize n_columns, const AntPagesColumn *column, gsize n_rows,
                               const char *const *cell);

guint ant_pages_count (const AntPages *pages); /* so far */
/* The document. NULL with one sentence (ANT_ERROR_WRITE). */
GBytes *ant_pages_finish (AntPages *pages, GError **error);
