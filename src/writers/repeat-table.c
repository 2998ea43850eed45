/* repeat-table.c - the columns of repeats and of periods, and what stands above them. */
#include "writers/repeat-table.h"

#include <math.h>

#include "core/units.h"

#define PPM "10**-6"
#define NUMBER(name, expression)                                                                                       \
  static double name (gconstpointer data, gsize row)                                                                   \
  {                                                                                                                    \
    const AntScanResults *results = data;                                                                              \
    G_GNUC_UNUSED const AntTimeReference *time = &results->record->time;                                               \
    G_GNUC_UNUSED const AntRepeat *repeat = &results->repeats.repeat[row];                                             \
    return expression;                                                                                                 \
  }

static gsize
listed_events (const AntRepeat *repeat)
{
  gsize n = 0;
  for (gsize e = 0; e < repeat->n_events; e++)
    n += repeat->event[e].dip > 0;
  return n;
}

NUMBER (number, (double) row + 1)
NUMBER (period_d, repeat->period_d)
NUMBER (period_sigma_d, repeat->period_sigma_d)
NUMBER (epoch_jd, ant_time_reference_jd (time, repeat->epoch_d))
NUMBER (epoch_sigma_d, repeat->epoch_sigma_d)
NUMBER (duration_h, repeat->duration_d * ANT_HOURS_PER_DAY)
NUMBER (depth_ppm, repeat->depth_ppm)
NUMBER (depth_sigma_ppm, repeat->depth_sigma_ppm)
NUMBER (snr, repeat->snr)
NUMBER (events, (double) repeat->n_observed)
NUMBER (expected_false, repeat->expected_false)
NUMBER (touched, (double) repeat->n_events)
NUMBER (listed, (double) listed_events (repeat))
NUMBER (without_largest, repeat->snr_without_largest)
NUMBER (unlisted, repeat->snr_unlisted)
NUMBER (odd_even, repeat->odd_even)
NUMBER (chi2, repeat->chi2)
NUMBER (probability, NAN)

static char *
epoch_time (gconstpointer data, gsize row)
{
  const AntScanResults *results = data;
  return ant_time_reference_own_text (&results->record->time, results->repeats.repeat[row].epoch_d);
}

static char *
class_word (gconstpointer data, gsize row)
{
  return g_strdup ("undecided");
}

static char *
evidence (gconstpointer data, gsize row)
{
  return g_strdup ("");
}

/* "1/2: 0.71, 2: ..." */
static char *
aliases (gconstpointer data, gsize row)
{
  const AntScanResults *results = data;
  const AntRepeat *repeat = &results->repeats.repeat[row];
  GString *text = g_string_new (NULL);
  for (gsize k = 0; k < ANT_REPEAT_ALIASES; k++)
    {
      char snr[G_ASCII_DTOSTR_BUF_SIZE];
      const AntRepeatAlias *alias = &repeat->alias[k];
      g_string_append_printf (text, "%s%d/%d:%s", k ? " " : "", alias->numerator, alias->denominator,
                              g_ascii_formatd (snr, sizeof snr, "%.2f", alias->snr));
    }
  return g_string_free (text, FALSE);
}

static const AntTableColumn repeat_columns[] = {
  { "repeat", ANT_CELL_WHOLE, NULL, NULL, "meta.id;meta.main", NULL, FALSE, number, NULL },
  { "period_d", ANT_CELL_REAL, "%.8g", "d", "time.period", "from event to event", FALSE, period_d, NULL },
  { "period_sigma_d", ANT_CELL_REAL, "%.3g", "d", "stat.error;time.period", "where SNR^2/2 has fallen by a half", FALSE, period_sigma_d, NULL },
  { "epoch_jd", ANT_CELL_REAL, "%.5f", "d", "time.epoch;meta.main",
    "middle of the event nearest to the middle of the record, JD in the record's time scale; empty if the origin of its times is unknown",
    TRUE, epoch_jd, NULL },
  { "epoch_time", ANT_CELL_TEXT, NULL, NULL, "time.epoch", "the same as the record writes its times", FALSE, NULL, epoch_time },
  { "epoch_sigma_d", ANT_CELL_REAL, "%.3g", "d", "stat.error;time.epoch", NULL, FALSE, epoch_sigma_d, NULL },
  { "duration_h", ANT_CELL_REAL, "%.4f", "h", "time.duration", "contact I to IV; length of the box in white noise", FALSE, duration_h, NULL },
  { "depth_ppm", ANT_CELL_REAL, "%.6g", PPM, "phot.flux.bol;arith.ratio;stat.max",
    "common greatest depth of the events' crossings before exposure smearing; depth of the box in white noise", FALSE, depth_ppm, NULL },
  { "depth_sigma_ppm", ANT_CELL_REAL, "%.4g", PPM, "stat.error;phot.flux.bol;arith.ratio;stat.max", NULL, FALSE, depth_sigma_ppm, NULL },
  { "snr", ANT_CELL_REAL, "%.3f", NULL, "stat.snr", "train SNR: all events together", FALSE, snr, NULL },
  { "events", ANT_CELL_WHOLE, NULL, NULL, "meta.number", "events that are at least half observed; 2: period uncertain by a whole factor", FALSE, events, NULL },
  { "expected_false", ANT_CELL_REAL, "%.3g", NULL, "meta.number;stat.probability", "repeats that noise alone would show in this record at this SNR", FALSE, expected_false, NULL },
  { "events_with_data", ANT_CELL_WHOLE, NULL, NULL, "meta.number", "events of which anything is observed", FALSE, touched, NULL },
  { "events_listed", ANT_CELL_WHOLE, NULL, NULL, "meta.number", "events that stand in dips.csv as well", FALSE, listed, NULL },
  { "snr_without_largest", ANT_CELL_REAL, "%.3f", NULL, "stat.snr", "train SNR without the event that adds most", FALSE, without_largest, NULL },
  { "snr_unlisted", ANT_CELL_REAL, "%.3f", NULL, "stat.snr", "train SNR without the events that stand in dips.csv", FALSE, unlisted, NULL },
  { "odd_even_sigma", ANT_CELL_REAL, "%.2f", NULL, "stat.value", "difference in depth of odd and even events, in its own sigma", FALSE, odd_even, NULL },
  { "chi2", ANT_CELL_REAL, "%.2f", NULL, "stat.fit.chi2", "of the events' depths about the common one, events - 1 degrees of freedom", FALSE, chi2, NULL },
  { "aliases", ANT_CELL_TEXT, NULL, NULL, "meta.note", "SNR at simple fractions and multiples of the period", FALSE, NULL, aliases },
  { "class", ANT_CELL_TEXT, NULL, NULL, "meta.code.class", NULL, FALSE, NULL, class_word },
  { "probability", ANT_CELL_REAL, "%.4f", NULL, "stat.probability", "of that class", FALSE, probability, NULL },
  { "evidence", ANT_CELL_TEXT, NULL, NULL, "meta.note", "what speaks for it", FALSE, NULL, evidence },
};

static void
add_notes (AntTable *table, const AntRepeatResults *repeats)
{
  if (!repeats->searched)
    {
      ant_table_note (table, "no period was searched");
      return;
    }
  if (repeats->done < 1)
    ant_table_note (table, "incomplete: the search was stopped after %.0f %% of its periods", 100 * repeats->done);
  ant_table_note (table, "periods from %.6g to %.6g d, at least %zu events, noise %s", repeats->period_min_d, repeats->period_max_d,
                  repeats->least_events, repeats->white ? "taken for white" : "as fitted");
  ant_table_note (table, "threshold: SNR %.3f, at which noise alone is expected to show %.3g repeats of one sign", repeats->threshold_snr,
                  repeats->expected_at_threshold);
}

AntTable *
ant_repeat_table_new (const AntScanResults *results)
{
  AntTable *table = ant_table_new ("Repeats: dips that recur with a period", "REPEATS", results->record);
  const AntRepeatResults *repeats = &results->repeats;
  add_notes (table, repeats);
  if (repeats->searched)
    ant_table_note (table, "the same search for brightenings lists %zu; its best has SNR %.2f", repeats->n_mirrored, repeats->best_mirrored_snr);
  ant_table_add_columns (table, G_N_ELEMENTS (repeat_columns), repeat_columns);
  ant_table_set_rows (table, repeats->n, results, NULL);
  return table;
}

static double
bin_period_d (gconstpointer data, gsize row)
{
  return ((const AntRepeatResults *) data)->period_d[row];
}

static double
bin_snr (gconstpointer data, gsize row)
{
  return ((const AntRepeatResults *) data)->period_snr[row];
}

static double
bin_duration_h (gconstpointer data, gsize row)
{
  return ((const AntRepeatResults *) data)->period_duration_h[row];
}

static const AntTableColumn period_columns[] = {
  { "period_d", ANT_CELL_REAL, "%.8g", "d", "time.period;meta.main", "of the best train in a bin of ln P", FALSE, bin_period_d, NULL },
  { "snr", ANT_CELL_REAL, "%.3f", NULL, "stat.snr", "of the coarse search: single events cut at 5 sigma, a few per cent below the refined SNR", FALSE, bin_snr, NULL },
  { "duration_h", ANT_CELL_REAL, "%.3f", "h", "time.duration", NULL, FALSE, bin_duration_h, NULL },
};

AntTable *
ant_period_table_new (const AntScanResults *results)
{
  AntTable *table = ant_table_new ("Periods: the best SNR at every period", "PERIODS", results->record);
  add_notes (table, &results->repeats);
  ant_table_note (table, "bins below SNR 4 are left out");
  ant_table_add_columns (table, G_N_ELEMENTS (period_columns), period_columns);
  ant_table_set_rows (table, results->repeats.n_periods, &results->repeats, NULL);
  return table;
}
