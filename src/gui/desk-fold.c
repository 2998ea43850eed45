/* desk-fold.c - the period that the record is folded on: that of a repeat, or one that was typed. */
#include <math.h>

#include "gui/desk-private.h"

#define YEAR_D 365.25

const AntFold *
ant_desk_get_fold (AntDesk *self)
{
  return self->fold.period_d > 0 ? &self->fold : NULL;
}

gsize
ant_desk_get_repeat (AntDesk *self)
{
  return self->repeat;
}

const AntFoldData *
ant_desk_get_fold_data (AntDesk *self)
{
  if (!self->fold_data && self->layers && self->fold.period_d > 0)
    self->fold_data = ant_fold_data_new (self->layers, ant_desk_get_settings (self), &self->fold);
  return self->fold_data;
}

static void
set_fold (AntDesk *self, gsize repeat, const AntFold *fold)
{
  g_clear_pointer (&self->fold_data, ant_fold_data_free);
  self->repeat = repeat;
  self->fold = *fold;
  ant_desk_tell (self, ANT_DESK_FOLD);
}

void
ant_desk_select_repeat (AntDesk *self, gsize i)
{
  if (!self->results || i >= self->results->repeats.n)
    return;
  const AntRepeat *repeat = &self->results->repeats.repeat[i];
  set_fold (self, i, &(AntFold) { .period_d = repeat->period_d, .epoch_d = repeat->epoch_d, .duration_d = repeat->duration_d,
                                  .depth_ppm = repeat->depth_ppm });
}

/* The epoch stays, and the duration once there is one: else that of a crossing, about the middle of the view. */
void
ant_desk_fold_on (AntDesk *self, double period_d)
{
  if (!self->layers || !(period_d > 0) || !isfinite (period_d))
    return;
  AntFold fold = self->fold;
  if (!(fold.period_d > 0))
    fold.epoch_d = 0.5 * (self->view.from + self->view.to);
  if (!(fold.duration_d > 0))
    fold.duration_d = ANT_REPEAT_CROSSING_H / ANT_HOURS_PER_DAY * cbrt (period_d / YEAR_D);
  fold.period_d = period_d;
  fold.duration_d = fmin (fold.duration_d, 0.3 * period_d);
  fold.depth_ppm = NAN;
  set_fold (self, ANT_NO_DIP, &fold);
}

void
ant_desk_nudge_fold (AntDesk *self, int steps)
{
  if (!self->layers || !(self->fold.period_d > 0))
    return;
  const AntSeries *series = &self->layers->record->series;
  /* One step shifts the ends of the record by a tenth of a duration against its middle. */
  double events = fmax (0.5 * (double) series->n * series->step_d / self->fold.period_d, 1);
  ant_desk_fold_on (self, self->fold.period_d + steps * 0.1 * self->fold.duration_d / events);
}

void
ant_desk_view_event (AntDesk *self, gsize i)
{
  const AntFoldData *data = ant_desk_get_fold_data (self);
  if (!data || i >= data->strips.n)
    return;
  double half_d = 2.5 * self->fold.duration_d;
  ant_desk_set_view (self, data->mid_d[i] - half_d, data->mid_d[i] + half_d);
}

void
ant_desk_drop_fold (AntDesk *self)
{
  g_clear_pointer (&self->fold_data, ant_fold_data_free);
  self->fold = (AntFold) { 0 };
  self->repeat = ANT_NO_DIP;
}

void
ant_desk_begin_fold (AntDesk *self)
{
  ant_desk_drop_fold (self);
  if (self->results && self->results->repeats.n)
    ant_desk_select_repeat (self, 0);
}
