/* test-progress.c - promises of cli/progress.h. */
#include "cli/progress.h"

static const AntProgress halfway = { .title = "searching for dips", .stage = 1, .n_stages = 6, .done = 50, .count = 200,
                                     .elapsed_s = 30, .stage_s = 10 };

static void
expect_text (const AntProgress *progress, const char *expected)
{
  g_autofree char *text = ant_progress_text (progress);
  g_assert_cmpstr (text, ==, expected);
}

static void
it_tells_stage_share_rate_and_time_left (void)
{
  expect_text (&halfway, "stage 2 of 6, searching for dips: 25 %, 5/s, 30 s left");
}

static void
it_tells_no_rate_before_it_is_known (void)
{
  AntProgress progress = halfway;
  progress.stage_s = 0.1;
  expect_text (&progress, "stage 2 of 6, searching for dips: 25 %");
  progress.stage_s = 10;
  progress.done = 0;
  expect_text (&progress, "stage 2 of 6, searching for dips: 0 %");
}

static void
long_waits_are_told_in_minutes_and_hours (void)
{
  AntProgress progress = halfway;
  progress.stage_s = 100;
  expect_text (&progress, "stage 2 of 6, searching for dips: 25 %, 0.5/s, 5 min left");
  progress.stage_s = 10000;
  expect_text (&progress, "stage 2 of 6, searching for dips: 25 %, 0.005/s, 8.3 h left");
}

static void
an_empty_stage_is_done (void)
{
  AntProgress progress = { .title = "resting", .n_stages = 1, .stage_s = 2 };
  expect_text (&progress, "stage 1 of 1, resting: 100 %");
}

static void
forced_lines_are_few_and_whole (void)
{
  if (g_test_subprocess ())
    {
      AntProgressLine *line = ant_progress_line_new (TRUE);
      AntProgress progress = halfway;
      for (progress.done = 0; progress.done <= progress.count; progress.done++)
        {
          progress.elapsed_s = 20 + (double) progress.done * 0.01;
          progress.stage_s = (double) progress.done * 0.01;
          ant_progress_line_show (&progress, line);
        }
      ant_progress_line_end (line);
      return;
    }
  g_test_trap_subprocess (NULL, 20 * G_USEC_PER_SEC, G_TEST_SUBPROCESS_DEFAULT);
  g_test_trap_assert_passed ();
  g_test_trap_assert_stderr ("stage 2 of 6, searching for dips: 0 %\n"
                             "stage 2 of 6, searching for dips: 100 %, 100/s\n");
}

static void
nothing_is_said_where_there_is_no_terminal (void)
{
  if (g_test_subprocess ())
    {
      AntProgressLine *line = ant_progress_line_new (FALSE);
      ant_progress_line_show (&halfway, line);
      ant_progress_line_end (line);
      return;
    }
  g_test_trap_subprocess (NULL, 20 * G_USEC_PER_SEC, G_TEST_SUBPROCESS_DEFAULT);
  g_test_trap_assert_passed ();
  g_test_trap_assert_stderr ("");
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/cli/progress/it-tells-stage-share-rate-and-time-left", it_tells_stage_share_rate_and_time_left);
  g_test_add_func ("/cli/progress/it-tells-no-rate-before-it-is-known", it_tells_no_rate_before_it_is_known);
  g_test_add_func ("/cli/progress/long-waits-are-told-in-minutes-and-hours", long_waits_are_told_in_minutes_and_hours);
  g_test_add_func ("/cli/progress/an-empty-stage-is-done", an_empty_stage_is_done);
  g_test_add_func ("/cli/progress/forced-lines-are-few-and-whole", forced_lines_are_few_and_whole);
  g_test_add_func ("/cli/progress/nothing-is-said-where-there-is-no-terminal", nothing_is_said_where_there_is_no_terminal);
  return g_test_run ();
}
