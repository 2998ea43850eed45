/* fits-table.c - CFITSIO's tables as columns of series. */
#include "readers/fits-table.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/error.h"
#include "readers/text-names.h"

#define ROWS_JUDGED 256
#define ELEMENTS_JUDGED 16384 /* of wide cells fewer rows */
#define MOST_ELEMENTS 512  /* of a vector cell that are columns each */
#define WIDEST_TEXT 256

/* A column of the file before its elements are told apart. */
typedef struct
{
  char *name, *unit;
  int type; /* as CFITSIO scales it; negative for variable length */
  LONGLONG repeat;
  long width;
} Field;

static void
field_clear (gpointer data)
{
  Field *field = data;
  g_free (field->name);
  g_free (field->unit);
}

char *
ant_fits_place (fitsfile *file, int hdu)
{
  char name[FLEN_VALUE];
  int status = 0;
  if (fits_read_key (file, TSTRING, "EXTNAME", name, NULL, &status) || *name == 0)
    return g_strdup_printf (_("HDU %d"), hdu);
  g_autofree char *plain = ant_text_excerpt (name, name + strlen (name), 40);
  return g_strdup_printf (_("HDU %d (%s)"), hdu, plain);
}

gboolean
ant_fits_refuse (fitsfile *file, const char *path, const char *place, int status, GError **error)
{
  char what[FLEN_STATUS];
  fits_get_errstatus (status, what);
  fits_clear_errmsg ();
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: %s: found damage (%s), expected a whole FITS table"), path, place, what);
  return FALSE;
}

static gboolean
refuse (const AntFitsTable *table, int status, GError **error)
{
  return ant_fits_refuse (table->file, table->path, table->layout ? table->layout->place : "", status, error);
}

static char *
key_text (fitsfile *file, const char *key)
{
  char value[FLEN_VALUE] = "";
  int status = 0;
  fits_read_key (file, TSTRING, key, value, NULL, &status);
  if (status || *g_strstrip (value) == 0)
    return NULL;
  return ant_text_excerpt (value, value + strlen (value), FLEN_VALUE);
}

static gboolean
key_number (fitsfile *file, const char *key, double *value)
{
  int status = 0;
  return fits_read_key (file, TDOUBLE, key, value, NULL, &status) == 0 && isfinite (*value);
}

/* Look a keyword up in the primary header and come back. */
static gboolean
in_primary (AntFitsTable *table, const char *key, char **text, double *number)
{
  int status = 0;
  if (table->hdu == 0 || fits_movabs_hdu (table->file, 1, NULL, &status))
    return FALSE;
  gboolean found = text ? (*text = key_text (table->file, key)) != NULL : key_number (table->file, key, number);
  fits_movabs_hdu (table->file, table->hdu + 1, NULL, &status);
  return found && status == 0;
}

char *
ant_fits_text (AntFitsTable *table, const char *key)
{
  char *text = key_text (table->file, key);
  if (!text)
    in_primary (table, key, &text, NULL);
  return text;
}

gboolean
ant_fits_number (AntFitsTable *table, const char *key, double *value)
{
  return key_number (table->file, key, value) || in_primary (table, key, NULL, value);
}

char *
ant_fits_column_text (AntFitsTable *table, const char *stem, guint column)
{
  g_autofree char *key = g_strdup_printf ("%s%d", stem, table->series[column].column);
  return key_text (table->file, key);
}

/* The names, units and types of the file's columns. */
static GArray *
read_fields (AntFitsTable *table, GError **error)
{
  int n_fields = 0, status = 0;
  if (fits_get_num_cols (table->file, &n_fields, &status))
    {
      refuse (table, status, error);
      return NULL;
    }
  GArray *fields = g_array_new (FALSE, TRUE, sizeof (Field));
  g_array_set_clear_func (fields, field_clear);
  for (int c = 1; c <= n_fields && c <= ANT_MOST_COLUMNS; c++)
    {
      LONGLONG width = 0;
      Field field = { 0 };
      if (fits_get_eqcoltypell (table->file, c, &field.type, &field.repeat, &width, &status))
        {
          g_array_unref (fields);
          refuse (table, status, error);
          return NULL;
        }
      g_autofree char *name_key = g_strdup_printf ("TTYPE%d", c), *unit_key = g_strdup_printf ("TUNIT%d", c);
      field.width = (long) width;
      field.name = key_text (table->file, name_key);
      field.unit = key_text (table->file, unit_key);
      g_array_append_val (fields, field);
    }
  return fields;
}

static gboolean
is_number (const Field *field)
{
  switch (field->type)
    {
    case TBYTE: case TSBYTE: case TSHORT: case TUSHORT: case TINT: case TUINT: case TLONG: case TULONG: case TLONGLONG:
    case TULONGLONG: case TFLOAT: case TDOUBLE: return field->repeat > 0;
    default: return FALSE;
    }
}

static gboolean
names_time (const Field *field)
{
  AntTableColumn column = { .name = field->name };
  return field->name && ant_table_column_has_word (&column, ant_time_words);
}

/* Samples of a cell, if the table holds its series in cells: as many as its first column of times has elements. Two are no
 * series but a time in two parts. */
static gint64
samples_in_cells (const GArray *fields)
{
  for (guint i = 0; i < fields->len; i++)
    {
      const Field *field = &g_array_index (fields, Field, i);
      if (is_number (field) && names_time (field))
        return field->repeat > 2 ? field->repeat : 1;
    }
  return 1;
}

/* TDIM says that the samples come first: (samples, bands), not (bands, samples). */
static gboolean
samples_come_first (AntFitsTable *table, int column, gint64 n_samples)
{
  LONGLONG axes[2] = { 0 };
  int n_axes = 0, status = 0;
  return fits_read_tdimll (table->file, column, 2, &n_axes, axes, &status) == 0 && n_axes == 2 && axes[0] == n_samples;
}

/* `number` tells the elements of one field apart, from 1; 0 for a field of one. */
static void
add_series (GArray *series, GPtrArray *names, const Field *field, AntFitsSeries one, gint64 number, int column)
{
  g_autofree char *name = field->name ? g_strdup (field->name) : g_strdup_printf (_("column %d"), column);
  g_ptr_array_add (names, number ? g_strdup_printf ("%s[%d]", name, (int) number) : g_strdup (name));
  g_array_append_val (series, one);
}

/* Every element of a sample is a column of its own. */
static void
spread_field (AntFitsTable *table, const Field *field, int column, gint64 in_cell, GArray *series, GPtrArray *names)
{
  gint64 n_elements = field->repeat / in_cell;
  gboolean fits = is_number (field) && field->repeat % in_cell == 0 && n_elements <= MOST_ELEMENTS;
  gboolean samples_first = fits && in_cell > 1 && n_elements > 1 && samples_come_first (table, column, in_cell);
  if (field->type == TSTRING && in_cell == 1 && field->width > 0 && field->width <= WIDEST_TEXT
      && (field->repeat == field->width || field->repeat == 1))
    add_series (series, names, field,
                (AntFitsSeries){ .column = column, .is_text = TRUE, .text_width = (guint) field->width, .per_sample = 1 }, 0, column);
  else if (!fits || series->len + n_elements > ANT_MOST_COLUMNS)
    g_ptr_array_add (table->left_out, field->name ? g_strdup (field->name) : g_strdup_printf (_("column %d"), column));
  else
    for (gint64 e = 0; e < n_elements; e++)
      add_series (series, names, field,
                  samples_first ? (AntFitsSeries){ .column = column, .base = e * in_cell, .per_sample = 1 }
                                : (AntFitsSeries){ .column = column, .per_sample = n_elements, .element = e },
                  n_elements > 1 ? e + 1 : 0, column);
}

static gboolean
refuse_rows (const AntFitsTable *table, LONGLONG row, int status, GError **error)
{
  g_autofree char *place = g_strdup_printf (_("%s: row %zu"), table->layout->place, (gsize) row);
  return ant_fits_refuse (table->file, table->path, place, status, error);
}

/* As many samples as one call of CFITSIO can read: across rows unless another band stands between them. */
static gint64
next_run (const AntFitsTable *table, const AntFitsSeries *series, gint64 from, gint64 n, LONGLONG *row, LONGLONG *element)
{
  gint64 in_row = from % table->in_cell;
  *row = from / table->in_cell + 1;
  *element = series->base + in_row * series->per_sample + 1;
  return table->in_cell > 1 ? MIN (n, table->in_cell - in_row) : n;
}

/* Numbers of an ASCII table are read from their digits: CFITSIO's way of them is a bit off now and then. */
static void
find_digits (AntFitsTable *table, AntFitsSeries *series)
{
  double scale = 1.0, zero = 0.0;
  long at = 0;
  int status = 0, width = 0;
  fits_get_acolparms (table->file, series->column, NULL, &at, NULL, NULL, &scale, &zero, NULL, NULL, &status);
  fits_get_col_display_width (table->file, series->column, &width, &status);
  if (status || scale != 1.0 || zero != 0.0 || at < 1 || width < 1 || width > WIDEST_TEXT)
    return;
  series->decimal_at = at;
  series->text_width = (guint) width;
}

static gboolean
read_digits (AntFitsTable *table, const AntFitsSeries *series, gint64 from, gint64 n, double *value, GError **error)
{
  unsigned char text[WIDEST_TEXT + 1];
  for (gint64 i = 0; i < n; i++)
    {
      AntCell cell;
      int status = 0;
      if (fits_read_tblbytes (table->file, from + i + 1, series->decimal_at, series->text_width, text, &status))
        return refuse_rows (table, from + i + 1, status, error);
      text[series->text_width] = 0;
      ant_cell_next ((char *) text, (char *) text + series->text_width, '\t', &cell);
      if (cell.kind == ANT_CELL_NUMBER && memchr (text, '.', series->text_width)) /* a point that is implied is CFITSIO's business */
        value[i] = cell.number;
    }
  return TRUE;
}

static void
lay_out (AntFitsTable *table, const GArray *fields, gint64 in_cell, gboolean is_ascii)
{
  g_autoptr (GArray) series = g_array_new (FALSE, TRUE, sizeof (AntFitsSeries));
  g_autoptr (GPtrArray) names = g_ptr_array_new ();
  char *place = table->layout->place;
  for (guint i = 0; i < fields->len; i++)
    spread_field (table, &g_array_index (fields, Field, i), (int) i + 1, in_cell, series, names);
  table->layout->place = NULL;
  ant_table_layout_free (table->layout);
  table->layout = ant_table_layout_new (series->len);
  table->layout->place = place;
  for (guint c = 0; c < series->len; c++)
    {
      const AntFitsSeries *one = &g_array_index (series, AntFitsSeries, c);
      table->layout->columns[c].name = g_ptr_array_index (names, c);
      table->layout->columns[c].unit = g_strdup (g_array_index (fields, Field, one->column - 1).unit);
    }
  ant_table_layout_label (table->layout);
  table->series = (AntFitsSeries *) g_array_free (g_steal_pointer (&series), FALSE);
  for (guint c = 0; is_ascii && c < table->layout->n_columns; c++)
    if (!table->series[c].is_text)
      find_digits (table, &table->series[c]);
}

/* What the first rows hold, through the words that text tables are judged by. */
static gboolean
study (AntFitsTable *table, GError **error)
{
  gint64 most = MIN (table->n_samples, ROWS_JUDGED);
  double value[ROWS_JUDGED];
  char *text[ROWS_JUDGED];
  g_autofree char *room = g_malloc (ROWS_JUDGED * (WIDEST_TEXT + 1));
  for (gint64 i = 0; i < ROWS_JUDGED; i++)
    text[i] = room + i * (WIDEST_TEXT + 1);
  for (guint c = 0; c < table->layout->n_columns; c++)
    {
      double previous = NAN;
      gboolean is_text = table->series[c].is_text;
      gint64 n = MIN (most, MAX (16, ELEMENTS_JUDGED / table->series[c].per_sample));
      if (is_text ? !ant_fits_table_read_text (table, c, 0, n, text, error) : !ant_fits_table_read (table, c, 0, n, value, error))
        return FALSE;
      for (gint64 i = 0; i < n; i++)
        {
          char number[G_ASCII_DTOSTR_BUF_SIZE + 1];
          const char *cell_text = is_text ? text[i] : g_ascii_dtostr (number, sizeof number - 1, value[i]);
          AntCell cell;
          ant_cell_next (cell_text, cell_text + strlen (cell_text), '\t', &cell);
          ant_table_column_study (&table->layout->columns[c], &cell, &previous);
        }
    }
  return TRUE;
}

/* The rows that the header promises must be in the file. */
static gboolean
check_size (AntFitsTable *table, gint64 n_bytes, gint64 n_rows, GError **error)
{
  LONGLONG head, data, end, row_bytes = 0;
  int status = 0;
  if (fits_get_hduaddrll (table->file, &head, &data, &end, &status)
      || fits_read_key (table->file, TLONGLONG, "NAXIS1", &row_bytes, NULL, &status))
    return refuse (table, status, error);
  gint64 held = row_bytes > 0 && n_bytes > data ? (n_bytes - data) / row_bytes : 0;
  if (n_rows <= held && n_rows < G_MAXINT && table->in_cell <= MAX (row_bytes, 1))
    return TRUE;
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
               _("%s: %s: found %zu rows of %zu bytes in the header, expected at most %zu, which the file holds"), table->path,
               table->layout->place, (gsize) n_rows, (gsize) row_bytes, (gsize) held);
  return FALSE;
}

AntFitsTable *
ant_fits_table_open (fitsfile *file, const char *path, gint64 n_bytes, int hdu, GError **error)
{
  g_autoptr (AntFitsTable) table = g_new0 (AntFitsTable, 1);
  int type = 0, status = 0;
  LONGLONG n_rows = 0;
  *table = (AntFitsTable){ .file = file, .path = path, .hdu = hdu, .layout = ant_table_layout_new (0) };
  table->left_out = g_ptr_array_new_with_free_func (g_free);
  if (fits_movabs_hdu (file, hdu + 1, &type, &status))
    {
      table->layout->place = g_strdup_printf (_("HDU %d"), hdu);
      refuse (table, status, error);
      return NULL;
    }
  table->layout->place = ant_fits_place (file, hdu);
  if (type == IMAGE_HDU)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: %s: found an image, expected a table"), path, table->layout->place);
      return NULL;
    }
  if (fits_get_num_rowsll (file, &n_rows, &status))
    {
      refuse (table, status, error);
      return NULL;
    }
  g_autoptr (GArray) fields = read_fields (table, error);
  if (!fields)
    return NULL;
  table->in_cell = samples_in_cells (fields);
  if (!check_size (table, n_bytes, n_rows, error))
    return NULL;
  table->n_samples = n_rows * table->in_cell; /* no more than the bytes of the file: each has an element of the time's cell */
  lay_out (table, fields, table->in_cell, type == ASCII_TBL);
  return study (table, error) ? g_steal_pointer (&table) : NULL;
}

void
ant_fits_table_free (AntFitsTable *table)
{
  if (!table)
    return;
  ant_table_layout_free (table->layout);
  g_clear_pointer (&table->left_out, g_ptr_array_unref);
  g_free (table->series);
  g_free (table);
}

gint64
ant_fits_table_block (AntFitsTable *table)
{
  long n_rows = 0;
  int status = 0;
  return table->in_cell == 1 && fits_get_rowsize (table->file, &n_rows, &status) == 0 ? MAX (n_rows, 512) : 4096;
}

gboolean
ant_fits_table_read_text (AntFitsTable *table, guint column, gint64 from, gint64 n, char **text, GError **error)
{
  char null[] = "";
  int status = 0, any_null;
  if (n > 0 && fits_read_col_str (table->file, table->series[column].column, from + 1, 1, n, null, text, &any_null, &status))
    return refuse_rows (table, from + 1, status, error);
  return TRUE;
}

/* Numbers in a column of texts, read here: one word among them would have CFITSIO refuse them all. */
static gboolean
read_numbers_in_text (AntFitsTable *table, guint column, gint64 from, gint64 n, double *value, gint64 *whole, GError **error)
{
  guint room = table->series[column].text_width + 1;
  g_autofree char *bytes = g_malloc ((gsize) n * room + 1);
  g_autofree char **text = g_new (char *, n + 1);
  for (gint64 i = 0; i < n; i++)
    text[i] = bytes + i * room;
  if (!ant_fits_table_read_text (table, column, from, n, text, error))
    return FALSE;
  for (gint64 i = 0; i < n; i++)
    {
      AntCell cell;
      ant_cell_next (text[i], text[i] + strlen (text[i]), '\t', &cell);
      if (value)
        value[i] = cell.number;
      else if (!ant_cell_integer (&cell, &whole[i]))
        whole[i] = -1;
    }
  return TRUE;
}

gboolean
ant_fits_table_read (AntFitsTable *table, guint column, gint64 from, gint64 n, double *value, GError **error)
{
  const AntFitsSeries *series = &table->series[column];
  if (series->is_text)
    return read_numbers_in_text (table, column, from, n, value, NULL, error);
  g_autofree double *all = series->per_sample > 1 ? g_new (double, n * series->per_sample) : NULL;
  while (n > 0)
    {
      LONGLONG row, element;
      int status = 0, any_null; /* CFITSIO 4.2 writes to it unasked */
      gint64 run = next_run (table, series, from, n, &row, &element);
      if (fits_read_col_dbl (table->file, series->column, row, element, run * series->per_sample, (double) NAN, all ? all : value,
                             &any_null, &status))
        return refuse_rows (table, row, status, error);
      for (gint64 i = 0; all && i < run; i++)
        value[i] = all[i * series->per_sample + series->element];
      if (series->decimal_at > 0 && !read_digits (table, series, from, run, value, error))
        return FALSE;
      from += run;
      value += run;
      n -= run;
    }
  return TRUE;
}

gboolean
ant_fits_table_read_whole (AntFitsTable *table, guint column, gint64 from, gint64 n, gint64 *value, GError **error)
{
  const AntFitsSeries *series = &table->series[column];
  if (series->is_text)
    return read_numbers_in_text (table, column, from, n, NULL, value, error);
  g_autofree LONGLONG *all = g_new (LONGLONG, n * series->per_sample + 1);
  while (n > 0)
    {
      LONGLONG row, element;
      int status = 0, any_null;
      gint64 run = next_run (table, series, from, n, &row, &element);
      fits_read_col_lnglng (table->file, series->column, row, element, run * series->per_sample, -1, all, &any_null, &status);
      if (status && status != NUM_OVERFLOW) /* what is beyond 64 bits is cut to them: a bad quality either way */
        return refuse_rows (table, row, status, error);
      for (gint64 i = 0; i < run; i++)
        value[i] = all[i * series->per_sample + series->element];
      from += run;
      value += run;
      n -= run;
    }
  return TRUE;
}

