/* netcdf-columns.c - the table that lies in a NetCDF file. */
#include "readers/netcdf-columns.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"
#include "readers/cf-time.h"

/* Stored numbers pack as text does; what claims to unpack further, beyond a first allowance, is no record. */
#define MOST_UNPACK_RATIO 200
#define UNPACK_ALLOWANCE (64 * 1024 * 1024)
#define MOST_ROWS 200000000

static const AntNetcdfVariable *
variable_at (const AntNetcdfContents *contents, guint i)
{
  return g_ptr_array_index (contents->variables, i);
}

static const AntNetcdfDimension *
dimension_at (const AntNetcdfContents *contents, guint i)
{
  return g_ptr_array_index (contents->dimensions, i);
}

static gboolean
has_cf_unit (const AntNetcdfVariable *variable)
{
  const char *units = ant_netcdf_text (variable->attributes, "units");
  return variable->kind != ANT_WIRE_OTHER && variable->rank == 1 && units && ant_cf_time_is_unit (units);
}

/* The time by its unit: of the longest the first, one named like its dimension before others. -1 if there is none. */
static int
find_cf_time (const AntNetcdfContents *contents)
{
  int best = -1;
  guint64 best_length = 0;
  gboolean best_named = FALSE;
  for (guint i = 0; i < contents->variables->len; i++)
    {
      const AntNetcdfVariable *variable = variable_at (contents, i);
      if (!has_cf_unit (variable))
        continue;
      const AntNetcdfDimension *dimension = dimension_at (contents, variable->dimension[0]);
      gboolean named = !strcmp (dimension->name, variable->name);
      if (best < 0 || dimension->length > best_length || (dimension->length == best_length && named && !best_named))
        {
          best = (int) i;
          best_length = dimension->length;
          best_named = named;
        }
    }
  return best;
}

static int
longest_dimension (const AntNetcdfContents *contents)
{
  int best = -1;
  for (guint i = 0; i < contents->variables->len; i++)
    {
      const AntNetcdfVariable *variable = variable_at (contents, i);
      if (variable->kind != ANT_WIRE_OTHER && variable->rank == 1
          && (best < 0 || dimension_at (contents, variable->dimension[0])->length > dimension_at (contents, (guint) best)->length))
        best = (int) variable->dimension[0];
    }
  return best;
}

/* The index that the user gave for a dimension, from 0; -1 if none, -2 with an error if it is none. */
static gint64
chosen_index (const AntNetcdfDimension *dimension, const char *text, GError **error)
{
  const char *slash = strrchr (dimension->name, '/'), *bare = slash ? slash + 1 : dimension->name;
  g_auto (GStrv) parts = g_strsplit (text ? text : "", ",", -1);
  for (guint i = 0; parts[i]; i++)
    {
      guint64 number;
      char *equals = strchr (parts[i], '=');
      if (!equals)
        continue;
      *equals = 0;
      if (strcmp (g_strstrip (parts[i]), dimension->name) && strcmp (parts[i], bare))
        continue;
      if (g_ascii_string_to_unsigned (g_strstrip (equals + 1), 10, 1, dimension->length, &number, NULL))
        return (gint64) number - 1;
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("--index: found %s=%s, expected a number from 1 to %zu"), bare, equals + 1,
                   (gsize) dimension->length);
      return -2;
    }
  return -1;
}

/* Every part of --index names a dimension of the file. */
static gboolean
check_indices (const AntNetcdfContents *contents, const char *text, GError **error)
{
  g_auto (GStrv) parts = g_strsplit (text ? text : "", ",", -1);
  for (guint i = 0; parts[i]; i++)
    {
      gboolean known = FALSE;
      for (guint d = 0; d < contents->dimensions->len && !known; d++)
        {
          gint64 index = chosen_index (dimension_at (contents, d), parts[i], error);
          if (index == -2)
            return FALSE;
          known = index >= 0;
        }
      if (!known)
        {
          g_autoptr (GString) names = g_string_new (NULL);
          for (guint d = 0; d < MIN (contents->dimensions->len, 12); d++)
            g_string_append_printf (names, "%s%s", d ? ", " : "", dimension_at (contents, d)->name);
          g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("--index: found “%s”, expected DIMENSION=NUMBER with one of %s"), parts[i],
                       names->str);
          return FALSE;
        }
    }
  return TRUE;
}

/* Where the variable lies along the rows. FALSE if it does not; *open is a dimension that needs an index. */
static gboolean
pick (const AntNetcdfContents *contents, guint i, guint row_dimension, const char *indices, AntNetcdfPick *picked,
      const AntNetcdfDimension **open)
{
  const AntNetcdfVariable *variable = variable_at (contents, i);
  gboolean found = FALSE;
  *picked = (AntNetcdfPick){ .variable = i };
  *open = NULL;
  for (guint d = 0; d < variable->rank; d++)
    {
      const AntNetcdfDimension *dimension = dimension_at (contents, variable->dimension[d]);
      gint64 index = 0;
      if (variable->dimension[d] == row_dimension && !found)
        {
          picked->along = d;
          found = TRUE;
        }
      else if ((index = chosen_index (dimension, indices, NULL)) < 0)
        {
          if (dimension->length != 1)
            *open = dimension;
          index = 0;
        }
      picked->index[d] = (guint64) index;
    }
  return found && variable->kind != ANT_WIRE_OTHER;
}

static gboolean
is_chosen (const AntReadingChoices *choices, const char *name)
{
  const char *const chosen[] = { choices->value_column, choices->error_column, choices->quality_column };
  for (gsize i = 0; i < G_N_ELEMENTS (chosen); i++)
    if (chosen[i] && !g_ascii_strcasecmp (chosen[i], name))
      return TRUE;
  return FALSE;
}

static gboolean
refuse_open (const AntNetcdfVariable *variable, const AntNetcdfDimension *open, GError **error)
{
  const char *slash = strrchr (open->name, '/'), *bare = slash ? slash + 1 : open->name;
  return ant_refuse (error, _("found %s with %zu places along %s, expected one of them to be chosen: --index %s=1 (to %zu)"),
                 variable->name, (gsize) open->length, bare, bare, (gsize) open->length);
}

static gboolean
add_columns (const AntNetcdfContents *contents, const AntReadingChoices *choices, AntNetcdfColumns *columns, GError **error)
{
  int open_variable = -1;
  const AntNetcdfDimension *open_dimension = NULL;
  for (guint i = 0; i < contents->variables->len; i++)
    {
      AntNetcdfPick picked;
      const AntNetcdfDimension *open;
      const AntNetcdfVariable *variable = variable_at (contents, i);
      if (!pick (contents, i, columns->row_dimension, choices->index, &picked, &open) || (int) i == columns->bounds)
        continue;
      if (open && is_chosen (choices, variable->name))
        return refuse_open (variable, open, error);
      if (open)
        {
          open_variable = open_variable < 0 ? (int) i : open_variable;
          open_dimension = open_dimension ? open_dimension : open;
          continue;
        }
      if (columns->n_columns == ANT_NETCDF_MOST_COLUMNS)
        {
          columns->n_left_out++;
          continue;
        }
      picked.name = g_strdup (variable->name);
      if ((int) i == columns->time_variable)
        columns->time_column = (int) columns->n_columns;
      columns->column[columns->n_columns++] = picked;
    }
  if (columns->n_columns < 2 && open_variable >= 0)
    return refuse_open (variable_at (contents, (guint) open_variable), open_dimension, error);
  if (columns->n_columns < 2)
    return ant_refuse (error, _("found %u variables of numbers along %s, expected a time and a value"), columns->n_columns,
                   dimension_at (contents, columns->row_dimension)->name);
  return TRUE;
}

/* The variable with the two edges of each interval, if the time names one that is so; -1. */
static int
find_bounds (const AntNetcdfContents *contents, const AntNetcdfVariable *time)
{
  const char *name = ant_netcdf_text (time->attributes, "bounds");
  int found = name ? ant_netcdf_variable_find (contents, name) : -1;
  const AntNetcdfVariable *bounds = found >= 0 ? variable_at (contents, (guint) found) : NULL;
  if (!bounds || bounds->kind == ANT_WIRE_OTHER || bounds->rank != 2 || bounds->dimension[0] != time->dimension[0]
      || dimension_at (contents, bounds->dimension[1])->length != 2)
    return -1;
  return found;
}

/* The time's dimension: the user's, the one with a time unit, or the longest. */
static gboolean
find_rows (const AntNetcdfContents *contents, const AntReadingChoices *choices, AntNetcdfColumns *columns, GError **error)
{
  int time = choices->time_column ? ant_netcdf_variable_find (contents, choices->time_column) : find_cf_time (contents);
  int row = -1;
  if (time >= 0 && variable_at (contents, (guint) time)->rank == 1)
    row = (int) variable_at (contents, (guint) time)->dimension[0];
  columns->time_variable = time >= 0 && has_cf_unit (variable_at (contents, (guint) time)) && !choices->time_format ? time : -1;
  if (row < 0)
    row = longest_dimension (contents);
  if (row < 0)
    return ant_refuse (error, _("found no variable of numbers in the NetCDF file, expected a time and a value"));
  columns->row_dimension = (guint) row;
  columns->bounds = columns->time_column = -1;
  if (columns->time_variable >= 0)
    columns->bounds = find_bounds (contents, variable_at (contents, (guint) time));
  return TRUE;
}

AntNetcdfColumns *
ant_netcdf_columns_choose (const AntNetcdfContents *contents, const AntReadingChoices *choices, guint64 file_bytes, GError **error)
{
  static const AntReadingChoices none = { 0 };
  g_autoptr (AntNetcdfColumns) columns = g_new0 (AntNetcdfColumns, 1);
  choices = choices ? choices : &none;
  if (!check_indices (contents, choices->index, error) || !find_rows (contents, choices, columns, error))
    return NULL;
  const AntNetcdfDimension *rows = dimension_at (contents, columns->row_dimension);
  guint64 most = UNPACK_ALLOWANCE + MIN (file_bytes, G_MAXUINT64 / 1024) * MOST_UNPACK_RATIO;
  if (!add_columns (contents, choices, columns, error))
    return NULL;
  if (rows->length > MOST_ROWS || rows->length * 8 * columns->n_columns > most)
    {
      ant_refuse (error, _("found %u variables that claim %zu places along %s, expected no more than a file of %zu bytes can hold"),
              columns->n_columns, (gsize) rows->length, rows->name, (gsize) file_bytes);
      return NULL;
    }
  if (rows->length < 2)
    {
      ant_refuse (error, _("found %zu places along %s, expected a record of many"), (gsize) rows->length, rows->name);
      return NULL;
    }
  columns->n_rows = (gsize) rows->length;
  return g_steal_pointer (&columns);
}

void
ant_netcdf_columns_free (AntNetcdfColumns *columns)
{
  if (!columns)
    return;
  for (guint i = 0; i < columns->n_columns; i++)
    g_free (columns->column[i].name);
  g_free (columns);
}

char *
ant_netcdf_pick_text (const AntNetcdfContents *contents, const AntNetcdfPick *pick)
{
  GString *text = g_string_new (NULL);
  g_string_append_printf (text, "%u:", pick->variable);
  for (guint d = 0; d < variable_at (contents, pick->variable)->rank; d++)
    if (d == pick->along)
      g_string_append (text, d ? ",*" : "*");
    else
      g_string_append_printf (text, "%s%" G_GUINT64_FORMAT, d ? "," : "", pick->index[d]);
  return g_string_free (text, FALSE);
}
