/* ticks.h - where an axis is marked and what is written there: linear and logarithmic values, days, calendar time.
 *
 * Labelled ticks come first, ascending, then the unlabelled ones in no order. Labels are as many as can stand
 * without touching, judged by their true size: the ruler measures them. */
#pragma once

#include <stddef.h>

#define ANT_MAX_TICKS 256

typedef struct
{
  double value;
  int strong;     /* begins a larger unit: a day among hours, a year among months */
  char label[48];
} AntTick;

typedef struct
{
  size_t n_labelled, n; /* of n ticks the first n_labelled have text */
  AntTick tick[ANT_MAX_TICKS];
  char context[32];     /* what the labels leave out: "2041 UTC", "UTC", "days", or "" */
} AntTicks;

/* An axis on paper. */
typedef struct
{
  double length_px;
  double gap_px;                 /* least distance between two labels */
  double before_px, after_px;    /* how far labels may reach beyond the ends */
  double (*measure) (void *data, const char *label, int strong); /* extent of a label along the axis, px */
  void *data;
} AntRuler;

/* from < to; the log axis wants from > 0. */
void ant_ticks_linear (double from, double to, const AntRuler *ruler, AntTicks *ticks);
void ant_ticks_log (double from, double to, const AntRuler *ruler, AntTicks *ticks);

/* For makers of other axes: whether the labels stand apart and within the ends. */
int ant_ticks_fit (const AntTicks *ticks, double from, double to, int is_log, const AntRuler *ruler);
/* Add one tick, if there is room. label NULL: unlabelled. */
void ant_ticks_add (AntTicks *ticks, double value, const char *label);
