/* ticks.c - try finer steps first, keep the first whose labels stand apart. */
#include "plot/ticks.h"
#include <glib.h>
#include <math.h>
#include "plot/number-text.h"

#define MINOR_PX 7 /* least distance of unlabelled ticks */

void
ant_ticks_add (AntTicks *ticks, double value, const char *label)
{
  if (ticks->n >= ANT_MAX_TICKS)
    return;
  AntTick *tick = &ticks->tick[ticks->n++];
  *tick = (AntTick) { .value = value };
  if (label)
    {
      g_strlcpy (tick->label, label, sizeof tick->label);
      ticks->n_labelled = ticks->n;
    }
}

static double
place_px (double value, double from, double to, int is_log, double length_px)
{
  double fraction = is_log ? log (value / from) / log (to / from) : (value - from) / (to - from);
  return fraction * length_px;
}

int
ant_ticks_fit (const AntTicks *ticks, double from, double to, int is_log, const AntRuler *ruler)
{
  double edge = -ruler->before_px;
  for (size_t i = 0; i < ticks->n_labelled; i++)
    {
      const AntTick *tick = &ticks->tick[i];
      double half = ruler->measure (ruler->data, tick->label, tick->strong) / 2;
      double at = place_px (tick->value, from, to, is_log, ruler->length_px);
      if (at - half < edge)
        return FALSE;
      edge = at + half + ruler->gap_px;
    }
  return edge - ruler->gap_px <= ruler->length_px + ruler->after_px;
}

/* Labels that would reach beyond the ends are struck out, whichever step is chosen. */
static gboolean
within_ends (double value, const char *label, double from, double to, int is_log, const AntRuler *ruler)
{
  double half = ruler->measure (ruler->data, label, FALSE) / 2;
  double at = place_px (value, from, to, is_log, ruler->length_px);
  return at - half >= -ruler->before_px && at + half <= ruler->length_px + ruler->after_px;
}

static void
label_or_mark (AntTicks *ticks, AntTicks *minor, double value, const char *label, double from, double to, int is_log,
               const AntRuler *ruler)
{
  if (within_ends (value, label, from, to, is_log, ruler))
    ant_ticks_add (ticks, value, label);
  else
    ant_ticks_add (minor, value, NULL);
}

static void
append_minor (AntTicks *ticks, const AntTicks *minor)
{
  for (size_t i = 0; i < minor->n; i++)
    ant_ticks_add (ticks, minor->tick[i].value, NULL);
}

/* mantissa 0, 1, 2 of step = 1, 2, 5 x 10^exponent, and how a step is parted by small ticks. */
static const double mantissas[] = { 1, 2, 5 };
static const int parts[] = { 5, 4, 5 };

static void
linear_at (double from, double to, int exponent, int m, const AntRuler *ruler, AntTicks *ticks)
{
  static const AntTicks none = { 0 };
  AntTicks minor = none;
  *ticks = none;
  double step = mantissas[m] * pow (10, exponent), small = step / parts[m];
  double px_per_small = small / (to - from) * ruler->length_px;
  int every = px_per_small >= MINOR_PX ? 1 : parts[m];
  double slack = 1e-9 * (to - from);
  double first = ceil ((from - slack) / small);
  for (int i = 0; i < ANT_MAX_TICKS; i++)
    {
      double k = first + i, value = k * small, whole = k / parts[m];
      if (value > to + slack)
        break;
      char label[48];
      if (whole == floor (whole))
        {
          ant_plot_number_text (value, MAX (0, -exponent), sizeof label, label);
          label_or_mark (ticks, &minor, value, label, from, to, FALSE, ruler);
        }
      else if (every == 1)
        ant_ticks_add (&minor, value, NULL);
    }
  append_minor (ticks, &minor);
}

void
ant_ticks_linear (double from, double to, const AntRuler *ruler, AntTicks *ticks)
{
  /* No step closer than its gap can do; from there up, a few tries suffice. */
  double least = (to - from) * MAX (ruler->gap_px, 4) / ruler->length_px;
  int exponent = (int) floor (log10 (least));
  for (int try = 0; try < 12; try++)
    {
      int m = try % 3, e = exponent + try / 3;
      if (mantissas[m] * pow (10, e) < least)
        continue;
      linear_at (from, to, e, m, ruler, ticks);
      if (ant_ticks_fit (ticks, from, to, FALSE, ruler))
        return;
    }
  ticks->n_labelled = ticks->n = 0;
}

/* Which digits of a decade are labelled, densest first; decades > 1 skip. */
typedef struct
{
  int digits;           /* bit d: digit d is labelled */
  int decades;
  double most_decades;  /* only for a range up to this */
} LogStyle;
#define DIGITS_ALL 0x3fe
#define DIGITS_SOME ((1 << 1) | (1 << 2) | (1 << 3) | (1 << 5) | (1 << 7))
#define DIGITS_125 ((1 << 1) | (1 << 2) | (1 << 5))
#define DIGITS_13 ((1 << 1) | (1 << 3))
static const LogStyle log_styles[] = {
  { DIGITS_ALL, 1, 0.5 }, { DIGITS_SOME, 1, 1 }, { DIGITS_125, 1, 3.2 }, { DIGITS_13, 1, 3.2 }, { 1 << 1, 1, 99 },
  { 1 << 1, 2, 99 }, { 1 << 1, 3, 99 }, { 1 << 1, 5, 999 },
};

static void
log_at (double from, double to, const LogStyle *style, const AntRuler *ruler, AntTicks *ticks)
{
  static const AntTicks none = { 0 };
  AntTicks minor = none;
  *ticks = none;
  double decade_px = ruler->length_px / log10 (to / from);
  gboolean show_digits = decade_px * log10 (10.0 / 9) >= 1.8;
  int first = (int) floor (log10 (from) + 1e-12), last = (int) ceil (log10 (to) - 1e-12);
  for (int exponent = first; exponent <= last; exponent++)
    for (int digit = 1; digit <= 9; digit++)
      {
        double value = digit * pow (10, exponent);
        if (value < from * (1 - 1e-9) || value > to * (1 + 1e-9))
          continue;
        char label[48];
        if ((style->digits >> digit & 1) && exponent % style->decades == 0)
          {
            if (digit == 1 && style->digits == 1 << 1)
              ant_power_text (exponent, sizeof label, label);
            else
              ant_plot_number_text (value, MAX (0, -exponent), sizeof label, label);
            label_or_mark (ticks, &minor, value, label, from, to, TRUE, ruler);
          }
        else if (show_digits || digit == 1)
          ant_ticks_add (&minor, value, NULL);
      }
  append_minor (ticks, &minor);
}

void
ant_ticks_log (double from, double to, const AntRuler *ruler, AntTicks *ticks)
{
  for (size_t s = 0; s < G_N_ELEMENTS (log_styles); s++)
    if (log10 (to / from) <= log_styles[s].most_decades)
      {
        log_at (from, to, &log_styles[s], ruler, ticks);
        if (ticks->n_labelled > 0 && ant_ticks_fit (ticks, from, to, TRUE, ruler))
          return;
      }
  ticks->n_labelled = ticks->n = 0;
}
