/* noise-words.c - noise models, for people. */
#include "data/noise-words.h"

#include <glib/gi18n.h>
#include <math.h>

static const char *
role_title (const AntNoisePart *part)
{
  static const struct
  {
    const char *role, *title;
  } titles[] = { { "rotation", N_("Rotation") }, { "days", N_("Days") }, { "hours", N_("Hours") },
                 { "granulation", N_("Granulation") }, { "oscillations", N_("Oscillations") }, { "line", N_("Line") } };
  const char *role = ant_noise_part_role (part);
  for (gsize i = 0; i < G_N_ELEMENTS (titles); i++)
    if (g_str_equal (titles[i].role, role))
      return _ (titles[i].title);
  return role;
}

GPtrArray *
ant_noise_part_facts (const AntNoiseModel *model)
{
  GPtrArray *facts = g_ptr_array_new_with_free_func (ant_fact_free);
  for (gsize i = 0; i < model->n_parts; i++)
    {
      const AntNoisePart *part = &model->part[i];
      g_autofree char *time = ant_length_words (part->time_d);
      if (part->kind == ANT_OSCILLATOR)
        ant_facts_add_format (facts, role_title (part), _("%.3g ppm, period %s, quality %.2g"), part->rms_ppm, time, part->quality);
      else
        ant_facts_add_format (facts, role_title (part), _("%.3g ppm, forgotten in %s"), part->rms_ppm, time);
    }
  ant_facts_add_format (facts, _("White"), _("%.3g ppm per sample"), model->white_ppm);
  return facts;
}

GPtrArray *
ant_noise_health_facts (const AntScanResults *results, gsize index)
{
  const AntChunk *chunk = &results->chunk[index];
  const AntChunkHealth *health = &chunk->health;
  GPtrArray *facts = g_ptr_array_new_with_free_func (ant_fact_free);
  ant_facts_add_format (facts, _("Forecast errors"), _("%.3f of their stated size (1 if the model holds)"), health->innovation_rms);
  ant_facts_add_format (facts, _("Neighbours"), _("correlated by %.3f (0 if the model holds)"), health->lag1);
  if (!isnan (health->loudest))
    ant_facts_add_format (facts, _("Loudest, quietest"), _("%.2f, %.2f of the stated size"), health->loudest, health->quietest);
  ant_facts_add_format (facts, _("Samples"), _("%zu, %zu spikes left out"), health->observed, health->spikes);
  ant_facts_add_format (facts, _("Mirror"), _("dips %zu, brightenings %zu, of 9 h and less"), results->n_mirror_dips,
       results->n_mirrored);
  for (guint i = 0; i < MIN (results->said->len, 12); i++)
    ant_facts_add_format (facts, i == 0 ? _("Remarks") : "", "%s", (const char *) g_ptr_array_index (results->said, i));
  return facts;
}

char *
ant_noise_chunk_title (const AntScanResults *results, gsize index)
{
  const AntChunk *chunk = &results->chunk[index];
  const AntSeries *series = &results->record->series;
  g_autofree char *from = ant_instant_words (results->record, ant_series_time (series, chunk->own_from));
  g_autofree char *to = ant_instant_words (results->record, ant_series_time (series, chunk->own_to));
  return g_strdup_printf (_("Piece %zu: %s to %s"), index + 1, from, to);
}

char *
ant_scan_headline (const AntScanResults *results)
{
  g_autofree char *chance = ant_chance_words (results->expected_at_threshold);
  g_autofree char *dips = g_strdup_printf (g_dngettext (NULL, "%zu dip above SNR %.1f", "%zu dips above SNR %.1f",
                                                        results->n_dips),
                                           results->n_dips, results->threshold_snr);
  const char *mark = results->reach < ANT_SCAN_COMPLETE ? _("incomplete · ") : "";
  return g_strdup_printf (_("%s%s · %s expected by chance · mirror %zu"), mark, dips, chance, results->n_mirrored);
}
