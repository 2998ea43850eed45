/* scan-surrogates.c - surrogates on request: noise-only records drawn from the fitted chunk models through the record's own
 * gaps, each sent through the whole search, and the chance law fitted to what they show. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "noise/surrogate.h"
#include "search/scan-private.h"

/* Each chunk's own draw. Where neighbours overlap two independent draws go over into each other with amplitudes whose
 * squares add up to 1: there is no step, and at every time the covariance lies between the two models'. */
AntStatus
ant_scan_draw_surrogate (const AntScan *scan, size_t surrogate, float *value)
{
  size_t n = scan->series.n;
  double overlap = scan->options.chunk.overlap_d / scan->series.step_d;
  float *draw = malloc (2 * n * sizeof *draw), *total = draw + n;
  AntStatus status = draw ? ANT_OK : ANT_NO_MEMORY;
  memset (value, 0, n * sizeof *value);
  for (size_t p = 0; p < n && !status; p++)
    total[p] = 0;
  for (size_t i = 0; i < scan->n_chunks && !status; i++)
    {
      const AntChunk *chunk = &scan->chunk[i];
      AntSeries part = ant_series_part (&scan->series, chunk->first, chunk->n);
      AntRandom random;
      ant_random_seed (&random, scan->options.seed, surrogate * scan->n_chunks + i);
      status = ant_surrogate_draw (&chunk->model, &part, &random, draw);
      for (size_t p = 0; p < part.n && !status; p++)
        {
          float share = (float) ant_chunk_share (chunk, overlap, (double) (chunk->first + p));
          if (share > 0)
            value[chunk->first + p] += sqrtf (share) * draw[p];
          total[chunk->first + p] += share;
        }
    }
  for (size_t p = 0; p < n && !status; p++)
    value[p] /= sqrtf (total[p]);
  free (draw);
  return status;
}

/* Final SNRs of both signs, without their sign. */
static AntStatus
keep_events (const AntScan *noise, AntSurrogate *surrogate)
{
  surrogate->snr = malloc ((noise->n_dips + noise->n_brightenings + 1) * sizeof *surrogate->snr);
  if (!surrogate->snr)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < noise->n_dips; i++)
    surrogate->snr[surrogate->n++] = noise->dip[i].snr;
  for (size_t i = 0; i < noise->n_brightenings; i++)
    surrogate->snr[surrogate->n++] = -noise->brightening[i].snr;
  return ANT_OK;
}

AntStatus
ant_scan_try_surrogate (AntScan *scan, size_t i)
{
  AntSeries series = scan->series;
  AntScanOptions options = scan->options;
  options.surrogates = 0;
  options.threshold_snr = ANT_SURROGATE_SNR;
  float *value = malloc (series.n * sizeof *value);
  AntScan *noise = NULL;
  AntStatus status = value ? ant_scan_draw_surrogate (scan, i, value) : ANT_NO_MEMORY;
  if (!status)
    {
      series.value_ppm = value;
      noise = ant_scan_new (&series, &options, &status);
    }
  if (!status)
    {
      noise->stop = scan->stop;
      for (size_t c = 0; c < noise->n_chunks; c++)
        noise->chunk[c].stop = scan->stop;
      status = ant_scan_find_alone (noise);
    }
  if (!status)
    status = keep_events (noise, &scan->surrogate[i]);
  ant_scan_free (noise);
  free (value);
  return status;
}

AntStatus
ant_scan_learn_chance (AntScan *scan)
{
  for (size_t i = 0; i < scan->options.surrogates; i++)
    scan->n_surrogate_events += scan->surrogate[i].n;
  double *snr = malloc ((scan->n_surrogate_events + 1) * sizeof *snr);
  size_t n = 0;
  if (!snr)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < scan->options.surrogates; i++)
    for (size_t k = 0; k < scan->surrogate[i].n; k++)
      snr[n++] = scan->surrogate[i].snr[k];
  ant_chance_law_fit (&scan->chance, n, snr, scan->options.surrogates, ANT_SURROGATE_SNR);
  free (snr);
  return ANT_OK;
}
