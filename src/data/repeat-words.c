/* repeat-words.c - repeats, for people. */
#include "data/repeat-words.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"

char *
ant_repeat_title (const AntRepeatResults *results, gsize i)
{
  return g_strdup_printf (_("%zu · every %.6g d · SNR %.1f"), i + 1, results->repeat[i].period_d, results->repeat[i].snr);
}

/* Whether the coarse search shows a train above the threshold. */
static gboolean
has_peak (const AntRepeatResults *results)
{
  for (gsize i = 0; i < results->n_periods; i++)
    if (results->period_snr[i] >= results->threshold_snr)
      return TRUE;
  return FALSE;
}

char *
ant_repeat_summary (const AntRepeatResults *results)
{
  GString *text = g_string_new (NULL);
  g_string_append_printf (text, g_dngettext (NULL, "%zu repeat at or above SNR %.2f; noise alone is expected to show %.2g, brightenings show %zu.",
                                             "%zu repeats at or above SNR %.2f; noise alone is expected to show %.2g, brightenings show %zu.",
                                             results->n),
                          results->n, results->threshold_snr, results->expected_at_threshold, results->n_mirrored);
  if (results->done < 1)
    g_string_append_printf (text, _(" The search was stopped after %.0f %% of its periods."), 100 * results->done);
  if (results->n == 0 && has_peak (results))
    g_string_append (text, _(" Peaks above the line fell below it when they were weighed exactly, or rest on a single dip."));
  return g_string_free (text, FALSE);
}

GPtrArray *
ant_repeat_facts (const AntRepeatResults *results, gsize i)
{
  GPtrArray *facts = g_ptr_array_new_with_free_func (ant_fact_free);
  if (i >= results->n)
    return facts;
  const AntRepeat *repeat = &results->repeat[i];
  g_autoptr (GString) aliases = g_string_new (NULL);
  gsize listed = 0;
  for (gsize k = 0; k < ANT_REPEAT_ALIASES; k++)
    g_string_append_printf (aliases, _("%s%.5g d: %.1f"), k ? ", " : "", repeat->alias[k].period_d, repeat->alias[k].snr);
  for (gsize e = 0; e < repeat->n_events; e++)
    listed += repeat->event[e].dip > 0;
  ant_facts_add_format (facts, _("Period"), _("%.7g ± %.2g d"), repeat->period_d, repeat->period_sigma_d);
  ant_facts_add_format (facts, _("Length"), _("%.2f h"), repeat->duration_d * ANT_HOURS_PER_DAY);
  ant_facts_add_format (facts, _("Depth"), _("%.1f ± %.1f ppm"), repeat->depth_ppm, repeat->depth_sigma_ppm);
  ant_facts_add_format (facts, _("Train SNR"), _("%.1f; without the largest event %.1f"), repeat->snr, repeat->snr_without_largest);
  ant_facts_add_format (facts, _("By chance"), _("%.2g expected"), repeat->expected_false);
  ant_facts_add_format (facts, _("Events"), _("%zu observed, %zu of them in the list of dips"), repeat->n_observed, listed);
  ant_facts_add_format (facts, _("Odd and even"), _("differ by %.1f sigma"), repeat->odd_even);
  ant_facts_add_format (facts, _("Scatter"), _("χ² %.1f for %zu"), repeat->chi2, repeat->n_observed ? repeat->n_observed - 1 : 0);
  ant_facts_add (facts, _("Other periods, SNR"), aliases->str);
  return facts;
}

char *
ant_repeat_period_text (double period_d)
{
  char text[G_ASCII_DTOSTR_BUF_SIZE];
  return g_strdup (g_ascii_formatd (text, sizeof text, "%.8g", period_d));
}

gboolean
ant_repeat_period_parse (const char *text, double *period_d)
{
  g_autofree char *trimmed = g_strstrip (g_strdup (text));
  char *end = NULL;
  *period_d = g_ascii_strtod (trimmed, &end);
  return end != trimmed && *end == '\0' && *period_d > 0 && isfinite (*period_d);
}
