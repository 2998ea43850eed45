/* fits-headers.h - the headers of a FITS file, walked before its library sees them: it takes some for what they claim, and
 * asks for memory by numbers that were never set (4.2). */
#pragma once

#include <glib.h>

/* FALSE with one sentence if a header's sizes are none (FITS 4.0, section 4.4.1: axes and counts below 0, more than 999 fields); the
 * rest is left to the library. `bytes`: the whole file. *n_hdus: so many have a header that ends; what stands behind them must not be shown to
 * the library. */
gboolean ant_fits_headers_check (const char *name, const char *bytes, gsize n, int *n_hdus, GError **error);
