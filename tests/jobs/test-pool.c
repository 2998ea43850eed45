/* test-pool.c - promises of jobs/pool.h, kept over a toy table of stages. */
#include "jobs/pool.h"

#define N_SLICES 200

/* Stage 0 fills slots with sums that differ in their last digit when added in another order; stage 1 has nothing to
 * do; stage 2 looks at the merged sum. */
typedef struct
{
  double slot[N_SLICES], merged, seen[N_SLICES];
  int runs[N_SLICES];         /* of stage 0, by slice */
  gsize fail_from, fail_step; /* slices fail_from + k fail_step fail, each with its own status */
  gsize cancel_from;          /* slices from here on cancel the run */
  GCancellable *cancellable;
  GThread *finisher;
  GArray *reports;            /* of AntProgress */
} Toy;

static const char *
toy_title (void *work, size_t stage)
{
  static const char *const title[] = { "filling", "resting", "looking" };
  return title[stage];
}

static size_t
toy_count (void *work, size_t stage)
{
  return stage == 1 ? 0 : N_SLICES;
}

static AntStatus
toy_slice (void *work, size_t stage, size_t slice)
{
  Toy *toy = work;
  if (stage == 2)
    {
      toy->seen[slice] = toy->merged;
      return ANT_OK;
    }
  g_atomic_int_inc (&toy->runs[slice]);
  g_usleep ((gulong) (slice * 7919 % 13) * 20); /* so that slices end out of order */
  toy->slot[slice] = 1.0 / (3.0 + (double) slice);
  if (slice >= toy->cancel_from)
    g_cancellable_cancel (toy->cancellable);
  if (toy->fail_step && slice >= toy->fail_from && (slice - toy->fail_from) % toy->fail_step == 0)
    return slice == toy->fail_from ? ANT_NO_DATA : ANT_NO_MEMORY;
  return ANT_OK;
}

static AntStatus
toy_finish (void *work, size_t stage)
{
  Toy *toy = work;
  toy->finisher = g_thread_self ();
  if (stage == 0)
    for (gsize i = 0; i < N_SLICES; i++)
      toy->merged += toy->slot[i];
  return ANT_OK;
}

static const AntStages toy_stages = { 3, toy_title, toy_count, toy_slice, toy_finish };
static const Toy fresh_toy = { .cancel_from = G_MAXSIZE };

static void
keep_report (const AntProgress *progress, gpointer data)
{
  g_array_append_vals (data, progress, 1);
}

static void
digits_do_not_depend_on_threads (void)
{
  Toy one = fresh_toy, four = fresh_toy;
  g_assert_cmpint (ant_pool_run (&toy_stages, &one, 1, NULL, NULL, NULL), ==, ANT_OK);
  g_assert_cmpint (ant_pool_run (&toy_stages, &four, 4, NULL, NULL, NULL), ==, ANT_OK);
  g_assert_cmpmem (one.slot, sizeof one.slot, four.slot, sizeof four.slot);
  g_assert_cmpmem (&one.merged, sizeof one.merged, &four.merged, sizeof four.merged);
}

static void
every_slice_runs_once (void)
{
  Toy toy = fresh_toy;
  g_assert_cmpint (ant_pool_run (&toy_stages, &toy, 0, NULL, NULL, NULL), ==, ANT_OK);
  for (gsize i = 0; i < N_SLICES; i++)
    g_assert_cmpint (toy.runs[i], ==, 1);
}

static void
a_stage_sees_the_one_before_finished (void)
{
  Toy toy = fresh_toy;
  g_assert_cmpint (ant_pool_run (&toy_stages, &toy, 3, NULL, NULL, NULL), ==, ANT_OK);
  g_assert_cmpfloat (toy.merged, >, 1);
  for (gsize i = 0; i < N_SLICES; i++)
    g_assert_cmpfloat (toy.seen[i], ==, toy.merged);
}

static void
finish_runs_on_the_calling_thread (void)
{
  Toy toy = fresh_toy;
  g_assert_cmpint (ant_pool_run (&toy_stages, &toy, 2, NULL, NULL, NULL), ==, ANT_OK);
  g_assert_true (toy.finisher == g_thread_self ());
}

static void
the_lowest_failing_slice_decides (void)
{
  for (guint n_threads = 1; n_threads <= 8; n_threads++)
    {
      Toy toy = fresh_toy;
      toy.fail_from = 21;
      toy.fail_step = 1;
      g_assert_cmpint (ant_pool_run (&toy_stages, &toy, n_threads, NULL, NULL, NULL), ==, ANT_NO_DATA);
    }
}

static void
a_failure_stops_the_rest (void)
{
  Toy toy = fresh_toy;
  toy.fail_from = 21;
  toy.fail_step = 1;
  g_assert_cmpint (ant_pool_run (&toy_stages, &toy, 4, NULL, NULL, NULL), ==, ANT_NO_DATA);
  g_assert_cmpint (toy.runs[20], ==, 1);
  for (gsize i = 21 + 4; i < N_SLICES; i++)
    g_assert_cmpint (toy.runs[i], ==, 0);
  g_assert_null (toy.finisher);
}

/* --- a slice that would never end by itself --- */

typedef struct
{
  AntStop stop;
  GCancellable *cancellable;
} Endless;

static size_t
endless_count (void *work, size_t stage)
{
  return 2;
}

static AntStatus
endless_slice (void *work, size_t stage, size_t slice)
{
  Endless *endless = work;
  g_cancellable_cancel (endless->cancellable);
  while (!ant_stop_asked (&endless->stop))
    g_usleep (1000);
  return ANT_STOPPED;
}

static AntStop *
endless_stop (void *work)
{
  return &((Endless *) work)->stop;
}

static void
cancelling_ends_slices_that_look_for_it (void)
{
  static const AntStages stages = { 1, toy_title, endless_count, endless_slice, toy_finish, endless_stop };
  g_autoptr (GCancellable) cancellable = g_cancellable_new ();
  Endless endless = { .cancellable = cancellable };
  g_assert_cmpint (ant_pool_run (&stages, &endless, 2, cancellable, NULL, NULL), ==, ANT_STOPPED);
}

static void
cancelling_stops_between_slices (void)
{
  g_autoptr (GCancellable) cancellable = g_cancellable_new ();
  Toy toy = fresh_toy;
  toy.cancellable = cancellable;
  toy.cancel_from = 30;
  g_assert_cmpint (ant_pool_run (&toy_stages, &toy, 4, cancellable, NULL, NULL), ==, ANT_STOPPED);
  for (gsize i = 30 + 4; i < N_SLICES; i++)
    g_assert_cmpint (toy.runs[i], ==, 0);
  g_assert_null (toy.finisher);
}

static void
a_run_cancelled_before_it_begins_does_nothing (void)
{
  g_autoptr (GCancellable) cancellable = g_cancellable_new ();
  g_cancellable_cancel (cancellable);
  Toy toy = fresh_toy;
  g_assert_cmpint (ant_pool_run (&toy_stages, &toy, 2, cancellable, NULL, NULL), ==, ANT_STOPPED);
  g_assert_cmpint (toy.runs[0], ==, 0);
}

static void
progress_never_goes_back (void)
{
  Toy toy = fresh_toy;
  g_autoptr (GArray) reports = g_array_new (FALSE, FALSE, sizeof (AntProgress));
  g_assert_cmpint (ant_pool_run (&toy_stages, &toy, 2, NULL, keep_report, reports), ==, ANT_OK);
  for (guint i = 1; i < reports->len; i++)
    {
      const AntProgress *before = &g_array_index (reports, AntProgress, i - 1);
      const AntProgress *after = &g_array_index (reports, AntProgress, i);
      g_assert_true (after->stage > before->stage || (after->stage == before->stage && after->done >= before->done));
      g_assert_cmpfloat (after->elapsed_s, >=, before->elapsed_s);
      g_assert_cmpfloat (after->stage_s, <=, after->elapsed_s);
    }
}

static void
progress_tells_the_end_of_every_stage (void)
{
  Toy toy = fresh_toy;
  g_autoptr (GArray) reports = g_array_new (FALSE, FALSE, sizeof (AntProgress));
  g_assert_cmpint (ant_pool_run (&toy_stages, &toy, 2, NULL, keep_report, reports), ==, ANT_OK);
  gsize ended = 0;
  for (guint i = 0; i < reports->len; i++)
    {
      const AntProgress *progress = &g_array_index (reports, AntProgress, i);
      gboolean last_of_stage = i + 1 == reports->len || progress[1].stage != progress->stage;
      ended += last_of_stage && progress->done == progress->count;
    }
  g_assert_cmpuint (ended, ==, toy_stages.n_stages);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/jobs/pool/digits-do-not-depend-on-threads", digits_do_not_depend_on_threads);
  g_test_add_func ("/jobs/pool/every-slice-runs-once", every_slice_runs_once);
  g_test_add_func ("/jobs/pool/a-stage-sees-the-one-before-finished", a_stage_sees_the_one_before_finished);
  g_test_add_func ("/jobs/pool/finish-runs-on-the-calling-thread", finish_runs_on_the_calling_thread);
  g_test_add_func ("/jobs/pool/the-lowest-failing-slice-decides", the_lowest_failing_slice_decides);
  g_test_add_func ("/jobs/pool/a-failure-stops-the-rest", a_failure_stops_the_rest);
  g_test_add_func ("/jobs/pool/cancelling-ends-slices-that-look-for-it", cancelling_ends_slices_that_look_for_it);
  g_test_add_func ("/jobs/pool/cancelling-stops-between-slices", cancelling_stops_between_slices);
  g_test_add_func ("/jobs/pool/a-run-cancelled-before-it-begins-does-nothing",
                   a_run_cancelled_before_it_begins_does_nothing);
  g_test_add_func ("/jobs/pool/progress-never-goes-back", progress_never_goes_back);
  g_test_add_func ("/jobs/pool/progress-tells-the-end-of-every-stage", progress_tells_the_end_of_every_stage);
  return g_test_run ();
}
