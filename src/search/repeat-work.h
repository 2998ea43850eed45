/* repeat-work.h - what the stages of a search for repeats share. Private to search/. */
#pragma once

#include "noise/whitener.h"
#include "search/refine.h"
#include "search/repeat-chance.h"
#include "search/repeat-shared.h"
#include "search/repeat-train.h"
#include "search/repeats.h"

#define ANT_REPEAT_TREES 64     /* most durations with a tree of their own */
#define ANT_REPEAT_PEAKS 400    /* most peaks of one sign that are climbed from */
#define ANT_REPEAT_FINALISTS 12 /* most peaks that are measured with exact energies */

/* Dips (0) or brightenings (1). */
typedef struct
{
  AntRepeatBox box;
  AntRepeatEdges edges;
  AntRepeatTrain train;
  size_t n_shared, n_trees;
  AntRepeatShared shared[2];  /* short periods finely stepped, long ones */
  double shared_from_d[3];    /* their ranges: [i] .. [i+1] */
  AntRepeatBoxes tree[ANT_REPEAT_TREES];
  AntRepeatBins bins;
} AntRepeatSide;

typedef struct
{
  int side;
  size_t engine;
  double from_d, to_d;
  AntRepeatBins part;
} AntRepeatSlice;

typedef struct
{
  int side;
  AntRepeatCell cell;
  AntTrainTrial trial;
  AntTrainSums sums;
} AntRepeatPeak;

typedef struct
{
  AntTrainTrial trial;
  AntTrainSums sums;
  long first, end;        /* numbers of its events */
  AntTrainEvent *event;   /* [end - first] with exact energies */
  AntShapeFit *fit;       /* [end - first] depth, sigma, coverage of each; fitted noise */
} AntRepeatFinalist;

struct _AntRepeats
{
  AntStop stop;
  AntSeries series;       /* value_ppm is `value` */
  AntRepeatOptions options;
  size_t n_chunks;
  const AntChunk *chunk;
  double ramp;            /* places */
  double span_d;
  float *value;           /* [n] the record less what earlier rounds took out */
  double *z;              /* [n] */
  AntRepeatPairs pairs;
  AntRepeatSide side[2];
  double *rate;           /* [n_chunks][ANT_CHANCE_DURATIONS] */
  AntRepeatChance chance;
  double threshold;
  size_t n_slices, room_slices;
  AntRepeatSlice *slice;
  size_t n_done, n_first; /* slices of the first round: done, all */
  size_t n_peaks;
  AntRepeatPeak *peak;
  size_t n_finalists;
  AntRepeatFinalist finalist[ANT_REPEAT_FINALISTS]; /* the best peaks of this round, by SNR */
  int active, dips_out;   /* whether this round runs; known dips are gaps by now */
  int now;                /* the side that this round looks at: the last one is for brightenings */
  size_t round;
  AntRepeatBins spectrum; /* of the first round's dips */
  size_t n_repeats;
  AntRepeat repeat[ANT_MOST_REPEATS];
  size_t n_mirrored;
  double best_mirrored;
};

/* repeat-round.c: the data of a round, its slices, their folds. */
AntStatus ant_repeats_whiten (AntRepeats *repeats, size_t chunk);
AntStatus ant_repeats_plan (AntRepeats *repeats);
AntStatus ant_repeats_fold (AntRepeats *repeats, size_t slice);
AntStatus ant_repeats_merge (AntRepeats *repeats);
void ant_repeats_forget (AntRepeats *repeats);
/* repeat-pick.c: from bins to peaks, refined, to what stands. */
AntStatus ant_repeats_pick_peaks (AntRepeats *repeats);
AntStatus ant_repeats_climb (AntRepeats *repeats, size_t peak);
/* repeat-finals.c: the best peaks under the exact noise, and the one that stands. */
AntStatus ant_repeats_choose (AntRepeats *repeats);
AntStatus ant_repeats_measure (AntRepeats *repeats, size_t chunk);
AntStatus ant_repeats_settle (AntRepeats *repeats);
void ant_repeats_forget_finalists (AntRepeats *repeats);
/* repeat-report.c: a finalist as a repeat, with errors, events and aliases. */
AntStatus ant_repeats_report (const AntRepeats *repeats, const AntRepeatFinalist *finalist, AntRepeat *repeat);
