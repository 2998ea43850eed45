/* asked.c - measure one dip that somebody asks about or predicts, with no search: its noise fitted around it, itself masked. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "search/scan-private.h"

/* The stretch around the asked time: a chunk's length, or the whole of a shorter record. */
static AntSeries
stretch (const AntSeries *series, const AntScanOptions *options, double mid_d)
{
  AntChunk first;
  size_t room = ant_chunks_room (series, &options->chunk);
  AntChunk *chunk = room > 1 ? calloc (room, sizeof *chunk) : &first;
  if (!chunk)
    return *series;
  ant_chunks_plan (series, &options->chunk, room, chunk);
  double length = (double) chunk[0].n, from = ant_series_place (series, mid_d) - 0.5 * length;
  from = fmax (0, fmin (from, (double) series->n - length));
  if (room > 1)
    free (chunk);
  return ant_series_part (series, (size_t) from, (size_t) length);
}

/* The samples that the asked dip covers, taken out: neither the noise nor the strong events around it may know of it. */
static AntStatus
without_dip (const AntScan *scan, double centre, double duration_d, float *value)
{
  size_t n = scan->series.n;
  uint8_t *inside = calloc (n, 1);
  if (!inside)
    return ANT_NO_MEMORY;
  ant_scan_mask (scan, centre, duration_d, 0, n, inside);
  for (size_t i = 0; i < n; i++)
    value[i] = inside[i] ? NAN : scan->series.value_ppm[i];
  free (inside);
  return ANT_OK;
}

/* The stretch less the strong events that were found around the asked dip. */
static void
subtract_others (const AntScan *scan, const AntSeries *series, float *value)
{
  const AntChunkHarvest *harvest = &scan->harvest[0];
  memcpy (value, series->value_ppm, series->n * sizeof *value);
  for (size_t i = 0; i < harvest->n_events; i++)
    if (harvest->event[i].strong)
      ant_scan_add_shape (scan, &harvest->event[i].fit, harvest->event[i].fit.depth_ppm, 0, series->n, value);
}

/* Fit the noise without the dip, take the strong events around it out, factor and solve. z [series->n] out. */
static AntStatus
whiten_around (AntScan *scan, const AntSeries *series, double centre, double duration_d, AntWhitener **whitener, double *z)
{
  float *value = malloc (series->n * sizeof *value);
  AntStatus status = value ? without_dip (scan, centre, duration_d, value) : ANT_NO_MEMORY;
  scan->series.value_ppm = value;
  if (!status)
    status = ant_scan_learn_noise (scan);
  if (!status)
    status = ant_scan_search_chunk (scan, 0);
  if (!status)
    {
      subtract_others (scan, series, value);
      *whitener = ant_whitener_new_free_level (&scan->chunk[0].model, series, &status);
    }
  if (!status)
    status = ant_whitener_solve (*whitener, value, z);
  free (value);
  return status;
}

/* A scan of the stretch alone, for its tools; NULL with *status set. */
static AntScan *
scan_of (const AntSeries *part, const AntScanOptions *options, AntStatus *status)
{
  AntScanOptions quick = *options;
  quick.bank.sharp_edge_h = 0; /* strong events show without it, in a fifth of the time */
  AntScan *scan = ant_scan_new (part, &quick, status);
  if (scan && scan->n_chunks != 1)
    {
      ant_scan_free (scan);
      *status = ANT_BAD_ARGUMENT;
      return NULL;
    }
  return scan;
}

AntStatus
ant_scan_asked (const AntSeries *series, const AntScanOptions *options, double mid_d, double duration_d, AntDip *dip)
{
  return ant_scan_asked_scene (series, options, mid_d, duration_d, dip, NULL);
}

static void
tell_scene (const AntScan *scan, const AntSeries *series, const AntSeries *part, AntAskedScene *scene)
{
  const AntChunkHarvest *harvest = &scan->harvest[0];
  scene->chunk = scan->chunk[0];
  scene->chunk.first = (size_t) lround (ant_series_place (series, part->start_d));
  scene->chunk.frequency_cd = scene->chunk.power_unmasked = NULL; /* the scan's own */
  scene->chunk.n_bins = 0;
  scene->chunk.stop = NULL;
  scene->n_others = 0;
  for (size_t i = 0; i < harvest->n_events && scene->n_others < ANT_ASKED_OTHERS; i++)
    if (harvest->event[i].strong)
      ant_shape_fit_to_dip (&harvest->event[i].fit, &scan->refine, part->start_d, &scene->other[scene->n_others++]);
}

AntStatus
ant_scan_asked_scene (const AntSeries *series, const AntScanOptions *options, double mid_d, double duration_d, AntDip *dip,
                      AntAskedScene *scene)
{
  AntStatus status;
  AntWhitener *whitener = NULL;
  AntSeries part = stretch (series, options, mid_d);
  double centre = ant_series_place (&part, mid_d);
  *dip = (AntDip){ 0 };
  if (!(duration_d > 0) || !(centre >= 0 && centre <= (double) part.n))
    return ANT_BAD_ARGUMENT;
  AntScan *scan = scan_of (&part, options, &status);
  if (!scan)
    return status;
  AntShapeFit fit = { .centre = centre, .duration_d = duration_d, .impact = ANT_SHAPE_IMPACT,
                      .edge_d = fmin (options->bank.edge_h / 24, 0.4 * duration_d), .mid_sigma_d = NAN,
                      .duration_sigma_d = NAN };
  double *z = malloc (part.n * sizeof *z);
  status = z ? whiten_around (scan, &part, centre, duration_d, &whitener, z) : ANT_NO_MEMORY;
  if (!status)
    status = ant_measure (whitener, z, &scan->refine, &fit);
  if (!status && fit.coverage < options->least_coverage)
    status = ANT_NO_DATA;
  if (!status)
    ant_shape_fit_to_dip (&fit, &scan->refine, part.start_d, dip);
  dip->first_snr = dip->snr;
  dip->expected_false = NAN;
  if (!status && scene)
    tell_scene (scan, series, &part, scene);
  ant_whitener_free (whitener);
  free (z);
  ant_scan_free (scan);
  return status;
}

/* The amplitude of a shape of places first .. first+n-1 of a whitened stretch. */
static AntStatus
amplitude (const AntWhitener *whitener, const double *z, ptrdiff_t first, size_t n, const double *loss, AntAmplitude *found)
{
  double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  double *lanes = calloc (n * ANT_LANES, sizeof *lanes);
  if (!lanes)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < n; i++)
    lanes[i * ANT_LANES] = -loss[i];
  ant_whitener_energies (whitener, z, first, n, lanes, energy, moment, weight);
  free (lanes);
  if (!(energy[0] > 0))
    return ANT_NO_DATA;
  found->depth_ppm = moment[0] / energy[0];
  found->sigma_ppm = 1 / sqrt (energy[0]);
  found->snr = moment[0] / sqrt (energy[0]);
  return ANT_OK;
}

static double
observed_part (const AntSeries *series, ptrdiff_t first, size_t n, const double *loss)
{
  double whole = 0, observed = 0;
  for (size_t i = 0; i < n; i++)
    {
      ptrdiff_t place = first + (ptrdiff_t) i;
      whole += loss[i];
      if (place >= 0 && place < (ptrdiff_t) series->n && isfinite (series->value_ppm[place]))
        observed += loss[i];
    }
  return whole > 0 ? observed / whole : 0;
}

AntStatus
ant_scan_asked_shape (const AntSeries *series, const AntScanOptions *options, ptrdiff_t first, size_t n, const double *loss,
                      AntAmplitude *found)
{
  AntStatus status;
  AntWhitener *whitener = NULL;
  double middle = (double) first + 0.5 * (double) (n - 1);
  *found = (AntAmplitude){ .depth_ppm = NAN, .sigma_ppm = NAN, .snr = NAN, .coverage = observed_part (series, first, n, loss) };
  if (n == 0)
    return ANT_BAD_ARGUMENT;
  if (found->coverage < options->least_coverage)
    return ANT_NO_DATA;
  AntSeries part = stretch (series, options, ant_series_time (series, middle));
  ptrdiff_t offset = (ptrdiff_t) lround (ant_series_place (series, part.start_d));
  AntScan *scan = scan_of (&part, options, &status);
  if (!scan)
    return status;
  double *z = malloc (part.n * sizeof *z);
  status = z ? whiten_around (scan, &part, middle - (double) offset, (double) n * series->step_d, &whitener, z) : ANT_NO_MEMORY;
  if (!status)
    status = amplitude (whitener, z, first - offset, n, loss, found);
  ant_whitener_free (whitener);
  free (z);
  ant_scan_free (scan);
  return status;
}
