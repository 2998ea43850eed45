/* test-evidence.c - pieces of evidence: what raises and lowers which cause, and what says nothing. */
#include <glib.h>
#include <math.h>
#include "verdict/evidence.h"

#define STEP_D (2 / 1440.0)

static AntDip
dip_at (double mid_d, double duration_d)
{
  return (AntDip) { .mid_d = mid_d, .duration_d = duration_d, .edge_d = 0.01, .depth_ppm = 200, .depth_sigma_ppm = 20, .snr = 10,
                    .mid_sigma_d = 0.002, .duration_sigma_d = 0.004, .edges = ANT_EDGES_BOTH };
}

/* 10 d with one gap of an hour, from day 5. */
static AntSeries
gapped (float *value)
{
  AntSeries series = { .n = 7200, .step_d = STEP_D, .value_ppm = value };
  for (size_t i = 0; i < series.n; i++)
    value[i] = i >= 3600 && i < 3630 ? NAN : 0;
  return series;
}

static void
test_gap_starts_it (void)
{
  g_autofree float *value = g_new (float, 7200);
  AntSeries series = gapped (value);
  AntSurroundings facts;
  AntEvidence evidence;
  ant_surroundings_measure (&series, &facts);
  g_assert_cmpfloat_with_epsilon (facts.near_gap, (30 + 8) / 7200.0, 2e-4);
  g_assert_cmpfloat_with_epsilon (facts.observed_d, 7170 * STEP_D, 1e-9);
  AntDip after = dip_at (5 + 1.05 / 24 + 0.1, 0.2), within = dip_at (5.02 + 0.1, 0.2), later = dip_at (5.3 + 0.1, 0.2),
         before = dip_at (4.5, 0.2);
  ant_evidence_gap (&series, &facts, &after, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], >, 3);
  g_assert_cmpfloat (evidence.number[0], <=, 16);
  ant_evidence_gap (&series, &facts, &within, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], >, 3);
  ant_evidence_gap (&series, &facts, &later, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], <, 0);
  g_assert_true (isnan (evidence.number[0]));
  ant_evidence_gap (&series, &facts, &before, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], <, 0);
}

static void
test_gap_is_nothing_where_all_is_gaps (void)
{
  g_autofree float *value = g_new (float, 7200);
  AntSeries series = gapped (value);
  AntSurroundings facts = { .near_gap = 0.4, .observed_d = 5 };
  AntEvidence evidence;
  AntDip dip = dip_at (5.02 + 0.1, 0.2);
  ant_evidence_gap (&series, &facts, &dip, &evidence);
  g_assert_cmpfloat (fabs (evidence.weight[ANT_CAUSE_INSTRUMENT]), <, 0.5);
}

static void
test_twin (void)
{
  AntSurroundings facts = { .observed_d = 100 };
  AntDip dip = dip_at (50, 0.2), near = dip_at (50.4, 0.2), far = dip_at (60, 0.2);
  AntEvidence evidence;
  ant_evidence_twin (1, &near, &facts, &dip, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], >, 1);
  g_assert_cmpfloat_with_epsilon (evidence.number[0], 9.6, 1e-9);
  ant_evidence_twin (1, &far, &facts, &dip, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], <, 0);
  g_assert_true (isnan (evidence.number[0]));
}

static AntEvidence
predicted (double off_d, double depth_ppm, int asked, int found)
{
  AntPredictedEvent event = { .asked = asked, .found = found, .mid_d = 10 + off_d, .t14_d = 0.2, .depth_ppm = depth_ppm,
                              .tolerance_d = 10 / 1440.0 };
  AntDip dip = dip_at (10, 0.2);
  AntEvidence evidence;
  ant_evidence_predicted (&event, 1 / 365.25, &dip, &evidence);
  return evidence;
}

static void
test_planet_needs_a_prediction (void)
{
  g_assert_cmpfloat (predicted (0.003, 200, 1, 1).weight[ANT_CAUSE_PLANET], >, 8);
  g_assert_cmpfloat (predicted (0.1, 200, 1, 1).weight[ANT_CAUSE_PLANET], <, -20);
  g_assert_cmpfloat (predicted (0.003, 2000, 1, 1).weight[ANT_CAUSE_PLANET], <, -20);
  g_assert_cmpfloat (predicted (0, 200, 1, 0).weight[ANT_CAUSE_PLANET], <, -20);
  g_assert_cmpfloat (predicted (0, 200, 0, 0).weight[ANT_CAUSE_PLANET], <, -20);
}

static AntEvidence
witnessed (double depth_ppm, double sigma_ppm, double correlation)
{
  AntWitnessFact fact = { .looking = 1, .depth_ppm = depth_ppm, .sigma_ppm = sigma_ppm, .correlation = correlation };
  AntDip dip = dip_at (10, 0.2);
  AntEvidence evidence;
  ant_evidence_witness (&fact, &dip, &evidence);
  return evidence;
}

static void
test_witness_agrees (void)
{
  AntEvidence evidence = witnessed (195, 25, 0);
  double solar = evidence.weight[ANT_CAUSE_PLANET];
  g_assert_cmpfloat (solar, >, 20);
  for (int cause = 0; cause <= ANT_CAUSE_FLARE; cause++)
    g_assert_cmpfloat (evidence.weight[cause], ==, solar);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], ==, 0);
}

static void
test_witness_contradicts (void)
{
  AntEvidence evidence = witnessed (5, 25, 0);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_PLANET], <, -10);
}

static void
test_shared_noise_agrees_too (void)
{
  AntEvidence apart = witnessed (120, 20, 0), shared = witnessed (120, 20, 0.6);
  g_assert_cmpfloat (shared.weight[ANT_CAUSE_NOISE], >, apart.weight[ANT_CAUSE_NOISE] + 5);
}

static void
test_witness_in_a_gap (void)
{
  AntWitnessFact fact = { .looking = 0 };
  AntDip dip = dip_at (10, 0.2);
  AntEvidence evidence;
  ant_evidence_witness (&fact, &dip, &evidence);
  for (int cause = 0; cause < ANT_N_CAUSES; cause++)
    g_assert_cmpfloat (evidence.weight[cause], ==, 0);
}

/* Two bands with their own limb darkening: a central crossing is deeper in the blue, and that is what it is held against. */
static void
test_bands_use_their_own_limb_darkening (void)
{
  AntLimbDarkening blue = { 0.7, 0.15 }, red = { 0.25, 0.2 };
  double ratio = ant_transit_loss (0.03, 0.1, blue) / ant_transit_loss (0.03, 0.1, red);
  AntBandFact fact = { { 1000 * ratio, 1000 }, { 10, 10 }, { blue, red } };
  AntEvidence evidence;
  g_assert_cmpfloat (ratio, >, 1.1);
  ant_evidence_bands (&fact, 0.03, 0.1, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_PLANET], >, evidence.weight[ANT_CAUSE_INSTRUMENT] + 2);
  fact.depth_ppm[0] = 1000;
  ant_evidence_bands (&fact, 0.03, 0.1, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_PLANET], <, evidence.weight[ANT_CAUSE_INSTRUMENT] - 10);
}

static void
test_column (void)
{
  AntEvidence evidence;
  ant_evidence_column (8, 5, 2, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], >, 20);
  ant_evidence_column (0.5, 5, 2, &evidence);
  g_assert_cmpfloat (fabs (evidence.weight[ANT_CAUSE_INSTRUMENT]), <, 0.5);
}

static void
test_orbit (void)
{
  double onset_d[12], apart_d[12], period_d = 96 / 1440.0;
  AntDip dip = dip_at (0.1 + 0.3 * period_d, 0.2);
  AntEvidence evidence;
  for (int i = 0; i < 12; i++)
    {
      onset_d[i] = (7 * i + 0.3 + 0.02 * (i % 3)) * period_d;
      apart_d[i] = (7 * i + i / 12.0) * period_d;
    }
  ant_evidence_orbit (12, onset_d, period_d, &dip, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], >, 2);
  ant_evidence_orbit (12, apart_d, period_d, &dip, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_INSTRUMENT], ==, 0);
}

static void
test_chord (void)
{
  AntEvidence evidence;
  ant_evidence_chord (6.2 / 24, 0.66, 0.0306, &evidence); /* Venus 2004 */
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_PLANET], ==, 0);
  g_assert_cmpfloat_with_epsilon (evidence.number[0], 50, 3);
  ant_evidence_chord (0.4 / 24, 0.1, 0.01, &evidence);
  g_assert_cmpfloat (evidence.weight[ANT_CAUSE_PLANET_SHAPED], <, -3);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/verdict/evidence/onset-at-a-gap-points-to-the-instrument", test_gap_starts_it);
  g_test_add_func ("/verdict/evidence/a-gap-says-little-where-gaps-are-everywhere", test_gap_is_nothing_where_all_is_gaps);
  g_test_add_func ("/verdict/evidence/mirrored-twin-points-to-the-instrument", test_twin);
  g_test_add_func ("/verdict/evidence/planet-needs-a-predicted-crossing-of-its-size", test_planet_needs_a_prediction);
  g_test_add_func ("/verdict/evidence/agreeing-witness-lifts-every-solar-cause-alike", test_witness_agrees);
  g_test_add_func ("/verdict/evidence/contradicting-witness-points-to-the-instrument", test_witness_contradicts);
  g_test_add_func ("/verdict/evidence/noise-that-two-instruments-share-agrees-too", test_shared_noise_agrees_too);
  g_test_add_func ("/verdict/evidence/witness-in-a-gap-says-nothing", test_witness_in_a_gap);
  g_test_add_func ("/verdict/evidence/bands-are-held-against-their-own-limb-darkening", test_bands_use_their_own_limb_darkening);
  g_test_add_func ("/verdict/evidence/housekeeping-that-moves-along-points-to-the-instrument", test_column);
  g_test_add_func ("/verdict/evidence/onsets-at-one-phase-of-the-orbit", test_orbit);
  g_test_add_func ("/verdict/evidence/no-body-is-that-fast", test_chord);
  return g_test_run ();
}
