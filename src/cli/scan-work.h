/* scan-work.h - the work that a scan begins or goes on with: the options that say how a record is treated, and --from
 * with an analysis file, which holds all of that already. */
#pragma once

#include <gio/gio.h>
#include "cli/record-options.h"
#include "cli/settings-options.h"
#include "cli/witness-options.h"
#include "data/analysis.h"

typedef struct
{
  char **from;     /* --from: a time, an analysis file, or one of each */
  char *to;        /* --to */
  char *exclude;   /* --exclude */
  char *observer;  /* --observer */
  AntRecordOptions reading;
  AntSettingsOptions given;
  AntWitnessOptions witness;
} AntScanWork;

/* Add the options to a context; parsing fills `work` (start it as { 0 }). */
void ant_scan_work_add (GOptionContext *context, AntScanWork *work);
void ant_scan_work_clear (AntScanWork *work);
/* The analysis file among --from, or NULL. Borrowed. */
const char *ant_scan_work_file (const AntScanWork *work);
/* The analysis that is to be scanned, its treatment being that of the file with the options on top, and its record with
 * the grid laid. path: the record's; NULL: as the file names it. What must be known of both is said on standard error.
 * no_repeats: without the search for dips that recur. *comparisons: of AntComparison, with the file's witnesses and those of
 * --witness. NULL with one sentence. */
AntAnalysis *ant_scan_work_begin (const AntScanWork *work, const char *path, gboolean no_repeats, GCancellable *stop,
                                  AntRecord **record, GPtrArray **comparisons, GError **error);
