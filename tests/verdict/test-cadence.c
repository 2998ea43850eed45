/* test-cadence.c - a record of one minute and the same in means of ten get the same verdicts. */
#include <glib.h>
#include <math.h>
#include "judging.h"
#include "models.h"
#include "population.h"

static void
judge_alone (const AntSeries *series, double threshold_snr, AntVerdict *verdict)
{
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  AntVerdictInput input;
  options.threshold_snr = threshold_snr;
  AntScan *scan = scan_to_the_end (series, &options);
  AntVerdictWork *work = judge (series, scan, &input, 0);
  size_t best = 0;
  g_assert_cmpuint (input.n_dips, >, 0);
  for (size_t i = 1; i < input.n_dips; i++)
    best = input.dip[i].snr > input.dip[best].snr ? i : best;
  *verdict = ant_verdict_work_dips (work)[best];
  ant_verdict_work_free (work);
  ant_scan_free (scan);
}

/* A record of one minute and the same in means of ten: the verdict counts no trials, so it does not know the cadence. */
static void
test_cadence (void)
{
  enum { N = 8 * 1440, TEN = 10 };
  static const AntTruth kind[] = { ANT_TRUTH_CROSSING, ANT_TRUTH_RECOVERY, ANT_TRUTH_ECLIPSE };
  for (size_t k = 0; k < G_N_ELEMENTS (kind); k++)
    {
      g_autofree float *fine = g_new (float, N), *coarse = g_new (float, N / TEN);
      AntRandom random;
      AntPlantedEvent event;
      AntVerdict one, ten;
      AntSeries series = ant_study_record ('A', ANT_MASK_L1, N, 1 / 1440.0, 90 + k, fine);
      ant_random_seed (&random, 90 + k, 3);
      for (size_t i = 0; i < N; i++)
        fine[i] = isnan (fine[i]) ? 0 : fine[i]; /* whole bins */
      ant_population_plant ('A', &series, kind[k], 4, 9 + 3 * (double) k, &random, fine, &event);
      for (size_t i = 0; i < N / TEN; i++)
        {
          double sum = 0;
          for (size_t j = 0; j < TEN; j++)
            sum += (double) fine[i * TEN + j];
          coarse[i] = (float) (sum / TEN);
        }
      AntSeries binned = { .n = N / TEN, .step_d = TEN / 1440.0, .start_d = 4.5 / 1440, .value_ppm = coarse };
      judge_alone (&series, 5, &one);
      judge_alone (&binned, 5, &ten);
      for (int cause = 0; cause < ANT_N_CAUSES; cause++)
        {
          g_test_message ("%s cause %d: %.3f %.3f", ant_truth_name[kind[k]], cause, one.shape_probability[cause], ten.shape_probability[cause]);
          g_assert_cmpfloat_with_epsilon (one.shape_probability[cause], ten.shape_probability[cause], 0.05);
        }
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/verdict/cadence/one-minute-and-ten-minutes-agree", test_cadence);
  return g_test_run ();
}
