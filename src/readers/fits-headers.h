/* fits-headers.h - the headers of a FITS file, walked before its library sees them: it takes some for what they claim, and
 * asks for memory by numbers that were never set (4.2). */
#pragma once

#include <glib.h>

/* FALSE with one sentence if a header's sizes are none (FITS 4.0, section 4.4.1: axes and counts below 0, more than 999 fields); the
 * rest is left to the library. `bytes`: the whole file. */
gboolean ant_fits_headers_check (const char *name, const char *bytes, gsize n, GError **error);
