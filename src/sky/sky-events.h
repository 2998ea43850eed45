/* sky-events.h - what comes before the Sun for an observer over a span of time, and when.
 *
 * A step through the span is never longer than the bodies need to meet, told from their greatest speeds: crossings that
 * only graze are found too. Contacts are roots of the separation, the greatest phase its minimum. Exact to about a
 * second of time and 0.05" against an ephemeris fitted to observations (docs/sky.md). One thread (places.h). */
#pragma once

#include <stddef.h>
#include "core/stages.h"
#include "sky/look.h"

typedef enum
{
  ANT_SKY_CROSSING, /* Mercury or Venus before the Sun */
  ANT_SKY_ECLIPSE,  /* the Moon before it */
  ANT_SKY_SHADOW,   /* the Earth before it: an orbit's night */
} AntSkyKind;

const char *ant_sky_kind_name (AntSkyKind kind); /* "crossing"; untranslated, static */

enum
{
  ANT_CONTACT_1, /* first touch from outside */
  ANT_CONTACT_2, /* the smaller disc wholly before (or behind) the larger */
  ANT_CONTACT_3,
  ANT_CONTACT_4, /* last touch */
  ANT_N_CONTACTS,
};

/* Times are days of TT from J2000.0. */
typedef struct
{
  AntBody body;
  AntSkyKind kind;
  double contact_tt_d[ANT_N_CONTACTS]; /* NaN where it does not occur, or before or after the observer is known */
  double start_tt_d, end_tt_d;         /* the first and fourth contact, or where the span cuts them off; for an event that
                                          is only possible, where it may begin and end */
  double greatest_tt_d;                /* least separation */
  double separation_arcsec;            /* then, of the centres */
  double impact;                       /* the same over the Sun's radius */
  double radius_ratio;                 /* of the discs as seen then */
  double depth_ppm;                    /* loss of light then, by the limb darkening law */
  int possible;  /* only possible: an observer elsewhere about L1 would see another outcome */
  int uncertain; /* the observer's place is not known (L1): times to the hour, and no evidence of anything */
} AntSkyEvent;

typedef struct
{
  const AntObserver *observer; /* borrowed, checked (observer.h) */
  AntRadiiSet radii;
  AntLimbDarkening limb_darkening;
  const AntStop *stop;         /* looked at now and then; NULL: never */
} AntSkyOptions;

/* Events that overlap [from, to], by the time of their greatest phase. *event is allocated (free ()), NULL for none.
 * Of the Earth's shadow only for tables: the others stand on the ground or never enter it.
 * ANT_BAD_ARGUMENT: from > to, or outside the span of ant_observer_span. */
AntStatus ant_sky_events (const AntSkyOptions *options, double from_tt_d, double to_tt_d, size_t *n, AntSkyEvent **event);
