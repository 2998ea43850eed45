/* scan-chunk.c - one chunk of a scan: its noise, its strong events one round after another, its weaker candidates. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "noise/spectrum.h"
#include "search/scan-private.h"

#define ROUNDS 4
#define FIT_STEPS 25
#define SHAPE_PASSES 2

/* The work of one slice: everything in places of the chunk. */
typedef struct
{
  AntScan *scan;
  AntChunk *chunk;
  AntSeries part;
  uint8_t *spike;
  float *value; /* the part less its strong events */
  double *z;
  AntWhitener *whitener;
  AntDipMap *map;
  size_t n_strong;
  AntEvent strong[ANT_PER_CHUNK];
  AntPeak avoid[ANT_PER_CHUNK];
} Work;

void
ant_scan_add_shape (const AntScan *scan, const AntShapeFit *fit, double factor, size_t first, size_t n, float *value)
{
  AntCrossingShape shape;
  const AntRefineOptions *o = &scan->refine;
  ant_crossing_shape_init (&shape, fit->duration_d, fit->edge_d, fit->impact, o->limb_darkening);
  double reach = 0.5 * (fit->duration_d + o->exposure_d) / o->step_d;
  ptrdiff_t from = (ptrdiff_t) ceil (fit->centre - reach), to = (ptrdiff_t) floor (fit->centre + reach);
  for (ptrdiff_t p = from; p <= to; p++)
    if (p >= (ptrdiff_t) first && p < (ptrdiff_t) (first + n))
      value[p - (ptrdiff_t) first]
        += (float) (factor * ant_crossing_shape_mean (&shape, ((double) p - fit->centre) * o->step_d, o->exposure_d));
}

void
ant_scan_mask (const AntScan *scan, double centre, double duration_d, size_t first, size_t n, uint8_t *spike)
{
  double reach = 0.6 * duration_d / scan->series.step_d;
  ptrdiff_t from = (ptrdiff_t) floor (centre - reach), to = (ptrdiff_t) ceil (centre + reach);
  for (ptrdiff_t p = from; p <= to; p++)
    if (p >= (ptrdiff_t) first && p < (ptrdiff_t) (first + n) && !spike[p - (ptrdiff_t) first])
      spike[p - (ptrdiff_t) first] = ANT_SPIKE_DIP;
}

/* The part without its strong events, except one (or none: except = n_strong). */
static void
subtract_strong (Work *work, size_t except)
{
  memcpy (work->value, work->part.value_ppm, work->part.n * sizeof *work->value);
  for (size_t i = 0; i < work->n_strong; i++)
    if (i != except)
      ant_scan_add_shape (work->scan, &work->strong[i].fit, work->strong[i].fit.depth_ppm, 0, work->part.n, work->value);
}

static AntStatus
whiten (Work *work)
{
  AntStatus status;
  ant_whitener_free (work->whitener);
  work->whitener = ant_whitener_new_free_level (&work->chunk->model, &work->part, &status);
  return status;
}

static AntStatus
draw_map (Work *work)
{
  AntStatus status = ant_whitener_solve (work->whitener, work->value, work->z);
  ant_dip_map_free (work->map);
  work->map = status ? NULL
                     : ant_dip_map_new (work->scan->bank, work->whitener, work->z, work->scan->options.least_coverage,
                                        work->scan->stop, &status);
  return status;
}

/* Strong peaks of both signs that the map shows beyond those known. Returns how many were added. */
static size_t
find_strong (Work *work)
{
  size_t before = work->n_strong;
  for (int sign = 1; sign >= -1; sign -= 2)
    {
      AntPeak peak[ANT_PER_CHUNK / 4];
      size_t found = ant_dip_map_peaks (work->map, sign, ANT_STRONG_SNR, work->n_strong, work->avoid,
                                        ANT_PER_CHUNK / 4, peak);
      for (size_t i = 0; found != (size_t) -1 && i < found && work->n_strong < ANT_PER_CHUNK; i++)
        {
          work->avoid[work->n_strong] = peak[i];
          work->strong[work->n_strong++] = (AntEvent){ .peak = peak[i], .sign = sign, .strong = 1 };
        }
    }
  return work->n_strong - before;
}

/* Fit every strong event with the others subtracted. */
static AntStatus
fit_strong (Work *work)
{
  AntStatus status = ANT_OK;
  for (int pass = 0; pass < SHAPE_PASSES; pass++)
    for (size_t i = 0; i < work->n_strong && !status; i++)
      {
        AntEvent *event = &work->strong[i];
        subtract_strong (work, i);
        status = ant_whitener_solve (work->whitener, work->value, work->z);
        if (!status && ant_refine (work->whitener, work->z, &event->peak, event->sign, &work->scan->refine, &event->fit))
          event->fit = (AntShapeFit){ .centre = event->peak.centre, .duration_d = event->peak.duration_d,
                                      .edge_d = event->peak.edge_d, .impact = ANT_SHAPE_IMPACT };
      }
  subtract_strong (work, work->n_strong);
  return status;
}

/* Mask the strong events, refit the noise without them, fit their shapes. */
static AntStatus
set_strong_aside (Work *work)
{
  for (size_t i = 0; i < work->n_strong; i++)
    ant_scan_mask (work->scan, work->strong[i].peak.centre, work->strong[i].peak.duration_d, 0, work->part.n, work->spike);
  AntStatus status = ant_chunk_fit (work->chunk, &work->part, work->spike, FIT_STEPS, 1);
  if (!status || status == ANT_NOT_CONVERGED)
    status = whiten (work);
  return status ? status : fit_strong (work);
}

static AntStatus
measure_spectrum (Work *work)
{
  AntStatus status;
  AntChunk *chunk = work->chunk;
  AntSeries part = work->part;
  part.value_ppm = work->value;
  AntSpectrum *spectrum = ant_spectrum_new (&part, 6, &status);
  if (!spectrum)
    return status;
  chunk->n_bins = ant_spectrum_bins (spectrum);
  chunk->frequency_cd = malloc (2 * chunk->n_bins * sizeof *chunk->frequency_cd);
  if (!chunk->frequency_cd)
    status = ANT_NO_MEMORY;
  else
    {
      chunk->power_unmasked = chunk->frequency_cd + chunk->n_bins;
      memcpy (chunk->frequency_cd, ant_spectrum_frequency_cd (spectrum), chunk->n_bins * sizeof *chunk->frequency_cd);
      status = ant_spectrum_unmasked (spectrum, &chunk->model, chunk->power_unmasked);
    }
  ant_spectrum_free (spectrum);
  return status;
}

/* Keep an event in the harvest if its epoch belongs to this chunk. Places become those of the record. */
static void
keep (Work *work, AntChunkHarvest *harvest, AntEvent event)
{
  double first = (double) work->chunk->first;
  event.peak.centre += first;
  event.fit.centre += first;
  event.chunk = (size_t) (work->chunk - work->scan->chunk);
  if (event.peak.centre >= work->chunk->own_from && event.peak.centre < work->chunk->own_to)
    harvest->event[harvest->n_events++] = event;
}

static AntStatus
reap (Work *work, AntChunkHarvest *harvest)
{
  harvest->event = malloc ((size_t) 3 * ANT_PER_CHUNK * sizeof *harvest->event);
  if (!harvest->event)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < work->n_strong; i++)
    keep (work, harvest, work->strong[i]);
  for (int sign = 1; sign >= -1; sign -= 2)
    {
      AntPeak peak[ANT_PER_CHUNK];
      size_t found = ant_dip_map_peaks (work->map, sign, ANT_KEEP_SNR, work->n_strong, work->avoid, ANT_PER_CHUNK, peak);
      if (found == (size_t) -1)
        return ANT_NO_MEMORY;
      for (size_t i = 0; i < found; i++)
        keep (work, harvest, (AntEvent){ .peak = peak[i], .sign = sign });
    }
  AntChunk *chunk = work->chunk;
  chunk->n_floor = ant_dip_map_floor (work->map, chunk->own_from - (double) chunk->first,
                                      chunk->own_to - (double) chunk->first, work->n_strong, work->avoid, ANT_MAX_FLOOR,
                                      chunk->floor);
  return ANT_OK;
}

static AntStatus
run (Work *work, AntChunkHarvest *harvest)
{
  work->chunk->model = work->scan->start;
  memcpy (work->chunk->curvature, work->scan->start_curvature, sizeof work->chunk->curvature);
  AntStatus status = ant_chunk_fit (work->chunk, &work->part, work->spike, FIT_STEPS, 1);
  if (!status || status == ANT_NOT_CONVERGED)
    status = whiten (work);
  if (!status)
    status = draw_map (work);
  for (int round = 0; round < ROUNDS && !status; round++)
    {
      if (!find_strong (work))
        break;
      status = set_strong_aside (work);
      if (!status)
        status = draw_map (work);
    }
  if (!status)
    status = reap (work, harvest);
  if (!status)
    status = ant_chance_field_measure (&harvest->chance, work->whitener, work->scan->bank, &work->scan->refine,
                                       work->chunk->own_from - (double) work->chunk->first,
                                       work->chunk->own_to - (double) work->chunk->first);
  if (!status)
    status = measure_spectrum (work);
  if (!status)
    ant_noise_fit_unconstrained (&work->chunk->model, &work->part, work->chunk->health.unconstrained);
  return status;
}

AntStatus
ant_scan_search_chunk (AntScan *scan, size_t i)
{
  AntChunk *chunk = &scan->chunk[i];
  AntChunkHarvest *harvest = &scan->harvest[i];
  Work *work = calloc (1, sizeof *work);
  if (!work)
    return ANT_NO_MEMORY;
  work->scan = scan;
  work->chunk = chunk;
  work->part = ant_series_part (&scan->series, chunk->first, chunk->n);
  work->spike = harvest->spike = calloc (chunk->n, 1);
  work->value = malloc (chunk->n * sizeof *work->value);
  work->z = malloc (chunk->n * sizeof *work->z);
  AntStatus status = ANT_NO_MEMORY;
  if (work->spike && work->value && work->z)
    {
      if (work->part.spike)
        memcpy (work->spike, work->part.spike, chunk->n);
      work->part.spike = work->spike;
      memcpy (work->value, work->part.value_ppm, chunk->n * sizeof *work->value);
      status = run (work, harvest);
    }
  ant_dip_map_free (work->map);
  ant_whitener_free (work->whitener);
  free (work->value);
  free (work->z);
  free (work);
  return status;
}
