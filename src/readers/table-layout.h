/* table-layout.h - the columns of a table, whatever its format: their names, and what each was found to hold in a sample of
 * its rows. What is a time, a value, an error or a quality is told from this alone. */
#pragma once

#include <glib.h>
#include "readers/text-cell.h"

#define ANT_MOST_COLUMNS 1024

typedef struct
{
  char *name;  /* "" if the file gives none */
  char *label; /* the name for people: as given, or "column 3" */
  char *unit;  /* as written in the header, or NULL */
  char *remark; /* what else the header says of it, or NULL */
  gboolean has_zone; /* its ISO times name UTC or an offset from it */
  guint n_cells, n_missing, n_numbers, n_text;
  guint n_iso_time, n_iso_date;  /* text cells that are ISO dates with, and without, a time of day */
  guint n_clock;                 /* text cells such as 07:12:05 */
  guint n_whole, n_ymd;          /* numbers without fraction; numbers that read as YYYYMMDD[.fff] */
  guint n_clock_digits;          /* whole numbers that read as hhmmss */
  guint n_jd;                    /* numbers that a full Julian date of the years 216 to 3501 has */
  guint n_padded;                /* numbers such as 0007, which are codes more than counts */
  guint n_up, n_down;            /* steps from number to number */
  double least, greatest;        /* of the numbers, absurdly great ones aside; NaN without any */
} AntTableColumn;

typedef struct
{
  gboolean is_text;     /* rows are lines of the file */
  char *place;          /* "HDU 1 (FLUXES)" for refusals of columns, or NULL for the line of the first row */
  guint n_columns;
  AntTableColumn *columns;
  gboolean has_epoch;   /* the file states what plain numbers of time count from: they are not to be guessed at */
  guint32 first_row;    /* line number of the first row of data; 1 if rows are no lines */
  GPtrArray *header;    /* char*: the lines before it, marks included, valid UTF-8 */
  /* Text only. */
  char separator;       /* ',', ';', '\t', or ' ' for runs of blanks */
  guint counted;        /* header lines that the first line claims, 0 if it does not */
} AntTableLayout;

AntTableLayout *ant_table_layout_new (guint n_columns); /* no names yet, empty header */
void ant_table_layout_free (AntTableLayout *layout);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntTableLayout, ant_table_layout_free)
/* Count a cell. *previous is the column's last number, NaN at first. */
void ant_table_column_study (AntTableColumn *column, const AntCell *cell, double *previous);
/* One of the lower-case words of the column's name ("Time_dec" has "time" and "dec") is in the list, NULL-terminated. */
gboolean ant_table_column_has_word (const AntTableColumn *column, const char *const *words);
/* n of the column's cells, the missing ones aside, are more than half. */
gboolean ant_table_column_mostly (const AntTableColumn *column, guint n);
/* Labels from the names, "column 3" where there is none. */
void ant_table_layout_label (AntTableLayout *layout);
/* The column of this name or number (from 1), -1 if there is none. */
int ant_table_layout_column (const AntTableLayout *layout, const char *name);
/* The sentence for a name that is none, with those there are. */
void ant_table_layout_no_column (const AntTableLayout *layout, const char *name, GError **error);
/* "line 37" or "HDU 1 (FLUXES)": where the columns stand. Caller frees. */
char *ant_table_layout_place (const AntTableLayout *layout);
