/* report.h - the report of a scan: what the record is, what was assumed, what was found and how sure that is, page after
 * page, for someone who has neither the record nor the program. Window and command make the same bytes of the same input. */
#pragma once

#include "data/comparison.h"
#include "data/judgement.h"
#include "data/scan-results.h"
#include "plot/pages.h"

/* What the analyst says of a dip. */
typedef struct
{
  AntDipClass class;
  const char *note; /* "" or NULL: none */
} AntReportWord;

/* [results->n_dips] of what an analysis keeps; the notes are borrowed from the judgements. Caller g_frees. */
AntReportWord *ant_report_words (const AntScanResults *results, const AntJudgements *judgements);

/* The PDF. word [results->n_dips], or NULL: the analyst has said nothing. comparisons: of AntComparison with the record, or NULL. Takes as long as drawing the record's curve takes
 * (seconds for millions of samples), and some 5 ms for each dip; any thread. NULL with one sentence: the record is too poor for a
 * curve, or what cairo says. */
GBytes *ant_report_bytes (const AntScanResults *results, const AntReportWord *word, const GPtrArray *comparisons, AntPaper paper,
                          GError **error);
