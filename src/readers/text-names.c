/* text-names.c - what the header calls the columns. */
#include "readers/text-names.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"
#include "readers/text-cell.h"

const char *const ant_time_words[] = { "time",  "date",  "datetime", "utc", "jd",  "mjd",   "bjd",  "hjd",    "bkjd", "btjd", "tjd",
                                       "jdn",   "gps",   "unix",     "epoch", "timestamp", "yyyymmdd", "year", "yr", "doy",
                                       "t",     "day",   "days",     "hours", "iso",  "hhmm",  "hhmmss", NULL };

char *
ant_text_excerpt (const char *start, const char *end, gsize n)
{
  gsize length = MIN ((gsize) (end - start), n);
  g_autofree char *valid = g_utf8_make_valid (start, (gssize) length);
  for (char *c = valid; *c; c++)
    if (g_ascii_iscntrl (*c) && *c != '\t')
      *c = '?';
  return g_steal_pointer (&valid);
}

const char *
ant_text_known_unit (const char *text)
{
  static const char *const watts[] = { "wm2", "wm-2", "w/m2", "wattsperm2", "w/m**2", "wm**-2", "w.m2", "w.m-2", "w/m^2",
                                       "wm^-2", "w/m²", "wm⁻²", "watt/m2", "watts/m2", "w/sqm" };
  g_autoptr (GString) bare = g_string_new (NULL);
  for (const char *c = text; *c; c++)
    if (*c != ' ' && *c != '_' && *c != '*')
      g_string_append_c (bare, g_ascii_tolower (*c));
  for (gsize i = 0; i < G_N_ELEMENTS (watts); i++)
    if (!strcmp (bare->str, watts[i]))
      return "W/m2";
  if (!strcmp (bare->str, "ppm"))
    return "ppm";
  if (!strcmp (bare->str, "relative") || !strcmp (bare->str, "normalized") || !strcmp (bare->str, "normalised"))
    return "relative";
  return NULL;
}

/* "TSI [W/m2]" or "TSI (Wm-2)": the part in brackets, where it is a unit. */
static void
take_unit (AntTableColumn *column)
{
  const char *square = strchr (column->name, '['), *open = square ? square : strchr (column->name, '(');
  const char *close = open ? strpbrk (open, "])") : NULL;
  if (close)
    column->unit = g_strndup (open + 1, (gsize) (close - open - 1));
}

static gboolean
has_time_word (const AntCell *cells, guint n)
{
  for (guint c = 0; c < n; c++)
    {
      g_autofree char *name = g_strndup (cells[c].start, (gsize) (cells[c].end - cells[c].start));
      AntTableColumn column = { .name = name };
      if (ant_table_column_has_word (&column, ant_time_words))
        return TRUE;
    }
  return FALSE;
}

/* A row of names in this line? Names are words; a cell of bare number shows that it is not. Comments hold much other prose:
 * there one of the names must be a time's, and then a few may be numbers, such as wavelengths. */
static gboolean
names_from_line (AntTableLayout *layout, const char *line, char separator, gboolean is_comment, AntCell *cells)
{
  const char *end = line + strlen (line);
  if (ant_cell_split (line, end, separator, layout->n_columns, cells) != layout->n_columns)
    return FALSE;
  guint words = 0, numbers = 0;
  for (guint c = 0; c < layout->n_columns; c++)
    {
      numbers += cells[c].kind == ANT_CELL_NUMBER;
      words += cells[c].kind == ANT_CELL_TEXT;
    }
  if (words <= 2 * numbers || (numbers > 0 && !is_comment) || (is_comment && !has_time_word (cells, layout->n_columns)))
    return FALSE;
  for (guint c = 0; c < layout->n_columns; c++)
    {
      g_free (layout->columns[c].name);
      layout->columns[c].name = g_strndup (cells[c].start, (gsize) (cells[c].end - cells[c].start));
    }
  return TRUE;
}

/* "3rd col: TSI (W/m2), remarks" or "column 3 = TSI": the number, and where its words begin. */
static guint
numbered_column (const char *line, const char **words)
{
  const char *at = line;
  while (*at && (ant_cell_is_comment_mark (*at) || *at == ' ' || *at == '\t'))
    at++;
  gboolean word_first = !g_ascii_strncasecmp (at, "col", 3);
  while (word_first && *at && !g_ascii_isdigit (*at))
    at++;
  char *after;
  guint64 number = g_ascii_strtoull (at, &after, 10);
  if (after == at || number > ANT_MOST_COLUMNS)
    return 0;
  at = after;
  if (!word_first)
    {
      while (g_ascii_isalpha (*at)) /* st, nd, rd, th */
        at++;
      while (*at == ' ')
        at++;
      if (g_ascii_strncasecmp (at, "col", 3) != 0)
        return 0;
      while (g_ascii_isalpha (*at))
        at++;
    }
  if (*at != ' ' && *at != ':' && *at != '=' && *at != '.') /* "col 3-7" speaks of several */
    return 0;
  at += strspn (at, " :=.");
  *words = at;
  return (guint) number;
}

static void
names_from_prose (AntTableLayout *layout)
{
  for (guint i = 0; i < layout->header->len; i++)
    {
      const char *words;
      guint number = numbered_column (g_ptr_array_index (layout->header, i), &words);
      if (number < 1 || number > layout->n_columns || *words == 0 || *layout->columns[number - 1].name)
        continue;
      const char *end = strpbrk (words, ")]");
      gsize n = end ? (gsize) (end + 1 - words) : strcspn (words, ",;");
      g_free (layout->columns[number - 1].name);
      layout->columns[number - 1].name = g_strchomp (g_strndup (words, n));
      words += n + strspn (words + n, " ,;.:-");
      if (*words)
        layout->columns[number - 1].remark = g_strchomp (g_strdup (words));
    }
}

void
ant_text_name_columns (AntTableLayout *layout)
{
  const char separators[] = { layout->separator, ',', '\t', ' ', ';' };
  g_autofree AntCell *cells = g_new (AntCell, layout->n_columns);
  gboolean named = FALSE, seen_text = FALSE;
  for (guint c = 0; c < layout->n_columns; c++)
    layout->columns[c].name = g_strdup ("");
  for (guint i = layout->header->len; i-- > 0 && !named;)
    {
      const char *line = g_ptr_array_index (layout->header, i);
      const char *bare = line;
      while (*bare && (ant_cell_is_comment_mark (*bare) || *bare == ' ' || *bare == '\t'))
        bare++;
      gboolean is_comment = ant_cell_is_comment_mark (*ant_cell_skip_blanks (line, line + strlen (line)));
      if (*bare == 0 || (!is_comment && seen_text))
        continue; /* of the lines without a mark only the last one stands above the columns */
      seen_text |= !is_comment;
      for (gsize s = 0; s < (is_comment ? G_N_ELEMENTS (separators) : 1) && !named; s++)
        named = names_from_line (layout, is_comment ? bare : line, separators[s], is_comment, cells);
    }
  if (!named)
    names_from_prose (layout);
  for (guint c = 0; c < layout->n_columns; c++)
    {
      AntTableColumn *column = &layout->columns[c];
      take_unit (column);
    }
  ant_table_layout_label (layout);
}
