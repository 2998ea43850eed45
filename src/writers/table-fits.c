/* table-fits.c - a table as a FITS binary table, made in memory by CFITSIO. */
#include "config.h"
#include "writers/table-private.h"

#include <fitsio.h>
#include <glib/gi18n.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "data/error.h"

#define BLOCK_ROWS 2048
#define CARD_TEXT 70 /* letters after COMMENT */
#define GROWTH (1 << 20) /* bytes by which the file in memory grows */

typedef struct
{
  fitsfile *file;
  void *bytes;
  size_t room;
  int status; /* CFITSIO's: once it is not 0, every call does nothing */
} Fits;

/* ASCII without controls, the only letters that FITS knows. */
static char *
ascii (const char *text)
{
  g_autofree char *valid = g_utf8_make_valid (text, -1);
  char *plain = g_str_to_ascii (valid, "C");
  for (char *c = plain; *c; c++)
    if (*c < 0x20 || *c > 0x7e)
      *c = '?';
  return plain;
}

static void
put_text (Fits *fits, const char *key, const char *text, const char *meaning)
{
  g_autofree char *plain = ascii (text), *comment = meaning ? ascii (meaning) : NULL;
  fits_write_key_longstr (fits->file, key, plain, comment, &fits->status);
}

static void
put_column_text (Fits *fits, const char *stem, guint number, const char *text)
{
  char key[FLEN_KEYWORD];
  g_snprintf (key, sizeof key, "%s%u", stem, number);
  if (text)
    put_text (fits, key, text, NULL);
}

/* "%.7f" -> "F17.7", so that readers show the digits that the CSV has. */
static char *
display_of (const char *format)
{
  int decimals = atoi (format + 2);
  return g_str_has_suffix (format, "f") ? g_strdup_printf ("F%d.%d", decimals + 10, decimals)
                                        : g_strdup_printf ("G%d.%d", decimals + 8, decimals);
}

static int
text_width (const AntTable *table, const AntTableColumn *column)
{
  gsize width = 1;
  for (gsize row = 0; row < table->n_rows; row++)
    {
      g_autofree char *text = column->text (table->rows, row), *plain = ascii (text);
      width = MAX (width, strlen (plain));
    }
  return (int) width;
}

static char *
form_of (const AntTable *table, const AntTableColumn *column)
{
  switch (column->kind)
    {
    case ANT_CELL_REAL: return g_strdup ("1D");
    case ANT_CELL_WHOLE: return g_strdup ("1J");
    case ANT_CELL_BITS: return g_strdup ("1I");
    case ANT_CELL_TEXT: return g_strdup_printf ("%dA", text_width (table, column));
    }
  g_return_val_if_reached (NULL);
}

static void
create (Fits *fits, const AntTable *table)
{
  guint n = table->columns->len;
  g_autoptr (GPtrArray) forms = g_ptr_array_new_with_free_func (g_free);
  g_autofree char **names = g_new (char *, n), **units = g_new (char *, n);
  g_autofree char *extension = g_strdup (table->name);
  for (guint c = 0; c < n; c++)
    {
      const AntTableColumn *column = &g_array_index (table->columns, AntTableColumn, c);
      names[c] = (char *) (gsize) column->name; /* CFITSIO only reads them */
      units[c] = (char *) (gsize) (column->unit ? column->unit : "");
      g_ptr_array_add (forms, form_of (table, column));
    }
  fits_create_memfile (&fits->file, &fits->bytes, &fits->room, GROWTH, realloc, &fits->status);
  fits_create_tbl (fits->file, BINARY_TBL, (LONGLONG) table->n_rows, (int) n, names, (char **) forms->pdata, units, extension,
                   &fits->status);
}

/* Times are JD in the record's scale; a clock of no known scale is "local" (Rots et al. 2015, table 2). */
static void
put_times (Fits *fits, const AntTable *table)
{
  const char *scale = ant_table_scale_word (table->record, "LOCAL");
  if (!table->record->time.origin_known)
    return;
  put_text (fits, "TIMESYS", scale, "time scale of the JD columns");
  put_text (fits, "TREFPOS", ant_table_place_word (table->record), "where the clock stood");
  put_text (fits, "TIMEUNIT", "d", NULL);
  fits_write_key_dbl (fits->file, "JDREF", 0.0, -15, "JD columns count from JD 0", &fits->status);
  for (guint c = 0; c < table->columns->len; c++)
    if (g_array_index (table->columns, AntTableColumn, c).is_jd)
      {
        put_column_text (fits, "TCTYP", c + 1, scale);
        put_column_text (fits, "TCUNI", c + 1, "d");
      }
}

static void
put_columns (Fits *fits, const AntTable *table)
{
  for (guint c = 0; c < table->columns->len; c++)
    {
      const AntTableColumn *column = &g_array_index (table->columns, AntTableColumn, c);
      g_autofree char *display = column->kind == ANT_CELL_REAL ? display_of (column->format) : NULL;
      put_column_text (fits, "TDISP", c + 1, display);
      put_column_text (fits, "TUCD", c + 1, column->ucd);
      put_column_text (fits, "TCOMM", c + 1, column->meaning);
    }
}

/* COMMENT cards, broken between words. */
static void
put_note (Fits *fits, const char *text)
{
  g_autofree char *plain = ascii (text);
  for (char *line = plain; *line;)
    {
      gsize length = strlen (line), cut = MIN (length, CARD_TEXT);
      while (length > CARD_TEXT && cut > 0 && line[cut] != ' ')
        cut--;
      cut = cut ? cut : CARD_TEXT;
      g_autofree char *card = g_strndup (line, cut);
      fits_write_comment (fits->file, card, &fits->status);
      line += cut + (line[cut] == ' ');
    }
}

static void
put_facts (Fits *fits, const AntTable *table)
{
  const AntRecord *record = table->record;
  put_text (fits, "CREATOR", "Antumbra " ANT_VERSION, NULL);
  g_autofree char *name = ant_record_name (record);
  put_text (fits, "RECORD", name, NULL);
  put_text (fits, "SHA256", record->sha256 ? record->sha256 : "unknown", NULL);
  for (guint i = 0; i < table->facts->len; i++)
    {
      const AntTableFact *fact = &g_array_index (table->facts, AntTableFact, i);
      if (fact->text)
        put_text (fits, fact->key, fact->text, fact->meaning);
      else if (isfinite (fact->number))
        fits_write_key_dbl (fits->file, fact->key, fact->number, -10, fact->meaning, &fits->status);
    }
  for (guint i = 0; i < table->notes->len; i++)
    put_note (fits, g_ptr_array_index (table->notes, i));
}

static void
put_texts (Fits *fits, const AntTable *table, const AntTableColumn *column, int number, gsize first, gsize n)
{
  g_autoptr (GPtrArray) texts = g_ptr_array_new_with_free_func (g_free);
  for (gsize i = 0; i < n; i++)
    {
      g_autofree char *text = column->text (table->rows, first + i);
      g_ptr_array_add (texts, ascii (text));
    }
  fits_write_col (fits->file, TSTRING, number, (LONGLONG) first + 1, 1, (LONGLONG) n, texts->pdata, &fits->status);
}

static void
put_numbers (Fits *fits, const AntTable *table, const AntTableColumn *column, int number, gsize first, gsize n)
{
  double values[BLOCK_ROWS];
  for (gsize i = 0; i < n; i++)
    values[i] = column->number (table->rows, first + i);
  fits_write_col (fits->file, TDOUBLE, number, (LONGLONG) first + 1, 1, (LONGLONG) n, values, &fits->status);
}

static void
put_rows (Fits *fits, const AntTable *table)
{
  for (gsize first = 0; first < table->n_rows && !fits->status; first += BLOCK_ROWS)
    for (guint c = 0; c < table->columns->len; c++)
      {
        const AntTableColumn *column = &g_array_index (table->columns, AntTableColumn, c);
        gsize n = MIN (BLOCK_ROWS, table->n_rows - first);
        (column->kind == ANT_CELL_TEXT ? put_texts : put_numbers) (fits, table, column, (int) c + 1, first, n);
      }
}

/* The checksums of an HDU (FITS 4.0, appendix J), without the date that CFITSIO would put beside them. */
static void
seal (Fits *fits, int hdu)
{
  unsigned long data, all;
  char text[FLEN_VALUE];
  fits_movabs_hdu (fits->file, hdu, NULL, &fits->status);
  fits_write_key_str (fits->file, "CHECKSUM", "0000000000000000", "HDU checksum", &fits->status);
  fits_set_hdustruc (fits->file, &fits->status);
  fits_get_chksum (fits->file, &data, &all, &fits->status);
  g_snprintf (text, sizeof text, "%lu", data);
  fits_write_key_str (fits->file, "DATASUM", text, "data unit checksum", &fits->status);
  fits_set_hdustruc (fits->file, &fits->status); /* the header's end is written before it is summed */
  fits_get_chksum (fits->file, &data, &all, &fits->status);
  fits_encode_chksum (all, TRUE, text);
  fits_modify_key_str (fits->file, "CHECKSUM", text, "&", &fits->status);
}

GBytes *
ant_table_fits (const AntTable *table, GError **error)
{
  Fits fits = { .status = 0 };
  LONGLONG end = 0;
  create (&fits, table);
  put_facts (&fits, table);
  put_times (&fits, table);
  put_columns (&fits, table);
  put_rows (&fits, table);
  seal (&fits, 1);
  seal (&fits, 2);
  fits_get_hduaddrll (fits.file, NULL, NULL, &end, &fits.status);
  int failed = fits.status, closing = 0;
  if (fits.file)
    fits_close_file (fits.file, failed ? &closing : &failed);
  if (!failed)
    return g_bytes_new_with_free_func (fits.bytes, (gsize) end, free, fits.bytes);
  char reason[FLEN_STATUS];
  fits_get_errstatus (failed, reason);
  free (fits.bytes);
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("The FITS table “%s” cannot be made: %s"), table->title, reason);
  return NULL;
}
