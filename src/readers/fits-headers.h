/* fits-headers.h - the headers of a FITS file, walked before its library sees them: it asks for memory for as many columns
 * as a header claims. */
#pragma once

#include <glib.h>

/* FALSE with one sentence if a header claims more fields than the standard has (FITS 4.0, section 7.3.1: 0 to 999). What else is
 * wrong is left to the library. `bytes`: the whole file. */
gboolean ant_fits_headers_check (const char *name, const char *bytes, gsize n, GError **error);
