/* scan.c - the stages of a scan and the merging of what their slices found. */
#include "search/scan.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/robust.h"
#include "noise/spectrum.h"
#include "search/scan-private.h"

enum { LEARN, SEARCH, CHANCE, WEIGH, TOGETHER, BORDER, TRACE, N_STAGES };

#define WHITTLE_BINS 6
#define START_STEPS 40
#define CHUNK_PRIOR_LN 0.7
#define WEIGH_MARGIN 0.7   /* below the threshold, in 30 d of data and more */
#define SHORT_RECORD_D 30
#define LEAST_WEIGHED 3    /* per chunk and sign */

static AntRefineOptions
refine_options (const AntScanOptions *options, const AntTemplateBank *bank)
{
  double step_d = bank->step_d, sharp_d = options->bank.sharp_edge_h / 24;
  double least = bank->n_families > 1 ? fmax (0.8 * sharp_d, step_d) : fmax (bank->family[0].member[0].edge_d * 0.75, step_d);
  return (AntRefineOptions){ .step_d = step_d, .exposure_d = options->bank.exposure_d > 0 ? options->bank.exposure_d : step_d,
                             .limb_darkening = options->bank.limb_darkening,
                             .shortest_d = bank->family[0].member[0].duration_d,
                             .longest_d = options->bank.duration_max_h / 24 * 1.15, .least_edge_d = least };
}

AntScan *
ant_scan_new (const AntSeries *series, const AntScanOptions *options, AntStatus *status)
{
  AntScan *scan = calloc (1, sizeof *scan);
  *status = ANT_NO_MEMORY;
  if (!scan)
    return NULL;
  scan->series = *series;
  scan->options = *options;
  scan->stop = &scan->own_stop;
  scan->bank = ant_template_bank_new (&options->bank, series->step_d, status);
  if (scan->bank)
    {
      size_t room = ant_chunks_room (series, &options->chunk);
      scan->refine = refine_options (options, scan->bank);
      scan->chunk = calloc (room, sizeof *scan->chunk);
      scan->harvest = calloc (room, sizeof *scan->harvest);
      scan->trace = calloc (room, sizeof *scan->trace);
      scan->surrogate = calloc (options->surrogates + 1, sizeof *scan->surrogate);
      scan->residual = malloc (series->n * sizeof *scan->residual);
      scan->spike = calloc (series->n, 1);
      *status = scan->chunk && scan->harvest && scan->trace && scan->surrogate && scan->residual && scan->spike ? ANT_OK : ANT_NO_MEMORY;
      if (!*status)
        scan->n_chunks = ant_chunks_plan (series, &options->chunk, room, scan->chunk);
      for (size_t i = 0; i < scan->n_chunks; i++)
        scan->chunk[i].stop = &scan->own_stop;
    }
  if (*status)
    {
      ant_scan_free (scan);
      return NULL;
    }
  memcpy (scan->residual, series->value_ppm, series->n * sizeof *scan->residual);
  if (series->spike)
    memcpy (scan->spike, series->spike, series->n);
  return scan;
}

static void
forget_harvest (AntScan *scan)
{
  for (size_t i = 0; scan->harvest && i < scan->n_chunks; i++)
    {
      free (scan->harvest[i].spike);
      free (scan->harvest[i].event);
      scan->harvest[i] = (AntChunkHarvest){ 0 };
    }
}

void
ant_scan_free (AntScan *scan)
{
  if (!scan)
    return;
  forget_harvest (scan);
  for (size_t i = 0; scan->chunk && i < scan->n_chunks; i++)
    free (scan->chunk[i].frequency_cd);
  for (size_t i = 0; scan->trace && i < scan->n_chunks; i++)
    {
      free (scan->trace[i].slow_ppm);
      free (scan->trace[i].passage);
    }
  for (size_t i = 0; scan->surrogate && i < scan->options.surrogates; i++)
    free (scan->surrogate[i].snr);
  ant_template_bank_free (scan->bank);
  free (scan->chunk);
  free (scan->harvest);
  free (scan->residual);
  free (scan->spike);
  free (scan->event);
  free (scan->dip);
  free (scan->brightening);
  free (scan->trace);
  free (scan->surrogate);
  free (scan->slow_ppm);
  free (scan->passage);
  free (scan);
}

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

static int
by_strength (const void *a, const void *b)
{
  double left = fabs (((const AntEvent *) a)->peak.snr), right = fabs (((const AntEvent *) b)->peak.snr);
  return left > right ? -1 : left < right;
}

/* From one chunk's harvest: strong events, and of each sign the candidates that a refit could lift to the threshold. */
static void
choose_candidates (AntScan *scan, AntChunkHarvest *harvest, double observed_d)
{
  double cut = observed_d < SHORT_RECORD_D ? ANT_KEEP_SNR : scan->threshold_snr - WEIGH_MARGIN;
  size_t weighed[2] = { 0, 0 };
  qsort (harvest->event, harvest->n_events, sizeof *harvest->event, by_strength);
  for (size_t i = 0; i < harvest->n_events; i++)
    {
      const AntEvent *event = &harvest->event[i];
      size_t *count = &weighed[event->sign > 0];
      if (event->strong || fabs (event->peak.snr) >= cut || *count < LEAST_WEIGHED)
        {
          *count += !event->strong;
          scan->event[scan->n_events++] = *event;
        }
    }
}

/* Merge the chunks: spikes and masks of each chunk's own stretch, and the chance field. */
static void
merge_chunks (AntScan *scan)
{
  AntChanceField field = { 0 };
  double fitted_d = 0;
  for (size_t i = 0; i < scan->n_chunks; i++)
    {
      AntChunk *chunk = &scan->chunk[i];
      AntChunkHarvest *harvest = &scan->harvest[i];
      ant_chance_field_add (&field, &harvest->chance);
      fitted_d = fmax (fitted_d, (double) chunk->n * scan->series.step_d);
      for (size_t p = 0; p < chunk->n; p++)
        if ((double) (chunk->first + p) >= chunk->own_from && (double) (chunk->first + p) < chunk->own_to)
          scan->spike[chunk->first + p] = harvest->spike[p];
    }
  ant_chance_law_init (&scan->chance, &field, fitted_d);
}

/* The threshold, strong events out of the residual, candidates listed. */
static AntStatus
choose_events (AntScan *scan)
{
  size_t room = 0;
  for (size_t i = 0; i < scan->n_chunks; i++)
    room += scan->harvest[i].n_events;
  scan->threshold_snr = scan->options.threshold_snr;
  if (!(scan->threshold_snr > 0))
    scan->threshold_snr
      = ant_chance_law_threshold (&scan->chance,
                                  scan->options.false_alarms_per_year * scan->chance.field.observed_d / 365.25);
  scan->event = malloc ((room + 1) * sizeof *scan->event);
  if (!scan->event)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < scan->n_chunks; i++)
    choose_candidates (scan, &scan->harvest[i], scan->harvest[i].chance.observed_d);
  for (size_t i = 0; i < scan->n_events; i++)
    if (scan->event[i].strong)
      {
        const AntShapeFit *fit = &scan->event[i].fit;
        ant_scan_add_shape (scan, fit, fit->depth_ppm, 0, scan->series.n, scan->residual);
        ant_scan_mask (scan, fit->centre, fit->duration_d, 0, scan->series.n, scan->spike);
      }
  forget_harvest (scan);
  return ANT_OK;
}

static AntStatus
settle_chance (AntScan *scan)
{
  AntStatus status = scan->options.surrogates ? ant_scan_learn_chance (scan) : ANT_OK;
  return status ? status : choose_events (scan);
}

static int
by_time (const void *a, const void *b)
{
  double left = ((const AntDip *) a)->mid_d, right = ((const AntDip *) b)->mid_d;
  return (left > right) - (left < right);
}

static AntPeak
as_peak (const AntEvent *event)
{
  return (AntPeak){ .centre = event->fit.centre, .duration_d = event->fit.duration_d };
}

/* A dip pulls up its surroundings, and two candidates may have climbed to one dip: within one duration of a stronger
 * event of either sign nothing else stands. */
static void
drop_side_lobes (AntScan *scan)
{
  for (size_t i = 0; i < scan->n_events; i++)
    for (size_t j = 0; j < scan->n_events && !scan->event[i].dropped; j++)
      {
        const AntEvent *weak = &scan->event[i], *strong = &scan->event[j];
        double weak_snr = fabs (weak->fit.snr), strong_snr = fabs (strong->fit.snr);
        AntPeak at_weak = as_peak (weak), at_strong = as_peak (strong);
        if (i == j || !(strong_snr >= scan->threshold_snr) || weak_snr > strong_snr || (weak_snr == strong_snr && i < j))
          continue;
        scan->event[i].dropped = ant_peaks_clash (&at_strong, &at_weak, scan->series.step_d);
      }
}

static void
settle_borders (AntScan *scan)
{
  for (size_t i = 0; i < scan->n_events; i++)
    scan->event[i].fit = scan->event[i].border_fit;
  drop_side_lobes (scan);
}

static AntStatus
list_dips (AntScan *scan)
{
  scan->dip = malloc ((scan->n_events + 1) * sizeof *scan->dip);
  scan->brightening = malloc ((scan->n_events + 1) * sizeof *scan->brightening);
  if (!scan->dip || !scan->brightening)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < scan->n_events; i++)
    {
      const AntEvent *event = &scan->event[i];
      if (event->dropped || !(event->sign * event->fit.snr >= scan->threshold_snr))
        continue;
      AntDip *dip = event->sign > 0 ? &scan->dip[scan->n_dips++] : &scan->brightening[scan->n_brightenings++];
      ant_shape_fit_to_dip (&event->fit, &scan->refine, scan->series.start_d, dip);
      dip->first_snr = event->peak.snr;
      dip->chunk = event->chunk;
      dip->expected_false = ant_chance_law_expected (&scan->chance, fabs (dip->snr));
    }
  qsort (scan->dip, scan->n_dips, sizeof *scan->dip, by_time);
  qsort (scan->brightening, scan->n_brightenings, sizeof *scan->brightening, by_time);
  return ANT_OK;
}

static const char *
stage_title (void *work, size_t stage)
{
  static const char *const title[N_STAGES] = {
    "learning the noise", "searching for dips", "searching surrogates", "weighing candidates", "fitting dips together",
    "fitting dips at borders", "tracing passages"
  };
  return title[stage];
}

static size_t
stage_count (void *work, size_t stage)
{
  AntScan *scan = work;
  size_t count[N_STAGES] = { 1, scan->n_chunks, scan->options.surrogates, scan->n_events, scan->n_chunks, scan->n_events,
                             scan->n_chunks };
  return count[stage];
}

static AntStatus
run_slice (void *work, size_t stage, size_t slice)
{
  AntScan *scan = work;
  if (ant_stop_asked (scan->stop))
    return ANT_STOPPED;
  switch (stage)
    {
    case LEARN: return ant_scan_learn_noise (scan);
    case SEARCH: return ant_scan_search_chunk (scan, slice);
    case CHANCE: return ant_scan_try_surrogate (scan, slice);
    case WEIGH: return scan->event[slice].strong ? ANT_OK : ant_scan_weigh (scan, slice);
    case TOGETHER: return ant_scan_fit_together (scan, slice);
    case BORDER: return ant_scan_weigh_at_border (scan, slice);
    default: return ant_scan_trace_slow (scan, slice);
    }
}

static AntStatus
finish (void *work, size_t stage)
{
  switch (stage)
    {
    case SEARCH: merge_chunks (work); return ANT_OK;
    case CHANCE: return settle_chance (work);
    case WEIGH: drop_side_lobes (work); return ANT_OK;
    case BORDER: settle_borders (work); return list_dips (work);
    case TRACE: return ant_scan_join_traces (work);
    default: return ANT_OK;
    }
}

AntStatus
ant_scan_find_alone (AntScan *scan)
{
  AntStatus status = ANT_OK;
  for (size_t stage = LEARN; stage <= BORDER && !status; stage++)
    {
      size_t count = stage_count (scan, stage);
      for (size_t i = 0; i < count && !status; i++)
        status = run_slice (scan, stage, i);
      if (!status)
        status = finish (scan, stage);
    }
  return status;
}

static AntStop *
stop_of (void *work)
{
  AntScan *scan = work;
  return scan->stop;
}

const AntStages *
ant_scan_stages (void)
{
  static const AntStages stages = { N_STAGES, stage_title, stage_count, run_slice, finish, stop_of };
  return &stages;
}
