/* evidence.h - pieces of evidence beside the shape: each a few numbers and the ln odds that it gives to every cause.
 *
 * Weights are ln likelihood ratios; a constant added to all of them means nothing. Where a weight rests on an assumed
 * share, the share stands beside it in evidence.c. Sentences are made in data/. */
#pragma once

#include <stddef.h>
#include "core/transit-curve.h"
#include "noise/series.h"
#include "noise/whitener.h"
#include "search/dip.h"
#include "verdict/cause.h"

typedef enum
{
  ANT_EVIDENCE_CHANCE,      /* number: expected false dips as strong in the record */
  ANT_EVIDENCE_GAP,         /* minutes from the end of the gap to the onset (0: it lies in the gap; NaN: no gap near);
                               share of the record's time that is as near a gap */
  ANT_EVIDENCE_EDGES,       /* ingress seen, egress seen: 0 or 1 */
  ANT_EVIDENCE_LOCAL_NOISE, /* scatter around the dip over that of the noise model */
  ANT_EVIDENCE_TWIN,        /* hours to the nearest event of the other sign (NaN: none near), its SNR, chance of one so near */
  ANT_EVIDENCE_CHORD,       /* speed over the disc, km/s; radius ratio */
  ANT_EVIDENCE_PREDICTED,   /* minutes from the predicted crossing (NaN: none), its depth, its T14 in hours; 1 if asked at all */
  ANT_EVIDENCE_ECLIPSED,    /* minutes from a predicted eclipse */
  ANT_EVIDENCE_WITNESS,     /* depth there, its sigma, correlation of the two noises; 1 if it was looking */
  ANT_EVIDENCE_BANDS,       /* ratio of two depths, its sigma, the ratio that a crossing gives */
  ANT_EVIDENCE_COLUMN,      /* significance of the regression on a housekeeping column; its index */
  ANT_EVIDENCE_ORBIT,       /* phase in the orbit, chance that the record's events crowd so at one phase */
  ANT_N_EVIDENCE,
} AntEvidenceKind;

typedef struct
{
  AntEvidenceKind kind;
  double number[4];
  double weight[ANT_N_CAUSES];
} AntEvidence;

/* How the record looks as a whole, for the chances of coincidence. */
typedef struct
{
  double near_gap;      /* share of its time that lies in a gap or just after one */
  double observed_d;
} AntSurroundings;
void ant_surroundings_measure (const AntSeries *series, AntSurroundings *facts);

void ant_evidence_gap (const AntSeries *series, const AntSurroundings *facts, const AntDip *dip, AntEvidence *evidence);
void ant_evidence_edges (const AntDip *dip, AntEvidence *evidence);
/* The scatter of the innovations within 2 d of the dip and outside it; z-like pull [observed of the whitener]. */
void ant_evidence_local_noise (const AntWhitener *whitener, const AntSeries *window, const double *innovation,
                               const AntDip *dip, AntEvidence *evidence);
/* Events of the other sign. */
void ant_evidence_twin (size_t n, const AntDip *other, const AntSurroundings *facts, const AntDip *dip,
                        AntEvidence *evidence);
/* The speed that a crossing's T14, impact and radius ratio ask of a body before the Sun. */
void ant_evidence_chord (double t14_d, double impact, double radius_ratio, AntEvidence *evidence);

/* What an almanac says of the time of an event: the nearest predicted crossing or eclipse, if there is one. */
typedef struct
{
  int asked;           /* the almanac could be asked: times, scale and observer are known */
  int found;
  double mid_d, t14_d, depth_ppm; /* of the predicted crossing, days from the record's origin */
  double tolerance_d;  /* how far it may be off: 10 min for a low orbit whose positions are not known */
} AntPredictedEvent;
/* The one nearest to an event, of n; asked and found are filled in, near is within a day of its contacts. */
AntPredictedEvent ant_predicted_nearest (int asked, size_t n, const AntPredictedEvent *event, const AntDip *dip);
/* rate_d: crossings a day that were assumed before the almanac was asked. */
void ant_evidence_predicted (const AntPredictedEvent *predicted, double rate_d, const AntDip *dip, AntEvidence *evidence);
void ant_evidence_eclipsed (const AntPredictedEvent *predicted, double rate_d, const AntDip *dip, AntEvidence *evidence);

/* What a second instrument on the same Sun shows at the time of an event, measured with the event's shape. */
typedef struct
{
  int looking;         /* it has data then */
  double depth_ppm, sigma_ppm;
  double correlation;  /* of the two records' noise on that time scale, measured */
} AntWitnessFact;
/* Agreement excludes the instrument and nothing else: every cause in the Sun or before it gains alike. */
void ant_evidence_witness (const AntWitnessFact *fact, const AntDip *dip, AntEvidence *evidence);

/* Depths of one event in two bands of the same instrument. */
typedef struct
{
  double depth_ppm[2], sigma_ppm[2];
  AntLimbDarkening limb_darkening[2]; /* each band's own */
} AntBandFact;
/* radius_ratio and impact: of the fitted crossing. */
void ant_evidence_bands (const AntBandFact *fact, double radius_ratio, double impact, AntEvidence *evidence);

/* The event's residual regressed on a housekeeping column: how many sigma the coefficient is from 0, and how many
 * columns were tried. */
void ant_evidence_column (double significance, size_t tried, size_t index, AntEvidence *evidence);

/* Onsets of all events of the record in phase of an orbit: crowded, as an instrument's would be? onset_d [n]. */
void ant_evidence_orbit (size_t n, const double *onset_d, double period_d, const AntDip *dip, AntEvidence *evidence);
