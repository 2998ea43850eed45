/* repeat-tree.c - the folding tree: a plan of block sizes, windows that follow the slip, and the sums. */
#include "search/repeat-tree.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/simd.h"

#define MOST_LEVELS 8
#define MARGIN 64   /* zeros before the series, and after what may be asked */
#define FEW_ROWS 40 /* up to here a chunk of periods has one number of rows */
#define CHUNK 0.03  /* beyond, it is this wide */

/* Sums over blocks of `rows` rows. Block k stands in a + k room from place base[k] on. */
typedef struct
{
  size_t radix, rows, n_blocks, room;
  size_t leaves;   /* trial periods that one node serves */
  size_t slack;    /* places that rounding on deeper levels may ask beyond the leaves' own */
  double period;   /* of the node that is in the buffer */
  float *a, *b;
  ptrdiff_t *base;
  unsigned char *round; /* folded over one period */
} Level;

typedef struct
{
  const AntFoldArrays *arrays;
  const AntFoldRange *range;
  AntFoldVisit visit;
  void *data;
  size_t n_rows, n_leaves, n_levels;
  double step;        /* of the trial period */
  size_t phase, tile; /* present tile */
  int whole;          /* one tile holds the whole period */
  Level level[MOST_LEVELS + 1]; /* [0]: the series itself */
} Walk;

AntStatus
ant_fold_arrays_init (AntFoldArrays *arrays, size_t n, size_t longest)
{
  size_t length = n + longest + longest / 2 + 2 * MARGIN;
  *arrays = (AntFoldArrays){ .n = n, .longest = longest, .memory = calloc (2 * length, sizeof (float)) };
  if (!arrays->memory)
    return ANT_NO_MEMORY;
  arrays->a = arrays->memory + MARGIN;
  arrays->b = arrays->memory + length + MARGIN;
  return ANT_OK;
}

void
ant_fold_arrays_clear (AntFoldArrays *arrays)
{
  free (arrays->memory);
  *arrays = (AntFoldArrays){ 0 };
}

size_t
ant_fold_rows (size_t n, double period)
{
  return (size_t) ceil ((double) n / period);
}

double
ant_fold_chunk_end (size_t n, double from)
{
  size_t rows = ant_fold_rows (n, from * (1 + 1e-9)); /* where one chunk ends the next begins */
  return rows <= FEW_ROWS && rows > 1 ? (double) n / (double) (rows - 1) : from * (1 + CHUNK);
}

/* floor (), without a call where the processor has no instruction for it. */
static inline double
whole_part (double x)
{
  double whole = (double) (ptrdiff_t) x;
  return whole > x ? whole - 1 : whole;
}

static size_t
least (size_t one, size_t other)
{
  return one < other ? one : other;
}

/* Price of the levels from `level` on, a sum of the work for one trial period and phase: a node of `rows` rows is made once
 * for drift_inner/(rows-1) of period, a leaf once for drift_top/(n_rows-1). The overheads are measured. */
static double
plan_from (Walk *walk, size_t level, size_t rows, double spent, double best, size_t *radix, size_t *chosen, size_t *n_chosen)
{
  const AntFoldRange *range = walk->range;
  size_t blocks = (walk->n_rows + rows - 1) / rows;
  if (blocks <= ANT_FOLD_RADIX)
    {
      double total = spent + ((double) blocks + 2.5) / range->drift_top;
      if (total < best)
        {
          best = total;
          *n_chosen = level;
          memcpy (chosen, radix, level * sizeof *radix);
        }
    }
  for (size_t r = 2; r <= ANT_FOLD_RADIX && level < MOST_LEVELS && blocks > 1; r++)
    {
      double price = (1 - 1.0 / (double) (rows * r)) / range->drift_inner * ((double) r + 3);
      if (spent + price < best)
        {
          radix[level] = r;
          best = plan_from (walk, level + 1, rows * r, spent + price, best, radix, chosen, n_chosen);
        }
    }
  return best;
}

static AntStatus
reserve (Walk *walk)
{
  double longest = walk->range->to;
  size_t reach = walk->range->reach + ANT_FOLD_LANES;
  for (size_t l = 1; l <= walk->n_levels; l++)
    {
      Level *level = &walk->level[l];
      double slip = (double) walk->n_rows * walk->step * (double) level->leaves;
      double whole = 2.5 * longest, run = (double) walk->tile + slip;
      size_t sum_room = (size_t) (walk->whole && slip > 0.5 * longest ? whole : run) + reach + 2 * level->slack + 8;
      level->room = (sum_room + ANT_FOLD_LANES) / ANT_FOLD_LANES * ANT_FOLD_LANES;
      level->a = malloc (2 * level->n_blocks * level->room * sizeof *level->a);
      level->base = malloc (level->n_blocks * sizeof *level->base);
      level->round = malloc (level->n_blocks);
      if (!level->a || !level->base || !level->round)
        return ANT_NO_MEMORY;
      level->b = level->a + level->n_blocks * level->room;
    }
  return ANT_OK;
}

static AntStatus
plan (Walk *walk)
{
  const AntFoldRange *range = walk->range;
  size_t radix[MOST_LEVELS], chosen[MOST_LEVELS], rows = 1;
  walk->n_rows = ant_fold_rows (walk->arrays->n, range->from);
  double apart = range->drift_top / (double) (walk->n_rows > 2 ? walk->n_rows - 1 : 1);
  walk->n_leaves = (size_t) ceil ((range->to - range->from) / apart);
  walk->step = (range->to - range->from) / (double) walk->n_leaves;
  plan_from (walk, 0, 1, 0, HUGE_VAL, radix, chosen, &walk->n_levels);
  size_t longest = (size_t) ceil (range->to);
  walk->whole = longest <= range->tile;
  walk->tile = walk->whole ? longest : range->tile;
  walk->level[0] = (Level){ .rows = 1, .n_blocks = walk->n_rows };
  for (size_t l = 1; l <= walk->n_levels; l++)
    {
      Level *level = &walk->level[l];
      level->radix = chosen[l - 1];
      level->rows = rows *= level->radix;
      level->n_blocks = (walk->n_rows + rows - 1) / rows;
      level->leaves = (size_t) (range->drift_inner / (double) (rows - 1) / walk->step);
      if (!walk->whole) /* a tile cannot go round */
        level->leaves = least (level->leaves, (size_t) (0.5 * range->from / ((double) walk->n_rows * walk->step)));
      level->leaves = level->leaves ? level->leaves : 1;
      level->slack = 2 + (walk->n_levels - l) * ((size_t) ceil (0.25 * range->drift_inner) + 2);
    }
  return reserve (walk);
}

/* Window of block k for leaves with periods low..high: its first place and its length. */
static size_t
place_window (const Walk *walk, Level *level, size_t k, double low, double high)
{
  double first_row = (double) (k * level->rows), half = 0.5 * (double) (level->rows - 1);
  size_t reach = walk->range->reach + ANT_FOLD_LANES;
  level->round[k] = walk->whole && first_row * (high - low) > 0.5 * low;
  if (level->round[k])
    {
      level->base[k] = (ptrdiff_t) whole_part (first_row * level->period) - (ptrdiff_t) level->slack;
      return level->room;
    }
  double from = first_row * low + half * (low - level->period), to = first_row * high + half * (high - level->period);
  level->base[k] = (ptrdiff_t) whole_part (from) + (ptrdiff_t) walk->phase - (ptrdiff_t) level->slack;
  size_t length = (size_t) (to - whole_part (from)) + walk->tile + reach + 2 * level->slack + 2;
  return least (length, level->room);
}

/* The series or the sums of a level from absolute place `want` of a block on. */
static inline size_t
index_in (const Level *level, size_t k, double want)
{
  double index = whole_part (want + 0.5) - (double) level->base[k];
  if (level->round[k])
    {
      double turns = whole_part (index / level->period);
      index -= whole_part (turns * level->period + 0.5);
      index = index < 0 ? index + whole_part (level->period) : index;
    }
  return k * level->room + (size_t) index;
}

/* The source of block or row k, from place `want` on. Returns 0 for a row that begins beyond the series. */
static inline int
source (const Walk *walk, size_t l, size_t k, double want, const float **a, const float **b)
{
  if (l == 0)
    {
      ptrdiff_t place = (ptrdiff_t) whole_part (want + 0.5);
      if (place >= (ptrdiff_t) walk->arrays->n)
        return 0;
      *a = walk->arrays->a + place;
      *b = walk->arrays->b + place;
      return 1;
    }
  size_t index = index_in (&walk->level[l], k, want);
  *a = walk->level[l].a + index;
  *b = walk->level[l].b + index;
  return 1;
}

static inline __attribute__ ((always_inline)) void
sum_of (size_t n_rows, const float *const *row, size_t length, float *restrict sum)
{
  for (size_t t = 0; t < length; t++)
    {
      float total = row[0][t];
      for (size_t r = 1; r < n_rows; r++)
        total += row[r][t];
      sum[t] = total;
    }
}

static inline __attribute__ ((always_inline)) void
sum_rows (size_t n_rows, const float *const *row, size_t length, float *restrict sum)
{
  switch (n_rows)
    {
    case 0: memset (sum, 0, length * sizeof *sum); return;
    case 1: memcpy (sum, row[0], length * sizeof *sum); return;
    case 2: sum_of (2, row, length, sum); return;
    case 3: sum_of (3, row, length, sum); return;
    case 4: sum_of (4, row, length, sum); return;
    case 5: sum_of (5, row, length, sum); return;
    case 6: sum_of (6, row, length, sum); return;
    case 7: sum_of (7, row, length, sum); return;
    default: sum_of (8, row, length, sum); return;
    }
}

/* Repeat the first period of a block that is folded over one to the end of its room. */
static void
go_round (float *sum, double period, size_t known, size_t length)
{
  for (double turn = 1;; turn += 1)
    {
      size_t shift = (size_t) (turn * period + 0.5), from = turn == 1 ? known : (size_t) (turn * period + 0.5);
      if (from >= length)
        return;
      size_t until = (size_t) ((turn + 1) * period + 0.5);
      until = least (until, length);
      for (size_t t = from; t < until; t++)
        sum[t] = sum[t - shift];
    }
}

/* Fill level l with the sums of a node about its period, from those of the level above. */
ANT_SIMD static void
fold_level (Walk *walk, size_t l, double low, double high)
{
  Level *level = &walk->level[l];
  const Level *above = &walk->level[l - 1];
  double turned = 0.5 * (double) (above->rows - 1) * (level->period - above->period);
  for (size_t k = 0; k < level->n_blocks; k++)
    {
      const float *a[ANT_FOLD_RADIX], *b[ANT_FOLD_RADIX];
      size_t length = place_window (walk, level, k, low, high), n = 0;
      for (size_t j = 0; j < level->radix && k * level->radix + j < above->n_blocks; j++)
        {
          double want = (double) level->base[k] + (double) (j * above->rows) * level->period + turned;
          n += (size_t) source (walk, l - 1, k * level->radix + j, want, &a[n], &b[n]);
        }
      size_t period = (size_t) ceil (level->period) + 1, known = level->round[k] && period < length ? period : length;
      float *sum_a = level->a + k * level->room, *sum_b = level->b + k * level->room;
      sum_rows (n, a, known, sum_a);
      sum_rows (n, b, known, sum_b);
      if (known < length)
        {
          go_round (sum_a, level->period, known, length);
          go_round (sum_b, level->period, known, length);
        }
    }
}

static void
visit_leaf (const Walk *walk, size_t leaf)
{
  const Level *level = &walk->level[walk->n_levels];
  const float *a[ANT_FOLD_RADIX], *b[ANT_FOLD_RADIX];
  AntFoldLeaf here = { .period = walk->range->from + ((double) leaf + 0.5) * walk->step, .first_phase = walk->phase, .a = a, .b = b };
  size_t phases = (size_t) ceil (here.period);
  if (phases <= walk->phase)
    return;
  here.n_phases = least (phases - walk->phase, walk->tile);
  double turned = walk->n_levels ? 0.5 * (double) (level->rows - 1) * (here.period - level->period) : 0;
  for (size_t k = 0; k < level->n_blocks; k++)
    {
      double want = (double) (k * level->rows) * here.period + turned + (double) walk->phase;
      here.n_rows += (size_t) source (walk, walk->n_levels, k, want, &a[here.n_rows], &b[here.n_rows]);
    }
  if (here.n_rows)
    walk->visit (walk->data, &here);
}

static AntStatus
descend (Walk *walk, size_t l, size_t first, size_t end)
{
  if (l > walk->n_levels)
    {
      for (size_t leaf = first; leaf < end; leaf++)
        visit_leaf (walk, leaf);
      return ANT_OK;
    }
  Level *level = &walk->level[l];
  size_t nodes = (end - first + level->leaves - 1) / level->leaves;
  AntStatus status = ANT_OK;
  for (size_t i = 0; i < nodes && !status; i++)
    {
      size_t from = first + (end - first) * i / nodes, to = first + (end - first) * (i + 1) / nodes;
      double low = walk->range->from + ((double) from + 0.5) * walk->step, high = low + (double) (to - from - 1) * walk->step;
      level->period = 0.5 * (low + high);
      if (ant_stop_asked (walk->range->stop))
        return ANT_STOPPED;
      fold_level (walk, l, low, high);
      status = descend (walk, l + 1, from, to);
    }
  return status;
}

AntStatus
ant_fold_tree_run (const AntFoldArrays *arrays, const AntFoldRange *range, AntFoldVisit visit, void *data)
{
  Walk walk = { .arrays = arrays, .range = range, .visit = visit, .data = data };
  AntStatus status = plan (&walk);
  size_t longest = (size_t) ceil (range->to);
  for (walk.phase = 0; walk.phase < longest && !status; walk.phase += walk.tile)
    status = descend (&walk, 1, 0, walk.n_leaves);
  for (size_t l = 1; l <= walk.n_levels; l++)
    {
      free (walk.level[l].a);
      free (walk.level[l].base);
      free (walk.level[l].round);
    }
  return status;
}
