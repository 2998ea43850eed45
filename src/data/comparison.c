/* comparison.c - two records onto one grid, and their ratio and difference. */
#include "data/comparison.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/robust.h"
#include "core/running-median.h"
#include "core/units.h"
#include "data/error.h"
#include "data/plain-text.h"
#include "sky/places.h"

#define FEWEST_BOTH 20
#define MOST_BINS 2e8

const double ant_common_scales_h[ANT_N_COMMON_SCALES] = { 1.0, 6.0, 24.0 };

/* TT of time 0, days from J2000.0, or with an unknown scale its own count. */
static double
origin (const AntTimeReference *time)
{
  double jd1, jd2;
  if (time->scale == ANT_SCALE_UNKNOWN
      || ant_time_convert (time->scale, time->origin_jd1, time->origin_jd2, ANT_SCALE_TT, &jd1, &jd2) != ANT_OK)
    return (time->origin_jd1 - ANT_J2000_JD) + time->origin_jd2;
  return (jd1 - ANT_J2000_JD) + jd2;
}

/* What is to be added to the witness's time. Where one scale is unknown both origins are taken as of one clock. */
static gboolean
find_shift (AntComparison *self, GError **error)
{
  const AntTimeReference *a = &self->record->time, *b = &self->witness->time;
  if (!a->origin_known || !b->origin_known)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: found times of no known origin in %s, expected dates in record and witness"),
                   self->witness->path, a->origin_known ? _("the witness") : _("the record"));
      return FALSE;
    }
  self->scales_known = a->scale != ANT_SCALE_UNKNOWN && b->scale != ANT_SCALE_UNKNOWN;
  if (self->scales_known)
    self->shift_d = origin (b) - origin (a);
  else
    self->shift_d = (b->origin_jd1 - a->origin_jd1) + (b->origin_jd2 - a->origin_jd2);
  return TRUE;
}

static gboolean
rebin_both (AntComparison *self, GError **error)
{
  const AntSeries *a = &self->record->series, *b = &self->witness->series;
  double first_d = a->start_d - 0.5 * a->step_d, span_d = (double) a->n * a->step_d;
  self->step_d = fmax (a->step_d, b->step_d);
  self->start_d = a->step_d >= b->step_d ? a->start_d : first_d + 0.5 * self->step_d;
  double n = floor (span_d / self->step_d + 1e-6);
  if (!(n >= 1.0 && n < MOST_BINS))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: found a cadence longer than the record, expected one that fits into it"),
                   self->witness->path);
      return FALSE;
    }
  self->n = (gsize) n;
  self->record_ppm = g_new (float, self->n);
  self->witness_ppm = g_new (float, self->n);
  return ant_status_to_error (ant_series_rebin (a, 0.0, self->start_d, self->step_d, self->n, self->record_ppm), _("averaging the record"),
                              error)
         && ant_status_to_error (ant_series_rebin (b, self->shift_d, self->start_d, self->step_d, self->n, self->witness_ppm),
                                 _("averaging the witness"), error);
}

/* Take the median off, and a running one if asked. */
static gboolean
level (gsize n, double step_d, double drift_d, float *value, GError **error)
{
  g_autofree double *work = g_new (double, n);
  for (gsize i = 0; i < n; i++)
    work[i] = (double) value[i];
  float median = (float) ant_median (n, work, work);
  for (gsize i = 0; i < n; i++)
    value[i] -= median;
  if (drift_d <= 0.0)
    return TRUE;
  g_autofree float *slow = g_new (float, n);
  gsize half_width = (gsize) fmin (0.5 * drift_d / step_d, (double) n);
  if (!ant_status_to_error (ant_running_median (n, value, half_width, slow), _("the running median"), error))
    return FALSE;
  for (gsize i = 0; i < n; i++)
    value[i] -= slow[i];
  return TRUE;
}

static gboolean
compare (AntComparison *self, GError **error)
{
  self->ratio_ppm = g_new (float, self->n);
  self->difference_ppm = g_new (float, self->n);
  for (gsize i = 0; i < self->n; i++)
    {
      double a = (double) self->record_ppm[i] * ANT_PPM, b = (double) self->witness_ppm[i] * ANT_PPM;
      self->n_both += !isnan (a) && !isnan (b);
      self->ratio_ppm[i] = (float) (((1.0 + a) / (1.0 + b) - 1.0) / ANT_PPM);
      self->difference_ppm[i] = (float) ((a - b * self->witness->median / self->record->median) / ANT_PPM);
      if (!isfinite (self->ratio_ppm[i]))
        self->ratio_ppm[i] = self->difference_ppm[i] = NAN;
    }
  if (self->n_both < FEWEST_BOTH)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: found %zu averages in common with the record, expected %d or more"),
                   self->witness->path, self->n_both, FEWEST_BOTH);
      return FALSE;
    }
  self->level_ratio = self->record->median / self->witness->median;
  return level (self->n, self->step_d, self->drift_d, self->ratio_ppm, error)
         && level (self->n, self->step_d, self->drift_d, self->difference_ppm, error);
}

static void
measure (AntComparison *self)
{
  g_autofree double *work = g_new (double, 2 * self->n);
  for (gsize i = 0; i < self->n; i++)
    work[i] = (double) self->ratio_ppm[i];
  self->ratio_scatter_ppm = ant_mad_sigma (self->n, work, work);
  for (int k = 0; k < ANT_N_COMMON_SCALES; k++)
    {
      double step_d = ant_common_scales_h[k] / ANT_HOURS_PER_DAY;
      self->common[k] = (AntCommonNoise){ 0, (double) NAN, (double) NAN, (double) NAN, (double) NAN };
      gsize n = (gsize) ((double) self->n * self->step_d / step_d);
      if (step_d < self->step_d * (1.0 - 1e-6) || n < 3 || n > self->n)
        continue;
      g_autofree float *a = g_new (float, n), *b = g_new (float, n);
      double start_d = self->start_d + 0.5 * (step_d - self->step_d);
      if (ant_series_rebin (&self->record->series, 0.0, start_d, step_d, n, a) == ANT_OK
          && ant_series_rebin (&self->witness->series, self->shift_d, start_d, step_d, n, b) == ANT_OK)
        self->common[k] = ant_common_noise (n, a, b, work);
    }
}

AntComparison *
ant_comparison_new (AntRecord *record, AntRecord *witness, double drift_d, GError **error)
{
  g_autoptr (AntComparison) self = g_new0 (AntComparison, 1);
  self->ref_count = 1;
  self->record = ant_record_ref (record);
  self->witness = ant_record_ref (witness);
  self->drift_d = drift_d;
  if (!find_shift (self, error) || !rebin_both (self, error) || !compare (self, error))
    return NULL;
  measure (self);
  return g_steal_pointer (&self);
}

AntComparison *
ant_comparison_ref (AntComparison *comparison)
{
  g_atomic_int_inc (&comparison->ref_count);
  return comparison;
}

void
ant_comparison_unref (AntComparison *comparison)
{
  if (!comparison || !g_atomic_int_dec_and_test (&comparison->ref_count))
    return;
  ant_record_unref (comparison->record);
  ant_record_unref (comparison->witness);
  g_free (comparison->record_ppm);
  g_free (comparison->witness_ppm);
  g_free (comparison->ratio_ppm);
  g_free (comparison->difference_ppm);
  g_free (comparison);
}

double
ant_comparison_correlation (const AntComparison *comparison, double duration_d, double *sigma)
{
  int best = -1;
  double nearest = HUGE_VAL;
  for (int k = 0; k < ANT_N_COMMON_SCALES; k++)
    {
      double off = fabs (log (duration_d * ANT_HOURS_PER_DAY / ant_common_scales_h[k]));
      if (isfinite (comparison->common[k].correlation) && off < nearest)
        {
          nearest = off;
          best = k;
        }
    }
  *sigma = best >= 0 ? comparison->common[best].sigma : (double) NAN;
  return best >= 0 ? comparison->common[best].correlation : (double) NAN;
}

static void add (GPtrArray *words, const char *format, ...) G_GNUC_PRINTF (2, 3);

static void
add (GPtrArray *words, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_ptr_array_add (words, g_strdup_vprintf (format, arguments));
  va_end (arguments);
}

GPtrArray *
ant_comparison_words (const AntComparison *self)
{
  GPtrArray *words = g_ptr_array_new_with_free_func (g_free);
  g_autofree char *step = ant_length_text (self->step_d);
  add (words, _("%zu averages of %s in common; record over witness is %.6f, its scatter %.4g ppm."), self->n_both, step,
       self->level_ratio, self->ratio_scatter_ppm);
  if (self->drift_d > 0.0)
    {
      g_autofree char *drift = ant_length_text (self->drift_d);
      add (words, _("From ratio and difference a running median of %s was taken out."), drift);
    }
  if (!self->scales_known)
    add (words, _("The time scale of one is unknown: both clocks were taken to be one, which may be a minute off."));
  for (int k = 0; k < ANT_N_COMMON_SCALES; k++)
    if (isfinite (self->common[k].correlation))
      add (words, _("Noise over %g h: record %.3g ppm, witness %.3g ppm, correlation %.2f +- %.2f."), ant_common_scales_h[k],
           self->common[k].rms_a_ppm, self->common[k].rms_b_ppm, self->common[k].correlation, self->common[k].sigma);
  return words;
}
