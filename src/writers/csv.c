/* csv.c - the pieces of a comma-separated table. */
#include "writers/csv.h"
#include <math.h>
#include <string.h>
#include "config.h"

void
ant_csv_text (GString *table, const char *text)
{
  if (!strpbrk (text, ",\"\r\n") && *text != '#')
    {
      g_string_append (table, text);
      return;
    }
  g_string_append_c (table, '"');
  for (; *text; text++)
    {
      if (*text == '"')
        g_string_append_c (table, '"');
      g_string_append_c (table, *text);
    }
  g_string_append_c (table, '"');
}

void
ant_csv_number (GString *table, const char *format, double number)
{
  char text[400]; /* the widest double of "%.17f" has 309 + 18 digits */
  if (isfinite (number))
    g_string_append (table, g_ascii_formatd (text, sizeof text, format, number));
}

void
ant_csv_comment (GString *table, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_autofree char *line = g_strdup_vprintf (format, arguments);
  va_end (arguments);
  g_strdelimit (line, "\r\n", ' ');
  g_string_append_printf (table, "# %s\n", line);
}

void
ant_csv_preamble (GString *table, const char *title, const AntRecord *record)
{
  const AntTimeReference *time = &record->time;
  ant_csv_comment (table, "%s (Antumbra %s)", title, ANT_VERSION);
  g_autofree char *name = ant_record_name (record);
  ant_csv_comment (table, "record: %s", name);
  ant_csv_comment (table, "SHA-256: %s", record->sha256 ? record->sha256 : "unknown");
  ant_csv_comment (table, "time scale: %s%s; clock at: %s", ant_time_scale_name (time->scale),
                   time->scale != ANT_SCALE_UNKNOWN && time->scale_assumed ? " (assumed)" : "",
                   time->place ? time->place : "unknown");
}
