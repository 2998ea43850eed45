/* verdict.h - what an event is: probabilities of its shape and of its cause, from rival shapes, rates and evidence. */
#pragma once

#include "core/stages.h"
#include "verdict/evidence.h"
#include "verdict/priors.h"
#include "verdict/rival-fit.h"

typedef struct
{
  int target_star;      /* a star: every crossing is a planet's; the Sun: only a predicted one is */
  AntCauseRates rates;
  double observed_d;    /* of the record: expected_false belongs to it */
} AntVerdictOptions;

typedef struct
{
  int sign;             /* +1 dip, -1 brightening */
  AntRivalFit rival[ANT_N_RIVALS];
  double chi2_of_nothing;
  size_t n_evidence;
  AntEvidence evidence[ANT_N_EVIDENCE];
  double rival_probability[ANT_N_RIVALS + 1]; /* of the shape, the last: of none; other evidence left aside */
  double shape_probability[ANT_N_CAUSES];     /* these by cause, target star */
  double probability[ANT_N_CAUSES];           /* of the cause, all evidence in */
  AntCause shape, cause;                      /* the likeliest */
} AntVerdict;

/* Below these no cause is named: undecided. Half a crossing is told from half an eclipse or half a fault by what was assumed
 * beforehand alone: where ingress or egress was not observed and no almanac expected it, it takes more. */
#define ANT_VERDICT_LEAST 0.6
#define ANT_VERDICT_LEAST_HALF_SEEN 0.99

/* Fit every rival to an event, and what its own record says besides. pull: innovations of the bench's window without
 * the dip's own noise fit. ANT_STOPPED if stop is asked. */
AntStatus ant_verdict_compare (const AntRivalBench *bench, const AntDip *dip, const AntStop *stop, AntVerdict *verdict);
/* Put a piece of evidence in place of the one of its kind. */
void ant_verdict_add (AntVerdict *verdict, const AntEvidence *evidence);
/* NULL if there is none of that kind. */
const AntEvidence *ant_verdict_evidence (const AntVerdict *verdict, AntEvidenceKind kind);
/* Probabilities from all that is there; also fills in the evidence of chance. */
void ant_verdict_decide (AntVerdict *verdict, const AntDip *dip, const AntVerdictOptions *options);
/* The cause, if a verdict may be called by it at this probability (of its cause or of its shape); else ANT_N_CAUSES. */
AntCause ant_verdict_named (const AntVerdict *verdict, AntCause cause, double probability);
