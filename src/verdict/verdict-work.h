/* verdict-work.h - verdicts for every event of a scan, as stages that may run on any threads.
 *
 * For each chunk the noise is refitted with all its listed events masked (a few warm steps, as the search weighs
 * candidates); for each event the record around it is whitened under that noise, events farther than a day taken out, and
 * the rivals are compared. Results are valid after the last finish. All arrays must outlive the work. */
#pragma once

#include "core/stages.h"
#include "search/chunk.h"
#include "verdict/verdict.h"

typedef struct
{
  const AntSeries *series;
  double exposure_d;
  AntLimbDarkening limb_darkening;
  size_t n_chunks;
  const AntChunk *chunk;
  size_t n_dips, n_brightenings;
  const AntDip *dip, *brightening;
  size_t n_others;           /* further events that are known and not judged: masked, and taken out where they are not near */
  const AntDip *other;
  double line_period_d;      /* orbit that events may be locked to; 0: none known */
  int almanac;               /* crossings and eclipses over the whole record are known: those listed, and no others */
  size_t n_crossings, n_eclipses;
  const AntPredictedEvent *crossing, *eclipse;
  AntVerdictOptions options; /* observed_d is filled in */
} AntVerdictInput;

typedef struct _AntVerdictWork AntVerdictWork;

/* Copies the input's numbers, borrows its arrays. NULL with *status set. */
AntVerdictWork *ant_verdict_work_new (const AntVerdictInput *input, AntStatus *status);
void ant_verdict_work_free (AntVerdictWork *work); /* NULL is fine */
const AntStages *ant_verdict_work_stages (void);
/* [n_dips], [n_brightenings] in the input's order; the work's own. */
const AntVerdict *ant_verdict_work_dips (const AntVerdictWork *work);
const AntVerdict *ant_verdict_work_brightenings (const AntVerdictWork *work);
double ant_verdict_work_observed_d (const AntVerdictWork *work);
