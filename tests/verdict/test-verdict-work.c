/* test-verdict-work.c - whole records judged: the quick form of the study, and that the order of slices does not matter. */
#include <glib.h>
#include <math.h>
#include "judging.h"
#include "models.h"
#include "population.h"

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
  size_t n = (size_t) (8 * 144), judged = 0, right = 0;
  double step_d = 10 / 1440.0;
  g_autofree float *value = g_new (float, n);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  options.threshold_snr = 6;
  for (unsigned long seed = 0; seed < 1; seed++)
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
  g_assert_cmpuint (judged, >=, 1);
  g_assert_cmpuint (right, ==, judged);
}

static void test_crossings (void) { check_kind (ANT_TRUTH_CROSSING, ANT_CAUSE_PLANET); }
static void test_steps (void) { check_kind (ANT_TRUTH_STEP, ANT_CAUSE_INSTRUMENT); }
static void test_recoveries (void) { check_kind (ANT_TRUTH_RECOVERY, ANT_CAUSE_INSTRUMENT); }
static void test_thermal (void) { check_kind (ANT_TRUTH_THERMAL, ANT_CAUSE_INSTRUMENT); }
static void test_eclipses (void) { check_kind (ANT_TRUTH_ECLIPSE, ANT_CAUSE_ECLIPSE); }

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
  g_test_add_func ("/verdict/work/order-of-slices-does-not-matter", test_order_of_slices);
  return g_test_run ();
}
