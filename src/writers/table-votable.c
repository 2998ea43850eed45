/* table-votable.c - a table as VOTable 1.4 (IVOA recommendation, Ochsenbein et al. 2019). */
#include "config.h"
#include "writers/table-private.h"

#include <math.h>

#define TIME_SYSTEM "times"

static void append (GString *xml, const char *format, ...) G_GNUC_PRINTF (2, 3);

/* Strings are escaped, and what XML has no character for (controls, stray bytes) becomes a question mark. */
static void
append (GString *xml, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_autofree char *text = g_markup_vprintf_escaped (format, arguments);
  va_end (arguments);
  g_string_append (xml, text);
}

static char *
clean (const char *text)
{
  char *valid = g_utf8_make_valid (text, -1);
  for (char *c = valid; *c; c++)
    if ((guchar) *c < 0x20 && *c != '\t' && *c != '\n')
      *c = '?';
  return valid;
}

static void
append_info (GString *xml, const char *name, const char *value, const char *meaning)
{
  g_autofree char *shown = clean (value);
  append (xml, "  <INFO name=\"%s\" value=\"%s\">%s</INFO>\n", name, shown, meaning);
}

static void
append_facts (GString *xml, const AntTable *table)
{
  const AntRecord *record = table->record;
  append_info (xml, "program", "Antumbra " ANT_VERSION, "what wrote this table");
  g_autofree char *name = ant_record_name (record);
  append_info (xml, "record", name, "the record it tells of");
  append_info (xml, "SHA256", record->sha256 ? record->sha256 : "unknown", "of the record's bytes");
  for (guint i = 0; i < table->facts->len; i++)
    {
      const AntTableFact *fact = &g_array_index (table->facts, AntTableFact, i);
      char number[G_ASCII_DTOSTR_BUF_SIZE];
      if (fact->text || isfinite (fact->number))
        append_info (xml, fact->key,
                     fact->text ? fact->text : g_ascii_formatd (number, sizeof number, "%.10g", fact->number), fact->meaning);
    }
}

static void
append_field (GString *xml, const AntTable *table, const AntTableColumn *column)
{
  static const char *const types[] = { [ANT_CELL_REAL] = "datatype=\"double\"", [ANT_CELL_WHOLE] = "datatype=\"int\"",
                                       [ANT_CELL_TEXT] = "datatype=\"unicodeChar\" arraysize=\"*\"",
                                       [ANT_CELL_BITS] = "datatype=\"unicodeChar\" arraysize=\"*\"" };
  append (xml, "   <FIELD name=\"%s\" ID=\"%s\" ", column->name, column->name);
  g_string_append (xml, types[column->kind]);
  if (column->unit)
    append (xml, " unit=\"%s\"", column->unit);
  if (column->ucd)
    append (xml, " ucd=\"%s\"", column->ucd);
  if (column->is_jd && table->record->time.origin_known)
    g_string_append (xml, " ref=\"" TIME_SYSTEM "\"");
  if (column->meaning)
    append (xml, ">\n    <DESCRIPTION>%s</DESCRIPTION>\n   </FIELD>\n", column->meaning);
  else
    g_string_append (xml, "/>\n");
}

static void
append_cell (GString *xml, const AntTable *table, const AntTableColumn *column, gsize row)
{
  char digits[400];
  g_string_append (xml, "<TD>");
  if (column->kind == ANT_CELL_REAL)
    g_string_append (xml, ant_table_digits (column, column->number (table->rows, row), sizeof digits, digits));
  else if (column->kind == ANT_CELL_WHOLE)
    g_string_append_printf (xml, "%d", (int) column->number (table->rows, row));
  else
    {
      g_autofree char *text = column->text (table->rows, row), *shown = clean (text);
      append (xml, "%s", shown);
    }
  g_string_append (xml, "</TD>");
}

static void
append_notes (GString *xml, const AntTable *table)
{
  g_string_append (xml, "   <DESCRIPTION>");
  for (guint i = 0; i < table->notes->len; i++)
    {
      g_autofree char *shown = clean (g_ptr_array_index (table->notes, i));
      append (xml, "%s%s.", i ? "\n" : "", shown);
    }
  g_string_append (xml, "</DESCRIPTION>\n");
}

GBytes *
ant_table_votable (const AntTable *table)
{
  GString *xml = g_string_new ("<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n"
                               "<VOTABLE version=\"1.4\" xmlns=\"http://www.ivoa.net/xml/VOTable/v1.3\">\n"
                               " <RESOURCE type=\"results\">\n");
  if (table->record->time.origin_known)
    append (xml, "  <TIMESYS ID=\"" TIME_SYSTEM "\" timeorigin=\"JD-origin\" timescale=\"%s\" refposition=\"%s\"/>\n",
            ant_table_scale_word (table->record, "UNKNOWN"), ant_table_place_word (table->record));
  append_facts (xml, table);
  append (xml, "  <TABLE name=\"%s\" nrows=\"%" G_GSIZE_FORMAT "\">\n", table->name, table->n_rows);
  append_notes (xml, table);
  for (guint c = 0; c < table->columns->len; c++)
    append_field (xml, table, &g_array_index (table->columns, AntTableColumn, c));
  g_string_append (xml, "   <DATA>\n    <TABLEDATA>\n");
  for (gsize row = 0; row < table->n_rows; row++)
    {
      g_string_append (xml, "     <TR>");
      for (guint c = 0; c < table->columns->len; c++)
        append_cell (xml, table, &g_array_index (table->columns, AntTableColumn, c), row);
      g_string_append (xml, "</TR>\n");
    }
  g_string_append (xml, "    </TABLEDATA>\n   </DATA>\n  </TABLE>\n </RESOURCE>\n</VOTABLE>\n");
  return g_string_free_to_bytes (xml);
}
