/* analysis-file.h - an analysis on the disk, whole or as it was before, whatever happens meanwhile; and unsaved work kept
 * beside it.
 *
 * Unsaved work of FOLDER/NAME.antumbra stands in FOLDER/.NAME.antumbra.unsaved. Of an analysis that has no file yet it
 * stands in the user's folder of states, under the number of the process. */
#pragma once

#include "data/analysis.h"

/* Write the text (ant_analysis_to_text for this very path) and sync file and folder. FALSE with one sentence, and what
 * stood there stands there still. Any thread. */
gboolean ant_analysis_file_write (const char *path, const char *text, gboolean replace, GError **error);
/* The same of an analysis; it has this path then and is saved. */
gboolean ant_analysis_file_save (AntAnalysis *analysis, const char *path, gboolean replace, GError **error);

/* Where unsaved work is kept, for an analysis with this path; path NULL: a name in the user's folder of states that is
 * this process's own, the `number`-th. Caller frees. */
char *ant_unsaved_path (const char *path, guint number);
/* Make the user's folder for it if that is where it will stand, so that a write can succeed. */
gboolean ant_unsaved_make_folder (const char *unsaved_path);
gboolean ant_unsaved_write (const char *unsaved_path, const char *text, GError **error);
/* Unsaved work without a file that processes left which are no more. Caller frees (g_strfreev). */
char **ant_unsaved_left_behind (void);
/* When a file was last written, in the user's own time: "14:07", or with the day if that is another. Caller frees. */
char *ant_file_time_words (const char *path);
void ant_unsaved_remove (const char *unsaved_path);
