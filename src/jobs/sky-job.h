/* sky-job.h - ask the sky from any thread: libnova allows one at a time, and this room holds the lane.
 *
 * All functions block; FALSE or NULL with one sentence, G_IO_ERROR_CANCELLED if stopped. Cancellable may be NULL. */
#pragma once

#include <gio/gio.h>
#include "data/observer-choice.h"
#include "data/settings.h"
#include "data/sighting.h"

/* Events of a span of TT (days from J2000.0): GArray of AntSkyEvent by time, caller unrefs. Radii and limb darkening are
 * those of the settings. */
GArray *ant_sky_job_predict (const AntObserverChoice *choice, const AntSettings *settings, double from_tt_d, double to_tt_d,
                             GCancellable *cancellable, GError **error);
/* Events over a gridded record, in its own time: GArray of AntSighting, nothing measured yet. The span is cut to that of the
 * observer's positions (an error if they do not meet). A record whose origin is unknown is refused. */
GArray *ant_sky_job_sightings (const AntRecord *record, const AntObserverChoice *choice, const AntSettings *settings,
                               GCancellable *cancellable, GError **error);
/* The predicted loss of an event against time; clear it. */
gboolean ant_sky_job_curve (const AntObserverChoice *choice, const AntSettings *settings, const AntSkyEvent *event,
                            AntSkyCurve *curve, GError **error);
/* The body's way before the Sun at n even times from the event's start to its end: the centre's offset in solar radii. */
gboolean ant_sky_job_path (const AntObserverChoice *choice, const AntSettings *settings, const AntSkyEvent *event, gsize n,
                           double *east, double *north, GError **error);
/* Measure what the record shows of one: the predicted shape under the record's noise, only its depth free. Fills the second
 * half of the sighting. The Earth's shadow is only looked at, not measured. */
gboolean ant_sky_job_measure (const AntRecord *record, const AntObserverChoice *choice, const AntSettings *settings,
                              AntSighting *sighting, GError **error);
