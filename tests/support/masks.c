/* masks.c - gaps for the studies. */
#include "masks.h"
#include <string.h>
#include "core/units.h"

static void
lose (size_t n, unsigned char *seen, double from, double length)
{
  size_t first = from > 0 ? (size_t) from : 0, last = (size_t) (from + length);
  for (size_t i = first; i < last && i < n; i++)
    seen[i] = 0;
}

void
ant_mask_make (AntMask mask, size_t n, double step_d, AntRandom *random, unsigned char *seen)
{
  double per_min = 1 / (step_d * ANT_MINUTES_PER_DAY), days = (double) n * step_d;
  memset (seen, 1, n);
  if (mask == ANT_MASK_L1)
    {
      for (int i = 0; i < 5 * days / 30; i++)
        lose (n, seen, ant_random_uniform (random) * (double) n, (5 + 175 * ant_random_uniform (random)) * per_min);
      for (size_t i = 0; i < n; i++)
        if (ant_random_uniform (random) < 0.003)
          seen[i] = 0;
      return;
    }
  for (size_t i = 0; i < n; i++)
    {
      double minute = (double) i / per_min;
      if (minute - 96 * (double) (size_t) (minute / 96) < 35)
        seen[i] = 0;
    }
  for (int d = 0; d < days; d++)
    lose (n, seen, (d + ant_random_uniform (random)) * 1440 * per_min, (60 + 120 * ant_random_uniform (random)) * per_min);
  for (int i = 0; i < (int) (days / 30 + 0.5); i++)
    lose (n, seen, ant_random_uniform (random) * (double) n, (1 + 3 * ant_random_uniform (random)) * 1440 * per_min);
}
