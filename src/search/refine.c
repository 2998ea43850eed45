/* refine.c - climb from a template to the crossing of best SNR near it. */
#include "search/refine.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/dense.h"

#define PASSES 60

/* A trial is its two outer contacts, in places, and its edge: each contact is pinned by its own samples. */
typedef struct
{
  double start, end, edge_d;
} Trial;

typedef struct
{
  const AntWhitener *whitener;
  const double *z;
  const AntRefineOptions *options;
  int sign;
  double low, high; /* bounds of the middle, places */
  double *buffer;   /* [room][ANT_LANES] */
  size_t room;
} Climb;

static int
allowed (const Climb *climb, const Trial *trial)
{
  const AntRefineOptions *o = climb->options;
  double duration_d = (trial->end - trial->start) * o->step_d, middle = 0.5 * (trial->start + trial->end);
  return duration_d >= o->shortest_d && duration_d <= o->longest_d && trial->edge_d >= o->least_edge_d
         && trial->edge_d <= 0.5 * duration_d && middle >= climb->low && middle <= climb->high;
}

/* Draw one trial into its lane. */
static void
draw (const Climb *climb, const Trial *trial, ptrdiff_t base, size_t lane)
{
  const AntRefineOptions *o = climb->options;
  AntCrossingShape shape;
  ant_crossing_shape_init (&shape, (trial->end - trial->start) * o->step_d, trial->edge_d, ANT_SHAPE_IMPACT,
                           o->limb_darkening);
  double centre = 0.5 * (trial->start + trial->end), reach = 0.5 * o->exposure_d / o->step_d;
  ptrdiff_t begin = (ptrdiff_t) ceil (trial->start - reach), last = (ptrdiff_t) floor (trial->end + reach);
  for (ptrdiff_t p = begin; p <= last; p++)
    if (p >= base && p < base + (ptrdiff_t) climb->room)
      climb->buffer[(size_t) (p - base) * ANT_LANES + lane]
        = -ant_crossing_shape_mean (&shape, ((double) p - centre) * o->step_d, o->exposure_d);
}

/* SNR of up to ANT_LANES trials, times the sign sought; trials that are not allowed get -inf. */
static void
rate (const Climb *climb, size_t n, const Trial *trial, double *snr)
{
  double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  double reach = 0.5 * climb->options->exposure_d / climb->options->step_d + 1;
  double from = HUGE_VAL, to = -HUGE_VAL;
  for (size_t i = 0; i < n; i++)
    if (allowed (climb, &trial[i]))
      {
        from = fmin (from, trial[i].start - reach);
        to = fmax (to, trial[i].end + reach);
      }
  ptrdiff_t base = (ptrdiff_t) floor (from);
  size_t length = from <= to ? (size_t) (to - from) + 3 : 0;
  length = length > climb->room ? climb->room : length;
  memset (climb->buffer, 0, length * ANT_LANES * sizeof *climb->buffer);
  for (size_t i = 0; i < n; i++)
    if (allowed (climb, &trial[i]))
      draw (climb, &trial[i], base, i);
  if (length)
    ant_whitener_energies (climb->whitener, climb->z, base, length, climb->buffer, energy, moment, weight);
  for (size_t i = 0; i < n; i++)
    snr[i] = length && allowed (climb, &trial[i]) && energy[i] > 0 ? climb->sign * moment[i] / sqrt (energy[i]) : -HUGE_VAL;
}

/* A trial moved in ingress, egress (places) and edge (days), the edge about the middles of ingress and egress: the data pin
 * these down far better than the contacts, with which held a climb sticks on a slanting ridge. */
static Trial
moved (const Trial *at, const double by[3], double step_d)
{
  double wider = 0.5 * by[2] / step_d;
  return (Trial){ at->start + by[0] - wider, at->end + by[1] + wider, at->edge_d + by[2] };
}

/* The eight moves: ingress and egress alone, both together, the edge. */
static void
moves (const Trial *at, double h, double edge_factor, double step_d, Trial *trial)
{
  static const signed char start[8] = { -1, 1, 0, 0, -1, 1, 0, 0 }, end[8] = { 0, 0, -1, 1, -1, 1, 0, 0 };
  for (int i = 0; i < 8; i++)
    {
      double edge_d = i == 6 ? at->edge_d / edge_factor : i == 7 ? at->edge_d * edge_factor : at->edge_d;
      trial[i] = moved (at, (double[3]){ h * start[i], h * end[i], edge_d - at->edge_d }, step_d);
    }
}

static double
climb_up (const Climb *climb, Trial *at)
{
  const AntRefineOptions *o = climb->options;
  double best, h = fmax (fmax (0.25 * at->edge_d / o->step_d, 0.04 * (at->end - at->start)), 0.25), factor = 1.3, snr[8];
  Trial trial[8];
  rate (climb, 1, at, &best);
  for (int pass = 0; pass < PASSES && (h > 0.01 * at->edge_d / o->step_d || factor > 1.02); pass++)
    {
      moves (at, h, factor, o->step_d, trial);
      rate (climb, 8, trial, snr);
      int winner = -1;
      for (int i = 0; i < 8; i++)
        if (snr[i] > best)
          {
            best = snr[i];
            winner = i;
          }
      if (winner >= 0)
        *at = trial[winner];
      else
        {
          h *= 0.5;
          factor = sqrt (factor);
        }
    }
  return best;
}

/* How far SNR^2/2 falls below its best, mean over the two trials on either side of it. */
static double
fall_of (double best, const double snr[2])
{
  return 0.5 * best * best - 0.25 * (snr[0] * fabs (snr[0]) + snr[1] * fabs (snr[1]));
}

/* The step along one axis (ingress, egress, edge) over which SNR^2/2 falls by about a half, and that fall; NaN if the bounds
 * or a flat top allow none. */
static double
axis_step (const Climb *climb, const Trial *at, double best, int axis, double *fall)
{
  const AntRefineOptions *o = climb->options;
  double h = 0.25 * (axis == 2 ? at->edge_d : at->edge_d / o->step_d), snr[2];
  for (int round = 0; round < 12; round++)
    {
      double up[3] = { 0 }, down[3] = { 0 };
      up[axis] = h;
      down[axis] = -h;
      Trial trial[2] = { moved (at, up, o->step_d), moved (at, down, o->step_d) };
      rate (climb, 2, trial, snr);
      *fall = fall_of (best, snr);
      if (!isfinite (*fall))
        h *= 0.5;
      else if (*fall > 1 && round < 11)
        h *= fmax (0.2, sqrt (0.5 / *fall));
      else if (*fall < 0.1 && round < 11)
        h *= 1.8;
      else
        return *fall > 0 ? h : NAN;
    }
  return NAN;
}

/* Formal errors of middle and duration: the inverse of the curvature of SNR^2/2 in ingress, egress and edge, so that an
 * ingress in a gap counts as unsure. The edge counts as known where its bounds are nearer than its error. */
static void
formal_errors (const Climb *climb, const Trial *at, double best, AntShapeFit *fit)
{
  const AntRefineOptions *o = climb->options;
  static const int pair[3][2] = { { 0, 1 }, { 0, 2 }, { 1, 2 } };
  double step[3], fall[3], snr[6], curvature[9], covariance[9];
  Trial trial[6];
  for (int axis = 0; axis < 3; axis++)
    step[axis] = axis_step (climb, at, best, axis, &fall[axis]);
  size_t n = isnan (step[2]) ? 2 : 3, pairs = n == 3 ? 3 : 1;
  fit->mid_sigma_d = fit->duration_sigma_d = NAN;
  if (isnan (step[0]) || isnan (step[1]))
    return;
  for (size_t k = 0; k < 2 * pairs; k++)
    {
      double by[3] = { 0 };
      for (int side = 0; side < 2; side++)
        by[pair[k / 2][side]] = (k % 2 ? -1 : 1) * step[pair[k / 2][side]];
      trial[k] = moved (at, by, o->step_d);
    }
  rate (climb, 2 * pairs, trial, snr);
  for (size_t i = 0; i < n; i++)
    curvature[i * n + i] = 2 * fall[i];
  for (size_t k = 0; k < pairs; k++)
    {
      size_t i = (size_t) pair[k][0], j = (size_t) pair[k][1];
      curvature[i * n + j] = curvature[j * n + i] = fall_of (best, snr + 2 * k) - fall[i] - fall[j];
    }
  if (ant_cholesky (n, curvature))
    return;
  ant_cholesky_inverse (n, curvature, covariance);
  for (size_t i = 0; i < n; i++)
    for (size_t j = 0; j < n; j++)
      covariance[i * n + j] *= step[i] * step[j];
  double start = covariance[0], end = covariance[n + 1], both = 2 * covariance[1], duration = start + end - both;
  if (n == 3) /* the edge widens the crossing by its own length, half on either side */
    duration += (covariance[8] / o->step_d + 2 * (covariance[5] - covariance[2])) / o->step_d;
  fit->mid_sigma_d = 0.5 * sqrt (start + end + both) * o->step_d;
  fit->duration_sigma_d = sqrt (duration) * o->step_d;
}

static size_t
observed_between (const AntWhitener *whitener, double from, double to)
{
  const unsigned *place = ant_whitener_places (whitener);
  size_t bound[2];
  double edge[2] = { ceil (from), floor (to) + 1 };
  for (int side = 0; side < 2; side++)
    {
      size_t low = 0, high = ant_whitener_observed (whitener);
      while (low < high)
        {
          size_t mid = (low + high) / 2;
          if ((double) place[mid] < edge[side])
            low = mid + 1;
          else
            high = mid;
        }
      bound[side] = low;
    }
  return bound[1] > bound[0] ? bound[1] - bound[0] : 0;
}

/* An edge has data when at least half of the places from half a sample before to half a sample after it are observed. */
static int
edge_seen (const AntWhitener *whitener, double from, double to)
{
  from -= 0.5;
  to += 0.5;
  double places = floor (to) - ceil (from) + 1;
  return places > 0 && (double) observed_between (whitener, from, to) >= 0.5 * places;
}

static AntEdges
edges_seen (const AntWhitener *whitener, const AntShapeFit *fit, double step_d)
{
  double half = 0.5 * fit->duration_d / step_d, edge = fit->edge_d / step_d;
  int ingress = edge_seen (whitener, fit->centre - half, fit->centre - half + edge);
  int egress = edge_seen (whitener, fit->centre + half - edge, fit->centre + half);
  return ingress && egress ? ANT_EDGES_BOTH : ingress ? ANT_EDGES_INGRESS : egress ? ANT_EDGES_EGRESS : ANT_EDGES_NONE;
}

AntStatus
ant_measure (const AntWhitener *whitener, const double *z, const AntRefineOptions *options, AntShapeFit *fit)
{
  double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES], whole = 0;
  AntCrossingShape shape;
  ptrdiff_t first;
  size_t room = (size_t) ((fit->duration_d + options->exposure_d) / options->step_d) + 3;
  double *sample = calloc (room * ANT_LANES, sizeof *sample);
  if (!sample)
    return ANT_NO_MEMORY;
  ant_crossing_shape_init (&shape, fit->duration_d, fit->edge_d, fit->impact, options->limb_darkening);
  size_t n = ant_crossing_shape_sample (&shape, fit->centre, options->step_d, options->exposure_d, -1, &first, room,
                                        ANT_LANES, sample);
  for (size_t j = 0; j < n; j++)
    whole += sample[j * ANT_LANES];
  ant_whitener_energies (whitener, z, first, n, sample, energy, moment, weight);
  free (sample);
  if (!(energy[0] > 0))
    return ANT_NO_DATA;
  fit->depth_ppm = moment[0] / energy[0];
  fit->sigma_ppm = 1 / sqrt (energy[0]);
  fit->snr = moment[0] / sqrt (energy[0]);
  fit->coverage = weight[0] / whole;
  fit->edges = edges_seen (whitener, fit, options->step_d);
  return ANT_OK;
}

AntStatus
ant_refine (const AntWhitener *whitener, const double *z, const AntPeak *peak, int sign, const AntRefineOptions *options,
            AntShapeFit *fit)
{
  double wander_d = options->wander_d > 0 ? options->wander_d : 0.5 * peak->duration_d + peak->edge_d;
  Climb climb = { .whitener = whitener, .z = z, .options = options, .sign = sign,
                  .low = peak->centre - wander_d / options->step_d, .high = peak->centre + wander_d / options->step_d };
  climb.room = (size_t) ((options->longest_d + options->exposure_d + 4 * wander_d) / options->step_d) + 16;
  climb.buffer = malloc (climb.room * ANT_LANES * sizeof *climb.buffer);
  if (!climb.buffer)
    return ANT_NO_MEMORY;
  double half = 0.5 * peak->duration_d / options->step_d;
  Trial at = { peak->centre - half, peak->centre + half, fmax (peak->edge_d, options->least_edge_d) };
  double best = climb_up (&climb, &at);
  *fit = (AntShapeFit){ .centre = 0.5 * (at.start + at.end), .duration_d = (at.end - at.start) * options->step_d,
                        .edge_d = at.edge_d, .impact = ANT_SHAPE_IMPACT };
  if (isfinite (best))
    formal_errors (&climb, &at, best, fit);
  free (climb.buffer);
  return isfinite (best) ? ant_measure (whitener, z, options, fit) : ANT_NO_DATA;
}

void
ant_shape_fit_to_dip (const AntShapeFit *fit, const AntRefineOptions *options, double start_d, AntDip *dip)
{
  AntCrossingShape shape;
  ant_crossing_shape_init (&shape, fit->duration_d, fit->edge_d, fit->impact, options->limb_darkening);
  double depth = fabs (fit->depth_ppm) * 1e-6;
  dip->mid_d = start_d + fit->centre * options->step_d;
  dip->duration_d = fit->duration_d;
  dip->edge_d = fit->edge_d;
  dip->depth_ppm = fit->depth_ppm;
  dip->depth_sigma_ppm = fit->sigma_ppm;
  dip->mean_depth_ppm = fit->depth_ppm * ant_crossing_shape_average (&shape);
  dip->radius_ratio = fit->depth_ppm > 0 && depth < 1
                        ? ant_crossing_radius_for_depth (fit->impact, options->limb_darkening, depth) : NAN;
  dip->snr = fit->snr;
  dip->mid_sigma_d = fit->mid_sigma_d;
  dip->duration_sigma_d = fit->duration_sigma_d;
  dip->coverage = fit->coverage;
  dip->edges = fit->edges;
}
