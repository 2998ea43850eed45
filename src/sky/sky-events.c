/* sky-events.c - a march through a span, body by body, and the contacts of what it meets. */
#include "sky/sky-events.h"

#include <math.h>
#include <stdlib.h>
#include "core/units.h"

#define ARCSEC (ANT_PI / 648000.0)
#define ROUGH_MARGIN (180 * ARCSEC)  /* three times what rough separations are wrong by */
#define BEHIND 0.26                  /* radians: a planet behind the Sun must pass an elongation of 15 degrees first */
#define EARTH_SPEED_KM_S 30.3
#define FINEST 0.05                  /* of the sum of radii: the shortest step */
#define LEAD_D 1.0                   /* no event lasts longer */
#define INSIDE 256                   /* samples of an event, for its inner contacts and least separation */
#define CONTACT_D (1e-4 / ANT_SECONDS_PER_DAY)

/* Greatest speeds relative to the Earth, km/s. */
static const double body_speed[ANT_N_BODIES] = { 90, 66, 1.2, 0 };

const char *
ant_sky_kind_name (AntSkyKind kind)
{
  static const char *const names[] = { "crossing", "eclipse", "shadow" };
  return names[kind];
}

typedef struct
{
  const AntSkyOptions *options;
  AntWatch watch;
  double speed_km_s;     /* of the body and the observer */
  double from_d, to_d;   /* where the observer is known */
  double finest;         /* of the latest place: discs nearer than this are passed by the shortest step */
  size_t n, room;
  AntSkyEvent *event;
} March;

/* How far the discs stand apart (negative: they overlap): exactly where they are near, else a lower bound. *step_d is
 * a time in which they cannot meet, or the shortest step. */
static double
apart (March *march, double tt_d, double *step_d)
{
  AntLook look;
  double gap = BEHIND;
  ant_watch_look_rough (&march->watch, tt_d, &look);
  double touch = look.sun_radius + look.body_radius + look.halo;
  if (look.body_km < look.sun_km)
    gap = look.separation - touch - ROUGH_MARGIN;
  if (gap <= 0)
    {
      ant_watch_look (&march->watch, tt_d, &look);
      touch = look.sun_radius + look.body_radius + look.halo;
      gap = look.separation - touch;
    }
  if (!step_d)
    return gap;
  /* The Sun is covered when the line to it passes the body's centre within the body's radius: how far that is from being
   * so, and how fast it can come about by the body's motion and the Sun's. */
  double line = fmin (fmax (look.separation - look.sun_radius - look.halo - ROUGH_MARGIN, 0), 0.5 * ANT_PI);
  double away_km = look.body_km * sin (line) - march->watch.radii.body_km[march->watch.body];
  double speed_km_s = march->speed_km_s + (EARTH_SPEED_KM_S + march->speed_km_s) * look.body_km / look.sun_km;
  march->finest = FINEST * touch;
  *step_d = fmax (away_km, march->finest * look.body_km) / speed_km_s / ANT_SECONDS_PER_DAY;
  return gap;
}

typedef double Distance (March *march, double tt_d); /* one of the four below */

static double
centres_apart (March *march, double tt_d)
{
  AntLook look;
  ant_watch_look (&march->watch, tt_d, &look);
  return look.separation;
}

static double
outer_edges_apart (March *march, double tt_d)
{
  AntLook look;
  ant_watch_look (&march->watch, tt_d, &look);
  return look.separation - (look.sun_radius + look.body_radius);
}

static double
inner_edges_apart (March *march, double tt_d)
{
  AntLook look;
  ant_watch_look (&march->watch, tt_d, &look);
  return look.separation - fabs (look.sun_radius - look.body_radius);
}

static double
reach_apart (March *march, double tt_d)
{
  return apart (march, tt_d, NULL);
}

/* The instant between a and b at which a distance changes its sign. */
static double
touching (March *march, Distance *distance, double a, double b)
{
  int sign = distance (march, a) > 0;
  while (fabs (b - a) > CONTACT_D)
    {
      double middle = 0.5 * (a + b);
      if ((distance (march, middle) > 0) == sign)
        a = middle;
      else
        b = middle;
    }
  return 0.5 * (a + b);
}

/* Minimum of f between a and b by golden section (Kiefer 1953). The minimum's own value is flat: its place is good to
 * the square root of the digits, a few ms here. */
static double
lowest (March *march, Distance *f, double a, double b)
{
  const double golden = 0.5 * (sqrt (5) - 1);
  double c = b - golden * (b - a), d = a + golden * (b - a), at_c = f (march, c), at_d = f (march, d);
  while (b - a > CONTACT_D)
    {
      if (at_c < at_d)
        {
          b = d;
          d = c;
          at_d = at_c;
          c = b - golden * (b - a);
          at_c = f (march, c);
        }
      else
        {
          a = c;
          c = d;
          at_c = at_d;
          d = a + golden * (b - a);
          at_d = f (march, d);
        }
    }
  return 0.5 * (a + b);
}

/* First and last crossing of a touching distance in the event; NaN where an end of it is inside already. */
static void
find_contacts (March *march, Distance *distance, double start, double end, double *first, double *last)
{
  double before = 1, was = start;
  *first = *last = NAN;
  for (int i = 0; i <= INSIDE; i++)
    {
      double now = start + (end - start) * i / INSIDE, here = distance (march, now);
      if (i > 0 && before > 0 && here <= 0 && isnan (*first))
        *first = touching (march, distance, was, now);
      if (i > 0 && before <= 0 && here > 0)
        *last = touching (march, distance, was, now);
      before = here;
      was = now;
    }
}

static double
least_separation (March *march, double start, double end)
{
  double step = (end - start) / INSIDE, best = INFINITY, at = start;
  for (int i = 0; i <= INSIDE; i++)
    {
      double separation = centres_apart (march, start + i * step);
      if (separation < best)
        {
          best = separation;
          at = start + i * step;
        }
    }
  return lowest (march, centres_apart, fmax (start, at - step), fmin (end, at + step));
}

static void
describe (March *march, AntSkyEvent *event)
{
  AntLook look;
  event->greatest_tt_d = least_separation (march, event->start_tt_d, event->end_tt_d);
  ant_watch_look (&march->watch, event->greatest_tt_d, &look);
  event->separation_arcsec = look.separation / ARCSEC;
  event->impact = look.separation / look.sun_radius;
  event->radius_ratio = look.body_radius / look.sun_radius;
  event->depth_ppm = 1e6 * ant_look_loss (&look, march->options->limb_darkening);
  event->uncertain = march->options->observer->kind == ANT_OBSERVER_L1;
  event->possible = look.separation + look.halo > look.sun_radius + look.body_radius && look.halo > 0;
}

/* Keep the event between start and end, where the discs overlap (or, about L1, may). */
static AntStatus
keep (March *march, double start, double end)
{
  static const AntSkyKind kind[ANT_N_BODIES] = { ANT_SKY_CROSSING, ANT_SKY_CROSSING, ANT_SKY_ECLIPSE, ANT_SKY_SHADOW };
  if (march->n == march->room)
    {
      size_t room = 2 * march->room + 16;
      AntSkyEvent *more = realloc (march->event, room * sizeof *more);
      if (!more)
        return ANT_NO_MEMORY;
      march->event = more;
      march->room = room;
    }
  AntSkyEvent *event = &march->event[march->n++];
  double *contact = event->contact_tt_d;
  *event = (AntSkyEvent){ .body = march->watch.body, .kind = kind[march->watch.body], .start_tt_d = start, .end_tt_d = end };
  describe (march, event);
  find_contacts (march, inner_edges_apart, start, end, &contact[ANT_CONTACT_2], &contact[ANT_CONTACT_3]);
  if (event->uncertain)
    {
      find_contacts (march, outer_edges_apart, start, end, &contact[ANT_CONTACT_1], &contact[ANT_CONTACT_4]);
      return ANT_OK;
    }
  contact[ANT_CONTACT_1] = start > march->from_d ? start : (double) NAN;
  contact[ANT_CONTACT_4] = end < march->to_d ? end : (double) NAN;
  return ANT_OK;
}

/* From an instant inside an event to its end; *tt_d is left there. */
static AntStatus
follow (March *march, double start, double *tt_d)
{
  double step, inside = *tt_d;
  while (apart (march, *tt_d, &step) <= 0 && *tt_d < march->to_d)
    {
      inside = *tt_d;
      *tt_d = fmin (*tt_d + step, march->to_d);
    }
  double end = apart (march, *tt_d, NULL) > 0 ? touching (march, reach_apart, inside, *tt_d) : march->to_d;
  return keep (march, start, end);
}

/* One body through the whole span. */
static AntStatus
march_through (March *march, double from_d, double to_d)
{
  AntStatus status = ANT_OK;
  double now = fmax (from_d - LEAD_D, march->from_d), last = fmin (to_d + LEAD_D, march->to_d), step;
  double gap[3] = { NAN, NAN, NAN }, at[3] = { NAN, NAN, NAN }; /* the last three, the newest first */
  while (!status && now <= last)
    {
      if (ant_stop_asked (march->options->stop))
        return ANT_STOPPED;
      gap[2] = gap[1], gap[1] = gap[0], at[2] = at[1], at[1] = at[0];
      gap[0] = apart (march, now, &step);
      at[0] = now;
      double dip = NAN; /* a graze between two steps */
      if (gap[0] > 0 && gap[1] > 0 && gap[1] < march->finest && gap[1] <= gap[0] && gap[1] <= gap[2])
        dip = lowest (march, reach_apart, at[2], at[0]);
      if (!isnan (dip) && apart (march, dip, NULL) <= 0)
        status = keep (march, touching (march, reach_apart, at[2], dip), touching (march, reach_apart, dip, at[0]));
      else if (gap[0] <= 0)
        {
          double start = gap[1] > 0 ? touching (march, reach_apart, at[1], now) : now;
          status = follow (march, start, &now);
          gap[0] = gap[1] = NAN;
          if (now >= last)
            break;
          apart (march, now, &step);
        }
      if (now == last)
        break;
      now = fmin (now + step, last);
    }
  return status;
}

static int
by_time (const void *a, const void *b)
{
  double first = ((const AntSkyEvent *) a)->greatest_tt_d, second = ((const AntSkyEvent *) b)->greatest_tt_d;
  return (first > second) - (first < second);
}

/* Only what overlaps the asked span. */
static size_t
overlapping (size_t n, AntSkyEvent *event, double from_d, double to_d)
{
  size_t kept = 0;
  for (size_t i = 0; i < n; i++)
    if (event[i].end_tt_d >= from_d && event[i].start_tt_d <= to_d)
      event[kept++] = event[i];
  return kept;
}

AntStatus
ant_sky_events (const AntSkyOptions *options, double from_tt_d, double to_tt_d, size_t *n, AntSkyEvent **event)
{
  March march = { .options = options };
  AntStatus status = ANT_OK;
  *n = 0;
  *event = NULL;
  ant_observer_span (options->observer, &march.from_d, &march.to_d);
  if (!(from_tt_d <= to_tt_d && from_tt_d >= march.from_d && to_tt_d <= march.to_d))
    return ANT_BAD_ARGUMENT;
  double observer_km_s = ant_observer_speed (options->observer);
  for (AntBody body = 0; body < ANT_N_BODIES && !status; body++)
    {
      if (body == ANT_BODY_EARTH && options->observer->kind != ANT_OBSERVER_TABLE)
        continue;
      if (body == ANT_BODY_MOON && options->observer->kind == ANT_OBSERVER_L1)
        continue; /* it is never on the Sun's side of L1 */
      ant_watch_init (&march.watch, body, options->observer, options->radii);
      march.speed_km_s = body_speed[body] + observer_km_s;
      status = march_through (&march, from_tt_d, to_tt_d);
    }
  if (status)
    {
      free (march.event);
      return status;
    }
  *n = overlapping (march.n, march.event, from_tt_d, to_tt_d);
  *event = march.event;
  if (*n > 1)
    qsort (*event, *n, sizeof **event, by_time);
  return ANT_OK;
}
