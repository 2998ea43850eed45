/* netcdf-process.h - run the NetCDF child on an open file and bring back what it wrote. */
#pragma once

#include <gio/gio.h>

typedef struct
{
  const guint8 *bytes; /* what it wrote */
  gsize n;
} AntNetcdfOutput;
void ant_netcdf_output_clear (AntNetcdfOutput *output);
G_DEFINE_AUTO_CLEANUP_CLEAR_FUNC (AntNetcdfOutput, ant_netcdf_output_clear)

typedef struct AntNetcdfProcess AntNetcdfProcess;

/* Start the child on `file` (an open file, not moved; `name` is for sentences), with what netcdf-child.c takes: "contents" or "columns" and the columns
 * asked for, NULL-terminated. It may use so much time of a processor and write so many bytes. */
AntNetcdfProcess *ant_netcdf_process_start (int file, const char *name, const char *const *asked, guint seconds,
                                            guint64 most_bytes, GError **error);
/* Wait for it. FALSE with one sentence, the `name` of the file before it: damaged, too long, too large, or cancelled. It has
 * ended either way, and `process` is freed. */
gboolean ant_netcdf_process_finish (AntNetcdfProcess *process, const char *name, GCancellable *cancellable,
                                    AntNetcdfOutput *output, GError **error);
