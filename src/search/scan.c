/* scan.c - a scan from its making to its end, and the table of its stages. */
#include "search/scan.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "search/scan-private.h"

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
  scan->pace.stop = scan->stop;
  if (!scan->series.pace)
    scan->series.pace = &scan->pace;
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

void
ant_scan_forget_harvest (AntScan *scan)
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
  ant_scan_forget_harvest (scan);
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

static const char *
stage_title (void *work, size_t stage)
{
  static const char *const title[ANT_N_STAGES] = {
    "learning the noise", "searching for dips", "searching surrogates", "weighing candidates", "fitting dips together",
    "fitting dips at borders", "tracing passages"
  };
  return title[stage];
}

static size_t
stage_count (void *work, size_t stage)
{
  AntScan *scan = work;
  size_t count[ANT_N_STAGES] = { 1, scan->n_chunks, scan->options.surrogates, scan->n_events, scan->n_chunks, scan->n_events,
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
    case ANT_STAGE_LEARN: return ant_scan_learn_noise (scan);
    case ANT_STAGE_SEARCH: return ant_scan_search_chunk (scan, slice);
    case ANT_STAGE_CHANCE: return ant_scan_try_surrogate (scan, slice);
    case ANT_STAGE_WEIGH: return scan->event[slice].strong ? ANT_OK : ant_scan_weigh (scan, slice);
    case ANT_STAGE_TOGETHER: return ant_scan_fit_together (scan, slice);
    case ANT_STAGE_BORDER: return ant_scan_weigh_at_border (scan, slice);
    default: return ant_scan_trace_slow (scan, slice);
    }
}

static AntStatus
merge (AntScan *scan, size_t stage)
{
  switch (stage)
    {
    case ANT_STAGE_SEARCH: ant_scan_merge_chunks (scan); return ANT_OK;
    case ANT_STAGE_CHANCE: return ant_scan_settle_chance (scan);
    case ANT_STAGE_WEIGH: ant_scan_drop_side_lobes (scan); return ANT_OK;
    case ANT_STAGE_BORDER: return ant_scan_list_dips (scan);
    case ANT_STAGE_TRACE: return ant_scan_join_traces (scan);
    default: return ANT_OK;
    }
}

static AntStatus
finish (void *work, size_t stage)
{
  AntScan *scan = work;
  AntStatus status = merge (scan, stage);
  if (!status)
    scan->n_finished = stage + 1;
  scan->passed_before = ant_pace_passed (&scan->pace);
  return status;
}

AntStatus
ant_scan_find_alone (AntScan *scan)
{
  AntStatus status = ANT_OK;
  for (size_t stage = ANT_STAGE_LEARN; stage <= ANT_STAGE_BORDER && !status; stage++)
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

/* Of one map, for each sample of the record. */
static double
cost_of_map (const AntTemplateBank *bank)
{
  double cost = 0;
  for (size_t f = 0; f < bank->n_families; f++)
    for (size_t b = 0; b < bank->family[f].n_members / ANT_LANES; b++)
      cost += (double) bank->family[f].block_length[b] / (double) bank->family[f].stride;
  return cost;
}

/* What a slice of a stage costs on the pace for each of its samples, about: as measured on records of many kinds. */
static double
part_of (void *work, size_t stage)
{
  AntScan *scan = work;
  double search = 1200 + 2.5 * cost_of_map (scan->bank);
  double cost[ANT_N_STAGES] = { 2200, search, 2200 + search, 90, 65, 90, 8 };
  double samples = 0, longest = 0;
  for (size_t i = 0; i < scan->n_chunks; i++)
    {
      samples += (double) scan->chunk[i].n;
      longest = fmax (longest, (double) scan->chunk[i].n);
    }
  double events = (double) scan->n_events / (double) scan->n_chunks;
  double of_stage[ANT_N_STAGES] = { longest, samples, samples * (double) scan->options.surrogates, samples * events, samples,
                                    samples * events, samples };
  if (of_stage[stage] <= 0)
    return 0;
  return ant_pace_part ((double) (ant_pace_passed (&scan->pace) - scan->passed_before), cost[stage] * of_stage[stage]);
}

const AntStages *
ant_scan_stages (void)
{
  static const AntStages stages = { ANT_N_STAGES, stage_title, stage_count, run_slice, finish, stop_of, part_of };
  return &stages;
}
