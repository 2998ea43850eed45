/* observer-reader.c - tables of positions, row by row. */
#include "readers/observer-reader.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/error.h"
#include "readers/line-source.h"
#include "readers/text-cell.h"
#include "sky/iso-time.h"
#include "sky/places.h"

#define N_CELLS 4
#define MOST_CELLS 16
#define MOST_ROWS 20000000
#define MJD_ZERO 2400000.5

typedef struct
{
  AntLineSource lines;
  const char *name;
  AntTimeScale scale;
  gboolean frame_known, after_header;
  AntFrame frame;
  char separator; /* 0 until a row was seen */
  GArray *column[N_CELLS], *line; /* time_tt_d, x, y, z of double; guint */
} Table;

static gboolean
refuse (const Table *table, GError **error, const char *found)
{
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: line %u: found %s, expected time, x, y, z (km)"), table->name,
               table->lines.line, found);
  return FALSE;
}

/* The axes and the scale that a comment or a line of names tells of. */
static void
learn (Table *table, const char *start, const char *end)
{
  static const struct
  {
    const char *word;
    AntFrame frame;
  } frames[] = { { "gse", ANT_FRAME_GSE }, { "gcrs", ANT_FRAME_GCRS }, { "icrs", ANT_FRAME_GCRS }, { "j2000", ANT_FRAME_GCRS } };
  g_autofree char *copy = g_strndup (start, (gsize) (end - start));
  g_autofree char *line = g_ascii_strdown (copy, -1);
  for (gsize i = 0; i < G_N_ELEMENTS (frames) && !table->frame_known; i++)
    if (strstr (line, frames[i].word))
      {
        table->frame = frames[i].frame;
        table->frame_known = TRUE;
      }
  char *scale = strstr (line, "scale:");
  if (!scale)
    return;
  g_auto (GStrv) words = g_strsplit_set (g_strchug (scale + strlen ("scale:")), " \t,;", 2);
  AntTimeScale told = words[0] ? ant_time_scale_from_name (words[0]) : ANT_SCALE_UNKNOWN;
  if (told != ANT_SCALE_UNKNOWN)
    table->scale = told;
}

static char
separator_of (const char *start, const char *end)
{
  for (const char *c = ",;\t"; *c; c++)
    if (memchr (start, *c, (gsize) (end - start)))
      return *c;
  return ' ';
}

/* Days of TT from J2000.0 of a row's first cell (or first two: a date and a clock). FALSE if it is no time. */
static gboolean
read_time (const Table *table, const char *start, const char *end, double number, double *tt_d)
{
  AntIsoTime iso;
  double jd1, jd2;
  if (isfinite (number))
    {
      /* JD or MJD by its size: between 1858 and 2500 neither can be taken for the other. */
      double days = floor (number);
      jd1 = number > 2000000 && number < 3000000 ? days : number > 0 && number < 300000 ? days + MJD_ZERO : (double) NAN;
      jd2 = number - days;
    }
  else if (!ant_iso_read (start, end, &iso) || ant_iso_instant (&iso, iso.has_zone ? ANT_SCALE_UTC : table->scale, &jd1, &jd2) != ANT_OK)
    return FALSE;
  AntTimeScale scale = !isfinite (number) && iso.has_zone ? ANT_SCALE_UTC : table->scale;
  if (!isfinite (jd1) || ant_time_convert (scale, jd1, jd2, ANT_SCALE_TT, &jd1, &jd2) != ANT_OK)
    return FALSE;
  *tt_d = (jd1 - ANT_J2000_JD) + jd2;
  return TRUE;
}

static gboolean
add_row (Table *table, const char *start, const char *end, GError **error)
{
  AntCell cell[MOST_CELLS];
  double value[N_CELLS];
  if (!table->separator)
    table->separator = separator_of (start, end);
  guint n = ant_cell_split (start, end, table->separator, MOST_CELLS, cell);
  gboolean two = table->separator == ' ' && n == N_CELLS + 1; /* a date and a clock apart */
  gboolean timed = n >= 1 && cell[0].kind != ANT_CELL_MISSING
                   && read_time (table, cell[0].start, cell[two ? 1 : 0].end, two ? NAN : cell[0].number, &value[0]);
  if (!timed && !table->after_header)
    {
      learn (table, start, end);
      table->separator = 0;
      table->after_header = TRUE;
      return TRUE;
    }
  table->after_header = TRUE;
  if (!timed)
    return refuse (table, error, _("no time"));
  if (n != (guint) (two ? N_CELLS + 1 : N_CELLS))
    return refuse (table, error, n < N_CELLS ? _("too few cells") : _("too many cells"));
  for (int i = 1; i < N_CELLS; i++)
    {
      value[i] = cell[i + two].number;
      if (!isfinite (value[i]))
        return refuse (table, error, _("a cell that is no number"));
    }
  if (table->line->len >= MOST_ROWS)
    return refuse (table, error, _("more than 20 million rows"));
  for (int i = 0; i < N_CELLS; i++)
    g_array_append_val (table->column[i], value[i]);
  g_array_append_val (table->line, table->lines.line);
  return TRUE;
}

static gboolean
read_lines (Table *table, GError **error)
{
  const char *start, *end;
  int got;
  while ((got = ant_line_source_next (&table->lines, &start, &end, error)) > 0)
    {
      start = ant_cell_skip_blanks (start, end);
      if (start == end)
        continue;
      if (ant_cell_is_comment_mark (*start))
        learn (table, start, end);
      else if (!add_row (table, start, end, error))
        return FALSE;
    }
  return got == 0;
}

static AntObserverChoice *
make_choice (Table *table, GError **error)
{
  if (table->line->len > 0 && !table->frame_known)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
                   _("%s: its axes are not named, expected a comment such as “# frame: GCRS” or “# frame: GSE”"), table->name);
      return NULL;
    }
  double *column[N_CELLS];
  gsize n = table->line->len;
  for (int i = 0; i < N_CELLS; i++)
    column[i] = (double *) (gpointer) g_array_free (g_steal_pointer (&table->column[i]), FALSE);
  return ant_observer_choice_new_table (table->name, table->frame, n, column[0], column[1], column[2], column[3],
                                        (const guint *) (gconstpointer) table->line->data, error);
}

static AntObserverChoice *
read_table (AntByteSource *source, GError **error)
{
  Table table = { .name = ant_byte_source_name (source), .scale = ANT_SCALE_UTC };
  ant_line_source_init (&table.lines, source, NULL);
  for (int i = 0; i < N_CELLS; i++)
    table.column[i] = g_array_new (FALSE, FALSE, sizeof (double));
  table.line = g_array_new (FALSE, FALSE, sizeof (guint));
  AntObserverChoice *choice = read_lines (&table, error) ? make_choice (&table, error) : NULL;
  for (int i = 0; i < N_CELLS; i++)
    g_clear_pointer (&table.column[i], g_array_unref);
  g_array_unref (table.line);
  ant_line_source_clear (&table.lines);
  return choice;
}

AntObserverChoice *
ant_observer_open (const char *text, GError **error)
{
  if (g_str_equal (text, "earth"))
    return ant_observer_choice_new_earth ();
  if (g_str_equal (text, "l1"))
    return ant_observer_choice_new_l1 ();
  if (g_str_has_prefix (text, "site:"))
    return ant_observer_choice_new_site (text + strlen ("site:"), error);
  g_autoptr (AntByteSource) source = ant_byte_source_open (text, error);
  return source ? read_table (source, error) : NULL;
}

AntObserverChoice *
ant_observer_read_bytes (const char *name, const void *bytes, gsize n, GError **error)
{
  g_autoptr (AntByteSource) source = ant_byte_source_new_bytes (name, bytes, n);
  return read_table (source, error);
}
