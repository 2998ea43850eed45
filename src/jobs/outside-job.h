/* outside-job.h - bring what stands outside a record into the verdicts on its dips: what an almanac predicts for its
 * observer, and what witnesses show at the same time. */
#pragma once

#include <gio/gio.h>
#include "data/comparison.h"
#include "data/observer-choice.h"
#include "data/scan-results.h"

/* Results that nobody else has yet, with verdicts (else nothing is done). observer NULL: no almanac is asked. witnesses: of
 * AntComparison, may be NULL; of several that were looking the one with the least error speaks. Blocks; FALSE with one sentence,
 * a record whose times have no known origin among them. */
gboolean ant_outside_job_run (AntScanResults *results, const AntObserverChoice *observer, const GPtrArray *witnesses,
                              GCancellable *cancellable, GError **error);
/* The same of one dip of a record that was asked about. */
gboolean ant_outside_job_ask (AntRecord *record, const AntSettings *settings, const AntObserverChoice *observer,
                              const GPtrArray *witnesses, const AntDip *dip, AntVerdict *verdict, GCancellable *cancellable,
                              GError **error);
