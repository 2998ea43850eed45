/* netcdf-classic.h - how long a classic NetCDF file must be by its own header, since the library reads zeros where one was cut.
 *
 * Source: the format's specification (NetCDF users' guide, appendix B): CDF-1, CDF-2 and CDF-5. */
#pragma once

#include <glib.h>

typedef enum
{
  ANT_CLASSIC_WHOLE,   /* *needed is set */
  ANT_CLASSIC_OTHER,   /* not a classic file */
  ANT_CLASSIC_LONGER,  /* the header goes on behind these bytes */
  ANT_CLASSIC_DAMAGED, /* *needed is the place of what cannot be */
} AntClassic;

/* The first n bytes of a file. needed: the bytes that all its variables take, padding at the end aside. */
AntClassic ant_netcdf_classic_length (const guint8 *bytes, gsize n, guint64 *needed);
