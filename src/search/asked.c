/* asked.c - measure one dip that somebody asks about, with no search: its noise fitted around it, itself masked. */
#include <math.h>
#include <stdlib.h>
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

AntStatus
ant_scan_asked (const AntSeries *series, const AntScanOptions *options, double mid_d, double duration_d, AntDip *dip)
{
  AntStatus status;
  AntSeries part = stretch (series, options, mid_d);
  double centre = ant_series_place (&part, mid_d);
  *dip = (AntDip){ 0 };
  if (!(duration_d > 0) || !(centre >= 0 && centre <= (double) part.n))
    return ANT_BAD_ARGUMENT;
  AntScan *scan = ant_scan_new (&part, options, &status);
  if (!scan)
    return status;
  double *z = malloc (part.n * sizeof *z);
  AntShapeFit fit = { .centre = centre, .duration_d = duration_d, .impact = ANT_SHAPE_IMPACT,
                      .edge_d = fmin (options->bank.edge_h / 24, 0.4 * duration_d), .mid_sigma_d = NAN,
                      .duration_sigma_d = NAN };
  AntWhitener *whitener = NULL;
  status = z ? ANT_OK : ANT_NO_MEMORY;
  if (!status)
    {
      ant_scan_mask (scan, centre, duration_d, 0, part.n, scan->spike);
      scan->series.spike = scan->spike;
      status = ant_scan_learn_noise (scan);
    }
  if (!status)
    whitener = ant_whitener_new (&scan->start, &part, &status);
  if (!status)
    status = ant_whitener_solve_about_level (whitener, part.value_ppm, z, NULL);
  if (!status)
    status = ant_measure (whitener, z, &scan->refine, &fit);
  if (!status && fit.coverage < options->least_coverage)
    status = ANT_NO_DATA;
  if (!status)
    ant_shape_fit_to_dip (&fit, &scan->refine, part.start_d, dip);
  dip->first_snr = dip->snr;
  dip->expected_false = NAN;
  ant_whitener_free (whitener);
  free (z);
  ant_scan_free (scan);
  return status;
}
