/* test-record-distance.c - the yearly swing is found where it is, and taken out and put in by the same factor. */
#include "rows.h"

#include <math.h>
#include "core/units.h"
#include "data/record-distance.h"
#include "sky/places.h"
#include "sky/sun-distance.h"

/* Daily rows of UTC noons, 2005-01-01 on. */
static AntRecord *
daily (gsize n, gboolean swings)
{
  AntRecord *record = test_rows (n, 0.5, 1.0);
  record->value_unit = g_strdup ("W/m2");
  record->time.style = ANT_STAMP_ISO;
  record->time.scale = ANT_SCALE_UTC;
  record->time.origin_known = TRUE;
  record->time.origin_jd1 = 2453371.5;
  record->time.origin_jd2 = 0.0;
  for (gsize i = 0; i < n; i++)
    {
      AntSunDistance distance;
      double tt_d = 2453371.5 - ANT_J2000_JD + record->time_d[i] + 64.184 / ANT_SECONDS_PER_DAY;
      g_assert_cmpint (ant_sun_distance (NULL, tt_d, &distance), ==, ANT_OK);
      record->value[i] = ANT_TSI_W_M2 * (1.0 + 4e-4 * sin ((double) i / 4.3) + test_wiggle_ppm (i) * ANT_PPM);
      if (swings)
        record->value[i] /= ant_one_au_factor (&distance, TRUE);
    }
  return record;
}

static void
the_swing_tells_where_values_stand (void)
{
  for (int swings = 0; swings < 2; swings++)
    for (gsize n = 90; n < 1500; n = 3 * n + 31)
      {
        AntGridOptions options = ANT_GRID_OPTIONS_INIT;
        g_autoptr (AntRecord) record = daily (n, swings);
        test_grid (record, &options);
        g_assert_cmpfloat (fabs (record->swing - swings), <, 4.0 * record->swing_sigma + 0.02);
        g_assert_cmpint (record->distance, ==, swings ? ANT_DISTANCE_OBSERVER : ANT_DISTANCE_ONE_AU);
        g_assert_true (test_said (record, swings ? "at the observer's distance" : "at 1 au"));
      }
}

static void
short_records_do_not_tell (void)
{
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  g_autoptr (AntRecord) record = daily (58, FALSE);
  test_grid (record, &options);
  g_assert_cmpint (record->distance, ==, ANT_DISTANCE_UNKNOWN);
  g_assert_true (isnan (record->swing));
  g_assert_true (test_said (record, "less than 60 days"));
}

static void
names_speak_where_the_swing_does_not (void)
{
  static const struct
  {
    const char *name;
    AntDistance distance;
  } cases[] = { { "tsi_1au", ANT_DISTANCE_ONE_AU },
                { "TSI at 1 AU", ANT_DISTANCE_ONE_AU },
                { "tsi_true_earth", ANT_DISTANCE_OBSERVER },
                { "tsi", ANT_DISTANCE_UNKNOWN } };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      AntGridOptions options = ANT_GRID_OPTIONS_INIT;
      g_autoptr (AntRecord) record = daily (58, FALSE);
      g_free (record->value_name);
      record->value_name = g_strdup (cases[i].name);
      test_grid (record, &options);
      g_assert_cmpint (record->distance, ==, cases[i].distance);
    }
}

static void
the_swing_is_believed_against_a_name (void)
{
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  g_autoptr (AntRecord) record = daily (400, TRUE);
  g_free (record->value_name);
  record->value_name = g_strdup ("tsi_1au");
  test_grid (record, &options);
  g_assert_cmpint (record->distance, ==, ANT_DISTANCE_OBSERVER);
  g_assert_true (test_said (record, "the swing is believed"));
}

/* To 1 au the swing is gone to the interpolation's 1e-8; what stands there already is left alone, and back again is the same. */
static void
conversion_goes_either_way (void)
{
  AntGridOptions to = ANT_GRID_OPTIONS_INIT, from = ANT_GRID_OPTIONS_INIT, bare = ANT_GRID_OPTIONS_INIT;
  to.distance = bare.distance = ANT_DISTANCE_TO_ONE_AU;
  bare.no_doppler = 1.0;
  from.distance = ANT_DISTANCE_TO_OBSERVER;
  g_autoptr (AntRecord) swinging = daily (500, TRUE), even = daily (500, FALSE), forth = daily (500, FALSE), left = daily (500, FALSE),
                        seen = daily (500, TRUE), alone = daily (500, TRUE);
  test_grid (swinging, &to);
  test_grid (forth, &from);
  test_grid (left, &to);
  test_grid (alone, &bare);
  double most = 0.0;
  for (gsize i = 0; i < 500; i++)
    {
      g_assert_cmpfloat_with_epsilon (swinging->value[i] / even->value[i], 1.0, 1e-8);
      g_assert_cmpfloat_with_epsilon (forth->value[i] / seen->value[i], 1.0, 1e-8);
      g_assert_cmpfloat (left->value[i], ==, even->value[i]);
      most = fmax (most, fabs (alone->value[i] / swinging->value[i] - 1.0) / ANT_PPM);
    }
  g_assert_cmpfloat_with_epsilon (most, 3.4, 0.4); /* 0.5 km/s of the Earth's own recession */
  g_assert_cmpint (swinging->distance, ==, ANT_DISTANCE_ONE_AU);
  g_assert_cmpint (forth->distance, ==, ANT_DISTANCE_OBSERVER);
  g_assert_true (test_said (swinging, "in a low orbit up to 94 ppm"));
  g_assert_true (test_said (left, "already"));
}

/* A day in a low orbit: 7000 km, 97 min a turn. Without its positions the swing that is locked to the orbit stays, with them it goes. */
static void
positions_take_out_the_swing_of_a_low_orbit (void)
{
  enum { N = 1440, N_PLACES = 1500 };
  static double time[N_PLACES], x[N_PLACES], y[N_PLACES], z[N_PLACES];
  double origin_d = 2453371.5 - ANT_J2000_JD + 64.184 / ANT_SECONDS_PER_DAY, period_d = 97.0 / ANT_MINUTES_PER_DAY;
  for (int i = 0; i < N_PLACES; i++)
    {
      time[i] = origin_d + (i - 30.0) / ANT_MINUTES_PER_DAY;
      double angle = ANT_TAU * (time[i] - origin_d) / period_d;
      x[i] = 7000.0 * cos (angle);
      y[i] = 7000.0 * sin (angle);
      z[i] = 0.0;
    }
  AntObserver orbit = { .kind = ANT_OBSERVER_TABLE, .table = { N_PLACES, time, x, y, z, ANT_FRAME_GSE } };
  g_assert_cmpint (ant_observer_check (&orbit, NULL, NULL), ==, ANT_OBSERVER_GOOD);
  AntGridOptions placed = ANT_GRID_OPTIONS_INIT, unplaced = ANT_GRID_OPTIONS_INIT;
  placed.distance = unplaced.distance = ANT_DISTANCE_TO_ONE_AU;
  placed.observer = &orbit;
  g_autoptr (AntRecord) known = daily (N, FALSE), unknown = daily (N, FALSE);
  AntRecord *const both[] = { known, unknown };
  for (int i = 0; i < N; i++)
    for (int k = 0; k < 2; k++)
      {
        AntSunDistance distance;
        both[k]->time_d[i] = i / ANT_MINUTES_PER_DAY;
        g_assert_cmpint (ant_sun_distance (&orbit, origin_d + both[k]->time_d[i], &distance), ==, ANT_OK);
        both[k]->value[i] = ANT_TSI_W_M2 * (1.0 + test_wiggle_ppm ((gsize) i) * ANT_PPM) / ant_one_au_factor (&distance, TRUE);
      }
  test_grid (known, &placed);
  test_grid (unknown, &unplaced);
  double most_known = 0.0, most_unknown = 0.0;
  for (int i = 0; i < N; i++)
    {
      double level = ANT_TSI_W_M2 * (1.0 + test_wiggle_ppm ((gsize) i) * ANT_PPM);
      most_known = fmax (most_known, fabs (known->value[i] / level - 1.0) / ANT_PPM);
      most_unknown = fmax (most_unknown, fabs (unknown->value[i] / level - 1.0) / ANT_PPM);
    }
  g_assert_cmpfloat (most_known, <, 0.05);
  g_assert_cmpfloat (most_unknown, >, 90.0);
  g_assert_cmpfloat (most_unknown, <, 94.0 + 51.0);
  g_assert_false (test_said (known, "in a low orbit"));
}

static void
times_without_an_origin_cannot_be_converted (void)
{
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  options.distance = ANT_DISTANCE_TO_ONE_AU;
  AntRecord *record = daily (200, TRUE);
  record->time.origin_known = FALSE;
  test_refused (record, &options, "no known origin");
  ant_record_unref (record);
}

static void
relative_fluxes_stand_nowhere (void)
{
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  g_autoptr (AntRecord) record = daily (200, FALSE);
  g_free (record->value_unit);
  record->value_unit = g_strdup ("relative");
  test_grid (record, &options);
  g_assert_cmpint (record->distance, ==, ANT_DISTANCE_UNKNOWN);
  g_assert_false (test_said (record, "1 au"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/record-distance/the-swing-tells-where-values-stand", the_swing_tells_where_values_stand);
  g_test_add_func ("/data/record-distance/short-records-do-not-tell", short_records_do_not_tell);
  g_test_add_func ("/data/record-distance/names-speak-where-the-swing-does-not", names_speak_where_the_swing_does_not);
  g_test_add_func ("/data/record-distance/the-swing-is-believed-against-a-name", the_swing_is_believed_against_a_name);
  g_test_add_func ("/data/record-distance/conversion-goes-either-way", conversion_goes_either_way);
  g_test_add_func ("/data/record-distance/positions-take-out-the-swing-of-a-low-orbit", positions_take_out_the_swing_of_a_low_orbit);
  g_test_add_func ("/data/record-distance/times-without-an-origin-cannot-be-converted", times_without_an_origin_cannot_be_converted);
  g_test_add_func ("/data/record-distance/relative-fluxes-stand-nowhere", relative_fluxes_stand_nowhere);
  return g_test_run ();
}
