/* record-words.h - a gridded record in words: its facts, and what was left out of it and why. */
#pragma once

#include "data/dip-words.h"
#include "data/record-summary.h"

/* Columns, times, level, cadence and scatter as AntFact. Caller unrefs. */
GPtrArray *ant_record_facts (const AntRecord *record, const AntRecordSummary *summary);
/* The record's further columns as one more AntFact, the first few of many. */
void ant_record_add_further (GPtrArray *facts, const AntRecord *record);
/* The rows, the span and the values of a record without a grid, on one line. `partial`: of its first part. Caller frees. */
char *ant_preview_words (const AntRecord *record, gboolean partial);
/* What is left out: for each flag that was set its name and count and, after a line break, what it means. */
GPtrArray *ant_record_left_out (const AntRecordSummary *summary);
/* "at 1 au (0.002 +- 0.004 of the yearly swing was in them)": where the values stand. Caller frees. */
char *ant_record_distance_words (const AntRecord *record);
/* "41.6 d · 60 s · 52 304 samples · 12 % missing". Caller frees. */
char *ant_record_headline (const AntRecord *record, const AntRecordSummary *summary);
