/* scan-results.c - keep what a scan gave, and say in words how far its noise model can be trusted. */
#include "data/scan-results.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "core/robust.h"
#include "core/units.h"

static void say (AntScanResults *results, const char *format, ...) G_GNUC_PRINTF (2, 3);

static void
say (AntScanResults *results, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_ptr_array_add (results->said, g_strdup_vprintf (format, arguments));
  va_end (arguments);
}

AntScanOptions
ant_scan_results_options (const AntRecord *record, const AntSettings *settings)
{
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  options.bank = settings->bank;
  options.bank.exposure_d = record->exposure_d;
  options.chunk = (AntChunkOptions) { .length_d = settings->chunk_d, .overlap_d = settings->chunk_overlap_d };
  options.threshold_snr = settings->threshold_snr;
  options.false_alarms_per_year = settings->false_alarms_per_year;
  options.surrogates = (size_t) settings->surrogates;
  options.seed = (guint64) settings->seed;
  if (settings->line_period_h > 0)
    options.line[options.n_lines++] = (AntNoiseLine) { .period_d = settings->line_period_h / ANT_HOURS_PER_DAY,
                                                       .harmonics = (int) settings->line_harmonics };
  return options;
}

static void
copy_chunks (AntScanResults *results, const AntScan *scan)
{
  const AntChunk *chunk;
  results->n_chunks = ant_scan_chunks (scan, &chunk);
  results->chunk = g_memdup2 (chunk, results->n_chunks * sizeof *chunk);
  for (gsize i = 0; i < results->n_chunks; i++)
    results->chunk[i].stop = NULL; /* the scan's, which ends before the results do */
  for (gsize i = 0; i < results->n_chunks; i++)
    if (chunk[i].n_bins)
      {
        AntChunk *own = &results->chunk[i];
        own->frequency_cd = g_memdup2 (chunk[i].frequency_cd, 2 * own->n_bins * sizeof (double));
        own->power_unmasked = own->frequency_cd + own->n_bins;
      }
}

static void
copy_passages (AntScanResults *results, const AntScan *scan)
{
  const AntPassage *passage;
  results->n_passages = ant_scan_passages (scan, &passage);
  results->passage = g_memdup2 (passage, results->n_passages * sizeof *passage);
  results->slow_ppm = g_memdup2 (ant_scan_slow (scan), results->record->series.n * sizeof *results->slow_ppm);
}

/* For each duration the median over chunks of the 1-sigma depth and of the SNR's spread. */
static void
median_floor (AntScanResults *results)
{
  g_autofree double *sigma = g_new (double, results->n_chunks), *spread = g_new (double, results->n_chunks);
  results->n_floor = results->n_chunks ? results->chunk[0].n_floor : 0;
  for (gsize p = 0; p < results->n_floor; p++)
    {
      gsize starts = 0;
      for (gsize i = 0; i < results->n_chunks; i++)
        {
          const AntFloorPoint *point = &results->chunk[i].floor[p];
          sigma[i] = point->sigma_ppm;
          spread[i] = point->snr_sd;
          starts += point->starts;
        }
      results->floor[p] = (AntFloorPoint) { .duration_d = results->chunk[0].floor[p].duration_d, .starts = starts,
                                            .sigma_ppm = ant_median (results->n_chunks, sigma, sigma),
                                            .snr_sd = ant_median (results->n_chunks, spread, spread), .snr_mean = NAN };
    }
}

static void
find_spike_rows (AntScanResults *results, const AntScan *scan)
{
  const AntRecord *record = results->record;
  const guint8 *spike = ant_scan_spikes (scan);
  g_autoptr (GArray) rows = g_array_new (FALSE, FALSE, sizeof (guint32));
  for (guint32 row = 0; row < record->n_rows; row++)
    if (record->place[row] >= 0 && spike[record->place[row]] == ANT_SPIKE_FOUND && !record->flags[row])
      g_array_append_val (rows, row);
  results->spike_row = (guint32 *) (gpointer) g_array_steal (rows, &results->n_spikes);
}

static void
add_spike_flags (AntScanResults *results)
{
  const AntRecord *record = results->record;
  results->flags = g_memdup2 (record->flags, record->n_rows * sizeof *record->flags);
  for (gsize i = 0; i < results->n_spikes; i++)
    results->flags[results->spike_row[i]] |= ANT_FLAG_SPIKE;
}

static gboolean
dips_fit (const AntScanResults *results, const AntSeries *series, gsize n, const AntDip *dip)
{
  for (gsize i = 0; i < n; i++)
    {
      double place = ant_series_place (series, dip[i].mid_d);
      if (!(place > -1e6 && place < (double) series->n + 1e6) || dip[i].chunk >= results->n_chunks)
        return FALSE;
    }
  return TRUE;
}

gboolean
ant_scan_results_join (AntScanResults *results, AntRecord *record)
{
  const AntSeries *series = &record->series;
  for (gsize i = 0; i < results->n_chunks; i++)
    if (results->chunk[i].n > series->n || results->chunk[i].first > series->n - results->chunk[i].n)
      return FALSE;
  for (gsize i = 0; i < results->n_spikes; i++)
    if (results->spike_row[i] >= record->n_rows)
      return FALSE;
  if (!dips_fit (results, series, results->n_dips, results->dip)
      || !dips_fit (results, series, results->n_brightenings, results->brightening))
    return FALSE;
  results->record = ant_record_ref (record);
  add_spike_flags (results);
  return TRUE;
}

static gsize
count_short (gsize n, const AntDip *dip)
{
  gsize count = 0;
  for (gsize i = 0; i < n; i++)
    count += dip[i].duration_d * ANT_HOURS_PER_DAY <= ANT_MIRROR_LONGEST_H;
  return count;
}

/* A noise model that does not describe its chunk makes every SNR in it wrong: say so. */
static void
say_health (AntScanResults *results)
{
  for (gsize i = 0; i < results->n_chunks; i++)
    {
      const AntChunk *chunk = &results->chunk[i];
      const AntChunkHealth *health = &chunk->health;
      gsize number = i + 1;
      if (fabs (health->innovation_rms - 1) > 0.05)
        say (results, _("Chunk %zu: the scatter is %.2f times what its noise model says"), number,
             health->innovation_rms);
      if (fabs (health->lag1) > 0.05)
        say (results, _("Chunk %zu: neighbouring forecast errors are correlated by %+.2f; the noise model misses something"),
             number, health->lag1);
      if (health->loudest > 1.15 || health->quietest < 0.87)
        say (results, _("Chunk %zu: the noise changes within it, from %.2f to %.2f of the model's; SNRs in loud stretches are too high, in quiet ones too low"),
             number, health->quietest, health->loudest);
      g_autoptr (GString) names = g_string_new (NULL);
      gsize free_parameters = ant_noise_model_get (&chunk->model, NULL);
      for (gsize p = 0; p < free_parameters; p++)
        if (health->unconstrained[p])
          {
            char name[64];
            ant_noise_model_parameter_name (&chunk->model, p, sizeof name, name);
            g_string_append_printf (names, "%s%s", names->len ? ", " : "", name);
          }
      if (names->len)
        say (results, _("Chunk %zu: the data say little about %s; the prior decides"), number, names->str);
    }
}

static void
say_surrogates (AntScanResults *results)
{
  if (results->n_surrogates)
    say (results,
         _("Expected false dips and the threshold rest on %zu surrogates of this record, with %zu events of SNR 4 and more"),
         results->n_surrogates, results->n_surrogate_events);
}

/* The mirror is the data's own check: noise of the fitted kind would put as few brightenings above the threshold as dips. */
static void
say_mirror (AntScanResults *results)
{
  double expected = results->expected_at_threshold;
  if ((double) results->n_mirrored > expected + 3 * sqrt (expected) + 2)
    say (results, _("%zu brightenings of 9 h and less are listed where noise alone would give %.2g: the record has excursions that the noise model does not know (instrument, flares), so dips of like SNR need a cause other than chance, not necessarily a crossing"),
         results->n_mirrored, expected);
}

static void
say_length (AntScanResults *results)
{
  double span_d = (double) results->record->series.n * results->record->series.step_d;
  if (span_d < 30)
    say (results, _("The record spans %.1f d: noise slower than about %.1f d is known from the prior only, so depths of long dips rest on it"),
         span_d, span_d / 5);
  if (results->settings.bank.duration_max_h > 13)
    say (results, _("Dips longer than 13 h are looked for: on the Sun, spots and faculae look like dips of that length"));
}

const char *
ant_scan_reach_words (AntScanReach reach)
{
  switch (reach)
    {
    case ANT_SCAN_COMPLETE:
      return NULL;
    case ANT_SCAN_DIPS:
      return _("The scan was stopped before its end: the dips are complete, passages were not traced");
    case ANT_SCAN_WEIGHED:
      return _("The scan was stopped before its end: dips were weighed one by one, but neighbours not fitted together and "
               "those at the borders of pieces not fitted again; passages were not traced");
    case ANT_SCAN_NOISE:
    case ANT_SCAN_NOTHING:
    default:
      return _("The scan was stopped before its end: the noise is known and dips of SNR 8 and more are listed, weaker ones "
               "were not weighed; passages were not traced");
    }
}

static void
say_reach (AntScanResults *results)
{
  if (results->reach < ANT_SCAN_COMPLETE)
    say (results, "%s", ant_scan_reach_words (results->reach));
}

AntScanResults *
ant_scan_results_new (AntRecord *record, const AntSettings *settings, const AntScan *scan)
{
  AntScanResults *results = g_new0 (AntScanResults, 1);
  const AntDip *dip;
  results->ref_count = 1;
  results->record = ant_record_ref (record);
  results->settings = *settings;
  results->settings.grid.good_values = NULL;
  results->settings.grid.excluded = results->settings.grid.masked = NULL;
  results->reach = ant_scan_reach (scan);
  results->said = g_ptr_array_new_with_free_func (g_free);
  results->n_dips = ant_scan_dips (scan, &dip);
  results->dip = g_memdup2 (dip, results->n_dips * sizeof *dip);
  copy_passages (results, scan);
  results->n_brightenings = ant_scan_brightenings (scan, &dip);
  results->brightening = g_memdup2 (dip, results->n_brightenings * sizeof *dip);
  results->threshold_snr = ant_scan_threshold (scan);
  results->n_surrogates = ant_scan_surrogates (scan, &results->n_surrogate_events);
  results->expected_at_threshold = ant_scan_expected_false (scan, results->threshold_snr);
  results->chance = ant_scan_chance_law (scan);
  results->observed_d = ant_scan_chance_field (scan).observed_d;
  results->n_refits = ant_scan_refits (scan);
  results->n_mirror_dips = count_short (results->n_dips, results->dip);
  results->n_mirrored = count_short (results->n_brightenings, results->brightening);
  copy_chunks (results, scan);
  median_floor (results);
  find_spike_rows (results, scan);
  add_spike_flags (results);
  say_reach (results);
  say_surrogates (results);
  say_health (results);
  say_length (results);
  say_mirror (results);
  return results;
}

AntScanResults *
ant_scan_results_ref (AntScanResults *results)
{
  g_atomic_int_inc (&results->ref_count);
  return results;
}

void
ant_scan_results_unref (AntScanResults *results)
{
  if (!results || !g_atomic_int_dec_and_test (&results->ref_count))
    return;
  for (gsize i = 0; i < results->n_chunks; i++)
    g_free (results->chunk[i].frequency_cd);
  g_free (results->chunk);
  g_free (results->dip);
  g_free (results->brightening);
  g_free (results->dip_verdict);
  g_free (results->brightening_verdict);
  g_free (results->passage);
  ant_repeat_results_clear (&results->repeats);
  g_free (results->slow_ppm);
  g_free (results->spike_row);
  g_free (results->flags);
  g_ptr_array_unref (results->said);
  ant_record_unref (results->record);
  g_free (results);
}

AntVerdictInput
ant_verdict_input_of (const AntRecord *record, const AntSettings *settings)
{
  return (AntVerdictInput) {
    .series = &record->series,
    .exposure_d = record->exposure_d,
    .limb_darkening = settings->bank.limb_darkening,
    .line_period_d = settings->line_period_h / ANT_HOURS_PER_DAY,
    .options = { .target_star = settings->target == ANT_TARGET_STAR, .rates = settings->rates },
  };
}

AntVerdictInput
ant_scan_results_verdict_input (const AntScanResults *results)
{
  AntVerdictInput input = ant_verdict_input_of (results->record, &results->settings);
  input.n_chunks = results->n_chunks;
  input.chunk = results->chunk;
  input.n_dips = results->n_dips;
  input.n_brightenings = results->n_brightenings;
  input.dip = results->dip;
  input.brightening = results->brightening;
  return input;
}

void
ant_scan_results_add_verdicts (AntScanResults *results, const AntVerdictWork *work)
{
  results->dip_verdict = g_memdup2 (ant_verdict_work_dips (work), results->n_dips * sizeof (AntVerdict));
  results->brightening_verdict
      = g_memdup2 (ant_verdict_work_brightenings (work), results->n_brightenings * sizeof (AntVerdict));
}

AntDip
ant_passage_as_dip (const AntPassage *passage)
{
  return (AntDip) { .mid_d = passage->mid_d, .duration_d = passage->end_d - passage->start_d, .edge_d = NAN,
                    .depth_ppm = passage->depth_ppm, .depth_sigma_ppm = passage->depth_sigma_ppm, .mean_depth_ppm = NAN,
                    .radius_ratio = NAN, .snr = passage->depth_ppm / passage->depth_sigma_ppm, .first_snr = NAN,
                    .mid_sigma_d = NAN, .duration_sigma_d = NAN, .expected_false = NAN, .coverage = passage->coverage,
                    .chunk = passage->chunk };
}

AntDipList
ant_scan_results_list (const AntScanResults *results, gboolean brightenings)
{
  return (AntDipList) {
    .brightenings = brightenings,
    .incomplete = ant_scan_reach_words (results->reach),
    .n = brightenings ? results->n_brightenings : results->n_dips,
    .dip = brightenings ? results->brightening : results->dip,
    .verdict = brightenings ? results->brightening_verdict : results->dip_verdict,
    .limb_u1 = results->settings.bank.limb_darkening.u1,
    .limb_u2 = results->settings.bank.limb_darkening.u2,
    .threshold_snr = results->threshold_snr,
    .false_alarms = results->expected_at_threshold,
    .n_surrogates = results->n_surrogates,
    .n_surrogate_events = results->n_surrogate_events,
    .mirror_known = TRUE,
    .n_found = results->n_mirror_dips,
    .n_mirrored = results->n_mirrored,
  };
}
