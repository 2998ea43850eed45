/* witness-job.h - a second record beside the first: read, put on its grid, compared, and asked about single dips. */
#pragma once

#include "data/comparison.h"
#include "data/settings.h"
#include "verdict/evidence.h"

/* What a person asked for: "FILE", or "FILE::time=1,value=tsi" with columns as of --column. NULL with one sentence. */
AntWitness *ant_witness_parse (const char *text, GError **error);
/* Read the witness, lay its grid by the settings of the record's (a stated exposure, stamp or cadence is the record's own and
 * is not taken), compare. Seconds for a long one: off the main loop. NULL with one sentence. */
AntComparison *ant_witness_job_open (AntRecord *record, const AntWitness *witness, const AntSettings *settings,
                                     GCancellable *cancellable, GError **error);
/* What the witness shows at the time of a dip of the record, measured with the dip's fitted shape under the witness's own noise, and
 * how much of the two noises is one. Not looking where less than the least coverage is observed. */
void ant_witness_job_fact (const AntComparison *comparison, const AntSettings *settings, const AntDip *dip, AntWitnessFact *fact);
