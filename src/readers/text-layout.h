/* text-layout.h - how a text table is laid out: its separator, where its data begin, its column names, and what each column
 * holds, judged on the first lines of the file. */
#pragma once

#include <glib.h>

#define ANT_MOST_COLUMNS 1024
#define ANT_SAMPLE_BYTES (512 * 1024)

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
} AntTextColumn;

typedef struct
{
  char separator;       /* ',', ';', '\t', or ' ' for runs of blanks */
  guint n_columns;
  AntTextColumn *columns;
  guint32 first_row;    /* line number of the first row of data */
  GPtrArray *header;    /* char*: the lines before it, marks included, valid UTF-8 */
  guint counted;        /* header lines that the first line claims, 0 if it does not */
} AntTextLayout;

/* Judge the sample: n bytes of whole lines and a readable byte after them. NULL with one sentence if it holds no table. */
AntTextLayout *ant_text_layout_find (const char *name, const char *sample, gsize n, GError **error);
void ant_text_layout_free (AntTextLayout *layout);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntTextLayout, ant_text_layout_free)
/* One of the lower-case words of the column's name ("Time_dec" has "time" and "dec") is in the list, NULL-terminated. */
gboolean ant_text_column_has_word (const AntTextColumn *column, const char *const *words);
/* The column of this name or number (from 1), -1 if there is none. */
int ant_text_layout_column (const AntTextLayout *layout, const char *name);
/* The sentence for a name that is none, with those there are. */
void ant_text_layout_no_column (const AntTextLayout *layout, const char *name, GError **error);
