/* test-column-job.c - which columns speak, what bands and housekeeping say, and what an asked dip is taken for. */
#include <fftw3.h>
#include <gsl/gsl_errno.h>
#include <math.h>
#include <string.h>
#include "core/solar-limb.h"
#include "core/units.h"
#include "data/verdict-words.h"
#include "jobs/column-job.h"
#include "jobs/scan-job.h"
#include "models.h"
#include "trials/planets.h"

#define N ((gsize) (10 * 144))
#define STEP_D (10 / 1440.0)
#define MID_D 5.0

static const AntCrossing crossing = { 0.03, 0.5, 0.25 };

typedef struct
{
  AntRecord *record;
  AntSettings settings;
} Fixture;

static void
add_column (AntRecord *record, const char *name, const char *unit, float *value)
{
  g_ptr_array_add (record->columns, ant_column_new (name, unit, value, N));
}

/* Model A's noise with a crossing; a band that sees its own limb darkening, one that a fault of the whole dip would make (the same depth but
 * for a tenth), a temperature, and columns that cannot speak. */
static void
set_up (Fixture *f, gconstpointer data)
{
  AntRecord *record = f->record = ant_record_new ();
  g_autofree float *ppm = g_new (float, N);
  AntRandom random;
  ant_random_seed (&random, 5, 5);
  ant_study_record ('A', ANT_MASK_L1, N, STEP_D, 31, ppm);
  record->n_rows = N;
  record->time_d = g_new (double, N);
  record->value = g_new (double, N);
  record->line = g_new (guint32, N);
  record->flags = g_new0 (guint16, N);
  record->path = g_strdup ("drawn.txt");
  record->value_unit = g_strdup ("W/m2");
  record->value_name = g_strdup ("irradiance");
  float *band = g_new (float, N), *copy = g_new (float, N), *warm = g_new (float, N), *clock = g_new (float, N), *error = g_new (float, N);
  for (gsize i = 0; i < N; i++)
    {
      double start_d = (double) i * STEP_D - MID_D, noise = isnan (ppm[i]) ? NAN : (double) ppm[i];
      double loss = ant_crossing_mean_loss (&crossing, ANT_LIMB_DARKENING_SUN, start_d, start_d + STEP_D);
      double red = ant_crossing_mean_loss (&crossing, ant_solar_limb (862), start_d, start_d + STEP_D);
      record->time_d[i] = ((double) i + 0.5) * STEP_D;
      record->value[i] = 1361 * (1 + noise * ANT_PPM - loss);
      record->line[i] = (guint32) i + 1;
      band[i] = (float) (0.9 * (1 + noise * ANT_PPM - red + 20 * ANT_PPM * ant_random_normal (&random)));
      copy[i] = (float) record->value[i];
      warm[i] = (float) (293 + 0.2 * sin (9 * record->time_d[i]) + 0.05 * ant_random_normal (&random) + (data && loss > 0 ? 2 : 0));
      clock[i] = (float) i;
      error[i] = (float) (0.01 + 0.001 * ant_random_uniform (&random));
    }
  add_column (record, "red 862 nm", "W/m2/nm", band);
  add_column (record, "at_1au", "W/m2", copy);
  add_column (record, "housing_temperature", "K", warm);
  add_column (record, "counter", NULL, clock);
  add_column (record, "value_uncertainty", NULL, error);
  AntGridOptions grid = ANT_GRID_OPTIONS_INIT;
  g_autoptr (GError) problem = NULL;
  ant_record_make_grid (record, &grid, &problem);
  g_assert_no_error (problem);
  ant_settings_init (&f->settings);
}

static void
tear_down (Fixture *f, gconstpointer data)
{
  ant_record_unref (f->record);
}

static AntVerdict
ask (Fixture *f)
{
  g_autoptr (GError) error = NULL;
  AntDip dip;
  AntVerdict verdict;
  double limit_ppm;
  ant_scan_job_ask (f->record, &f->settings, MID_D, crossing.t14_d, &dip, &limit_ppm, &verdict, &error);
  g_assert_no_error (error);
  return verdict;
}

static void
test_asked_dip_is_judged (Fixture *f, gconstpointer data)
{
  AntVerdict verdict = ask (f);
  g_assert_cmpint (ant_verdict_shape_class (&verdict), ==, ANT_CLASS_PLANET);
  g_assert_cmpint (ant_verdict_class (&verdict), ==, ANT_CLASS_PLANET_SHAPED);
}

/* A small planet takes more of the band whose disc is darker at the limb, where it crosses the middle. */
static void
test_band (Fixture *f, gconstpointer data)
{
  AntVerdict verdict = ask (f);
  const AntEvidence *bands = ant_verdict_evidence (&verdict, ANT_EVIDENCE_BANDS);
  g_assert_nonnull (bands);
  double truth = ant_transit_loss (crossing.radius_ratio, crossing.impact, ANT_LIMB_DARKENING_SUN)
                 / ant_transit_loss (crossing.radius_ratio, crossing.impact, ant_solar_limb (862));
  g_assert_cmpfloat_with_epsilon (bands->number[2], truth, 0.03); /* the chord is known so well */
  g_assert_cmpfloat (bands->number[2], >, 1.002);
  g_assert_cmpfloat (fabs (bands->number[0] - truth), <, 3 * bands->number[1]);
  g_assert_cmpfloat (bands->weight[ANT_CAUSE_PLANET], >, bands->weight[ANT_CAUSE_INSTRUMENT]);
}

static void
test_quiet_housekeeping (Fixture *f, gconstpointer data)
{
  AntVerdict verdict = ask (f);
  const AntEvidence *column = ant_verdict_evidence (&verdict, ANT_EVIDENCE_COLUMN);
  g_assert_nonnull (column);
  g_assert_cmpfloat (column->number[1], ==, 2); /* the temperature, and nothing else */
  g_assert_cmpfloat (column->weight[ANT_CAUSE_INSTRUMENT], <, 1);
}

static void
test_warm_housing (Fixture *f, gconstpointer data)
{
  AntVerdict verdict = ask (f);
  const AntEvidence *column = ant_verdict_evidence (&verdict, ANT_EVIDENCE_COLUMN);
  g_assert_nonnull (column);
  g_assert_cmpfloat (fabs (column->number[0]), >, 5);
  g_assert_cmpfloat (column->weight[ANT_CAUSE_INSTRUMENT], >, 5);
}

static void
test_names (void)
{
  g_assert_cmpfloat (ant_column_wavelength_nm ("irradiance 500 nm"), ==, 500);
  g_assert_cmpfloat (ant_column_wavelength_nm ("red_0.862um"), ==, 862);
  g_assert_cmpfloat (ant_column_wavelength_nm ("ch2-402nm_corrected"), ==, 402);
  g_assert_true (isnan (ant_column_wavelength_nm ("column 3")));
  g_assert_true (isnan (ant_column_wavelength_nm ("numbers 12 nmol")));
  g_assert_true (ant_column_is_bookkeeping ("tsi_uncertainty"));
  g_assert_true (ant_column_is_bookkeeping ("JD"));
  g_assert_false (ant_column_is_bookkeeping ("temperature"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  fftw_make_planner_thread_safe ();
  gsl_set_error_handler_off ();
  g_test_add_func ("/jobs/column-job/names-tell-bands-and-bookkeeping", test_names);
  g_test_add ("/jobs/column-job/an-asked-dip-is-judged", Fixture, NULL, set_up, test_asked_dip_is_judged, tear_down);
  g_test_add ("/jobs/column-job/a-band-is-held-against-its-own-limb", Fixture, NULL, set_up, test_band, tear_down);
  g_test_add ("/jobs/column-job/housekeeping-that-goes-on-as-always-says-little", Fixture, NULL, set_up, test_quiet_housekeeping, tear_down);
  g_test_add ("/jobs/column-job/housekeeping-that-moves-with-the-dip-speaks-for-the-instrument", Fixture, "warm", set_up, test_warm_housing, tear_down);
  return g_test_run ();
}
