/* analysis-text.h - an analysis as the text of its file, and back: JSON, one schema version, docs/analysis-file.md.
 *
 * What this program does not know of a file that it read is written again as it was. Errors (ANT_ERROR_READ) are one
 * sentence that names the file, the place in it, what was found and what was expected. */
#pragma once

#include "data/analysis.h"

#define ANT_ANALYSIS_SUFFIX ".antumbra"
#define ANT_ANALYSIS_VERSION 1

/* Whether a path is named like an analysis file. */
gboolean ant_analysis_is_name (const char *path);

/* As it would be kept at `path` (absolute): the record is named from there. Caller frees. */
char *ant_analysis_to_text (const AntAnalysis *analysis, const char *path);
/* What was found waits for its record (ant_analysis_take_record). A text of a newer version is read as far as it is
 * understood, and *newer is then a sentence that says so (caller frees): the analysis has no path, so that the file stays
 * as it is. newer may not be NULL. */
AntAnalysis *ant_analysis_parse (const char *path, const char *text, gsize length, char **newer, GError **error);
/* The same of a file, of which no more is read than an analysis can be long. */
AntAnalysis *ant_analysis_load (const char *path, char **newer, GError **error);
