/* time-reference.h - how a record writes its time stamps, and the way back from elapsed days to them.
 *
 * Inside the program a time is elapsed SI days since the record's origin (leap seconds counted where the scale is UTC),
 * so that a grid is uniform in real time. This struct carries it back to the record's own numbers, JD and UTC. */
#pragma once

#include <glib.h>
#include "sky/time-scale.h"

typedef enum
{
  ANT_STAMP_DAYS,    /* bare numbers with no known origin, in days (or another stated unit) */
  ANT_STAMP_JD,      /* JD, or JD minus own_offset (MJD: 2400000.5) */
  ANT_STAMP_UNIX,    /* seconds since 1970 */
  ANT_STAMP_ISO,     /* ISO 8601 text */
  ANT_STAMP_YMD,     /* YYYYMMDD with a day fraction, or with hhmmss beside it */
  ANT_STAMP_YEAR_DAY,/* year + day of year */
  ANT_STAMP_DECIMAL_YEAR,
} AntStampStyle;

typedef struct
{
  AntTimeScale scale;      /* ANT_SCALE_UNKNOWN if the record does not say */
  gboolean scale_assumed;  /* the scale is the reader's assumption, not the file's word */
  AntStampStyle style;
  gboolean origin_known;   /* JD columns can be written */
  double origin_jd1, origin_jd2; /* the instant of time 0, in `scale` (or its own JD count if scale unknown) */
  double own_zero;         /* the record's own number at time 0, for number styles */
  double own_unit_d;       /* days per unit of the record's own numbers (ANT_STAMP_DAYS: 1, 1/24, 1/86400) */
  double own_offset;       /* ANT_STAMP_JD: JD minus the record's number */
  gboolean own_skips_leaps;/* ANT_STAMP_DAYS with a known origin: the numbers count days of 86400 s, as POSIX does */
  char *place;             /* where the clock stood if the record says ("geocentre", "heliocentre", "observer"), or NULL */
} AntTimeReference;

void ant_time_reference_clear (AntTimeReference *reference);
void ant_time_reference_copy (const AntTimeReference *reference, AntTimeReference *copy);
/* JD of an elapsed time, in the record's scale (quasi-JD for UTC); NaN if the origin is unknown. */
double ant_time_reference_jd (const AntTimeReference *reference, double time_d);
/* The record's own way of writing this time: a number for number styles, ISO text for date styles. Caller frees. */
char *ant_time_reference_own_text (const AntTimeReference *reference, double time_d);
/* UTC as "2041-03-14T07:12:05Z", or "" if scale or origin is unknown. Caller frees. */
char *ant_time_reference_utc_text (const AntTimeReference *reference, double time_d, int decimals);
/* Understand a time that a person typed: own numbers, JD, or ISO 8601. */
gboolean ant_time_reference_parse (const AntTimeReference *reference, const char *text, double *time_d, GError **error);
/* Days of TT from J2000.0 at time 0: a time's TT is this and the elapsed days together. An unknown scale counts as UTC. NaN if
 * the origin is unknown. */
double ant_time_reference_tt_origin (const AntTimeReference *reference);
