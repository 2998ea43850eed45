/* fits-making.h - FITS files in memory for the reader's tests, made with CFITSIO. */
#pragma once

#include <fitsio.h>
#include <glib.h>
#include <string.h>

typedef struct
{
  fitsfile *file;
  void *bytes;
  size_t n_bytes;
} Making;

static inline void
must (int status)
{
  char text[FLEN_STATUS];
  fits_get_errstatus (status, text);
  if (status)
    g_error ("CFITSIO: %s", text);
}

static inline void
making_start (Making *making)
{
  int status = 0;
  *making = (Making){ .n_bytes = 2880, .bytes = g_malloc (2880) };
  fits_create_memfile (&making->file, &making->bytes, &making->n_bytes, 2880, g_realloc, &status);
  fits_create_img (making->file, BYTE_IMG, 0, NULL, &status);
  must (status);
}

/* A table; name NULL for none. `forms` such as "1D". */
static inline void
making_table (Making *making, const char *name, int type, gsize n_rows, int n_columns, const char *const *names,
              const char *const *forms, const char *const *units)
{
  int status = 0;
  char *ttype[32], *tform[32], *tunit[32];
  for (int c = 0; c < n_columns; c++)
    {
      ttype[c] = (char *) (guintptr) names[c];
      tform[c] = (char *) (guintptr) forms[c];
      tunit[c] = (char *) (guintptr) (units ? units[c] : "");
    }
  fits_create_tbl (making->file, type, (LONGLONG) n_rows, n_columns, ttype, tform, tunit, name, &status);
  must (status);
}

static inline void
making_numbers (Making *making, int column, gsize n, const double *value)
{
  int status = 0;
  g_autofree double *copy = g_memdup2 (value, n * sizeof *value);
  fits_write_col (making->file, TDOUBLE, column, 1, 1, (LONGLONG) n, copy, &status);
  must (status);
}

static inline void
making_number_key (Making *making, const char *key, double value)
{
  int status = 0;
  fits_update_key (making->file, TDOUBLE, key, &value, NULL, &status);
  must (status);
}

static inline void
making_text_key (Making *making, const char *key, const char *text)
{
  int status = 0;
  g_autofree char *copy = g_strdup (text);
  fits_update_key (making->file, TSTRING, key, copy, NULL, &status);
  must (status);
}

/* The file as bytes; the caller frees. */
static inline guint8 *
making_end (Making *making, gsize *n)
{
  int status = 0;
  LONGLONG head, data, end;
  fits_flush_file (making->file, &status);
  fits_get_hduaddrll (making->file, &head, &data, &end, &status);
  fits_close_file (making->file, &status);
  must (status);
  *n = (gsize) end;
  return making->bytes;
}
