/* netcdf-stream.c - every length is held against what is left before anything is made from it. */
#include "readers/netcdf-stream.h"

#include <math.h>

#include "readers/text-names.h"

/* What is left to read; `broken` once something did not fit, and then everything reads as 0. */
typedef struct
{
  const guint8 *at;
  gsize left;
  gboolean broken;
} Cursor;

static const guint8 *
take (Cursor *cursor, gsize n)
{
  if (cursor->broken || n > cursor->left)
    {
      cursor->broken = TRUE;
      return NULL;
    }
  const guint8 *bytes = cursor->at;
  cursor->at += n;
  cursor->left -= n;
  return bytes;
}

static void
take_mark (Cursor *cursor, const char *mark)
{
  const guint8 *bytes = take (cursor, ANT_WIRE_MARK);
  cursor->broken |= !bytes || memcmp (bytes, mark, ANT_WIRE_MARK);
}

/* A count of at most `most`. */
static guint
take_count (Cursor *cursor, guint most)
{
  guint32 count = 0;
  const guint8 *bytes = take (cursor, sizeof count);
  if (bytes)
    memcpy (&count, bytes, sizeof count);
  if (count > most)
    cursor->broken = TRUE;
  return cursor->broken ? 0 : count;
}

static guint64
take_long (Cursor *cursor)
{
  guint64 number = 0;
  const guint8 *bytes = take (cursor, sizeof number);
  if (bytes)
    memcpy (&number, bytes, sizeof number);
  return number;
}

static char *
take_text (Cursor *cursor)
{
  guint n = take_count (cursor, ANT_WIRE_MOST_TEXT);
  const char *bytes = (const char *) take (cursor, n);
  return bytes ? ant_text_excerpt (bytes, bytes + n, n) : g_strdup ("");
}

static void
free_attribute (gpointer data)
{
  AntNetcdfAttribute *attribute = data;
  g_free (attribute->name);
  g_free (attribute->text);
  g_free (attribute);
}

static void
free_dimension (gpointer data)
{
  AntNetcdfDimension *dimension = data;
  g_free (dimension->name);
  g_free (dimension);
}

static void
free_variable (gpointer data)
{
  AntNetcdfVariable *variable = data;
  g_free (variable->name);
  g_clear_pointer (&variable->attributes, g_ptr_array_unref);
  g_free (variable);
}

static GPtrArray *
take_attributes (Cursor *cursor)
{
  GPtrArray *attributes = g_ptr_array_new_with_free_func (free_attribute);
  guint n = take_count (cursor, ANT_WIRE_MOST_ATTRIBUTES);
  for (guint i = 0; i < n && !cursor->broken; i++)
    {
      AntNetcdfAttribute *attribute = g_new0 (AntNetcdfAttribute, 1);
      g_ptr_array_add (attributes, attribute);
      attribute->name = take_text (cursor);
      if (take_count (cursor, 1))
        attribute->text = take_text (cursor);
      else
        {
          attribute->n_numbers = take_count (cursor, ANT_WIRE_MOST_NUMBERS);
          const guint8 *bytes = take (cursor, attribute->n_numbers * sizeof (double));
          if (bytes)
            memcpy (attribute->number, bytes, attribute->n_numbers * sizeof (double));
        }
    }
  return attributes;
}

static void
take_variable (Cursor *cursor, AntNetcdfContents *contents)
{
  AntNetcdfVariable *variable = g_new0 (AntNetcdfVariable, 1);
  g_ptr_array_add (contents->variables, variable);
  variable->name = take_text (cursor);
  variable->kind = (AntWireKind) take_count (cursor, ANT_WIRE_INTEGER);
  variable->type = take_count (cursor, ANT_WIRE_MOST_TYPE);
  variable->rank = take_count (cursor, ANT_WIRE_MOST_RANK);
  for (guint i = 0; i < variable->rank; i++)
    {
      variable->dimension[i] = take_count (cursor, ANT_WIRE_MOST_DIMENSIONS);
      cursor->broken |= variable->dimension[i] >= contents->dimensions->len;
    }
  variable->attributes = take_attributes (cursor);
}

AntNetcdfContents *
ant_netcdf_contents_parse (const guint8 *bytes, gsize n)
{
  Cursor cursor = { bytes, n, FALSE };
  AntNetcdfContents *contents = g_new0 (AntNetcdfContents, 1);
  contents->dimensions = g_ptr_array_new_with_free_func (free_dimension);
  contents->variables = g_ptr_array_new_with_free_func (free_variable);
  take_mark (&cursor, ANT_WIRE_CONTENTS);
  guint n_dimensions = take_count (&cursor, ANT_WIRE_MOST_DIMENSIONS);
  for (guint i = 0; i < n_dimensions && !cursor.broken; i++)
    {
      AntNetcdfDimension *dimension = g_new0 (AntNetcdfDimension, 1);
      g_ptr_array_add (contents->dimensions, dimension);
      dimension->name = take_text (&cursor);
      dimension->length = take_long (&cursor);
    }
  guint n_variables = take_count (&cursor, ANT_WIRE_MOST_VARIABLES);
  for (guint i = 0; i < n_variables && !cursor.broken; i++)
    take_variable (&cursor, contents);
  contents->attributes = take_attributes (&cursor);
  take_mark (&cursor, ANT_WIRE_END);
  if (cursor.broken || cursor.left > 0)
    g_clear_pointer (&contents, ant_netcdf_contents_free);
  return contents;
}

void
ant_netcdf_contents_free (AntNetcdfContents *contents)
{
  if (!contents)
    return;
  g_ptr_array_unref (contents->dimensions);
  g_ptr_array_unref (contents->variables);
  g_ptr_array_unref (contents->attributes);
  g_free (contents);
}

static const AntNetcdfAttribute *
find_attribute (const GPtrArray *attributes, const char *name)
{
  for (guint i = 0; i < attributes->len; i++)
    {
      const AntNetcdfAttribute *attribute = g_ptr_array_index (attributes, i);
      if (!strcmp (attribute->name, name))
        return attribute;
    }
  return NULL;
}

const char *
ant_netcdf_text (const GPtrArray *attributes, const char *name)
{
  const AntNetcdfAttribute *attribute = find_attribute (attributes, name);
  return attribute && attribute->text && *attribute->text ? attribute->text : NULL;
}

const AntNetcdfAttribute *
ant_netcdf_numbers (const GPtrArray *attributes, const char *name)
{
  const AntNetcdfAttribute *attribute = find_attribute (attributes, name);
  return attribute && !attribute->text && attribute->n_numbers > 0 ? attribute : NULL;
}

int
ant_netcdf_variable_find (const AntNetcdfContents *contents, const char *name)
{
  int only = -1, n_below = 0;
  for (guint i = 0; i < contents->variables->len; i++)
    {
      const AntNetcdfVariable *variable = g_ptr_array_index (contents->variables, i);
      const char *slash = strrchr (variable->name, '/');
      if (!strcmp (variable->name, name))
        return (int) i;
      if (slash && !strcmp (slash + 1, name))
        {
          only = (int) i;
          n_below++;
        }
    }
  return n_below == 1 ? only : -1;
}

gboolean
ant_netcdf_columns_parse (const guint8 *bytes, gsize n, guint n_columns, const gsize *count, AntNetcdfColumn *column)
{
  Cursor cursor = { bytes, n, FALSE };
  take_mark (&cursor, ANT_WIRE_COLUMNS);
  for (guint i = 0; i < n_columns; i++)
    {
      guint64 kind = take_long (&cursor), found = take_long (&cursor);
      cursor.broken |= (kind != ANT_WIRE_REAL && kind != ANT_WIRE_INTEGER) || found != count[i] || found > n / 8;
      column[i].kind = (AntWireKind) kind;
      column[i].n = count[i];
      column[i].at = take (&cursor, cursor.broken ? 0 : count[i] * 8);
    }
  take_mark (&cursor, ANT_WIRE_END);
  return !cursor.broken && cursor.left == 0;
}

gint64
ant_netcdf_column_integer (const AntNetcdfColumn *column, gsize i)
{
  gint64 integer;
  if (column->kind == ANT_WIRE_INTEGER)
    {
      memcpy (&integer, column->at + 8 * i, sizeof integer);
      return integer;
    }
  double real = ant_netcdf_column_real (column, i);
  return fabs (real) < 9.2e18 && real == floor (real) ? (gint64) real : -1;
}
