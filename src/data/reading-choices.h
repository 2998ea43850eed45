/* reading-choices.h - what a person said about how a record is to be read. */
#pragma once

#include <glib.h>

/* NULL or 0 fields are found by the reader and said. */
typedef struct
{
  char *time_column, *value_column, *error_column, *quality_column; /* names, or numbers from 1; time may be "1+2" */
  char *time_format; /* "jd", "mjd", "jd-OFFSET", "iso", "ymd", "unix", "year-day", "year-month-day", "decimal-year", "days", "hours", "seconds" */
  char *time_scale;  /* "UTC", "TT", ... */
  char *time_zone;   /* of a local clock, hours ahead of UTC: "+01:00", "-7" */
  char *epoch;       /* what plain numbers count from: an ISO time or a JD, in the times' own scale */
  char *hdu;         /* of a FITS file: its name, or its number, 0 the primary one */
  char *index;       /* of a NetCDF file: where along further dimensions, "wavelength=3,band=1", from 1 */
  GArray *fill_values; /* of double: these and the usual ones count as missing; NULL = only the usual ones */
} AntReadingChoices;

/* The members that are words, with the names that files know them by; copies, comparison and the analysis file follow
 * this table. */
typedef struct
{
  const char *name;
  gsize offset; /* of a char * in AntReadingChoices */
} AntReadingWord;
extern const AntReadingWord ant_reading_word_table[];
extern const gsize ant_n_reading_words;
char **ant_reading_choices_word (AntReadingChoices *choices, const AntReadingWord *word);

void ant_reading_choices_clear (AntReadingChoices *choices);
/* A copy of its own; clear it. */
void ant_reading_choices_copy (const AntReadingChoices *choices, AntReadingChoices *copy);
gboolean ant_reading_choices_same (const AntReadingChoices *one, const AntReadingChoices *other);
/* Parse "time=1,value=tsi,error=4,quality=flag". */
gboolean ant_reading_choices_parse_columns (AntReadingChoices *choices, const char *text, GError **error);
/* Add the fill values of "-99, 0". */
gboolean ant_reading_choices_parse_fills (AntReadingChoices *choices, const char *text, GError **error);
char *ant_reading_choices_fills_text (const AntReadingChoices *choices); /* the same back; NULL: none. Caller frees */
