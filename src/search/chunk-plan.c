/* chunk-plan.c - where a long record is cut. */
#include "search/chunk.h"
#include <math.h>
#include "core/units.h"

#define LEAST_OBSERVED 300

static double
length_d (const AntSeries *series, const AntChunkOptions *options)
{
  if (options->length_d > 0)
    return options->length_d;
  double days = series->step_d < 10 / ANT_MINUTES_PER_DAY ? 90 : 180;
  return fmax (days, 500 * series->step_d); /* at a daily cadence a chunk is 500 samples */
}

static size_t
count (const AntSeries *series, const AntChunkOptions *options)
{
  double whole_d = (double) series->n * series->step_d, length = length_d (series, options);
  if (whole_d <= 1.3 * length)
    return 1;
  return (size_t) ceil ((whole_d - options->overlap_d) / (length - options->overlap_d));
}

size_t
ant_chunks_room (const AntSeries *series, const AntChunkOptions *options)
{
  return count (series, options);
}

static size_t
observed_in (const AntSeries *series, size_t first, size_t n)
{
  AntSeries part = ant_series_part (series, first, n);
  return ant_series_observed (&part, 0);
}

/* A stretch that is mostly gap borrows from its neighbours until a fit is possible. */
static void
lengthen (const AntSeries *series, AntChunk *chunk)
{
  size_t grow = chunk->n / 4 + 1;
  while (chunk->n < series->n && observed_in (series, chunk->first, chunk->n) < LEAST_OBSERVED)
    {
      size_t end = chunk->first + chunk->n + grow;
      chunk->first = chunk->first > grow ? chunk->first - grow : 0;
      chunk->n = (end < series->n ? end : series->n) - chunk->first;
    }
}

size_t
ant_chunks_plan (const AntSeries *series, const AntChunkOptions *options, size_t room, AntChunk *chunk)
{
  size_t n = count (series, options);
  if (n > room)
    return (size_t) -1;
  double overlap = n > 1 ? options->overlap_d / series->step_d : 0;
  double length = n > 1 ? ((double) series->n + overlap * (double) (n - 1)) / (double) n : (double) series->n;
  for (size_t i = 0; i < n; i++)
    {
      double from = (double) i * (length - overlap);
      chunk[i] = (AntChunk){ .first = (size_t) from };
      size_t end = i + 1 == n ? series->n : (size_t) ceil (from + length);
      chunk[i].n = end - chunk[i].first;
      chunk[i].own_from = i ? from + 0.5 * overlap : -HUGE_VAL;
      chunk[i].own_to = i + 1 < n ? from + length - 0.5 * overlap : HUGE_VAL;
      lengthen (series, &chunk[i]);
    }
  return n;
}

double
ant_chunk_share (const AntChunk *chunk, double overlap, double place)
{
  if (!(overlap > 0))
    return place >= chunk->own_from && place < chunk->own_to;
  double rise = (place - chunk->own_from) / overlap + 0.5, fall = (chunk->own_to - place) / overlap + 0.5;
  return fmin (fmax (rise, 0), 1) * fmin (fmax (fall, 0), 1);
}
