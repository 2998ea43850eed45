/* false-alarm.c - the geometry of the searched range, and the expected number of chance dips. */
#include "search/false-alarm.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/units.h"

#define EPOCHS 24
#define DURATIONS 9
#define LEAST_COVERAGE 0.3

/* The calibration: see docs/search.md. */
#define YIELD 1.0
#define SOFTNESS 0.0
#define SOFTNESS_POWER 0.5

/* A shape, the same moved a little, and their sum, on one window of lanes. */
typedef struct
{
  size_t length;
  double *lane;  /* [length][ANT_LANES] */
  double whole;  /* sum of the shape itself */
  double centre; /* of the shape, in places after the first of the window */
  double moved;  /* places */
} Neighbours;

static AntStatus
draw (Neighbours *n, double duration_d, double edge_d, const AntRefineOptions *o)
{
  AntCrossingShape shape;
  double reach = 0.5 * (duration_d + o->exposure_d) / o->step_d;
  ant_crossing_shape_init (&shape, duration_d, edge_d, ANT_SHAPE_IMPACT, o->limb_darkening);
  /* A dip shorter than its exposure only changes when it moves to another sample. */
  n->moved = duration_d > o->exposure_d ? 0.2 * edge_d / o->step_d : 1;
  n->centre = ceil (reach) + 1;
  n->length = (size_t) (2 * n->centre + n->moved) + 2;
  n->whole = 0;
  n->lane = calloc (n->length * ANT_LANES, sizeof *n->lane);
  if (!n->lane)
    return ANT_NO_MEMORY;
  for (size_t j = 0; j < n->length; j++)
    {
      double *at = n->lane + j * ANT_LANES;
      at[0] = -ant_crossing_shape_mean (&shape, ((double) j - n->centre) * o->step_d, o->exposure_d);
      at[1] = -ant_crossing_shape_mean (&shape, ((double) j - n->centre - n->moved) * o->step_d, o->exposure_d);
      at[2] = at[0] + at[1];
      n->whole += at[0];
    }
  return ANT_OK;
}

/* Upcrossings of zero per place at one epoch: sqrt(variance of the field's derivative)/2 pi (Rice 1945). */
static double
rate_at (const AntWhitener *whitener, const Neighbours *n, double place)
{
  double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  ant_whitener_energies (whitener, NULL, (ptrdiff_t) floor (place - n->centre), n->length, n->lane, energy, moment, weight);
  if (weight[0] / n->whole < LEAST_COVERAGE || !(energy[0] > 0) || !(energy[1] > 0))
    return 0;
  double correlation = 0.5 * (energy[2] - energy[0] - energy[1]) / sqrt (energy[0] * energy[1]);
  return sqrt (2 * fmax (1 - correlation, 0)) / n->moved / ANT_TAU;
}

AntStatus
ant_chance_field_measure (AntChanceField *field, const AntWhitener *whitener, const AntTemplateBank *bank,
                          const AntRefineOptions *options, double from, double to)
{
  double low = fmax (from, 0), high = fmin (to, (double) ant_whitener_n (whitener));
  const unsigned *place = ant_whitener_places (whitener);
  *field = (AntChanceField){ 0 };
  for (size_t i = 0; i < ant_whitener_observed (whitener); i++)
    field->observed_d += place[i] >= low && place[i] < high ? options->step_d : 0;
  for (size_t f = 0; f < bank->n_families && high > low; f++)
    {
      const AntFamily *family = &bank->family[f];
      size_t members = 0;
      while (members < family->n_members && family->member[members].length)
        members++;
      for (size_t d = 0; d < DURATIONS; d++)
        {
          const AntMember *member = &family->member[d * (members - 1) / (DURATIONS - 1)];
          Neighbours neighbours;
          AntStatus status = draw (&neighbours, member->duration_d, member->edge_d, options);
          if (status)
            return status;
          for (size_t e = 0; e < EPOCHS; e++)
            {
              double at = low + (high - low) * ((double) e + fmod (0.5 + 0.618034 * (double) e, 1.0)) / EPOCHS;
              field->crossings += rate_at (whitener, &neighbours, at) * (high - low) / EPOCHS * (double) members / DURATIONS;
            }
          free (neighbours.lane);
        }
    }
  return ANT_OK;
}

void
ant_chance_field_add (AntChanceField *sum, const AntChanceField *field)
{
  sum->crossings += field->crossings;
  sum->observed_d += field->observed_d;
}

void
ant_chance_law_init (AntChanceLaw *law, const AntChanceField *field)
{
  law->field = *field;
  law->yield = YIELD;
  law->softness = SOFTNESS * pow (fmax (field->observed_d, 1) / 30, -SOFTNESS_POWER);
}

double
ant_chance_law_expected (const AntChanceLaw *law, double snr)
{
  double t2 = snr * snr / (1 + law->softness);
  return law->yield * law->field.crossings * t2 * exp (-0.5 * t2);
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
