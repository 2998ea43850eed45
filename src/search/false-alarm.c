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
#define YIELD 0.07
#define PIVOT_SNR 4.33
#define SOFTNESS_OF_A_DAY 0.66 /* softness = this / sqrt(days) */
#define MOST_SOFTNESS 0.5

/* A shape, the same moved a little, the same a template longer, and their sums with the shape, on one window of lanes. */
enum { SHAPE, MOVED, LONGER, WITH_MOVED, WITH_LONGER };

typedef struct
{
  size_t length;
  double *lane;  /* [length][ANT_LANES] */
  double whole;  /* sum of the shape itself */
  double centre; /* of the shape, in places after the first of the window */
  double moved;  /* places */
} Neighbours;

static AntStatus
draw (Neighbours *n, const AntMember *member, double longer_d, const AntRefineOptions *o)
{
  AntCrossingShape shape, longer;
  double reach = 0.5 * (member->duration_d + longer_d + o->exposure_d) / o->step_d;
  ant_crossing_shape_init (&shape, member->duration_d, member->edge_d, ANT_SHAPE_IMPACT, o->limb_darkening);
  ant_crossing_shape_init (&longer, member->duration_d + longer_d, member->edge_d, ANT_SHAPE_IMPACT, o->limb_darkening);
  /* A dip shorter than its exposure only changes when it moves to another sample. */
  n->moved = member->duration_d > o->exposure_d ? 0.2 * member->edge_d / o->step_d : 1;
  n->centre = ceil (reach) + 1;
  n->length = (size_t) (2 * n->centre + n->moved) + 2;
  n->whole = 0;
  n->lane = calloc (n->length * ANT_LANES, sizeof *n->lane);
  if (!n->lane)
    return ANT_NO_MEMORY;
  for (size_t j = 0; j < n->length; j++)
    {
      double *at = n->lane + j * ANT_LANES, place = (double) j - n->centre;
      at[SHAPE] = -ant_crossing_shape_mean (&shape, place * o->step_d, o->exposure_d);
      at[MOVED] = -ant_crossing_shape_mean (&shape, (place - n->moved) * o->step_d, o->exposure_d);
      at[LONGER] = -ant_crossing_shape_mean (&longer, place * o->step_d, o->exposure_d);
      at[WITH_MOVED] = at[SHAPE] + at[MOVED];
      at[WITH_LONGER] = at[SHAPE] + at[LONGER];
      n->whole += at[SHAPE];
    }
  return ANT_OK;
}

/* How far two shapes are apart, from the energies of both and of their sum: sqrt(2 (1 - correlation)), at most 1. */
static double
apart (double one, double other, double both)
{
  double correlation = 0.5 * (both - one - other) / sqrt (one * other);
  return fmin (sqrt (2 * fmax (1 - correlation, 0)), 1);
}

/* Upcrossings of zero per place at one epoch, sqrt(variance of the field's derivative)/2 pi (Rice 1945), times the part of
 * the template that its neighbour in duration does not share. */
static double
rate_at (const AntWhitener *whitener, const Neighbours *n, double place)
{
  double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  ant_whitener_energies (whitener, NULL, (ptrdiff_t) floor (place - n->centre), n->length, n->lane, energy, moment, weight);
  if (weight[SHAPE] / n->whole < LEAST_COVERAGE || !(energy[SHAPE] > 0 && energy[MOVED] > 0 && energy[LONGER] > 0))
    return 0;
  return apart (energy[SHAPE], energy[MOVED], energy[WITH_MOVED]) / n->moved / ANT_TAU
         * apart (energy[SHAPE], energy[LONGER], energy[WITH_LONGER]);
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
      double step_d = 0; /* from one duration to the next; half an hour where there is only one */
      for (; members < family->n_members && family->member[members].length; members++)
        step_d = fmax (step_d, members ? family->member[members].duration_d - family->member[members - 1].duration_d : 0);
      step_d = step_d > 0 ? step_d : 1.0 / 48;
      for (size_t d = 0; d < DURATIONS; d++)
        {
          const AntMember *member = &family->member[d * (members - 1) / (DURATIONS - 1)];
          Neighbours neighbours;
          AntStatus status = draw (&neighbours, member, step_d, options);
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
ant_chance_law_init (AntChanceLaw *law, const AntChanceField *field, double fitted_d)
{
  law->field = *field;
  law->yield = YIELD;
  law->softness = fmin (SOFTNESS_OF_A_DAY / sqrt (fmax (fitted_d, 1)), MOST_SOFTNESS);
}

double
ant_chance_law_expected (const AntChanceLaw *law, double snr)
{
  double beyond = fmax (snr * snr - PIVOT_SNR * PIVOT_SNR, 0);
  return law->yield * law->field.crossings * snr * snr * exp (-0.5 * (snr * snr - law->softness * beyond));
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
