/* sighting.c - predicted events in a record's time and on its grid. */
#include "data/sighting.h"

#include <math.h>

#define SIGMAS 3.0

AntSighting
ant_sighting_new (const AntSkyEvent *event, double origin_tt_d)
{
  AntSighting sighting = { .event = *event, .start_d = event->start_tt_d - origin_tt_d, .end_d = event->end_tt_d - origin_tt_d,
                           .greatest_d = event->greatest_tt_d - origin_tt_d, .expected_ppm = event->depth_ppm,
                           .expected_sample_ppm = NAN,
                           .measured = { .depth_ppm = NAN, .sigma_ppm = NAN, .snr = NAN, .coverage = NAN } };
  for (int i = 0; i < ANT_N_CONTACTS; i++)
    sighting.contact_d[i] = event->contact_tt_d[i] - origin_tt_d;
  return sighting;
}

GArray *
ant_sighting_shape (const AntRecord *record, const AntSkyCurve *curve, double origin_tt_d, gssize *first)
{
  const AntSeries *series = &record->series;
  GArray *shape = g_array_new (FALSE, FALSE, sizeof (double));
  double half_d = 0.5 * record->exposure_d, start_d = curve->start_tt_d - origin_tt_d;
  double end_d = start_d + (double) (curve->n - 1) * curve->step_d;
  double from = ceil (ant_series_place (series, start_d - half_d)), to = floor (ant_series_place (series, end_d + half_d));
  *first = 0;
  if (!(from <= to && to >= 0 && from <= (double) series->n - 1) || !(curve->greatest > 0))
    return shape;
  *first = (gssize) from;
  for (double place = from; place <= to; place++)
    {
      double loss = ant_sky_curve_mean (curve, origin_tt_d + ant_series_time (series, place), record->exposure_d) / curve->greatest;
      g_array_append_val (shape, loss);
    }
  return shape;
}

AntShown
ant_sighting_judge (const AntSighting *sighting)
{
  const AntAmplitude *measured = &sighting->measured;
  double sigma = measured->sigma_ppm;
  if (!(sigma > 0))
    return ANT_SHOWN_GAP;
  gboolean like_expected = fabs (measured->depth_ppm - sighting->expected_ppm) <= SIGMAS * sigma;
  gboolean like_nothing = fabs (measured->depth_ppm) <= SIGMAS * sigma;
  if (like_expected)
    return sighting->expected_ppm < SIGMAS * sigma && like_nothing ? ANT_SHOWN_FAINT : ANT_SHOWN_AGREES;
  return like_nothing ? ANT_SHOWN_ABSENT : ANT_SHOWN_DIFFERS;
}

gboolean
ant_sighting_is_dark (const AntRecord *record, const AntSighting *sighting)
{
  double dark_d = 0;
  for (guint i = 0; i < record->dark_spans->len; i++)
    {
      const AntSpan *span = &g_array_index (record->dark_spans, AntSpan, i);
      dark_d += MAX (0, MIN (span->end_d, sighting->end_d) - MAX (span->start_d, sighting->start_d));
    }
  return dark_d > 0.5 * (sighting->end_d - sighting->start_d);
}
