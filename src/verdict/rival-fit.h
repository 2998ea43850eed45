/* rival-fit.h - one rival shape fitted to an event under the noise of the record, and its evidence.
 *
 * With y the record around the event, C its covariance (level free) and s the shape, the gain in ln likelihood over
 * nothing at all is a s'z - a^2 s'Cinv s / 2, z = Cinv y. A free depth a is integrated out under its prior (uniform in ln), a
 * crossing's depth follows from its radius ratio. The rest is integrated over its prior by evidence-integral.h. */
#pragma once

#include "noise/whitener.h"
#include "search/dip.h"
#include "verdict/priors.h"

/* The stretch of the record around an event, whitened. Borrows all; buffer is scratch of one thread. */
typedef struct
{
  const AntWhitener *whitener; /* level free */
  const double *z;
  AntSeries window;            /* what is fitted, other events taken out */
  double exposure_d;
  AntLimbDarkening limb_darkening;
  int sign;                    /* +1 dip, -1 brightening */
  AntCrossingShape eclipse;    /* ant_rival_eclipse of the event's depth */
  double *buffer;              /* [window.n * ANT_LANES] */
} AntRivalBench;

typedef struct
{
  AntRivalKind kind;
  int fitted;             /* 0: not a rival for this sign, or no data */
  double parameter[ANT_RIVAL_PARAMETERS]; /* where the posterior is highest; days from the record's origin */
  double mean[ANT_RIVAL_PARAMETERS], sigma[ANT_RIVAL_PARAMETERS]; /* median and half the central 68 % of the posterior; logarithmic ones of ln. Of a crossing, where
                                        the data tell the chord, by crossing-fit.h, else under a prior flat in depth */
  double depth_ppm, depth_sigma_ppm; /* positive = dark: of a crossing likewise, of the others at the best parameters */
  double log_gain;        /* ln likelihood over nothing, at best */
  double log_evidence;    /* ln (odds against nothing per event a day) */
  double chi2;            /* of the residual, per sample, from one duration before to one after the dip */
} AntRivalFit;

/* dip: as the search found it. ANT_NO_DATA leaves fit->fitted 0. */
AntStatus ant_rival_fit (const AntRivalBench *bench, const AntDip *dip, AntRivalKind kind, AntRivalFit *fit);
/* chi2 per sample with nothing taken out; NaN without a sample. */
double ant_rival_chi2_of_nothing (const AntRivalBench *bench, const AntDip *dip);
