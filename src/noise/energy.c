/* energy.c - s' C^-1 s of short shapes, exact through gaps: whiten the shape, then let a stored matrix account for the
 * memory that it leaves behind. Eight shapes that begin together share one pass over the factor. */
#include <math.h>
#include <string.h>
#include "noise/whitener-private.h"
#include "core/simd.h"

#define L ANT_LANES

typedef struct
{
  double memory[ANT_MAX_TERMS][L];
  double energy[L], moment[L], weight[L];
} Lanes;

/* Innovations of all lanes at sample i, given what they left in memory; adds them to the energy and to the memory. */
static inline __attribute__ ((always_inline)) void
lanes_sample (const AntWhitener *whitener, size_t width, size_t i, const double *shape, Lanes *lanes)
{
  const double *u = whitener->u + i * width, *w = whitener->w + i * width;
  double part[4][L] = { 0 }, innovation[L];
  for (size_t j = 0; j < width; j += 4) /* four sums, so that one addition need not wait for another */
    for (size_t q = 0; q < 4; q++)
      for (size_t l = 0; l < L; l++)
        part[q][l] += u[j + q] * lanes->memory[j + q][l];
  double scale = 1.0 / whitener->d[i];
  for (size_t l = 0; l < L; l++)
    {
      innovation[l] = (shape ? shape[l] : 0) - ((part[0][l] + part[1][l]) + (part[2][l] + part[3][l]));
      lanes->energy[l] += innovation[l] * innovation[l] * scale;
    }
  for (size_t j = 0; j < width; j++)
    for (size_t l = 0; l < L; l++)
      lanes->memory[j][l] += w[j] * innovation[l];
}

static inline __attribute__ ((always_inline)) void
lanes_decay (size_t width, const double *decay, Lanes *lanes)
{
  for (size_t j = 0; j < width; j++)
    for (size_t l = 0; l < L; l++)
      lanes->memory[j][l] *= decay[j];
}

/* The energy that the memory entering checkpoint sample i still leaves in all later samples. */
static inline __attribute__ ((always_inline)) void
lanes_tail (const AntWhitener *whitener, size_t width, size_t i, Lanes *lanes)
{
  const double *o = whitener->tail + i / whitener->every * width * width;
  for (size_t j = 0; j < width; j++)
    {
      double sum[L] = { 0 };
      for (size_t k = 0; k < width; k++)
        for (size_t l = 0; l < L; l++)
          sum[l] += o[j * width + k] * lanes->memory[k][l];
      for (size_t l = 0; l < L; l++)
        lanes->energy[l] += sum[l] * lanes->memory[j][l];
    }
}

static inline __attribute__ ((always_inline)) void
lanes_run (const AntWhitener *whitener, size_t width, const double *z, ptrdiff_t first, size_t n_shape,
           const double *shape, Lanes *lanes)
{
  double scratch[ANT_MAX_TERMS];
  size_t from = first < 0 ? 0 : (size_t) first, m = whitener->observed;
  ptrdiff_t end = first + (ptrdiff_t) n_shape;
  size_t start = from < whitener->n ? whitener->next[from] : m, i;
  memset (lanes, 0, sizeof *lanes);
  for (i = start; i < m && (ptrdiff_t) whitener->place[i] < end; i++)
    {
      const double *s = shape + ((ptrdiff_t) whitener->place[i] - first) * L;
      if (i > start)
        lanes_decay (width, ant_decay_before (whitener, i, scratch), lanes);
      lanes_sample (whitener, width, i, s, lanes);
      double value = z ? z[whitener->place[i]] : 0;
      for (size_t l = 0; l < L; l++)
        {
          lanes->moment[l] += s[l] * value;
          lanes->weight[l] += fabs (s[l]);
        }
    }
  if (i == start)
    return; /* nothing of the window is observed */
  for (; i < m; i++)
    {
      lanes_decay (width, ant_decay_before (whitener, i, scratch), lanes);
      if (i % whitener->every == 0)
        {
          lanes_tail (whitener, width, i, lanes);
          return;
        }
      lanes_sample (whitener, width, i, NULL, lanes);
    }
}

ANT_SIMD void
ant_whitener_energies (const AntWhitener *whitener, const double *z, ptrdiff_t first, size_t n_shape,
                       const double *shape, double energy[ANT_LANES], double moment[ANT_LANES], double weight[ANT_LANES])
{
  Lanes lanes;
  switch (whitener->terms.terms)
    {
    case 8: lanes_run (whitener, 8, z, first, n_shape, shape, &lanes); break;
    case 12: lanes_run (whitener, 12, z, first, n_shape, shape, &lanes); break;
    case 16: lanes_run (whitener, 16, z, first, n_shape, shape, &lanes); break;
    default: lanes_run (whitener, whitener->terms.terms, z, first, n_shape, shape, &lanes); break;
    }
  memcpy (energy, lanes.energy, sizeof lanes.energy);
  memcpy (moment, lanes.moment, sizeof lanes.moment);
  memcpy (weight, lanes.weight, sizeof lanes.weight);
}
