/* fill-values.h - telling the numbers that stand for "no value" from those that were measured. */
#pragma once

#include <glib.h>

typedef struct
{
  double value;
  gsize count;
  gboolean stated; /* by the user or the header, not judged */
} AntFill;

/* Numbers that the header calls missing ("Missing values are indicated by -99."). GArray of double; caller unrefs. */
GArray *ant_fill_stated (const GPtrArray *header);
/* Which fills the n values hold: the stated ones wherever they stand, and the usual ones (-99, -999, 0, 65535, -1e34 ...)
 * where they lie far outside everything else, the weaker of them only if repeated. GArray of AntFill; caller unrefs. */
GArray *ant_fill_judge (const double *value, gsize n, const GArray *stated);
/* The same in single precision: the fills found become NaN. Returns how many values they were. */
gsize ant_fill_clear (float *value, gsize n, const GArray *stated);
gboolean ant_fill_is (const GArray *fills, double value);
