/* rotation-curve.c - the slow curve under a record, by harmonic fits in a window that slides along it. */
#include "noise/rotation-curve.h"
#include <math.h>
#include <stdlib.h>
#include "core/dense.h"
#include "core/robust.h"
#include "core/units.h"

#define BIN_D (30 / ANT_MINUTES_PER_DAY)
#define BIWEIGHT 4.685065 /* 95 % efficiency for normal residuals */
#define REWEIGHTINGS 2
#define WINDOWS_PER_WIDTH 108 /* a fit each quarter of a day; between two fits their curves are blended */
#define MAX_HARMONICS 16
#define MAX_COEFFICIENTS (2 * MAX_HARMONICS + 1)
/* Where a window holds too little (a short record, a long gap) the data do not tell harmonics apart. A penalty on the
 * k-th harmonic of this times k^4, in units of a full window's weight, then keeps the curve from swinging; a full window
 * hardly feels it. */
#define STIFFNESS 3e-7

typedef struct
{
  size_t bins;
  double *time_d, *value, *filled; /* [bins] mean time and value of the samples, share of places observed */
  size_t coefficients;
  double *basis;                   /* [bins][coefficients] 1, cos, sin, cos 2.. of the window's period */
  double *weight, *residual, *work; /* [bins] scratch */
  double window_d, bin_d;
} Curve;

static void
fill_basis (const Curve *curve, double time_d, double *basis)
{
  double c = cos (ANT_TAU * time_d / curve->window_d), s = sin (ANT_TAU * time_d / curve->window_d);
  basis[0] = 1;
  for (size_t k = 1; k < curve->coefficients; k += 2)
    {
      basis[k] = k == 1 ? c : c * basis[k - 2] - s * basis[k - 1];
      basis[k + 1] = k == 1 ? s : s * basis[k - 2] + c * basis[k - 1];
    }
}

/* Times are counted from the middle of place 0. */
static void
fill_bins (Curve *curve, const AntSeries *series, const uint8_t *masked, size_t per_bin)
{
  for (size_t first = 0; first < series->n; first += per_bin)
    {
      size_t end = series->n - first < per_bin ? series->n : first + per_bin;
      double value = 0, place = 0, count = 0;
      for (size_t i = first; i < end; i++)
        if (!isnan (series->value_ppm[i]) && !(masked && masked[i]) && !(series->spike && series->spike[i]))
          {
            value += (double) series->value_ppm[i];
            place += (double) i;
            count++;
          }
      if (count == 0)
        continue;
      size_t b = curve->bins++;
      curve->value[b] = value / count;
      curve->time_d[b] = place / count * series->step_d;
      curve->filled[b] = count / (double) per_bin;
      fill_basis (curve, curve->time_d[b], curve->basis + b * curve->coefficients);
    }
}

/* Penalised least squares over bins first..end-1 with curve->weight. */
static AntStatus
solve (const Curve *curve, size_t first, size_t end, double *coefficient)
{
  size_t m = curve->coefficients;
  double normal[MAX_COEFFICIENTS * MAX_COEFFICIENTS] = { 0 }, right[MAX_COEFFICIENTS] = { 0 };
  for (size_t b = first; b < end; b++)
    {
      const double *basis = curve->basis + b * m;
      if (!(curve->weight[b] > 0))
        continue;
      for (size_t i = 0; i < m; i++)
        {
          double weighted = curve->weight[b] * basis[i];
          right[i] += weighted * curve->value[b];
          for (size_t j = 0; j <= i; j++)
            normal[i * m + j] += weighted * basis[j];
        }
    }
  double full = 81.0 / 140 * curve->window_d / curve->bin_d; /* the tricube's mean over -1..1 is 81/140 */
  for (size_t i = 1; i < m; i++)
    normal[i * m + i] += STIFFNESS * full * pow ((double) ((i + 1) / 2), 4);
  AntStatus status = ant_cholesky (m, normal);
  if (status == ANT_OK)
    ant_cholesky_solve (m, normal, right, coefficient);
  return status;
}

/* Multiply the weights by Tukey's biweight of the residuals; 0 if there is no scatter to judge them by. */
static int
reweight (Curve *curve, size_t first, size_t end, const double *tricube, const double *coefficient)
{
  size_t m = curve->coefficients, count = 0;
  for (size_t b = first; b < end; b++)
    {
      double model = 0;
      for (size_t i = 0; i < m; i++)
        model += coefficient[i] * curve->basis[b * m + i];
      curve->residual[b] = curve->value[b] - model;
      if (tricube[b - first] > 0)
        curve->work[count++] = fabs (curve->residual[b]);
    }
  double cut = BIWEIGHT * ANT_MAD_TO_SIGMA * ant_median (count, curve->work, curve->work);
  if (!(cut > 0))
    return 0;
  for (size_t b = first; b < end; b++)
    {
      double u = curve->residual[b] / cut;
      double v = 1 - u * u;
      curve->weight[b] = fabs (u) < 1 ? tricube[b - first] * v * v : 0;
    }
  return 1;
}

static size_t
first_bin_from (const Curve *curve, double time_d)
{
  size_t low = 0, high = curve->bins;
  while (low < high)
    {
      size_t middle = low + (high - low) / 2;
      if (curve->time_d[middle] < time_d)
        low = middle + 1;
      else
        high = middle;
    }
  return low;
}

/* The harmonics that hold about `centre_d`. Near an end the window slides inward and the tricube reaches to its far
 * side. Returns 0 if the window holds nothing. tricube [bins] is scratch. */
static int
fit_window (Curve *curve, double centre_d, double end_d, double *tricube, double *coefficient)
{
  double half = curve->window_d / 2;
  double start = fmax (0, fmin (centre_d - half, end_d - curve->window_d));
  double stop = fmin (end_d, start + curve->window_d);
  double reach = fmax (half, fmax (centre_d - start, stop - centre_d));
  size_t first = first_bin_from (curve, start), last = first_bin_from (curve, nextafter (stop, INFINITY));
  double total = 0;
  for (size_t b = first; b < last; b++)
    {
      double u = fabs (curve->time_d[b] - centre_d) / reach;
      double v = u < 1 ? 1 - u * u * u : 0;
      tricube[b - first] = curve->weight[b] = curve->filled[b] * v * v * v;
      total += curve->weight[b];
    }
  if (!(total > 0) || solve (curve, first, last, coefficient) != ANT_OK)
    return 0;
  for (int pass = 0; pass < REWEIGHTINGS; pass++)
    if (!reweight (curve, first, last, tricube, coefficient) || solve (curve, first, last, coefficient) != ANT_OK)
      break;
  return 1;
}

/* Evaluate at the places between two window centres; a missing fit leaves the word to the other. */
static void
blend (const Curve *curve, const AntSeries *series, double left_d, double spacing_d, const double *left,
       const double *right, float *curve_ppm)
{
  size_t m = curve->coefficients;
  double basis[MAX_COEFFICIENTS];
  size_t i = (size_t) ceil (left_d / series->step_d - 1e-9);
  for (; i < series->n && (double) i * series->step_d <= left_d + spacing_d * (1 + 1e-9); i++)
    {
      double share = ((double) i * series->step_d - left_d) / spacing_d;
      double from_left = 0, from_right = 0;
      fill_basis (curve, (double) i * series->step_d, basis);
      for (size_t k = 0; k < m; k++)
        {
          from_left += left ? left[k] * basis[k] : 0;
          from_right += right ? right[k] * basis[k] : 0;
        }
      share = left && right ? share : right ? 1 : 0;
      curve_ppm[i] = left || right ? (float) ((1 - share) * from_left + share * from_right) : NAN;
    }
}

static void
slide (Curve *curve, const AntSeries *series, double *tricube, float *curve_ppm)
{
  double end_d = (double) (series->n - 1) * series->step_d;
  double spacing_d = fmax (curve->window_d / WINDOWS_PER_WIDTH, series->step_d);
  double fit[2][MAX_COEFFICIENTS];
  int holds = fit_window (curve, 0, end_d, tricube, fit[0]);
  for (size_t w = 0; w == 0 || (double) w * spacing_d < end_d; w++)
    {
      double *left = fit[w % 2], *right = fit[(w + 1) % 2];
      int next = fit_window (curve, fmin ((double) (w + 1) * spacing_d, end_d), end_d, tricube, right);
      blend (curve, series, (double) w * spacing_d, spacing_d, holds ? left : NULL, next ? right : NULL, curve_ppm);
      holds = next;
    }
}

AntStatus
ant_rotation_curve (const AntSeries *series, const uint8_t *masked, const AntRotationOptions *options, float *curve_ppm)
{
  if (!(series->step_d > 0) || !(options->window_d > 0) || options->harmonics < 0 || options->harmonics > MAX_HARMONICS)
    return ANT_BAD_ARGUMENT;
  size_t per_bin = BIN_D > series->step_d ? (size_t) lrint (BIN_D / series->step_d) : 1;
  size_t most = series->n / per_bin + 1;
  Curve curve = { .window_d = options->window_d, .bin_d = (double) per_bin * series->step_d,
                  .coefficients = 2 * (size_t) options->harmonics + 1 };
  double *memory = malloc (most * (7 + curve.coefficients) * sizeof (double));
  if (!memory)
    return ANT_NO_MEMORY;
  curve.time_d = memory;
  curve.value = memory + most;
  curve.filled = memory + 2 * most;
  curve.weight = memory + 3 * most;
  curve.residual = memory + 4 * most;
  curve.work = memory + 5 * most;
  curve.basis = memory + 7 * most;
  fill_bins (&curve, series, masked, per_bin);
  for (size_t i = 0; i < series->n; i++)
    curve_ppm[i] = NAN;
  if (curve.bins)
    slide (&curve, series, memory + 6 * most, curve_ppm);
  free (memory);
  return curve.bins ? ANT_OK : ANT_NO_DATA;
}
