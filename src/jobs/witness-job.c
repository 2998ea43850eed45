/* witness-job.c - from a file to a comparison, and from a dip to what the other instrument has of it. */
#include "jobs/witness-job.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "jobs/scan-job.h"
#include "readers/reader.h"

#define COLUMNS_MARK "::"

gboolean
ant_witness_parse (const char *text, char **path, AntReadingChoices *choices, GError **error)
{
  const char *mark = g_strrstr (text, COLUMNS_MARK);
  memset (choices, 0, sizeof *choices);
  *path = mark ? g_strndup (text, (gsize) (mark - text)) : g_strdup (text);
  return !mark || ant_reading_choices_parse_columns (choices, mark + strlen (COLUMNS_MARK), error);
}

AntComparison *
ant_witness_job_open (AntRecord *record, const char *path, const AntReadingChoices *choices, const AntSettings *settings,
                      GCancellable *cancellable, GError **error)
{
  g_autoptr (AntRecord) witness = ant_reader_open (path, choices, cancellable, error);
  AntGridOptions grid = ant_settings_grid (settings);
  grid.exposure_d = grid.cadence_d = 0.0;
  grid.stamp = ANT_AT_UNKNOWN;
  if (!witness || !ant_record_make_grid (witness, &grid, error))
    {
      g_prefix_error (error, _("the witness: "));
      return NULL;
    }
  return ant_comparison_new (record, witness, settings->witness_drift_d, error);
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
