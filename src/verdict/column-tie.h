/* column-tie.h - does a further column of the record move with an event? */
#pragma once

#include "noise/series.h"
#include "search/dip.h"

/* The record around an event (half again its length on either side, two hours at least) regressed on a column [series->n], each less its own straight
 * line there, and the same with the column taken from up to 400 other places of the record: how many times their spread the
 * first regression's moment is. So neither the column's own memory nor how often it wanders counts for anything. NaN where
 * the column says nothing: less than half of it is there, it stands still, or the record is too short. */
double ant_column_tie (const AntSeries *series, const float *column, const AntDip *dip);
