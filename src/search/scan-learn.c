/* scan-learn.c - the first noise model of a scan, learnt on the fullest chunk: where every other fit starts. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/robust.h"
#include "noise/spectrum.h"
#include "search/scan-private.h"

#define WHITTLE_BINS 6
#define START_STEPS 40
#define CHUNK_PRIOR_LN 0.7

/* rms of the record and of its neighbouring differences over sqrt2, robustly: where the fit starts. */
static AntStatus
scatter (const AntSeries *part, double *rms_ppm, double *white_ppm)
{
  double *value = malloc (2 * part->n * sizeof *value), *difference = value + part->n;
  size_t n = 0, pairs = 0;
  if (!value)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < part->n; i++)
    if (!isnan (part->value_ppm[i]))
      {
        value[n++] = (double) part->value_ppm[i];
        if (i && !isnan (part->value_ppm[i - 1]))
          difference[pairs++] = (double) part->value_ppm[i] - (double) part->value_ppm[i - 1];
      }
  *rms_ppm = ant_mad_sigma (n, value, value);
  *white_ppm = pairs > 5 ? ant_mad_sigma (pairs, difference, difference) / sqrt (2) : 0.3 * *rms_ppm;
  free (value);
  return n < 20 || !(*rms_ppm > 0) ? ANT_NO_DATA : ANT_OK;
}

AntStatus
ant_scan_learn_noise (AntScan *scan)
{
  size_t best = 0, most = 0;
  for (size_t i = 0; i < scan->n_chunks; i++)
    {
      AntSeries part = ant_series_part (&scan->series, scan->chunk[i].first, scan->chunk[i].n);
      size_t observed = ant_series_observed (&part, 1);
      if (observed > most)
        {
          most = observed;
          best = i;
        }
    }
  AntSeries part = ant_series_part (&scan->series, scan->chunk[best].first, scan->chunk[best].n);
  AntChunk chunk = scan->chunk[best];
  double rms_ppm, white_ppm;
  AntStatus status = scatter (&part, &rms_ppm, &white_ppm);
  if (status)
    return status;
  ant_noise_model_default (&chunk.model, part.step_d, rms_ppm, fmax (white_ppm, 1e-3 * rms_ppm), part.error_ppm != NULL,
                           scan->options.n_lines, scan->options.line);
  AntSpectrum *spectrum = ant_spectrum_new (&part, WHITTLE_BINS, &status);
  if (spectrum)
    status = ant_spectrum_whittle_fit (spectrum, &chunk.model);
  ant_spectrum_free (spectrum);
  if (status && status != ANT_NOT_CONVERGED)
    return status;
  uint8_t *spike = calloc (part.n, 1);
  if (!spike)
    return ANT_NO_MEMORY;
  if (part.spike)
    memcpy (spike, part.spike, part.n);
  status = ant_chunk_fit (&chunk, &part, spike, START_STEPS, 0);
  free (spike);
  scan->start = chunk.model;
  memcpy (scan->start_curvature, chunk.curvature, sizeof scan->start_curvature);
  if (scan->n_chunks > 1)
    ant_noise_model_centre_priors (&scan->start, CHUNK_PRIOR_LN);
  return status == ANT_NOT_CONVERGED ? ANT_OK : status;
}
