/* desk-view.c - which part of the time is seen, where the pointer is, and the way back through views. */
#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "gui/desk-private.h"
#include "plot/number-text.h"
#include "plot/time-ticks.h"

#define LEAST_SAMPLES 12         /* closest view */
#define SETTLED_US (G_USEC_PER_SEC * 7 / 10) /* views that change faster are one step of the history */
#define SURROUNDINGS 4.0         /* durations in view around a selected dip */

AntSpan
ant_desk_whole (AntDesk *self)
{
  if (!self->layers)
    return (AntSpan) { 0, 1 };
  const AntSeries *series = &self->layers->record->series;
  return (AntSpan) { ant_series_time (series, -0.5), ant_series_time (series, (double) series->n - 0.5) };
}

const AntView *
ant_desk_get_view (AntDesk *self)
{
  return &self->view;
}

/* Put the present view into the history: in place of the last if that has not settled, else after it. */
static void
remember (AntDesk *self)
{
  AntSpan present = { self->view.from, self->view.to };
  gint64 now_us = g_get_monotonic_time ();
  gboolean settled = now_us - self->view_changed_us > SETTLED_US;
  self->view_changed_us = now_us;
  if (self->n_past == 0)
    self->n_past = 1, self->now = 0;
  else if (settled || self->now == 0)
    {
      if (self->now == ANT_MOST_VIEWS - 1)
        memmove (self->past, self->past + 1, (ANT_MOST_VIEWS - 1) * sizeof *self->past);
      else
        self->now++;
      self->n_past = self->now + 1;
    }
  self->past[self->now] = present;
}

static void
changed (AntDesk *self)
{
  remember (self);
  ant_desk_tell (self, ANT_DESK_VIEW);
}

void
ant_desk_begin_views (AntDesk *self)
{
  AntSpan whole = ant_desk_whole (self);
  self->view = (AntView) { whole.start_d, whole.end_d, 0, 1, 0, 0 };
  self->n_past = 0;
  self->pointer_d = NAN;
  self->span = (AntSpan) { NAN, NAN };
  remember (self);
}

static double
least_d (AntDesk *self)
{
  return LEAST_SAMPLES * self->layers->record->series.step_d;
}

static void
place_view (AntDesk *self, double from_d, double to_d)
{
  AntSpan whole = ant_desk_whole (self);
  double length_d =
      CLAMP (to_d - from_d, fmin (least_d (self), whole.end_d - whole.start_d), whole.end_d - whole.start_d);
  double middle_d = (from_d + to_d) / 2;
  double start_d = CLAMP (middle_d - length_d / 2, whole.start_d, whole.end_d - length_d);
  self->view.from = start_d;
  self->view.to = start_d + length_d;
}

void
ant_desk_set_view (AntDesk *self, double from_d, double to_d)
{
  if (!self->layers)
    return;
  place_view (self, from_d, to_d);
  changed (self);
}

void
ant_desk_zoom (AntDesk *self, double factor, double at_d)
{
  if (!self->layers)
    return;
  AntSpan whole = ant_desk_whole (self);
  if (isnan (at_d))
    at_d = (self->view.from + self->view.to) / 2;
  ant_view_zoom (&self->view, factor, at_d, whole.start_d, whole.end_d, least_d (self));
  changed (self);
}

void
ant_desk_pan (AntDesk *self, double fraction)
{
  if (!self->layers)
    return;
  AntSpan whole = ant_desk_whole (self);
  ant_view_pan (&self->view, fraction, whole.start_d, whole.end_d);
  changed (self);
}

void
ant_desk_view_whole (AntDesk *self)
{
  AntSpan whole = ant_desk_whole (self);
  ant_desk_set_view (self, whole.start_d, whole.end_d);
}

void
ant_desk_view_selected (AntDesk *self)
{
  AntSpan span;
  if (ant_desk_get_span (self, &span))
    ant_desk_set_view (self, span.start_d, span.end_d);
  else if (self->selected)
    {
      const AntDip *dip = ant_dip_item_get_dip (self->selected);
      ant_desk_set_view (self, dip->mid_d - SURROUNDINGS / 2 * dip->duration_d,
                         dip->mid_d + SURROUNDINGS / 2 * dip->duration_d);
    }
}

/* A dip outside the view, or only partly in it, comes to its middle; the scale stays unless it is too small for the
 * dip. */
void
ant_desk_bring_into_view (AntDesk *self, const AntDip *dip)
{
  if (dip->mid_d - dip->duration_d / 2 >= self->view.from && dip->mid_d + dip->duration_d / 2 <= self->view.to)
    return;
  double half_d = fmax (self->view.to - self->view.from, 1.5 * dip->duration_d) / 2;
  place_view (self, dip->mid_d - half_d, dip->mid_d + half_d);
  remember (self);
}

gboolean
ant_desk_can_go (AntDesk *self, int step)
{
  return self->layers && (step < 0 ? self->now > 0 : self->now + 1 < self->n_past);
}

void
ant_desk_go (AntDesk *self, int step)
{
  if (!ant_desk_can_go (self, step))
    return;
  self->now = step < 0 ? self->now - 1 : self->now + 1;
  self->view.from = self->past[self->now].start_d;
  self->view.to = self->past[self->now].end_d;
  self->view_changed_us = 0; /* whatever comes next is a step of its own */
  ant_desk_tell (self, ANT_DESK_VIEW);
}

double
ant_desk_get_pointer (AntDesk *self)
{
  return self->pointer_d;
}

void
ant_desk_set_pointer (AntDesk *self, double time_d)
{
  if (time_d == self->pointer_d || (isnan (time_d) && isnan (self->pointer_d)))
    return;
  self->pointer_d = time_d;
  ant_desk_tell (self, ANT_DESK_POINTER);
}

gboolean
ant_desk_get_span (AntDesk *self, AntSpan *span)
{
  *span = self->span;
  return !isnan (self->span.start_d);
}

void
ant_desk_set_span (AntDesk *self, const AntSpan *span)
{
  self->span = span ? (AntSpan) { fmin (span->start_d, span->end_d), fmax (span->start_d, span->end_d) }
                    : (AntSpan) { NAN, NAN };
  ant_desk_tell (self, ANT_DESK_POINTER);
}

void
ant_desk_widen_span (AntDesk *self, int steps)
{
  if (!self->layers)
    return;
  AntSpan span;
  double step_d = (self->view.to - self->view.from) / 100;
  double middle_d = (self->view.from + self->view.to) / 2, half_d = 4 * step_d;
  if (ant_desk_get_span (self, &span))
    {
      middle_d = (span.start_d + span.end_d) / 2;
      half_d = fmax ((span.end_d - span.start_d) / 2 + steps * step_d, step_d);
    }
  span = (AntSpan) { middle_d - half_d, middle_d + half_d };
  ant_desk_set_span (self, &span);
}

AntDragPurpose
ant_desk_get_purpose (AntDesk *self)
{
  return self->purpose;
}

void
ant_desk_set_purpose (AntDesk *self, AntDragPurpose purpose)
{
  self->purpose = purpose;
  ant_desk_tell (self, ANT_DESK_POINTER);
}

void
ant_desk_use_span (AntDesk *self)
{
  AntSpan span;
  AntDragPurpose purpose = self->purpose;
  if (!ant_desk_get_span (self, &span))
    return;
  ant_desk_set_purpose (self, ANT_DRAG_VIEW);
  if (purpose == ANT_DRAG_MASK)
    ant_desk_mask (self, &span);
  else if (purpose == ANT_DRAG_UNMASK)
    ant_desk_unmask (self, &span);
  if (purpose == ANT_DRAG_MASK || purpose == ANT_DRAG_UNMASK)
    ant_desk_set_span (self, NULL);
  else
    ant_desk_ask (self, span.start_d, span.end_d);
}

static void
append_value (AntDesk *self, GString *text, gsize place)
{
  const AntRecord *record = self->layers->record;
  double ppm = (double) record->series.value_ppm[place];
  if (isnan (ppm))
    {
      g_string_append (text, _("  ·  not observed"));
      return;
    }
  const char *unit = g_strcmp0 (record->value_unit, "W/m2") == 0 ? "W/m²"
                     : record->value_unit                        ? record->value_unit
                                                                 : "";
  g_autofree char *residual = ant_number_words ((double) self->layers->residual_ppm[place], 0);
  g_string_append_printf (text, _("  ·  %.7g %s  ·  residual %s ppm"), ant_record_value (record, ppm), unit, residual);
  if (self->snr && !isnan (self->snr->snr[place]))
    {
      g_autofree char *snr = ant_number_words ((double) self->snr->snr[place], 1);
      g_string_append_printf (text, _("  ·  SNR %s"), snr);
    }
}

char *
ant_desk_readout (AntDesk *self)
{
  AntSpan span;
  if (!self->layers)
    return g_strdup ("");
  if (ant_desk_get_span (self, &span))
    {
      g_autofree char *start = ant_instant_words (self->layers->record, span.start_d);
      g_autofree char *length = ant_length_words (span.end_d - span.start_d);
      return g_strdup_printf (_("%s, %s long"), start, length);
    }
  if (isnan (self->pointer_d))
    return g_strdup ("");
  const AntSeries *series = &self->layers->record->series;
  char time[96];
  ant_time_label (&self->layers->record->time, self->pointer_d, (self->view.to - self->view.from) / 2000, sizeof time,
                  time);
  GString *text = g_string_new (time);
  double place = round (ant_series_place (series, self->pointer_d));
  if (place >= 0 && place < (double) series->n)
    append_value (self, text, (gsize) place);
  return g_string_free (text, FALSE);
}
