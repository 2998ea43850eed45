/* kept-path.c - names of files as an analysis file keeps them. */
#include "data/kept-path.h"

/* The way from a folder to a file: by .. where they share more than the root. Both absolute. */
static char *
relative_path (const char *folder, const char *path)
{
  g_autofree char *from = g_canonicalize_filename (folder, "/"), *to = g_canonicalize_filename (path, "/");
  g_auto (GStrv) a = g_strsplit (from, "/", -1), b = g_strsplit (to, "/", -1);
  guint n_a = g_strv_length (a), same = 1; /* both begin with an empty part before the first slash */
  while (a[same] && b[same] && b[same + 1] && g_str_equal (a[same], b[same]))
    same++;
  if (same < 2)
    return g_steal_pointer (&to);
  GString *way = g_string_new (NULL);
  for (guint i = same; i < n_a; i++)
    g_string_append (way, "../");
  g_autofree char *rest = g_strjoinv ("/", b + same);
  g_string_append (way, rest);
  return g_string_free (way, FALSE);
}

char *
ant_kept_path (const char *folder, const char *path)
{
  g_autofree char *way = path && g_path_is_absolute (path) ? relative_path (folder, path) : g_strdup (path);
  return way && !g_utf8_validate (way, -1, NULL) ? g_filename_to_uri (path, NULL, NULL) : g_steal_pointer (&way);
}

char *
ant_kept_path_resolve (const char *folder, const char *text)
{
  if (text && g_str_has_prefix (text, "file:"))
    return g_filename_from_uri (text, NULL, NULL);
  return text && !g_str_equal (text, "-") ? g_canonicalize_filename (text, folder) : g_strdup (text);
}
