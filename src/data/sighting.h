/* sighting.h - what should have crossed the Sun while a record was taken, in the record's own time, and what the record
 * shows of it. */
#pragma once

#include "data/record.h"
#include "search/scan.h"
#include "sky/sky-curve.h"

/* What the record has to say of a predicted event. */
typedef enum
{
  ANT_SHOWN_UNKNOWN,   /* not looked at */
  ANT_SHOWN_GAP,       /* not observed, or too little of it */
  ANT_SHOWN_DARK,      /* its samples are set aside as dark or covered: what an eclipse does */
  ANT_SHOWN_AGREES,    /* the depth is within 3 sigma of what is expected */
  ANT_SHOWN_ABSENT,    /* there is no dip where one of 3 sigma and more is expected */
  ANT_SHOWN_FAINT,     /* neither: what is expected is below 3 sigma */
  ANT_SHOWN_DIFFERS,   /* there is a dip of another depth */
  ANT_SHOWN_UNPLACED,  /* the observer's place is not known: nothing definite to look for */
  ANT_N_SHOWN,
} AntShown;

typedef struct
{
  AntSkyEvent event;
  double contact_d[ANT_N_CONTACTS]; /* the record's elapsed days; NaN as in the event */
  double start_d, end_d, greatest_d;

  AntShown shown;
  double expected_ppm;        /* depth before smearing */
  double expected_sample_ppm; /* of the sample that shows most of it: averaged over the exposure */
  AntAmplitude measured;      /* NaN where nothing could be measured; coverage is that of the predicted shape */
} AntSighting;

/* An event in the time of a record whose time 0 is `origin_tt_d` (ant_time_reference_tt_origin). */
AntSighting ant_sighting_new (const AntSkyEvent *event, double origin_tt_d);
/* The predicted loss on the record's grid, averaged over its exposures and scaled to a greatest loss of 1 before that: *first
 * and the array's length say where. Empty if the event is outside the record. Caller unrefs (GArray of double). */
GArray *ant_sighting_shape (const AntRecord *record, const AntSkyCurve *curve, double origin_tt_d, gssize *first);
/* Decide from what was measured; expected depth and amplitude are filled. */
AntShown ant_sighting_judge (const AntSighting *sighting);
/* Whether half of the event's time in the record is set aside as dark or covered. */
gboolean ant_sighting_is_dark (const AntRecord *record, const AntSighting *sighting);
