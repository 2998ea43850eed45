/* worked.c - make an analysis with something of everything in it. */
#include "worked.h"

#include <math.h>

#include "rows.h"

#define STEP_D 0.05

static AntDip
dip_at (double mid_d, double depth_ppm, gsize chunk)
{
  return (AntDip) { .mid_d = mid_d, .duration_d = 0.3, .edge_d = 1.0 / 72, .depth_ppm = depth_ppm, .depth_sigma_ppm = 12.345678901234567,
                    .mean_depth_ppm = 0.9 * depth_ppm, .radius_ratio = 0.01 / 3, .snr = depth_ppm / 12, .first_snr = depth_ppm / 13,
                    .mid_sigma_d = 1e-3, .duration_sigma_d = NAN, .expected_false = 1e-7, .coverage = 0.875,
                    .edges = ANT_EDGES_INGRESS, .chunk = chunk };
}

static void
fill_chunk (AntChunk *chunk, gsize first)
{
  chunk->first = first;
  chunk->n = 120;
  chunk->own_from = (double) first;
  chunk->own_to = (double) first + 100.5;
  ant_noise_model_default (&chunk->model, STEP_D, 80, 20, FALSE, 0, NULL);
  chunk->fit = (AntFitReport) { -1234.5, -1240.25, 12, 345 };
  chunk->health = (AntChunkHealth) { .observed = 118, .spikes = 1, .refits = 3, .innovation_rms = 1.01, .lag1 = -0.002,
                                     .loudest = NAN, .quietest = NAN };
  chunk->health.unconstrained[1] = 1;
  chunk->n_floor = 3;
  chunk->n_bins = 5;
  chunk->frequency_cd = g_new0 (double, 2 * chunk->n_bins);
  chunk->power_unmasked = chunk->frequency_cd + chunk->n_bins;
  for (gsize i = 0; i < chunk->n_floor; i++)
    chunk->floor[i] = (AntFloorPoint) { (double) (i + 1) / 24, 1000 + i, 1.0 / 3, 0.01, 7.7 / (double) (i + 1) };
  for (gsize i = 0; i < chunk->n_bins; i++)
    {
      chunk->frequency_cd[i] = 0.1 * (double) (i + 1);
      chunk->power_unmasked[i] = i == 2 ? NAN : 1e5 / (double) (3 + i);
    }
}

AntScanResults *
test_results (void)
{
  AntScanResults *results = g_new0 (AntScanResults, 1);
  const AntDip dips[] = { dip_at (2, 300, 0), dip_at (4.5, 150, 0), dip_at (8, 120, 1) };
  const AntDip brightening = dip_at (6, -140, 1);
  const AntPassage passage = { 1, 3, 5.5, 400, 20, 0.99, 0 };
  results->ref_count = 1;
  ant_settings_init (&results->settings);
  results->reach = ANT_SCAN_COMPLETE;
  results->n_dips = G_N_ELEMENTS (dips);
  results->dip = g_memdup2 (dips, sizeof dips);
  results->n_brightenings = 1;
  results->brightening = g_memdup2 (&brightening, sizeof brightening);
  results->n_passages = 1;
  results->passage = g_memdup2 (&passage, sizeof passage);
  results->n_chunks = 2;
  results->chunk = g_new0 (AntChunk, 2);
  fill_chunk (&results->chunk[0], 0);
  fill_chunk (&results->chunk[1], 80);
  results->n_floor = 3;
  for (gsize i = 0; i < 3; i++)
    results->floor[i] = results->chunk[0].floor[i];
  results->threshold_snr = 4.875321;
  results->expected_at_threshold = 0.05;
  results->observed_d = 9.5;
  results->n_refits = 7;
  results->n_mirror_dips = 3;
  results->n_mirrored = 1;
  results->n_spikes = 2;
  results->spike_row = g_new0 (guint32, 2);
  results->spike_row[0] = 17;
  results->spike_row[1] = 170;
  results->said = g_ptr_array_new_with_free_func (g_free);
  g_ptr_array_add (results->said, g_strdup ("The record spans 10.0 d: “slow” noise is known from the prior only"));
  return results;
}

AntRecord *
test_results_record (void)
{
  AntRecord *record = test_rows (200, 0, STEP_D);
  g_free (record->path);
  record->path = g_strdup ("/somewhere/records/ten days.txt");
  g_free (record->sha256);
  record->sha256 = g_strdup ("5f70bf18a086007016e948b04aed3b82103a36bea41755b6cddfaf10ace3c6ef");
  AntGridOptions grid = ANT_GRID_OPTIONS_INIT;
  test_grid (record, &grid);
  return record;
}

AntAnalysis *
test_worked_analysis (void)
{
  AntAnalysis *analysis = ant_analysis_new ();
  g_autoptr (AntRecord) record = test_results_record ();
  g_autoptr (AntScanResults) results = test_results ();
  g_free (ant_analysis_take_record (analysis, record));
  g_assert_true (ant_analysis_set_setting (analysis, ant_setting_find ("duration-max"), "11.123456789012345", NULL));
  g_assert_true (ant_analysis_set_setting (analysis, ant_setting_find ("exposure"), "50.3", NULL));
  g_assert_true (ant_analysis_set_setting (analysis, ant_setting_find ("stamp"), "start", NULL));
  ant_analysis_mask (analysis, (AntSpan) { 3.25, 3.5 }, "shutter test, “cold”");
  g_autoptr (AntWitness) witness = ant_witness_new ("/somewhere/records/other instrument.nc", record->sha256, NULL);
  g_assert_true (ant_reading_choices_parse_columns (&witness->reading, "time=1,value=tsi", NULL));
  g_assert_true (ant_reading_choices_parse_fills (&witness->reading, "-99,0", NULL));
  g_assert_true (ant_analysis_add_witness (analysis, witness));
  g_assert_true (ant_scan_results_join (results, record));
  ant_analysis_set_results (analysis, results, ant_analysis_get_treatment (analysis));
  ant_analysis_judge (analysis, "dip 1", 2, 0.3, ANT_CLASS_PLANET);
  ant_analysis_note (analysis, "dip 1", 2, 0.3, "as predicted\nto the minute");
  ant_analysis_judge (analysis, "dip 3", 8, 0.3, ANT_CLASS_INSTRUMENT);
  return analysis;
}
