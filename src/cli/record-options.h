/* record-options.h - the options that say how a record is to be read, the same for every verb that takes one. */
#pragma once

#include <gio/gio.h>
#include "data/treatment.h"

typedef struct
{
  char *columns;     /* --column time=1,value=tsi,error=4,quality=flag */
  char *time_format; /* --time-format */
  char *time_scale;  /* --time-scale */
  char *time_zone;   /* --time-zone */
  char *epoch;       /* --epoch */
  char *index;       /* --index wavelength=3 */
  char *hdu;         /* --hdu */
  char *fill;        /* --fill -99,-999 */
  char *good;        /* --good 0,2 or 0x10042 */
} AntRecordOptions;

/* Add the options to a context; parsing fills `options` (start it as { 0 }). */
void ant_record_options_add (GOptionContext *context, AntRecordOptions *options);
void ant_record_options_clear (AntRecordOptions *options);
/* Put what was asked for into choices, which keep what they had else. FALSE with one sentence. */
gboolean ant_record_options_choose (const AntRecordOptions *options, AntReadingChoices *choices, GError **error);
/* Read the rows of a record ("-" = standard input) as the options say. NULL with one sentence. */
AntRecord *ant_record_options_read (const AntRecordOptions *options, const char *path, GCancellable *cancellable,
                                    GError **error);
/* Put --good into the grid's options: a hexadecimal number is a mask of bits that must all be clear, else a list of the
 * good values. The caller unrefs grid->good_values. FALSE with one sentence. */
gboolean ant_record_options_good (const AntRecordOptions *options, AntGridOptions *grid, GError **error);
