/* text-reader.c - a text table to the rows of a record. */
#include "readers/text-reader.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"
#include "readers/table-record.h"
#include "readers/text-layout.h"
#include "readers/text-slices.h"
#include "readers/time-columns.h"

/* The first lines of the file, whole ones, and what they show. */
static AntTableLayout *
look_at_sample (AntLineSource *lines, const AntRecord *record, GError **error)
{
  static const char byte_order_mark[] = "\xef\xbb\xbf";
  if (!ant_line_source_fill (lines, ANT_SAMPLE_BYTES, error))
    return NULL;
  if (lines->filled >= 3 && !memcmp (lines->buffer, byte_order_mark, 3))
    lines->at = 3;
  gsize n = lines->filled - lines->at;
  if (n == 0)
    {
      ant_record_refuse (record, error, _("found an empty file, expected rows of a time and a value"));
      return NULL;
    }
  const char *start = lines->buffer + lines->at;
  const char *newline = memrchr (start, '\n', n);
  if (!newline)
    {
      const char *end;
      AntLineSource rest = *lines; /* the line is longer than the sample: let the line source say how far it may go */
      if (ant_line_source_next (&rest, &start, &end, error) >= 0)
        ant_record_refuse (record, error, _("line 1: found a line longer than %d bytes, expected a row of a table"), ANT_SAMPLE_BYTES);
      return NULL;
    }
  return ant_text_layout_find (record->path, start, (gsize) (newline + 1 - start), error);
}

static void
say_layout (const AntTableLayout *layout, gboolean packed, AntRecord *record)
{
  const char *separator = layout->separator == ',' ? _("commas") : layout->separator == ';' ? _("semicolons")
                          : layout->separator == '\t' ? _("TABs") : _("blanks");
  ant_record_say (record, _("%u columns separated by %s%s; the data begin in line %u."), layout->n_columns, separator,
                  packed ? _(", packed by gzip") : "", layout->first_row);
  if (layout->counted >= layout->first_row)
    ant_record_say (record, _("The first line counts %u header lines, the data begin sooner."), layout->counted);
}

gboolean
ant_text_reader_read (AntByteSource *source, const AntReadingChoices *choices, const AntSliceRunner *runner,
                      GCancellable *cancellable, AntRecord *record, GError **error)
{
  AntLineSource lines;
  AntTableRows rows = { 0 };
  AntTimeForm form;
  AntValueColumns columns;
  gboolean done = FALSE;
  ant_line_source_init (&lines, source, cancellable);
  g_autoptr (AntTableLayout) layout = look_at_sample (&lines, record, error);
  if (layout)
    say_layout (layout, ant_byte_source_is_packed (source), record);
  if (layout && ant_time_columns_find (layout, choices, record, &form, error)
      && ant_value_columns_find (layout, &form, choices, record->path, &columns, error))
    {
      ant_table_record_say_time (layout, &form, record);
      done = ant_text_slices_read (&rows, &lines, layout, &form, &columns, runner, error)
             && ant_table_record_fill (&rows, layout, &form, &columns, choices, record, error);
    }
  ant_table_rows_clear (&rows);
  ant_line_source_clear (&lines);
  return done;
}
