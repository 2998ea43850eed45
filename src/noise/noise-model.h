/* noise-model.h - the Sun's and the instrument's noise as a sum of simple random processes.
 *
 * A damped oscillator driven by white noise has the power spectrum of Harvey's law with exponent 4 when its quality is
 * 1/sqrt2 (Harvey 1985; Anderson, Duvall & Jefferies 1990, ApJ 364, 699); an exponentially correlated part has exponent 2.
 * Sums of both with white measurement noise cover what irradiance records show, and every such sum has a covariance
 * that factors in linear time (whitener.h).
 *
 * One-sided power spectra, so that the integral over f > 0 is the variance. Times in days, values in ppm. */
#pragma once

#include <stddef.h>
#include "core/status.h"

#define ANT_MAX_PARTS 24

typedef enum
{
  ANT_OSCILLATOR,  /* rms, undamped period, quality */
  ANT_EXPONENTIAL, /* rms, correlation time; quality unused */
} AntPartKind;

/* One component. A parameter is fitted if its prior width is > 0, else held. Priors are normal in ln(value). */
typedef struct
{
  AntPartKind kind;
  double rms_ppm;
  double time_d;  /* oscillator: undamped period 2 pi/w0; exponential: correlation time */
  double quality; /* oscillator only, never fitted */
  double rms_prior_ppm, rms_width_ln;
  double time_prior_d, time_width_ln;
} AntNoisePart;

typedef struct
{
  size_t n_parts;
  AntNoisePart part[ANT_MAX_PARTS];
  /* Variance of one measurement: white_ppm^2 / bin_count + error_scale^2 * stated_error^2. */
  double white_ppm, white_prior_ppm, white_width_ln;
  double error_scale, error_scale_width_ln; /* prior centred on 1; the width is 0 when no errors are stated */
} AntNoiseModel;

/* A line locked to an orbit or another clock: a period and its harmonics, each a narrow oscillator. */
typedef struct
{
  double period_d;
  int harmonics;
} AntNoiseLine;

/* ANT_BAD_ARGUMENT if a number of the model has no meaning: a quality of 1/2 or less, a time that is not positive, a
 * negative or infinite amplitude, too many parts. Spectra and covariances of such a part are NaN. */
AntStatus ant_noise_model_check (const AntNoiseModel *model);

/* The default bank for a cadence (method page "noise"): slow oscillator with a period about 20 d, one about 2 d, one
 * with a time scale (period / 2 pi) about 3 h, two exponentials about 8 h and 25 min, white; below a 5-min cadence also
 * granulation (about 4.5 min time scale) and the 3.1 mHz oscillations. Parts that the cadence cannot resolve are left
 * out, save the three slowest, which are stretched to a few cadences. Starting values are scaled to `rms_ppm`, the
 * scatter of the record, and `white_ppm`, the scatter of its neighbouring differences (over sqrt2).
 * lines [n_lines] are added with quality 30, their periods held; harmonics beyond the Nyquist frequency or
 * ANT_MAX_PARTS are dropped. */
void ant_noise_model_default (AntNoiseModel *model, double step_d, double rms_ppm, double white_ppm, int has_errors,
                              size_t n_lines, const AntNoiseLine *lines);

/* One-sided power spectral density of the parts (without white), ppm^2 per (cycle/day), at f_cd cycles/day. */
double ant_noise_model_psd (const AntNoiseModel *model, double f_cd);
double ant_noise_part_psd (const AntNoisePart *part, double f_cd);
/* Autocovariance at a lag, ppm^2 (without white). */
double ant_noise_model_covariance (const AntNoiseModel *model, double lag_d);
double ant_noise_part_covariance (const AntNoisePart *part, double lag_d);
/* PSD of the white part sampled each step_d: 2 r step_d with r its variance. */
double ant_noise_white_psd (double variance_ppm2, double step_d);

/* Variance of one measurement. error_ppm 0 and bin_count 1 where the record states none. */
double ant_noise_model_variance (const AntNoiseModel *model, double error_ppm, double bin_count);

/* What a part is, judged after the fit by where its power lies: "rotation", "days", "hours", "granulation",
 * "oscillations", "line". Static, untranslated. */
const char *ant_noise_part_role (const AntNoisePart *part);

/* The free parameters as logarithms, in a fixed order (for each part rms then time, then white, then error scale);
 * returns how many. theta may be NULL to count. */
size_t ant_noise_model_get (const AntNoiseModel *model, double *theta_ln);
void ant_noise_model_set (AntNoiseModel *model, const double *theta_ln);
/* -ln prior of the free parameters, up to a constant. */
double ant_noise_model_penalty (const AntNoiseModel *model);
/* Centre every prior on the present value with width `width_ln` (free parameters only). */
void ant_noise_model_centre_priors (AntNoiseModel *model, double width_ln);
/* A name for free parameter i: writes like "hours.rms", "days-2.time", "white" or "error-scale" into text[size]. */
void ant_noise_model_parameter_name (const AntNoiseModel *model, size_t i, size_t size, char *text);
