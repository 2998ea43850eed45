/* noise-draw.c - exact stepping of Gauss-Markov processes with their mean over an exposure. */
#include "trials/noise-draw.h"

#include <math.h>
#include <string.h>
#include "core/units.h"

#define MAX_STATES 3
#define TAYLOR_TERMS 18

/* Row-major MAX_STATES x MAX_STATES; only the first n rows and columns are used. */
typedef double Matrix[MAX_STATES * MAX_STATES];

/* x after the step = advance x before it + root (normals). */
typedef struct
{
  int n_states;
  Matrix advance, root;
} Step;

static void
multiply (int n, const double *a, const double *b, double *c)
{
  for (int i = 0; i < n; i++)
    for (int j = 0; j < n; j++)
      {
        double sum = 0;

        for (int k = 0; k < n; k++)
          sum += a[i * MAX_STATES + k] * b[k * MAX_STATES + j];
        c[i * MAX_STATES + j] = sum;
      }
}

/* c = a b a' */
static void
congruence (int n, const double *a, const double *b, double *c)
{
  Matrix ab, transposed;

  for (int i = 0; i < n; i++)
    for (int j = 0; j < n; j++)
      transposed[i * MAX_STATES + j] = a[j * MAX_STATES + i];
  multiply (n, a, b, ab);
  multiply (n, ab, transposed, c);
}

/* Lower root of a covariance that may be singular (a mean over no time has none). */
static void
lower_root (int n, const double *covariance, double *root)
{
  memset (root, 0, sizeof (Matrix));
  for (int i = 0; i < n; i++)
    for (int j = 0; j <= i; j++)
      {
        double rest = covariance[i * MAX_STATES + j];

        for (int k = 0; k < j; k++)
          rest -= root[i * MAX_STATES + k] * root[j * MAX_STATES + k];
        if (i == j)
          root[i * MAX_STATES + j] = sqrt (fmax (0, rest));
        else if (root[j * MAX_STATES + j] > 0)
          root[i * MAX_STATES + j] = rest / root[j * MAX_STATES + j];
      }
}

/* One step of unit time of dx = F x dt + dB, cov (dB) = D dt: Taylor series over 2^-k, then k doublings. */
static void
discretise (int n, const double *f, const double *d, Step *step)
{
  Matrix term, drift, q, scratch;
  double size = 0, h = 1;
  int doublings = 0;

  for (int i = 0; i < MAX_STATES * MAX_STATES; i++)
    size = fmax (size, fabs (f[i]));
  for (; n * size * h > 0.5; h /= 2)
    doublings++;

  /* advance = sum (F h)^k / k!, q = sum h^(k+1)/(k+1)! M_k with M_0 = D, M_(k+1) = F M_k + M_k F'. */
  memset (step->advance, 0, sizeof (Matrix));
  memset (term, 0, sizeof (Matrix));
  for (int i = 0; i < n; i++)
    step->advance[i * MAX_STATES + i] = term[i * MAX_STATES + i] = 1;
  for (int i = 0; i < MAX_STATES * MAX_STATES; i++)
    q[i] = drift[i] = d[i] * h;
  for (int k = 1; k <= TAYLOR_TERMS; k++)
    {
      multiply (n, f, term, scratch);
      for (int i = 0; i < n; i++)
        for (int j = 0; j < n; j++)
          {
            term[i * MAX_STATES + j] = scratch[i * MAX_STATES + j] * h / k;
            step->advance[i * MAX_STATES + j] += term[i * MAX_STATES + j];
          }
      multiply (n, f, drift, scratch);
      for (int i = 0; i < n; i++)
        for (int j = 0; j < n; j++)
          {
            drift[i * MAX_STATES + j]
                = (scratch[i * MAX_STATES + j] + scratch[j * MAX_STATES + i]) * h / (k + 1);
            q[i * MAX_STATES + j] += drift[i * MAX_STATES + j];
          }
    }
  for (int k = 0; k < doublings; k++)
    {
      congruence (n, step->advance, q, scratch);
      for (int i = 0; i < n; i++)
        for (int j = 0; j < n; j++)
          q[i * MAX_STATES + j] += scratch[i * MAX_STATES + j];
      multiply (n, step->advance, step->advance, scratch);
      memcpy (step->advance, scratch, sizeof scratch);
    }
  step->n_states = n;
  lower_root (n, q, step->root);
}

/* The step of a part over length_d, in units of its rms. The velocity of an oscillator is in units of rms w0, so that
 * the stationary covariance is the identity. With `with_mean` the last state gathers the mean over the step. */
static void
part_step (const AntNoisePart *part, double length_d, int with_mean, Step *step)
{
  Matrix f = { 0 }, d = { 0 };
  int n;

  if (part->kind == ANT_OSCILLATOR)
    {
      const double angle = ANT_TAU * length_d / part->time_d;

      n = 2;
      f[1] = angle;
      f[MAX_STATES] = -angle;
      f[MAX_STATES + 1] = -angle / part->quality;
      d[MAX_STATES + 1] = 2 * angle / part->quality;
    }
  else
    {
      n = 1;
      f[0] = -length_d / part->time_d;
      d[0] = 2 * length_d / part->time_d;
    }
  if (with_mean)
    {
      f[n * MAX_STATES] = 1;
      n++;
    }
  discretise (n, f, d, step);
}

static void
take_step (const Step *step, AntRandom *random, double *state)
{
  double normal[MAX_STATES], next[MAX_STATES];
  const int n = step->n_states;

  for (int i = 0; i < n; i++)
    normal[i] = ant_random_normal (random);
  for (int i = 0; i < n; i++)
    {
      double sum = 0;

      for (int k = 0; k < n; k++)
        sum += step->advance[i * MAX_STATES + k] * state[k];
      for (int k = 0; k <= i; k++)
        sum += step->root[i * MAX_STATES + k] * normal[k];
      next[i] = sum;
    }
  memcpy (state, next, (size_t)n * sizeof *state);
}

void
ant_noise_part_draw (const AntNoisePart *part, size_t n, double cadence_d, double exposure_d, AntRandom *random,
                     double *sum_ppm)
{
  const int n_own = part->kind == ANT_OSCILLATOR ? 2 : 1;
  const int averaged = exposure_d > 0;
  const double dead_d = cadence_d - exposure_d;
  const int has_dead = dead_d > 1e-12 * cadence_d;
  double state[MAX_STATES] = { 0 };
  Step open, dead;

  if (averaged)
    part_step (part, exposure_d, 1, &open);
  if (has_dead)
    part_step (part, dead_d, 0, &dead);
  for (int i = 0; i < n_own; i++)
    state[i] = ant_random_normal (random);
  for (size_t i = 0; i < n; i++)
    {
      state[n_own] = 0;
      if (averaged)
        take_step (&open, random, state);
      sum_ppm[i] += part->rms_ppm * state[averaged ? n_own : 0];
      if (has_dead)
        take_step (&dead, random, state);
    }
}
