/* record-slip.c - the way from the grid to stamps that slip against it. */
#include "data/record-slip.h"

#include <math.h>

#define QUARTER_STEPS 0.25 /* less than this is snapped, and nothing is lost by it */
#define TOGETHER_STEPS 0.05 /* rms from one sample to the next: a clock that drifts, not times that jump about */
#define REACH 2            /* places at either side that tell the slip at one */

void
ant_record_find_slip (AntRecord *record, const AntRowOrder *order, const AntCadence *cadence)
{
  double largest = 0.0, square = 0.0, last = 0.0;
  gsize n_pairs = 0;
  for (gsize k = 0; k < order->n; k++)
    {
      gint64 place = record->place[order->row[k]];
      double off = (order->time_d[k] - cadence->start_d) / cadence->step_d - (double) place;
      if (k > 0 && place == record->place[order->row[k - 1]] + 1)
        {
          square += (off - last) * (off - last);
          n_pairs++;
        }
      largest = fmax (largest, fabs (off));
      last = off;
    }
  if (largest < QUARTER_STEPS || n_pairs == 0 || sqrt (square / (double) n_pairs) > TOGETHER_STEPS)
    return;
  record->slip_d = g_new (float, record->series.n);
  for (gsize i = 0; i < record->series.n; i++)
    record->slip_d[i] = NAN;
  for (gsize k = 0; k < order->n; k++)
    {
      gint64 place = record->place[order->row[k]];
      record->slip_d[place] = (float) (order->time_d[k] - cadence->start_d - (double) place * cadence->step_d);
    }
}

double
ant_record_slip (const AntRecord *record, double grid_d)
{
  const AntSeries *series = &record->series;
  if (!record->slip_d)
    return 0.0;
  double place = CLAMP (rint (ant_series_place (series, grid_d)), 0.0, (double) series->n - 1.0);
  for (double reach = REACH;; reach *= 2.0)
    {
      double first = fmax (place - reach, 0.0), last = fmin (place + reach, (double) series->n - 1.0), sum = 0.0;
      gsize n = 0;
      for (gsize i = (gsize) first; i <= (gsize) last; i++)
        if (!isnan (record->slip_d[i]))
          {
            sum += (double) record->slip_d[i];
            n++;
          }
      if (n > 0)
        return sum / (double) n;
      if (first == 0.0 && last == (double) series->n - 1.0)
        return 0.0;
    }
}

void
ant_record_unslip (const AntRecord *record, size_t n, AntDip *dip)
{
  for (size_t i = 0; record->slip_d && i < n; i++)
    {
      double start_d = ant_record_slip (record, dip[i].mid_d - 0.5 * dip[i].duration_d);
      double end_d = ant_record_slip (record, dip[i].mid_d + 0.5 * dip[i].duration_d);
      dip[i].mid_d += 0.5 * (start_d + end_d);
      dip[i].duration_d = fmax (dip[i].duration_d + end_d - start_d, 0.5 * dip[i].duration_d);
    }
}
