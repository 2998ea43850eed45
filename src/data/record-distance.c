/* record-distance.c - the yearly swing looked for, and taken out or put in. */
#include "data/record-distance.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/robust.h"
#include "core/units.h"
#include "data/error.h"
#include "data/plain-text.h"
#include "sky/places.h"
#include "sky/sun-distance.h"

#define LEAST_SPAN_D 60.0
#define SUN_CORRELATION_D 13.0 /* half a rotation: so far apart days are independent */
#define MOST_SIGMA 0.15        /* of a slope that tells 0 from 1 */
#define NEAR_SLOPE 0.3
#define LIKE_TSI 0.06
#define MOST_DAYS 1500.0       /* looked at */
#define CLIP_SIGMA 4.0
#define N_CLIPS 3
#define TABLE_STEP_D 0.25      /* of the Earth's factor; a cubic through four of them is good to 1e-9 */
#define LOW_ORBIT_DISTANCE_PPM 94.0 /* 2 x 7000 km of 1 au */
#define LOW_ORBIT_DOPPLER_PPM 51.0  /* 2 x 7.6 km/s of c */

static double
swing_at (double tt_d)
{
  AntSunDistance distance;
  return ant_sun_distance (NULL, tt_d, &distance) == ANT_OK ? 1.0 / ant_one_au_factor (&distance, TRUE) : (double) NAN;
}

/* Slope, its intercept and the rms about it, of the pairs whose weight is not 0. */
static void
fit_line (gsize n, const double *x, const double *y, const guint8 *kept, double *slope, double *level, double *rms, double *spread)
{
  double count = 0.0, mean_x = 0.0, mean_y = 0.0, xx = 0.0, xy = 0.0, square = 0.0;
  for (gsize i = 0; i < n; i++)
    if (kept[i])
      {
        count += 1.0;
        mean_x += x[i];
        mean_y += y[i];
      }
  mean_x /= count;
  mean_y /= count;
  for (gsize i = 0; i < n; i++)
    if (kept[i])
      {
        xx += (x[i] - mean_x) * (x[i] - mean_x);
        xy += (x[i] - mean_x) * (y[i] - mean_y);
      }
  *slope = xy / xx;
  *level = mean_y - *slope * mean_x;
  for (gsize i = 0; i < n; i++)
    if (kept[i])
      square += (y[i] - *level - *slope * x[i]) * (y[i] - *level - *slope * x[i]);
  *rms = sqrt (square / count);
  *spread = sqrt (xx / count);
}

AntYearlySwing
ant_yearly_swing (gsize n, const double *tt_d, const double *value)
{
  AntYearlySwing swing = { (double) NAN, (double) NAN };
  if (n < 10 || tt_d[n - 1] - tt_d[0] < LEAST_SPAN_D)
    return swing;
  g_autofree double *x = g_new (double, n), *y = g_new (double, n), *work = g_new (double, n);
  g_autofree guint8 *kept = g_new (guint8, n);
  double median = ant_median (n, value, work), level = 0.0, rms = 0.0, spread = 0.0;
  for (gsize i = 0; i < n; i++)
    {
      x[i] = swing_at (tt_d[i]);
      y[i] = value[i] / median;
      kept[i] = isfinite (x[i]) && isfinite (y[i]);
      if (!kept[i] && !isfinite (x[i]))
        return swing;
    }
  for (int pass = 0; pass < N_CLIPS; pass++)
    {
      fit_line (n, x, y, kept, &swing.slope, &level, &rms, &spread);
      for (gsize i = 0; i < n; i++)
        work[i] = y[i] - level - swing.slope * x[i];
      double sigma = ant_mad_sigma (n, work, y);
      for (gsize i = 0; i < n; i++)
        {
          y[i] = value[i] / median;
          kept[i] = fabs (y[i] - level - swing.slope * x[i]) <= CLIP_SIGMA * sigma + 1e-9;
        }
    }
  double independent = fmax (2.0, (tt_d[n - 1] - tt_d[0]) / SUN_CORRELATION_D - 2.0);
  swing.sigma = rms / (spread * sqrt (independent));
  return swing;
}

/* TT of the record's time 0, days from J2000.0. An unknown scale counts as UTC: a minute is 0.5 ppm. NaN without an origin. */
static double
origin_tt_d (const AntRecord *record)
{
  const AntTimeReference *time = &record->time;
  double jd1, jd2;
  AntTimeScale scale = time->scale == ANT_SCALE_UNKNOWN ? ANT_SCALE_UTC : time->scale;
  if (!time->origin_known || ant_time_convert (scale, time->origin_jd1, time->origin_jd2, ANT_SCALE_TT, &jd1, &jd2) != ANT_OK)
    return (double) NAN;
  return (jd1 - ANT_J2000_JD) + jd2;
}

/* From a stamp to the middle of its exposure, as far as both are known before the grid is laid. */
static double
shift_d (const AntRecord *record, const AntGridOptions *options)
{
  AntStampPlace stamp = options->stamp != ANT_AT_UNKNOWN ? options->stamp : record->stamp;
  double exposure_d = options->exposure_d > 0.0 ? options->exposure_d : record->exposure_known ? record->exposure_d : 0.0;
  return stamp == ANT_AT_START ? 0.5 * exposure_d : stamp == ANT_AT_END ? -0.5 * exposure_d : 0.0;
}

/* The median of each day's good values; of a long record every so many days. *level is the median of those. */
static AntYearlySwing
measure (const AntRecord *record, const AntRowOrder *order, double origin_d, double *level)
{
  double stride_d = fmax (1.0, floor ((order->time_d[order->n - 1] - order->time_d[0]) / MOST_DAYS)), next_d = -HUGE_VAL;
  g_autoptr (GArray) days = g_array_new (FALSE, FALSE, sizeof (double)), levels = g_array_new (FALSE, FALSE, sizeof (double));
  g_autofree double *work = g_new (double, order->n);
  for (gsize k = 0; k < order->n;)
    {
      double day = floor (order->time_d[k]);
      gsize n = 0;
      for (; k < order->n && floor (order->time_d[k]) == day; k++)
        if (ant_row_used (record, order->row[k]))
          work[n++] = record->value[order->row[k]];
      if (n == 0 || day < next_d)
        continue;
      double tt_d = origin_d + day + 0.5, median = ant_median (n, work, work);
      g_array_append_val (days, tt_d);
      g_array_append_val (levels, median);
      next_d = day + stride_d;
    }
  *level = ant_median (levels->len, (const double *) (const void *) levels->data, work);
  return ant_yearly_swing (days->len, (const double *) (const void *) days->data, (const double *) (const void *) levels->data);
}

/* What name and header say of it; unknown where they are silent. */
static AntDistance
by_words (const AntRecord *record)
{
  static const char *const one_au[] = { "1au", "1_au", "1 au", "1-au", "one au", "one_au", "1.0 au", "astronomical unit" };
  static const char *const observer[] = { "true earth", "true_earth", "trueearth", "earth distance", "earth_distance",
                                          "at_earth", "at earth", "observer" };
  const char *const texts[] = { record->value_name, record->value_remark };
  for (gsize t = 0; t < G_N_ELEMENTS (texts); t++)
    {
      g_autofree char *lower = texts[t] ? g_ascii_strdown (texts[t], -1) : NULL;
      for (gsize i = 0; lower && i < G_N_ELEMENTS (one_au); i++)
        if (strstr (lower, one_au[i]))
          return ANT_DISTANCE_ONE_AU;
      for (gsize i = 0; lower && i < G_N_ELEMENTS (observer); i++)
        if (strstr (lower, observer[i]))
          return ANT_DISTANCE_OBSERVER;
    }
  return ANT_DISTANCE_UNKNOWN;
}

static AntDistance
by_swing (const AntYearlySwing *swing)
{
  if (!(swing->sigma < MOST_SIGMA))
    return ANT_DISTANCE_UNKNOWN;
  return fabs (swing->slope - 1.0) < NEAR_SLOPE ? ANT_DISTANCE_OBSERVER
         : fabs (swing->slope) < NEAR_SLOPE     ? ANT_DISTANCE_ONE_AU
                                                : ANT_DISTANCE_UNKNOWN;
}

static const char *
place_words (AntDistance distance)
{
  return distance == ANT_DISTANCE_ONE_AU ? _("at 1 au") : distance == ANT_DISTANCE_OBSERVER ? _("at the observer's distance")
                                                                                           : _("at an unknown distance");
}

static void
say (AntRecord *record, AntDistance named, AntDistance swung, double span_d)
{
  char slope[ANT_N_NUMBER_TEXT], sigma[ANT_N_NUMBER_TEXT];
  ant_number_text (slope, "%.3f", record->swing);
  ant_number_text (sigma, "%.3f", record->swing_sigma);
  if (swung != ANT_DISTANCE_UNKNOWN)
    ant_record_say (record, _("Values stand %s: %s +- %s of the yearly swing of 6.9 %% by the Earth's distance is in them."),
                    place_words (swung), slope, sigma);
  if (swung != ANT_DISTANCE_UNKNOWN && named != ANT_DISTANCE_UNKNOWN && named != swung)
    ant_record_say (record, _("Their name says that they stand %s: the swing is believed."), place_words (named));
  if (swung == ANT_DISTANCE_UNKNOWN && named != ANT_DISTANCE_UNKNOWN)
    ant_record_say (record, _("Values stand %s by their name; the swing does not tell."), place_words (named));
  if (swung != ANT_DISTANCE_UNKNOWN || named != ANT_DISTANCE_UNKNOWN)
    return;
  if (span_d < LEAST_SPAN_D)
    ant_record_say (record, _("Whether values stand at 1 au or at the observer's distance is unknown: no name says it, and less than "
                              "60 days do not show the yearly swing."));
  else if (isfinite (record->swing))
    ant_record_say (record, _("Whether values stand at 1 au or at the observer's distance is unknown: no name says it, and the yearly "
                              "swing is not plain (%s +- %s of it is in them)."), slope, sigma);
}

/* The Earth's factor four times a day over the record, and one step beyond. */
static double *
earth_factors (double first_d, double last_d, gboolean with_doppler, gsize *n)
{
  *n = (gsize) ceil ((last_d - first_d) / TABLE_STEP_D) + 4;
  double *factor = g_new (double, *n);
  for (gsize i = 0; i < *n; i++)
    {
      AntSunDistance distance;
      double tt_d = first_d + ((double) i - 1.0) * TABLE_STEP_D;
      factor[i] = ant_sun_distance (NULL, tt_d, &distance) == ANT_OK ? ant_one_au_factor (&distance, with_doppler) : (double) NAN;
    }
  return factor;
}

/* A cubic through the four around (Lagrange). */
static double
read_factor (const double *factor, double first_d, double tt_d)
{
  double place = (tt_d - first_d) / TABLE_STEP_D, whole = floor (place), x = place - whole;
  const double *f = factor + (gsize) whole;
  return f[0] * (-x * (x - 1.0) * (x - 2.0) / 6.0) + f[1] * ((x + 1.0) * (x - 1.0) * (x - 2.0) / 2.0)
         + f[2] * (-(x + 1.0) * x * (x - 2.0) / 2.0) + f[3] * ((x + 1.0) * x * (x - 1.0) / 6.0);
}

static double
factor_at (const AntGridOptions *options, const double *table, double first_d, double tt_d)
{
  AntSunDistance distance;
  if (!options->observer || options->observer->kind == ANT_OBSERVER_EARTH)
    return read_factor (table, first_d, tt_d);
  return ant_sun_distance (options->observer, tt_d, &distance) == ANT_OK ? ant_one_au_factor (&distance, !options->no_doppler)
                                                                        : (double) NAN;
}

/* Multiply (or divide) every row by its factor. Rows for which the observer is nowhere become fills. */
static gboolean
convert (AntRecord *record, const AntRowOrder *order, const AntGridOptions *options, double origin_d, gboolean to_one_au, GError **error)
{
  gsize n, n_lost = 0;
  double first_d = origin_d + order->time_d[0] + shift_d (record, options) - 1.0, least = HUGE_VAL, greatest = 0.0;
  double last_d = origin_d + order->time_d[order->n - 1] + 1.0;
  g_autofree double *table = earth_factors (first_d, last_d, !options->no_doppler, &n);
  for (gsize k = 0; k < order->n; k++)
    {
      guint32 row = order->row[k];
      double factor = factor_at (options, table, first_d, origin_d + order->time_d[k] + shift_d (record, options));
      if (!isfinite (factor))
        {
          record->flags[row] |= ANT_FLAG_FILL;
          n_lost++;
          continue;
        }
      least = fmin (least, factor);
      greatest = fmax (greatest, factor);
      record->value[row] *= to_one_au ? factor : 1.0 / factor;
      if (record->error)
        record->error[row] *= to_one_au ? factor : 1.0 / factor;
    }
  if (n_lost == order->n)
    return ant_record_refuse (record, error, _("found no time at which the observer's distance is known, expected years 1900 to 2100 and "
                                               "positions over the record"));
  char low[ANT_N_NUMBER_TEXT], high[ANT_N_NUMBER_TEXT];
  ant_record_say (record, to_one_au ? _("Values were brought to 1 au: multiplied by (r/au)^2%s, %s to %s.")
                                    : _("Values were brought to the observer's distance: divided by (r/au)^2%s, %s to %s."),
                  options->no_doppler ? "" : _(" (1 + 2 v/c)"), ant_number_text (low, "%.6f", least),
                  ant_number_text (high, "%.6f", greatest));
  if (n_lost > 0)
    ant_record_say (record, _("Rows at which the observer's place is not known, left out: %zu."), n_lost);
  if (!options->observer || options->observer->kind == ANT_OBSERVER_EARTH)
    ant_record_say (record, _("The Earth's centre stands for the observer: in a low orbit up to %.0f ppm of its distance and %.0f ppm of its "
                              "Doppler shift remain."), LOW_ORBIT_DISTANCE_PPM, LOW_ORBIT_DOPPLER_PPM);
  return TRUE;
}

/* A star's flux, or a relative one, stands nowhere in the solar system. Without a unit the level tells total irradiance. */
static gboolean
is_irradiance (const AntRecord *record, double level)
{
  if (record->value_unit)
    return strstr (record->value_unit, "W/m2") != NULL;
  return fabs (level / ANT_TSI_W_M2 - 1.0) < LIKE_TSI;
}

gboolean
ant_record_settle_distance (AntRecord *record, const AntRowOrder *order, const AntGridOptions *options, GError **error)
{
  AntDistanceWish wish = (AntDistanceWish) options->distance;
  double origin_d = origin_tt_d (record), span_d = order->time_d[order->n - 1] - order->time_d[0];
  AntDistance named = by_words (record), swung = ANT_DISTANCE_UNKNOWN;
  AntYearlySwing swing = { (double) NAN, (double) NAN };
  double level = (double) NAN;
  if (isfinite (origin_d) && (!record->value_unit || is_irradiance (record, level)))
    swing = measure (record, order, origin_d, &level);
  gboolean sensible = is_irradiance (record, level);
  if (sensible)
    swung = by_swing (&swing);
  else
    swing = (AntYearlySwing){ (double) NAN, (double) NAN };
  record->swing = swing.slope;
  record->swing_sigma = swing.sigma;
  record->distance = swung != ANT_DISTANCE_UNKNOWN ? swung : named;
  if (sensible || named != ANT_DISTANCE_UNKNOWN)
    say (record, named, swung, span_d);
  if (wish == ANT_DISTANCE_AS_IS)
    return TRUE;
  if (!isfinite (origin_d))
    return ant_record_refuse (record, error, _("found times of no known origin, expected dates, from which the distance of the Sun follows "
                                               "(setting distance)"));
  AntDistance wanted = wish == ANT_DISTANCE_TO_ONE_AU ? ANT_DISTANCE_ONE_AU : ANT_DISTANCE_OBSERVER;
  if (record->distance == wanted)
    {
      ant_record_say (record, _("Values stand %s already: they are left as they are."), place_words (wanted));
      return TRUE;
    }
  if (!convert (record, order, options, origin_d, wanted == ANT_DISTANCE_ONE_AU, error))
    return FALSE;
  record->distance = wanted;
  return TRUE;
}
