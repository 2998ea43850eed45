/* noise-presets.h - named noise: three models that the noise methods are judged by, and the Sun's own spectrum.
 *
 * Damped oscillators of quality 1/sqrt2 are Harvey's law with exponent 4 (spectrum 1/(1 + (2 pi f tau)^4)), time scale
 * tau = period/(2 pi). The law with exponent 3 is the sum of five such, within 3 % of it up to f = 30/(2 pi tau). */
#pragma once

#include "noise/noise-model.h"

typedef enum
{
  ANT_PRESET_NONE,
  ANT_PRESET_A, /* 40 ppm 250 s exponent 4, 40 ppm 3 h exponent 3, oscillations 3 ppm, white 10 ppm */
  ANT_PRESET_B, /* 40 ppm 250 s exponent 4, 50 ppm 10 h exponent 2, oscillations 3 ppm, white 5 ppm */
  ANT_PRESET_C, /* 30 ppm 1 h exponent 4, white 100 ppm */
  /* The Sun in total irradiance: granulation 2 x 25.34 ppm (207 s and 58 s; law of Kallinger et al. 2014, A&A 570, A41,
   * at 3.09 mHz, from memory), oscillations 11 ppm about 3.09 mHz as one oscillator of quality 4, 9 ppm 8000 s, 12 ppm
   * 5e4 s (our own round amplitudes); no white noise. */
  ANT_PRESET_SUN,
  ANT_PRESET_QUIET_SUN,  /* and 60 ppm 3e5 s for active regions, where no spots are drawn one by one */
  ANT_PRESET_ACTIVE_SUN, /* and 400 ppm */
} AntNoisePreset;

/* Fill the parts and white_ppm (free widths 0: nothing is to be fitted). */
void ant_noise_preset (AntNoisePreset preset, AntNoiseModel *model);
