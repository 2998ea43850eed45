/* recipe-keys.h - the table of every group and key that a recipe may hold; reading, writing, checking and the manual
 * (docs/recipes.md) all follow it. */
#pragma once

#include <glib.h>

typedef enum
{
  ANT_KEY_NUMBER,
  ANT_KEY_WHOLE,  /* a number without a fraction */
  ANT_KEY_TIME,   /* UTC, ISO 8601; held as days from the record's start */
  ANT_KEY_SWITCH, /* yes or no; held as 1 or 0 */
  ANT_KEY_WORD,   /* one of `words`; held as its index */
  ANT_KEY_TEXT,   /* free text */
} AntRecipeKeyKind;

typedef struct
{
  const char *name;
  AntRecipeKeyKind kind;
  double fallback;           /* NAN: what happens without it is told by `help` */
  gboolean required;
  double minimum, maximum;   /* of numbers, both allowed */
  const char *const *words;  /* NULL-ended */
  const char *help;          /* one phrase */
} AntRecipeKey;

/* A group is written once, as [name], or any number of times with a name of its own, as [planet venus-like]. */
typedef struct
{
  const char *name;
  gboolean many;
  const AntRecipeKey *key;
  gsize n_keys;
  const char *help;
} AntRecipeGroup;

typedef enum
{
  ANT_GROUP_RECORD,
  ANT_GROUP_GAPS,
  ANT_GROUP_GAP,
  ANT_GROUP_NOISE,
  ANT_GROUP_OSCILLATOR,
  ANT_GROUP_EXPONENTIAL,
  ANT_GROUP_SPOTS,
  ANT_GROUP_SPOT,
  ANT_GROUP_FLARE,
  ANT_GROUP_PLANET,
  ANT_GROUP_STEP,
  ANT_GROUP_SWING,
  ANT_GROUP_SPIKES,
  ANT_GROUP_SPIKE,
  ANT_GROUP_WARM_UP,
  ANT_N_RECIPE_GROUPS
} AntRecipeGroupIndex;

/* Places of the keys in their groups. */
enum { ANT_RECORD_NAME, ANT_RECORD_START, ANT_RECORD_DAYS, ANT_RECORD_CADENCE, ANT_RECORD_EXPOSURE, ANT_RECORD_STAMP,
       ANT_RECORD_LEVEL, ANT_RECORD_UNCERTAINTY, ANT_RECORD_DECIMALS, ANT_RECORD_U1, ANT_RECORD_U2, ANT_RECORD_SEED };
enum { ANT_GAPS_MASK, ANT_GAPS_ORBIT_PERIOD, ANT_GAPS_ORBIT_GAP, ANT_GAPS_ORBIT_OFFSET, ANT_GAPS_DAILY_MIN,
       ANT_GAPS_DAILY_MAX, ANT_GAPS_SHORT_RATE, ANT_GAPS_SHORT_MIN, ANT_GAPS_SHORT_MAX, ANT_GAPS_LONG_RATE,
       ANT_GAPS_LONG_MIN, ANT_GAPS_LONG_MAX, ANT_GAPS_DROPPED };
enum { ANT_GAP_START, ANT_GAP_END };
enum { ANT_NOISE_PRESET, ANT_NOISE_WHITE };
enum { ANT_OSCILLATOR_RMS, ANT_OSCILLATOR_PERIOD, ANT_OSCILLATOR_QUALITY };
enum { ANT_EXPONENTIAL_RMS, ANT_EXPONENTIAL_TIME };
enum { ANT_SPOTS_RATE, ANT_SPOTS_AREA_MEDIAN, ANT_SPOTS_AREA_SPREAD, ANT_SPOTS_AREA_MAX, ANT_SPOTS_LATITUDE,
       ANT_SPOTS_GROWTH, ANT_SPOTS_DECAY, ANT_SPOTS_FACULA_RATIO, ANT_SPOTS_ROTATION };
enum { ANT_SPOT_MERIDIAN, ANT_SPOT_AREA, ANT_SPOT_LATITUDE, ANT_SPOT_PEAK, ANT_SPOT_GROWTH, ANT_SPOT_DECAY,
       ANT_SPOT_FACULA_RATIO };
enum { ANT_FLARE_START, ANT_FLARE_SIZE, ANT_FLARE_RISE, ANT_FLARE_DECAY };
enum { ANT_PLANET_MIDDLE, ANT_PLANET_DURATION, ANT_PLANET_IMPACT, ANT_PLANET_RADIUS_RATIO, ANT_PLANET_DEPTH,
       ANT_PLANET_PERIOD };
enum { ANT_STEP_TIME, ANT_STEP_SIZE, ANT_STEP_RECOVERY, ANT_STEP_FLAGGED };
enum { ANT_SWING_PERIOD, ANT_SWING_AMPLITUDE, ANT_SWING_HARMONIC_2, ANT_SWING_HARMONIC_3, ANT_SWING_HARMONIC_4,
       ANT_SWING_PHASE };
enum { ANT_SPIKES_RATE, ANT_SPIKES_SIZE_MIN, ANT_SPIKES_SIZE_MAX, ANT_SPIKES_DARK, ANT_SPIKES_FLAGGED };
enum { ANT_SPIKE_TIME, ANT_SPIKE_SIZE, ANT_SPIKE_SAMPLES, ANT_SPIKE_FLAGGED };
enum { ANT_WARM_UP_SIZE, ANT_WARM_UP_DECAY, ANT_WARM_UP_AFTER };

#define ANT_MAX_RECIPE_KEYS 16

extern const AntRecipeGroup ant_recipe_group_table[ANT_N_RECIPE_GROUPS];

/* The group that a header such as "planet venus-like" belongs to, its own name in *own_name (inside header; "" for
 * groups that come once). NULL if there is none. */
const AntRecipeGroup *ant_recipe_group_find (const char *header, const char **own_name);
/* Place of a key in its group, -1 if it has none of that name. */
int ant_recipe_key_find (const AntRecipeGroup *group, const char *name);
