/* repeat-edges.c - the running sums behind the edges of dips. */
#include "search/repeat-edges.h"
#include <stdlib.h>
#include "core/prefix-sums.h"

AntStatus
ant_repeat_edges_init (AntRepeatEdges *edges, size_t n, const double *z, double ramp)
{
  *edges = (AntRepeatEdges){ .n = n, .ramp = ramp, .moment = malloc ((n + 1) * sizeof (double)),
                             .twice = malloc ((n + 1) * sizeof (double)) };
  if (!edges->moment || !edges->twice)
    {
      ant_repeat_edges_clear (edges);
      return ANT_NO_MEMORY;
    }
  ant_prefix_sums_double (n, z, edges->moment);
  double mean = 0; /* off, so that F stays small over millions of places */
  for (size_t i = 0; i <= n; i++)
    mean += edges->moment[i] / (double) (n + 1);
  for (size_t i = 0; i <= n; i++)
    edges->moment[i] -= mean;
  edges->twice[0] = 0;
  for (size_t i = 0; i < n; i++)
    edges->twice[i + 1] = edges->twice[i] + edges->moment[i + 1];
  return ANT_OK;
}

void
ant_repeat_edges_clear (AntRepeatEdges *edges)
{
  free (edges->moment);
  free (edges->twice);
  *edges = (AntRepeatEdges){ 0 };
}

/* F(x): its slope between places i and i+1 is the sum of z up to and with i. */
static inline double
twice_at (const AntRepeatEdges *edges, double x)
{
  if (x <= 0)
    return x * edges->moment[0];
  if (x >= (double) edges->n)
    return edges->twice[edges->n] + (x - (double) edges->n) * edges->moment[edges->n];
  size_t i = (size_t) x;
  return edges->twice[i] + (x - (double) i) * edges->moment[i + 1];
}

double
ant_repeat_edges_at (const AntRepeatEdges *edges, double place)
{
  return (twice_at (edges, place + edges->ramp) - twice_at (edges, place)) / edges->ramp;
}
