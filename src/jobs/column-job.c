/* column-job.c - columns sorted into bands and housekeeping, and asked about single events. */
#include "jobs/column-job.h"

#include <math.h>
#include <string.h>

#include "core/robust.h"
#include "core/solar-limb.h"
#include "core/units.h"
#include "data/scan-results.h"
#include "verdict/column-tie.h"

#define LEAST_PART 0.3       /* of the record's samples that a column must have */
#define SAME 0.95            /* correlation of changes from sample to sample of what is one and the same */
#define ONE_WAY 0.98         /* share of such changes in one direction from which a column is a clock or a counter */
#define LARGEST_SWING 0.5    /* of a band about its median */

typedef struct
{
  gsize index;      /* among the record's columns */
  float *value;     /* [series.n] on the grid: a band in ppm of its median */
  double nm;        /* wavelength of a band; NaN: housekeeping */
} Column;

struct _AntColumnJob
{
  AntRecord *record;
  const AntSettings *settings;
  GArray *column; /* of Column */
  gsize n_housekeeping;
};

void
ant_column_job_free (AntColumnJob *job)
{
  if (!job)
    return;
  for (guint i = 0; i < job->column->len; i++)
    g_free (g_array_index (job->column, Column, i).value);
  g_array_unref (job->column);
  g_free (job);
}

/* Whether a column has enough numbers, moves, is no clock, and is not the record itself once more. */
static gboolean
says_something (const AntSeries *series, const float *value)
{
  gsize there = 0, changes = 0, up = 0, observed = 0;
  double xx = 0, xy = 0, yy = 0;
  for (gsize i = 0; i < series->n; i++)
    {
      observed += !isnan (series->value_ppm[i]);
      there += !isnan (value[i]) && !isnan (series->value_ppm[i]);
      if (i == 0 || isnan (value[i]) || isnan (value[i - 1]))
        continue;
      double x = (double) value[i] - (double) value[i - 1], y = (double) series->value_ppm[i] - (double) series->value_ppm[i - 1];
      changes += x != 0;
      up += x > 0;
      if (isnan (y))
        continue;
      xx += x * x;
      xy += x * y;
      yy += y * y;
    }
  double one_way = changes ? fmax ((double) up, (double) (changes - up)) / (double) changes : 1;
  return (double) there >= LEAST_PART * (double) observed && changes > 10 && one_way < ONE_WAY
         && fabs (xy) < SAME * sqrt (xx * yy);
}

/* In ppm of its median; FALSE if it is no irradiance. */
static gboolean
make_band (gsize n, float *value)
{
  g_autofree double *all = g_new (double, n), *work = g_new (double, n);
  for (gsize i = 0; i < n; i++)
    all[i] = (double) value[i];
  double median = ant_median (n, all, work);
  if (!(median > 0))
    return FALSE;
  for (gsize i = 0; i < n; i++)
    {
      double relative = (double) value[i] / median - 1;
      value[i] = fabs (relative) < LARGEST_SWING ? (float) (relative / ANT_PPM) : NAN;
    }
  return TRUE;
}

static gboolean
same_unit (const AntRecord *record, const AntColumn *column)
{
  return record->value_unit && column->unit && g_ascii_strcasecmp (record->value_unit, column->unit) == 0;
}

AntColumnJob *
ant_column_job_new (AntRecord *record, const AntSettings *settings)
{
  g_autoptr (AntColumnJob) job = g_new0 (AntColumnJob, 1);
  *job = (AntColumnJob) { record, settings, g_array_new (FALSE, FALSE, sizeof (Column)), 0 };
  for (guint i = 0; i < record->columns->len; i++)
    {
      const AntColumn *column = g_ptr_array_index (record->columns, i);
      double nm = ant_column_wavelength_nm (column->name);
      if (ant_column_is_bookkeeping (column->name) || (isnan (nm) && same_unit (record, column)))
        continue;
      Column one = { i, ant_record_column_on_grid (record, column), nm };
      if (says_something (&record->series, one.value) && (isnan (nm) || make_band (record->series.n, one.value)))
        g_array_append_val (job->column, one);
      else
        g_free (one.value);
      job->n_housekeeping += isnan (nm) && job->column->len && g_array_index (job->column, Column, job->column->len - 1).index == i;
    }
  return job->column->len ? g_steal_pointer (&job) : NULL;
}

/* Depth of the event in a series of the same grid, with its length. */
static gboolean
measure (const AntColumnJob *job, const float *value_ppm, const AntDip *dip, double *depth_ppm, double *sigma_ppm)
{
  AntSeries series = job->record->series;
  AntScanOptions options = ant_scan_results_options (job->record, job->settings);
  AntDip seen;
  if (value_ppm != series.value_ppm)
    series.error_ppm = NULL;
  series.value_ppm = value_ppm;
  if (ant_scan_asked (&series, &options, dip->mid_d, dip->duration_d, &seen))
    return FALSE;
  *depth_ppm = seen.depth_ppm;
  *sigma_ppm = seen.depth_sigma_ppm;
  return TRUE;
}

static void
add_bands (const AntColumnJob *job, const AntDip *dip, AntVerdict *verdict)
{
  AntBandFact best = { .sigma_ppm = { NAN, NAN } };
  const AntRivalFit *crossing = &verdict->rival[ANT_RIVAL_CROSSING];
  double own_nm = ant_column_wavelength_nm (job->record->value_name ? job->record->value_name : "");
  best.limb_darkening[0] = isnan (own_nm) ? job->settings->bank.limb_darkening : ant_solar_limb (own_nm);
  for (guint i = 0; i < job->column->len && crossing->fitted; i++)
    {
      const Column *column = &g_array_index (job->column, Column, i);
      double depth_ppm, sigma_ppm;
      if (isnan (column->nm) || !measure (job, column->value, dip, &depth_ppm, &sigma_ppm) || sigma_ppm >= best.sigma_ppm[1])
        continue;
      best.depth_ppm[1] = depth_ppm;
      best.sigma_ppm[1] = sigma_ppm;
      best.limb_darkening[1] = ant_solar_limb (column->nm);
    }
  AntEvidence evidence;
  if (isnan (best.sigma_ppm[1])
      || !measure (job, job->record->series.value_ppm, dip, &best.depth_ppm[0], &best.sigma_ppm[0]))
    return;
  ant_evidence_bands (&best, crossing->mean[3], crossing->mean[2], &evidence);
  ant_verdict_add (verdict, &evidence);
}

static void
add_housekeeping (const AntColumnJob *job, const AntDip *dip, AntVerdict *verdict)
{
  double most = 0;
  gsize index = 0;
  for (guint i = 0; i < job->column->len; i++)
    {
      const Column *column = &g_array_index (job->column, Column, i);
      double tie = isnan (column->nm) ? ant_column_tie (&job->record->series, column->value, dip) : (double) NAN;
      if (fabs (tie) > fabs (most))
        {
          most = tie;
          index = column->index;
        }
    }
  AntEvidence evidence;
  if (most == 0)
    return;
  ant_evidence_column (most, job->n_housekeeping, index, &evidence);
  ant_verdict_add (verdict, &evidence);
}

void
ant_column_job_add (const AntColumnJob *job, const AntDip *dip, AntVerdict *verdict)
{
  if (verdict->sign > 0)
    add_bands (job, dip, verdict);
  add_housekeeping (job, dip, verdict);
}
