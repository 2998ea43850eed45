/* record-distance.h - whether a record's values stand at the observer's distance from the Sun or at 1 au, and the way
 * between. Inside the data room only; docs/data.md gives the rules. */
#pragma once

#include "data/row-order.h"

/* Tell by name and by the yearly swing where the values stand, say it, and convert them if the options ask. Sets the record's
 * distance fields. FALSE with one sentence if a conversion is asked that cannot be made. */
gboolean ant_record_settle_distance (AntRecord *record, const AntRowOrder *order, const AntGridOptions *options, GError **error);

/* A least-squares slope of a record on the yearly swing: 1 at the observer's distance, 0 at 1 au. */
typedef struct
{
  double slope, sigma; /* NaN where the record cannot tell: shorter than 60 days, or no times */
} AntYearlySwing;
/* n values at days of TT from J2000.0, rising; one a day is enough. Pure. */
AntYearlySwing ant_yearly_swing (gsize n, const double *tt_d, const double *value);
