/* whole-file.h - a file that appears whole or not at all: drafted beside its place, synced, then renamed over it.
 *
 * Errors (ANT_ERROR_WRITE) name the file and the reason. One thread at a time. */
#pragma once

#include <glib.h>
#include <stdio.h>

typedef struct _AntWholeFile AntWholeFile;

/* Begin a draft. NULL if the file is there and `replace` is not set, if something else than an ordinary file is there, or
 * if none can be made there. */
AntWholeFile *ant_whole_file_open (const char *path, gboolean replace, GError **error);
/* Where to write, until it is finished. Errors are kept by the stream and told by ant_whole_file_finish. */
FILE *ant_whole_file_stream (AntWholeFile *file);
/* Bring all that was written to the disk: from here on only the name is missing, so several files can be made to appear
 * together. On FALSE the draft is gone. */
gboolean ant_whole_file_finish (AntWholeFile *file, GError **error);
/* Finish it, bring it to its place and free it; on FALSE nothing is left behind. */
gboolean ant_whole_file_commit (AntWholeFile *file, GError **error);
/* All of it at once: these bytes are the file, or nothing has changed. */
gboolean ant_whole_file_write (const char *path, const char *bytes, gsize length, gboolean replace, GError **error);
/* Forget what was written and free it; NULL is fine. */
void ant_whole_file_abandon (AntWholeFile *file);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntWholeFile, ant_whole_file_abandon)
