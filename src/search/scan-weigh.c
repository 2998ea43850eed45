/* scan-weigh.c - weigh a candidate: mask it, refit the noise without it, and measure it under that noise; then fit all
 * accepted events of a chunk together. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/dense.h"
#include "search/scan-private.h"

#define JOINT_PASSES 2

/* A stretch of the record with its own copies of values and masks. */
typedef struct
{
  size_t first;
  AntSeries part;
  float *value;
  uint8_t *spike;
  double *z;
  AntNoiseModel model;
  AntWhitener *whitener;
} Bench;

static void
bench_clear (Bench *bench)
{
  ant_whitener_free (bench->whitener);
  free (bench->value);
  free (bench->spike);
  free (bench->z);
}

static AntStatus
bench_lay (Bench *bench, const AntScan *scan, size_t first, size_t n)
{
  bench->first = first;
  bench->part = ant_series_part (&scan->series, first, n);
  n = bench->part.n;
  bench->value = malloc (n * sizeof *bench->value);
  bench->spike = malloc (n);
  bench->z = malloc (n * sizeof *bench->z);
  if (!bench->value || !bench->spike || !bench->z)
    return ANT_NO_MEMORY;
  memcpy (bench->value, scan->residual + first, n * sizeof *bench->value);
  memcpy (bench->spike, scan->spike + first, n);
  bench->part.value_ppm = bench->value;
  bench->part.spike = bench->spike;
  return ANT_OK;
}

/* Refit the noise under the bench's masks, factor, whiten. */
static AntStatus
bench_whiten (Bench *bench, const AntChunk *chunk)
{
  AntStatus status = ant_chunk_refit (chunk, &bench->part, &bench->model);
  if (!status)
    bench->whitener = ant_whitener_new_free_level (&bench->model, &bench->part, &status);
  return status ? status : ant_whitener_solve (bench->whitener, bench->value, bench->z);
}

/* The stretch under which an event is weighed: its chunk, or one centred on it where it lies near the chunk's border.
 * Returns whether it does. */
static int
stretch_for (const AntScan *scan, const AntEvent *event, size_t *first, size_t *n)
{
  const AntChunk *chunk = &scan->chunk[event->chunk];
  double border = scan->options.chunk.overlap_d / scan->series.step_d, centre = event->peak.centre;
  *first = chunk->first;
  *n = chunk->n;
  int near_start = chunk->first > 0 && centre - (double) chunk->first < border;
  int near_end = chunk->first + chunk->n < scan->series.n && (double) (chunk->first + chunk->n) - centre < border;
  if (near_start || near_end)
    {
      double from = fmax (centre - 0.5 * (double) chunk->n, 0);
      *first = (size_t) fmin (from, (double) (scan->series.n - chunk->n));
    }
  return near_start || near_end;
}

static AntPeak
as_seen_from (const AntPeak *peak, size_t first)
{
  AntPeak moved = *peak;
  moved.centre -= (double) first;
  return moved;
}

AntStatus
ant_scan_weigh (AntScan *scan, size_t index)
{
  AntEvent *event = &scan->event[index];
  const AntChunk *chunk = &scan->chunk[event->chunk];
  Bench bench = { 0 };
  size_t first, n;
  stretch_for (scan, event, &first, &n);
  AntStatus status = bench_lay (&bench, scan, first, n);
  if (!status)
    {
      ant_scan_mask (scan, event->peak.centre, event->peak.duration_d, first, bench.part.n, bench.spike);
      status = bench_whiten (&bench, chunk);
    }
  if (!status)
    {
      AntPeak peak = as_seen_from (&event->peak, first);
      AntStatus fitted = ant_refine (bench.whitener, bench.z, &peak, event->sign, &scan->refine, &event->fit);
      event->fit.centre += (double) first;
      if (fitted == ANT_NO_DATA)
        event->fit = (AntShapeFit){ 0 };
      else
        status = fitted;
    }
  bench_clear (&bench);
  return status;
}

/* Amplitudes of all shapes at once: G a = b with G_ij = s_i'C^-1 s_j, b_i = s_i'z. */
static AntStatus
joint_amplitudes (const AntScan *scan, Bench *bench, size_t n, AntEvent **event)
{
  size_t places = bench->part.n;
  float *shape = malloc (n * places * sizeof *shape);
  double *work = calloc (2 * n * n + n, sizeof *work), *gram = work, *inverse = work + n * n, *b = work + 2 * n * n;
  double *zs = malloc (places * sizeof *zs);
  AntStatus status = shape && work && zs ? ANT_OK : ANT_NO_MEMORY;
  for (size_t i = 0; i < n && !status; i++)
    {
      memset (shape + i * places, 0, places * sizeof *shape);
      ant_scan_add_shape (scan, &event[i]->fit, -1, bench->first, places, shape + i * places);
    }
  if (!status)
    status = ant_whitener_solve (bench->whitener, bench->value, bench->z);
  for (size_t i = 0; i < n && !status; i++)
    {
      status = ant_whitener_solve (bench->whitener, shape + i * places, zs);
      for (size_t p = 0; p < places && !status; p++)
        {
          b[i] += (double) shape[i * places + p] * bench->z[p];
          for (size_t j = 0; j <= i; j++)
            gram[i * n + j] += (double) shape[j * places + p] * zs[p];
        }
    }
  if (!status)
    status = ant_cholesky (n, gram);
  if (!status)
    {
      ant_cholesky_inverse (n, gram, inverse);
      ant_cholesky_solve (n, gram, b, b);
      for (size_t i = 0; i < n; i++)
        {
          event[i]->fit.depth_ppm = b[i];
          event[i]->fit.sigma_ppm = sqrt (inverse[i * n + i]);
          event[i]->fit.snr = b[i] / event[i]->fit.sigma_ppm;
        }
    }
  free (shape);
  free (work);
  free (zs);
  return status;
}

static int
stands (const AntScan *scan, const AntEvent *event)
{
  return !event->dropped && (event->strong || event->sign * event->fit.snr >= scan->threshold_snr);
}

/* Mask every event that stands, and take all but one out of the values. */
static void
take_out (const AntScan *scan, Bench *bench, const AntEvent *alone)
{
  for (size_t i = 0; i < scan->n_events; i++)
    if (stands (scan, &scan->event[i]))
      {
        const AntShapeFit *fit = &scan->event[i].fit;
        ant_scan_mask (scan, fit->centre, fit->duration_d, bench->first, bench->part.n, bench->spike);
        if (&scan->event[i] != alone)
          ant_scan_add_shape (scan, fit, fit->depth_ppm, bench->first, bench->part.n, bench->value);
      }
}

AntStatus
ant_scan_weigh_at_border (AntScan *scan, size_t index)
{
  AntEvent *event = &scan->event[index];
  size_t first, n;
  event->border_fit = event->fit;
  if (!stretch_for (scan, event, &first, &n) || !stands (scan, event))
    return ANT_OK;
  Bench bench = { 0 };
  AntStatus status = bench_lay (&bench, scan, first, n);
  if (!status)
    {
      memcpy (bench.value, scan->series.value_ppm + first, bench.part.n * sizeof *bench.value);
      take_out (scan, &bench, event);
      status = bench_whiten (&bench, &scan->chunk[event->chunk]);
    }
  AntPeak peak = { .centre = event->fit.centre - (double) first, .duration_d = event->fit.duration_d,
                   .edge_d = event->fit.edge_d };
  AntShapeFit fit;
  if (!status && !ant_refine (bench.whitener, bench.z, &peak, event->sign, &scan->refine, &fit))
    {
      fit.centre += (double) first;
      event->border_fit = fit;
    }
  bench_clear (&bench);
  return status;
}

/* Events of this chunk that stand: strong ones, and candidates at the threshold. */
static size_t
standing (AntScan *scan, size_t chunk, AntEvent ***list)
{
  size_t n = 0;
  *list = malloc ((scan->n_events + 1) * sizeof **list);
  for (size_t i = 0; *list && i < scan->n_events; i++)
    if (scan->event[i].chunk == chunk && stands (scan, &scan->event[i]))
      (*list)[n++] = &scan->event[i];
  return n;
}

AntStatus
ant_scan_fit_together (AntScan *scan, size_t index)
{
  const AntChunk *chunk = &scan->chunk[index];
  AntEvent **event;
  Bench bench = { 0 };
  size_t n = standing (scan, index, &event);
  if (!event)
    return ANT_NO_MEMORY;
  AntStatus status = ANT_OK;
  if (n > 1 || (n == 1 && event[0]->strong))
    {
      status = bench_lay (&bench, scan, chunk->first, chunk->n);
      for (size_t i = 0; i < n && !status; i++)
        {
          ant_scan_mask (scan, event[i]->fit.centre, event[i]->fit.duration_d, bench.first, bench.part.n, bench.spike);
          if (!event[i]->strong) /* strong ones are already out of the residual */
            ant_scan_add_shape (scan, &event[i]->fit, event[i]->fit.depth_ppm, bench.first, bench.part.n, bench.value);
        }
      if (!status)
        status = bench_whiten (&bench, chunk);
      for (size_t i = 0; i < JOINT_PASSES * n && !status; i++)
        {
          AntEvent *one = event[i % n]; /* put it back, fit it, take it out again */
          ant_scan_add_shape (scan, &one->fit, -one->fit.depth_ppm, bench.first, bench.part.n, bench.value);
          status = ant_whitener_solve (bench.whitener, bench.value, bench.z);
          AntPeak peak = { .centre = one->fit.centre - (double) bench.first, .duration_d = one->fit.duration_d,
                           .edge_d = one->fit.edge_d };
          AntShapeFit fit = one->fit;
          if (!status && !ant_refine (bench.whitener, bench.z, &peak, one->sign, &scan->refine, &fit))
            {
              fit.centre += (double) bench.first;
              one->fit = fit;
            }
          ant_scan_add_shape (scan, &one->fit, one->fit.depth_ppm, bench.first, bench.part.n, bench.value);
        }
      for (size_t i = 0; i < n && !status; i++)
        ant_scan_add_shape (scan, &event[i]->fit, -event[i]->fit.depth_ppm, bench.first, bench.part.n, bench.value);
      if (!status)
        {
          status = joint_amplitudes (scan, &bench, n, event);
          if (status == ANT_NOT_POSITIVE) /* two shapes are one: leave the separate fits */
            status = ANT_OK;
        }
    }
  bench_clear (&bench);
  free (event);
  return status;
}
