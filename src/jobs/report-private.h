/* report-private.h - the sections of a report. */
#pragma once

#include "jobs/layers.h"
#include "jobs/report.h"

typedef struct
{
  const AntScanResults *results;
  const AntLayers *layers;   /* of the same record, drawn with these results */
  const AntReportWord *word; /* [results->n_dips], or NULL */
  const GPtrArray *comparisons; /* of AntComparison, or NULL */
} AntReport;

/* Each begins with its heading, and is left out where there is nothing to tell. */
void ant_report_summary (const AntReport *report, AntPages *pages);      /* record, assumptions, what was found, lists */
void ant_report_time (const AntReport *report, AntPages *pages);         /* the time stack */
void ant_report_noise (const AntReport *report, AntPages *pages);        /* spectrum, parts, floor */
void ant_report_dips (const AntReport *report, AntPages *pages);         /* one by one */
void ant_report_repeats (const AntReport *report, AntPages *pages);      /* what recurs, event by event */
void ant_report_brightenings (const AntReport *report, AntPages *pages);
void ant_report_passages (const AntReport *report, AntPages *pages);
void ant_report_witnesses (const AntReport *report, AntPages *pages);    /* other instruments beside it */
void ant_report_settings (const AntReport *report, AntPages *pages);     /* settings, and how to do it again */

/* The dips (or brightenings) as a table. */
void ant_report_list (const AntReport *report, AntPages *pages, gboolean brightenings);
/* What a dip is taken for: the analyst's word, else the program's. */
AntDipClass ant_report_class (const AntReport *report, gsize dip);
/* "planet-shaped, 97 %", "spot (analyst)". Caller frees. */
char *ant_report_verdict_words (const AntReport *report, gsize dip);
/* The last part of a record's path. Caller frees. */
char *ant_report_record_name (const AntRecord *record);
