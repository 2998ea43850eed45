/* rows.c - a record's rows as the readers give them, every digit: outside-rows FILE [COLUMNS [INDEX]], for checks against other
 * libraries. First line: origin JD in two parts, scale, number of rows; then a row a line: elapsed days, value, error, quality,
 * flags. */
#include "readers/reader.h"

#include <math.h>
#include <stdio.h>

int
main (int argc, char **argv)
{
  g_autoptr (GError) error = NULL;
  AntReadingChoices choices = { .index = argc > 3 ? g_strdup (argv[3]) : NULL };
  if (argc < 2 || (argc > 2 && *argv[2] && !ant_reading_choices_parse_columns (&choices, argv[2], &error)))
    return 2;
  g_autoptr (AntRecord) record = ant_reader_open (argv[1], &choices, NULL, &error);
  ant_reading_choices_clear (&choices);
  if (!record)
    {
      fprintf (stderr, "%s\n", error->message);
      return 3;
    }
  printf ("%.17g %.17g %s %zu\n", record->time.origin_jd1, record->time.origin_jd2, ant_time_scale_name (record->time.scale),
          record->n_rows);
  for (gsize i = 0; i < record->n_rows; i++)
    printf ("%.17g %.17g %.17g %" G_GINT64_FORMAT " %u\n", record->time_d[i], record->value[i],
            record->error ? record->error[i] : (double) NAN, record->quality ? record->quality[i] : 0, record->flags[i]);
  return 0;
}
