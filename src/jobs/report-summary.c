/* report-summary.c - the first page of a report: the record, what was assumed, what was found. */
#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/noise-words.h"
#include "data/record-words.h"
#include "jobs/report-private.h"

static void add (AntPages *pages, void (*put) (AntPages *, const char *), const char *format, ...) G_GNUC_PRINTF (3, 4);

static void
add (AntPages *pages, void (*put) (AntPages *, const char *), const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_autofree char *text = g_strdup_vprintf (format, arguments);
  va_end (arguments);
  put (pages, text);
}

static void
body (AntPages *pages, const char *text)
{
  ant_pages_text (pages, ANT_PAGES_BODY, text);
}

/* What was found, and how much of it chance alone would show. */
static void
tell_chance (const AntScanResults *results, AntPages *pages)
{
  g_autofree char *chance = ant_chance_words (results->expected_at_threshold);
  add (pages, body,
       g_dngettext (NULL, "The search lists %zu dip at or above an SNR of %.2f.", "The search lists %zu dips at or above an SNR of %.2f.",
                    results->n_dips),
       results->n_dips, results->threshold_snr);
  add (pages, body,
       _("Noise alone, of the kind fitted to this record, is expected to show %s such dips in its %.1f observed days, at any time and "
         "of any length searched. “By chance” tells for each dip how many of its SNR noise alone would show here."),
       *chance ? chance : _("an unknown number of"), results->observed_d);
  add (pages, body,
       _("The same search for brightenings is the record's own check: of 9 h and less it lists %zu, beside %zu of the dips. Spots are dark, "
         "faculae and flares bright, so the two need not be equal; many brightenings mean that the noise is not what the model says."),
       results->n_mirrored, results->n_mirror_dips);
  const char *lacks = ant_scan_reach_words (results->reach);
  if (lacks)
    add (pages, body, "%s.", lacks);
}

void
ant_report_list (const AntReport *report, AntPages *pages, gboolean brightenings)
{
  const AntPagesColumn columns[] = { { "", 1 }, { _("Middle"), 0 }, { _("Length"), 1 }, { _("Depth, ppm"), 1 },
                                     { _("SNR"), 1 }, { _("By chance"), 1 }, { _("Observed"), 1 }, { _("Verdict"), 0 } };
  const AntScanResults *results = report->results;
  gsize n = brightenings ? results->n_brightenings : results->n_dips;
  g_autoptr (GPtrArray) cells = g_ptr_array_new_with_free_func (g_free);
  for (gsize i = 0; i < n; i++)
    {
      const AntDip *dip = brightenings ? &results->brightening[i] : &results->dip[i];
      g_ptr_array_add (cells, g_strdup_printf ("%zu", i + 1));
      g_ptr_array_add (cells, ant_instant_words (results->record, dip->mid_d));
      g_ptr_array_add (cells, ant_length_words (dip->duration_d));
      g_ptr_array_add (cells, ant_depth_figures (results->record, dip, ANT_DEPTH_PPM));
      g_ptr_array_add (cells, ant_number_words (dip->snr, 1));
      g_ptr_array_add (cells, ant_chance_words (dip->expected_false));
      g_ptr_array_add (cells, g_strdup_printf (_("%.0f %%"), 100 * dip->coverage));
      if (!brightenings)
        g_ptr_array_add (cells, ant_report_verdict_words (report, i));
    }
  ant_pages_table (pages, ANT_PAGES_BODY, G_N_ELEMENTS (columns) - (brightenings ? 1 : 0), columns, n, (const char *const *) cells->pdata);
}

void
ant_report_summary (const AntReport *report, AntPages *pages)
{
  const AntScanResults *results = report->results;
  const AntRecord *record = results->record;
  g_autofree char *name = ant_report_record_name (record), *title = g_strdup_printf (_("Dips in %s"), name), *below = ant_record_headline (record, &report->layers->summary);
  g_autoptr (GPtrArray) facts = ant_record_facts (record, &report->layers->summary), out = ant_record_left_out (&report->layers->summary);
  ant_record_add_further (facts, record);
  ant_pages_title (pages, title, below);
  ant_pages_heading (pages, 1, _("The record"), 60);
  ant_pages_facts (pages, facts, 2);
  if (record->said->len > 0)
    ant_pages_heading (pages, 2, _("What was assumed and found while reading"), 20);
  for (guint i = 0; i < record->said->len; i++)
    ant_pages_item (pages, g_ptr_array_index (record->said, i));
  if (out->len > 0)
    {
      ant_pages_heading (pages, 2, _("What was left out"), 20);
      ant_pages_facts (pages, out, 1);
    }
  ant_pages_heading (pages, 1, _("What was found"), 60);
  tell_chance (results, pages);
  if (results->n_dips > 0)
    ant_report_list (report, pages, FALSE);
}

void
ant_report_brightenings (const AntReport *report, AntPages *pages)
{
  if (report->results->n_brightenings == 0)
    return;
  ant_pages_heading (pages, 1, _("Brightenings"), 60);
  body (pages, _("What the same search lists with the sign turned. Their depth is negative. They show what else than crossings this record holds."));
  ant_report_list (report, pages, TRUE);
}

void
ant_report_passages (const AntReport *report, AntPages *pages)
{
  const AntPagesColumn columns[] = { { "", 1 }, { _("Middle"), 0 }, { _("Width"), 1 }, { _("Depth, ppm"), 1 }, { _("Observed"), 1 } };
  const AntScanResults *results = report->results;
  g_autoptr (GPtrArray) cells = g_ptr_array_new_with_free_func (g_free);
  if (results->n_passages == 0)
    return;
  for (gsize i = 0; i < results->n_passages; i++)
    {
      const AntPassage *passage = &results->passage[i];
      g_ptr_array_add (cells, g_strdup_printf ("%zu", i + 1));
      g_ptr_array_add (cells, ant_instant_words (results->record, passage->mid_d));
      g_ptr_array_add (cells, g_strdup_printf (_("%.1f d"), passage->end_d - passage->start_d));
      g_ptr_array_add (cells, g_strdup_printf ("%.0f ± %.0f", passage->depth_ppm, passage->depth_sigma_ppm));
      g_ptr_array_add (cells, g_strdup_printf (_("%.0f %%"), 100 * passage->coverage));
    }
  ant_pages_heading (pages, 1, _("Passages of spot groups and the like"), 60);
  body (pages, _("Minima of the slow part of the record that last 1 to 14 days. No claim about chance is made: the Sun does this."));
  ant_pages_table (pages, ANT_PAGES_BODY, G_N_ELEMENTS (columns), columns, results->n_passages, (const char *const *) cells->pdata);
}
