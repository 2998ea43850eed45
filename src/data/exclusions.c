/* exclusions.c - the list of spans a scan leaves out. */
#include "data/exclusions.h"
#include <gio/gio.h>
#include <glib/gi18n.h>
#include <string.h>
#include "data/error.h"
#include "data/record.h"

#define LARGEST_FILE (256 << 20)
#define N_FIELDS 3
/* A time read back from its text may be off by this much (decimal years are written to 16 ms). */
#define ROUNDING_D 5e-7

/* Cut one field off a line of comma-separated text; a quoted field may hold commas and doubled quotes. Returns the
 * rest, or NULL after the last field. */
static const char *
cut_field (const char *line, GString *field)
{
  g_string_truncate (field, 0);
  while (*line == ' ' || *line == '\t')
    line++;
  if (*line == '"')
    for (line++; *line; line++)
      {
        if (*line == '"' && *++line != '"')
          break;
        g_string_append_c (field, *line);
      }
  while (*line && *line != ',')
    g_string_append_c (field, *line++);
  g_strchomp (field->str);
  field->len = strlen (field->str);
  return *line == ',' ? line + 1 : NULL;
}

static gboolean
refuse_line (const char *name, gsize number, GError **error, const char *found)
{
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
               _("%s: line %zu: %s; expected start,end,reason or an earlier flags.csv"), name, number, found);
  return FALSE;
}

static gboolean
add_span_line (GArray *spans, GString *fields[N_FIELDS], const AntTimeReference *reference, const char *name,
               gsize number, GError **error)
{
  AntSpan span;
  g_autoptr (GError) problem = NULL;
  if (!ant_time_reference_parse (reference, fields[0]->str, &span.start_d, &problem) ||
      !ant_time_reference_parse (reference, fields[1]->str, &span.end_d, &problem))
    return refuse_line (name, number, error, problem->message);
  if (span.end_d < span.start_d)
    return refuse_line (name, number, error, _("the span ends before it begins"));
  g_array_append_val (spans, span);
  return TRUE;
}

/* Whether one of the names between bars is one that stands for the analyst's or the grid's exclusion. */
static gboolean
is_exclusion (const char *flags)
{
  static const AntFlag exclusions[] = { ANT_FLAG_HAND, ANT_FLAG_EXCLUDED, ANT_FLAG_DARK };
  g_auto (GStrv) names = g_strsplit (flags, "|", -1);
  for (gsize i = 0; i < G_N_ELEMENTS (exclusions); i++)
    if (g_strv_contains ((const char *const *) names, ant_flag_name ((unsigned) g_bit_nth_lsf (exclusions[i], -1))))
      return TRUE;
  return FALSE;
}

/* A row of flags.csv; rows that follow each other in the file they came from are one span. */
static gboolean
add_flag_line (GArray *spans, guint64 *last_row, GString *fields[N_FIELDS], const AntTimeReference *reference,
               const char *name, gsize number, GError **error)
{
  double time_d;
  guint64 row;
  g_autoptr (GError) problem = NULL;
  if (!is_exclusion (fields[2]->str) || fields[1]->len == 0)
    return TRUE;
  if (!g_ascii_string_to_unsigned (fields[0]->str, 10, 0, G_MAXUINT32, &row, &problem) ||
      !ant_time_reference_parse (reference, fields[1]->str, &time_d, &problem))
    return refuse_line (name, number, error, problem->message);
  AntSpan *last = spans->len > 0 ? &g_array_index (spans, AntSpan, spans->len - 1) : NULL;
  if (last && row == *last_row + 1 && time_d >= last->start_d)
    last->end_d = MAX (last->end_d, time_d + ROUNDING_D);
  else
    {
      AntSpan span = { time_d - ROUNDING_D, time_d + ROUNDING_D };
      g_array_append_val (spans, span);
    }
  *last_row = row;
  return TRUE;
}

static gboolean
parse_lines (GArray *spans, GString *fields[N_FIELDS], const char *name, const char *text,
             const AntTimeReference *reference, GError **error)
{
  gboolean header_may_come = TRUE, of_flags = FALSE;
  guint64 last_row = 0;
  gsize number = 0;
  if (g_str_has_prefix (text, "\xEF\xBB\xBF"))
    text += 3;
  while (*text)
    {
      gsize length = strcspn (text, "\n");
      g_autofree char *line = g_strstrip (g_strndup (text, length));
      text += length + (text[length] == '\n');
      number++;
      if (*line == 0 || *line == '#')
        continue;
      if (header_may_come)
        {
          header_may_come = FALSE;
          of_flags = strcmp (line, ANT_FLAGS_HEADER) == 0;
          if (of_flags || g_ascii_strncasecmp (line, "start,end", 9) == 0)
            continue;
        }
      const char *rest = line;
      int n = 0;
      for (; n < N_FIELDS && rest; n++)
        rest = cut_field (rest, fields[n]);
      if (n < (of_flags ? 3 : 2))
        return refuse_line (name, number, error, _("too few fields"));
      if (of_flags ? !add_flag_line (spans, &last_row, fields, reference, name, number, error)
                   : !add_span_line (spans, fields, reference, name, number, error))
        return FALSE;
    }
  return TRUE;
}

GArray *
ant_exclusions_parse (const char *name, const char *text, const AntTimeReference *reference, GError **error)
{
  g_autoptr (GArray) spans = g_array_new (FALSE, FALSE, sizeof (AntSpan));
  GString *fields[N_FIELDS];
  for (int i = 0; i < N_FIELDS; i++)
    fields[i] = g_string_new (NULL);
  gboolean read = parse_lines (spans, fields, name, text, reference, error);
  for (int i = 0; i < N_FIELDS; i++)
    g_string_free (fields[i], TRUE);
  return read ? g_steal_pointer (&spans) : NULL;
}

GArray *
ant_exclusions_read (const char *path, const AntTimeReference *reference, GError **error)
{
  g_autoptr (GFile) file = g_file_new_for_path (path);
  g_autoptr (GError) problem = NULL;
  g_autoptr (GFileInputStream) stream = g_file_read (file, NULL, &problem);
  g_autoptr (GString) text = g_string_new (NULL);
  char block[1 << 14];
  gsize n = sizeof block;
  while (stream && !problem && n == sizeof block && text->len < LARGEST_FILE
         && g_input_stream_read_all (G_INPUT_STREAM (stream), block, sizeof block, &n, NULL, &problem))
    g_string_append_len (text, block, (gssize) n);
  if (problem)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: cannot be read: %s"), path, problem->message);
      return NULL;
    }
  if (text->len >= LARGEST_FILE || !g_utf8_validate_len (text->str, text->len, NULL))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: not a list of spans; expected text of less than %d MB"),
                   path, LARGEST_FILE >> 20);
      return NULL;
    }
  return ant_exclusions_parse (path, text->str, reference, error);
}
