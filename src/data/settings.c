/* settings.c - the table of settings, and the ways in and out of it. */
#include "data/settings.h"

#include <gio/gio.h>
#include <glib/gi18n.h>
#include <math.h>

#include "data/error.h"
#include "data/near-word.h"
#include "sky/places.h"

static const char *const stamp_words[] = { [ANT_AT_UNKNOWN] = "unknown", [ANT_AT_START] = "start",
                                           [ANT_AT_MIDDLE] = "middle", [ANT_AT_END] = "end", NULL };

static const char *const paper_words[] = { "A4", "letter", NULL };
static const char *const radii_words[] = { [ANT_RADII_ALMANAC] = "almanac", [ANT_RADII_IAU] = "iau", NULL };
static const char *const target_words[] = { [ANT_TARGET_SUN] = "sun", [ANT_TARGET_STAR] = "star", NULL };

static const char *const distance_words[] = { [ANT_DISTANCE_AS_IS] = "as-is", [ANT_DISTANCE_TO_ONE_AU] = "to-1au",
                                              [ANT_DISTANCE_TO_OBSERVER] = "to-observer", NULL };
static const char *const doppler_words[] = { "yes", "no", NULL };

static const char *const yes_words[] = { "no", "yes", NULL };
static const char *const repeat_duration_words[] = { "physical", "any", NULL };
static const char *const repeat_noise_words[] = { "fitted", "white", NULL };

#define AT(field) G_STRUCT_OFFSET (AntSettings, field)
#define REAL ANT_SETTING_REAL
#define WHOLE ANT_SETTING_WHOLE
#define WORD ANT_SETTING_WORD

const AntSetting ant_setting_table[] = {
  { "exposure", "s", REAL, 0, 0, 864000, 86400, AT (grid.exposure_d), NULL, N_("Record"),
    N_("Time over which one sample averages; 0 = unknown, and the cadence is used") },
  { "stamp", "", WORD, ANT_AT_UNKNOWN, ANT_AT_UNKNOWN, ANT_AT_END, 1, AT (stamp), stamp_words, N_("Record"),
    N_("Part of the exposure that a time stamp marks; unknown counts as the middle") },
  { "cadence", "s", REAL, 0, 0, 8640000, 86400, AT (grid.cadence_d), NULL, N_("Record"),
    N_("Time from sample to sample; 0 = found from the time stamps") },
  { "dark-fraction", "%", REAL, 1, 0.01, 100, 100, AT (grid.dark_fraction), NULL, N_("Record"),
    N_("Samples farther than this from the running 5-day median are set aside as dark or covered") },
  { "distance", "", WORD, ANT_DISTANCE_AS_IS, ANT_DISTANCE_AS_IS, ANT_DISTANCE_TO_OBSERVER, 1, AT (grid.distance), distance_words, N_("Record"),
    N_("Bring irradiances to 1 au or to the observer's distance from the Sun, or leave them as the file has them") },
  { "doppler", "", WORD, 0, 0, 1, 1, AT (grid.no_doppler), doppler_words, N_("Record"),
    N_("Take the Doppler shift by the observer's motion along with the distance") },

  { "chunk-length", "d", REAL, 0, 0, 36525, 1, AT (chunk_d), NULL, N_("Noise"),
    N_("Length of the pieces that get a noise model each; 0 = 90 d below a 10-min cadence, else 180 d") },
  { "chunk-overlap", "d", REAL, 20, 1, 365, 1, AT (chunk_overlap_d), NULL, N_("Noise"),
    N_("Length that neighbouring pieces share") },
  { "line-period", "h", REAL, 0, 0, 8766, 1, AT (line_period_h), NULL, N_("Noise"),
    N_("Period of a swing locked to an orbit or another clock, modelled as narrow lines; 0 = none") },
  { "line-harmonics", "", WHOLE, 4, 1, 8, 1, AT (line_harmonics), NULL, N_("Noise"),
    N_("Number of lines: the period itself and its harmonics") },

  { "duration-min", "h", REAL, 0.5, 0.1, 96, 1, AT (bank.duration_min_h), NULL, N_("Search"),
    N_("Shortest dip looked for, from contact I to IV") },
  { "duration-max", "h", REAL, 13, 0.1, 96, 1, AT (bank.duration_max_h), NULL, N_("Search"),
    N_("Longest dip looked for; above 13 h spots on the Sun look like dips") },
  { "duration-step", "h", REAL, 0.5, 0.05, 24, 1, AT (bank.duration_step_h), NULL, N_("Search"),
    N_("Step from one duration to the next") },
  { "edge", "min", REAL, 20, 1, 720, 60, AT (bank.edge_h), NULL, N_("Search"),
    N_("Length of ingress and egress of the shapes looked for") },
  { "sharp-edge", "min", REAL, 5, 0, 720, 60, AT (bank.sharp_edge_h), NULL, N_("Search"),
    N_("The same for the additional sharp shapes; 0 leaves them out") },
  { "limb-darkening-1", "", REAL, 0.40, -1, 2, 1, AT (bank.limb_darkening.u1), NULL, N_("Search"),
    N_("Linear coefficient of the quadratic limb darkening law") },
  { "limb-darkening-2", "", REAL, 0.19, -1, 1, 1, AT (bank.limb_darkening.u2), NULL, N_("Search"),
    N_("Quadratic coefficient of the quadratic limb darkening law") },

  { "false-alarms-per-year", "", REAL, 0.1, 1e-6, 1000, 1, AT (false_alarms_per_year), NULL, N_("False alarms"),
    N_("Noise-only dips accepted per year of observed time; sets the threshold") },
  { "threshold", "", REAL, 0, 0, 1000, 1, AT (threshold_snr), NULL, N_("False alarms"),
    N_("Least dip SNR listed; 0 = from false-alarms-per-year") },
  { "surrogates", "", WHOLE, 0, 0, 10000, 1, AT (surrogates), NULL, N_("False alarms"),
    N_("Noise-only records drawn from the fitted noise and searched, to refit the false-alarm law; each takes as long as a scan; 0 = the built-in law") },

  { "radii", "", WORD, ANT_RADII_ALMANAC, ANT_RADII_ALMANAC, ANT_RADII_IAU, 1, AT (radii), radii_words, N_("Sky"),
    N_("Radii of the Sun and of what crosses it: almanac (959.63″ and such, which published contact times assume) or iau (km, for depths)") },

  { "target", "", WORD, ANT_TARGET_SUN, ANT_TARGET_SUN, ANT_TARGET_STAR, 1, AT (target), target_words, N_("Verdicts"),
    N_("What shines: on the Sun a planet needs a predicted crossing, of a star every crossing shape is one") },
  { "rate-planet", "1/yr", REAL, 1, 1e-6, 10000, 1, AT (rates.per_year[ANT_CAUSE_PLANET]), NULL, N_("Verdicts"),
    N_("Crossings a year, of all depths, before the record is looked at; on the Sun of those not predicted, for the probability of the shape") },
  { "rate-planet-shaped", "1/yr", REAL, 0.2, 1e-6, 10000, 1, AT (rates.per_year[ANT_CAUSE_PLANET_SHAPED]), NULL, N_("Verdicts"),
    N_("Dips shaped like crossings with no body known a year (target sun)") },
  { "rate-spot", "1/yr", REAL, 1, 1e-6, 10000, 1, AT (rates.per_year[ANT_CAUSE_SPOT]), NULL, N_("Verdicts"),
    N_("Spots a year whose passage makes a dip as short as those looked for") },
  { "rate-eclipse", "1/yr", REAL, 0.5, 1e-6, 10000, 1, AT (rates.per_year[ANT_CAUSE_ECLIPSE]), NULL, N_("Verdicts"),
    N_("Eclipses a year that no almanac tells of") },
  { "rate-flare", "1/yr", REAL, 10, 1e-6, 10000, 1, AT (rates.per_year[ANT_CAUSE_FLARE]), NULL, N_("Verdicts"),
    N_("Flares a year (brightenings)") },
  { "rate-instrument", "1/yr", REAL, 12, 1e-6, 10000, 1, AT (rates.per_year[ANT_CAUSE_INSTRUMENT]), NULL, N_("Verdicts"),
    N_("Faults of the instrument a year: steps, recoveries, gradual falls, spikes") },

  { "repeats", "", WORD, 1, 0, 1, 1, AT (repeats), yes_words, N_("Repeats"),
    N_("Look for dips that recur, at every period") },
  { "repeat-period-min", "d", REAL, 0.5, 0.01, 36525, 1, AT (repeat_period_min_d), NULL, N_("Repeats"),
    N_("Shortest period looked for") },
  { "repeat-period-max", "d", REAL, 0, 0, 36525, 1, AT (repeat_period_max_d), NULL, N_("Repeats"),
    N_("Longest period looked for; 0 = as long as the record has room for the events asked") },
  { "repeat-durations", "", WORD, 0, 0, 1, 1, AT (repeat_durations), repeat_duration_words, N_("Repeats"),
    N_("Lengths of dips that recur: physical = about the time in which a body with that period crosses a Sun, any = duration-min to duration-max") },
  { "repeat-shortest", "", REAL, 0.2, 0.01, 10, 1, AT (repeat_shortest), NULL, N_("Repeats"),
    N_("Shortest of the physical lengths, in times of a central crossing, 13 h (period / 1 yr)^(1/3)") },
  { "repeat-longest", "", REAL, 2, 0.02, 20, 1, AT (repeat_longest), NULL, N_("Repeats"),
    N_("Longest of the physical lengths, likewise") },
  { "repeat-events", "", WHOLE, 3, 2, 1000, 1, AT (repeat_events), NULL, N_("Repeats"),
    N_("Fewest observed events of a repeat; two are marked, since nothing tells their period from a fraction of it") },
  { "repeat-noise", "", WORD, 0, 0, 1, 1, AT (repeat_noise), repeat_noise_words, N_("Repeats"),
    N_("Noise in the search for repeats: fitted = that of the record, white = a plain box search, for records without slow variation") },
  { "repeat-false-alarms-per-record", "", REAL, 0.01, 1e-9, 100, 1, AT (repeat_false_alarms), NULL, N_("Repeats"),
    N_("Noise-only repeats accepted per record; sets their threshold") },

  { "rotation-window", "d", REAL, 27.275232, 2, 365.25, 1, AT (rotation_window_d), NULL, N_("Display"),
    N_("Period and window of the rotation curve that is drawn") },
  { "rotation-harmonics", "", WHOLE, 4, 1, 12, 1, AT (rotation_harmonics), NULL, N_("Display"),
    N_("Harmonics of that period in the rotation curve") },

  { "witness-drift", "d", REAL, 0, 0, 36525, 1, AT (witness_drift_d), NULL, N_("Witness"),
    N_("Length of the running median that is taken out of ratio and difference to a witness; 0 = nothing is") },

  { "seed", "", WHOLE, 1, 0, 4294967295.0, 1, AT (seed), NULL, N_("Run"),
    N_("Start of the random numbers of surrogates; same seed, same numbers") },
  { "threads", "", WHOLE, 0, 0, 1024, 1, AT (threads), NULL, N_("Run"),
    N_("Threads to work with; 0 = as many as processors; results do not depend on it") },
  { "paper", "", WORD, 0, 0, 1, 1, AT (paper), paper_words, N_("Run"), N_("Paper of the report") },
};
const gsize ant_n_settings = G_N_ELEMENTS (ant_setting_table);

static double *
place_of (const AntSetting *setting, AntSettings *settings)
{
  return G_STRUCT_MEMBER_P (settings, setting->offset);
}

void
ant_settings_init (AntSettings *settings)
{
  *settings = (AntSettings) { .grid = ANT_GRID_OPTIONS_INIT, .bank = ANT_BANK_OPTIONS_INIT };
  for (gsize i = 0; i < ant_n_settings; i++)
    *place_of (&ant_setting_table[i], settings) = ant_setting_table[i].fallback / ant_setting_table[i].divisor;
}

AntGridOptions
ant_settings_grid (const AntSettings *settings)
{
  AntGridOptions grid = settings->grid;
  grid.stamp = (AntStampPlace) settings->stamp;
  return grid;
}

gboolean
ant_setting_matters (const AntSetting *setting)
{
  return !g_str_equal (setting->key, "threads") && !g_str_equal (setting->key, "paper")
         && !g_str_equal (setting->key, "witness-drift");
}

const AntSetting *
ant_setting_find (const char *key)
{
  for (gsize i = 0; i < ant_n_settings; i++)
    if (g_str_equal (ant_setting_table[i].key, key))
      return &ant_setting_table[i];
  return NULL;
}

const AntSetting *
ant_setting_require (const char *key, GError **error)
{
  const AntSetting *setting = ant_setting_find (key);
  if (setting)
    return setting;
  const char *keys[G_N_ELEMENTS (ant_setting_table) + 1] = { NULL };
  for (gsize i = 0; i < ant_n_settings; i++)
    keys[i] = ant_setting_table[i].key;
  const char *near = ant_near_word (key, keys);
  if (near)
    g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("there is no setting “%s”; the nearest is “%s”"), key, near);
  else
    g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                 _("there is no setting “%s”; “antumbra-cli settings” lists them"), key);
  return NULL;
}

double
ant_setting_get (const AntSetting *setting, const AntSettings *settings)
{
  const double *place = (const double *) ((const char *) settings + setting->offset);
  return *place * setting->divisor;
}

char *
ant_setting_format (const AntSetting *setting, double value)
{
  if (setting->kind == ANT_SETTING_WORD)
    return g_strdup (setting->words[(gsize) value]);
  char text[G_ASCII_DTOSTR_BUF_SIZE];
  /* Twelve digits hide the last-digit noise of the change of unit. */
  return g_strdup (g_ascii_formatd (text, sizeof text, "%.12g", value));
}

char *
ant_setting_range (const AntSetting *setting)
{
  if (setting->kind != ANT_SETTING_WORD)
    {
      g_autofree char *low = ant_setting_format (setting, setting->minimum);
      g_autofree char *high = ant_setting_format (setting, setting->maximum);
      return g_strdup_printf (_("%s to %s%s%s"), low, high, *setting->unit ? " " : "", setting->unit);
    }
  GString *words = g_string_new (setting->words[0]);
  for (gsize i = 1; setting->words[i]; i++)
    g_string_append_printf (words, ", %s", setting->words[i]);
  return g_string_free (words, FALSE);
}

static gboolean
parse_value (const AntSetting *setting, const char *text, double *value)
{
  if (setting->kind == ANT_SETTING_WORD)
    {
      for (gsize i = 0; setting->words[i]; i++)
        if (g_str_equal (setting->words[i], text))
          return *value = (double) i, TRUE;
      return FALSE;
    }
  char *end = NULL;
  *value = g_ascii_strtod (text, &end);
  if (end == text || *end != '\0')
    return FALSE;
  if (setting->kind == ANT_SETTING_WHOLE && *value != floor (*value))
    return FALSE;
  return *value >= setting->minimum && *value <= setting->maximum; /* also refuses NaN */
}

gboolean
ant_setting_set_text (const AntSetting *setting, AntSettings *settings, const char *text, GError **error)
{
  g_autofree char *trimmed = g_strstrip (g_strdup (text));
  double value;
  if (parse_value (setting, trimmed, &value))
    {
      *place_of (setting, settings) = value / setting->divisor;
      return TRUE;
    }
  const char *kind = setting->kind == ANT_SETTING_WORD    ? _("one of")
                     : setting->kind == ANT_SETTING_WHOLE ? _("a whole number from")
                                                          : _("a number from");
  g_autofree char *range = ant_setting_range (setting);
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("setting “%s”: found “%s”, expected %s %s"), setting->key, trimmed,
               kind, range);
  return FALSE;
}

gboolean
ant_settings_assign (AntSettings *settings, const char *assignment, GError **error)
{
  const char *equals = strchr (assignment, '=');
  if (!equals)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("found “%s”, expected key=value"), assignment);
      return FALSE;
    }
  g_autofree char *key = g_strstrip (g_strndup (assignment, equals - assignment));
  const AntSetting *setting = ant_setting_require (key, error);
  return setting && ant_setting_set_text (setting, settings, equals + 1, error);
}

static gboolean
assign_all (AntSettings *settings, GKeyFile *file, GError **error)
{
  g_auto (GStrv) keys = g_key_file_get_keys (file, "settings", NULL, error);
  if (!keys)
    return FALSE;
  for (char **key = keys; *key; key++)
    {
      const AntSetting *setting = ant_setting_require (*key, error);
      g_autofree char *text = setting ? g_key_file_get_string (file, "settings", *key, error) : NULL;
      if (!text || !ant_setting_set_text (setting, settings, text, error))
        return FALSE;
    }
  return TRUE;
}

gboolean
ant_settings_load (AntSettings *settings, const char *path, GError **error)
{
  g_autoptr (GKeyFile) file = g_key_file_new ();
  AntSettings changed = *settings;
  GError *cause = NULL;
  if (g_key_file_load_from_file (file, path, G_KEY_FILE_NONE, &cause) && assign_all (&changed, file, &cause))
    {
      *settings = changed;
      return TRUE;
    }
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, "%s: %s", path, cause->message);
  g_error_free (cause);
  return FALSE;
}

char *
ant_settings_to_key_file (const AntSettings *settings)
{
  GString *text = g_string_new ("[settings]\n");
  for (gsize i = 0; i < ant_n_settings; i++)
    {
      const AntSetting *setting = &ant_setting_table[i];
      g_autofree char *value = ant_setting_format (setting, ant_setting_get (setting, settings));
      g_autofree char *range = ant_setting_range (setting);
      g_string_append_printf (text, "\n# %s (%s%s%s)\n%s=%s\n", _ (setting->help), range, *setting->unit ? " " : "",
                              setting->unit, setting->key, value);
    }
  return g_string_free (text, FALSE);
}
