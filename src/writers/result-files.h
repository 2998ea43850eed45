/* result-files.h - the tables that a scan leaves in its folder: which there are, and in which formats. */
#pragma once

#include "data/comparison.h"
#include "data/scan-results.h"
#include "writers/output-dir.h"
#include "writers/table.h"

/* CSV is always written. */
typedef struct
{
  gboolean fits, votable; /* the tables of dips, brightenings, passages and repeats so too; fits: those of periods and flags likewise */
  gboolean series;        /* the detrended series as well */
  guint witnesses;        /* so many tables of comparisons */
} AntResultChoice;

/* "fits", "votable" or both with a comma between. FALSE with one sentence. */
gboolean ant_result_choice_parse (AntResultChoice *choice, const char *text, GError **error);
/* What a scan found, and what the analyst says of it. */
typedef struct
{
  const AntScanResults *results;
  const AntJudgements *judgements; /* or NULL */
  const char *analysis;            /* the text of analysis.antumbra; NULL: it is not written */
  const GPtrArray *comparisons;    /* of AntComparison, as many as were chosen, or NULL */
} AntFindings;
#define ANT_ANALYSIS_FILE_NAME "analysis.antumbra"

/* What is written: "dips.csv" ..., analysis.antumbra last. Caller g_strfreevs. */
char **ant_result_file_names (const AntResultChoice *choice);
/* Add all of them to a folder that is open. */
gboolean ant_result_files_add (AntOutputDir *dir, const AntFindings *findings, const AntResultChoice *choice, GError **error);

/* The tables that come in several formats, by what a scan is asked for; NULL if a stopped scan does not have it. Results
 * and judgements (NULL: none) must outlive the table. Caller frees. */
typedef enum
{
  ANT_RESULT_DIPS,
  ANT_RESULT_BRIGHTENINGS,
  ANT_RESULT_PASSAGES,
  ANT_RESULT_REPEATS,
  ANT_RESULT_PERIODS,
  ANT_RESULT_SERIES,
  ANT_N_RESULT_TABLES,
} AntResultTable;
AntTable *ant_result_table_new (AntResultTable which, const AntScanResults *results, const AntJudgements *judgements);
