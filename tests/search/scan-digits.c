/* scan-digits.c - scan one record and print every digit of what came out, for comparison between builds. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include "core/units.h"
#include "models.h"
#include "planting.h"
#include "search/repeats.h"

static void
print_dips (const char *name, size_t n, const AntDip *dip)
{
  for (size_t i = 0; i < n; i++)
    printf ("%s %a %a %a %a %a %a %a %a %a\n", name, dip[i].mid_d, dip[i].duration_d, dip[i].edge_d, dip[i].depth_ppm,
            dip[i].depth_sigma_ppm, dip[i].snr, dip[i].first_snr, dip[i].mid_sigma_d, dip[i].expected_false);
}

static void
print_chunk (const AntChunk *chunk)
{
  printf ("chunk %a %a %a %a\n", chunk->model.white_ppm, chunk->fit.log_likelihood, chunk->health.innovation_rms,
          chunk->health.lag1);
  for (size_t i = 0; i < chunk->model.n_parts; i++)
    printf ("part %a %a\n", chunk->model.part[i].rms_ppm, chunk->model.part[i].time_d);
  for (size_t i = 0; i < chunk->n_floor; i++)
    printf ("floor %a %a %a\n", chunk->floor[i].snr_sd, chunk->floor[i].snr_mean, chunk->floor[i].sigma_ppm);
  for (size_t i = 0; i < chunk->n_bins; i++)
    printf ("power %a %a\n", chunk->frequency_cd[i], chunk->power_unmasked[i]);
}

/* Every bin of both searches, and what stands. */
static void
print_repeats (const AntSeries *series, int white, size_t n_chunks, const AntChunk *chunk)
{
  AntRepeatOptions options = { .grid = { .period_min_d = 0.5, .shortest_factor = 0.2, .longest_factor = 2, .shortest_d = 0.5 / 24 },
                               .least_events = 2, .false_alarms = 0.1, .white = white, .edge_d = 20 / ANT_MINUTES_PER_DAY,
                               .exposure_d = series->step_d, .limb_darkening = ANT_LIMB_DARKENING_SUN };
  AntStatus status;
  const AntStages *stages = ant_repeats_stages ();
  AntRepeats *repeats = ant_repeats_new (series, &options, n_chunks, chunk, &status);
  for (size_t stage = 0; stage < stages->n_stages && !status; stage++)
    {
      for (size_t i = 0, count = stages->count (repeats, stage); i < count && !status; i++)
        status = stages->run_slice (repeats, stage, i);
      status = status ? status : stages->finish (repeats, stage);
    }
  const AntRepeatBins *bins = ant_repeats_spectrum (repeats);
  const AntRepeat *repeat;
  for (size_t i = 0; i < bins->n; i++)
    if (bins->cell[i].power > 0)
      printf ("bin %zu %a %a %a %a\n", i, bins->cell[i].power, bins->cell[i].period_d, bins->cell[i].mid_d, bins->cell[i].duration_d);
  for (size_t i = 0, n = ant_repeats_list (repeats, &repeat); i < n; i++)
    printf ("repeat %a %a %a %a\n", repeat[i].period_d, repeat[i].snr, repeat[i].depth_ppm, repeat[i].period_sigma_d);
  printf ("threshold %a status %d\n", ant_repeats_threshold (repeats), (int) status);
  ant_repeats_free (repeats);
}

int
main (void)
{
  static const Planted planted[] = { { 5.1, 7, 20, 0.3, 400 }, { 13.3, 3, 10, 0.3, 1500 }, { 17, 5, 20, 0.3, -500 } };
  size_t n = (size_t) (20 * ANT_SECONDS_PER_DAY / 120);
  float *value = malloc (n * sizeof *value);
  AntSeries series = ant_study_record ('A', ANT_MASK_LOW_ORBIT, n, 120 / ANT_SECONDS_PER_DAY, 15001, value);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  const AntDip *dip;
  const AntChunk *chunk;
  for (size_t i = 0; i < sizeof planted / sizeof *planted; i++)
    plant (&series, &planted[i], value);
  options.threshold_snr = 4.5;
  options.n_lines = 1;
  options.line[0] = (AntNoiseLine){ 96 / ANT_MINUTES_PER_DAY, 2 };
  AntScan *scan = scan_all (&series, &options);
  size_t n_dips = ant_scan_dips (scan, &dip);
  print_dips ("dip", n_dips, dip);
  size_t n_brightenings = ant_scan_brightenings (scan, &dip);
  print_dips ("brightening", n_brightenings, dip);
  for (size_t i = 0, n_chunks = ant_scan_chunks (scan, &chunk); i < n_chunks; i++)
    print_chunk (&chunk[i]);
  size_t n_chunks = ant_scan_chunks (scan, &chunk);
  print_repeats (&series, 0, n_chunks, chunk);
  print_repeats (&series, 1, 0, NULL);
  ant_scan_free (scan);
  free (value);
  return n_dips < 2 || n_brightenings < 1;
}
