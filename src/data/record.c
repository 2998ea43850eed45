/* record.c - an irradiance record's life, what was said of it, and the names of its flags. */
#include "data/record.h"
#include <glib/gi18n.h>
#include <math.h>
#include "core/units.h"
#include "data/error.h"

static const struct
{
  const char *name;
  const char *description;
} flag_table[ANT_N_FLAGS] = {
  { "fill", N_("A fill value, an empty cell or not a number.") },
  { "quality", N_("The record's own quality column says bad.") },
  { "duplicate", N_("A second row at the time of an earlier one.") },
  { "hand", N_("Masked by the analyst.") },
  { "excluded", N_("Inside an excluded span, or outside the limits of the scan.") },
  { "dark", N_("Dark or covered: far from the running 5-day median, as in an eclipse or at night.") },
  { "spike", N_("An isolated outlier: left out of the noise fit, still searched.") },
  { "no-time", N_("Its time cannot be read.") },
};

const char *
ant_flag_name (unsigned bit_index)
{
  g_return_val_if_fail (bit_index < ANT_N_FLAGS, "");
  return flag_table[bit_index].name;
}

const char *
ant_flag_description (unsigned bit_index)
{
  g_return_val_if_fail (bit_index < ANT_N_FLAGS, "");
  return _(flag_table[bit_index].description);
}

AntRecord *
ant_record_new (void)
{
  AntRecord *record = g_new0 (AntRecord, 1);
  record->said = g_ptr_array_new_with_free_func (g_free);
  record->columns = g_ptr_array_new_with_free_func ((GDestroyNotify) ant_column_free);
  record->dark_spans = g_array_new (FALSE, FALSE, sizeof (AntSpan));
  record->gaps = g_array_new (FALSE, FALSE, sizeof (AntSpan));
  record->time.own_unit_d = 1.0;
  record->swing = record->swing_sigma = (double) NAN;
  record->ref_count = 1;
  return record;
}

AntRecord *
ant_record_ref (AntRecord *record)
{
  g_atomic_int_inc (&record->ref_count);
  return record;
}

/* The series is a view that promises not to write; here, at the end of its owner, that promise ends. */
static void
free_view (const void *view)
{
  g_free ((gpointer) (guintptr) view);
}

void
ant_record_unref (AntRecord *record)
{
  if (!record || !g_atomic_int_dec_and_test (&record->ref_count))
    return;
  g_free (record->time_d);
  g_free (record->value);
  g_free (record->error);
  g_free (record->quality);
  g_free (record->line);
  g_free (record->flags);
  g_free (record->path);
  g_free (record->sha256);
  g_free (record->format);
  g_free (record->part);
  g_free (record->time_name);
  g_free (record->value_name);
  g_free (record->error_name);
  g_free (record->quality_name);
  g_free (record->value_unit);
  g_free (record->value_remark);
  ant_time_reference_clear (&record->time);
  g_ptr_array_unref (record->columns);
  g_ptr_array_unref (record->said);
  free_view (record->series.value_ppm);
  free_view (record->series.error_ppm);
  free_view (record->series.bin_count);
  free_view (record->series.spike);
  g_free (record->place);
  g_free (record->slip_d);
  g_array_unref (record->dark_spans);
  g_array_unref (record->gaps);
  g_free (record);
}

void
ant_record_say (AntRecord *record, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_ptr_array_add (record->said, g_strdup_vprintf (format, arguments));
  va_end (arguments);
}

char *
ant_record_row_text (const AntRecord *record, guint32 line)
{
  return g_strdup_printf (record->part ? _("row %u") : _("line %u"), line);
}

char *
ant_record_rows_text (const AntRecord *record, guint32 first, guint32 last)
{
  return g_strdup_printf (record->part ? _("rows %u to %u") : _("lines %u to %u"), first, last);
}

gboolean
ant_record_refuse (const AntRecord *record, GError **error, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  char *sentence = g_strdup_vprintf (format, arguments);
  va_end (arguments);
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, "%s: %s%s%s", record->path ? record->path : "-",
               record->part ? record->part : "", record->part ? ": " : "", sentence);
  g_free (sentence);
  return FALSE;
}

char *
ant_record_name (const AntRecord *record)
{
  g_autofree char *name = g_path_get_basename (record->path ? record->path : "-");
  return g_filename_display_name (name);
}

double
ant_record_value (const AntRecord *record, double ppm)
{
  return record->median * (1.0 + ppm * ANT_PPM);
}

float *
ant_record_column_on_grid (const AntRecord *record, const AntColumn *column)
{
  gsize n = record->series.n;
  float *grid = g_new0 (float, n);
  g_autofree guint32 *count = g_new0 (guint32, n);
  for (gsize i = 0; i < record->n_rows; i++)
    if (record->place[i] >= 0 && !isnan (column->value[i]))
      {
        gint64 place = record->place[i];
        grid[place] += (column->value[i] - grid[place]) / (float) ++count[place];
      }
  for (gsize k = 0; k < n; k++)
    if (count[k] == 0)
      grid[k] = NAN;
  return grid;
}
