/* closeup-data.h - one dip's surroundings, ready for the close-up painter: samples or their averages about the level
 * beside the dip, and the shape that was fitted. */
#pragma once

#include "data/comparison.h"
#include "data/settings.h"
#include "jobs/layers.h"
#include "plot/dip-closeup.h"
#include "verdict/verdict.h"

#define ANT_CLOSEUP_RIVALS 2

typedef struct
{
  AntDipCloseup closeup; /* its arrays belong to this struct */
  AntShapeLine shape[1 + ANT_CLOSEUP_RIVALS];
  struct AntDipCloseupWitness witness;
  double *points, *curve, *other; /* other: the witness's; NULL: none */
} AntCloseupData;

/* A millisecond of work. Never NULL; no points where nothing was observed. With a verdict (may be NULL) the likeliest rivals
 * of the fitted crossing are drawn too. */
AntCloseupData *ant_closeup_data_new (const AntLayers *layers, const AntSettings *settings, const AntDip *dip,
                                      const AntVerdict *verdict);
/* Add what a witness shows at the time of that dip, less a straight line through it beside the dip. */
void ant_closeup_data_add_witness (AntCloseupData *data, const AntComparison *comparison, const AntDip *dip);
/* Likewise of a passage (ant_passage_as_dip): the record's values, and the slow part drawn over them, if the results
 * have it. */
AntCloseupData *ant_closeup_data_new_passage (const AntScanResults *results, const AntDip *passage);
void ant_closeup_data_free (AntCloseupData *data); /* NULL is fine */
