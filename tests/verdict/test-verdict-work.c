/* test-verdict-work.c - whole records judged: the quick form of the study, the same record at two cadences, order of slices. */
#include <glib.h>
#include <math.h>
#include "driving.h"
#include "models.h"
#include "population.h"
#include "verdict/verdict-work.h"

static const AntCauseRates rates = { { 50, 1, 20, 20, 10, 110, 0 } };

static AntVerdictWork *
judge (const AntSeries *series, const AntScan *scan, AntVerdictInput *input, int backwards)
{
  AntStatus status;
  *input = (AntVerdictInput) { .series = series, .exposure_d = series->step_d, .limb_darkening = ANT_LIMB_DARKENING_SUN,
                               .options = { .target_star = 1, .rates = rates } };
  input->n_chunks = ant_scan_chunks (scan, &input->chunk);
  input->n_dips = ant_scan_dips (scan, &input->dip);
  input->n_brightenings = ant_scan_brightenings (scan, &input->brightening);
  AntVerdictWork *work = ant_verdict_work_new (input, &status);
  const AntStages *stages = ant_verdict_work_stages ();
  g_assert_nonnull (work);
  for (size_t stage = 0; stage < stages->n_stages; stage++)
    {
      size_t count = stages->count (work, stage);
      for (size_t i = 0; i < count; i++)
        g_assert_cmpint (stages->run_slice (work, stage, backwards ? count - 1 - i : i), ==, ANT_OK);
      g_assert_cmpint (stages->finish (work, stage), ==, ANT_OK);
    }
  return work;
}

static void
check_sums (const AntVerdict *verdict)
{
  double shape = 0, rival = 0, cause = 0;
  for (int i = 0; i < ANT_N_CAUSES; i++)
    {
      shape += verdict->shape_probability[i];
      cause += verdict->probability[i];
    }
  for (int i = 0; i <= ANT_N_RIVALS; i++)
    rival += verdict->rival_probability[i];
  g_assert_cmpfloat_with_epsilon (shape, 1, 1e-9);
  g_assert_cmpfloat_with_epsilon (rival, 1, 1e-9);
  g_assert_cmpfloat_with_epsilon (cause, 1, 1e-9);
}

/* One kind of event planted alone in eight days of model A, at a modest SNR, and judged. */
static void
check_kind (AntTruth truth, AntCause expected)
{
  size_t n = (size_t) (8 * 288), judged = 0, right = 0;
  double step_d = 5 / 1440.0;
  g_autofree float *value = g_new (float, n);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  options.threshold_snr = 6;
  for (unsigned long seed = 0; seed < 3; seed++)
    {
      AntRandom random;
      AntPlantedEvent event;
      AntVerdictInput input;
      AntSeries series = ant_study_record ('A', ANT_MASK_L1, n, step_d, 70 + seed, value);
      ant_random_seed (&random, 70 + seed, 3);
      ant_population_plant ('A', &series, truth, 4, 40, &random, value, &event);
      AntScan *scan = scan_to_the_end (&series, &options);
      AntVerdictWork *work = judge (&series, scan, &input, 0);
      for (size_t i = 0; i < input.n_dips; i++)
        {
          check_sums (&ant_verdict_work_dips (work)[i]);
          if (input.dip[i].mid_d < event.from_d - 0.5 || input.dip[i].mid_d > event.to_d + 0.5)
            continue;
          judged++;
          right += ant_verdict_work_dips (work)[i].shape == expected;
        }
      ant_verdict_work_free (work);
      ant_scan_free (scan);
    }
  g_assert_cmpuint (judged, >=, 2);
  g_assert_cmpuint (right, ==, judged);
}

static void test_crossings (void) { check_kind (ANT_TRUTH_CROSSING, ANT_CAUSE_PLANET); }
static void test_steps (void) { check_kind (ANT_TRUTH_STEP, ANT_CAUSE_INSTRUMENT); }
static void test_recoveries (void) { check_kind (ANT_TRUTH_RECOVERY, ANT_CAUSE_INSTRUMENT); }
static void test_thermal (void) { check_kind (ANT_TRUTH_THERMAL, ANT_CAUSE_INSTRUMENT); }
static void test_eclipses (void) { check_kind (ANT_TRUTH_ECLIPSE, ANT_CAUSE_ECLIPSE); }

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

static void
test_order_of_slices (void)
{
  size_t n = (size_t) (ANT_POPULATION_DAYS * 144);
  g_autofree float *value = g_new (float, n);
  AntPlantedEvent event[ANT_POPULATION_EVENTS];
  AntVerdictInput input;
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  AntSeries series = ant_population_record ('C', ANT_MASK_LOW_ORBIT, n, 10 / 1440.0, 5, 10, 60, value, event);
  AntScan *scan = scan_to_the_end (&series, &options);
  AntVerdictWork *there = judge (&series, scan, &input, 0), *back = judge (&series, scan, &input, 1);
  g_assert_cmpuint (input.n_dips, >, 0);
  for (size_t i = 0; i < input.n_dips; i++)
    for (int cause = 0; cause < ANT_N_CAUSES; cause++)
      g_assert_cmpfloat (ant_verdict_work_dips (there)[i].probability[cause], ==, ant_verdict_work_dips (back)[i].probability[cause]);
  ant_verdict_work_free (there);
  ant_verdict_work_free (back);
  ant_scan_free (scan);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/verdict/work/crossings-are-planets", test_crossings);
  g_test_add_func ("/verdict/work/steps-are-the-instrument", test_steps);
  g_test_add_func ("/verdict/work/recoveries-are-the-instrument", test_recoveries);
  g_test_add_func ("/verdict/work/gradual-falls-are-the-instrument", test_thermal);
  g_test_add_func ("/verdict/work/eclipses-are-eclipses", test_eclipses);
  g_test_add_func ("/verdict/work/one-minute-and-ten-minutes-agree", test_cadence);
  g_test_add_func ("/verdict/work/order-of-slices-does-not-matter", test_order_of_slices);
  return g_test_run ();
}
