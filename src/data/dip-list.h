/* dip-list.h - the dips (or brightenings) of one record with what was asked of the search: all that a table tells.
 * A view, it owns nothing. */
#pragma once

#include <glib.h>
#include "data/judgement.h"
#include "search/dip.h"
#include "verdict/verdict.h"

typedef struct
{
  gboolean brightenings;         /* this list is of the other sign: negative depths and SNRs */
  const char *incomplete;        /* what a stopped scan lacks, as a sentence; NULL: nothing */
  gsize n;
  const AntDip *dip;             /* [n] in the order in which they are numbered */
  const AntVerdict *verdict;     /* [n], or NULL if none were made */
  double limb_u1, limb_u2;       /* quadratic limb darkening of the templates */
  double threshold_snr;          /* NaN for an asked dip: there was no search */
  double false_alarms;           /* dips of this sign expected by chance at that threshold in the record; NaN unknown */
  gsize n_surrogates, n_surrogate_events; /* that the chance law was refitted to, and their events; 0: the built-in law */
  gboolean mirror_known;         /* the mirrored search was run: */
  gsize n_found, n_mirrored;     /*   dips at or above the threshold, and brightenings, of the durations it checks */
  const double *upper_limit_ppm; /* [n] 95 % upper limits of asked dips, NaN beside dips that a search found; NULL: all were */
  const char *const *analyst_class, *const *analyst_note; /* [n] what the analyst said of each; NULL: nothing of any */
  const AntJudgements *judgements; /* the same by the dips' times, where these are NULL; NULL: nothing was said */
} AntDipList;
