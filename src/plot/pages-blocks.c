/* pages-blocks.c - what stands on the pages of a document: headings, paragraphs, facts, figures, tables. */
#include <math.h>

#include "data/dip-words.h"
#include "plot/pages-private.h"

#define PAPER_SCALE 2 /* as figures have it: columns of half a point */
#define PARAGRAPH 3.5
#define INDENT 10.0
#define COLUMN_GAP 22.0
#define LABEL_GAP 10.0
#define LABEL_SHARE 0.46 /* of a column of facts, at most */
#define FIGURE_SHARE 0.56
#define CELL_GAP 9.0
#define CELL_AIR 16.0 /* by which a column of a table may grow */
#define ROW_AIR 2.6

static double
put (AntPages *pages, Face face, AntRole role, const char *text, double x, double y, double width)
{
  g_autoptr (PangoLayout) layout = ant_pages_lay_out (pages, face, text, width, 0);
  ant_pages_show (pages, layout, role, x, y);
  return ant_pages_layout_height (layout);
}

void
ant_pages_title (AntPages *pages, const char *text, const char *below)
{
  pages->y += put (pages, FACE_TITLE, ANT_ROLE_TEXT, text, MARGIN, pages->y, ant_pages_width (pages)) + 2;
  if (below)
    pages->y += put (pages, FACE_BODY, ANT_ROLE_QUIET, below, MARGIN, pages->y, ant_pages_width (pages));
  pages->y += 8;
}

void
ant_pages_heading (AntPages *pages, int level, const char *text, double keep)
{
  gboolean top = level <= 1;
  double before = top ? 14 : 9, after = top ? 6 : 3;
  g_autoptr (PangoLayout) layout = ant_pages_lay_out (pages, top ? FACE_HEADING : FACE_SUBHEADING, text, ant_pages_width (pages), 0);
  double height = ant_pages_layout_height (layout);
  ant_pages_keep (pages, before + height + after + keep);
  ant_pages_space (pages, before);
  Mark mark = { level, ant_pages_count (pages), pages->y, g_strdup (text) };
  g_array_append_val (pages->outline, mark);
  ant_pages_show (pages, layout, ANT_ROLE_TEXT, MARGIN, pages->y);
  pages->y += height;
  if (top)
    ant_pages_rule (pages, pages->y + 1.5, ANT_ROLE_FRAME, 0.5);
  pages->y += after;
}

static void
paragraph (AntPages *pages, Face face, AntRole role, const char *text, double indent)
{
  g_autoptr (PangoLayout) layout = ant_pages_lay_out (pages, face, text, ant_pages_width (pages) - indent, 0);
  double height = ant_pages_layout_height (layout);
  ant_pages_keep (pages, height);
  ant_pages_show (pages, layout, role, MARGIN + indent, pages->y);
  if (indent > 0)
    put (pages, face, role, "•", MARGIN + 1, pages->y, -1);
  pages->y += height + PARAGRAPH;
}

void
ant_pages_text (AntPages *pages, AntPagesStyle style, const char *text)
{
  paragraph (pages, style == ANT_PAGES_SMALL ? FACE_SMALL : FACE_BODY, style == ANT_PAGES_BODY ? ANT_ROLE_TEXT : ANT_ROLE_QUIET, text, 0);
}

void
ant_pages_item (AntPages *pages, const char *text)
{
  paragraph (pages, FACE_BODY, ANT_ROLE_TEXT, text, INDENT);
}

/* As wide as the longest of all labels, so that columns of facts look alike. */
static double
label_width_of (AntPages *pages, const GPtrArray *facts, double width)
{
  double widest = 0;
  for (guint i = 0; i < facts->len; i++)
    widest = fmax (widest, ant_pages_text_width (pages, FACE_BODY, ((const AntFact *) g_ptr_array_index (facts, i))->label));
  return fmin (ceil (widest) + LABEL_GAP, LABEL_SHARE * width);
}

/* Facts first .. last-1 from a place downwards; drawn or only measured. Returns their height. */
static double
column_of_facts (AntPages *pages, const GPtrArray *facts, guint first, guint last, double x, double y, double width, gboolean draw)
{
  double top = y, label_width = label_width_of (pages, facts, width);
  for (guint i = first; i < last; i++)
    {
      const AntFact *fact = g_ptr_array_index (facts, i);
      g_autoptr (PangoLayout) label = ant_pages_lay_out (pages, FACE_BODY, fact->label, label_width - 4, 0);
      g_autoptr (PangoLayout) value = ant_pages_lay_out (pages, FACE_BODY, fact->value, width - label_width, 0);
      if (draw)
        {
          ant_pages_show (pages, label, ANT_ROLE_QUIET, x, y);
          ant_pages_show (pages, value, ANT_ROLE_TEXT, x + label_width, y);
        }
      y += fmax (ant_pages_layout_height (label), ant_pages_layout_height (value)) + ROW_AIR;
    }
  return y - top;
}

void
ant_pages_facts (AntPages *pages, const GPtrArray *facts, guint n_columns)
{
  double width = (ant_pages_width (pages) - COLUMN_GAP * (n_columns - 1)) / n_columns, height = 0;
  guint each = (facts->len + n_columns - 1) / n_columns;
  for (int draw = 0; draw <= 1; draw++)
    {
      for (guint c = 0; c < n_columns; c++)
        height = fmax (height, column_of_facts (pages, facts, MIN (c * each, facts->len), MIN ((c + 1) * each, facts->len),
                                                MARGIN + c * (width + COLUMN_GAP), pages->y, width, draw));
      if (!draw)
        ant_pages_keep (pages, height);
    }
  pages->y += height + PARAGRAPH;
}

static void
figure (AntPages *pages, double width, double height, AntFigurePaint paint, gpointer data)
{
  AntBox box = { 0, 0, floor (width), floor (height) };
  cairo_save (pages->cr);
  cairo_translate (pages->cr, MARGIN, pages->y);
  paint (pages->cr, &box, PAPER_SCALE, data);
  cairo_restore (pages->cr);
}

void
ant_pages_figure (AntPages *pages, double height, AntFigurePaint paint, gpointer data)
{
  ant_pages_keep (pages, height);
  figure (pages, ant_pages_width (pages), height, paint, data);
  pages->y += height + PARAGRAPH;
}

void
ant_pages_figure_facts (AntPages *pages, double height, AntFigurePaint paint, gpointer data, const GPtrArray *facts)
{
  double left = FIGURE_SHARE * ant_pages_width (pages), right = ant_pages_width (pages) - left - COLUMN_GAP / 2;
  double facts_height = column_of_facts (pages, facts, 0, facts->len, 0, 0, right, FALSE), both = fmax (height, facts_height);
  ant_pages_keep (pages, both);
  figure (pages, left, height, paint, data);
  column_of_facts (pages, facts, 0, facts->len, MARGIN + left + COLUMN_GAP / 2, pages->y, right, TRUE);
  pages->y += both + PARAGRAPH;
}

/* Tables */

typedef struct
{
  AntPages *pages;
  Face face;
  gsize n_columns;
  const AntPagesColumn *column;
  double *width;
} Table;

/* As wide as the widest cell, and a little more where there is room; too much is taken from the widest column. */
static void
share_width (Table *table, gsize n_rows, const char *const *cell)
{
  double sum = 0, room = ant_pages_width (table->pages) - CELL_GAP * (double) (table->n_columns - 1);
  for (gsize c = 0; c < table->n_columns; c++)
    {
      table->width[c] = ant_pages_text_width (table->pages, table->face, table->column[c].title);
      for (gsize row = 0; row < n_rows; row++)
        table->width[c] = fmax (table->width[c], ant_pages_text_width (table->pages, table->face, cell[row * table->n_columns + c]));
      table->width[c] = ceil (table->width[c]) + 1;
      sum += table->width[c];
    }
  gsize widest = 0;
  for (gsize c = 1; c < table->n_columns; c++)
    if (table->width[c] > table->width[widest])
      widest = c;
  if (sum > room)
    table->width[widest] -= sum - room;
  else
    for (gsize c = 0; c < table->n_columns; c++)
      table->width[c] += fmin ((room - sum) / (double) table->n_columns, CELL_AIR);
}

static double
table_row (const Table *table, const char *const *cell, AntRole role)
{
  double height = 0, x = MARGIN;
  GPtrArray *layouts = g_ptr_array_new_with_free_func (g_object_unref);
  for (gsize c = 0; c < table->n_columns; c++)
    {
      PangoLayout *layout = ant_pages_lay_out (table->pages, table->face, cell[c], fmax (table->width[c], 20), table->column[c].align);
      height = fmax (height, ant_pages_layout_height (layout));
      g_ptr_array_add (layouts, layout);
    }
  for (gsize c = 0; c < table->n_columns && role != ANT_N_ROLES; c++)
    {
      ant_pages_show (table->pages, g_ptr_array_index (layouts, c), role, x, table->pages->y);
      x += table->width[c] + CELL_GAP;
    }
  g_ptr_array_unref (layouts);
  return height + ROW_AIR;
}

static void
table_header (const Table *table)
{
  g_autofree const char **titles = g_new (const char *, table->n_columns);
  for (gsize c = 0; c < table->n_columns; c++)
    titles[c] = table->column[c].title;
  table->pages->y += table_row (table, titles, ANT_ROLE_QUIET);
  ant_pages_rule (table->pages, table->pages->y - ROW_AIR / 2, ANT_ROLE_FRAME, 0.5);
  table->pages->y += ROW_AIR / 2;
}

double
ant_pages_table_height (AntPages *pages, AntPagesStyle style, gsize n_columns, const AntPagesColumn *column, gsize n_rows,
                        const char *const *cell)
{
  g_autofree double *width = g_new (double, n_columns);
  Table table = { pages, style == ANT_PAGES_SMALL ? FACE_SMALL : FACE_BODY, n_columns, column, width };
  double height = ROW_AIR / 2 + PARAGRAPH;
  share_width (&table, n_rows, cell);
  for (gsize row = 0; row < n_rows; row++)
    height += table_row (&table, cell + row * n_columns, ANT_N_ROLES) * (row == 0 ? 2 : 1); /* the header is as high as a row of one line */
  return height;
}

void
ant_pages_table (AntPages *pages, AntPagesStyle style, gsize n_columns, const AntPagesColumn *column, gsize n_rows, const char *const *cell)
{
  g_autofree double *width = g_new (double, n_columns);
  Table table = { pages, style == ANT_PAGES_SMALL ? FACE_SMALL : FACE_BODY, n_columns, column, width };
  share_width (&table, n_rows, cell);
  ant_pages_keep (pages, 4 * table_row (&table, cell, ANT_N_ROLES));
  table_header (&table);
  for (gsize row = 0; row < n_rows; row++)
    {
      double height = table_row (&table, cell + row * n_columns, ANT_N_ROLES);
      if (height > ant_pages_left_height (pages))
        {
          ant_pages_turn (pages);
          table_header (&table);
        }
      table_row (&table, cell + row * n_columns, ANT_ROLE_TEXT);
      pages->y += height;
    }
  pages->y += PARAGRAPH;
}
