/* netcdf-stream.h - what the NetCDF child wrote, taken apart as bytes that nobody has to believe. */
#pragma once

#include <glib.h>
#include <string.h>
#include "readers/netcdf-wire.h"

typedef struct
{
  char *name;
  guint64 length;
} AntNetcdfDimension;

typedef struct
{
  char *name;
  char *text;                        /* valid UTF-8 without control characters, or NULL for numbers */
  guint n_numbers;
  double number[ANT_WIRE_MOST_NUMBERS];
} AntNetcdfAttribute;

typedef struct
{
  char *name;                        /* "group/name" below the first group */
  AntWireKind kind;
  guint type;                        /* NC_BYTE 1, NC_CHAR 2, NC_SHORT 3 ... NC_STRING 12; 0 for one of its own */
  guint rank, dimension[ANT_WIRE_MOST_RANK]; /* indices of contents->dimensions */
  GPtrArray *attributes;             /* of AntNetcdfAttribute* */
} AntNetcdfVariable;

typedef struct
{
  GPtrArray *dimensions;             /* of AntNetcdfDimension* */
  GPtrArray *variables;              /* of AntNetcdfVariable* */
  GPtrArray *attributes;             /* of AntNetcdfAttribute*: those of the file */
} AntNetcdfContents;

/* NULL if the bytes break any rule of netcdf-wire.h: cut short, counts beyond its limits, dimensions that are none. */
AntNetcdfContents *ant_netcdf_contents_parse (const guint8 *bytes, gsize n);
void ant_netcdf_contents_free (AntNetcdfContents *contents); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntNetcdfContents, ant_netcdf_contents_free)

/* NULL if there is none of this name, or it is of the other sort. */
const char *ant_netcdf_text (const GPtrArray *attributes, const char *name);
const AntNetcdfAttribute *ant_netcdf_numbers (const GPtrArray *attributes, const char *name);
/* Index of the variable of this name, -1 if there is none. A bare name also finds the only "group/name" there is. */
int ant_netcdf_variable_find (const AntNetcdfContents *contents, const char *name);

typedef struct
{
  AntWireKind kind;  /* REAL or INTEGER */
  const guint8 *at;  /* 8 bytes a number, perhaps not aligned; borrowed */
  gsize n;
} AntNetcdfColumn;

/* n_columns columns of the counts that were asked for. FALSE if anything else stands there. */
gboolean ant_netcdf_columns_parse (const guint8 *bytes, gsize n, guint n_columns, const gsize *count, AntNetcdfColumn *column);
gint64 ant_netcdf_column_integer (const AntNetcdfColumn *column, gsize i); /* a real that is no whole number: -1 */
static inline double
ant_netcdf_column_real (const AntNetcdfColumn *column, gsize i)
{
  double real;
  gint64 integer;
  if (column->kind == ANT_WIRE_INTEGER)
    {
      memcpy (&integer, column->at + 8 * i, sizeof integer);
      return (double) integer;
    }
  memcpy (&real, column->at + 8 * i, sizeof real);
  return real;
}
