/* repeat-results.c - keep what a search for repeats gave, and say in words what it covers. */
#include "data/repeat-results.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/error.h"

#define MIRROR_MARGIN 1.2 /* a repeat below this many times the best brightening's SNR is told of as such */

AntRepeatOptions
ant_repeat_results_options (const AntRecord *record, const AntSettings *settings)
{
  return (AntRepeatOptions) {
    .grid = { .period_min_d = settings->repeat_period_min_d,
              .period_max_d = settings->repeat_period_max_d,
              .any_duration = settings->repeat_durations > 0,
              .shortest_factor = settings->repeat_shortest,
              .longest_factor = settings->repeat_longest,
              .shortest_d = settings->bank.duration_min_h / ANT_HOURS_PER_DAY,
              .longest_d = settings->bank.duration_max_h / ANT_HOURS_PER_DAY },
    .least_events = (size_t) settings->repeat_events,
    .false_alarms = settings->repeat_false_alarms,
    .white = settings->repeat_noise > 0,
    .edge_d = settings->bank.edge_h / ANT_HOURS_PER_DAY,
    .exposure_d = record->exposure_d,
    .limb_darkening = settings->bank.limb_darkening,
  };
}

gboolean
ant_repeat_results_check (const AntRecord *record, const AntSettings *settings, GError **error)
{
  if (settings->repeats < 1)
    return TRUE;
  AntRepeatOptions options = ant_repeat_results_options (record, settings);
  const AntRepeatGrid *grid = &options.grid;
  double shortest_d, longest_d;
  ant_repeats_limits (&record->series, &options, &shortest_d, &longest_d);
  if (grid->period_max_d > 0 && grid->period_max_d <= grid->period_min_d)
    g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("setting “repeat-period-max”: found %g d, expected more than “repeat-period-min”, %g d"),
                 grid->period_max_d, grid->period_min_d);
  else if (grid->period_max_d > longest_d)
    g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                 _("setting “repeat-period-max”: found %g d, expected at most %.4g d, since %zu events must fit into the record"),
                 grid->period_max_d, longest_d, options.least_events);
  else if (!grid->any_duration && grid->longest_factor <= grid->shortest_factor)
    g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("setting “repeat-longest”: found %g, expected more than “repeat-shortest”, %g"),
                 grid->longest_factor, grid->shortest_factor);
  else if (grid->any_duration && grid->longest_d < grid->shortest_d)
    g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("setting “duration-max”: found %g h, expected at least “duration-min”, %g h"),
                 grid->longest_d * ANT_HOURS_PER_DAY, grid->shortest_d * ANT_HOURS_PER_DAY);
  else if (grid->period_max_d > 0 && grid->period_max_d <= 3 * grid->shortest_d)
    g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                 _("setting “repeat-period-max”: found %g d, expected more than three times the shortest dip, %g h (“duration-min”)"),
                 grid->period_max_d, grid->shortest_d * ANT_HOURS_PER_DAY);
  else
    return TRUE;
  return FALSE;
}

static void
take_spectrum (AntRepeatResults *results, const AntRepeatBins *bins)
{
  results->period_d = g_new (double, bins->n);
  results->period_snr = g_new (double, bins->n);
  results->period_duration_h = g_new (double, bins->n);
  for (gsize i = 0; i < bins->n; i++)
    if (bins->cell[i].power >= ANT_REPEAT_FLOOR)
      {
        gsize k = results->n_periods++;
        results->period_d[k] = bins->cell[i].period_d;
        results->period_snr[k] = sqrt (bins->cell[i].power);
        results->period_duration_h[k] = bins->cell[i].duration_d * ANT_HOURS_PER_DAY;
      }
}

void
ant_repeat_results_take (AntRepeatResults *results, const AntRepeatOptions *options, AntRepeats *repeats)
{
  const AntRepeat *repeat;
  AntRepeatGrid grid = ant_repeats_grid (repeats);
  *results = (AntRepeatResults) { .searched = 1, .done = ant_repeats_done (repeats), .white = options->white != 0,
                                  .period_min_d = grid.period_min_d, .period_max_d = grid.period_max_d,
                                  .least_events = options->least_events, .threshold_snr = ant_repeats_threshold (repeats) };
  results->expected_at_threshold = ant_repeats_expected_false (repeats, results->threshold_snr);
  results->n_mirrored = ant_repeats_mirrored (repeats, &results->best_mirrored_snr);
  results->n = ant_repeats_list (repeats, &repeat);
  results->repeat = g_memdup2 (repeat, results->n * sizeof *repeat);
  for (gsize i = 0; i < results->n; i++)
    results->repeat[i].event = g_memdup2 (repeat[i].event, repeat[i].n_events * sizeof *repeat[i].event);
  take_spectrum (results, ant_repeats_spectrum (repeats));
}

void
ant_repeat_results_clear (AntRepeatResults *results)
{
  for (gsize i = 0; i < results->n; i++)
    g_free (results->repeat[i].event);
  g_free (results->repeat);
  g_free (results->period_d);
  g_free (results->period_snr);
  g_free (results->period_duration_h);
  *results = (AntRepeatResults) { 0 };
}

static void say (GPtrArray *said, const char *format, ...) G_GNUC_PRINTF (2, 3);

static void
say (GPtrArray *said, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_ptr_array_add (said, g_strdup_vprintf (format, arguments));
  va_end (arguments);
}

/* A stronger repeat with the same period, and how far into its cycle this one lies; NULL if there is none. */
static const AntRepeat *
same_cycle (const AntRepeatResults *results, gsize i, double *phase)
{
  const AntRepeat *repeat = &results->repeat[i];
  for (gsize k = 0; k < i; k++)
    {
      const AntRepeat *other = &results->repeat[k];
      double sigma_d = hypot (repeat->period_sigma_d, other->period_sigma_d);
      *phase = (repeat->epoch_d - other->epoch_d) / other->period_d;
      *phase -= floor (*phase);
      if (fabs (repeat->period_d - other->period_d) < 4 * sigma_d)
        return other;
    }
  return NULL;
}

/* Events within the record, observed or not. */
static gsize
events_within (const AntRecord *record, const AntRepeat *repeat)
{
  return (gsize) ((double) record->series.n * record->series.step_d / repeat->period_d);
}

static void
say_repeat (const AntRepeatResults *results, const AntRecord *record, const AntSettings *settings, gsize i, GPtrArray *said)
{
  const AntRepeat *repeat = &results->repeat[i], *other;
  gsize listed = 0, within = events_within (record, repeat);
  double phase;
  for (gsize e = 0; e < repeat->n_events; e++)
    listed += repeat->event[e].dip > 0;
  if (repeat->n_observed == 2)
    say (said, _("Repeat %zu rests on two events: any whole fraction of its period would do as well where its events fall into gaps"), i + 1);
  if (results->n_mirrored && repeat->snr < MIRROR_MARGIN * results->best_mirrored_snr)
    say (said, _("Repeat %zu is hardly stronger than what brightenings show (SNR %.1f): excursions that the noise model does not know can make it"),
         i + 1, results->best_mirrored_snr);
  if (listed)
    say (said, _("Repeat %zu: %zu of its events stand in the list of dips; without them its SNR is %.1f"), i + 1, listed,
         repeat->snr_unlisted);
  if (repeat->odd_even > 3)
    say (said, _("Repeat %zu: odd and even events differ by %.1f sigma in depth; its true period may be %.6g d"), i + 1, repeat->odd_even,
         2 * repeat->period_d);
  if (5 * repeat->n_observed < 3 * within)
    say (said, _("Repeat %zu: of %zu events within the record only %zu were observed: suspect the gaps"), i + 1, within,
         repeat->n_observed);
  if ((other = same_cycle (results, i, &phase)))
    say (said, _("Repeat %zu has the period of repeat %zu, at %.2f of its cycle: both may belong to one body"), i + 1,
         (gsize) (other - results->repeat) + 1, phase);
  double orbit_d = settings->line_period_h / ANT_HOURS_PER_DAY;
  double orbits = orbit_d > 0 ? repeat->period_d / orbit_d : 0;
  if (orbit_d > 0 && fabs (orbits - floor (orbits + 0.5)) * orbit_d < repeat->period_sigma_d + 0.02 * orbit_d)
    say (said, _("Repeat %zu: its period is %.0f times that of the line of setting “line-period”: suspect the orbit"), i + 1, orbits);
  for (int k = 1; k <= 3; k++)
    if (fabs (repeat->period_d * k / ANT_SYNODIC_ROTATION_D - 1) < 0.03)
      say (said, _("Repeat %zu: its period is the Sun's rotation as seen from the Earth over %d: suspect what rotates with the Sun"), i + 1, k);
  if (fabs (repeat->period_d - floor (repeat->period_d + 0.5)) < fmax (3 * repeat->period_sigma_d, 0.002) && repeat->period_d > 0.9)
    say (said, _("Repeat %zu: its period is a whole number of days: suspect the instrument's schedule"), i + 1);
}

void
ant_repeat_results_say (const AntRepeatResults *results, const AntRecord *record, const AntSettings *settings, GPtrArray *said)
{
  if (!results->searched)
    {
      double shortest_d, longest_d;
      AntRepeatOptions options = ant_repeat_results_options (record, settings);
      ant_repeats_limits (&record->series, &options, &shortest_d, &longest_d);
      say (said, _("No period was searched for repeats: %zu events within the record allow at most %.3g d, and %.3g d is the shortest"),
           options.least_events, longest_d, fmax (shortest_d, options.grid.period_min_d));
      return;
    }
  if (results->done < 1)
    say (said, _("The search for repeats was stopped after %.0f %% of its periods; what is listed was found until then"),
         100 * results->done);
  for (gsize i = 0; i < results->n; i++)
    say_repeat (results, record, settings, i, said);
  if (results->n_mirrored)
    say (said, _("A brightening recurs at SNR %.1f, where noise alone would give %.2g: repeats of like SNR need a cause other than chance"),
         results->best_mirrored_snr, results->expected_at_threshold);
}
