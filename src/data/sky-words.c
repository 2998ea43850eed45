/* sky-words.c - predicted events in words. */
#include "data/sky-words.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/error.h"
#include "sky/iso-time.h"

const char *
ant_sky_event_title (const AntSkyEvent *event)
{
  switch (event->body)
    {
    case ANT_BODY_MERCURY: return _("Mercury before the Sun");
    case ANT_BODY_VENUS: return _("Venus before the Sun");
    case ANT_BODY_MOON: return _("Moon before the Sun");
    default: return _("In the Earth's shadow");
    }
}

/* "2004-06-08T05:13:29.7Z", or rounded to the hour; "" for NaN. */
static void
utc_text (double tt_d, gboolean hour, char text[40])
{
  double jd1, jd2;
  *text = 0;
  if (!isfinite (tt_d) || ant_time_convert (ANT_SCALE_TT, ANT_J2000_JD, tt_d, ANT_SCALE_UTC, &jd1, &jd2) != ANT_OK)
    return;
  if (hour)
    {
      double whole = floor (jd1 + jd2 - 0.5) + 0.5;
      jd2 = round (((jd1 - whole) + jd2) * ANT_HOURS_PER_DAY) / ANT_HOURS_PER_DAY;
      jd1 = whole;
    }
  if (ant_time_text (ANT_SCALE_UTC, jd1, jd2, 1, 40, text) != ANT_OK)
    *text = 0;
}

char *
ant_sky_time_iso (double tt_d, gboolean hour)
{
  char text[40];
  utc_text (tt_d, hour, text);
  return *text ? g_strdup (text) : NULL;
}

char *
ant_sky_time_text (double tt_d, gboolean hour)
{
  char text[40];
  utc_text (tt_d, hour, text);
  if (!*text)
    return g_strdup ("-");
  if (hour)
    return g_strdup_printf (_("%.10s %.2s h"), text, text + 11);
  return g_strdup_printf ("%.10s %.10s", text, text + 11);
}

char *
ant_sky_clock_text (double tt_d, double day_tt_d, gboolean hour)
{
  char text[40], day[40];
  utc_text (tt_d, hour, text);
  utc_text (day_tt_d, hour, day);
  if (!*text)
    return g_strdup ("-");
  int shift = strncmp (text, day, 10);
  const char *mark = shift > 0 ? "+1" : shift < 0 ? "-1" : "";
  return hour ? g_strdup_printf (_("%.2s h%s"), text + 11, mark) : g_strdup_printf ("%.10s%s", text + 11, mark);
}

const char *
ant_shown_name (AntShown shown)
{
  static const char *const names[ANT_N_SHOWN] = { "unknown", "gap", "dark", "agrees", "absent", "faint", "differs", "unplaced" };
  return names[shown];
}

/* "depth 955 ± 60 ppm (SNR 15.9), 1007 expected" and so on. */
static char *
measured_words (const AntSighting *sighting)
{
  const AntAmplitude *measured = &sighting->measured;
  return g_strdup_printf (_("depth %.1f ± %.1f ppm, SNR %.1f, where %.1f ppm are expected (%.1f in one sample), %.0f %% observed"),
                          measured->depth_ppm, measured->sigma_ppm, measured->snr, sighting->expected_ppm,
                          sighting->expected_sample_ppm, 100 * measured->coverage);
}

char *
ant_sighting_words (const AntSighting *sighting)
{
  g_autofree char *measured = measured_words (sighting);
  double covered = isfinite (sighting->measured.coverage) ? 100 * sighting->measured.coverage : 0;
  switch (sighting->shown)
    {
    case ANT_SHOWN_GAP: return g_strdup_printf (_("not observed: gap, %.0f %% of it covered"), covered);
    case ANT_SHOWN_DARK:
      if (sighting->event.kind == ANT_SKY_SHADOW)
        return g_strdup (_("dark, as it should be"));
      return g_strdup_printf (_("set aside as dark or covered, as an eclipse would be; %.0f %% of it is left"), covered);
    case ANT_SHOWN_AGREES: return g_strdup_printf (_("agrees: %s"), measured);
    case ANT_SHOWN_ABSENT: return g_strdup_printf (_("predicted and absent: %s"), measured);
    case ANT_SHOWN_FAINT: return g_strdup_printf (_("too faint to tell: %s"), measured);
    case ANT_SHOWN_DIFFERS: return g_strdup_printf (_("differs: %s"), measured);
    case ANT_SHOWN_UNPLACED:
      if (!isfinite (sighting->measured.sigma_ppm))
        return g_strdup (_("the observer's place is not known well enough to look for it"));
      return g_strdup_printf (_("no evidence either way, the observer's place is not known: %s"), measured);
    default: return g_strdup (_("not looked at"));
    }
}

static void
add_time (GPtrArray *facts, const char *label, double tt_d, const AntSkyEvent *event)
{
  g_autofree char *text = ant_sky_time_text (tt_d, event->uncertain);
  ant_facts_add (facts, label, text);
}

static void
add_number (GPtrArray *facts, const char *label, double number, int decimals, const char *unit)
{
  g_autofree char *figures = ant_number_words (number, decimals), *text = g_strdup_printf ("%s%s", figures, unit);
  ant_facts_add (facts, label, text);
}

GPtrArray *
ant_sighting_facts (const AntSighting *sighting)
{
  const AntSkyEvent *event = &sighting->event;
  GPtrArray *facts = g_ptr_array_new_with_free_func (ant_fact_free);
  if (event->uncertain)
    ant_facts_add (facts, _("Certainty"), event->possible ? _("possible") : _("likely; times are to the hour"));
  add_time (facts, _("Contact I (UTC)"), event->contact_tt_d[ANT_CONTACT_1], event);
  add_time (facts, _("Contact II"), event->contact_tt_d[ANT_CONTACT_2], event);
  add_time (facts, _("Greatest"), event->greatest_tt_d, event);
  add_time (facts, _("Contact III"), event->contact_tt_d[ANT_CONTACT_3], event);
  add_time (facts, _("Contact IV"), event->contact_tt_d[ANT_CONTACT_4], event);
  add_number (facts, _("Least separation"), event->separation_arcsec, 1, "\"");
  add_number (facts, _("Impact"), event->impact, 4, "");
  add_number (facts, _("Radius ratio"), event->radius_ratio, 5, "");
  add_number (facts, _("Expected depth"), event->depth_ppm, 1, _(" ppm"));
  return facts;
}

const char *
ant_sky_caution (void)
{
  return _("Never look at the Sun, least of all through optics, without a certified solar filter; local rules and qualified "
           "guidance come first.");
}

gboolean
ant_sky_time_parse (const char *text, double *tt_d, GError **error)
{
  AntIsoTime iso;
  char *end;
  double jd1 = NAN, jd2 = 0, number = g_ascii_strtod (text, &end);
  if (end != text && !*end && number > 2000000 && number < 3000000)
    {
      jd1 = floor (number);
      jd2 = number - jd1;
    }
  else if (!ant_iso_read (text, text + strlen (text), &iso) || ant_iso_instant (&iso, ANT_SCALE_UTC, &jd1, &jd2) != ANT_OK)
    jd1 = NAN;
  if (!isfinite (jd1) || ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_TT, &jd1, &jd2) != ANT_OK)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("“%s” is no time, expected 2041-03-14T07:12:05Z or a JD"), text);
      return FALSE;
    }
  *tt_d = (jd1 - ANT_J2000_JD) + jd2;
  return TRUE;
}

gboolean
ant_sky_span_check (const AntObserverChoice *choice, double from_tt_d, double to_tt_d, GError **error)
{
  double first, last;
  ant_observer_span (&choice->observer, &first, &last);
  if (from_tt_d > to_tt_d)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("the span ends before it begins"));
      return FALSE;
    }
  if (from_tt_d >= first && to_tt_d <= last)
    return TRUE;
  g_autofree char *asked_from = ant_sky_time_text (from_tt_d, FALSE), *asked_to = ant_sky_time_text (to_tt_d, FALSE);
  if (from_tt_d < ANT_SKY_FIRST_TT_D || to_tt_d > ANT_SKY_LAST_TT_D)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                   _("found %s to %s, expected times from 1600 to 2400: beyond, the theories of the planets are not good to the second"),
                   asked_from, asked_to);
      return FALSE;
    }
  g_autofree char *known_from = ant_sky_time_text (first, FALSE), *known_to = ant_sky_time_text (last, FALSE);
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: found %s to %s asked, expected times within its positions: %s to %s UTC"),
               choice->text, asked_from, asked_to, known_from, known_to);
  return FALSE;
}
