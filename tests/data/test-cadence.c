/* test-cadence.c - the even step is found whatever the times look like, and no place is far from its time. */
#include <math.h>
#include "data/cadence.h"

#define HOUR (1.0 / 24.0)

static AntCadence
find (gsize n, const double *time_d)
{
  AntCadence cadence;
  g_assert_true (ant_cadence_find (n, time_d, 0.0, &cadence));
  return cadence;
}

/* The promise of every placing: never back, never farther than 0.6 of a step. */
static void
assert_near_places (const AntCadence *cadence, gsize n, const double *time_d)
{
  g_autofree gint64 *place = g_new (gint64, n);
  ant_cadence_place (cadence, n, time_d, place);
  for (gsize i = 0; i < n; i++)
    {
      double off = (time_d[i] - cadence->start_d) / cadence->step_d - (double) place[i];
      g_assert_cmpfloat (fabs (off), <=, 0.6 + 1e-9);
      if (i > 0)
        g_assert_cmpint (place[i], >=, place[i - 1]);
    }
}

static void
test_even (void)
{
  double time_d[1000];
  for (int i = 0; i < 1000; i++)
    time_d[i] = 51544.2 + i * HOUR;
  AntCadence cadence = find (1000, time_d);
  g_assert_cmpfloat_with_epsilon (cadence.step_d, HOUR, 1e-12);
  g_assert_cmpfloat_with_epsilon (cadence.start_d, 51544.2, 1e-9);
}

static void
test_rounded (void)
{
  double time_d[5000];
  for (int i = 0; i < 5000; i++)
    time_d[i] = rint ((12.0 + i * HOUR) * 100.0) / 100.0;
  AntCadence cadence = find (5000, time_d);
  g_assert_cmpfloat_with_epsilon (cadence.step_d, HOUR, 1e-6);
  g_autofree gint64 *place = g_new (gint64, 5000);
  ant_cadence_place (&cadence, 5000, time_d, place);
  for (int i = 0; i < 5000; i++)
    g_assert_cmpint (place[i], ==, i);
}

/* A low orbit: runs of 25 samples every 92.6 min on one clock, each time off by up to 2 ms. */
static void
test_low_orbit (void)
{
  double step_d = 49.99909 / 86400.0;
  g_autofree double *time_d = g_new (double, 4000);
  g_autofree gint64 *truth = g_new (gint64, 4000), *place = g_new (gint64, 4000);
  g_autoptr (GRand) random = g_rand_new_with_seed (2);
  gsize n = 0;
  for (int run = 0; run < 160; run++)
    for (int i = 0; i < 25; i++, n++)
      {
        truth[n] = (gint64) rint (run * 92.6 * 60.0 / 50.0) + i;
        time_d[n] = (double) truth[n] * step_d + g_rand_double_range (random, -0.002, 0.002) / 86400.0;
      }
  AntCadence cadence = find (n, time_d);
  g_assert_cmpfloat_with_epsilon (cadence.step_d, step_d, 1e-12);
  ant_cadence_place (&cadence, n, time_d, place);
  for (gsize i = 0; i < n; i++)
    g_assert_cmpint (place[i] - place[0], ==, truth[i]);
}

/* The first guess from short neighbours is off by more than what a gap of a year allows; the joined runs are not. */
static void
test_long_gap (void)
{
  g_autofree double *time_d = g_new (double, 4000);
  for (int i = 0; i < 4000; i++)
    time_d[i] = rint ((i + (i >= 2000 ? 525600 : 0)) / 1440.0 * 1e5) / 1e5;
  AntCadence cadence = find (4000, time_d);
  g_autofree gint64 *place = g_new (gint64, 4000);
  ant_cadence_place (&cadence, 4000, time_d, place);
  g_assert_cmpint (place[3999] - place[0], ==, 3999 + 525600);
}

static void
test_daily_gaps (void)
{
  g_autofree double *time_d = g_new (double, 30 * 40);
  for (int day = 0; day < 30; day++)
    for (int i = 0; i < 40; i++)
      time_d[day * 40 + i] = day + i / 144.0;
  AntCadence cadence = find (30 * 40, time_d);
  g_assert_cmpfloat_with_epsilon (cadence.step_d, 1.0 / 144.0, 1e-9);
}

static void
test_runs_out_of_phase (void)
{
  g_autoptr (GRand) random = g_rand_new_with_seed (3);
  g_autofree double *time_d = g_new (double, 50 * 100);
  g_autofree gint64 *place = g_new (gint64, 50 * 100);
  for (int run = 0; run < 50; run++)
    {
      double phase = g_rand_double (random);
      for (int i = 0; i < 100; i++)
        time_d[run * 100 + i] = run * 300.0 + phase + i + 1e-4 * g_rand_double (random);
    }
  AntCadence cadence = find (50 * 100, time_d);
  g_assert_cmpfloat_with_epsilon (cadence.step_d, 1.0, 1e-4);
  assert_near_places (&cadence, 50 * 100, time_d);
  ant_cadence_place (&cadence, 50 * 100, time_d, place);
  int n_shared = 0;
  for (int i = 1; i < 50 * 100; i++)
    n_shared += place[i] == place[i - 1];
  g_assert_cmpint (n_shared, ==, 0);
}

static void
test_run_at_half_a_step (void)
{
  double time_d[300];
  gint64 place[300];
  for (int i = 0; i < 300; i++)
    time_d[i] = i + 0.5 + (i % 2 ? 0.003 : -0.003);
  ant_cadence_place (&(AntCadence){ .step_d = 1.0, .start_d = 0.0 }, 300, time_d, place);
  for (int i = 1; i < 300; i++)
    g_assert_cmpint (place[i], ==, place[i - 1] + 1);
}

/* A clock that drifts by 20 steps over the record cannot be even; its samples stay near their times all the same. */
static void
test_drifting_clock (void)
{
  g_autofree double *time_d = g_new (double, 10000);
  for (int i = 0; i < 10000; i++)
    time_d[i] = i + 20.0 * (i / 10000.0) * (i / 10000.0);
  AntCadence cadence = find (10000, time_d);
  g_assert_cmpfloat_with_epsilon (cadence.step_d, 1.0, 0.01);
  assert_near_places (&cadence, 10000, time_d);
}

static void
test_irregular (void)
{
  g_autoptr (GRand) random = g_rand_new_with_seed (4);
  g_autofree double *time_d = g_new (double, 3000);
  double t = 0.0;
  for (int i = 0; i < 3000; i++)
    time_d[i] = t += -log (1.0 - g_rand_double (random)) + 1e-3;
  AntCadence cadence = find (3000, time_d);
  g_assert_cmpfloat (cadence.step_d, >, 0.3);
  g_assert_cmpfloat (cadence.step_d, <, 1.2);
  assert_near_places (&cadence, 3000, time_d);
}

static void
test_coarse_given (void)
{
  g_autofree double *time_d = g_new (double, 1200);
  g_autofree gint64 *place = g_new (gint64, 1200);
  for (int i = 0; i < 1200; i++)
    time_d[i] = i / 1440.0;
  AntCadence cadence;
  g_assert_true (ant_cadence_find (1200, time_d, 10.0 / 1440.0, &cadence));
  g_assert_cmpfloat (cadence.step_d, ==, 10.0 / 1440.0);
  assert_near_places (&cadence, 1200, time_d);
  ant_cadence_place (&cadence, 1200, time_d, place);
  g_assert_cmpint (place[1199], >=, 119);
  g_assert_cmpint (place[1199], <=, 120);
}

static void
test_nothing_to_find (void)
{
  AntCadence cadence;
  g_assert_false (ant_cadence_find (2, (double[]){ 0.0, 1.0 }, 0.0, &cadence));
  double lost[] = { 1e15, 1e15 + 0.125, 1e15 + 0.25, 1e15 + 0.375 };
  g_assert_false (ant_cadence_find (4, lost, 0.0, &cadence));
  double vast[] = { -1.7e308, 0.0, 1.0, 1.7e308 };
  g_assert_false (ant_cadence_find (4, vast, 0.0, &cadence));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/cadence/even-times-give-their-step", test_even);
  g_test_add_func ("/data/cadence/hours-in-rounded-days-give-an-hour", test_rounded);
  g_test_add_func ("/data/cadence/runs-on-one-clock-are-joined", test_low_orbit);
  g_test_add_func ("/data/cadence/a-year-of-missing-minutes-is-counted-exactly", test_long_gap);
  g_test_add_func ("/data/cadence/nights-do-not-move-the-step", test_daily_gaps);
  g_test_add_func ("/data/cadence/runs-out-of-phase-share-no-place", test_runs_out_of_phase);
  g_test_add_func ("/data/cadence/a-run-at-half-a-step-does-not-stumble", test_run_at_half_a_step);
  g_test_add_func ("/data/cadence/a-drifting-clock-stays-near-its-places", test_drifting_clock);
  g_test_add_func ("/data/cadence/irregular-times-stay-near-their-places", test_irregular);
  g_test_add_func ("/data/cadence/a-given-coarse-step-bins", test_coarse_given);
  g_test_add_func ("/data/cadence/too-few-or-unresolved-times-give-none", test_nothing_to_find);
  return g_test_run ();
}
