/* column.h - a further column of a record: housekeeping or another band, beside the value that is searched. */
#pragma once

#include <glib.h>

/* Values are kept as float: seven digits are enough for a strip and for a fit of temperatures (0.1 ppm of an irradiance), and a
 * record with ten such columns takes half the memory. */
typedef struct
{
  char *name;      /* as the file gives it, or "column 3" */
  char *unit;      /* as written, or NULL */
  float *value;    /* [n_rows] of the record; NaN where missing, fill or no number */
  gsize n_missing; /* of them */
} AntColumn;

/* Takes value; the words are copied. */
AntColumn *ant_column_new (const char *name, const char *unit, float *value, gsize n_rows);
/* "temperature, K", the unit only where the name does not have it already. Caller frees. */
char *ant_column_title (const AntColumn *column);
/* "temperature, K, 120 of 4320 missing". Caller frees. */
char *ant_column_words (const AntColumn *column, gsize n_rows);
/* The wavelength that a name tells of a band ("irradiance 500 nm", "red_0.86um"), nm; NaN where it tells none. */
double ant_column_wavelength_nm (const char *name);
/* It names an error, a count, a flag or a time rather than a quantity that could move with an event. */
gboolean ant_column_is_bookkeeping (const char *name);
void ant_column_free (AntColumn *column); /* NULL is fine */
