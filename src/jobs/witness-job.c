/* witness-job.c - from a file to a comparison, and from a dip to what the other instrument has of it. */
#include "jobs/witness-job.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "jobs/record-open.h"
#include "jobs/scan-job.h"

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

void
ant_witness_job_fact (const AntComparison *comparison, const AntSettings *settings, const AntDip *dip, AntWitnessFact *fact)
{
  AntDip seen;
  double limit_ppm, sigma;
  *fact = (AntWitnessFact){ .depth_ppm = (double) NAN, .sigma_ppm = (double) NAN };
  fact->correlation = ant_comparison_correlation (comparison, dip->duration_d, &sigma);
  if (!ant_scan_job_ask (comparison->witness, settings, dip->mid_d - comparison->shift_d, dip->duration_d, &seen, &limit_ppm, NULL))
    return;
  fact->looking = 1;
  fact->depth_ppm = seen.depth_ppm;
  fact->sigma_ppm = seen.depth_sigma_ppm;
}
