/* error.h - the program's error domain and the one place where a status becomes a sentence. */
#pragma once

#include <glib.h>
#include "core/status.h"

#define ANT_ERROR (ant_error_quark ())
GQuark ant_error_quark (void);

/* What went wrong decides the command's exit code (cli/exit-code.h). */
typedef enum
{
  ANT_ERROR_USAGE,  /* the caller asked for something impossible */
  ANT_ERROR_READ,   /* an input cannot be read or understood */
  ANT_ERROR_WRITE,  /* an output cannot be written */
  ANT_ERROR_STOPPED,
  ANT_ERROR_NUMERIC /* the numbers given allow no answer */
} AntErrorCode;

/* Set *error from a status met while doing `what` ("fitting the noise of chunk 3"); returns FALSE, for `return`.
 * ANT_OK sets nothing and returns TRUE. ANT_STOPPED becomes G_IO_ERROR_CANCELLED. */
gboolean ant_status_to_error (AntStatus status, const char *what, GError **error);

/* Set *error to ANT_ERROR_READ with a sentence; returns FALSE, for `return`. */
gboolean ant_refuse (GError **error, const char *format, ...) G_GNUC_PRINTF (2, 3);
