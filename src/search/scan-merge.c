/* scan-merge.c - what one stage of a scan found, merged for the next: candidates, the threshold, side lobes, the lists. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "search/scan-private.h"

#define WEIGH_MARGIN 0.7   /* below the threshold, in 30 d of data and more */
#define SHORT_RECORD_D 30
#define LEAST_WEIGHED 3    /* per chunk and sign */

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
void
ant_scan_merge_chunks (AntScan *scan)
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
  ant_scan_forget_harvest (scan);
  return ANT_OK;
}

AntStatus
ant_scan_settle_chance (AntScan *scan)
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
void
ant_scan_drop_side_lobes (AntScan *scan)
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

static AntStatus
list_events (AntScan *scan)
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

AntStatus
ant_scan_list_dips (AntScan *scan)
{
  for (size_t i = 0; i < scan->n_events; i++)
    scan->event[i].fit = scan->event[i].border_fit;
  ant_scan_drop_side_lobes (scan);
  return list_events (scan);
}

/* Before all candidates were weighed only the strong events have been measured as they ought to be. */
static void
keep_strong (AntScan *scan)
{
  size_t n = 0;
  for (size_t i = 0; i < scan->n_events; i++)
    if (scan->event[i].strong)
      scan->event[n++] = scan->event[i];
  scan->n_events = n;
}

AntStatus
ant_scan_conclude (AntScan *scan)
{
  AntScanReach reach = ant_scan_reach (scan);
  if (reach == ANT_SCAN_NOTHING)
    return ANT_NO_DATA;
  if (reach >= ANT_SCAN_DIPS)
    return ANT_OK;
  AntStatus status = scan->n_finished > ANT_STAGE_CHANCE ? ANT_OK : choose_events (scan);
  if (status)
    return status;
  if (reach == ANT_SCAN_NOISE)
    keep_strong (scan);
  ant_scan_drop_side_lobes (scan);
  return list_events (scan);
}
