/* netcdf-columns.h - which variables of a NetCDF file are columns of one table: those along the dimension of its time. */
#pragma once

#include "data/reading-choices.h"
#include "readers/netcdf-stream.h"

#define ANT_NETCDF_MOST_COLUMNS 80

typedef struct
{
  guint variable;                       /* index in the contents */
  guint along;                          /* which of its dimensions are the rows */
  guint64 index[ANT_WIRE_MOST_RANK];    /* along each of the others, from 0 */
  char *name;                           /* the variable's */
} AntNetcdfPick;

typedef struct
{
  guint row_dimension;
  gsize n_rows;
  guint n_columns;
  AntNetcdfPick column[ANT_NETCDF_MOST_COLUMNS]; /* in the file's order */
  guint n_left_out;
  int time_variable;                    /* whose unit is one such as "days since 2003-02-25"; -1: none has */
  int time_column;                      /* the same among the columns */
  int bounds;                           /* index of the variable with the edges of its intervals; -1: none */
} AntNetcdfColumns;

/* Choose by the user's word, else the longest time with such a unit, one named like its dimension first; without any, the
 * longest dimension. file_bytes bounds what the file can hold. NULL with what was found and what was expected. */
AntNetcdfColumns *ant_netcdf_columns_choose (const AntNetcdfContents *contents, const AntReadingChoices *choices,
                                             guint64 file_bytes, GError **error);
void ant_netcdf_columns_free (AntNetcdfColumns *columns); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntNetcdfColumns, ant_netcdf_columns_free)
/* As the child takes it: "7:*,2". Caller frees. */
char *ant_netcdf_pick_text (const AntNetcdfContents *contents, const AntNetcdfPick *pick);
