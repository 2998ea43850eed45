/* noise-model.c - spectra, covariances, starting bank and free parameters of a sum of simple random processes. */
#include "noise/noise-model.h"
#include <math.h>
#include <stdio.h>
#include <string.h>
#include "core/units.h"

#define HARVEY_QUALITY 0.70710678118654752440 /* no resonance: the spectrum is 1/(1 + (f/f0)^4) */
#define LINE_QUALITY 30.0
#define OSCILLATIONS_HZ 3.1e-3
#define OSCILLATIONS_QUALITY 4.0
#define FINE_CADENCE_D (5 / ANT_MINUTES_PER_DAY)

static int
part_is_valid (const AntNoisePart *part)
{
  if (!(part->rms_ppm >= 0) || !(part->time_d > 0) || !isfinite (part->rms_ppm) || !isfinite (part->time_d))
    return 0;
  return part->kind == ANT_EXPONENTIAL || (part->kind == ANT_OSCILLATOR && part->quality > 0.5);
}

AntStatus
ant_noise_model_check (const AntNoiseModel *model)
{
  if (model->n_parts > ANT_MAX_PARTS)
    return ANT_BAD_ARGUMENT;
  for (size_t i = 0; i < model->n_parts; i++)
    if (!part_is_valid (&model->part[i]))
      return ANT_BAD_ARGUMENT;
  if (!(model->white_ppm >= 0) || !isfinite (model->white_ppm))
    return ANT_BAD_ARGUMENT;
  return model->error_scale >= 0 && isfinite (model->error_scale) ? ANT_OK : ANT_BAD_ARGUMENT;
}

/* --- spectra and covariances --- */

double
ant_noise_part_psd (const AntNoisePart *part, double f_cd)
{
  if (!part_is_valid (part))
    return NAN;
  double variance = part->rms_ppm * part->rms_ppm;
  if (part->kind == ANT_EXPONENTIAL)
    {
      double x = ANT_TAU * f_cd * part->time_d;
      return 4 * variance * part->time_d / (1 + x * x);
    }
  /* u = w/w0, in which the integral of 1/((1-u^2)^2 + (u/Q)^2) over u > 0 is pi Q/2. */
  double u = f_cd * part->time_d;
  double detuning = 1 - u * u;
  double damping = u / part->quality;
  return 4 * variance * part->time_d / (ANT_TAU * part->quality * (detuning * detuning + damping * damping));
}

double
ant_noise_part_covariance (const AntNoisePart *part, double lag_d)
{
  if (!part_is_valid (part))
    return NAN;
  double variance = part->rms_ppm * part->rms_ppm;
  double lag = fabs (lag_d);
  if (part->kind == ANT_EXPONENTIAL)
    return variance * exp (-lag / part->time_d);
  double phase = ANT_TAU * lag / part->time_d;
  double damping = 0.5 / part->quality;
  double eta = sqrt (1 - damping * damping);
  return variance * exp (-phase * damping) * (cos (eta * phase) + damping / eta * sin (eta * phase));
}

double
ant_noise_model_psd (const AntNoiseModel *model, double f_cd)
{
  double sum = 0;
  for (size_t i = 0; i < model->n_parts; i++)
    sum += ant_noise_part_psd (&model->part[i], f_cd);
  return sum;
}

double
ant_noise_model_covariance (const AntNoiseModel *model, double lag_d)
{
  double sum = 0;
  for (size_t i = 0; i < model->n_parts; i++)
    sum += ant_noise_part_covariance (&model->part[i], lag_d);
  return sum;
}

double
ant_noise_white_psd (double variance_ppm2, double step_d)
{
  return 2 * variance_ppm2 * step_d;
}

double
ant_noise_model_variance (const AntNoiseModel *model, double error_ppm, double bin_count)
{
  double count = bin_count > 0 ? bin_count : 1;
  double stated = error_ppm > 0 ? model->error_scale * error_ppm : 0;
  return model->white_ppm * model->white_ppm / count + stated * stated;
}

/* --- the starting bank --- */

/* Where a part starts. Its time is stretched to `stretch` cadences where the cadence is coarse; it is left out at
 * cadences of longest_step_d and more. The amplitude starts at factor * rms^(1-haste) * white^haste: the slowest part
 * carries the scatter of the record, the fastest the scatter of neighbours, those between lie between. */
typedef struct
{
  AntPartKind kind;
  double time_d;
  double quality;
  double stretch;
  double longest_step_d;
  double factor, haste;
  double time_width_ln;
} BankEntry;

static const BankEntry bank[] = {
  { ANT_OSCILLATOR, 20, HARVEY_QUALITY, 20, INFINITY, 0.8, 0, 0.5 },
  { ANT_OSCILLATOR, 2, HARVEY_QUALITY, 5, INFINITY, 0.5, 0.4, 0.7 },
  /* time scale 1/w0 of 3 h */
  { ANT_OSCILLATOR, ANT_TAU * 3 / ANT_HOURS_PER_DAY, HARVEY_QUALITY, 0, 1.5 / ANT_HOURS_PER_DAY, 0.5, 0.6, 1 },
  { ANT_EXPONENTIAL, 8 / ANT_HOURS_PER_DAY, 0, 3, INFINITY, 0.5, 0.5, 1 },
  { ANT_EXPONENTIAL, 25 / ANT_MINUTES_PER_DAY, 0, 0, 12.5 / ANT_MINUTES_PER_DAY, 0.5, 0.8, 1 },
  /* time scale 1/w0 of 280 s */
  { ANT_OSCILLATOR, ANT_TAU * 280 / ANT_SECONDS_PER_DAY, HARVEY_QUALITY, 0, FINE_CADENCE_D, 0.8, 0.9, 0.7 },
  { ANT_OSCILLATOR, 1 / (OSCILLATIONS_HZ * ANT_SECONDS_PER_DAY), OSCILLATIONS_QUALITY, 0, FINE_CADENCE_D, 0.3, 1, 0 },
};

static void
add_part (AntNoiseModel *model, AntPartKind kind, double rms_ppm, double time_d, double quality, double time_width_ln)
{
  if (model->n_parts == ANT_MAX_PARTS)
    return;
  model->part[model->n_parts++] = (AntNoisePart){
    .kind = kind, .rms_ppm = rms_ppm, .time_d = time_d, .quality = quality, .rms_prior_ppm = rms_ppm,
    .rms_width_ln = 2, .time_prior_d = time_d, .time_width_ln = time_width_ln,
  };
}

void
ant_noise_model_default (AntNoiseModel *model, double step_d, double rms_ppm, double white_ppm, int has_errors,
                         size_t n_lines, const AntNoiseLine *lines)
{
  /* A record of constants still needs values whose logarithms exist. */
  double white = white_ppm > 1e-6 ? white_ppm : 1e-6;
  double rms = rms_ppm > white ? rms_ppm : white;
  /* Where neighbours differ as much as the whole record scatters, there is little but white noise: expect small parts,
   * else each would keep a share that its prior gave it. */
  double coloured = fmax (1 - white * white / (rms * rms), 0.03);
  *model = (AntNoiseModel){ .error_scale = 1, .error_scale_width_ln = has_errors ? 0.5 : 0 };
  for (size_t i = 0; i < sizeof bank / sizeof *bank; i++)
    {
      const BankEntry *entry = &bank[i];
      if (step_d >= entry->longest_step_d)
        continue;
      double start_ppm = coloured * entry->factor * pow (rms, 1 - entry->haste) * pow (white, entry->haste);
      add_part (model, entry->kind, start_ppm, fmax (entry->time_d, entry->stretch * step_d), entry->quality,
                entry->time_width_ln);
      /* Slow parts even smaller: a month says least of them, so the prior weighs most, and long dips pay for it. */
      AntNoisePart *part = &model->part[model->n_parts - 1];
      if (part->time_d > 0.5)
        part->rms_prior_ppm *= coloured;
    }
  for (size_t i = 0; i < n_lines; i++)
    for (int h = 1; h <= lines[i].harmonics; h++)
      if (lines[i].period_d / h > 2 * step_d)
        add_part (model, ANT_OSCILLATOR, 0.3 * sqrt (rms * white) / h, lines[i].period_d / h, LINE_QUALITY, 0);
  model->white_ppm = model->white_prior_ppm = white * (has_errors ? 0.3 : 0.7);
  model->white_width_ln = 2;
}

/* --- names --- */

const char *
ant_noise_part_role (const AntNoisePart *part)
{
  int oscillator = part->kind == ANT_OSCILLATOR;
  double period_min = (oscillator ? part->time_d : ANT_TAU * part->time_d) * ANT_MINUTES_PER_DAY;
  if (oscillator && part->quality >= 20)
    return "line";
  if (oscillator && part->quality > 2 && period_min > 2.5 && period_min < 10)
    return "oscillations";
  if (period_min < 60)
    return "granulation";
  if (period_min < ANT_MINUTES_PER_DAY)
    return "hours";
  return period_min <= 8 * ANT_MINUTES_PER_DAY ? "days" : "rotation";
}

/* --- free parameters --- */

/* One parameter of a model: its value, the centre and the width of its prior. */
typedef struct
{
  double *value;
  double *prior; /* NULL: 1, always */
  double *width_ln;
  size_t part;   /* n_parts: belongs to no part */
  const char *name;
} Parameter;

#define MAX_PARAMETERS (2 * ANT_MAX_PARTS + 2)

/* The free parameters in their fixed order. */
static size_t
list_free (AntNoiseModel *model, Parameter *list)
{
  size_t n = 0;
  for (size_t i = 0; i < model->n_parts; i++)
    {
      AntNoisePart *part = &model->part[i];
      if (part->rms_width_ln > 0)
        list[n++] = (Parameter){ &part->rms_ppm, &part->rms_prior_ppm, &part->rms_width_ln, i, "rms" };
      if (part->time_width_ln > 0)
        list[n++] = (Parameter){ &part->time_d, &part->time_prior_d, &part->time_width_ln, i, "time" };
    }
  if (model->white_width_ln > 0)
    list[n++] = (Parameter){ &model->white_ppm, &model->white_prior_ppm, &model->white_width_ln, model->n_parts,
                             "white" };
  if (model->error_scale_width_ln > 0)
    list[n++] = (Parameter){ &model->error_scale, NULL, &model->error_scale_width_ln, model->n_parts, "error-scale" };
  return n;
}

size_t
ant_noise_model_get (const AntNoiseModel *model, double *theta_ln)
{
  AntNoiseModel copy = *model;
  Parameter list[MAX_PARAMETERS];
  size_t n = list_free (&copy, list);
  for (size_t i = 0; theta_ln && i < n; i++)
    theta_ln[i] = log (*list[i].value);
  return n;
}

void
ant_noise_model_set (AntNoiseModel *model, const double *theta_ln)
{
  Parameter list[MAX_PARAMETERS];
  size_t n = list_free (model, list);
  for (size_t i = 0; i < n; i++)
    *list[i].value = exp (theta_ln[i]);
}

double
ant_noise_model_penalty (const AntNoiseModel *model)
{
  AntNoiseModel copy = *model;
  Parameter list[MAX_PARAMETERS];
  size_t n = list_free (&copy, list);
  double sum = 0;
  for (size_t i = 0; i < n; i++)
    {
      double off = log (*list[i].value / (list[i].prior ? *list[i].prior : 1)) / *list[i].width_ln;
      sum += 0.5 * off * off;
    }
  return sum;
}

void
ant_noise_model_centre_priors (AntNoiseModel *model, double width_ln)
{
  Parameter list[MAX_PARAMETERS];
  size_t n = list_free (model, list);
  for (size_t i = 0; i < n; i++)
    {
      if (list[i].prior)
        *list[i].prior = *list[i].value;
      *list[i].width_ln = width_ln;
    }
}

void
ant_noise_model_parameter_name (const AntNoiseModel *model, size_t i, size_t size, char *text)
{
  AntNoiseModel copy = *model;
  Parameter list[MAX_PARAMETERS];
  if (size)
    text[0] = '\0';
  if (i >= list_free (&copy, list))
    return;
  if (list[i].part == model->n_parts)
    {
      snprintf (text, size, "%s", list[i].name);
      return;
    }
  /* The second part of one role reads "hours-2". */
  const char *role = ant_noise_part_role (&model->part[list[i].part]);
  unsigned same = 1;
  for (size_t j = 0; j < list[i].part; j++)
    same += strcmp (ant_noise_part_role (&model->part[j]), role) == 0;
  if (same > 1)
    snprintf (text, size, "%s-%u.%s", role, same, list[i].name);
  else
    snprintf (text, size, "%s.%s", role, list[i].name);
}
