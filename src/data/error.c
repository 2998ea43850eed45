/* error.c - the sentences of error.h. */
#include "data/error.h"
#include <gio/gio.h>
#include <glib/gi18n.h>

G_DEFINE_QUARK (ant-error-quark, ant_error)

static const char *
status_sentence (AntStatus status)
{
  switch (status)
    {
    case ANT_OK: return _("done");
    case ANT_BAD_ARGUMENT: return _("a value is outside its range");
    case ANT_NO_DATA: return _("too few observed samples");
    case ANT_NOT_POSITIVE: return _("a variance that must be positive is not");
    case ANT_NO_MEMORY: return _("not enough memory");
    case ANT_NOT_CONVERGED: return _("the fit did not settle");
    case ANT_STOPPED: return _("stopped");
    }
  return _("unknown outcome");
}

gboolean
ant_status_to_error (AntStatus status, const char *what, GError **error)
{
  if (status == ANT_OK)
    return TRUE;
  if (status == ANT_STOPPED)
    g_set_error (error, G_IO_ERROR, G_IO_ERROR_CANCELLED, "%s: %s", what, status_sentence (status));
  else
    g_set_error (error, ANT_ERROR, status == ANT_BAD_ARGUMENT ? ANT_ERROR_USAGE : ANT_ERROR_NUMERIC, "%s: %s", what,
                 status_sentence (status));
  return FALSE;
}

gboolean
ant_refuse (GError **error, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_autofree char *what = g_strdup_vprintf (format, arguments);
  va_end (arguments);
  g_set_error_literal (error, ANT_ERROR, ANT_ERROR_READ, what);
  return FALSE;
}
