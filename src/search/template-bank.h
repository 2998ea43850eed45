/* template-bank.h - the shapes looked for: limb-darkened crossings of all durations, smeared by the exposure.
 *
 * A family shares its edge and its step in epoch; its members differ in duration (and, at coarse cadence, in sub-sample
 * phase). All members of a family that begin at one place are evaluated together, ANT_LANES at a time. Impact 0.3. */
#pragma once

#include <stddef.h>
#include "core/status.h"
#include "noise/whitener.h"
#include "search/crossing-shape.h"

typedef struct
{
  double duration_min_h, duration_max_h, duration_step_h; /* 0.5, 13, 0.5 */
  double edge_h;             /* wide edge, 20 min; members with a shorter half duration use 0.4 T14 */
  double sharp_edge_h;       /* sharp members, 5 min; 0 leaves them out */
  double exposure_d;         /* boxcar each sample averages over; <= 0 = the cadence */
  AntLimbDarkening limb_darkening;
} AntBankOptions;
#define ANT_BANK_OPTIONS_INIT { .duration_min_h = 0.5, .duration_max_h = 13, .duration_step_h = 0.5, .edge_h = 1.0 / 3, \
                                .sharp_edge_h = 1.0 / 12, .exposure_d = 0, .limb_darkening = ANT_LIMB_DARKENING_SUN }

typedef struct
{
  double duration_d, edge_d;
  double centre; /* middle of the shape, in places after the first sample of the window (fractional) */
  size_t length; /* samples from the first of the window to its last nonzero */
} AntMember;

typedef struct
{
  size_t stride;    /* places between trial starts */
  size_t n_members; /* multiple of ANT_LANES; unused lanes at the end have length 0 */
  double edge_d;
  AntMember *member;
  double **shape;   /* [n_members/ANT_LANES] blocks, each block_length[b]*ANT_LANES interleaved doubles */
  size_t *block_length;
} AntFamily;

typedef struct
{
  size_t n_families;
  AntFamily family[2];
  double step_d;
} AntTemplateBank;

/* Shapes are negative (a dip), greatest depth 1 before smearing. Durations below the cadence are left out (the longest
 * is always kept). The edge is at least the cadence; each duration comes in two sub-sample phases where the
 * cadence exceeds half the edge, in four where it equals it. The sharp family needs a cadence below half its edge. */
AntTemplateBank *ant_template_bank_new (const AntBankOptions *options, double step_d, AntStatus *status);
void ant_template_bank_free (AntTemplateBank *bank);
