/* study-witness.c - what a second instrument is worth: steps of one instrument, crossings that both see.
 * Arguments: records, first seed. Two records of 14 d at 10 min of one Sun (model A without its white part), each with white noise,
 * slow noise, gaps and a level of its own; on day 4 or 10 a step of the first instrument, on the other a crossing of SNR 8 in
 * each. A step's dip is weaker than the step itself, so steps are planted stronger; dips of SNR 6.5 to 9.5 count. The first is searched (threshold 6) and judged with the second as witness: target star, rates of crossings and
 * faults as planted, others as set. Prints a line per event found - planted, its SNR, what it is called alone and with the
 * witness - then how many were called rightly. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include "data/verdict-words.h"
#include "jobs/outside-job.h"
#include "jobs/scan-job.h"
#include "masks.h"
#include "models.h"
#include "noise/surrogate.h"
#include "population.h"
#include "trials/planets.h"

#define DAYS 14.0
#define STEP_D (10 / 1440.0)
#define N ((size_t) (DAYS * 144))
#define SNR 8
#define LEAST_SNR 6.5
#define MOST_SNR 9.5
#define EARLY_D 4.0
#define LATE_D 10.0
#define OWN_PPM 10.0

static void
draw (const AntNoiseModel *noise, AntRandom *random, float *drawn)
{
  g_autofree float *open = g_new0 (float, N);
  AntSeries series = { .n = N, .step_d = STEP_D, .value_ppm = open };
  ant_surrogate_draw (noise, &series, random, drawn);
}

/* What both see, plus what is the instrument's own; gaps are its own too. */
static void
observe (const float *sun, AntRandom *random, float *value)
{
  g_autofree unsigned char *seen = g_new (unsigned char, N);
  AntNoiseModel own = { .error_scale = 1, .white_ppm = OWN_PPM };
  own.n_parts = 1;
  own.part[0] = (AntNoisePart){ .kind = ANT_EXPONENTIAL, .rms_ppm = OWN_PPM, .time_d = 0.25 };
  draw (&own, random, value);
  ant_mask_make (ANT_MASK_L1, N, STEP_D, random, seen);
  for (size_t i = 0; i < N; i++)
    value[i] = seen[i] ? value[i] + sun[i] : NAN;
}

static AntRecord *
record_of (const float *value, double level, const char *name)
{
  AntRecord *record = ant_record_new ();
  g_autoptr (GError) error = NULL;
  AntGridOptions grid = ANT_GRID_OPTIONS_INIT;
  grid.dark_fraction = 100;
  record->n_rows = N;
  record->time_d = g_new (double, N);
  record->value = g_new (double, N);
  record->line = g_new (guint32, N);
  record->flags = g_new0 (guint16, N);
  record->path = g_strdup (name);
  record->stamp = ANT_AT_MIDDLE;
  record->time.scale = ANT_SCALE_UTC;
  record->time.origin_known = TRUE;
  record->time.origin_jd1 = 2456078.5;
  for (size_t i = 0; i < N; i++)
    {
      record->time_d[i] = ((double) i + 0.5) * STEP_D;
      record->value[i] = level * (1 + 1e-6 * (double) value[i]);
      record->line[i] = (guint32) i + 1;
    }
  if (!ant_record_make_grid (record, &grid, &error))
    g_error ("%s", error->message);
  return record;
}

typedef struct
{
  AntPlantedEvent event[2];       /* step, crossing */
  AntRecord *first, *second;
} Pair;

static Pair
make_pair (unsigned long seed)
{
  AntRandom random;
  AntNoiseModel sun;
  Pair pair;
  g_autofree float *common = g_new (float, N), *first = g_new (float, N), *second = g_new (float, N);
  ant_random_seed (&random, seed, 60);
  ant_study_model ('A', &sun);
  sun.white_ppm = 1e-3;
  draw (&sun, &random, common);
  observe (common, &random, first);
  observe (common, &random, second);
  double step_d = seed % 2 ? EARLY_D : LATE_D, crossing_d = seed % 2 ? LATE_D : EARLY_D;
  AntSeries series = { .n = N, .step_d = STEP_D, .start_d = 0.5 * STEP_D, .value_ppm = first };
  ant_population_plant ('A', &series, ANT_TRUTH_STEP, step_d, SNR * exp (0.7 + 1.8 * ant_random_uniform (&random)), &random, first, &pair.event[0]);
  ant_population_plant ('A', &series, ANT_TRUTH_CROSSING, crossing_d, SNR, &random, first, &pair.event[1]);
  const double *p = pair.event[1].parameter, depth = pair.event[1].depth_ppm * 1e-6;
  AntCrossing crossing = { ant_crossing_radius_for_depth (p[2], ANT_LIMB_DARKENING_SUN, depth), p[2], p[1] };
  for (size_t i = 0; i < N; i++)
    {
      double start_d = (double) i * STEP_D - p[0];
      second[i] -= (float) (1e6 * ant_crossing_mean_loss (&crossing, ANT_LIMB_DARKENING_SUN, start_d, start_d + STEP_D));
    }
  pair.first = record_of (first, 1361.2, "first");
  pair.second = record_of (second, 1365.7, "second");
  return pair;
}

/* 0: the step, 1: the crossing, -1: neither. */
static int
maker (const Pair *pair, const AntDip *dip)
{
  for (int k = 0; k < 2; k++)
    if (dip->mid_d > pair->event[k].from_d - 0.5 * dip->duration_d - 0.25 * !k && dip->mid_d < pair->event[k].to_d + 0.5 * dip->duration_d + 0.25 * !k)
      return k;
  return -1;
}

int
main (int argc, char **argv)
{
  if (argc < 3)
    return 2;
  size_t found[2] = { 0 }, right[2] = { 0 }, alone[2] = { 0 };
  static const AntDipClass wanted[2] = { ANT_CLASS_INSTRUMENT, ANT_CLASS_PLANET };
  AntSettings settings;
  ant_settings_init (&settings);
  settings.threshold_snr = 6;
  settings.target = ANT_TARGET_STAR;
  settings.repeats = 0;
  settings.threads = 1;
  settings.rates.per_year[ANT_CAUSE_PLANET] = settings.rates.per_year[ANT_CAUSE_INSTRUMENT] = 365.25 / DAYS;
  for (unsigned long r = 0; r < strtoul (argv[1], NULL, 10); r++)
    {
      g_autoptr (GError) error = NULL;
      Pair pair = make_pair (strtoul (argv[2], NULL, 10) + r);
      g_autoptr (AntScanResults) results = ant_scan_job_run (pair.first, &settings, NULL, NULL, NULL, &error);
      g_autoptr (GPtrArray) witnesses = g_ptr_array_new_with_free_func ((GDestroyNotify) ant_comparison_unref);
      g_ptr_array_add (witnesses, ant_comparison_new (pair.first, pair.second, 0, &error));
      if (error)
        g_error ("%s", error->message);
      g_autofree AntDipClass *before = g_new (AntDipClass, results->n_dips + 1);
      for (gsize i = 0; i < results->n_dips; i++)
        before[i] = ant_verdict_class (&results->dip_verdict[i]);
      if (!ant_outside_job_run (results, NULL, witnesses, NULL, &error))
        g_error ("%s", error->message);
      for (gsize i = 0; i < results->n_dips; i++)
        {
          int k = maker (&pair, &results->dip[i]);
          AntDipClass class = ant_verdict_class (&results->dip_verdict[i]);
          if (k < 0 || results->dip[i].snr < LEAST_SNR || results->dip[i].snr > MOST_SNR)
            continue;
          found[k]++;
          alone[k] += before[i] == wanted[k];
          right[k] += class == wanted[k];
          const AntEvidence *seen = ant_verdict_evidence (&results->dip_verdict[i], ANT_EVIDENCE_WITNESS);
          printf ("%s SNR %.2f, %.1f ppm, witness %.1f +- %.1f ppm, correlation %.2f: %s, with the witness %s %.3f\n", k ? "crossing" : "step", results->dip[i].snr, results->dip[i].depth_ppm, seen->number[0], seen->number[1], seen->number[2], ant_dip_class_name (before[i]),
                  ant_dip_class_name (class), ant_verdict_probability (&results->dip_verdict[i]));
        }
      ant_record_unref (pair.first);
      ant_record_unref (pair.second);
    }
  for (int k = 0; k < 2; k++)
    printf ("%s: %zu found, called %s alone %zu, with the witness %zu\n", k ? "crossing seen by both" : "step of one instrument", found[k],
            ant_dip_class_name (wanted[k]), alone[k], right[k]);
  return 0;
}
