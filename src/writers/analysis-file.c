/* analysis-file.c - write an analysis, and keep unsaved work. */
#include "writers/analysis-file.h"

#include <errno.h>
#include <glib/gi18n.h>
#include <glib/gstdio.h>
#include <signal.h>
#include <string.h>
#include <unistd.h>

#include "data/analysis-text.h"
#include "data/error.h"
#include "writers/whole-file.h"

#define UNSAVED_SUFFIX ".unsaved"

gboolean
ant_analysis_file_write (const char *path, const char *text, gboolean replace, GError **error)
{
  return ant_whole_file_write (path, text, strlen (text), replace, error);
}

gboolean
ant_analysis_file_save (AntAnalysis *analysis, const char *path, gboolean replace, GError **error)
{
  g_autofree char *whole = g_canonicalize_filename (path, NULL);
  g_autofree char *text = ant_analysis_to_text (analysis, whole);
  if (!ant_analysis_file_write (whole, text, replace, error))
    return FALSE;
  ant_analysis_set_path (analysis, whole);
  ant_analysis_set_saved (analysis);
  return TRUE;
}

static char *
unsaved_folder (void)
{
  return g_build_filename (g_get_user_state_dir (), "antumbra", "unsaved", NULL);
}

char *
ant_unsaved_path (const char *path, guint number)
{
  g_autofree char *folder = path ? g_path_get_dirname (path) : unsaved_folder ();
  g_autofree char *base = path ? g_path_get_basename (path) : g_strdup_printf ("%d-%u%s", (int) getpid (), number, ANT_ANALYSIS_SUFFIX);
  g_autofree char *name = path ? g_strdup_printf (".%s" UNSAVED_SUFFIX, base) : g_strdup (base);
  return g_build_filename (folder, name, NULL);
}

gboolean
ant_unsaved_make_folder (const char *unsaved_path)
{
  g_autofree char *folder = g_path_get_dirname (unsaved_path), *states = unsaved_folder ();
  return !g_str_equal (folder, states) || g_mkdir_with_parents (folder, 0700) == 0;
}

gboolean
ant_unsaved_write (const char *unsaved_path, const char *text, GError **error)
{
  if (!ant_unsaved_make_folder (unsaved_path))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("%s: cannot be made: %s"), unsaved_path, g_strerror (errno));
      return FALSE;
    }
  return ant_analysis_file_write (unsaved_path, text, TRUE, error);
}

/* The process whose number begins the name; 0 if none does. */
static gint64
owner_of (const char *name)
{
  return g_str_has_suffix (name, ANT_ANALYSIS_SUFFIX) ? g_ascii_strtoll (name, NULL, 10) : 0;
}

char **
ant_unsaved_left_behind (void)
{
  g_autofree char *folder = unsaved_folder ();
  g_autoptr (GDir) dir = g_dir_open (folder, 0, NULL);
  g_autoptr (GStrvBuilder) paths = g_strv_builder_new ();
  const char *name;
  while (dir && (name = g_dir_read_name (dir)))
    {
      gint64 owner = owner_of (name);
      if (owner <= 0 || owner > G_MAXINT32 || owner == getpid () || kill ((pid_t) owner, 0) == 0 || errno == EPERM)
        continue;
      g_autofree char *path = g_build_filename (folder, name, NULL);
      g_strv_builder_add (paths, path);
    }
  return g_strv_builder_end (paths);
}

char *
ant_file_time_words (const char *path)
{
  GStatBuf status;
  gint64 seconds = g_stat (path, &status) == 0 ? status.st_mtime : 0;
  g_autoptr (GDateTime) then = g_date_time_new_from_unix_local (seconds), now = g_date_time_new_now_local ();
  gboolean today = g_date_time_get_year (then) == g_date_time_get_year (now)
                   && g_date_time_get_day_of_year (then) == g_date_time_get_day_of_year (now);
  return g_date_time_format (then, today ? "%H:%M" : "%Y-%m-%d %H:%M");
}

void
ant_unsaved_remove (const char *unsaved_path)
{
  g_unlink (unsaved_path); /* that it is not there is as good */
}
