/* test-verdict.c - how rates, evidence and chance become probabilities. */
#include <glib.h>
#include <math.h>
#include "verdict/verdict.h"

static AntVerdict
with_evidence (double crossing, double trapezoid, double step)
{
  AntVerdict verdict = { .sign = 1 };
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    verdict.rival[kind].kind = (AntRivalKind) kind;
  verdict.rival[ANT_RIVAL_CROSSING] = (AntRivalFit) { .kind = ANT_RIVAL_CROSSING, .fitted = 1, .log_evidence = crossing };
  verdict.rival[ANT_RIVAL_TRAPEZOID] = (AntRivalFit) { .kind = ANT_RIVAL_TRAPEZOID, .fitted = 1, .log_evidence = trapezoid };
  verdict.rival[ANT_RIVAL_STEP] = (AntRivalFit) { .kind = ANT_RIVAL_STEP, .fitted = 1, .log_evidence = step };
  return verdict;
}

static const AntVerdictOptions star = { .target_star = 1, .rates = { { 10, 1, 10, 10, 10, 10, 0 } }, .observed_d = 100 };
static const AntVerdictOptions sun = { .target_star = 0, .rates = { { 10, 1, 10, 10, 10, 10, 0 } }, .observed_d = 100 };

static void
test_odds (void)
{
  AntVerdict verdict = with_evidence (20, 18, 21);
  AntDip dip = { .snr = 8, .expected_false = 1e-12 };
  ant_verdict_decide (&verdict, &dip, &star);
  double step = ant_rival_prior (ANT_RIVAL_STEP)->share[0], trapezoid = ant_rival_prior (ANT_RIVAL_TRAPEZOID)->share[0];
  double odds = exp (20) / (step * exp (21) + trapezoid * exp (18));
  g_assert_cmpfloat_with_epsilon (verdict.shape_probability[ANT_CAUSE_PLANET] / verdict.shape_probability[ANT_CAUSE_INSTRUMENT],
                                  odds, 1e-9 * odds);
}

static void
test_chance_takes_over (void)
{
  AntDip dip = { .snr = 6 };
  double before = -1;
  for (double expected = 1e-9; expected < 20; expected *= 10)
    {
      AntVerdict verdict = with_evidence (10, 9, 0);
      dip.expected_false = expected;
      ant_verdict_decide (&verdict, &dip, &star);
      g_assert_cmpfloat (verdict.probability[ANT_CAUSE_NOISE], >, before);
      before = verdict.probability[ANT_CAUSE_NOISE];
    }
  g_assert_cmpfloat (before, >, 0.9);
}

static void
test_sun_without_prediction (void)
{
  AntVerdict verdict = with_evidence (60, 40, 30);
  AntDip dip = { .snr = 12, .expected_false = 1e-20, .mid_d = 5, .duration_d = 0.2 };
  AntPredictedEvent nothing = { .asked = 1 };
  AntEvidence evidence;
  ant_evidence_predicted (&nothing, sun.rates.per_year[ANT_CAUSE_PLANET] / 365.25, &dip, &evidence);
  ant_verdict_add (&verdict, &evidence);
  ant_verdict_decide (&verdict, &dip, &sun);
  g_assert_cmpint (verdict.cause, ==, ANT_CAUSE_PLANET_SHAPED);
  g_assert_cmpint (verdict.shape, ==, ANT_CAUSE_PLANET);
  g_assert_cmpfloat (verdict.shape_probability[ANT_CAUSE_PLANET], >, 0.99);
}

static void
test_sun_with_prediction (void)
{
  AntVerdict verdict = with_evidence (60, 40, 30);
  AntDip dip = { .snr = 12, .expected_false = 1e-20, .mid_d = 5, .mid_sigma_d = 0.001, .duration_d = 0.2, .duration_sigma_d = 0.002,
                 .depth_ppm = 100, .depth_sigma_ppm = 8 };
  AntPredictedEvent crossing = { .asked = 1, .found = 1, .mid_d = 5.001, .t14_d = 0.201, .depth_ppm = 104, .tolerance_d = 10 / 1440.0 };
  AntEvidence evidence;
  ant_evidence_predicted (&crossing, sun.rates.per_year[ANT_CAUSE_PLANET] / 365.25, &dip, &evidence);
  ant_verdict_add (&verdict, &evidence);
  ant_verdict_decide (&verdict, &dip, &sun);
  g_assert_cmpint (verdict.cause, ==, ANT_CAUSE_PLANET);
  g_assert_cmpfloat (verdict.probability[ANT_CAUSE_PLANET], >, 0.99);
}

static void
test_agreeing_witness_excludes_the_instrument (void)
{
  AntVerdict verdict = with_evidence (20, 18, 25);
  AntDip dip = { .snr = 8, .expected_false = 1e-9, .depth_ppm = 100, .depth_sigma_ppm = 12 };
  AntWitnessFact fact = { .looking = 1, .depth_ppm = 98, .sigma_ppm = 12 };
  AntEvidence evidence;
  ant_verdict_decide (&verdict, &dip, &star);
  g_assert_cmpint (verdict.cause, ==, ANT_CAUSE_INSTRUMENT);
  ant_evidence_witness (&fact, &dip, &evidence);
  ant_verdict_add (&verdict, &evidence);
  ant_verdict_decide (&verdict, &dip, &star);
  g_assert_cmpint (verdict.cause, ==, ANT_CAUSE_PLANET);
  g_assert_cmpint (verdict.shape, ==, ANT_CAUSE_INSTRUMENT); /* the shape does not know the witness */
}

static void
test_evidence_is_replaced (void)
{
  AntVerdict verdict = with_evidence (20, 18, 25);
  AntEvidence one = { .kind = ANT_EVIDENCE_GAP, .number = { 1 } }, two = { .kind = ANT_EVIDENCE_GAP, .number = { 2 } };
  ant_verdict_add (&verdict, &one);
  ant_verdict_add (&verdict, &two);
  g_assert_cmpuint (verdict.n_evidence, ==, 1);
  g_assert_cmpfloat (ant_verdict_evidence (&verdict, ANT_EVIDENCE_GAP)->number[0], ==, 2);
  g_assert_null (ant_verdict_evidence (&verdict, ANT_EVIDENCE_TWIN));
}

/* Half a crossing looks like half of much else. */
static void
test_half_seen_needs_more (void)
{
  AntVerdict verdict = with_evidence (60, 40, 30);
  AntEvidence evidence;
  AntDip dip = { .edges = ANT_EDGES_BOTH };
  ant_evidence_edges (&dip, &evidence);
  ant_verdict_add (&verdict, &evidence);
  g_assert_cmpint (ant_verdict_named (&verdict, ANT_CAUSE_PLANET, 0.8), ==, ANT_CAUSE_PLANET);
  g_assert_cmpint (ant_verdict_named (&verdict, ANT_CAUSE_PLANET, 0.55), ==, ANT_N_CAUSES);
  dip.edges = ANT_EDGES_INGRESS;
  ant_evidence_edges (&dip, &evidence);
  ant_verdict_add (&verdict, &evidence);
  g_assert_cmpint (ant_verdict_named (&verdict, ANT_CAUSE_PLANET, 0.8), ==, ANT_N_CAUSES);
  g_assert_cmpint (ant_verdict_named (&verdict, ANT_CAUSE_PLANET_SHAPED, 0.995), ==, ANT_CAUSE_PLANET_SHAPED);
  g_assert_cmpint (ant_verdict_named (&verdict, ANT_CAUSE_INSTRUMENT, 0.8), ==, ANT_CAUSE_INSTRUMENT);
}

/* No body circles so fast that it would cross in half an hour: that is part of what a dip looks like. */
static void
test_chord_counts_in_the_shape (void)
{
  AntVerdict slow = with_evidence (20, 18, 21), fast = slow;
  AntDip dip = { .snr = 8, .expected_false = 1e-12 };
  AntEvidence chord;
  ant_evidence_chord (0.5 / 24, 0.1, 0.02, &chord);
  ant_verdict_add (&fast, &chord);
  ant_verdict_decide (&slow, &dip, &star);
  ant_verdict_decide (&fast, &dip, &star);
  double before = slow.shape_probability[ANT_CAUSE_PLANET] / slow.shape_probability[ANT_CAUSE_INSTRUMENT];
  double after = fast.shape_probability[ANT_CAUSE_PLANET] / fast.shape_probability[ANT_CAUSE_INSTRUMENT];
  g_assert_cmpfloat (chord.weight[ANT_CAUSE_PLANET], <, -1);
  g_assert_cmpfloat_with_epsilon (log (after / before), chord.weight[ANT_CAUSE_PLANET], 1e-9);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/verdict/verdict/odds-are-rates-times-shares-times-evidence", test_odds);
  g_test_add_func ("/verdict/verdict/noise-grows-with-its-expected-number", test_chance_takes_over);
  g_test_add_func ("/verdict/verdict/on-the-sun-no-planet-without-a-prediction", test_sun_without_prediction);
  g_test_add_func ("/verdict/verdict/on-the-sun-a-predicted-crossing-is-a-planet", test_sun_with_prediction);
  g_test_add_func ("/verdict/verdict/agreeing-witness-excludes-the-instrument-not-the-sun", test_agreeing_witness_excludes_the_instrument);
  g_test_add_func ("/verdict/verdict/evidence-of-a-kind-is-replaced", test_evidence_is_replaced);
  g_test_add_func ("/verdict/verdict/half-a-crossing-is-named-only-when-sure", test_half_seen_needs_more);
  g_test_add_func ("/verdict/verdict/the-speed-over-the-disc-is-part-of-the-shape", test_chord_counts_in_the_shape);
  return g_test_run ();
}
