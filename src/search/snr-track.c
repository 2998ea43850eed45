/* snr-track.c - one template along the whole record, chunk by chunk. */
#include "search/snr-track.h"
#include <math.h>
#include <stdlib.h>
#include "core/units.h"
#include "search/dip-map.h"

struct _AntSnrTrack
{
  AntStop stop;
  AntSeries series;
  double least_coverage;
  size_t n_chunks;
  const AntChunk *chunk;
  AntTemplateBank *bank;
  float *snr;
};

AntSnrTrack *
ant_snr_track_new (const AntSeries *series, const AntBankOptions *bank, double least_coverage, double duration_d,
                   size_t n_chunks, const AntChunk *chunk, AntStatus *status)
{
  AntSnrTrack *track = calloc (1, sizeof *track);
  *status = ANT_NO_MEMORY;
  if (!track)
    return NULL;
  AntBankOptions one = *bank;
  one.duration_min_h = one.duration_max_h = duration_d * ANT_HOURS_PER_DAY;
  one.sharp_edge_h = 0;
  track->series = *series;
  track->least_coverage = least_coverage;
  track->n_chunks = n_chunks;
  track->chunk = chunk;
  track->snr = malloc (series->n * sizeof *track->snr);
  if (track->snr)
    track->bank = ant_template_bank_new (&one, series->step_d, status);
  if (*status)
    {
      ant_snr_track_free (track);
      return NULL;
    }
  for (size_t p = 0; p < series->n; p++)
    track->snr[p] = NAN;
  return track;
}

void
ant_snr_track_free (AntSnrTrack *track)
{
  if (!track)
    return;
  ant_template_bank_free (track->bank);
  free (track->snr);
  free (track);
}

/* SNR of a start, NaN where it is none or covered too little. Member 0 stands on a place; others are its sub-sample
 * phases. */
static float
snr_of (const AntFamilyMap *family, size_t n_members, double start)
{
  if (!(start >= 0 && start < (double) family->n_starts))
    return NAN;
  size_t cell = (size_t) start * n_members;
  return isnan (family->sigma_ppm[cell]) ? NAN : family->snr[cell];
}

/* Each place of the chunk's own part lies between two starts, whose middles are half an edge apart. */
static void
read_map (AntSnrTrack *track, const AntChunk *chunk, const AntDipMap *map)
{
  const AntFamilyMap *family = &map->family[0];
  size_t members = track->bank->family[0].n_members, stride = track->bank->family[0].stride;
  double first = ant_dip_map_centre (map, 0, 0, 0) + (double) chunk->first;
  size_t from = (size_t) fmax (ceil (chunk->own_from), 0), to = (size_t) fmin (ceil (chunk->own_to), (double) track->series.n);
  for (size_t p = from; p < to; p++)
    {
      double start = ((double) p - first) / (double) stride, before = floor (start), part = start - before;
      float left = snr_of (family, members, before), right = part > 0 ? snr_of (family, members, before + 1) : left;
      if (isnan (left) || isnan (right))
        track->snr[p] = part < 0.5 ? left : right;
      else
        track->snr[p] = (float) ((1 - part) * (double) left + part * (double) right);
    }
}

static AntStatus
follow_chunk (AntSnrTrack *track, const AntChunk *chunk)
{
  AntStatus status;
  AntSeries part = ant_series_part (&track->series, chunk->first, chunk->n);
  AntDipMap *map = NULL;
  double *z = malloc (part.n * sizeof *z);
  AntWhitener *whitener = ant_whitener_new_free_level (&chunk->model, &part, &status);
  if (whitener)
    status = z ? ant_whitener_solve (whitener, part.value_ppm, z) : ANT_NO_MEMORY;
  if (!status)
    map = ant_dip_map_new (track->bank, whitener, z, track->least_coverage, &track->stop, &status);
  if (map)
    read_map (track, chunk, map);
  ant_dip_map_free (map);
  ant_whitener_free (whitener);
  free (z);
  return status;
}

static const char *
title (void *work, size_t stage)
{
  return "following the dip SNR";
}

static size_t
count (void *work, size_t stage)
{
  AntSnrTrack *track = work;
  return track->n_chunks;
}

static AntStatus
run_slice (void *work, size_t stage, size_t slice)
{
  AntSnrTrack *track = work;
  return ant_stop_asked (&track->stop) ? ANT_STOPPED : follow_chunk (track, &track->chunk[slice]);
}

static AntStatus
finish (void *work, size_t stage)
{
  return ANT_OK;
}

static AntStop *
stop (void *work)
{
  AntSnrTrack *track = work;
  return &track->stop;
}

const AntStages *
ant_snr_track_stages (void)
{
  static const AntStages stages = { 1, title, count, run_slice, finish, stop };
  return &stages;
}

const float *
ant_snr_track_snr (const AntSnrTrack *track)
{
  return track->snr;
}
