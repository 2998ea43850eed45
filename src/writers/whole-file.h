/* whole-file.h - a file that appears whole or not at all: written beside its place, synced, then renamed over it. */
#pragma once

#include <glib.h>
#include <stdio.h>

typedef struct _AntWholeFile AntWholeFile;

/* NULL with one sentence (ANT_ERROR_WRITE) if the file is there and `replace` is not set, or none can be made there. */
AntWholeFile *ant_whole_file_open (const char *path, gboolean replace, GError **error);
/* Where to write. Errors are kept by the stream and told by ant_whole_file_commit. */
FILE *ant_whole_file_stream (AntWholeFile *file);
/* Bring it to its place and free it; FALSE with one sentence, nothing left behind. */
gboolean ant_whole_file_commit (AntWholeFile *file, GError **error);
/* Forget what was written and free it; NULL is fine. */
void ant_whole_file_abandon (AntWholeFile *file);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntWholeFile, ant_whole_file_abandon)
