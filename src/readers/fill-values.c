/* fill-values.c - fills are exact, repeated and far from all else. */
#include "readers/fill-values.h"

#include <math.h>
#include <string.h>

#define SAMPLE 4096
#define FAR_SPANS 3.0     /* so many times the span of the middle 96 % beyond it */
#define FAR_FRACTION 0.01 /* and so much of the median */

/* Seen in real files. The weak ones may be measured once in a while: they must repeat. */
static const struct
{
  double value;
  gboolean weak;
} usual[] = {
  { -99, FALSE },     { -99.9, FALSE },   { -99.99, FALSE },   { -999, FALSE },    { -999.9, FALSE },  { -999.99, FALSE },
  { -9999, FALSE },   { -9999.9, FALSE }, { -9999.99, FALSE }, { -99999, FALSE },  { -99999.9, FALSE }, { -999999, FALSE },
  { -9900, FALSE },   { -7999, FALSE },   { -1e34, FALSE },    { 1e34, FALSE },    { -1e31, FALSE },   { 1e31, FALSE },
  { -1e30, FALSE },   { 1e30, FALSE },    { 9.969209968386869e36, FALSE },         { -32768, FALSE },  { -2147483648.0, FALSE },
  { 65535, TRUE },    { 32767, TRUE },    { 999, TRUE },       { 9999, TRUE },     { 99999, TRUE },    { 999.9, TRUE },
  { 9999.9, TRUE },   { 999.99, TRUE },   { 9999.99, TRUE },   { 99999.9, TRUE },  { -1, TRUE },       { 0, TRUE },
};

GArray *
ant_fill_stated (const GPtrArray *header)
{
  static const char *const words[] = { "missing", "fill", "no data", "nodata", "bad value", "bad data", "undefined" };
  GArray *stated = g_array_new (FALSE, FALSE, sizeof (double));
  for (guint i = 0; i < header->len; i++)
    for (gsize w = 0; w < G_N_ELEMENTS (words); w++)
      {
        const char *at = strcasestr (g_ptr_array_index (header, i), words[w]);
        if (!at)
          continue;
        at += strcspn (at, "0123456789");
        if (*at == 0)
          continue;
        if (at[-1] == '.')
          at--;
        at -= at[-1] == '-';
        double value = g_ascii_strtod (at, NULL);
        /* A year or a count in the same sentence is no fill. */
        if (value <= 0.0 || value >= 9999.0 || value == 999.0 || value == 999.9)
          g_array_append_val (stated, value);
        break;
      }
  return stated;
}

/* The numbers to judge, in one precision or the other: -99.9 as a float is not -99.9 as a double. */
typedef struct
{
  const double *wide;
  const float *narrow;
  gsize n;
} Numbers;

static double
number_at (const Numbers *numbers, gsize i)
{
  return numbers->wide ? numbers->wide[i] : (double) numbers->narrow[i];
}

static gboolean
is_same (const Numbers *numbers, double value, double fill)
{
  return numbers->wide ? value == fill : (float) value == (float) fill;
}

static int
usual_index (const Numbers *numbers, double value)
{
  for (gsize i = 0; i < G_N_ELEMENTS (usual); i++)
    if (is_same (numbers, value, usual[i].value))
      return (int) i;
  return -1;
}

static gboolean
is_stated (const Numbers *numbers, const GArray *stated, double value)
{
  for (guint i = 0; stated && i < stated->len; i++)
    if (is_same (numbers, value, g_array_index (stated, double, i)))
      return TRUE;
  return FALSE;
}

static int
compare (const void *a, const void *b)
{
  double x = *(const double *) a, y = *(const double *) b;
  return (x > y) - (x < y);
}

/* Where everything else lies, from evenly spread values that are no candidates. FALSE if there are none. */
static gboolean
usual_range (const Numbers *numbers, const GArray *stated, double *low, double *high)
{
  double sample[SAMPLE];
  gsize n = numbers->n, n_sample = 0, stride = n / SAMPLE + 1;
  for (int pass = 0; pass < 2 && n_sample == 0; pass++, stride = 1) /* the second for a few good ones among many fills */
    for (gsize i = 0; i < n && n_sample < (pass ? 1 : SAMPLE); i += stride)
      {
        double value = number_at (numbers, i);
        if (isfinite (value) && usual_index (numbers, value) < 0 && !is_stated (numbers, stated, value))
          sample[n_sample++] = value;
      }
  if (n_sample == 0)
    return FALSE;
  qsort (sample, n_sample, sizeof *sample, compare);
  *low = sample[n_sample / 50];
  *high = sample[n_sample - 1 - n_sample / 50];
  double margin = FAR_SPANS * (*high - *low) + FAR_FRACTION * fabs (sample[n_sample / 2]);
  *low -= margin;
  *high += margin;
  return TRUE;
}

static void
count_fill (GArray *fills, double value, gboolean stated)
{
  for (guint i = 0; i < fills->len; i++)
    if (g_array_index (fills, AntFill, i).value == value)
      {
        g_array_index (fills, AntFill, i).count++;
        return;
      }
  AntFill fill = { value, 1, stated };
  g_array_append_val (fills, fill);
}

static GArray *
judge (const Numbers *numbers, const GArray *stated)
{
  GArray *fills = g_array_new (FALSE, FALSE, sizeof (AntFill));
  double low = HUGE_VAL, high = -HUGE_VAL;
  gboolean lone = !usual_range (numbers, stated, &low, &high);
  gboolean any_stated = stated && stated->len > 0;
  for (gsize i = 0; i < numbers->n; i++)
    {
      double value = number_at (numbers, i);
      gboolean inside = value > low && value < high;
      if (any_stated && is_stated (numbers, stated, value))
        count_fill (fills, value, TRUE);
      else if (!inside && !isnan (value) && usual_index (numbers, value) >= 0)
        count_fill (fills, value, FALSE);
    }
  for (guint i = fills->len; i-- > 0;)
    {
      const AntFill *fill = &g_array_index (fills, AntFill, i);
      if (!fill->stated && fill->count < 2 && !lone && usual[usual_index (numbers, fill->value)].weak)
        g_array_remove_index (fills, i);
    }
  return fills;
}

GArray *
ant_fill_judge (const double *value, gsize n, const GArray *stated)
{
  return judge (&(Numbers){ .wide = value, .n = n }, stated);
}

gboolean
ant_fill_is (const GArray *fills, double value)
{
  for (guint i = 0; i < fills->len; i++)
    if (g_array_index (fills, AntFill, i).value == value)
      return TRUE;
  return FALSE;
}

gsize
ant_fill_clear (float *value, gsize n, const GArray *stated)
{
  g_autoptr (GArray) fills = judge (&(Numbers){ .narrow = value, .n = n }, stated);
  gsize n_cleared = 0;
  for (gsize i = 0; fills->len > 0 && i < n; i++)
    if (ant_fill_is (fills, (double) value[i]))
      {
        value[i] = NAN;
        n_cleared++;
      }
  return n_cleared;
}
