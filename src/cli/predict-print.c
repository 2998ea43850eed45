/* predict-print.c - the list of predicted events. */
#include "cli/predict-print.h"

#include <glib/gi18n.h>
#include <math.h>

#include "cli/json-values.h"
#include "data/sky-words.h"

#define UTC_KNOWN_FROM_TT_D (-10227.5)  /* 1972-01-01: leap seconds */
#define UTC_KNOWN_TO_TT_D 9861.5        /* 2027-01-01: later ones are not announced yet */

static void
print_event (const AntSighting *sighting, gboolean measured)
{
  const AntSkyEvent *event = &sighting->event;
  g_autofree char *greatest = ant_sky_time_text (event->greatest_tt_d, event->uncertain);
  char *contact[ANT_N_CONTACTS];
  for (int i = 0; i < ANT_N_CONTACTS; i++)
    contact[i] = ant_sky_clock_text (event->contact_tt_d[i], event->greatest_tt_d, event->uncertain);
  g_print ("%-8s %-9s %-21s %-12s %-12s %-12s %-12s %8.1f %7.4f %8.5f %10.1f%s\n", ant_body_name (event->body),
           ant_sky_kind_name (event->kind), greatest, contact[0], contact[1], contact[2], contact[3], event->separation_arcsec,
           event->impact, event->radius_ratio, event->depth_ppm, event->possible ? _("  possible") : "");
  for (int i = 0; i < ANT_N_CONTACTS; i++)
    g_free (contact[i]);
  if (!measured)
    return;
  g_autofree char *words = ant_sighting_words (sighting);
  g_print ("         %s\n", words);
}

void
ant_predict_print (const GArray *sightings, const AntObserverChoice *choice, const AntSettings *settings, double from_tt_d,
                   double to_tt_d, gboolean measured)
{
  g_autofree char *who = ant_observer_choice_words (choice);
  g_autofree char *from = ant_sky_time_text (from_tt_d, FALSE), *to = ant_sky_time_text (to_tt_d, FALSE);
  g_autofree char *radii = ant_setting_format (ant_setting_find ("radii"), settings->radii);
  g_print (g_dngettext (NULL, "%u event before the Sun for %s, %s to %s UTC, radii: %s.\n",
                        "%u events before the Sun for %s, %s to %s UTC, radii: %s.\n", sightings->len),
           sightings->len, who, from, to, radii);
  if (sightings->len > 0)
    g_print ("%-8s %-9s %-21s %-12s %-12s %-12s %-12s %8s %7s %8s %10s\n", _("body"), _("kind"), _("greatest (UTC)"), "I", "II",
             "III", "IV", _("sep \""), _("impact"), _("ratio"), _("depth ppm"));
  for (guint i = 0; i < sightings->len; i++)
    print_event (&g_array_index (sightings, AntSighting, i), measured);
  if (choice->observer.kind == ANT_OBSERVER_L1)
    g_print (_("Orbits about L1 stand up to 700 000 km off the line to the Sun: times are to the hour, and no event is evidence.\n"));
  if (from_tt_d < UTC_KNOWN_FROM_TT_D || to_tt_d > UTC_KNOWN_TO_TT_D)
    g_print (_("UTC before 1972 and in years to come is counted from TT with the leap seconds known.\n"));
  g_print ("%s\n", ant_sky_caution ());
}

static void
add_times (JsonBuilder *json, const AntSkyEvent *event)
{
  static const char *const names[ANT_N_CONTACTS] = { "contact1_utc", "contact2_utc", "contact3_utc", "contact4_utc" };
  for (int i = 0; i < ANT_N_CONTACTS; i++)
    {
      g_autofree char *text = ant_sky_time_iso (event->contact_tt_d[i], event->uncertain);
      ant_json_text (json, names[i], text);
    }
  g_autofree char *greatest = ant_sky_time_iso (event->greatest_tt_d, event->uncertain);
  ant_json_text (json, "greatest_utc", greatest);
}

static void
add_shown (JsonBuilder *json, const AntSighting *sighting)
{
  json_builder_begin_object (json_builder_set_member_name (json, "record"));
  ant_json_text (json, "shows", ant_shown_name (sighting->shown));
  ant_json_number (json, "depth_ppm", sighting->measured.depth_ppm);
  ant_json_number (json, "depth_sigma_ppm", sighting->measured.sigma_ppm);
  ant_json_number (json, "snr", sighting->measured.snr);
  ant_json_number (json, "expected_depth_ppm", sighting->expected_ppm);
  ant_json_number (json, "expected_sample_ppm", sighting->expected_sample_ppm);
  ant_json_number (json, "covered_fraction", sighting->measured.coverage);
  json_builder_end_object (json);
}

void
ant_predict_print_json (const GArray *sightings, gboolean measured)
{
  g_autoptr (JsonBuilder) json = json_builder_new ();
  json_builder_begin_object (json);
  json_builder_begin_array (json_builder_set_member_name (json, "events"));
  for (guint i = 0; i < sightings->len; i++)
    {
      const AntSighting *sighting = &g_array_index (sightings, AntSighting, i);
      const AntSkyEvent *event = &sighting->event;
      json_builder_begin_object (json);
      ant_json_text (json, "body", ant_body_name (event->body));
      ant_json_text (json, "kind", ant_sky_kind_name (event->kind));
      ant_json_text (json, "certainty", event->possible ? "possible" : event->uncertain ? "likely" : "certain");
      add_times (json, event);
      ant_json_number (json, "separation_arcsec", event->separation_arcsec);
      ant_json_number (json, "impact", event->impact);
      ant_json_number (json, "radius_ratio", event->radius_ratio);
      ant_json_number (json, "depth_ppm", event->depth_ppm);
      if (measured)
        add_shown (json, sighting);
      json_builder_end_object (json);
    }
  json_builder_end_array (json);
  json_builder_end_object (json);
  ant_json_print (json);
}
