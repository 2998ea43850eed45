/* output-dir.h - a directory of results that appears whole or not at all.
 *
 * Each result is a whole file (writers/whole-file.h); ant_output_dir_commit brings all of them to their places. Whatever
 * was not committed is removed when the directory is closed, and so are directories made for it. Errors (ANT_ERROR_WRITE)
 * name the file and the reason. One thread at a time. */
#pragma once

#include <glib.h>

typedef struct _AntOutputDir AntOutputDir;

/* Make the directory, with its parents, and try that its results can be written there, so that a long scan does not find
 * out at its end. `names` (NULL-terminated) are the results this run may write: without `replace` none may exist yet. */
AntOutputDir *ant_output_dir_open (const char *path, const char *const *names, gboolean replace, GError **error);
/* Write one result to its draft. A name is added once. */
gboolean ant_output_dir_add (AntOutputDir *dir, const char *name, const char *text, gsize length, GError **error);
gboolean ant_output_dir_commit (AntOutputDir *dir, GError **error);
void ant_output_dir_close (AntOutputDir *dir); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntOutputDir, ant_output_dir_close)
