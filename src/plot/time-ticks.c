/* time-ticks.c - walk the calendar in round steps; the smallest step whose labels stand apart. */
#include "plot/time-ticks.h"
#include <glib.h>
#include <glib/gi18n.h>
#include <math.h>
#include "core/units.h"
#include "plot/number-text.h"

#define DAY_S 86400
#define MINOR_PX 7        /* least distance of small ticks */
#define LEAST_LABEL_PX 16 /* no label of a time is narrower */
#define NEAR_END_PX 160   /* only labels this near to an end can reach beyond it */

typedef enum { IN_SECONDS, IN_DAYS, IN_MONTHS, IN_YEARS } Unit;

typedef struct
{
  Unit unit;
  int step;
  double about_d;
} Pace;

#define SECONDS(n) { IN_SECONDS, n, n / ANT_SECONDS_PER_DAY }
static const Pace paces[] = {
  SECONDS (1), SECONDS (2), SECONDS (5), SECONDS (10), SECONDS (15), SECONDS (30),
  SECONDS (60), SECONDS (120), SECONDS (300), SECONDS (600), SECONDS (900), SECONDS (1800),
  SECONDS (3600), SECONDS (7200), SECONDS (10800), SECONDS (21600), SECONDS (43200),
  { IN_DAYS, 1, 1 }, { IN_DAYS, 2, 2 }, { IN_DAYS, 5, 5 }, { IN_DAYS, 10, 10 },
  { IN_MONTHS, 1, 30 }, { IN_MONTHS, 2, 60 }, { IN_MONTHS, 3, 91 }, { IN_MONTHS, 6, 182 },
  { IN_YEARS, 1, 365 }, { IN_YEARS, 2, 730 }, { IN_YEARS, 5, 1826 }, { IN_YEARS, 10, 3652 }, { IN_YEARS, 20, 7305 },
  { IN_YEARS, 50, 18262 }, { IN_YEARS, 100, 36524 }, { IN_YEARS, 200, 73048 }, { IN_YEARS, 500, 182621 },
  { IN_YEARS, 1000, 365242 },
};

/* A calendar whose day 0 the record's origin is. */
typedef struct
{
  AntTimeScale scale;
  double jd1, jd2;
} Calendar;

typedef struct
{
  int year, month, day, second; /* second of the day */
} Moment;

static const char *const months[] = { N_("Jan"), N_("Feb"), N_("Mar"), N_("Apr"), N_("May"), N_("Jun"),
                                      N_("Jul"), N_("Aug"), N_("Sep"), N_("Oct"), N_("Nov"), N_("Dec") };

static gboolean
calendar_open (const AntTimeReference *time, Calendar *calendar)
{
  if (!time || !time->origin_known)
    return FALSE;
  *calendar = (Calendar) { ANT_SCALE_TT, time->origin_jd1, time->origin_jd2 }; /* unknown scale: days of 86400 s */
  if (time->scale == ANT_SCALE_UNKNOWN)
    return TRUE;
  calendar->scale = ANT_SCALE_UTC;
  return ant_time_convert (time->scale, time->origin_jd1, time->origin_jd2, ANT_SCALE_UTC, &calendar->jd1,
                           &calendar->jd2) == ANT_OK;
}

/* decimals of the second: rounding is ERFA's, so that 59.9999 does not become minute 60. */
static gboolean
moment_at (const Calendar *calendar, double time_d, int decimals, Moment *moment, double *second)
{
  double jd1, jd2;
  int hour, minute;
  if (ant_time_after (calendar->scale, calendar->jd1, calendar->jd2, time_d, &jd1, &jd2) != ANT_OK
      || ant_time_to_calendar (calendar->scale, jd1, jd2, decimals, &moment->year, &moment->month, &moment->day, &hour,
                               &minute, second) != ANT_OK)
    return FALSE;
  moment->second = hour * 3600 + minute * 60 + (int) floor (*second);
  return TRUE;
}

static double
elapsed_of (const Calendar *calendar, const Moment *m)
{
  double jd1, jd2;
  if (ant_time_from_calendar (calendar->scale, m->year, m->month, m->day, m->second / 3600, m->second / 60 % 60,
                              m->second % 60, &jd1, &jd2) != ANT_OK)
    return NAN;
  return ant_time_elapsed_d (calendar->scale, calendar->jd1, calendar->jd2, jd1, jd2);
}

static int
days_in_month (int year, int month)
{
  return g_date_get_days_in_month ((GDateMonth) month, (GDateYear) year);
}

static int
floored (int value, int step)
{
  return value - ((value % step) + step) % step;
}

/* The last round moment at or before m. */
static Moment
round_down (const Pace *pace, Moment m)
{
  switch (pace->unit)
    {
    case IN_SECONDS: return (Moment) { m.year, m.month, m.day, floored (MIN (m.second, DAY_S - 1), pace->step) };
    case IN_DAYS: return (Moment) { m.year, m.month, 1, 0 };
    case IN_MONTHS: return (Moment) { m.year, 1, 1, 0 };
    case IN_YEARS: return (Moment) { floored (m.year, pace->step), 1, 1, 0 };
    }
  return m;
}

static Moment
next_day (Moment m, int step)
{
  int length = days_in_month (m.year, m.month);
  m.second = 0;
  m.day += step;
  /* 1, 6 .. 26 and 1, 11, 21: a step that would end close before the next first of the month is left out. */
  if (m.day > length || 5 * (length + 1 - m.day) < 3 * step)
    {
      m.day = 1;
      m.month = m.month % 12 + 1;
      m.year += m.month == 1;
    }
  return m;
}

static Moment
step_on (const Pace *pace, Moment m)
{
  switch (pace->unit)
    {
    case IN_SECONDS:
      m.second += pace->step;
      return m.second >= DAY_S ? next_day (m, 1) : m;
    case IN_DAYS:
      return next_day (m, pace->step);
    case IN_MONTHS:
      m.month += pace->step;
      m.year += m.month > 12;
      m.month = (m.month - 1) % 12 + 1;
      return m;
    case IN_YEARS:
      m.year += pace->step;
      return m;
    }
  return m;
}

static void
day_text (const Moment *m, size_t size, char *text)
{
  /* Translators: a day of a month, as "Mar 14" */
  g_snprintf (text, size, _("%1$s %2$d"), _(months[m->month - 1]), m->day);
}

/* A moment that begins a larger unit is called by it. */
static void
label_of (const Pace *pace, const Moment *m, AntTick *tick)
{
  gboolean new_year = m->month == 1 && m->day == 1 && m->second == 0;
  tick->strong = pace->unit == IN_SECONDS ? m->second == 0 : pace->unit != IN_YEARS && new_year;
  if (pace->unit == IN_YEARS || (new_year && pace->unit != IN_SECONDS))
    g_snprintf (tick->label, sizeof tick->label, "%d", m->year);
  else if (pace->unit == IN_MONTHS)
    g_strlcpy (tick->label, _(months[m->month - 1]), sizeof tick->label);
  else if (pace->unit == IN_DAYS || m->second == 0)
    day_text (m, sizeof tick->label, tick->label);
  else if (pace->step < 60)
    g_snprintf (tick->label, sizeof tick->label, "%02d:%02d:%02d", m->second / 3600, m->second / 60 % 60,
                m->second % 60);
  else
    g_snprintf (tick->label, sizeof tick->label, "%02d:%02d", m->second / 3600, m->second / 60 % 60);
}

static gboolean
holds (const Pace *small, const Pace *large)
{
  return small->unit < large->unit || large->step % small->step == 0;
}

static gboolean
already_marked (const AntTicks *ticks, size_t n, double time_d)
{
  for (size_t i = 0; i < n; i++)
    if (ticks->tick[i].value == time_d)
      return TRUE;
  return FALSE;
}

/* Every round moment of the range that is not marked yet. */
static void
walk (const Calendar *calendar, double from_d, double to_d, const Pace *pace, gboolean labelled, AntTicks *ticks)
{
  Moment m;
  double second;
  size_t n_before = ticks->n;
  if (!moment_at (calendar, from_d, 3, &m, &second))
    return;
  m = round_down (pace, m);
  if (pace->unit == IN_YEARS && m.year < 1)
    m.year = pace->step;
  for (; ticks->n < ANT_MAX_TICKS; m = step_on (pace, m))
    {
      double time_d = elapsed_of (calendar, &m);
      if (!(time_d <= to_d))
        return;
      if (time_d < from_d || already_marked (ticks, n_before, time_d))
        continue;
      ant_ticks_add (ticks, time_d, labelled ? "" : NULL);
      if (labelled)
        label_of (pace, &m, &ticks->tick[ticks->n - 1]);
    }
}

/* Strike out the labels that would reach beyond the ends, keeping their marks. */
static void
trim_ends (double from_d, double to_d, const AntRuler *ruler, AntTicks *ticks)
{
  size_t kept = 0, cut = 0;
  AntTick outside[4];
  for (size_t i = 0; i < ticks->n_labelled; i++)
    {
      AntTick tick = ticks->tick[i];
      double at = (tick.value - from_d) / (to_d - from_d) * ruler->length_px, half = 0;
      if (MIN (at, ruler->length_px - at) < NEAR_END_PX)
        half = ruler->measure (ruler->data, tick.label, tick.strong) / 2;
      if (at - half >= -ruler->before_px && at + half <= ruler->length_px + ruler->after_px)
        ticks->tick[kept++] = tick;
      else if (cut < G_N_ELEMENTS (outside))
        outside[cut++] = tick;
    }
  ticks->n_labelled = ticks->n = kept;
  for (size_t i = 0; i < cut; i++)
    ant_ticks_add (ticks, outside[i].value, NULL);
}

/* Within one day nothing names the day: the first label with room for it does. */
static void
name_the_day (const Calendar *calendar, const Pace *pace, double from_d, double to_d, const AntRuler *ruler,
              AntTicks *ticks)
{
  gboolean named = pace->unit != IN_SECONDS;
  for (size_t i = 0; i < ticks->n_labelled; i++)
    named |= ticks->tick[i].strong;
  for (size_t i = 0; i < ticks->n_labelled && !named; i++)
    {
      AntTick *tick = &ticks->tick[i];
      Moment m;
      double second;
      char day[24], label[sizeof tick->label];
      if (!moment_at (calendar, tick->value, 3, &m, &second))
        return;
      day_text (&m, sizeof day, day);
      g_snprintf (label, sizeof label, "%s, %s", day, tick->label);
      double half = ruler->measure (ruler->data, label, FALSE) / 2;
      named = (tick->value - from_d) / (to_d - from_d) * ruler->length_px - half >= -ruler->before_px;
      if (named)
        g_strlcpy (tick->label, label, sizeof tick->label);
    }
}

static void
set_context (const Calendar *calendar, double from_d, double to_d, const Pace *pace, AntTicks *ticks)
{
  Moment a, b;
  double second;
  const char *scale = calendar->scale == ANT_SCALE_UTC ? "UTC" : "";
  if (pace->unit != IN_YEARS && moment_at (calendar, from_d, 0, &a, &second)
      && moment_at (calendar, to_d, 0, &b, &second) && a.year == b.year)
    g_snprintf (ticks->context, sizeof ticks->context, "%d%s%s", a.year, *scale ? " " : "", scale);
  else
    g_strlcpy (ticks->context, scale, sizeof ticks->context);
}

static gboolean
calendar_ticks (const Calendar *calendar, double from_d, double to_d, const AntRuler *ruler, AntTicks *ticks)
{
  Moment ends;
  double second, px_per_d = ruler->length_px / (to_d - from_d);
  if (!moment_at (calendar, from_d, 0, &ends, &second) || !moment_at (calendar, to_d, 0, &ends, &second))
    return FALSE;
  for (size_t p = 0; p < G_N_ELEMENTS (paces); p++)
    {
      const Pace *pace = &paces[p];
      if (pace->about_d * px_per_d < ruler->gap_px + LEAST_LABEL_PX)
        continue;
      ticks->n = ticks->n_labelled = 0;
      walk (calendar, from_d, to_d, pace, TRUE, ticks);
      trim_ends (from_d, to_d, ruler, ticks);
      name_the_day (calendar, pace, from_d, to_d, ruler, ticks);
      if (!ant_ticks_fit (ticks, from_d, to_d, FALSE, ruler))
        continue;
      set_context (calendar, from_d, to_d, pace, ticks);
      for (size_t q = 0; q < p; q++)
        if (paces[q].about_d * px_per_d >= MINOR_PX && holds (&paces[q], pace))
          {
            walk (calendar, from_d, to_d, &paces[q], FALSE, ticks);
            break;
          }
      return TRUE;
    }
  return FALSE;
}

void
ant_ticks_time (const AntTimeReference *time, double from_d, double to_d, const AntRuler *ruler, AntTicks *ticks)
{
  Calendar calendar;
  *ticks = (AntTicks) { 0 };
  if (calendar_open (time, &calendar) && calendar_ticks (&calendar, from_d, to_d, ruler, ticks))
    return;
  ant_ticks_linear (from_d, to_d, ruler, ticks);
  g_strlcpy (ticks->context, _("days"), sizeof ticks->context);
}

void
ant_time_label (const AntTimeReference *time, double time_d, double resolution_d, size_t size, char *text)
{
  Calendar calendar;
  Moment m;
  double second;
  int decimals = resolution_d < 1 / ANT_SECONDS_PER_DAY ? 1 : 0;
  if (!calendar_open (time, &calendar) || !moment_at (&calendar, time_d, decimals, &m, &second))
    {
      int digits = (int) CLAMP (ceil (-log10 (resolution_d)), 0, 9);
      char number[48];
      ant_plot_number_text (time_d, digits, sizeof number, number);
      g_snprintf (text, size, _("%s d"), number);
      return;
    }
  char day[24], clock[24] = "";
  day_text (&m, sizeof day, day);
  if (resolution_d < 1 / ANT_MINUTES_PER_DAY)
    g_snprintf (clock, sizeof clock, " %02d:%02d:%0*.*f", m.second / 3600, m.second / 60 % 60, decimals ? 4 : 2,
                decimals, second);
  else if (resolution_d < 1)
    g_snprintf (clock, sizeof clock, " %02d:%02d", m.second / 3600, m.second / 60 % 60);
  g_snprintf (text, size, "%d %s%s", m.year, day, clock);
}
