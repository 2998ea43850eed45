/* scan-tables.c - tables of noise floor, spectrum and chunk diagnostics. */
#include "writers/scan-tables.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/robust.h"
#include "core/units.h"
#include "writers/csv.h"

#define UHZ_PER_CYCLE_A_DAY (1e6 / ANT_SECONDS_PER_DAY)

static void
add_floor (GString *table, gsize chunk, const AntFloorPoint *point, double threshold_snr)
{
  g_string_append_printf (table, "%zu,", chunk);
  ant_csv_number (table, "%.4g", point->duration_d * ANT_HOURS_PER_DAY);
  g_string_append_c (table, ',');
  ant_csv_number (table, "%.5g", point->sigma_ppm);
  g_string_append_c (table, ',');
  ant_csv_number (table, "%.5g", threshold_snr * point->sigma_ppm);
  g_string_append_c (table, ',');
  ant_csv_number (table, "%.4f", point->snr_sd);
  g_string_append_printf (table, ",%zu\n", point->starts);
}

GString *
ant_floor_table_text (const AntScanResults *results)
{
  GString *table = g_string_new (NULL);
  ant_csv_preamble (table, _("Noise floor: the depth that is 1 sigma, and the depth that reaches the threshold"), results->record);
  ant_csv_comment (table, _("chunk 0 is the median over all chunks; snr_sd is the spread of the dip SNR, 1 where the noise model holds"));
  g_string_append (table, "chunk,duration_h,sigma_ppm,threshold_ppm,snr_sd,starts\n");
  for (gsize p = 0; p < results->n_floor; p++)
    add_floor (table, 0, &results->floor[p], results->threshold_snr);
  for (gsize i = 0; i < results->n_chunks; i++)
    for (gsize p = 0; p < results->chunk[i].n_floor; p++)
      add_floor (table, i + 1, &results->chunk[i].floor[p], results->threshold_snr);
  return table;
}

/* Measurement variance of a typical sample of the record. */
static double
typical_variance (const AntRecord *record, const AntNoiseModel *model)
{
  const AntSeries *series = &record->series;
  gsize n = 0;
  double error2 = 0, inverse_count = 0;
  for (gsize i = 0; i < series->n; i++)
    if (!isnan (series->value_ppm[i]))
      {
        double error = series->error_ppm ? (double) series->error_ppm[i] : 0;
        error2 += error * error;
        inverse_count += series->bin_count ? 1 / (double) series->bin_count[i] : 1;
        n++;
      }
  return n ? model->white_ppm * model->white_ppm * inverse_count / (double) n
               + model->error_scale * model->error_scale * error2 / (double) n : 0;
}

static void
add_bin (GString *table, gsize number, const AntRecord *record, const AntChunk *chunk, double variance, gsize bin)
{
  double f_cd = chunk->frequency_cd[bin];
  double white = ant_noise_white_psd (variance, record->series.step_d);
  g_string_append_printf (table, "%zu,", number);
  ant_csv_number (table, "%.6g", f_cd * UHZ_PER_CYCLE_A_DAY);
  g_string_append_c (table, ',');
  ant_csv_number (table, "%.5g", chunk->power_unmasked[bin] / UHZ_PER_CYCLE_A_DAY);
  g_string_append_c (table, ',');
  ant_csv_number (table, "%.5g", (ant_noise_model_psd (&chunk->model, f_cd) + white) / UHZ_PER_CYCLE_A_DAY);
  g_string_append_c (table, ',');
  ant_csv_number (table, "%.5g", white / UHZ_PER_CYCLE_A_DAY);
  for (gsize p = 0; p < chunk->model.n_parts; p++)
    {
      g_string_append_c (table, ',');
      ant_csv_number (table, "%.5g", ant_noise_part_psd (&chunk->model.part[p], f_cd) / UHZ_PER_CYCLE_A_DAY);
    }
  g_string_append_c (table, '\n');
}

/* Medians over the chunks at the bins of the first one, each chunk read at its nearest bin in ln f. */
static void
add_median_bin (GString *table, const AntScanResults *results, const double *variance, gsize bin)
{
  g_autofree double *power = g_new (double, results->n_chunks), *model = g_new (double, results->n_chunks);
  double f_cd = results->chunk[0].frequency_cd[bin];
  for (gsize i = 0; i < results->n_chunks; i++)
    {
      const AntChunk *chunk = &results->chunk[i];
      gsize near = 0;
      for (gsize b = 1; b < chunk->n_bins; b++)
        if (fabs (log (chunk->frequency_cd[b] / f_cd)) < fabs (log (chunk->frequency_cd[near] / f_cd)))
          near = b;
      power[i] = chunk->n_bins ? chunk->power_unmasked[near] : NAN;
      model[i] = ant_noise_model_psd (&chunk->model, f_cd)
                 + ant_noise_white_psd (variance[i], results->record->series.step_d);
    }
  g_string_append (table, "0,");
  ant_csv_number (table, "%.6g", f_cd * UHZ_PER_CYCLE_A_DAY);
  g_string_append_c (table, ',');
  ant_csv_number (table, "%.5g", ant_median (results->n_chunks, power, power) / UHZ_PER_CYCLE_A_DAY);
  g_string_append_c (table, ',');
  ant_csv_number (table, "%.5g", ant_median (results->n_chunks, model, model) / UHZ_PER_CYCLE_A_DAY);
  for (gsize p = 0; p <= results->chunk[0].model.n_parts; p++)
    g_string_append_c (table, ',');
  g_string_append_c (table, '\n');
}

GString *
ant_spectrum_table_text (const AntScanResults *results)
{
  GString *table = g_string_new (NULL);
  ant_csv_preamble (table, _("Power spectrum, one-sided, ppm^2 per microhertz, the gaps' effect removed"), results->record);
  ant_csv_comment (table, _("chunk 0 is the median over all chunks; model = white + every part; strong dips are taken out"));
  g_string_append (table, "chunk,frequency_uhz,measured,model,white");
  gsize n_parts = results->n_chunks ? results->chunk[0].model.n_parts : 0;
  for (gsize p = 0; p < n_parts; p++)
    g_string_append_printf (table, ",part_%zu", p + 1);
  g_string_append_c (table, '\n');
  g_autofree double *variance = g_new (double, results->n_chunks + 1);
  for (gsize i = 0; i < results->n_chunks; i++)
    variance[i] = typical_variance (results->record, &results->chunk[i].model);
  for (gsize b = 0; results->n_chunks && b < results->chunk[0].n_bins; b++)
    add_median_bin (table, results, variance, b);
  for (gsize i = 0; i < results->n_chunks; i++)
    for (gsize b = 0; b < results->chunk[i].n_bins; b++)
      add_bin (table, i + 1, results->record, &results->chunk[i], variance[i], b);
  return table;
}

static void
add_parameters (GString *table, const AntNoiseModel *model)
{
  for (gsize p = 0; p < model->n_parts; p++)
    {
      const AntNoisePart *part = &model->part[p];
      g_string_append_printf (table, ",%s", ant_noise_part_role (part));
      g_string_append_c (table, ',');
      ant_csv_number (table, "%.5g", part->rms_ppm);
      g_string_append_c (table, ',');
      ant_csv_number (table, "%.6g", part->time_d * ANT_HOURS_PER_DAY);
    }
  g_string_append_c (table, '\n');
}

GString *
ant_chunks_table_text (const AntScanResults *results)
{
  GString *table = g_string_new (NULL);
  const AntSeries *series = &results->record->series;
  ant_csv_preamble (table, _("Noise models of the chunks, and how well they hold"), results->record);
  ant_csv_comment (table, _("innovation_rms is 1 and lag1 is 0 where the model holds; quietest and loudest are innovation rms in windows of 4 d"));
  ant_csv_comment (table, _("time of a part: undamped period of an oscillator, correlation time of an exponential"));
  g_string_append (table, "chunk,start_time,end_time,observed,spikes,innovation_rms,lag1,quietest,loudest,white_ppm,error_scale");
  for (gsize p = 0; results->n_chunks && p < results->chunk[0].model.n_parts; p++)
    g_string_append_printf (table, ",part_%zu,rms_%zu_ppm,time_%zu_h", p + 1,
                            p + 1, p + 1);
  g_string_append_c (table, '\n');
  for (gsize i = 0; i < results->n_chunks; i++)
    {
      const AntChunk *chunk = &results->chunk[i];
      const AntChunkHealth *health = &chunk->health;
      double start_d = ant_series_time (series, (double) chunk->first);
      double end_d = ant_series_time (series, (double) (chunk->first + chunk->n - 1));
      g_autofree char *start = ant_time_reference_own_text (&results->record->time, start_d);
      g_autofree char *end = ant_time_reference_own_text (&results->record->time, end_d);
      g_string_append_printf (table, "%zu,%s,%s,%zu,%zu", i + 1, start, end, health->observed, health->spikes);
      const double number[] = { health->innovation_rms, health->lag1, health->quietest, health->loudest,
                                chunk->model.white_ppm, chunk->model.error_scale };
      for (gsize k = 0; k < G_N_ELEMENTS (number); k++)
        {
          g_string_append_c (table, ',');
          ant_csv_number (table, "%.5g", number[k]);
        }
      add_parameters (table, &chunk->model);
    }
  return table;
}
