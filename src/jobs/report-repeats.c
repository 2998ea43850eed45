/* report-repeats.c - what recurs in a record, and how much of that chance would show. */
#include <glib/gi18n.h>

#include "core/units.h"
#include "data/dip-words.h"
#include "jobs/report-private.h"

#define MOST_EVENTS 40

/* What was searched, and how often noise alone would list something. */
static void
tell_search (const AntRepeatResults *repeats, AntPages *pages)
{
  g_autofree char *chance = ant_chance_words (repeats->expected_at_threshold);
  g_autofree char *text =
      g_strdup_printf (_("Periods from %.3g to %.3g d were searched for dips that recur at least %zu times. Listed is what reaches a train SNR of %.2f; "
                         "noise alone is expected to show %s such repeats in this record, and the same search for brightenings lists %zu."),
                       repeats->period_min_d, repeats->period_max_d, repeats->least_events, repeats->threshold_snr,
                       *chance ? chance : _("an unknown number of"), repeats->n_mirrored);
  ant_pages_text (pages, ANT_PAGES_BODY, text);
  if (repeats->done < 1)
    {
      g_autofree char *stopped = g_strdup_printf (_("The search was stopped when %.0f %% of the periods had been folded."), 100 * repeats->done);
      ant_pages_text (pages, ANT_PAGES_BODY, stopped);
    }
}

static void
list_repeats (const AntScanResults *results, AntPages *pages)
{
  const AntPagesColumn columns[] = { { "", 1 }, { _("Period, d"), 1 }, { _("Epoch"), 0 }, { _("Length"), 1 }, { _("Depth, ppm"), 1 },
                                     { _("SNR"), 1 }, { _("By chance"), 1 }, { _("Events"), 1 } };
  const AntRepeatResults *repeats = &results->repeats;
  g_autoptr (GPtrArray) cells = g_ptr_array_new_with_free_func (g_free);
  for (gsize i = 0; i < repeats->n; i++)
    {
      const AntRepeat *repeat = &repeats->repeat[i];
      g_autofree char *depth = ant_number_words (repeat->depth_ppm, 1), *sigma = ant_number_words (repeat->depth_sigma_ppm, 1);
      g_ptr_array_add (cells, g_strdup_printf ("%zu", i + 1));
      g_ptr_array_add (cells, g_strdup_printf ("%.5f ± %.5f", repeat->period_d, repeat->period_sigma_d));
      g_ptr_array_add (cells, ant_instant_words (results->record, repeat->epoch_d));
      g_ptr_array_add (cells, ant_length_words (repeat->duration_d));
      g_ptr_array_add (cells, g_strdup_printf ("%s ± %s", depth, sigma));
      g_ptr_array_add (cells, ant_number_words (repeat->snr, 1));
      g_ptr_array_add (cells, ant_chance_words (repeat->expected_false));
      g_ptr_array_add (cells, g_strdup_printf ("%zu", repeat->n_observed));
    }
  ant_pages_table (pages, ANT_PAGES_BODY, G_N_ELEMENTS (columns), columns, repeats->n, (const char *const *) cells->pdata);
}

static void
tell_repeat (const AntScanResults *results, gsize i, AntPages *pages)
{
  const AntPagesColumn columns[] = { { _("Event"), 1 }, { _("Middle"), 0 }, { _("Depth, ppm"), 1 }, { _("SNR"), 1 }, { _("Observed"), 1 },
                                     { _("Listed as"), 0 } };
  const AntRepeat *repeat = &results->repeats.repeat[i];
  gsize n = MIN (repeat->n_events, MOST_EVENTS);
  g_autoptr (GPtrArray) cells = g_ptr_array_new_with_free_func (g_free);
  for (gsize e = 0; e < n; e++)
    {
      const AntRepeatEvent *event = &repeat->event[e];
      g_autofree char *depth = ant_number_words (event->depth_ppm, 1), *sigma = ant_number_words (event->sigma_ppm, 1);
      g_ptr_array_add (cells, g_strdup_printf ("%ld", event->number));
      g_ptr_array_add (cells, ant_instant_words (results->record, event->mid_d));
      g_ptr_array_add (cells, g_strdup_printf ("%s ± %s", depth, sigma));
      g_ptr_array_add (cells, ant_number_words (event->snr, 1));
      g_ptr_array_add (cells, g_strdup_printf (_("%.0f %%"), 100 * event->coverage));
      g_ptr_array_add (cells, event->dip ? g_strdup_printf (_("dip %zu"), event->dip) : g_strdup (""));
    }
  g_autofree char *title = g_strdup_printf (_("Repeat %zu · every %.5f d"), i + 1, repeat->period_d);
  g_autofree char *facts = g_strdup_printf (_("Train SNR %.1f, %.1f without its largest event, %.1f of dips that are not listed; odd and even events differ by "
                                              "%.1f sigma."), repeat->snr, repeat->snr_without_largest, repeat->snr_unlisted, repeat->odd_even);
  ant_pages_heading (pages, 2, title, 70);
  ant_pages_text (pages, ANT_PAGES_BODY, facts);
  ant_pages_table (pages, ANT_PAGES_SMALL, G_N_ELEMENTS (columns), columns, n, (const char *const *) cells->pdata);
  if (repeat->n_events > n)
    {
      g_autofree char *more = g_strdup_printf (_("And %zu more events."), repeat->n_events - n);
      ant_pages_text (pages, ANT_PAGES_QUIET, more);
    }
}

void
ant_report_repeats (const AntReport *report, AntPages *pages)
{
  const AntRepeatResults *repeats = &report->results->repeats;
  if (repeats->searched == 0)
    return;
  ant_pages_heading (pages, 1, _("Repeats"), 60);
  tell_search (repeats, pages);
  if (repeats->n > 0)
    list_repeats (report->results, pages);
  for (gsize i = 0; i < repeats->n; i++)
    tell_repeat (report->results, i, pages);
}
