/* cadence.h - the even step hidden in a record's times, and the place of each time on it. No record is known here.
 *
 * The step starts as the typical spacing of neighbours and is refined as the slope of time against index. Runs are
 * joined across longer and longer gaps for as long as the samples keep step, so that a gap is counted only once the
 * step is known well enough to count it. */
#pragma once

#include <glib.h>

typedef struct
{
  double step_d;   /* days, > 0 */
  double start_d;  /* time of place 0: within half a step of the first time */
} AntCadence;

/* time_d [n] strictly increasing and finite; given_d > 0 fixes the step. FALSE if no step can be found: fewer than
 * three times, or a step lost in the rounding of the times. */
gboolean ant_cadence_find (gsize n, const double *time_d, double given_d, AntCadence *cadence);
/* place [n] of each time, never decreasing: the nearest place, except that a run which lies near half a step keeps
 * counting by one (to 0.6 of a step away) rather than stumble between two places. The caller has bounded the span. */
void ant_cadence_place (const AntCadence *cadence, gsize n, const double *time_d, gint64 *place);
