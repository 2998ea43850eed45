/* repeat-tree.h - sums of two series over all events of every trial period: the folding tree.
 *
 * A fast folding algorithm (Staelin 1969, Proc. IEEE 57, 724) of any radix: rows (one period each) are added in blocks,
 * blocks of blocks, and so on, each sum serving all trial periods that it cannot tell apart. It goes depth first over
 * period, with one buffer for each level, so that it works in the cache.
 *
 * Periods, phases and rows are in places of the series. Row j of trial period P begins at phase + j P, rounded by at most
 * half a place on each level; every trial period's rows are shifted about their middle one. Time runs on from row to row
 * as long as the slip within a node stays below half a period; beyond that (many short rows) a block is folded over one
 * period, which may count one row of a block in place of its neighbour. */
#pragma once

#include <stddef.h>
#include "core/stages.h"

#define ANT_FOLD_LANES 16 /* phases are worked on in multiples of this */

/* Two series that are folded together, with zeros on both sides. */
typedef struct
{
  size_t n;
  size_t longest;  /* longest period plus reach that may be asked */
  float *a, *b;    /* at place 0 */
  float *memory;
} AntFoldArrays;

/* [n] zeros, to be filled in. */
AntStatus ant_fold_arrays_init (AntFoldArrays *arrays, size_t n, size_t longest);
void ant_fold_arrays_clear (AntFoldArrays *arrays);

/* One trial period: the sum of a over its rows at phase first_phase + t is the sum of a[r][t] over r < n_rows, likewise b. */
typedef struct
{
  double period;
  size_t first_phase, n_phases; /* a[r] may be read for n_phases rounded up to lanes, plus reach, places */
  size_t n_rows;                /* at most ANT_FOLD_RADIX */
  const float *const *a, *const *b;
} AntFoldLeaf;
#define ANT_FOLD_RADIX 8
typedef void (*AntFoldVisit) (void *data, const AntFoldLeaf *leaf);

typedef struct
{
  double from, to;    /* periods, from <= P < to; at least 2 and fewer rows than places */
  double drift_top;   /* end-to-end slip over the series between neighbouring trial periods */
  double drift_inner; /* largest slip within a block */
  size_t reach;       /* phases beyond one period that visit reads, lanes not counted */
  size_t tile;        /* phases worked on together; longer periods come in several leaves */
  const AntStop *stop; /* looked at between nodes; may be NULL */
} AntFoldRange;

/* Visit every trial period of the range, rising within a tile. Deterministic. ANT_STOPPED, ANT_NO_MEMORY. */
AntStatus ant_fold_tree_run (const AntFoldArrays *arrays, const AntFoldRange *range, AntFoldVisit visit, void *data);
/* Rows of a period: those that begin within the series. */
size_t ant_fold_rows (size_t n, double period);
/* The period up to which a range that begins at `from` should go, so that all of it has much the same number of rows. */
double ant_fold_chunk_end (size_t n, double from);
