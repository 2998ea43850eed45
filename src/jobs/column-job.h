/* column-job.h - what the further columns of a record say of its dips: bands by the ratio of depths, housekeeping by whether
 * it moves with them. */
#pragma once

#include "data/record.h"
#include "data/settings.h"
#include "verdict/verdict.h"

/* The columns of a gridded record that can say something: a band tells its wavelength in its name; what has the value's own
 * unit, or follows it sample by sample, is another processing of the same and says nothing; nor do errors, counts, flags and
 * times. Borrows the record. NULL if there are none. */
typedef struct _AntColumnJob AntColumnJob;
AntColumnJob *ant_column_job_new (AntRecord *record, const AntSettings *settings);
void ant_column_job_free (AntColumnJob *job); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntColumnJob, ant_column_job_free)

/* The evidence of bands (the one with the least error) and of housekeeping (the column that moves most with the event), added to
 * a verdict, which is to be decided anew then. */
void ant_column_job_add (const AntColumnJob *job, const AntDip *dip, AntVerdict *verdict);
