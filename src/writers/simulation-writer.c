/* simulation-writer.c - the rows of a simulated record. */
#include "writers/simulation-writer.h"

#include <math.h>
#include <string.h>

#include "config.h"
#include "core/units.h"

#define LEAST_PASSAGE_PPM 5

/* A number with a fixed count of decimals, the same in every locale. */
static void
write_fixed (FILE *stream, double value, int decimals)
{
  static const double power[] = { 1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9 };
  double scaled = value * power[decimals];
  if (fabs (scaled) > 9e15)
    {
      char format[16], text[G_ASCII_DTOSTR_BUF_SIZE];
      g_snprintf (format, sizeof format, "%%.%de", 16);
      fputs (g_ascii_formatd (text, sizeof text, format, value), stream);
      return;
    }
  long long whole = llround (scaled);
  unsigned long long size = whole < 0 ? (unsigned long long) -whole : (unsigned long long) whole;
  unsigned long long unit = (unsigned long long) power[decimals];
  if (decimals == 0)
    fprintf (stream, "%s%llu", whole < 0 ? "-" : "", size);
  else
    fprintf (stream, "%s%llu.%0*llu", whole < 0 ? "-" : "", size / unit, decimals, size % unit);
}

static gboolean
is_whole_second (double days)
{
  double seconds = days * ANT_SECONDS_PER_DAY;
  return fabs (seconds - round (seconds)) < 1e-6;
}

/* From the start of an exposure to its time stamp. */
static double
stamp_offset_d (const AntRecipe *recipe)
{
  switch (recipe->stamp)
    {
    case ANT_AT_START: return 0;
    case ANT_AT_END: return recipe->scenario.exposure_d;
    default: return recipe->scenario.exposure_d / 2;
    }
}

static const char *
stamp_word (AntStampPlace stamp)
{
  return stamp == ANT_AT_START ? "start" : stamp == ANT_AT_END ? "end" : "middle";
}

static void
write_head (const AntRecipe *recipe, const AntSimulated *simulated, FILE *stream)
{
  const AntScenario *scenario = &recipe->scenario;
  g_autofree char *file = g_path_get_basename (recipe->path);
  g_autofree char *start = ant_time_reference_utc_text (&recipe->time, 0, 3);
  gsize observed = 0;
  for (gsize i = 0; i < simulated->n; i++)
    observed += !isnan (simulated->irradiance_w_m2[i]);
  fprintf (stream, "# %s\n", *recipe->title ? recipe->title : file);
  fprintf (stream, "# simulated: everything here is invented. Recipe %s, seed %" G_GUINT64_FORMAT ", antumbra %s\n",
           file, scenario->seed, ANT_VERSION);
  fprintf (stream, "# start %s, ", start);
  write_fixed (stream, scenario->days, 3);
  fputs (" d, cadence ", stream);
  write_fixed (stream, scenario->cadence_d * ANT_SECONDS_PER_DAY, 3);
  fputs (" s, exposure ", stream);
  write_fixed (stream, scenario->exposure_d * ANT_SECONDS_PER_DAY, 3);
  fprintf (stream, " s, %zu of %zu samples observed\n", observed, simulated->n);
}

void
ant_simulation_write_record (const AntRecipe *recipe, const AntSimulated *simulated, FILE *stream)
{
  const AntScenario *scenario = &recipe->scenario;
  double offset_d = stamp_offset_d (recipe);
  double error = scenario->level_w_m2 * recipe->uncertainty_ppm * ANT_PPM;
  gboolean has_error = error > 0;
  int time_decimals = is_whole_second (scenario->cadence_d) && is_whole_second (offset_d) ? 0 : 3;
  write_head (recipe, simulated, stream);
  fprintf (stream, "# units: irradiance W/m2%s; time_utc is UTC at the %s of the exposure; flag 0 = good\n",
           has_error ? ", uncertainty W/m2 (1 sigma)" : "", stamp_word (recipe->stamp));
  fprintf (stream, "time_utc,irradiance,%sflag\n", has_error ? "uncertainty," : "");
  for (gsize i = 0; i < simulated->n; i++)
    {
      if (isnan (simulated->irradiance_w_m2[i]))
        continue;
      double time_d = (double) i * scenario->cadence_d + offset_d;
      g_autofree char *time = ant_time_reference_utc_text (&recipe->time, time_d, time_decimals);
      fputs (time, stream);
      fputc (',', stream);
      write_fixed (stream, simulated->irradiance_w_m2[i], recipe->decimals);
      if (has_error)
        {
          fputc (',', stream);
          write_fixed (stream, error, MIN (9, recipe->decimals + 1));
        }
      fprintf (stream, ",%d\n", simulated->flag[i]);
    }
}

/* One row of the truth; what is not a number is left empty. */
typedef struct
{
  const char *kind, *name;
  double start_d, mid_d, end_d;
  double depth_ppm, mean_depth_ppm, radius_ratio, impact;
} Event;

static void
add_event (GArray *events, const AntRecipe *recipe, Event event)
{
  if (event.end_d > 0 && event.start_d < recipe->scenario.days)
    g_array_append_val (events, event);
}

static const char *
name_of (const GPtrArray *names, gsize i)
{
  return i < names->len ? g_ptr_array_index (names, i) : "";
}

static void
add_crossings (GArray *events, const AntRecipe *recipe, gsize index)
{
  const AntScenario *scenario = &recipe->scenario;
  const AntTrialPlanet *planet = &scenario->planet[index];
  const AntCrossing *crossing = &planet->crossing;
  double half_d = crossing->t14_d / 2, step_d = planet->period_d;
  double first = step_d > 0 ? ceil (-(planet->mid_d + half_d) / step_d) : 0;
  Event event = {
    .kind = "planet",
    .name = name_of (recipe->planet_names, index),
    .depth_ppm = ant_crossing_loss (crossing, scenario->limb_darkening, 0) / ANT_PPM,
    .mean_depth_ppm = ant_crossing_mean_loss (crossing, scenario->limb_darkening, -half_d, half_d) / ANT_PPM,
    .radius_ratio = crossing->radius_ratio,
    .impact = crossing->impact,
  };
  for (double k = first; planet->mid_d + k * step_d - half_d < scenario->days; k++)
    {
      event.mid_d = planet->mid_d + k * step_d;
      event.start_d = event.mid_d - half_d;
      event.end_d = event.mid_d + half_d;
      add_event (events, recipe, event);
      if (!(step_d > 0))
        break;
    }
}

/* Disc passages, limb to limb, that take enough to matter; their middle is where they take most. */
static void
add_passages (GArray *events, const AntRecipe *recipe, const AntSpotGroup *group, const char *name)
{
  double rotation_d = recipe->scenario.spots.rotation_d;
  double k = ceil (-(group->meridian_d + rotation_d / 4) / rotation_d);
  for (; group->meridian_d + (k - 0.25) * rotation_d < recipe->scenario.days; k++)
    {
      double meridian_d = group->meridian_d + k * rotation_d;
      Event event = { .kind = "spot", .name = name, .start_d = meridian_d - rotation_d / 4,
                      .end_d = meridian_d + rotation_d / 4, .mean_depth_ppm = NAN, .radius_ratio = NAN, .impact = NAN };
      for (int i = 0; i <= 400; i++)
        {
          double time_d = event.start_d + i * (rotation_d / 2 / 400);
          double depth_ppm = -ant_spot_light (group, rotation_d, time_d) / ANT_PPM;
          if (depth_ppm > event.depth_ppm)
            {
              event.depth_ppm = depth_ppm;
              event.mid_d = time_d;
            }
        }
      if (event.depth_ppm >= LEAST_PASSAGE_PPM)
        add_event (events, recipe, event);
    }
}

static void
add_faults (GArray *events, const AntRecipe *recipe, const AntSimulated *simulated)
{
  const AntScenario *scenario = &recipe->scenario;
  Event event = { .mean_depth_ppm = NAN, .radius_ratio = NAN, .impact = NAN };
  for (gsize i = 0; i < scenario->n_steps; i++)
    {
      const AntTrialStep *step = &scenario->step[i];
      event.kind = "step";
      event.name = name_of (recipe->step_names, i);
      event.start_d = event.mid_d = step->time_d;
      event.end_d = step->recovery_d > 0 ? step->time_d + 3 * step->recovery_d : scenario->days;
      event.depth_ppm = -step->size_ppm;
      add_event (events, recipe, event);
    }
  for (gsize i = 0; i < scenario->n_flares; i++)
    {
      const AntTrialFlare *flare = &scenario->flare[i];
      event.kind = "flare";
      event.name = name_of (recipe->flare_names, i);
      event.start_d = flare->start_d;
      event.mid_d = flare->start_d + flare->rise_d;
      event.end_d = event.mid_d + 3 * flare->decay_d;
      event.depth_ppm = -flare->size_ppm;
      add_event (events, recipe, event);
    }
  for (gsize i = 0; i < simulated->n_spikes; i++)
    {
      const AntTrialSpike *spike = &simulated->spike[i];
      event.kind = "spike";
      event.name = name_of (recipe->spike_names, i);
      event.start_d = ant_spike_first (spike, scenario->cadence_d) * scenario->cadence_d;
      event.end_d = event.start_d + (double) spike->n_samples * scenario->cadence_d;
      event.mid_d = (event.start_d + event.end_d) / 2;
      event.depth_ppm = -spike->size_ppm;
      add_event (events, recipe, event);
    }
}

static void
add_warm_ups (GArray *events, const AntRecipe *recipe, const AntSimulated *simulated)
{
  const AntScenario *scenario = &recipe->scenario;
  const AntWarmUp *warm_up = &scenario->warm_up;
  Event event = { .kind = "warm-up", .name = "", .depth_ppm = -warm_up->size_ppm, .mean_depth_ppm = NAN,
                  .radius_ratio = NAN, .impact = NAN };
  for (gsize i = 0, run = 0; warm_up->size_ppm != 0 && i < simulated->n; i++)
    {
      gboolean missing = isnan (simulated->irradiance_w_m2[i]);
      if (!missing && run > 0 && ant_warm_up_follows (scenario, run))
        {
          event.start_d = event.mid_d = (double) i * scenario->cadence_d;
          event.end_d = event.start_d + 3 * warm_up->decay_d;
          add_event (events, recipe, event);
        }
      run = missing ? run + 1 : 0;
    }
}

/* Observed samples over those that start..end has room for. */
static double
coverage (const AntRecipe *recipe, const AntSimulated *simulated, const Event *event)
{
  const AntScenario *scenario = &recipe->scenario;
  double half_d = scenario->exposure_d / 2;
  double first = ceil ((event->start_d - half_d) / scenario->cadence_d - 1e-6);
  double last = ceil ((event->end_d - half_d) / scenario->cadence_d - 1e-6);
  gsize observed = 0;
  for (double i = MAX (0, first); i < MIN (last, (double) simulated->n); i++)
    observed += !isnan (simulated->irradiance_w_m2[(gsize) i]);
  return last > first ? (double) observed / (last - first) : 0;
}

static int
compare_events (gconstpointer a, gconstpointer b)
{
  const Event *left = a, *right = b;
  return (left->start_d > right->start_d) - (left->start_d < right->start_d);
}

static void
write_optional (FILE *stream, double value, int decimals)
{
  fputc (',', stream);
  if (!isnan (value))
    write_fixed (stream, value, decimals);
}

static void
write_event (const AntRecipe *recipe, const AntSimulated *simulated, const Event *event, FILE *stream)
{
  double times[] = { event->start_d, event->mid_d, event->end_d };
  fprintf (stream, "%s,%s", event->kind, event->name);
  for (int i = 0; i < 3; i++)
    {
      g_autofree char *text = ant_time_reference_utc_text (&recipe->time, times[i], 0);
      fprintf (stream, ",%s", text);
    }
  for (int i = 0; i < 3; i++)
    write_optional (stream, ant_time_reference_jd (&recipe->time, times[i]), 7);
  write_optional (stream, (event->end_d - event->start_d) * ANT_HOURS_PER_DAY, 4);
  write_optional (stream, event->depth_ppm, 3);
  write_optional (stream, event->mean_depth_ppm, 3);
  write_optional (stream, event->radius_ratio, 7);
  write_optional (stream, event->impact, 4);
  write_optional (stream, coverage (recipe, simulated, event), 4);
  fputc ('\n', stream);
}

void
ant_simulation_write_truth (const AntRecipe *recipe, const AntSimulated *simulated, FILE *stream)
{
  g_autoptr (GArray) events = g_array_new (FALSE, FALSE, sizeof (Event));
  for (gsize i = 0; i < recipe->scenario.n_planets; i++)
    add_crossings (events, recipe, i);
  for (gsize i = 0; i < simulated->n_groups; i++)
    add_passages (events, recipe, &simulated->group[i], name_of (recipe->group_names, i));
  add_faults (events, recipe, simulated);
  add_warm_ups (events, recipe, simulated);
  g_array_sort (events, compare_events);

  g_autofree char *text = ant_recipe_to_text (recipe);
  g_auto (GStrv) lines = g_strsplit (text, "\n", -1);
  write_head (recipe, simulated, stream);
  for (gsize i = 0; lines[i]; i++)
    fprintf (stream, "#%s%s\n", *lines[i] ? "   " : "", lines[i]);
  fputs ("# depth_ppm: greatest, before exposure smearing, of the undimmed level; negative: brighter. JD is UTC.\n"
         "# duration_h: start to end, of a planet contact I to IV, of a spot limb to limb, of a step, flare or warm-up to\n"
         "# three recovery times. coverage: observed fraction of start to end.\n"
         "kind,name,start_utc,mid_utc,end_utc,start_jd,mid_jd,end_jd,duration_h,depth_ppm,mean_depth_ppm,radius_ratio,"
         "impact,coverage\n",
         stream);
  for (gsize i = 0; i < events->len; i++)
    write_event (recipe, simulated, &g_array_index (events, Event, i), stream);
}
