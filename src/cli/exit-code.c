/* exit-code.c - how errors become exit codes and one line of text. */
#include "cli/exit-code.h"

#include <gio/gio.h>

#include "data/error.h"

AntExitCode
ant_exit_code (const GError *error)
{
  if (g_error_matches (error, G_IO_ERROR, G_IO_ERROR_CANCELLED))
    return ANT_EXIT_STOPPED;
  if (error->domain == G_OPTION_ERROR)
    return ANT_EXIT_USAGE;
  if (error->domain != ANT_ERROR)
    return ANT_EXIT_READ;
  switch ((AntErrorCode) error->code)
    {
    case ANT_ERROR_USAGE: return ANT_EXIT_USAGE;
    case ANT_ERROR_READ: return ANT_EXIT_READ;
    case ANT_ERROR_WRITE: return ANT_EXIT_WRITE;
    case ANT_ERROR_STOPPED: return ANT_EXIT_STOPPED;
    case ANT_ERROR_NUMERIC: return ANT_EXIT_READ;
    }
  return ANT_EXIT_READ;
}

static void
say_one_line (const char *message)
{
  g_autofree char *line = g_strdelimit (g_strdup (message), "\n\r", ' ');
  g_printerr ("antumbra-cli: %s\n", line);
}

int
ant_cli_fail (const GError *error)
{
  say_one_line (error->message);
  return ant_exit_code (error);
}

int
ant_cli_fail_usage (const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_autofree char *message = g_strdup_vprintf (format, arguments);
  va_end (arguments);
  say_one_line (message);
  return ANT_EXIT_USAGE;
}
