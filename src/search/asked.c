/* asked.c - measure one dip that somebody asks about, with no search: its noise fitted around it, itself masked. */
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
without_dip (const AntScan *scan, const AntShapeFit *asked, float *value)
{
  size_t n = scan->series.n;
  uint8_t *inside = calloc (n, 1);
  if (!inside)
    return ANT_NO_MEMORY;
  ant_scan_mask (scan, asked->centre, asked->duration_d, 0, n, inside);
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

/* Fit the noise without the dip, and measure the dip under it. */
static AntStatus
measure (AntScan *scan, const AntSeries *series, AntShapeFit *fit)
{
  double *z = malloc (series->n * sizeof *z);
  float *value = malloc (series->n * sizeof *value);
  AntWhitener *whitener = NULL;
  AntStatus status = z && value ? without_dip (scan, fit, value) : ANT_NO_MEMORY;
  scan->series.value_ppm = value;
  if (!status)
    status = ant_scan_learn_noise (scan);
  if (!status)
    status = ant_scan_search_chunk (scan, 0);
  if (!status)
    {
      subtract_others (scan, series, value);
      whitener = ant_whitener_new_free_level (&scan->chunk[0].model, series, &status);
    }
  if (!status)
    status = ant_whitener_solve (whitener, value, z);
  if (!status)
    status = ant_measure (whitener, z, &scan->refine, fit);
  ant_whitener_free (whitener);
  free (value);
  free (z);
  return status;
}

AntStatus
ant_scan_asked (const AntSeries *series, const AntScanOptions *options, double mid_d, double duration_d, AntDip *dip)
{
  AntStatus status;
  AntScanOptions quick = *options;
  AntSeries part = stretch (series, options, mid_d);
  double centre = ant_series_place (&part, mid_d);
  *dip = (AntDip){ 0 };
  if (!(duration_d > 0) || !(centre >= 0 && centre <= (double) part.n))
    return ANT_BAD_ARGUMENT;
  quick.bank.sharp_edge_h = 0; /* strong events show without it, in a fifth of the time */
  AntScan *scan = ant_scan_new (&part, &quick, &status);
  if (!scan)
    return status;
  AntShapeFit fit = { .centre = centre, .duration_d = duration_d, .impact = ANT_SHAPE_IMPACT,
                      .edge_d = fmin (options->bank.edge_h / 24, 0.4 * duration_d), .mid_sigma_d = NAN,
                      .duration_sigma_d = NAN };
  status = scan->n_chunks == 1 ? measure (scan, &part, &fit) : ANT_BAD_ARGUMENT;
  if (!status && fit.coverage < options->least_coverage)
    status = ANT_NO_DATA;
  if (!status)
    ant_shape_fit_to_dip (&fit, &scan->refine, part.start_d, dip);
  dip->first_snr = dip->snr;
  dip->expected_false = NAN;
  ant_scan_free (scan);
  return status;
}
