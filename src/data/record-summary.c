/* record-summary.c - counting and measuring a record. */
#include "data/record-summary.h"

#include <math.h>
#include <string.h>

#include "core/robust.h"

static void
count_rows (const AntRecord *record, AntRecordSummary *summary)
{
  for (gsize i = 0; i < record->n_rows; i++)
    {
      summary->n_good += (record->flags[i] & ~ANT_FLAG_SPIKE) == 0;
      for (unsigned bit = 0; bit < ANT_N_FLAGS; bit++)
        summary->n_flagged[bit] += (record->flags[i] >> bit) & 1;
      if (isnan (record->time_d[i]))
        continue;
      if (!summary->has_times)
        summary->first_d = summary->last_d = record->time_d[i];
      summary->has_times = TRUE;
      summary->first_d = fmin (summary->first_d, record->time_d[i]);
      summary->last_d = fmax (summary->last_d, record->time_d[i]);
    }
}

/* A common shift is not jitter: stamps may mark starts or ends. */
static void
measure_jitter (const AntRecord *record, AntRecordSummary *summary)
{
  double sum = 0.0, sum_squares = 0.0, least = HUGE_VAL, most = -HUGE_VAL;
  gsize n = 0;
  for (gsize i = 0; i < record->n_rows; i++)
    if (record->place[i] >= 0 && (record->flags[i] & ~ANT_FLAG_SPIKE) == 0)
      {
        double off_d = record->time_d[i] - ant_series_time (&record->series, (double) record->place[i]);
        sum += off_d;
        sum_squares += off_d * off_d;
        least = fmin (least, off_d);
        most = fmax (most, off_d);
        n++;
      }
  if (n == 0)
    return;
  double mean = sum / (double) n;
  summary->jitter_rms_d = sqrt (fmax (sum_squares / (double) n - mean * mean, 0.0));
  summary->jitter_most_d = fmax (most - mean, mean - least);
}

static void
measure_scatter (const AntRecord *record, AntRecordSummary *summary)
{
  const AntSeries *series = &record->series;
  g_autofree double *work = g_new (double, series->n);
  for (gsize i = 0; i < series->n; i++)
    work[i] = (double) series->value_ppm[i];
  summary->scatter_ppm = ant_mad_sigma (series->n, work, work);
  for (gsize i = 0; i + 1 < series->n; i++)
    work[i] = ((double) series->value_ppm[i + 1] - (double) series->value_ppm[i]) * M_SQRT1_2;
  summary->sample_scatter_ppm = ant_mad_sigma (series->n - 1, work, work);
}

void
ant_record_summarise (const AntRecord *record, gboolean gridded, AntRecordSummary *summary)
{
  memset (summary, 0, sizeof *summary);
  count_rows (record, summary);
  if (!gridded)
    return;
  summary->n_places = record->series.n;
  summary->n_observed = ant_series_observed (&record->series, 0);
  measure_jitter (record, summary);
  measure_scatter (record, summary);
  for (guint i = 0; i < record->gaps->len; i++)
    {
      const AntSpan *gap = &g_array_index (record->gaps, AntSpan, i);
      if (gap->end_d - gap->start_d > summary->longest_gap_d)
        {
          summary->longest_gap_d = gap->end_d - gap->start_d;
          summary->longest_gap_start_d = gap->start_d;
        }
    }
}
