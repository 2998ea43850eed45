/* fits-table.h - the tables of a FITS file as columns of series: scalars, elements of vector cells, and series that stand whole
 * in the cells of one row. */
#pragma once

#include <fitsio.h>
#include <gio/gio.h>
#include "readers/table-layout.h"

/* Where the samples of one column stand: sample k of a row's cell is its element base + k * per_sample + element. */
typedef struct
{
  int column;           /* of the file, from 1 */
  gboolean is_text;
  guint text_width;     /* bytes of a text cell, or of the digits of an ASCII table */
  gint64 base, per_sample, element;
  gint64 decimal_at;    /* numbers of an ASCII table: the byte of the row, from 1, where their digits stand; 0 elsewhere */
} AntFitsSeries;

typedef struct
{
  fitsfile *file;       /* borrowed; stands at this HDU */
  const char *path;     /* borrowed, for sentences */
  int hdu;              /* 0 = primary */
  gint64 n_samples;     /* rows, or rows times the samples of a cell */
  gint64 in_cell;       /* samples of a row: 1, or more where series stand in cells */
  AntTableLayout *layout;
  AntFitsSeries *series; /* [layout->n_columns] */
  GPtrArray *left_out;  /* char*: columns that are no numbers, dates or series */
} AntFitsTable;

/* Move to an HDU and look at its columns and first rows. NULL with one sentence: no table, a header that promises more than
 * the file's n_bytes hold, damage. */
AntFitsTable *ant_fits_table_open (fitsfile *file, const char *path, gint64 n_bytes, int hdu, GError **error);
void ant_fits_table_free (AntFitsTable *table);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntFitsTable, ant_fits_table_free)

/* n samples from the one numbered `from` (0-based) of a column of numbers; NaN where the file says null. */
gboolean ant_fits_table_read (AntFitsTable *table, guint column, gint64 from, gint64 n, double *value, GError **error);
/* The same as whole numbers; -1 where null. */
gboolean ant_fits_table_read_whole (AntFitsTable *table, guint column, gint64 from, gint64 n, gint64 *value, GError **error);
/* Texts of a column of them: text[i] points to text_width + 1 bytes. */
gboolean ant_fits_table_read_text (AntFitsTable *table, guint column, gint64 from, gint64 n, char **text, GError **error);
/* Rows that CFITSIO likes to read at a time. */
gint64 ant_fits_table_block (AntFitsTable *table);

/* Keywords of the HDU, with the primary header's where it has none. */
char *ant_fits_text (AntFitsTable *table, const char *key); /* NULL if absent or empty; caller frees */
gboolean ant_fits_number (AntFitsTable *table, const char *key, double *value);
/* The same for "TCTYP%d" of a column. */
char *ant_fits_column_text (AntFitsTable *table, const char *stem, guint column);
/* "HDU 1 (FLUXES)". Caller frees. */
char *ant_fits_place (fitsfile *file, int hdu);
/* Set *error to what CFITSIO says of a status, with the place; returns FALSE. */
gboolean ant_fits_refuse (fitsfile *file, const char *path, const char *place, int status, GError **error);
