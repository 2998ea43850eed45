/* witness-job.c - from a file to a comparison, and from a dip to what the other instrument has of it. */
#include "jobs/witness-job.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/record-slip.h"
#include "data/scan-results.h"
#include "jobs/record-open.h"
#include "search/crossing-shape.h"

#define COLUMNS_MARK "::"

AntWitness *
ant_witness_parse (const char *text, GError **error)
{
  const char *mark = g_strrstr (text, COLUMNS_MARK);
  g_autofree char *path = mark ? g_strndup (text, (gsize) (mark - text)) : g_strdup (text);
  g_autoptr (AntWitness) witness = ant_witness_new (path, NULL, NULL);
  if (mark && !ant_reading_choices_parse_columns (&witness->reading, mark + strlen (COLUMNS_MARK), error))
    return NULL;
  return g_steal_pointer (&witness);
}

AntComparison *
ant_witness_job_open (AntRecord *record, const AntWitness *witness, const AntSettings *settings, GCancellable *cancellable,
                      GError **error)
{
  g_autoptr (AntRecord) read = ant_record_open (witness->path, &witness->reading, 0, cancellable, error);
  AntGridOptions grid = ant_settings_grid (settings);
  grid.exposure_d = grid.cadence_d = 0.0;
  grid.stamp = ANT_AT_UNKNOWN;
  if (!read || !ant_record_make_grid (read, &grid, error))
    {
      g_prefix_error (error, _("the witness: "));
      return NULL;
    }
  return ant_comparison_new (record, read, settings->witness_drift_d, error);
}

/* The shape that was fitted to a dip, as the witness would average it: places of its series, from *first on. Caller frees. */
static double *
shape_for (const AntRecord *witness, const AntSettings *settings, const AntDip *dip, double mid_d, ptrdiff_t *first, gsize *n)
{
  AntCrossingShape shape;
  double reach_d = 0.5 * (dip->duration_d + witness->exposure_d);
  ant_crossing_shape_init (&shape, dip->duration_d, fmin (dip->edge_d, 0.5 * dip->duration_d), ANT_SHAPE_IMPACT, settings->bank.limb_darkening);
  *first = (ptrdiff_t) ceil (ant_series_place (&witness->series, mid_d - reach_d));
  ptrdiff_t last = (ptrdiff_t) floor (ant_series_place (&witness->series, mid_d + reach_d));
  *n = last >= *first ? (gsize) (last - *first) + 1 : 0;
  double *loss = g_new (double, *n + 1);
  for (gsize i = 0; i < *n; i++)
    loss[i] = ant_crossing_shape_mean (&shape, ant_series_time (&witness->series, (double) (*first + (ptrdiff_t) i)) - mid_d, witness->exposure_d);
  return loss;
}

void
ant_witness_job_fact (const AntComparison *comparison, const AntSettings *settings, const AntDip *dip, AntWitnessFact *fact)
{
  const AntRecord *witness = comparison->witness;
  AntScanOptions options = ant_scan_results_options (witness, settings);
  AntAmplitude seen;
  double sigma;
  ptrdiff_t first;
  gsize n;
  double mid_d = dip->mid_d - comparison->shift_d;
  g_autofree double *loss = shape_for (witness, settings, dip, mid_d - ant_record_slip (witness, mid_d), &first, &n);
  *fact = (AntWitnessFact){ .depth_ppm = (double) NAN, .sigma_ppm = (double) NAN };
  fact->correlation = ant_comparison_correlation (comparison, dip->duration_d, &sigma);
  if (n == 0 || ant_scan_asked_shape (&witness->series, &options, first, n, loss, &seen))
    return;
  fact->looking = 1;
  fact->depth_ppm = seen.depth_ppm;
  fact->sigma_ppm = seen.sigma_ppm;
  /* What one of them did not see of the dip is no part of what they share. */
  double less = fmin (seen.coverage, dip->coverage), more = fmax (seen.coverage, dip->coverage);
  if (more > 0 && less >= 0)
    fact->correlation *= sqrt (less / more);
}
