/* state-space.c - a noise model's covariance as rotating, decaying terms. */
#include "noise/state-space.h"
#include <math.h>
#include <string.h>
#include "core/units.h"

/* Rotation by repeated multiplication is computed afresh this often, to stay at rounding error. */
#define EXACT_EVERY 128

static int
bad_part (const AntNoisePart *part)
{
  return !(part->rms_ppm >= 0) || !isfinite (part->rms_ppm) || !(part->time_d > 0) || !isfinite (part->time_d)
         || (part->kind == ANT_OSCILLATOR && !(part->quality > 0.5));
}

static void
add_wave (AntTerms *terms, const AntNoisePart *part)
{
  size_t w = terms->waves++;
  double w0 = ANT_TAU / part->time_d, eta = sqrt (1.0 - 0.25 / (part->quality * part->quality));
  terms->a[w] = part->rms_ppm * part->rms_ppm;
  terms->b[w] = terms->a[w] / (2.0 * eta * part->quality);
  terms->decay_d[2 * w] = terms->decay_d[2 * w + 1] = 0.5 * w0 / part->quality;
  terms->rate_d[w] = eta * w0;
  terms->turn_cos[w] = cos (terms->rate_d[w] * terms->step_d);
  terms->turn_sin[w] = sin (terms->rate_d[w] * terms->step_d);
}

AntStatus
ant_terms_from_model (AntTerms *terms, const AntNoiseModel *model, double step_d)
{
  memset (terms, 0, sizeof *terms);
  terms->step_d = step_d;
  for (size_t i = 0; i < model->n_parts; i++)
    {
      if (bad_part (&model->part[i]))
        return ANT_BAD_ARGUMENT;
      if (model->part[i].kind == ANT_OSCILLATOR)
        add_wave (terms, &model->part[i]);
      terms->total += model->part[i].rms_ppm * model->part[i].rms_ppm;
    }
  for (size_t i = 0; i < model->n_parts; i++)
    if (model->part[i].kind == ANT_EXPONENTIAL)
      {
        terms->single[terms->singles] = model->part[i].rms_ppm * model->part[i].rms_ppm;
        terms->decay_d[2 * terms->waves + terms->singles++] = 1.0 / model->part[i].time_d;
      }
  terms->terms = (2 * terms->waves + terms->singles + 3) / 4 * 4;
  for (size_t j = 0; j < terms->terms; j++)
    terms->decay_step[j] = exp (-terms->decay_d[j] * step_d);
  return ANT_OK;
}

void
ant_terms_decay (const AntTerms *terms, size_t gap, double *decay)
{
  if (gap == 1)
    {
      memcpy (decay, terms->decay_step, terms->terms * sizeof *decay);
      return;
    }
  double time_d = terms->step_d * (double) gap;
  for (size_t j = 0; j < terms->terms; j++)
    decay[j] = exp (-terms->decay_d[j] * time_d);
}

static void
rotate_exactly (AntWalk *walk, const AntTerms *terms)
{
  for (size_t w = 0; w < terms->waves; w++)
    {
      double angle = terms->rate_d[w] * terms->step_d * (double) walk->place;
      walk->cosine[w] = cos (angle);
      walk->sine[w] = sin (angle);
    }
  walk->since_exact = 0;
}

void
ant_walk_start (AntWalk *walk, const AntTerms *terms, size_t place)
{
  walk->place = place;
  walk->decay_gap = 1;
  ant_terms_decay (terms, 1, walk->decay);
  rotate_exactly (walk, terms);
}

void
ant_walk_to (AntWalk *walk, const AntTerms *terms, size_t place)
{
  size_t gap = place - walk->place;
  walk->place = place;
  if (gap != walk->decay_gap)
    {
      ant_terms_decay (terms, gap, walk->decay);
      walk->decay_gap = gap;
    }
  if (gap > 1 || ++walk->since_exact >= EXACT_EVERY)
    {
      rotate_exactly (walk, terms);
      return;
    }
  for (size_t w = 0; w < terms->waves; w++)
    {
      double cosine = walk->cosine[w], sine = walk->sine[w];
      walk->cosine[w] = cosine * terms->turn_cos[w] - sine * terms->turn_sin[w];
      walk->sine[w] = sine * terms->turn_cos[w] + cosine * terms->turn_sin[w];
    }
}

void
ant_walk_vectors (const AntWalk *walk, const AntTerms *terms, double *u, double *v)
{
  for (size_t w = 0; w < terms->waves; w++)
    {
      double cosine = walk->cosine[w], sine = walk->sine[w];
      u[2 * w] = terms->a[w] * cosine + terms->b[w] * sine;
      u[2 * w + 1] = terms->a[w] * sine - terms->b[w] * cosine;
      v[2 * w] = cosine;
      v[2 * w + 1] = sine;
    }
  for (size_t j = 2 * terms->waves; j < terms->terms; j++)
    {
      size_t e = j - 2 * terms->waves;
      u[j] = e < terms->singles ? terms->single[e] : 0;
      v[j] = e < terms->singles ? 1 : 0;
    }
}
