/* iso-time.h - dates and times of day written as ISO 8601 and its everyday relatives.
 *
 * Understood: 2041-03-14, 2041/03/14, 2041-073 (day of year), 20410314; then nothing, or T, t, _ or blanks and a time of day
 * 07, 07:12, 07:12:05, 07:12:05.25 (or a comma), 0712, 071205, 24:00; then nothing, Z, UTC, or +hh, +hhmm, +hh:mm. */
#pragma once

#include "sky/time-scale.h"

typedef struct
{
  int year, month, day; /* month and day are those of the calendar, also when the text gave the day of the year */
  double second;        /* of the day, 0 .. 86401: second 60 of a minute is kept, hour 24 is 86400 */
  int leap;             /* nonzero if the text named a second 60 */
  int has_time, has_zone;
  int zone_min;         /* minutes to subtract to reach UTC */
} AntIsoTime;

/* Read text .. end (no terminator needed) whole, blanks around it aside. Returns 1, or 0 if it is not such a time or names
 * an impossible date. Whether second 60 exists on that day is for the caller's calendar. */
int ant_iso_read (const char *text, const char *end, AntIsoTime *time);
/* A time of day alone, as seconds; 1 or 0. */
int ant_iso_read_clock (const char *text, const char *end, double *second, int *leap);
/* The instant in `scale`, zone subtracted. */
AntStatus ant_iso_instant (const AntIsoTime *time, AntTimeScale scale, double *jd1, double *jd2);
