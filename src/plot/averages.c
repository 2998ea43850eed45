/* averages.c - means and standard errors, merged two by two from level to level. */
#include "plot/averages.h"
#include <glib.h>
#include <math.h>

/* Count, mean and sum of squares about it: they merge without loss of digits (Chan, Golub & LeVeque 1983). */
typedef struct
{
  float count, mean, squares;
} Moments;

static Moments
moments_of (const float *value, size_t n)
{
  double sum = 0, squares = 0;
  size_t count = 0;
  for (size_t i = 0; i < n; i++)
    {
      gboolean seen = !isnan (value[i]);
      sum += seen ? (double) value[i] : 0;
      count += seen;
    }
  if (count == 0)
    return (Moments) { 0, NAN, 0 };
  double mean = sum / (double) count;
  for (size_t i = 0; i < n; i++)
    {
      double off = isnan (value[i]) ? 0 : (double) value[i] - mean;
      squares += off * off;
    }
  return (Moments) { (float) count, (float) mean, (float) squares };
}

static Moments
merged (Moments a, Moments b)
{
  if (a.count == 0 || b.count == 0)
    return a.count == 0 ? b : a;
  double na = (double) a.count, nb = (double) b.count, n = na + nb, apart = (double) b.mean - (double) a.mean;
  return (Moments) { (float) n, (float) ((double) a.mean + apart * nb / n),
                     (float) ((double) a.squares + (double) b.squares + apart * apart * na * nb / n) };
}

static void
publish (AntAverageLevel *level, size_t n, size_t samples, const Moments *bin, double least)
{
  level->n = n;
  level->samples = samples;
  level->mean = g_new (float, n);
  level->error = g_new (float, n);
  for (size_t b = 0; b < n; b++)
    {
      double count = (double) bin[b].count;
      gboolean enough = count >= least;
      level->mean[b] = enough ? bin[b].mean : NAN;
      level->error[b] = !enough ? NAN : count < 2 ? 0 : (float) sqrt ((double) bin[b].squares / (count * (count - 1)));
    }
}

AntAverages *
ant_averages_new (size_t n, const float *value, size_t bin)
{
  AntAverages *averages = g_new0 (AntAverages, 1);
  size_t bins = (n + bin - 1) / bin;
  g_autofree Moments *moments = g_new (Moments, bins);
  double least = MAX (1.0, ceil ((double) bin / 4));
  for (size_t b = 0; b < bins; b++)
    moments[b] = moments_of (value + b * bin, MIN (bin, n - b * bin));
  while (bins > 0)
    {
      publish (&averages->level[averages->n_levels++], bins, bin, moments, least);
      if (bins == 1)
        break;
      size_t half = (bins + 1) / 2;
      for (size_t b = 0; b < half; b++)
        moments[b] = 2 * b + 1 < bins ? merged (moments[2 * b], moments[2 * b + 1]) : moments[2 * b];
      bins = half;
      bin *= 2;
    }
  return averages;
}

void
ant_averages_free (AntAverages *averages)
{
  if (!averages)
    return;
  for (size_t l = 0; l < averages->n_levels; l++)
    {
      g_free (averages->level[l].mean);
      g_free (averages->level[l].error);
    }
  g_free (averages);
}

const AntAverageLevel *
ant_averages_level (const AntAverages *averages, double least)
{
  for (size_t l = 0; l < averages->n_levels; l++)
    if ((double) averages->level[l].samples >= least || l + 1 == averages->n_levels)
      return &averages->level[l];
  return NULL;
}
