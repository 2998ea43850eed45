/* rows.c - small records made of rows for the tests of the data room. */
#include "rows.h"
#include <math.h>
#include <string.h>
#include "data/error.h"

double
test_wiggle_ppm (gsize i)
{
  double x = (double) i;
  return 70.0 * sin (0.37 * x) + 50.0 * sin (0.0113 * x * sqrt (x + 1.0));
}

AntRecord *
test_rows (gsize n, double start_d, double step_d)
{
  AntRecord *record = ant_record_new ();
  record->n_rows = n;
  record->time_d = g_new (double, n);
  record->value = g_new (double, n);
  record->line = g_new (guint32, n);
  record->flags = g_new0 (guint16, n);
  record->path = g_strdup ("rows.txt");
  record->stamp = ANT_AT_MIDDLE;
  for (gsize i = 0; i < n; i++)
    {
      record->time_d[i] = start_d + (double) i * step_d;
      record->value[i] = 1361.0 * (1.0 + test_wiggle_ppm (i) * 1e-6);
      record->line[i] = (guint32) i + 1;
    }
  return record;
}

gboolean
test_said (const AntRecord *record, const char *fragment)
{
  for (guint i = 0; i < record->said->len; i++)
    if (strstr (g_ptr_array_index (record->said, i), fragment))
      return TRUE;
  return FALSE;
}

void
test_grid (AntRecord *record, const AntGridOptions *options)
{
  g_autoptr (GError) error = NULL;
  gboolean made = ant_record_make_grid (record, options, &error);
  g_assert_no_error (error);
  g_assert_true (made);
}

void
test_refused (AntRecord *record, const AntGridOptions *options, const char *fragment)
{
  g_autoptr (GError) error = NULL;
  g_assert_false (ant_record_make_grid (record, options, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_true (g_str_has_prefix (error->message, "rows.txt: "));
  g_assert_null (strchr (error->message, '\n'));
  if (!strstr (error->message, fragment))
    g_error ("\"%s\" does not contain \"%s\"", error->message, fragment);
}
