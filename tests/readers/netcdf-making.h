/* netcdf-making.h - short ways for tests to write NetCDF files by the library itself. */
#pragma once

#include <glib.h>
#include <glib/gstdio.h>
#include <netcdf.h>
#include <string.h>
#include <unistd.h>

#define MADE_ROWS 600
#define MADE_BANDS 4

static inline void
made (int status)
{
  if (status != NC_NOERR)
    g_error ("%s", nc_strerror (status));
}

static inline void
put_text (int file, int variable, const char *name, const char *text)
{
  made (nc_put_att_text (file, variable, name, strlen (text), text));
}

static inline char *
temporary_path (void)
{
  char *path = NULL;
  int handle = g_file_open_tmp (NULL, &path, NULL);
  g_assert_cmpint (handle, >=, 0);
  close (handle);
  return path;
}

/* What a made file holds at row i: 10-minute means, stamped in the middle. */
static inline double made_time (int i) { return 4500.0 + (i + 0.5) / 144.0; }
static inline short made_packed (int i) { return (short) (i % 97 == 0 ? -32768 : i % 101 == 0 ? 9000 : 37 * i % 1000 - 500); }
static inline double made_value (int i) { return made_packed (i) * 0.001 + 1361.0; }
static inline float made_band (int i, int band) { return 1.0f + (float) band + 1e-4f * (float) (7 * i % 11); }
static inline long long made_flag (int i) { return i % 50 == 3 ? 0x100000000LL : 0; }

/* NC_NETCDF4, or 0 and so on for the classic kinds. `group` other than NULL (NetCDF-4 only) holds all variables. */
static inline char *
make_netcdf (int kind, const char *group)
{
  char *path = temporary_path ();
  int file, place, time, nv, band, variable[6];
  made (nc_create (path, kind | NC_CLOBBER, &file));
  place = file;
  if (group)
    made (nc_def_grp (file, group, &place));
  made (nc_def_dim (place, "time", MADE_ROWS, &time));
  made (nc_def_dim (place, "nv", 2, &nv));
  made (nc_def_dim (place, "band", MADE_BANDS, &band));
  made (nc_def_var (place, "time", NC_DOUBLE, 1, &time, &variable[0]));
  put_text (place, variable[0], "units", "days since 2029-01-01 00:00:00");
  put_text (place, variable[0], "bounds", "edges");
  made (nc_def_var (place, "edges", NC_DOUBLE, 2, (int[]){ time, nv }, &variable[1]));
  made (nc_def_var (place, "tsi", NC_SHORT, 1, &time, &variable[2]));
  put_text (place, variable[2], "units", "W m-2");
  put_text (place, variable[2], "long_name", "total irradiance");
  put_text (place, variable[2], "ancillary_variables", "state");
  made (nc_put_att_short (place, variable[2], "_FillValue", NC_SHORT, 1, (short[]){ -32768 }));
  made (nc_put_att_short (place, variable[2], "valid_range", NC_SHORT, 2, (short[]){ -1000, 1000 }));
  made (nc_put_att_double (place, variable[2], "scale_factor", NC_DOUBLE, 1, (double[]){ 0.001 }));
  made (nc_put_att_double (place, variable[2], "add_offset", NC_DOUBLE, 1, (double[]){ 1361.0 }));
  made (nc_def_var (place, "tsi_uncertainty", NC_FLOAT, 1, &time, &variable[3]));
  made (nc_def_var (place, "spectrum", NC_FLOAT, 2, (int[]){ time, band }, &variable[4]));
  made (nc_def_var (place, "state", kind & NC_NETCDF4 ? NC_INT64 : NC_DOUBLE, 1, &time, &variable[5]));
  put_text (place, variable[5], "flag_meanings", "good shutter");
  if (kind & NC_NETCDF4)
    made (nc_def_var_deflate (place, variable[4], 1, 1, 4));
  made (nc_enddef (file));
  for (size_t i = 0; i < MADE_ROWS; i++)
    {
      double t = made_time ((int) i), edges[2] = { t - 0.5 / 144.0, t + 0.5 / 144.0 };
      short packed = made_packed ((int) i);
      float error = 0.05f, bands[MADE_BANDS];
      long long flag = made_flag ((int) i);
      for (int b = 0; b < MADE_BANDS; b++)
        bands[b] = made_band ((int) i, b);
      made (nc_put_var1_double (place, variable[0], &i, &t));
      made (nc_put_vara_double (place, variable[1], (size_t[]){ i, 0 }, (size_t[]){ 1, 2 }, edges));
      made (nc_put_var1_short (place, variable[2], &i, &packed));
      made (nc_put_var1_float (place, variable[3], &i, &error));
      made (nc_put_vara_float (place, variable[4], (size_t[]){ i, 0 }, (size_t[]){ 1, MADE_BANDS }, bands));
      made (nc_put_var1_longlong (place, variable[5], &i, &flag));
    }
  made (nc_close (file));
  return path;
}
