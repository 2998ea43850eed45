/* netcdf-values.h - from the numbers as a NetCDF file stores them to the values they mean.
 *
 * Source: the NetCDF users' guide's attribute conventions, as CF 1.12 takes them over (section 2.5.1, 8.1): missing values and
 * the valid range are judged on the stored numbers, then scale_factor and add_offset are applied. */
#pragma once

#include <math.h>
#include "readers/netcdf-stream.h"

#define ANT_NETCDF_MOST_FILLS 16

typedef struct
{
  guint n_fills;
  double fill[ANT_NETCDF_MOST_FILLS]; /* _FillValue, or the library's own for the type, and missing_value */
  double least, greatest;             /* the valid range; infinite if none is stated */
  gboolean scales;
  double scale, offset;
  double wrap;                        /* added to negative numbers: 2^bits where the file says _Unsigned, else 0 */
} AntNetcdfPacking;

typedef struct
{
  gsize n_fill, n_invalid;
} AntNetcdfTally;

AntNetcdfPacking ant_netcdf_packing (const AntNetcdfVariable *variable);
/* Value of a stored number; NaN if it is a fill or outside the valid range, which is counted. In line for the loops over rows. */
static inline double
ant_netcdf_unpack (const AntNetcdfPacking *packing, double stored, AntNetcdfTally *tally)
{
  double number = stored < 0.0 ? stored + packing->wrap : stored;
  for (guint i = 0; i < packing->n_fills; i++)
    if (number == packing->fill[i])
      {
        tally->n_fill++;
        return (double) NAN;
      }
  if (number < packing->least || number > packing->greatest)
    {
      tally->n_invalid++;
      return (double) NAN;
    }
  return packing->scales ? number * packing->scale + packing->offset : number;
}
