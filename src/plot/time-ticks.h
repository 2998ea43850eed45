/* time-ticks.h - ticks of a time axis: round instants of the calendar, from seconds to centuries, in UTC. */
#pragma once

#include "data/time-reference.h"
#include "plot/ticks.h"

/* from_d, to_d: elapsed days from the record's origin, as are the values of the ticks. With a known scale the calendar
 * is UTC's, leap seconds counted; with a known origin but no scale it is that of the record's own count and says no
 * name; with neither (or `time` NULL, or years the calendar refuses) plain days. */
void ant_ticks_time (const AntTimeReference *time, double from_d, double to_d, const AntRuler *ruler, AntTicks *ticks);

/* An instant as people read it, fit for a resolution: "2041 Mar 14 07:12:05" with seconds below resolution_d of a
 * minute, without the time of day from one day up; or days with as many decimals. Into text[size >= 64]. */
void ant_time_label (const AntTimeReference *time, double time_d, double resolution_d, size_t size, char *text);
