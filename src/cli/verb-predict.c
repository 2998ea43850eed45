/* verb-predict.c - `antumbra-cli predict`: what crosses the Sun for an observer, and what a record shows of it. */
#include <gio/gio.h>
#include <glib/gi18n.h>
#include <math.h>

#include "cli/exit-code.h"
#include "cli/predict-print.h"
#include "cli/record-options.h"
#include "cli/settings-options.h"
#include "cli/verbs.h"
#include "data/sky-words.h"
#include "jobs/sky-job.h"
#include "jobs/stop.h"
#include "readers/observer-reader.h"

typedef struct
{
  char *from, *to, *observer, *record;
  gboolean json;
  AntRecordOptions reading;
  AntSettingsOptions given;
} Options;

static void
options_clear (Options *options)
{
  g_free (options->from);
  g_free (options->to);
  g_free (options->observer);
  g_free (options->record);
  ant_record_options_clear (&options->reading);
  ant_settings_options_clear (&options->given);
}

static AntRecord *
load (const Options *options, const AntSettings *settings, GCancellable *stop, GError **error)
{
  g_autoptr (AntRecord) record = ant_record_options_read (&options->reading, options->record, stop, error);
  if (!record)
    return NULL;
  AntGridOptions grid = ant_settings_grid (settings);
  gboolean good = ant_record_options_good (&options->reading, &grid, error) && ant_record_make_grid (record, &grid, error);
  g_clear_pointer (&grid.good_values, g_array_unref);
  return good ? g_steal_pointer (&record) : NULL;
}

/* The asked span; where an end is not given, the record's. */
static gboolean
span_of (const Options *options, const AntRecord *record, double *from_tt_d, double *to_tt_d, GError **error)
{
  double origin = record ? ant_time_reference_tt_origin (&record->time) : NAN;
  if (record)
    {
      *from_tt_d = origin + record->series.start_d;
      *to_tt_d = origin + ant_series_time (&record->series, (double) record->series.n - 1);
    }
  return (!options->from || ant_sky_time_parse (options->from, from_tt_d, error))
         && (!options->to || ant_sky_time_parse (options->to, to_tt_d, error));
}

/* Without a record, events with nothing measured. */
static GArray *
sightings_of (const GArray *events)
{
  GArray *sightings = g_array_sized_new (FALSE, FALSE, sizeof (AntSighting), events->len);
  for (guint i = 0; i < events->len; i++)
    {
      AntSighting sighting = ant_sighting_new (&g_array_index (events, AntSkyEvent, i), 0);
      g_array_append_val (sightings, sighting);
    }
  return sightings;
}

/* Those of the record's span that also overlap the asked one, measured. */
static GArray *
look_into (const AntRecord *record, const AntObserverChoice *choice, const AntSettings *settings, double from_tt_d,
           double to_tt_d, GCancellable *stop, GError **error)
{
  g_autoptr (GArray) sightings = ant_sky_job_sightings (record, choice, settings, stop, error);
  if (!sightings)
    return NULL;
  for (guint i = 0; i < sightings->len;)
    {
      AntSighting *sighting = &g_array_index (sightings, AntSighting, i);
      if (sighting->event.end_tt_d < from_tt_d || sighting->event.start_tt_d > to_tt_d)
        g_array_remove_index (sightings, i);
      else if (g_cancellable_set_error_if_cancelled (stop, error)
               || !ant_sky_job_measure (record, choice, settings, sighting, error))
        return NULL;
      else
        i++;
    }
  return g_steal_pointer (&sightings);
}

static int
run (const Options *options)
{
  g_autoptr (GError) error = NULL;
  g_autoptr (AntRecord) record = NULL;
  g_autoptr (GArray) sightings = NULL, events = NULL;
  AntSettings settings;
  double from_tt_d = NAN, to_tt_d = NAN;
  GCancellable *stop = ant_stop_on_signals ();
  if (!ant_settings_options_apply (&options->given, &settings, &error))
    return ant_cli_fail (error);
  g_autoptr (AntObserverChoice) choice = ant_observer_open (options->observer ? options->observer : "earth", &error);
  if (!choice || (options->record && !(record = load (options, &settings, stop, &error)))
      || !span_of (options, record, &from_tt_d, &to_tt_d, &error))
    return ant_cli_fail (error);
  if (record)
    sightings = look_into (record, choice, &settings, from_tt_d, to_tt_d, stop, &error);
  else if ((events = ant_sky_job_predict (choice, &settings, from_tt_d, to_tt_d, stop, &error)))
    sightings = sightings_of (events);
  if (!sightings)
    return ant_cli_fail (error);
  if (options->json)
    ant_predict_print_json (sightings, record != NULL);
  else
    ant_predict_print (sightings, choice, &settings, from_tt_d, to_tt_d, record != NULL);
  return ANT_EXIT_DONE;
}

int
ant_verb_predict (int argc, char **argv)
{
  Options options = { 0 };
  const GOptionEntry entries[] = {
    { "from", 0, 0, G_OPTION_ARG_STRING, &options.from, N_("from this time: ISO 8601 in UTC, or a JD; of a record its start"), N_("TIME") },
    { "to", 0, 0, G_OPTION_ARG_STRING, &options.to, N_("up to this time; of a record its end"), N_("TIME") },
    { "observer", 0, 0, G_OPTION_ARG_FILENAME, &options.observer,
      N_("who watches: the Earth's centre, somebody near L1, a site, or a table of positions (time, x, y, z in km)"),
      N_("earth|l1|site:LON,LAT,HEIGHT_M|FILE") },
    { "record", 0, 0, G_OPTION_ARG_FILENAME, &options.record, N_("tell what this record shows at each event"), N_("FILE") },
    { "json", 0, 0, G_OPTION_ARG_NONE, &options.json, N_("print JSON"), NULL },
    { NULL }
  };
  g_autoptr (GOptionContext) context = g_option_context_new (NULL);
  g_option_context_set_summary (context, _("Predicts crossings of Mercury and Venus and eclipses for an observer."));
  g_option_context_add_main_entries (context, entries, NULL);
  ant_record_options_add (context, &options.reading);
  ant_settings_options_add (context, &options.given);

  g_autoptr (GError) error = NULL;
  int code;
  if (!g_option_context_parse (context, &argc, &argv, &error))
    code = ant_cli_fail (error);
  else if (argc != 1)
    code = ant_cli_fail_usage (_("predict: found “%s”, expected options only"), argv[1]);
  else if (!options.record && !(options.from && options.to))
    code = ant_cli_fail_usage (_("predict: found no span, expected --from and --to, or --record"));
  else
    code = run (&options);
  options_clear (&options);
  return code;
}
