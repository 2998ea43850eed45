/* false-alarm.c - the geometry of the searched range, and the expected number of chance dips. */
#include "search/false-alarm.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/units.h"

#define EPOCHS 24
#define DURATIONS 9
#define EDGES 4
#define SHAPES 4 /* the shape itself, moved in time, in duration, in edge */

/* The calibration: see docs/search.md. */
#define YIELD 1.0
#define SOFTNESS_AT_30_D 0.0
#define SOFTNESS_POWER 0.5

/* Four neighbouring shapes, and their six pair sums, on one window: two passes of lanes. */
typedef struct
{
  size_t length;
  double *lane[2];   /* [length][ANT_LANES] */
  double whole;      /* sum of the shape itself */
  double centre;     /* of the shape, in places after the first of the window */
  double step[3];    /* moved by: places, places of duration, ln edge */
} Quartet;

static const unsigned char pair[6][2] = { { 0, 1 }, { 0, 2 }, { 0, 3 }, { 1, 2 }, { 1, 3 }, { 2, 3 } };

static AntStatus
draw_quartet (Quartet *q, double duration_d, double edge_d, const AntRefineOptions *o)
{
  double h_d = 0.2 * edge_d, h = h_d / o->step_d;
  double d[SHAPES] = { duration_d, duration_d, duration_d + 2 * h_d, duration_d };
  double e[SHAPES] = { edge_d, edge_d, edge_d, edge_d / 1.2 };
  double reach = 0.5 * (duration_d + 2 * h_d + o->exposure_d) / o->step_d;
  q->centre = ceil (reach) + 1;
  q->length = (size_t) (2 * q->centre + h) + 3;
  q->step[0] = h;
  q->step[1] = 2 * h;
  q->step[2] = log (1.2);
  q->whole = 0;
  double *block = calloc (2 * q->length * ANT_LANES, sizeof *block);
  if (!block)
    return ANT_NO_MEMORY;
  q->lane[0] = block;
  q->lane[1] = block + q->length * ANT_LANES;
  for (size_t s = 0; s < SHAPES; s++)
    {
      AntCrossingShape shape;
      ant_crossing_shape_init (&shape, d[s], fmin (e[s], 0.5 * d[s]), ANT_SHAPE_IMPACT, o->limb_darkening);
      for (size_t j = 0; j < q->length; j++)
        block[j * ANT_LANES + s]
          = -ant_crossing_shape_mean (&shape, ((double) j - q->centre - (s == 1 ? h : 0)) * o->step_d, o->exposure_d);
    }
  for (size_t j = 0; j < q->length; j++)
    {
      q->whole += block[j * ANT_LANES];
      for (size_t p = 0; p < 6; p++)
        {
          double sum = block[j * ANT_LANES + pair[p][0]] + block[j * ANT_LANES + pair[p][1]];
          if (p < 4)
            block[j * ANT_LANES + SHAPES + p] = sum;
          else
            q->lane[1][j * ANT_LANES + p - 4] = sum;
        }
    }
  return ANT_OK;
}

/* Covariance of the field's three derivatives at one epoch, symmetric 3x3; 0 if the shape is not covered there. */
static int
metric (const AntWhitener *whitener, const Quartet *q, ptrdiff_t first, double least_coverage, double lambda[9])
{
  double energy[2][ANT_LANES], moment[ANT_LANES], weight[2][ANT_LANES], inner[SHAPES][SHAPES];
  for (int pass = 0; pass < 2; pass++)
    ant_whitener_energies (whitener, NULL, first, q->length, q->lane[pass], energy[pass], moment, weight[pass]);
  if (weight[0][0] / q->whole < least_coverage)
    return 0;
  for (int s = 0; s < SHAPES; s++)
    if (!((inner[s][s] = energy[0][s]) > 0))
      return 0;
  for (int p = 0; p < 6; p++)
    {
      int a = pair[p][0], b = pair[p][1];
      double both = p < 4 ? energy[0][SHAPES + p] : energy[1][p - 4];
      inner[a][b] = inner[b][a] = 0.5 * (both - inner[a][a] - inner[b][b]);
    }
  double norm[SHAPES];
  for (int s = 0; s < SHAPES; s++)
    norm[s] = sqrt (inner[s][s]);
  for (int i = 0; i < 3; i++)
    for (int j = 0; j < 3; j++)
      {
        double ij = inner[i + 1][j + 1] / (norm[i + 1] * norm[j + 1]);
        double i0 = inner[i + 1][0] / (norm[i + 1] * norm[0]), j0 = inner[j + 1][0] / (norm[j + 1] * norm[0]);
        lambda[3 * i + j] = (ij - i0 - j0 + 1) / (q->step[i] * q->step[j]);
      }
  return 1;
}

/* Contents of the unit cell at one point: along t; over t and D; over t and edge; over all three. */
static void
contents (const double l[9], double content[4])
{
  double td = l[0] * l[4] - l[1] * l[3], te = l[0] * l[8] - l[2] * l[6];
  double all = l[0] * (l[4] * l[8] - l[5] * l[7]) - l[1] * (l[3] * l[8] - l[5] * l[6]) + l[2] * (l[3] * l[7] - l[4] * l[6]);
  content[0] = sqrt (fmax (l[0], 0));
  content[1] = sqrt (fmax (td, 0));
  content[2] = sqrt (fmax (te, 0));
  content[3] = sqrt (fmax (all, 0));
}

/* Mean contents over a fixed sample of epochs. */
static void
average_contents (const AntWhitener *whitener, const Quartet *q, double from, double to, double mean[4])
{
  memset (mean, 0, 4 * sizeof *mean);
  for (int e = 0; e < EPOCHS; e++)
    {
      double lambda[9], content[4];
      double place = from + (to - from) * ((double) e + fmod (0.5 + 0.618034 * e, 1.0)) / EPOCHS;
      if (!metric (whitener, q, (ptrdiff_t) floor (place - q->centre), 0.3, lambda))
        continue;
      contents (lambda, content);
      for (int c = 0; c < 4; c++)
        mean[c] += content[c] / EPOCHS;
    }
}

AntStatus
ant_chance_field_measure (AntChanceField *field, const AntWhitener *whitener, const AntTemplateBank *bank,
                          const AntRefineOptions *options, double from, double to)
{
  double low = fmax (from, 0), high = fmin (to, (double) ant_whitener_n (whitener)), places = high - low;
  double shortest = options->shortest_d, widest = (options->longest_d - shortest) / options->step_d;
  const unsigned *place = ant_whitener_places (whitener);
  *field = (AntChanceField){ 0 };
  for (size_t i = 0; i < ant_whitener_observed (whitener); i++)
    field->observed_d += place[i] >= low && place[i] < high ? options->step_d : 0;
  for (int d = 0; d < DURATIONS && places > 0; d++)
    {
      double duration_d = shortest + (options->longest_d - shortest) * d / (DURATIONS - 1);
      double along_d = widest / (DURATIONS - 1) * (d == 0 || d == DURATIONS - 1 ? 0.5 : 1);
      double range = log (fmax (0.5 * duration_d / options->least_edge_d, 1.05));
      for (int e = 0; e < EDGES; e++)
        {
          Quartet q;
          double edge_d = fmin (options->least_edge_d * exp (range * e / (EDGES - 1)), 0.49 * duration_d), mean[4];
          double along_e = range / (EDGES - 1) * (e == 0 || e == EDGES - 1 ? 0.5 : 1);
          int end_d = d == 0 || d == DURATIONS - 1, end_e = e == 0 || e == EDGES - 1;
          AntStatus status = draw_quartet (&q, duration_d, edge_d, options);
          if (status)
            return status;
          average_contents (whitener, &q, low, high, mean);
          free (q.lane[0]);
          field->volume += places * along_d * along_e * mean[3];
          field->area += 0.5 * places * ((end_e ? along_d * mean[1] : 0) + (end_d ? along_e * mean[2] : 0));
          field->length += 0.25 * places * (end_d && end_e ? mean[0] : 0);
        }
    }
  return ANT_OK;
}

void
ant_chance_field_add (AntChanceField *sum, const AntChanceField *field)
{
  sum->length += field->length;
  sum->area += field->area;
  sum->volume += field->volume;
  sum->observed_d += field->observed_d;
}

void
ant_chance_law_init (AntChanceLaw *law, const AntChanceField *field)
{
  law->field = *field;
  law->yield = YIELD;
  law->softness = SOFTNESS_AT_30_D * pow (fmax (field->observed_d, 1) / 30, -SOFTNESS_POWER);
}

double
ant_chance_law_expected (const AntChanceLaw *law, double snr)
{
  double t2 = snr * snr / (1 + law->softness), t = sqrt (t2), e = exp (-0.5 * t2);
  return law->yield * e
         * (law->field.length / ANT_TAU + law->field.area * t / pow (ANT_TAU, 1.5)
            + law->field.volume * (t2 - 1) / (ANT_TAU * ANT_TAU));
}

double
ant_chance_law_threshold (const AntChanceLaw *law, double number)
{
  double low = 3, high = 40;
  for (int i = 0; i < 60; i++)
    {
      double mid = 0.5 * (low + high);
      if (ant_chance_law_expected (law, mid) > number)
        low = mid;
      else
        high = mid;
    }
  return 0.5 * (low + high);
}
