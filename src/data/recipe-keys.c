/* recipe-keys.c - the table of recipe-keys.h. */
#include "data/recipe-keys.h"

#include <math.h>
#include <string.h>

static const char *const stamp_words[] = { "start", "middle", "end", NULL };
static const char *const mask_words[] = { "none", "l1", "low-orbit", NULL };
static const char *const preset_words[] = { "none", "a", "b", "c", "sun", "quiet-sun", "active-sun", NULL };

#define NUMBER(name_, fallback_, min_, max_, help_) \
  { .name = name_, .kind = ANT_KEY_NUMBER, .fallback = fallback_, .minimum = min_, .maximum = max_, .help = help_ }
#define WHOLE(name_, fallback_, min_, max_, help_) \
  { .name = name_, .kind = ANT_KEY_WHOLE, .fallback = fallback_, .minimum = min_, .maximum = max_, .help = help_ }
#define NEEDED(name_, min_, max_, help_)                                                                               \
  {                                                                                                                    \
    .name = name_, .kind = ANT_KEY_NUMBER, .fallback = NAN, .required = TRUE, .minimum = min_, .maximum = max_,        \
    .help = help_                                                                                                      \
  }
#define TIME(name_, required_, help_) \
  { .name = name_, .kind = ANT_KEY_TIME, .fallback = NAN, .required = required_, .help = help_ }
#define SWITCH(name_, help_) { .name = name_, .kind = ANT_KEY_SWITCH, .fallback = 0, .help = help_ }
#define WORD(name_, fallback_, words_, help_) \
  { .name = name_, .kind = ANT_KEY_WORD, .fallback = fallback_, .words = words_, .help = help_ }

static const AntRecipeKey record_keys[] = {
  [ANT_RECORD_NAME] = { .name = "name", .kind = ANT_KEY_TEXT, .fallback = NAN, .help = "what the record calls itself" },
  [ANT_RECORD_START] = TIME ("start", TRUE, "start of the first exposure"),
  [ANT_RECORD_DAYS] = NEEDED ("days", 1e-3, 36525, "length of the record"),
  [ANT_RECORD_CADENCE] = NUMBER ("cadence_s", 60, 1e-3, 8640000, "from one exposure to the next"),
  [ANT_RECORD_EXPOSURE] = NUMBER ("exposure_s", NAN, 0, 8640000,
                                  "time each sample averages over, 0 for none; the cadence if not given"),
  [ANT_RECORD_STAMP] = WORD ("stamp", 1, stamp_words, "what the time stamps mark of an exposure"),
  [ANT_RECORD_LEVEL] = NUMBER ("level_w_m2", 1361, 1e-9, 1e12, "irradiance of the undisturbed Sun"),
  [ANT_RECORD_UNCERTAINTY] = NUMBER ("uncertainty_ppm", 0, 0, 1e6,
                                     "stated 1-sigma error of a sample; 0 leaves the column out"),
  [ANT_RECORD_DECIMALS] = WHOLE ("decimals", 5, 0, 9, "digits after the point of the irradiance"),
  [ANT_RECORD_U1] = NUMBER ("limb_darkening_u1", 0.40, -1, 2, "linear term of the limb darkening"),
  [ANT_RECORD_U2] = NUMBER ("limb_darkening_u2", 0.19, -1, 2, "quadratic term of the limb darkening"),
  [ANT_RECORD_SEED] = WHOLE ("seed", 1, 0, 9007199254740992.0, "start of all random numbers"),
};

static const AntRecipeKey gaps_keys[] = {
  [ANT_GAPS_MASK] = WORD ("mask", 0, mask_words, "a ready way of looking at the Sun; the keys below change it"),
  [ANT_GAPS_ORBIT_PERIOD] = NUMBER ("orbit_period_min", NAN, 1, 1e5, "length of a revolution"),
  [ANT_GAPS_ORBIT_GAP] = NUMBER ("orbit_gap_min", NAN, 0, 1e5, "unobserved part of each revolution"),
  [ANT_GAPS_ORBIT_OFFSET] =
      NUMBER ("orbit_offset_min", NAN, 0, 1e5, "start of the first such gap after the record's start"),
  [ANT_GAPS_DAILY_MIN] = NUMBER ("daily_min_h", NAN, 0, 24, "shortest of the gaps that come once a day"),
  [ANT_GAPS_DAILY_MAX] = NUMBER ("daily_max_h", NAN, 0, 24, "longest of them; 0 for none"),
  [ANT_GAPS_SHORT_RATE] = NUMBER ("short_per_30d", NAN, 0, 1e5, "number of short gaps in 30 days"),
  [ANT_GAPS_SHORT_MIN] = NUMBER ("short_min_min", NAN, 0, 1e5, "shortest of the short gaps"),
  [ANT_GAPS_SHORT_MAX] = NUMBER ("short_max_min", NAN, 0, 1e5, "longest of the short gaps"),
  [ANT_GAPS_LONG_RATE] = NUMBER ("long_per_30d", NAN, 0, 1e3, "number of long gaps in 30 days"),
  [ANT_GAPS_LONG_MIN] = NUMBER ("long_min_d", NAN, 0, 1e4, "shortest of the long gaps"),
  [ANT_GAPS_LONG_MAX] = NUMBER ("long_max_d", NAN, 0, 1e4, "longest of the long gaps"),
  [ANT_GAPS_DROPPED] = NUMBER ("dropped_percent", NAN, 0, 100, "share of single samples lost at random"),
};

static const AntRecipeKey gap_keys[] = {
  [ANT_GAP_START] = TIME ("start", TRUE, "when it begins"),
  [ANT_GAP_END] = TIME ("end", TRUE, "when it ends"),
};

static const AntRecipeKey noise_keys[] = {
  [ANT_NOISE_PRESET] =
      WORD ("preset", 0, preset_words, "a ready sum of processes; oscillators and exponentials add to it"),
  [ANT_NOISE_WHITE] =
      NUMBER ("white_ppm", NAN, 0, 1e9, "independent error of each sample; that of the preset if not given"),
};

static const AntRecipeKey oscillator_keys[] = {
  [ANT_OSCILLATOR_RMS] = NEEDED ("rms_ppm", 0, 1e9, "scatter it gives to instantaneous samples"),
  [ANT_OSCILLATOR_PERIOD] = NEEDED ("period_s", 1e-3, 1e10, "undamped period"),
  [ANT_OSCILLATOR_QUALITY] = NUMBER ("quality", 0.7071067811865476, 0.01, 1e6,
                                     "0.7071 gives a spectrum flat to 1/period, then falling as its fourth power"),
};

static const AntRecipeKey exponential_keys[] = {
  [ANT_EXPONENTIAL_RMS] = NEEDED ("rms_ppm", 0, 1e9, "scatter it gives to instantaneous samples"),
  [ANT_EXPONENTIAL_TIME] = NEEDED ("time_s", 1e-3, 1e10, "time in which the correlation falls to 1/e"),
};

static const AntRecipeKey spots_keys[] = {
  [ANT_SPOTS_RATE] =
      NUMBER ("groups_per_30d", 0, 0, 1000, "number of groups drawn at random in 30 days, over the whole Sun"),
  [ANT_SPOTS_AREA_MEDIAN] =
      NUMBER ("area_median_millionths", 150, 0, 1e6, "median of their greatest areas, of the hemisphere"),
  [ANT_SPOTS_AREA_SPREAD] = NUMBER ("area_spread_ln", 0.8, 0, 5, "scatter of the logarithm of the areas"),
  [ANT_SPOTS_AREA_MAX] = NUMBER ("area_max_millionths", 3000, 0, 1e6, "no group is larger"),
  [ANT_SPOTS_LATITUDE] = NUMBER ("latitude_deg", 15, 0, 60, "usual distance from the equator, either side"),
  [ANT_SPOTS_GROWTH] = NUMBER ("growth_d", 3, 0, 1000, "from emergence to greatest area"),
  [ANT_SPOTS_DECAY] =
      NUMBER ("decay_d", 12, 0, 10000, "exponential decay of the spots, three times as long for faculae; 0 for none"),
  [ANT_SPOTS_FACULA_RATIO] = NUMBER ("facula_ratio", 8, 0, 100, "area of faculae over area of spots"),
  [ANT_SPOTS_ROTATION] = NUMBER ("rotation_d", 27.275232, 1, 1000, "synodic rotation, of listed groups too"),
};

static const AntRecipeKey spot_keys[] = {
  [ANT_SPOT_MERIDIAN] = TIME ("meridian", TRUE, "when the group passes the central meridian"),
  [ANT_SPOT_AREA] = NEEDED ("area_millionths", 0, 1e6, "greatest area, of the hemisphere"),
  [ANT_SPOT_LATITUDE] = NUMBER ("latitude_deg", 0, -90, 90, "heliographic latitude"),
  [ANT_SPOT_PEAK] = TIME ("peak", FALSE, "when the area is greatest; the meridian passage if not given"),
  [ANT_SPOT_GROWTH] = NUMBER ("growth_d", 0, 0, 10000, "from emergence to greatest area; 0: it was always there"),
  [ANT_SPOT_DECAY] =
      NUMBER ("decay_d", 0, 0, 10000, "exponential decay after it, three times as long for faculae; 0: it stays"),
  [ANT_SPOT_FACULA_RATIO] = NUMBER ("facula_ratio", 0, 0, 100, "area of faculae over area of spots"),
};

static const AntRecipeKey flare_keys[] = {
  [ANT_FLARE_START] = TIME ("start", TRUE, "when it begins"),
  [ANT_FLARE_SIZE] = NEEDED ("size_ppm", -1e6, 1e6, "brightening at its peak"),
  [ANT_FLARE_RISE] = NUMBER ("rise_min", 5, 0, 1e5, "linear rise"),
  [ANT_FLARE_DECAY] = NUMBER ("decay_min", 30, 1e-3, 1e6, "exponential decay"),
};

static const AntRecipeKey planet_keys[] = {
  [ANT_PLANET_MIDDLE] = TIME ("middle", TRUE, "middle of a crossing, halfway between contacts I and IV"),
  [ANT_PLANET_DURATION] = NEEDED ("duration_h", 1e-3, 1e4, "contact I to contact IV"),
  [ANT_PLANET_IMPACT] = NUMBER ("impact", 0, 0, 2, "least distance of the centres, in solar radii"),
  [ANT_PLANET_RADIUS_RATIO] =
      NUMBER ("radius_ratio", NAN, 1e-6, 0.999, "radius of the disc over the Sun's; this or depth_ppm"),
  [ANT_PLANET_DEPTH] = NUMBER ("depth_ppm", NAN, 1e-6, 999999, "greatest depth, from which the radius follows"),
  [ANT_PLANET_PERIOD] =
      NUMBER ("period_d", NAN, 1e-3, 1e6, "it crosses again and again, before and after; once if not given"),
};

static const AntRecipeKey step_keys[] = {
  [ANT_STEP_TIME] = TIME ("time", TRUE, "when the level jumps"),
  [ANT_STEP_SIZE] = NEEDED ("size_ppm", -1e6, 1e6, "change of level, negative for a drop"),
  [ANT_STEP_RECOVERY] = NUMBER ("recovery_h", 0, 0, 1e6, "time of the exponential return; 0: it stays"),
  [ANT_STEP_FLAGGED] = SWITCH ("flagged", "mark it as bad for three recovery times"),
};

static const AntRecipeKey swing_keys[] = {
  [ANT_SWING_PERIOD] = NEEDED ("period_min", 0.1, 1e6, "period of the fundamental"),
  [ANT_SWING_AMPLITUDE] = NEEDED ("amplitude_ppm", 0, 1e6, "half the swing of the fundamental"),
  [ANT_SWING_HARMONIC_2] =
      NUMBER ("harmonic_2", 0, -100, 100, "amplitude of the second harmonic over that of the fundamental"),
  [ANT_SWING_HARMONIC_3] = NUMBER ("harmonic_3", 0, -100, 100, "likewise the third"),
  [ANT_SWING_HARMONIC_4] = NUMBER ("harmonic_4", 0, -100, 100, "likewise the fourth"),
  [ANT_SWING_PHASE] = NUMBER ("phase", 0, 0, 1, "in cycles, at the record's start"),
};

static const AntRecipeKey spikes_keys[] = {
  [ANT_SPIKES_RATE] = NUMBER ("per_30d", 0, 0, 1e6, "number of wild samples in 30 days, at random times"),
  [ANT_SPIKES_SIZE_MIN] = NUMBER ("size_min_ppm", 50, 0, 1e9, "smallest"),
  [ANT_SPIKES_SIZE_MAX] = NUMBER ("size_max_ppm", 500, 0, 1e9, "largest"),
  [ANT_SPIKES_DARK] = NUMBER ("dark_fraction", 0.5, 0, 1, "share of them that is dark"),
  [ANT_SPIKES_FLAGGED] = SWITCH ("flagged", "mark them as bad"),
};

static const AntRecipeKey spike_keys[] = {
  [ANT_SPIKE_TIME] = TIME ("time", TRUE, "in the exposure of the first wild sample"),
  [ANT_SPIKE_SIZE] = NEEDED ("size_ppm", -1e9, 1e9, "what is added"),
  [ANT_SPIKE_SAMPLES] = WHOLE ("samples", 1, 1, 1e6, "how many samples in a row"),
  [ANT_SPIKE_FLAGGED] = SWITCH ("flagged", "mark it as bad"),
};

static const AntRecipeKey warm_up_keys[] = {
  [ANT_WARM_UP_SIZE] = NEEDED ("size_ppm", -1e6, 1e6, "offset just after a gap, negative for low"),
  [ANT_WARM_UP_DECAY] = NUMBER ("decay_min", 30, 1e-3, 1e6, "time of the exponential return"),
  [ANT_WARM_UP_AFTER] = NUMBER ("after_gap_min", 30, 0, 1e6, "shorter gaps have none"),
};

#define GROUP(name_, many_, keys_, help_) { name_, many_, keys_, G_N_ELEMENTS (keys_), help_ }

const AntRecipeGroup ant_recipe_group_table[ANT_N_RECIPE_GROUPS] = {
  [ANT_GROUP_RECORD] = GROUP ("record", FALSE, record_keys, "the record itself"),
  [ANT_GROUP_GAPS] = GROUP ("gaps", FALSE, gaps_keys, "what is not observed"),
  [ANT_GROUP_GAP] = GROUP ("gap", TRUE, gap_keys, "one gap at a stated time"),
  [ANT_GROUP_NOISE] = GROUP ("noise", FALSE, noise_keys, "the noise of the Sun and of the instrument"),
  [ANT_GROUP_OSCILLATOR] = GROUP ("oscillator", TRUE, oscillator_keys, "one damped oscillator of the Sun"),
  [ANT_GROUP_EXPONENTIAL] =
      GROUP ("exponential", TRUE, exponential_keys, "one exponentially correlated process of the Sun"),
  [ANT_GROUP_SPOTS] = GROUP ("spots", FALSE, spots_keys, "spot groups drawn at random"),
  [ANT_GROUP_SPOT] = GROUP ("spot", TRUE, spot_keys, "one spot group"),
  [ANT_GROUP_FLARE] = GROUP ("flare", TRUE, flare_keys, "one flare"),
  [ANT_GROUP_PLANET] = GROUP ("planet", TRUE, planet_keys, "one planet that crosses the Sun"),
  [ANT_GROUP_STEP] = GROUP ("step", TRUE, step_keys, "one jump of the instrument's level"),
  [ANT_GROUP_SWING] = GROUP ("swing", TRUE, swing_keys, "one swing of the instrument, locked to an orbit"),
  [ANT_GROUP_SPIKES] = GROUP ("spikes", FALSE, spikes_keys, "wild samples drawn at random"),
  [ANT_GROUP_SPIKE] = GROUP ("spike", TRUE, spike_keys, "one wild sample, or a short run of them"),
  [ANT_GROUP_WARM_UP] = GROUP ("warm-up", FALSE, warm_up_keys, "an offset that returns after each long gap"),
};

const AntRecipeGroup *
ant_recipe_group_find (const char *header, const char **own_name)
{
  const gsize length = strcspn (header, " ");

  for (gsize i = 0; i < ANT_N_RECIPE_GROUPS; i++)
    {
      const AntRecipeGroup *group = &ant_recipe_group_table[i];

      if (strlen (group->name) != length || strncmp (group->name, header, length) != 0)
        continue;
      *own_name = header + length + (header[length] == ' ');
      /* A group of many has a name of its own; one that comes once has none. */
      return group->many == (**own_name != '\0') ? group : NULL;
    }
  return NULL;
}

int
ant_recipe_key_find (const AntRecipeGroup *group, const char *name)
{
  for (gsize i = 0; i < group->n_keys; i++)
    if (g_str_equal (group->key[i].name, name))
      return (int)i;
  return -1;
}
