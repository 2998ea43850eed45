/* exit-code.h - the numbers the command ends with, and the one line it says when it ends badly. */
#pragma once

#include <glib.h>

typedef enum
{
  ANT_EXIT_DONE = 0,
  ANT_EXIT_USAGE = 2,
  ANT_EXIT_READ = 3,  /* the input cannot be read, or its numbers allow no answer */
  ANT_EXIT_WRITE = 4,
  ANT_EXIT_STOPPED = 5,
} AntExitCode;

/* The exit code of an error of any domain: option errors are usage, cancelling is stopped, errors of GIO and of files
 * that nobody classed are read. */
AntExitCode ant_exit_code (const GError *error);
/* Say the error as one line, "antumbra-cli: ...", on standard error; returns its exit code, for `return`. */
int ant_cli_fail (const GError *error);
/* The same for a usage error that has no GError. */
int ant_cli_fail_usage (const char *format, ...) G_GNUC_PRINTF (1, 2);
