/* energy.c - s' C^-1 s of short shapes, exact through gaps: whiten the shape, then let a stored matrix account for the
 * memory that it leaves behind. Eight shapes that begin together share one pass over the factor. */
#include <math.h>
#include <string.h>
#include "noise/whitener-private.h"
#include "core/simd.h"

typedef struct
{
  AntEight memory[ANT_MAX_TERMS];
  AntEight innovation; /* of the last sample, not yet in memory */
  AntEight energy, moment, weight;
  AntEight level; /* s' C^-1 1 */
} Lanes;

/* Bring the memory from sample i-1 to sample i and add up what it predicts there. One pass over the memory, and four sums
 * so that one addition need not wait for another. */
static inline __attribute__ ((always_inline)) void
lanes_predict (const AntWhitener *whitener, size_t width, size_t i, Lanes *lanes, AntEight *predicted)
{
  double scratch[ANT_MAX_TERMS];
  const double *u = whitener->u + i * width, *w = whitener->w + (i - 1) * width;
  const double *decay = ant_decay_before (whitener, i, scratch);
  AntEight part[4] = { { 0 } };
  for (size_t j = 0; j < width; j += 4)
    for (size_t q = 0; q < 4; q++)
      {
        lanes->memory[j + q] = decay[j + q] * (lanes->memory[j + q] + w[j + q] * lanes->innovation);
        part[q] += u[j + q] * lanes->memory[j + q];
      }
  *predicted = (part[0] + part[1]) + (part[2] + part[3]);
}

static inline __attribute__ ((always_inline)) void
lanes_learn (const AntWhitener *whitener, size_t i, const AntEight *shape, const AntEight *predicted, Lanes *lanes)
{
  lanes->innovation = *shape - *predicted;
  lanes->energy += lanes->innovation * lanes->innovation * (1.0 / whitener->d[i]);
}

/* The energy that the memory entering checkpoint sample i still leaves in all later samples. */
static inline __attribute__ ((always_inline)) void
lanes_tail (const AntWhitener *whitener, size_t width, size_t i, Lanes *lanes)
{
  const double *o = whitener->tail + i / whitener->every * width * width;
  for (size_t j = 0; j < width; j++)
    {
      AntEight sum = { 0 };
      for (size_t k = 0; k < width; k++)
        sum += o[j * width + k] * lanes->memory[k];
      lanes->energy += sum * lanes->memory[j];
    }
}

static inline __attribute__ ((always_inline)) void
lanes_run (const AntWhitener *whitener, size_t width, const double *z, ptrdiff_t first, size_t n_shape,
           const double *shape, Lanes *lanes)
{
  static const AntEight nothing;
  size_t from = first < 0 ? 0 : (size_t) first, m = whitener->observed;
  ptrdiff_t end = first + (ptrdiff_t) n_shape;
  size_t start = from < whitener->n ? whitener->next[from] : m, i;
  memset (lanes, 0, sizeof *lanes);
  for (i = start; i < m && (ptrdiff_t) whitener->place[i] < end; i++)
    {
      AntEight s, predicted = nothing;
      if (i > start)
        lanes_predict (whitener, width, i, lanes, &predicted);
      memcpy (&s, shape + ((ptrdiff_t) whitener->place[i] - first) * ANT_LANES, sizeof s);
      lanes_learn (whitener, i, &s, &predicted, lanes);
      lanes->moment += s * (z ? z[whitener->place[i]] : 0);
      lanes->weight += s;
      if (whitener->level)
        lanes->level += s * whitener->level[whitener->place[i]];
    }
  if (i == start)
    return; /* nothing of the window is observed */
  for (; i < m; i++)
    {
      AntEight predicted;
      lanes_predict (whitener, width, i, lanes, &predicted);
      if (i % whitener->every == 0)
        {
          lanes_tail (whitener, width, i, lanes);
          return;
        }
      lanes_learn (whitener, i, &nothing, &predicted, lanes);
    }
}

ANT_SIMD void
ant_whitener_energies (const AntWhitener *whitener, const double *z, ptrdiff_t first, size_t n_shape,
                       const double *shape, double energy[ANT_LANES], double moment[ANT_LANES], double weight[ANT_LANES])
{
  Lanes lanes;
  ant_pace_on (whitener->pace, n_shape);
  switch (whitener->terms.terms)
    {
    case 4: lanes_run (whitener, 4, z, first, n_shape, shape, &lanes); break;
    case 8: lanes_run (whitener, 8, z, first, n_shape, shape, &lanes); break;
    case 12: lanes_run (whitener, 12, z, first, n_shape, shape, &lanes); break;
    case 16: lanes_run (whitener, 16, z, first, n_shape, shape, &lanes); break;
    default: lanes_run (whitener, whitener->terms.terms, z, first, n_shape, shape, &lanes); break;
    }
  if (whitener->level)
    lanes.energy -= lanes.level * lanes.level * (1.0 / whitener->level_energy);
  memcpy (energy, &lanes.energy, sizeof lanes.energy);
  memcpy (moment, &lanes.moment, sizeof lanes.moment);
  memcpy (weight, &lanes.weight, sizeof lanes.weight);
}
