/* test-judgement.c - verdicts and notes stay with their dips. */
#include "data/judgement.h"

static void
nothing_said_is_undecided (void)
{
  g_autoptr (AntJudgements) judgements = ant_judgements_new ();
  g_assert_cmpint (ant_judgements_class (judgements, 10, 0.25), ==, ANT_CLASS_UNDECIDED);
  g_assert_cmpstr (ant_judgements_note (judgements, 10, 0.25), ==, "");
  g_assert_cmpuint (ant_judgements_count (judgements), ==, 0);
}

static void
a_verdict_stays_with_a_dip_that_moves_a_little (void)
{
  g_autoptr (AntJudgements) judgements = ant_judgements_new ();
  ant_judgements_set_class (judgements, 10, 0.25, ANT_CLASS_PLANET);
  ant_judgements_set_note (judgements, 10.01, 0.24, "as predicted");
  g_assert_cmpuint (ant_judgements_count (judgements), ==, 1);
  g_assert_cmpint (ant_judgements_class (judgements, 9.99, 0.26), ==, ANT_CLASS_PLANET);
  g_assert_cmpstr (ant_judgements_note (judgements, 9.99, 0.26), ==, "as predicted");
  g_assert_cmpint (ant_judgements_class (judgements, 10.5, 0.25), ==, ANT_CLASS_UNDECIDED);
}

static void
of_two_near_dips_each_keeps_its_own (void)
{
  g_autoptr (AntJudgements) judgements = ant_judgements_new ();
  ant_judgements_set_class (judgements, 10, 0.2, ANT_CLASS_SPOT);
  ant_judgements_set_class (judgements, 10.15, 0.2, ANT_CLASS_NOISE);
  g_assert_cmpint (ant_judgements_class (judgements, 10.02, 0.2), ==, ANT_CLASS_SPOT);
  g_assert_cmpint (ant_judgements_class (judgements, 10.13, 0.2), ==, ANT_CLASS_NOISE);
}

static void
what_says_nothing_is_not_kept (void)
{
  g_autoptr (AntJudgements) judgements = ant_judgements_new ();
  ant_judgements_set_class (judgements, 10, 0.2, ANT_CLASS_SPOT);
  ant_judgements_set_class (judgements, 10, 0.2, ANT_CLASS_UNDECIDED);
  ant_judgements_set_note (judgements, 12, 0.2, "");
  g_assert_cmpuint (ant_judgements_count (judgements), ==, 0);
}

static void
every_class_is_known_by_its_name (void)
{
  for (int i = 0; i < ANT_N_CLASSES; i++)
    {
      AntDipClass class;
      g_assert_true (ant_dip_class_parse (ant_dip_class_name ((AntDipClass) i), &class));
      g_assert_cmpint (class, ==, i);
    }
  AntDipClass untouched = ANT_CLASS_SPOT;
  g_assert_false (ant_dip_class_parse ("comet", &untouched));
  g_assert_cmpint (untouched, ==, ANT_CLASS_SPOT);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/judgement/nothing-said-is-undecided", nothing_said_is_undecided);
  g_test_add_func ("/data/judgement/a-verdict-stays-with-a-dip-that-moves-a-little", a_verdict_stays_with_a_dip_that_moves_a_little);
  g_test_add_func ("/data/judgement/of-two-near-dips-each-keeps-its-own", of_two_near_dips_each_keeps_its_own);
  g_test_add_func ("/data/judgement/what-says-nothing-is-not-kept", what_says_nothing_is_not_kept);
  g_test_add_func ("/data/judgement/every-class-is-known-by-its-name", every_class_is_known_by_its_name);
  return g_test_run ();
}
