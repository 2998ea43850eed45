/* scan-trace.c - the last stage of a scan: trace the slow part of each chunk, its events taken out, and join the curves
 * and the passages read from them. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "search/scan-private.h"

#define SAME_PASSAGE_D 1.0 /* two chunks see one passage this far apart at most */

/* The chunk's own values without the events that stand and without spikes. */
static void
take_out_events (const AntScan *scan, const AntChunk *chunk, float *value)
{
  memcpy (value, scan->series.value_ppm + chunk->first, chunk->n * sizeof *value);
  for (size_t p = 0; p < chunk->n; p++)
    if (scan->spike[chunk->first + p] == ANT_SPIKE_FOUND)
      value[p] = NAN;
  for (size_t i = 0; i < scan->n_events; i++)
    {
      const AntEvent *event = &scan->event[i];
      if (!event->dropped && (event->strong || event->sign * event->fit.snr >= scan->threshold_snr))
        ant_scan_add_shape (scan, &event->fit, event->fit.depth_ppm, chunk->first, chunk->n, value);
    }
}

AntStatus
ant_scan_trace_slow (AntScan *scan, size_t i)
{
  const AntChunk *chunk = &scan->chunk[i];
  AntTrace *trace = &scan->trace[i];
  AntSeries part = ant_series_part (&scan->series, chunk->first, chunk->n);
  float *value = malloc (chunk->n * sizeof *value);
  trace->slow_ppm = malloc (chunk->n * sizeof *trace->slow_ppm);
  AntStatus status = value && trace->slow_ppm ? ANT_OK : ANT_NO_MEMORY;
  if (!status)
    {
      take_out_events (scan, chunk, value);
      part.value_ppm = value;
      status = ant_passages_trace (&chunk->model, &part, trace->slow_ppm, &trace->n_passages, &trace->passage);
    }
  free (value);
  return status;
}

/* One curve over the whole record: near a border both chunks' curves, each by its share. */
static AntStatus
join_curves (AntScan *scan)
{
  size_t n = scan->series.n;
  double overlap = scan->options.chunk.overlap_d / scan->series.step_d;
  float *total = calloc (n, sizeof *total);
  scan->slow_ppm = calloc (n, sizeof *scan->slow_ppm);
  if (!total || !scan->slow_ppm)
    {
      free (total);
      return ANT_NO_MEMORY;
    }
  for (size_t i = 0; i < scan->n_chunks; i++)
    for (size_t p = 0; p < scan->chunk[i].n; p++)
      {
        size_t place = scan->chunk[i].first + p;
        float share = (float) ant_chunk_share (&scan->chunk[i], overlap, (double) place);
        scan->slow_ppm[place] += share * scan->trace[i].slow_ppm[p];
        total[place] += share;
      }
  for (size_t p = 0; p < n; p++)
    scan->slow_ppm[p] /= total[p];
  free (total);
  return ANT_OK;
}

static int
by_time (const void *a, const void *b)
{
  double left = ((const AntPassage *) a)->mid_d, right = ((const AntPassage *) b)->mid_d;
  return (left > right) - (left < right);
}

/* Each chunk lists the passages of its own epochs and a little beyond, so that none falls between two; of one that two
 * chunks saw the deeper stays. */
static AntStatus
join_passages (AntScan *scan)
{
  size_t room = 0, n = 0;
  for (size_t i = 0; i < scan->n_chunks; i++)
    room += scan->trace[i].n_passages;
  AntPassage *all = scan->passage = malloc ((room + 1) * sizeof *scan->passage);
  if (!all)
    return ANT_NO_MEMORY;
  double margin = 0.5 * SAME_PASSAGE_D / scan->series.step_d;
  for (size_t i = 0; i < scan->n_chunks; i++)
    for (size_t k = 0; k < scan->trace[i].n_passages; k++)
      {
        AntPassage passage = scan->trace[i].passage[k];
        double place = ant_series_place (&scan->series, passage.mid_d);
        passage.chunk = i;
        if (place >= scan->chunk[i].own_from - margin && place < scan->chunk[i].own_to + margin)
          all[n++] = passage;
      }
  qsort (all, n, sizeof *all, by_time);
  for (size_t k = 0; k < n; k++)
    {
      AntPassage *last = scan->n_passages ? &all[scan->n_passages - 1] : NULL;
      if (!last || last->chunk == all[k].chunk || all[k].mid_d - last->mid_d > SAME_PASSAGE_D)
        all[scan->n_passages++] = all[k];
      else if (all[k].depth_ppm > last->depth_ppm)
        *last = all[k];
    }
  return ANT_OK;
}

AntStatus
ant_scan_join_traces (AntScan *scan)
{
  AntStatus status = join_curves (scan);
  return status ? status : join_passages (scan);
}
