/* repeat-chance.c - the volume of a search for repeats, and what noise alone shows in it. */
#include "search/repeat-chance.h"
#include <math.h>
#include <stdlib.h>
#include "core/units.h"

#define EPOCHS 16
#define LEAST_COVERAGE 0.3
#define PERIODS 200
#define WIDTHS 24
#define TAIL_STEP 0.05
#define TAIL_STEPS 40

/* The calibration: see docs/search.md. */
#define YIELD 0.78
#define WHITE_YIELD 0.06

enum { SHAPE, MOVED, LONGER, WITH_MOVED, WITH_LONGER };

static double
clip (double x)
{
  return x < 0 ? 0 : x > 1 ? 1 : x;
}

static double
trapezoid (double t, double ramp, double half_depth)
{
  return clip (t / ramp) - clip ((t - half_depth) / ramp);
}

/* A trapezoid, its neighbours and their sums in lanes; *whole its sum. Both moves are a fifth of a ramp. */
static void
draw (double ramp, double half_depth, size_t length, double *lane, double *whole)
{
  *whole = 0;
  for (size_t j = 0; j < length; j++)
    {
      double *at = lane + j * ANT_LANES, t = (double) j - 1;
      at[SHAPE] = trapezoid (t, ramp, half_depth);
      at[MOVED] = trapezoid (t - 0.2 * ramp, ramp, half_depth);
      at[LONGER] = trapezoid (t + 0.1 * ramp, ramp, half_depth + 0.2 * ramp);
      at[WITH_MOVED] = at[SHAPE] + at[MOVED];
      at[WITH_LONGER] = at[SHAPE] + at[LONGER];
      *whole += at[SHAPE];
    }
}

/* Variance of the derivative from the energies of two shapes `apart` from each other and of their sum. */
static double
derivative (double one, double other, double both, double apart)
{
  double correlation = 0.5 * (both - one - other) / sqrt (one * other);
  return 2 * fmax (1 - correlation, 0) / (apart * apart);
}

AntStatus
ant_repeat_chance_rates (const AntWhitener *whitener, double ramp, double from, double to, size_t n, const double *duration,
                         double *rate)
{
  double low = fmax (from, 0), high = fmin (to, (double) ant_whitener_n (whitener)), longest = 0;
  for (size_t i = 0; i < n; i++)
    longest = fmax (longest, duration[i]);
  size_t room = (size_t) ceil (longest + 2 * ramp) + 4;
  double *lane = calloc (room * ANT_LANES, sizeof *lane);
  if (!lane)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < n; i++)
    {
      double half_depth = fmax (duration[i] - ramp, 0.5 * ramp), sum = 0, whole, energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
      size_t length = (size_t) ceil (half_depth + 1.4 * ramp) + 3, count = 0;
      draw (ramp, half_depth, length, lane, &whole);
      for (size_t e = 0; e < EPOCHS && high > low; e++)
        {
          double place = low + (high - low) * ((double) e + fmod (0.5 + 0.618034 * (double) e, 1.0)) / EPOCHS;
          ant_whitener_energies (whitener, NULL, (ptrdiff_t) place, length, lane, energy, moment, weight);
          if (weight[SHAPE] < LEAST_COVERAGE * whole || !(energy[SHAPE] > 0 && energy[MOVED] > 0 && energy[LONGER] > 0))
            continue;
          sum += derivative (energy[SHAPE], energy[MOVED], energy[WITH_MOVED], 0.2 * ramp)
                 * sqrt (derivative (energy[SHAPE], energy[LONGER], energy[WITH_LONGER], 0.2 * ramp));
          count++;
        }
      rate[i] = count ? sum / (double) count : 0;
    }
  free (lane);
  return ANT_OK;
}

static void
duration_range (const AntRepeatGrid *grid, double *shortest_d, double *longest_d)
{
  double unused;
  ant_repeat_grid_durations (grid, grid->period_min_d, shortest_d, &unused);
  ant_repeat_grid_durations (grid, grid->period_max_d, &unused, longest_d);
  *longest_d = fmax (*longest_d, *shortest_d);
}

double
ant_repeat_chance_duration (const AntRepeatGrid *grid, size_t i)
{
  double shortest_d, longest_d;
  duration_range (grid, &shortest_d, &longest_d);
  return shortest_d * pow (longest_d / shortest_d, (double) i / (ANT_CHANCE_DURATIONS - 1));
}

/* Rate at a duration, linear in its logarithm. */
static double
rate_at (const AntRepeatGrid *grid, const double *rate, double duration_d)
{
  double shortest_d, longest_d;
  duration_range (grid, &shortest_d, &longest_d);
  double at = longest_d > shortest_d ? log (duration_d / shortest_d) / log (longest_d / shortest_d) * (ANT_CHANCE_DURATIONS - 1) : 0;
  at = fmax (0, fmin (at, ANT_CHANCE_DURATIONS - 1.000001));
  size_t i = (size_t) at;
  return rate[i] + (at - (double) i) * (rate[i + 1] - rate[i]);
}

/* Integral over duration at one period, per day. */
static double
over_durations (const AntRepeatGrid *grid, double period_d, double step_d, const double *rate)
{
  double shortest_d, longest_d, sum = 0;
  ant_repeat_grid_durations (grid, period_d, &shortest_d, &longest_d);
  for (int k = 0; k < WIDTHS && longest_d > shortest_d; k++)
    {
      double width_d = (longest_d - shortest_d) / WIDTHS, duration_d = shortest_d + (k + 0.5) * width_d;
      sum += width_d * (rate ? rate_at (grid, rate, duration_d) / (step_d * step_d * step_d) : pow (duration_d, -3));
    }
  return sum;
}

static double
normal_below (double x)
{
  return 0.5 * erfc (-x / sqrt (2.0));
}

/* Mean and variance of the greatest of `events` independent normal numbers. */
static void
greatest_of (size_t events, double *mean, double *variance)
{
  double first = 0, second = 0, step = 0.05;
  for (double x = -6; x < 8; x += step)
    {
      double share = pow (normal_below (x + step), (double) events) - pow (normal_below (x), (double) events);
      first += share * (x + 0.5 * step);
      second += share * (x + 0.5 * step) * (x + 0.5 * step);
    }
  *mean = first;
  *variance = second - first * first;
}

/* Add what one period has, per unit of its own integral: its epochs see `events` of it or one more. */
static void
add_period (AntRepeatChance *chance, size_t least_events, double span_d, double period_d, double weight)
{
  double turns = span_d / period_d, fewer = floor (turns), part[2] = { 1 - (turns - fewer), turns - fewer };
  for (int k = 0; k < 2; k++)
    {
      double events = fewer + k;
      if (events >= (double) least_events)
        chance->volume[events < ANT_CHANCE_EVENTS ? (size_t) events : ANT_CHANCE_EVENTS]
          += weight * part[k] * period_d * sqrt ((events * events - 1) / 12);
    }
}

void
ant_repeat_chance_init (AntRepeatChance *chance, const AntRepeatGrid *grid, size_t least_events, double span_d, double step_d,
                        const double *rate)
{
  double ratio = log (grid->period_max_d / grid->period_min_d) / PERIODS;
  *chance = (AntRepeatChance){ .white = !rate };
  for (size_t m = 2; m <= ANT_CHANCE_EVENTS; m++)
    {
      double variance;
      greatest_of (m, &chance->mean[m], &variance);
      chance->stretch[m] = sqrt (variance / (variance - 1 / (double) m));
    }
  for (int k = 0; k < PERIODS; k++)
    {
      double period_d = grid->period_min_d * exp ((k + 0.5) * ratio);
      double integral = over_durations (grid, period_d, step_d, rate) * period_d * ratio;
      add_period (chance, least_events, span_d, period_d, integral * (rate ? YIELD : WHITE_YIELD));
    }
}

/* Maxima above T of a unit volume. */
static double
maxima (int white, double snr)
{
  double square = snr * snr, tail = exp (-0.5 * square);
  return white ? square * square * snr * tail / sqrt (ANT_TAU) : fmax (square - 1, 0) * tail / (ANT_TAU * ANT_TAU);
}

/* The greatest departure from a mean is the greatest number less that mean, whose variance 1/M is independent of it. So it is
 * spread like the greatest of M independent numbers, but that much less. */
double
ant_repeat_chance_keeps_enough (const AntRepeatChance *chance, size_t events, double snr)
{
  double m = (double) events, most = sqrt (m - 1) * (snr * sqrt ((m - 1) / m) - ANT_WITHOUT_LARGEST);
  return pow (normal_below (chance->mean[events] + (most - chance->mean[events]) * chance->stretch[events]), m);
}

double
ant_repeat_chance_expected (const AntRepeatChance *chance, double snr)
{
  double sum = 0;
  for (int i = 0; i < TAIL_STEPS; i++)
    {
      double low = snr + i * TAIL_STEP, here = maxima (chance->white, low) - maxima (chance->white, low + TAIL_STEP), pass = 0;
      for (size_t m = 2; m <= ANT_CHANCE_EVENTS; m++)
        if (chance->volume[m] > 0)
          pass += chance->volume[m] * ant_repeat_chance_keeps_enough (chance, m, low + 0.5 * TAIL_STEP);
      sum += here * pass;
    }
  return sum;
}

double
ant_repeat_chance_threshold (const AntRepeatChance *chance, double number)
{
  double low = ANT_WITHOUT_LARGEST, high = 40; /* below, no train passes */
  while (high - low > 1e-9)
    {
      double mid = 0.5 * (low + high);
      if (ant_repeat_chance_expected (chance, mid) > number)
        low = mid;
      else
        high = mid;
    }
  return 0.5 * (low + high);
}
