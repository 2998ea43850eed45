/* recipe-scenario.c - from a recipe's groups to the numbers that trials/simulate.h works with. */
#include "data/recipe.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/error.h"
#include "trials/noise-presets.h"

#define MILLIONTH 1e-6
#define PER_MINUTE (1 / ANT_MINUTES_PER_DAY)
#define PER_HOUR (1 / ANT_HOURS_PER_DAY)
#define PER_SECOND (1 / ANT_SECONDS_PER_DAY)

static gboolean
refuse (const AntRecipe *recipe, const AntRecipeItem *item, GError **error, const char *what)
{
  const char *name = ant_recipe_group_table[item->group].name;
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, "%s: [%s%s%s]: %s", recipe->path, name, *item->name ? " " : "",
               item->name, what);
  return FALSE;
}

static gboolean
add_record (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  static const AntStampPlace places[] = { ANT_AT_START, ANT_AT_MIDDLE, ANT_AT_END };
  AntScenario *scenario = &recipe->scenario;
  double exposure_s = item->value[ANT_RECORD_EXPOSURE], cadence_s = item->value[ANT_RECORD_CADENCE];
  if (exposure_s > cadence_s)
    return refuse (recipe, item, error, _("found exposure_s above cadence_s, expected it no longer"));
  scenario->days = item->value[ANT_RECORD_DAYS];
  scenario->cadence_d = cadence_s * PER_SECOND;
  scenario->exposure_d = isnan (exposure_s) ? scenario->cadence_d : exposure_s * PER_SECOND;
  if (scenario->days / scenario->cadence_d >= ANT_MAX_SAMPLES || scenario->days < scenario->cadence_d)
    return refuse (recipe, item, error,
                   _("found days and cadence_s of less than one or more than 100 million samples"));
  scenario->level_w_m2 = item->value[ANT_RECORD_LEVEL];
  scenario->limb_darkening.u1 = item->value[ANT_RECORD_U1];
  scenario->limb_darkening.u2 = item->value[ANT_RECORD_U2];
  scenario->seed = (uint64_t) item->value[ANT_RECORD_SEED];
  recipe->stamp = places[(gsize) item->value[ANT_RECORD_STAMP]];
  recipe->uncertainty_ppm = item->value[ANT_RECORD_UNCERTAINTY];
  recipe->decimals = (int) item->value[ANT_RECORD_DECIMALS];
  return TRUE;
}

/* A value the file gives, in days, over that of the mask. */
static void
override (double *field, double value, double unit)
{
  if (!isnan (value))
    *field = value * unit;
}

static gboolean
add_gaps (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  const double *value = item->value;
  AntGapPlan *gaps = &recipe->scenario.gaps;
  *gaps = ant_gap_plan_for_mask ((AntGapMask) value[ANT_GAPS_MASK]);
  override (&gaps->orbit_period_d, value[ANT_GAPS_ORBIT_PERIOD], PER_MINUTE);
  override (&gaps->orbit_gap_d, value[ANT_GAPS_ORBIT_GAP], PER_MINUTE);
  override (&gaps->orbit_offset_d, value[ANT_GAPS_ORBIT_OFFSET], PER_MINUTE);
  override (&gaps->daily_min_d, value[ANT_GAPS_DAILY_MIN], PER_HOUR);
  override (&gaps->daily_max_d, value[ANT_GAPS_DAILY_MAX], PER_HOUR);
  override (&gaps->short_per_30d, value[ANT_GAPS_SHORT_RATE], 1);
  override (&gaps->short_min_d, value[ANT_GAPS_SHORT_MIN], PER_MINUTE);
  override (&gaps->short_max_d, value[ANT_GAPS_SHORT_MAX], PER_MINUTE);
  override (&gaps->long_per_30d, value[ANT_GAPS_LONG_RATE], 1);
  override (&gaps->long_min_d, value[ANT_GAPS_LONG_MIN], 1);
  override (&gaps->long_max_d, value[ANT_GAPS_LONG_MAX], 1);
  override (&gaps->dropped_fraction, value[ANT_GAPS_DROPPED], 0.01);
  if (gaps->daily_min_d > gaps->daily_max_d || gaps->short_min_d > gaps->short_max_d
      || gaps->long_min_d > gaps->long_max_d)
    return refuse (recipe, item, error, _("found a shortest gap longer than the longest, expected it no longer"));
  if (gaps->orbit_gap_d > 0 && gaps->orbit_gap_d >= gaps->orbit_period_d)
    return refuse (recipe, item, error, _("found orbit_gap_min as long as orbit_period_min, expected it shorter"));
  return TRUE;
}

static gboolean
add_gap (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  AntSpan gap = { item->value[ANT_GAP_START], item->value[ANT_GAP_END] };
  if (!(gap.end_d > gap.start_d))
    return refuse (recipe, item, error, _("found an end that is not after the start, expected it later"));
  g_array_append_val (recipe->gaps, gap);
  return TRUE;
}

/* The preset replaces what it finds, so [noise] is read before oscillators and exponentials (see make_scenario). */
static gboolean
add_noise (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  AntNoiseModel *noise = &recipe->scenario.noise;
  ant_noise_preset ((AntNoisePreset) item->value[ANT_NOISE_PRESET], noise);
  override (&noise->white_ppm, item->value[ANT_NOISE_WHITE], 1);
  return TRUE;
}

static gboolean
add_noise_part (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  AntNoiseModel *noise = &recipe->scenario.noise;
  AntNoisePart part = { 0 };
  if (noise->n_parts == ANT_MAX_PARTS)
    return refuse (recipe, item, error, _("found more oscillators and exponentials than 24, expected fewer"));
  if (item->group == ANT_GROUP_OSCILLATOR)
    {
      part.kind = ANT_OSCILLATOR;
      part.rms_ppm = item->value[ANT_OSCILLATOR_RMS];
      part.time_d = item->value[ANT_OSCILLATOR_PERIOD] * PER_SECOND;
      part.quality = item->value[ANT_OSCILLATOR_QUALITY];
    }
  else
    {
      part.kind = ANT_EXPONENTIAL;
      part.rms_ppm = item->value[ANT_EXPONENTIAL_RMS];
      part.time_d = item->value[ANT_EXPONENTIAL_TIME] * PER_SECOND;
    }
  noise->part[noise->n_parts++] = part;
  return TRUE;
}

static gboolean
add_spots (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  AntSpotPlan *spots = &recipe->scenario.spots;
  spots->groups_per_30d = item->value[ANT_SPOTS_RATE];
  spots->area_median = item->value[ANT_SPOTS_AREA_MEDIAN] * MILLIONTH;
  spots->area_spread_ln = item->value[ANT_SPOTS_AREA_SPREAD];
  spots->area_max = item->value[ANT_SPOTS_AREA_MAX] * MILLIONTH;
  spots->latitude_deg = item->value[ANT_SPOTS_LATITUDE];
  spots->growth_d = item->value[ANT_SPOTS_GROWTH];
  spots->decay_d = item->value[ANT_SPOTS_DECAY];
  spots->facula_ratio = item->value[ANT_SPOTS_FACULA_RATIO];
  spots->rotation_d = item->value[ANT_SPOTS_ROTATION];
  return TRUE;
}

static gboolean
add_spot (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  const double *value = item->value;
  AntSpotGroup group = {
    .meridian_d = value[ANT_SPOT_MERIDIAN],
    .latitude_deg = value[ANT_SPOT_LATITUDE],
    .area = value[ANT_SPOT_AREA] * MILLIONTH,
    .peak_d = isnan (value[ANT_SPOT_PEAK]) ? value[ANT_SPOT_MERIDIAN] : value[ANT_SPOT_PEAK],
    .growth_d = value[ANT_SPOT_GROWTH],
    .decay_d = value[ANT_SPOT_DECAY],
    .facula_ratio = value[ANT_SPOT_FACULA_RATIO],
  };
  g_array_append_val (recipe->groups, group);
  g_ptr_array_add (recipe->group_names, item->name);
  return TRUE;
}

static gboolean
add_flare (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  AntTrialFlare flare = {
    .start_d = item->value[ANT_FLARE_START],
    .size_ppm = item->value[ANT_FLARE_SIZE],
    .rise_d = item->value[ANT_FLARE_RISE] * PER_MINUTE,
    .decay_d = item->value[ANT_FLARE_DECAY] * PER_MINUTE,
  };
  g_array_append_val (recipe->flares, flare);
  g_ptr_array_add (recipe->flare_names, item->name);
  return TRUE;
}

static gboolean
add_planet (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  double radius_ratio = item->value[ANT_PLANET_RADIUS_RATIO], depth_ppm = item->value[ANT_PLANET_DEPTH];
  double impact = item->value[ANT_PLANET_IMPACT], period_d = item->value[ANT_PLANET_PERIOD];
  AntTrialPlanet planet = { .mid_d = item->value[ANT_PLANET_MIDDLE], .period_d = isnan (period_d) ? 0 : period_d };
  if (isnan (radius_ratio) == isnan (depth_ppm))
    return refuse (recipe, item, error, _("found both or none of radius_ratio and depth_ppm, expected one of them"));
  if (isnan (radius_ratio))
    {
      if (impact >= 1)
        return refuse (recipe, item, error,
                       _("found depth_ppm with an impact of 1 or more, expected radius_ratio there"));
      radius_ratio = ant_crossing_radius_for_depth (impact, recipe->scenario.limb_darkening, depth_ppm * ANT_PPM);
    }
  planet.crossing.radius_ratio = radius_ratio;
  planet.crossing.impact = impact;
  planet.crossing.t14_d = item->value[ANT_PLANET_DURATION] * PER_HOUR;
  if (!(impact < 1 + radius_ratio))
    return refuse (recipe, item, error,
                   _("found an impact at which the planet misses the Sun, expected less than 1 + radius_ratio"));
  if (planet.period_d > 0 && planet.period_d <= planet.crossing.t14_d)
    return refuse (recipe, item, error, _("found a period no longer than the crossing, expected it longer"));
  g_array_append_val (recipe->planets, planet);
  g_ptr_array_add (recipe->planet_names, item->name);
  return TRUE;
}

static gboolean
add_step (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  AntTrialStep step = {
    .time_d = item->value[ANT_STEP_TIME],
    .size_ppm = item->value[ANT_STEP_SIZE],
    .recovery_d = item->value[ANT_STEP_RECOVERY] * PER_HOUR,
    .flagged = item->value[ANT_STEP_FLAGGED] != 0,
  };
  if (step.flagged && !(step.recovery_d > 0))
    return refuse (recipe, item, error, _("found flagged with no recovery_h, expected a step that recovers"));
  g_array_append_val (recipe->steps, step);
  g_ptr_array_add (recipe->step_names, item->name);
  return TRUE;
}

static gboolean
add_swing (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  const double *value = item->value;
  AntTrialSwing swing = {
    .period_d = value[ANT_SWING_PERIOD] * PER_MINUTE,
    .phase = value[ANT_SWING_PHASE],
    .amplitude_ppm = value[ANT_SWING_AMPLITUDE],
    .relative = { 1, value[ANT_SWING_HARMONIC_2], value[ANT_SWING_HARMONIC_3], value[ANT_SWING_HARMONIC_4] },
  };
  g_array_append_val (recipe->swings, swing);
  g_ptr_array_add (recipe->swing_names, item->name);
  return TRUE;
}

static gboolean
add_spikes (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  AntSpikePlan *spikes = &recipe->scenario.spikes;
  spikes->per_30d = item->value[ANT_SPIKES_RATE];
  spikes->size_min_ppm = item->value[ANT_SPIKES_SIZE_MIN];
  spikes->size_max_ppm = item->value[ANT_SPIKES_SIZE_MAX];
  spikes->dark_fraction = item->value[ANT_SPIKES_DARK];
  spikes->flagged = item->value[ANT_SPIKES_FLAGGED] != 0;
  if (spikes->size_min_ppm > spikes->size_max_ppm)
    return refuse (recipe, item, error, _("found size_min_ppm above size_max_ppm, expected it no larger"));
  return TRUE;
}

static gboolean
add_spike (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  AntTrialSpike spike = {
    .time_d = item->value[ANT_SPIKE_TIME],
    .size_ppm = item->value[ANT_SPIKE_SIZE],
    .n_samples = (gsize) item->value[ANT_SPIKE_SAMPLES],
    .flagged = item->value[ANT_SPIKE_FLAGGED] != 0,
  };
  g_array_append_val (recipe->spikes, spike);
  g_ptr_array_add (recipe->spike_names, item->name);
  return TRUE;
}

static gboolean
add_warm_up (AntRecipe *recipe, const AntRecipeItem *item, GError **error)
{
  recipe->scenario.warm_up.size_ppm = item->value[ANT_WARM_UP_SIZE];
  recipe->scenario.warm_up.decay_d = item->value[ANT_WARM_UP_DECAY] * PER_MINUTE;
  recipe->scenario.warm_up.after_gap_d = item->value[ANT_WARM_UP_AFTER] * PER_MINUTE;
  return TRUE;
}

typedef gboolean (*AddItem) (AntRecipe *recipe, const AntRecipeItem *item, GError **error);

static const AddItem add_item[ANT_N_RECIPE_GROUPS] = {
  [ANT_GROUP_RECORD] = add_record,         [ANT_GROUP_GAPS] = add_gaps,
  [ANT_GROUP_GAP] = add_gap,               [ANT_GROUP_NOISE] = add_noise,
  [ANT_GROUP_OSCILLATOR] = add_noise_part, [ANT_GROUP_EXPONENTIAL] = add_noise_part,
  [ANT_GROUP_SPOTS] = add_spots,           [ANT_GROUP_SPOT] = add_spot,
  [ANT_GROUP_FLARE] = add_flare,           [ANT_GROUP_PLANET] = add_planet,
  [ANT_GROUP_STEP] = add_step,             [ANT_GROUP_SWING] = add_swing,
  [ANT_GROUP_SPIKES] = add_spikes,         [ANT_GROUP_SPIKE] = add_spike,
  [ANT_GROUP_WARM_UP] = add_warm_up,
};

static void
borrow_arrays (AntRecipe *recipe)
{
  AntScenario *scenario = &recipe->scenario;
  scenario->gaps.n_listed = recipe->gaps->len;
  scenario->gaps.listed = (const AntSpan *) (gconstpointer) recipe->gaps->data;
  scenario->spots.n_listed = recipe->groups->len;
  scenario->spots.listed = (const AntSpotGroup *) (gconstpointer) recipe->groups->data;
  scenario->spikes.n_listed = recipe->spikes->len;
  scenario->spikes.listed = (const AntTrialSpike *) (gconstpointer) recipe->spikes->data;
  scenario->n_planets = recipe->planets->len;
  scenario->planet = (const AntTrialPlanet *) (gconstpointer) recipe->planets->data;
  scenario->n_steps = recipe->steps->len;
  scenario->step = (const AntTrialStep *) (gconstpointer) recipe->steps->data;
  scenario->n_flares = recipe->flares->len;
  scenario->flare = (const AntTrialFlare *) (gconstpointer) recipe->flares->data;
  scenario->n_swings = recipe->swings->len;
  scenario->swing = (const AntTrialSwing *) (gconstpointer) recipe->swings->data;
}

gboolean
ant_recipe_make_scenario (AntRecipe *recipe, GError **error)
{
  recipe->scenario = (AntScenario) ANT_SCENARIO_INIT;
  recipe->gaps = g_array_new (FALSE, FALSE, sizeof (AntSpan));
  recipe->groups = g_array_new (FALSE, FALSE, sizeof (AntSpotGroup));
  recipe->planets = g_array_new (FALSE, FALSE, sizeof (AntTrialPlanet));
  recipe->steps = g_array_new (FALSE, FALSE, sizeof (AntTrialStep));
  recipe->flares = g_array_new (FALSE, FALSE, sizeof (AntTrialFlare));
  recipe->swings = g_array_new (FALSE, FALSE, sizeof (AntTrialSwing));
  recipe->spikes = g_array_new (FALSE, FALSE, sizeof (AntTrialSpike));
  GPtrArray **names[] = { &recipe->group_names, &recipe->planet_names, &recipe->step_names,
                          &recipe->flare_names, &recipe->swing_names,  &recipe->spike_names };
  for (gsize i = 0; i < G_N_ELEMENTS (names); i++)
    *names[i] = g_ptr_array_new ();
  /* In the order of the table, so that a group may lean on those before it: [record] first, [noise] before parts. */
  for (gsize group = 0; group < ANT_N_RECIPE_GROUPS; group++)
    for (gsize i = 0; i < recipe->items->len; i++)
      {
        const AntRecipeItem *item = g_ptr_array_index (recipe->items, i);
        if (item->group == group && !add_item[group](recipe, item, error))
          return FALSE;
      }
  borrow_arrays (recipe);
  return TRUE;
}
