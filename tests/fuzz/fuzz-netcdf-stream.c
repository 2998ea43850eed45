/* fuzz-netcdf-stream.c - whatever the NetCDF child writes, and whatever a classic header says, is a record or a refusal.
 *
 * Input: 4 bytes, big-endian, the length of the contents; the contents; the columns. The contents are tried as a classic
 * file too. The library itself stays out: it runs in the child. */
#include "data/error.h"
#include "readers/cf-time.h"
#include "readers/netcdf-classic.h"
#include "readers/netcdf-rows.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "fuzz-door.h"

static void
promise (gboolean kept)
{
  if (!kept)
    abort ();
}

static void
read_times (const AntNetcdfContents *contents)
{
  for (guint i = 0; i < contents->variables->len; i++)
    {
      const AntNetcdfVariable *variable = g_ptr_array_index (contents->variables, i);
      const char *units = ant_netcdf_text (variable->attributes, "units");
      AntCfTime time;
      g_autoptr (GError) error = NULL;
      if (!units || !ant_cf_time_parse (units, ant_netcdf_text (variable->attributes, "calendar"),
                                        ant_netcdf_text (variable->attributes, "units_metadata"), NULL, &time, &error))
        continue;
      for (double number = -1e9; number < 1e10; number = number < 0.0 ? -number / 7.0 : number * 3.7)
        promise (!isinf (ant_cf_time_read (&time, number)));
    }
}

static void
read_rows (const AntNetcdfContents *contents, const guint8 *bytes, gsize n)
{
  g_autoptr (GError) error = NULL;
  g_autoptr (AntNetcdfColumns) columns = ant_netcdf_columns_choose (contents, NULL, n, &error);
  promise ((columns != NULL) != (error != NULL));
  if (!columns)
    return;
  for (guint c = 0; c < columns->n_columns; c++)
    {
      g_autofree char *text = ant_netcdf_pick_text (contents, &columns->column[c]);
      promise (*text != 0);
    }
  g_autoptr (AntRecord) record = ant_record_new ();
  record->path = g_strdup ("any");
  record->format = g_strdup ("NetCDF");
  gboolean filled = ant_netcdf_rows_fill (contents, columns, bytes, n, NULL, NULL, record, &error);
  promise (filled == (error == NULL));
  if (error)
    promise (error->domain == ANT_ERROR && !strchr (error->message, '\n') && g_utf8_validate (error->message, -1, NULL));
  for (gsize i = 0; filled && i < record->n_rows; i++)
    promise (!isinf (record->time_d[i]) && !isinf (record->value[i])
             && isnan (record->time_d[i]) == ((record->flags[i] & ANT_FLAG_NO_TIME) != 0));
}

int
LLVMFuzzerTestOneInput (const uint8_t *bytes, size_t n)
{
  guint64 needed;
  if (n < 4)
    return 0;
  gsize length = MIN ((gsize) bytes[0] << 24 | (gsize) bytes[1] << 16 | (gsize) bytes[2] << 8 | bytes[3], n - 4);
  ant_netcdf_classic_length (bytes, n, &needed);
  ant_netcdf_classic_length (bytes + 4, length, &needed);
  g_autoptr (AntNetcdfContents) contents = ant_netcdf_contents_parse (bytes + 4, length);
  if (contents)
    {
      read_times (contents);
      read_rows (contents, bytes + 4 + length, n - 4 - length);
    }
  return 0;
}
