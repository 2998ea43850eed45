/* table.h - a table as data: what its columns are (name, unit, digits, UCD, meaning) and where its cells come from, said
 * once and written as CSV, as a FITS binary table and as a VOTable.
 *
 * CSV has comment lines in front, numbers with the digits of `format`. FITS (4.0; time keywords of Rots et al. 2015, A&A
 * 574, A36) holds the full double, NaN where a number is not known; its `format` gives the CSV's digits again. VOTable
 * (1.4, with TIMESYS and the UCD1+ of the columns) holds the CSV's digits. The same table gives the same bytes: no date
 * of writing anywhere. Words in tables are not translated: a table is data, and FITS headers know ASCII only.
 *
 * A maker fills in an AntTable on the heap, whose cells are asked for while it is written; what `rows` and `record` point
 * to must live that long. One thread at a time for one table. */
#pragma once

#include "data/record.h"

typedef enum
{
  ANT_CELL_REAL,  /* number () */
  ANT_CELL_WHOLE, /* number (), always known; 32 bits, signed */
  ANT_CELL_TEXT,  /* text () */
  ANT_CELL_BITS,  /* text () in CSV and VOTable, number () of up to 15 bits in FITS */
} AntCellKind;

typedef struct
{
  const char *name;     /* CSV's header, TTYPE, FIELD's name */
  AntCellKind kind;
  const char *format;   /* REAL: printf format of one double */
  const char *unit;     /* as FITS and VOUnits both have it; NULL: none. 10**-6 is ppm */
  const char *ucd;      /* UCD1+ words; NULL: none fits */
  const char *meaning;  /* one line; NULL where the name says it all */
  gboolean is_jd;       /* a JD in the record's own scale and place */
  double (*number) (gconstpointer rows, gsize row); /* NaN: not known */
  char *(*text) (gconstpointer rows, gsize row);    /* the caller's to free */
} AntTableColumn;

/* One more thing to know about a table, a keyword in FITS and an INFO in VOTable: a text, or a number (left out if NaN). */
typedef struct
{
  const char *key;      /* 8 characters at most, A-Z and 0-9 */
  const char *text;     /* NULL: number */
  double number;
  const char *meaning;
} AntTableFact;

typedef struct
{
  const char *title;    /* "Dips"; static */
  const char *name;     /* "DIPS": EXTNAME; static */
  const AntRecord *record;
  GPtrArray *notes;     /* char*: sentences for people; comment lines in CSV and FITS, the description in VOTable */
  GArray *facts;        /* of AntTableFact, whose strings are static */
  GArray *columns;      /* of AntTableColumn */
  gsize n_rows;
  gconstpointer rows;
  GDestroyNotify rows_free; /* NULL: borrowed */
} AntTable;

/* An empty one. */
AntTable *ant_table_new (const char *title, const char *name, const AntRecord *record);
void ant_table_free (AntTable *table); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntTable, ant_table_free)
void ant_table_note (AntTable *table, const char *format, ...) G_GNUC_PRINTF (2, 3);
void ant_table_fact_number (AntTable *table, const char *key, double number, const char *meaning);
void ant_table_add_columns (AntTable *table, gsize n, const AntTableColumn *column);
/* Fill in where the rows are. */
void ant_table_set_rows (AntTable *table, gsize n_rows, gconstpointer rows, GDestroyNotify rows_free);

typedef enum
{
  ANT_TABLE_CSV,
  ANT_TABLE_FITS,
  ANT_TABLE_VOTABLE,
} AntTableFormat;
#define ANT_N_TABLE_FORMATS 3

const char *ant_table_ending (AntTableFormat format);       /* ".csv", ".fits", ".vot" */
const char *ant_table_format_name (AntTableFormat format);  /* "csv", "fits", "votable" */
/* From the ending of a path, in any case (.vot, .votable and .xml are VOTables). FALSE with one sentence for another. */
gboolean ant_table_format_of (const char *path, AntTableFormat *format, GError **error);

/* The whole file, in memory. NULL with one sentence (ANT_ERROR_WRITE). */
GBytes *ant_table_bytes (const AntTable *table, AntTableFormat format, GError **error);
/* As CSV. Caller frees. */
GString *ant_table_text (const AntTable *table);
