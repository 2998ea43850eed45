/* netcdf-values.c - fills, valid range, scale and offset of a NetCDF variable. */
#include "readers/netcdf-values.h"

/* What the library writes where nothing was written, by its number of the type; NaN for bytes, which have none. */
static double
default_fill (guint type)
{
  static const double fills[ANT_WIRE_MOST_TYPE + 1] = {
    NAN, NAN, NAN, -32767.0, -2147483647.0, 9.969209968386869e36, 9.969209968386869e36, NAN, 65535.0, 4294967295.0,
    -9223372036854775806.0, 18446744073709551614.0, NAN,
  };
  return type <= ANT_WIRE_MOST_TYPE ? fills[type] : (double) NAN;
}

static double
unsigned_wrap (const AntNetcdfVariable *variable)
{
  const char *says = ant_netcdf_text (variable->attributes, "_Unsigned");
  if (!says || g_ascii_strcasecmp (says, "true"))
    return 0.0;
  return variable->type == 1 ? 256.0 : variable->type == 3 ? 65536.0 : variable->type == 4 ? 4294967296.0 : 0.0;
}

static double
wrapped (const AntNetcdfPacking *packing, double stored)
{
  return stored < 0.0 ? stored + packing->wrap : stored;
}

static double
one_number (const AntNetcdfVariable *variable, const char *name, guint i, double otherwise)
{
  const AntNetcdfAttribute *attribute = ant_netcdf_numbers (variable->attributes, name);
  return attribute && attribute->n_numbers > i && isfinite (attribute->number[i]) ? attribute->number[i] : otherwise;
}

static void
add_fills (AntNetcdfPacking *packing, const AntNetcdfAttribute *attribute)
{
  for (guint i = 0; attribute && i < attribute->n_numbers && packing->n_fills < ANT_NETCDF_MOST_FILLS; i++)
    packing->fill[packing->n_fills++] = wrapped (packing, attribute->number[i]);
}

AntNetcdfPacking
ant_netcdf_packing (const AntNetcdfVariable *variable)
{
  AntNetcdfPacking packing = { .wrap = unsigned_wrap (variable) };
  const AntNetcdfAttribute *range = ant_netcdf_numbers (variable->attributes, "valid_range");
  const AntNetcdfAttribute *fill = ant_netcdf_numbers (variable->attributes, "_FillValue");
  add_fills (&packing, fill);
  add_fills (&packing, ant_netcdf_numbers (variable->attributes, "missing_value"));
  if (!fill && packing.n_fills < ANT_NETCDF_MOST_FILLS)
    packing.fill[packing.n_fills++] = default_fill (variable->type);
  packing.least = one_number (variable, "valid_min", 0, (double) -INFINITY);
  packing.greatest = one_number (variable, "valid_max", 0, (double) INFINITY);
  if (range && range->n_numbers == 2)
    {
      packing.least = one_number (variable, "valid_range", 0, (double) -INFINITY);
      packing.greatest = one_number (variable, "valid_range", 1, (double) INFINITY);
    }
  if (packing.wrap > 0.0)
    {
      packing.least = isfinite (packing.least) ? wrapped (&packing, packing.least) : packing.least;
      packing.greatest = isfinite (packing.greatest) ? wrapped (&packing, packing.greatest) : packing.greatest;
    }
  packing.scale = one_number (variable, "scale_factor", 0, 1.0);
  packing.offset = one_number (variable, "add_offset", 0, 0.0);
  packing.scales = packing.scale != 1.0 || packing.offset != 0.0;
  return packing;
}
