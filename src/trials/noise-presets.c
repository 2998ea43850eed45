/* noise-presets.c - the named noise models. */
#include "trials/noise-presets.h"

#include <math.h>
#include <string.h>
#include "core/units.h"

#define P_MODE_PERIOD_S (1 / 3.1e-3)

static void
add (AntNoiseModel *model, AntPartKind kind, double rms_ppm, double time_s, double quality)
{
  AntNoisePart *part = &model->part[model->n_parts++];

  part->kind = kind;
  part->rms_ppm = rms_ppm;
  part->time_d = time_s / ANT_SECONDS_PER_DAY;
  part->quality = quality;
}

static void
add_exponent_4 (AntNoiseModel *model, double rms_ppm, double tau_s)
{
  add (model, ANT_OSCILLATOR, rms_ppm, ANT_TAU * tau_s, sqrt (0.5));
}

static void
add_exponent_3 (AntNoiseModel *model, double rms_ppm, double tau_s)
{
  /* Least-squares fit of ln spectrum to 1/(1 + x^3) over x = 0.01..60: time scales and shares of the variance. */
  static const double tau[] = { 1.17142, 0.60668, 0.21497, 0.07376, 0.02448 };
  static const double share[] = { 0.568082, 0.385326, 0.041191, 0.004804, 0.000597 };

  for (int i = 0; i < 5; i++)
    add_exponent_4 (model, rms_ppm * sqrt (share[i]), tau_s * tau[i]);
}

static void
add_sun (AntNoiseModel *model)
{
  add_exponent_4 (model, 25.34, 1 / (ANT_TAU * 769.7e-6));
  add_exponent_4 (model, 25.34, 1 / (ANT_TAU * 2746.9e-6));
  add (model, ANT_OSCILLATOR, 11.0, 1 / 3.09e-3, 4);
  add_exponent_4 (model, 9, 8000);
  add_exponent_4 (model, 12, 5e4);
}

void
ant_noise_preset (AntNoisePreset preset, AntNoiseModel *model)
{
  memset (model, 0, sizeof *model);
  switch (preset)
    {
    case ANT_PRESET_NONE:
      break;
    case ANT_PRESET_A:
      add_exponent_4 (model, 40, 250);
      add_exponent_3 (model, 40, 3 * 3600);
      add (model, ANT_OSCILLATOR, 3, P_MODE_PERIOD_S, 4);
      model->white_ppm = 10;
      break;
    case ANT_PRESET_B:
      add_exponent_4 (model, 40, 250);
      add (model, ANT_EXPONENTIAL, 50, 10 * 3600, 0);
      add (model, ANT_OSCILLATOR, 3, P_MODE_PERIOD_S, 4);
      model->white_ppm = 5;
      break;
    case ANT_PRESET_C:
      add_exponent_4 (model, 30, 3600);
      model->white_ppm = 100;
      break;
    case ANT_PRESET_SUN:
      add_sun (model);
      break;
    case ANT_PRESET_QUIET_SUN:
      add_sun (model);
      add_exponent_4 (model, 60, 3e5);
      break;
    case ANT_PRESET_ACTIVE_SUN:
      add_sun (model);
      add_exponent_4 (model, 400, 3e5);
      break;
    }
}
