/* verdict-work.c - the stages that judge every event of a scan. */
#include "verdict/verdict-work.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#define HALF_WINDOW_D 6.0
#define HALF_WINDOW_DURATIONS 6.0
#define HALF_WINDOW_PLACES 150.0
#define LEAVE_D 1.0     /* events nearer than this may be parts of one: they are left in */
#define MASK_MARGIN 0.1 /* of a duration, as the search masks */

enum { REFIT, COMPARE, N_STAGES };

struct _AntVerdictWork
{
  AntVerdictInput input;
  AntSurroundings facts;
  AntStop stop;
  AntNoiseModel *model; /* [n_chunks] */
  AntVerdict *verdict;  /* dips, then brightenings */
};

static const AntDip *
event_of (const AntVerdictWork *work, size_t i)
{
  const AntVerdictInput *in = &work->input;
  return i < in->n_dips ? &in->dip[i] : &in->brightening[i - in->n_dips];
}

static size_t n_events (const AntVerdictWork *work) { return work->input.n_dips + work->input.n_brightenings; }

/* All that is known, judged or not: event_of's first. */
static size_t n_known (const AntVerdictWork *work) { return n_events (work) + work->input.n_others; }

static const AntDip *
known (const AntVerdictWork *work, size_t i)
{
  return i < n_events (work) ? event_of (work, i) : &work->input.other[i - n_events (work)];
}

AntVerdictWork *
ant_verdict_work_new (const AntVerdictInput *input, AntStatus *status)
{
  AntVerdictWork *work = calloc (1, sizeof *work);
  *status = ANT_NO_MEMORY;
  if (!work)
    return NULL;
  work->input = *input;
  work->model = calloc (input->n_chunks + 1, sizeof *work->model);
  work->verdict = calloc (n_events (work) + 1, sizeof *work->verdict);
  if (!work->model || !work->verdict)
    {
      ant_verdict_work_free (work);
      return NULL;
    }
  ant_surroundings_measure (input->series, &work->facts);
  work->input.options.observed_d = work->facts.observed_d;
  *status = ANT_OK;
  return work;
}

void
ant_verdict_work_free (AntVerdictWork *work)
{
  if (!work)
    return;
  free (work->model);
  free (work->verdict);
  free (work);
}

static void
mask_events (const AntVerdictWork *work, size_t first, size_t n, uint8_t *spike)
{
  for (size_t i = 0; i < n_known (work); i++)
    {
      const AntDip *dip = known (work, i);
      double half_d = (0.5 + MASK_MARGIN) * dip->duration_d;
      double from = ceil (ant_series_place (work->input.series, dip->mid_d - half_d)) - (double) first;
      double to = floor (ant_series_place (work->input.series, dip->mid_d + half_d)) - (double) first;
      for (double p = fmax (0, from); p <= to && p < (double) n; p++)
        spike[(size_t) p] = 1;
    }
}

/* The noise of a chunk with its events out of the fit; a chunk without events keeps its model. */
static AntStatus
refit (AntVerdictWork *work, size_t index)
{
  AntChunk chunk = work->input.chunk[index];
  size_t events = 0;
  chunk.stop = &work->stop;
  work->model[index] = chunk.model;
  for (size_t i = 0; i < n_events (work); i++)
    events += event_of (work, i)->chunk == index;
  if (!events)
    return ANT_OK;
  AntSeries part = ant_series_part (work->input.series, chunk.first, chunk.n);
  uint8_t *spike = calloc (part.n, 1);
  if (!spike)
    return ANT_NO_MEMORY;
  if (part.spike)
    memcpy (spike, part.spike, part.n);
  mask_events (work, chunk.first, part.n, spike);
  part.spike = spike;
  AntStatus status = ant_chunk_refit (&chunk, &part, &work->model[index]);
  free (spike);
  if (status == ANT_NO_DATA) /* nothing is left: the chunk's own model stands */
    {
      work->model[index] = chunk.model;
      status = ANT_OK;
    }
  return status;
}

/* Take a dip as the search fitted it out of a window's values. */
static void
subtract (const AntVerdictInput *in, const AntDip *dip, const AntSeries *window, float *value)
{
  AntCrossingShape shape;
  ant_crossing_shape_init (&shape, dip->duration_d, fmin (dip->edge_d, 0.5 * dip->duration_d), ANT_SHAPE_IMPACT,
                           in->limb_darkening);
  double reach_d = 0.5 * (dip->duration_d + in->exposure_d);
  double from = ceil (ant_series_place (window, dip->mid_d - reach_d)), to = floor (ant_series_place (window, dip->mid_d + reach_d));
  for (double p = fmax (0, from); p <= to && p < (double) window->n; p++)
    value[(size_t) p] += (float) (dip->depth_ppm
                                  * ant_crossing_shape_mean (&shape, ant_series_time (window, p) - dip->mid_d, in->exposure_d));
}

/* What one event's comparison needs. */
typedef struct
{
  AntSeries window;
  float *value;
  double *z, *buffer, *innovation;
  AntWhitener *whitener;
} Bench;

static void
bench_clear (Bench *bench)
{
  ant_whitener_free (bench->whitener);
  free (bench->value);
  free (bench->z);
  free (bench->buffer);
  free (bench->innovation);
}

static AntStatus
bench_lay (Bench *bench, const AntVerdictWork *work, size_t index)
{
  const AntVerdictInput *in = &work->input;
  const AntDip *dip = event_of (work, index);
  double half = fmax (fmax (HALF_WINDOW_D, HALF_WINDOW_DURATIONS * dip->duration_d) / in->series->step_d, HALF_WINDOW_PLACES);
  double centre = ant_series_place (in->series, dip->mid_d), from = fmax (0, floor (centre - half));
  bench->window = ant_series_part (in->series, (size_t) from, (size_t) (ceil (centre + half) - from) + 1);
  size_t n = bench->window.n;
  bench->value = malloc (n * sizeof *bench->value);
  bench->z = malloc (n * sizeof *bench->z);
  bench->buffer = malloc (n * ANT_LANES * sizeof *bench->buffer);
  bench->innovation = malloc (n * sizeof *bench->innovation);
  if (!bench->value || !bench->z || !bench->buffer || !bench->innovation)
    return ANT_NO_MEMORY;
  memcpy (bench->value, bench->window.value_ppm, n * sizeof *bench->value);
  for (size_t i = 0; i < n_known (work); i++)
    {
      const AntDip *other = known (work, i);
      double apart_d = fabs (other->mid_d - dip->mid_d) - 0.5 * (other->duration_d + dip->duration_d);
      if (i != index && apart_d > LEAVE_D)
        subtract (in, other, &bench->window, bench->value);
    }
  for (size_t i = 0; i < n && bench->window.spike; i++)
    if (bench->window.spike[i] && fabs (ant_series_time (&bench->window, (double) i) - dip->mid_d) > dip->duration_d)
      bench->value[i] = NAN; /* a spike elsewhere is no part of this event */
  bench->window.value_ppm = bench->value;
  AntStatus status;
  bench->whitener = ant_whitener_new_free_level (&work->model[dip->chunk], &bench->window, &status);
  return status ? status : ant_whitener_solve (bench->whitener, bench->value, bench->z);
}

/* Take the shape that fits best out of the values: what is left around it is noise. */
static void
subtract_best (const AntRivalBench *rivals, const AntVerdict *verdict, float *value)
{
  const AntRivalFit *best = NULL;
  AntRivalCurve curve;
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    if (verdict->rival[kind].fitted && (!best || verdict->rival[kind].log_gain > best->log_gain))
      best = &verdict->rival[kind];
  if (!best)
    return;
  ant_rival_curve_init (&curve, best->kind, best->parameter, rivals->limb_darkening, &rivals->eclipse);
  for (size_t i = 0; i < rivals->window.n; i++)
    value[i] += (float) (best->depth_ppm * ant_rival_curve_mean (&curve, ant_series_time (&rivals->window, (double) i), rivals->exposure_d));
}

/* What the event's own record says besides its shape. */
static void
look_around (const AntVerdictWork *work, const Bench *bench, const AntRivalBench *rivals, const AntDip *dip, AntVerdict *verdict)
{
  const AntVerdictInput *in = &work->input;
  int bright = verdict->sign < 0;
  AntEvidence evidence;
  ant_evidence_gap (in->series, &work->facts, dip, &evidence);
  ant_verdict_add (verdict, &evidence);
  ant_evidence_edges (dip, &evidence);
  ant_verdict_add (verdict, &evidence);
  subtract_best (rivals, verdict, bench->value);
  double level = ant_whitener_level (bench->whitener, bench->value);
  for (size_t i = 0; i < bench->window.n; i++)
    bench->value[i] -= (float) level;
  ant_whitener_innovations (bench->whitener, bench->value, bench->innovation);
  ant_evidence_local_noise (bench->whitener, &bench->window, bench->innovation, dip, &evidence);
  ant_verdict_add (verdict, &evidence);
  ant_evidence_twin (bright ? in->n_dips : in->n_brightenings, bright ? in->dip : in->brightening, &work->facts, dip,
                     &evidence);
  ant_verdict_add (verdict, &evidence);
}

static AntStatus
compare (AntVerdictWork *work, size_t index)
{
  const AntVerdictInput *in = &work->input;
  const AntDip *dip = event_of (work, index);
  Bench bench = { 0 };
  AntStatus status = bench_lay (&bench, work, index);
  AntRivalBench rivals = { .whitener = bench.whitener, .z = bench.z, .window = bench.window, .exposure_d = in->exposure_d,
                           .limb_darkening = in->limb_darkening, .sign = index < in->n_dips ? 1 : -1,
                           .buffer = bench.buffer };
  ant_rival_eclipse (in->limb_darkening, dip->depth_ppm, &rivals.eclipse);
  AntVerdict *verdict = &work->verdict[index];
  *verdict = (AntVerdict){ 0 };
  if (!status)
    status = ant_verdict_compare (&rivals, dip, &work->stop, verdict);
  if (!status)
    look_around (work, &bench, &rivals, dip, verdict);
  bench_clear (&bench);
  return status;
}

/* What the almanac says; a star has none. */
static void
look_up (const AntVerdictInput *in, const AntDip *dip, AntVerdict *verdict)
{
  if (in->options.target_star || verdict->sign < 0)
    return;
  AntEvidence evidence;
  const double *rate = in->options.rates.per_year;
  AntPredictedEvent crossing = ant_predicted_nearest (in->almanac, in->n_crossings, in->crossing, dip);
  AntPredictedEvent eclipse = ant_predicted_nearest (in->almanac, in->n_eclipses, in->eclipse, dip);
  ant_evidence_predicted (&crossing, rate[ANT_CAUSE_PLANET] / 365.25, dip, &evidence);
  ant_verdict_add (verdict, &evidence);
  ant_evidence_eclipsed (&eclipse, rate[ANT_CAUSE_ECLIPSE] / 365.25, dip, &evidence);
  ant_verdict_add (verdict, &evidence);
}

/* Onsets crowd at one phase of the orbit only when all are seen together. */
static AntStatus
decide (AntVerdictWork *work)
{
  size_t n = n_events (work);
  double *onset_d = malloc ((n + 1) * sizeof *onset_d);
  if (!onset_d)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < n; i++)
    onset_d[i] = event_of (work, i)->mid_d - 0.5 * event_of (work, i)->duration_d;
  for (size_t i = 0; i < n; i++)
    {
      AntEvidence evidence;
      ant_evidence_orbit (n, onset_d, work->input.line_period_d, event_of (work, i), &evidence);
      if (!isnan (evidence.number[1]))
        ant_verdict_add (&work->verdict[i], &evidence);
      look_up (&work->input, event_of (work, i), &work->verdict[i]);
      ant_verdict_decide (&work->verdict[i], event_of (work, i), &work->input.options);
    }
  free (onset_d);
  return ANT_OK;
}

static const char *
stage_title (void *work, size_t stage)
{
  static const char *const title[N_STAGES] = { "refitting the noise around dips", "comparing shapes" };
  return title[stage];
}

static size_t
stage_count (void *data, size_t stage)
{
  const AntVerdictWork *work = data;
  return stage == REFIT ? work->input.n_chunks : n_events (work);
}

static AntStatus
run_slice (void *data, size_t stage, size_t slice)
{
  return stage == REFIT ? refit (data, slice) : compare (data, slice);
}

static AntStatus
finish (void *data, size_t stage)
{
  return stage == COMPARE ? decide (data) : ANT_OK;
}

static AntStop *
stop_of (void *data)
{
  return &((AntVerdictWork *) data)->stop;
}

const AntStages *
ant_verdict_work_stages (void)
{
  static const AntStages stages = { N_STAGES, stage_title, stage_count, run_slice, finish, stop_of };
  return &stages;
}

const AntVerdict *ant_verdict_work_dips (const AntVerdictWork *work) { return work->verdict; }

const AntVerdict *
ant_verdict_work_brightenings (const AntVerdictWork *work)
{
  return work->verdict + work->input.n_dips;
}

double ant_verdict_work_observed_d (const AntVerdictWork *work) { return work->facts.observed_d; }
