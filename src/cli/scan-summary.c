/* scan-summary.c - say what a scan found. */
#include "cli/scan-summary.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/verdict-words.h"

#define MOST_LINES 40
#define MOST_SENTENCES 12

/* The middle as people read it: UTC if it is known, else the record's own number. */
static char *
middle_text (const AntRecord *record, double mid_d)
{
  g_autofree char *utc = ant_time_reference_utc_text (&record->time, mid_d, 0);
  return *utc ? g_steal_pointer (&utc) : ant_time_reference_own_text (&record->time, mid_d);
}

static void
print_dips (const AntRecord *record, gsize n, const AntDip *dip, const AntVerdict *verdict)
{
  if (n == 0)
    return;
  g_print (_("  no  middle                length   depth              SNR  first  by chance  edges    class\n"));
  for (gsize i = 0; i < MIN (n, MOST_LINES); i++)
    {
      g_autofree char *middle = middle_text (record, dip[i].mid_d);
      g_autofree char *likely = verdict ? ant_probability_words (ant_verdict_probability (&verdict[i])) : g_strdup ("");
      g_print (_("%4zu  %-20s %5.2f h %7.1f ± %-5.1f ppm %6.1f %6.1f   %8.2g  %-7s  %s %s\n"), i + 1, middle,
               dip[i].duration_d * ANT_HOURS_PER_DAY, dip[i].depth_ppm, dip[i].depth_sigma_ppm, dip[i].snr, dip[i].first_snr,
               dip[i].expected_false, ant_edges_text (dip[i].edges),
               verdict ? ant_dip_class_title (ant_verdict_class (&verdict[i])) : "", likely);
    }
  if (n > MOST_LINES)
    g_print (_("      and %zu more in the table\n"), n - MOST_LINES);
}

/* The deepest is named, the rest counted: the table has them. */
static void
print_passages (const AntScanResults *results)
{
  const AntPassage *deepest = NULL;
  for (gsize i = 0; i < results->n_passages; i++)
    if (!deepest || results->passage[i].depth_ppm > deepest->depth_ppm)
      deepest = &results->passage[i];
  if (!deepest)
    return;
  g_autofree char *time = middle_text (results->record, deepest->mid_d);
  g_print (g_dngettext (NULL, "Spot groups and the like: %zu passage, at %s, %.0f ± %.0f ppm deep, %.1f d wide.\n",
                        "Spot groups and the like: %zu passages, the deepest at %s, %.0f ± %.0f ppm, %.1f d wide.\n",
                        results->n_passages),
           results->n_passages, time, deepest->depth_ppm, deepest->depth_sigma_ppm, deepest->end_d - deepest->start_d);
}

static void
print_repeats (const AntScanResults *results)
{
  const AntRepeatResults *repeats = &results->repeats;
  if (!repeats->searched)
    return;
  g_print (g_dngettext (NULL, "%zu repeat at or above SNR %.2f, periods %.4g to %.4g d; noise alone is expected to show %.2g, brightenings show %zu.\n",
                        "%zu repeats at or above SNR %.2f, periods %.4g to %.4g d; noise alone is expected to show %.2g, brightenings show %zu.\n",
                        repeats->n),
           repeats->n, repeats->threshold_snr, repeats->period_min_d, repeats->period_max_d, repeats->expected_at_threshold,
           repeats->n_mirrored);
  for (gsize i = 0; i < repeats->n; i++)
    {
      const AntRepeat *repeat = &repeats->repeat[i];
      g_autofree char *epoch = middle_text (results->record, repeat->epoch_d);
      g_print (g_dngettext (NULL, "%4zu  every %.6f ± %.6f d, one at %s, %.2f h, %.1f ± %.1f ppm, SNR %.1f, %zu event, by chance %.2g\n",
                            "%4zu  every %.6f ± %.6f d, one at %s, %.2f h, %.1f ± %.1f ppm, SNR %.1f, %zu events, by chance %.2g\n",
                            repeat->n_observed),
               i + 1, repeat->period_d, repeat->period_sigma_d, epoch, repeat->duration_d * ANT_HOURS_PER_DAY, repeat->depth_ppm,
               repeat->depth_sigma_ppm, repeat->snr, repeat->n_observed, repeat->expected_false);
    }
}

static void
print_floor (const AntScanResults *results)
{
  const double hours[] = { 0.5, 2, 6, 13 };
  g_print (_("Noise floor, 1-sigma depth:"));
  for (gsize h = 0; h < G_N_ELEMENTS (hours); h++)
    for (gsize p = 0; p < results->n_floor; p++)
      if (fabs (results->floor[p].duration_d * ANT_HOURS_PER_DAY - hours[h]) < 0.01 && isfinite (results->floor[p].sigma_ppm))
        g_print (_(" %.1f ppm at %g h;"), results->floor[p].sigma_ppm, hours[h]);
  g_print (_(" a dip is listed from %.2f times that depth.\n"), results->threshold_snr);
}

void
ant_scan_summary_print (const AntScanResults *results)
{
  const AntRecord *record = results->record;
  g_print (g_dngettext (NULL, "%s: %.1f d observed, cadence %.6g s, %zu noise model.\n",
                        "%s: %.1f d observed, cadence %.6g s, %zu noise models.\n", results->n_chunks),
           record->path, results->observed_d, record->cadence_d * ANT_SECONDS_PER_DAY, results->n_chunks);
  print_floor (results);
  g_print (g_dngettext (NULL, "%zu dip at or above SNR %.2f; noise alone is expected to show %.2g.\n",
                        "%zu dips at or above SNR %.2f; noise alone is expected to show %.2g.\n", results->n_dips),
           results->n_dips, results->threshold_snr, results->expected_at_threshold);
  print_dips (record, results->n_dips, results->dip, results->dip_verdict);
  g_print (_("The same search for brightenings lists %zu (of 9 h or less: %zu, beside %zu of the dips).\n"),
           results->n_brightenings, results->n_mirrored, results->n_mirror_dips);
  print_dips (record, results->n_brightenings, results->brightening, results->brightening_verdict);
  print_passages (results);
  print_repeats (results);
  for (guint i = 0; i < MIN (results->said->len, MOST_SENTENCES); i++)
    g_print ("%s.\n", (const char *) g_ptr_array_index (results->said, i));
  if (results->said->len > MOST_SENTENCES)
    g_print (_("And %u more remarks on the noise of single chunks: see chunks.csv.\n"), results->said->len - MOST_SENTENCES);
}

void
ant_scan_summary_print_asked (const AntRecord *record, const AntDip *dip, double upper_limit_ppm, const AntVerdict *verdict)
{
  g_autofree char *middle = middle_text (record, dip->mid_d);
  g_print (_("Asked dip at %s, %.2f h: depth %.1f ± %.1f ppm, SNR %.2f; deeper than %.1f ppm is excluded at 95 %%; %.0f %% observed, edges seen: %s.\n"),
           middle, dip->duration_d * ANT_HOURS_PER_DAY, dip->depth_ppm, dip->depth_sigma_ppm, dip->snr, upper_limit_ppm,
           100 * dip->coverage, ant_edges_text (dip->edges));
  g_autofree char *likely = ant_probability_words (ant_verdict_probability (verdict));
  g_autofree char *shape = ant_probability_words (ant_verdict_shape_probability (verdict));
  g_print (_("Taken for %s, %s; by shape alone %s, %s.\n"), ant_dip_class_title (ant_cause_class (verdict->cause)), likely,
           ant_dip_class_title (ant_cause_class (verdict->shape)), shape);
  g_autoptr (GPtrArray) lines = ant_verdict_lines (verdict);
  for (guint i = 0; i < lines->len; i++)
    {
      const AntEvidenceLine *line = g_ptr_array_index (lines, i);
      g_autofree char *weight = ant_weight_words (line->weight);
      g_print ("%7s  %s\n", weight, line->text);
    }
}
