/* time-form.h - how the cells of a row make up its time, and the way from them to elapsed days. */
#pragma once

#include "data/time-reference.h"
#include "readers/text-cell.h"

#define ANT_MOST_TIME_PARTS 6

/* What one cell contributes. The first part is a date or a whole time, the others add to it. */
typedef enum
{
  ANT_PART_NUMBER,       /* JD, days, Unix seconds: the style says */
  ANT_PART_FRACTION,     /* more of that number, kept apart from it */
  ANT_PART_ISO,          /* an ISO 8601 date or time */
  ANT_PART_YMD,          /* YYYYMMDD, with a day fraction perhaps */
  ANT_PART_YEAR,         /* a whole year; its day, or month and day, to follow */
  ANT_PART_MONTH,
  ANT_PART_DAY,          /* of the month, with a fraction perhaps */
  ANT_PART_DAY_OF_YEAR,  /* from 1, with a fraction perhaps */
  ANT_PART_DECIMAL_YEAR,
  ANT_PART_CLOCK,        /* hh:mm[:ss] */
  ANT_PART_HHMMSS,       /* as digits */
  ANT_PART_HHMM,
  ANT_PART_HOUR,
  ANT_PART_MINUTE,       /* of the hour, or of the day */
  ANT_PART_SECOND,       /* of the minute, or of the day */
} AntTimePart;

typedef struct
{
  AntStampStyle style;
  AntTimeScale scale;
  double offset;  /* ANT_STAMP_JD: JD minus the number */
  gboolean has_date;      /* the header gives the date, the parts are a clock */
  double date_jd;
  int zone_min;           /* the clock is ahead of UTC by so much, where its times do not say so themselves */
  int repeats[2];         /* columns that say the date and the clock once more, -1 if there is none */
  double offset_rest; /* more of it, kept apart: fractions of a day lose digits beside millions */
  double unit_d;  /* ANT_STAMP_DAYS */
  gboolean epoch_known; /* ANT_STAMP_DAYS: what the numbers count from, in `scale` */
  double epoch_jd1, epoch_jd2;
  guint n_parts;
  guint columns[ANT_MOST_TIME_PARTS]; /* from 0 */
  AntTimePart parts[ANT_MOST_TIME_PARTS];

  /* Working state of ant_time_form_read. */
  gboolean started;            /* the origin stands: the midnight at or before the first time read */
  double origin_jd, own_zero;
  double day_jd, day_start_d, day_length_d; /* the day last met, so that leap seconds cost nothing per row */
  double day_own;                           /* ANT_STAMP_JD: the record's number at its midnight */
} AntTimeForm;

#define ANT_TIME_FORM_INIT { .unit_d = 1.0, .repeats = { -1, -1 } }

/* How many parts make up the date; the rest are clocks. */
guint ant_time_form_date_parts (const AntTimeForm *form);
/* Elapsed days of a row from its time cells [n_parts]; the first readable one sets the origin. NaN if it cannot be read. */
double ant_time_form_read (AntTimeForm *form, const AntCell *const *cells);
/* What the form has come to mean; call after the last row. Fills all but `place`. */
void ant_time_form_reference (const AntTimeForm *form, AntTimeReference *reference);
