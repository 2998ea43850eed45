/* test-places.c - places and radii of the bodies against an ephemeris fitted to observations, standards and each other. */
#include "sky/places.h"

#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "sky/time-scale.h"

#define ARCSEC (ANT_PI / 648000)

/* JPL's DE405 (public domain, as Debian has it), km on the ICRS: Sun, Earth-Moon barycentre and planet from the solar
 * system's barycentre, the Moon from the Earth. Times are TDB, which is TT within 2 ms. */
static const struct
{
  double jd;
  AntBody planet;
  double place[4][3];
} de405[] = {
  { 2451498.4034722224, ANT_BODY_MERCURY,
    { { -1103654.301857, -347589.431727, -116404.176485 },
      { 87764805.086611, 108191484.005721, 46940720.322082 },
      { 292095.598238, -241445.759023, -111939.070791 },
      { 26991191.725114, 33702988.493903, 15158268.759797 } } },
  { 2452766.827777778, ANT_BODY_MERCURY,
    { { 328223.647675, -576427.870915, -253187.466755 },
      { -103917104.361176, -100733892.643616, -43675797.001580 },
      { -137782.385980, 326251.224185, 172264.543751 },
      { -46113645.488973, -45391478.672328, -19375635.504798 } } },
  { 2453164.847222222, ANT_BODY_VENUS,
    { { 593234.194300, -237188.255822, -116315.624299 },
      { -31442470.922632, -136427560.140895, -59160351.834325 },
      { 320894.924245, -162842.399764, -105668.948491 },
      { -22342984.254614, -97613307.572765, -42474301.487814 } } },
  { 2454048.4034722224, ANT_BODY_MERCURY,
    { { 393861.568710, 540477.605596, 216742.669005 },
      { 102869120.917637, 98764201.745744, 42799984.794047 },
      { -6477.531794, 332458.059248, 180614.487541 },
      { 32972456.304843, 31908337.858147, 13594323.034049 } } },
  { 2456084.5618055556, ANT_BODY_VENUS,
    { { -372362.225700, -267009.719661, -118422.769580 },
      { -38158272.603493, -135165735.687275, -58599319.924133 },
      { 49220.448104, -337852.160882, -126554.714128 },
      { -27388236.825625, -96833403.105687, -41856735.044259 } } },
  { 2457518.122916667, ANT_BODY_MERCURY,
    { { 562568.097558, 326200.042817, 114869.432044 },
      { -98169768.249484, -104558300.198858, -45353022.655474 },
      { 10887.529265, 349252.290948, 116222.045490 },
      { -43712665.952276, -46638264.618247, -20383159.397239 } } },
  { 2458799.138888889, ANT_BODY_MERCURY,
    { { -504915.462710, 1032373.891120, 449444.284458 },
      { 97322648.597727, 103064150.188699, 44679812.100752 },
      { 311957.906399, 235784.572253, 68450.985602 },
      { 30524712.623366, 33395948.057951, 14521340.713139 } } },
  { 2463549.870833333, ANT_BODY_MERCURY,
    { { -648169.200071, 329.420756, 21467.226393 },
      { 92361800.868788, 105664106.042648, 45822462.787914 },
      { 366988.511817, -10443.427552, 14207.489903 },
      { 28798290.101523, 33306643.244585, 14762966.964780 } } },
};
#define DE405_EARTH_OVER_MOON 81.30056

static double
apart_km (const double a[3], const double b[3])
{
  return sqrt ((a[0] - b[0]) * (a[0] - b[0]) + (a[1] - b[1]) * (a[1] - b[1]) + (a[2] - b[2]) * (a[2] - b[2]));
}

static void
exact_places_are_those_of_de405 (void)
{
  for (gsize i = 0; i < G_N_ELEMENTS (de405); i++)
    {
      double planet[3], earth[3], moon[3], got[3], tt_d = de405[i].jd - ANT_J2000_JD;
      for (int axis = 0; axis < 3; axis++)
        {
          double sun = de405[i].place[0][axis];
          planet[axis] = de405[i].place[3][axis] - sun;
          earth[axis] = de405[i].place[1][axis] - de405[i].place[2][axis] / (1 + DE405_EARTH_OVER_MOON) - sun;
          moon[axis] = earth[axis] + de405[i].place[2][axis];
        }
      ant_place_exact (de405[i].planet, tt_d, got);
      g_test_message ("%.3f: planet off by %.1f km", de405[i].jd, apart_km (got, planet));
      g_assert_cmpfloat (apart_km (got, planet), <, 40);
      ant_place_exact (ANT_BODY_EARTH, tt_d, got);
      g_assert_cmpfloat (apart_km (got, earth), <, 40);
      ant_place_exact (ANT_BODY_MOON, tt_d, got);
      g_assert_cmpfloat (apart_km (got, moon), <, 40);
    }
}

/* The published check of VSOP87D at J2000 (Bretagnon & Francou 1988, file vsop87.chk, from memory): distances. */
static void
distances_at_j2000_are_those_of_vsop87 (void)
{
  static const struct
  {
    AntBody body;
    double au;
  } at[] = { { ANT_BODY_MERCURY, 0.4664714751 }, { ANT_BODY_VENUS, 0.7202129253 }, { ANT_BODY_EARTH, 0.9833276819 } };
  const double origin[3] = { 0 };
  for (gsize i = 0; i < G_N_ELEMENTS (at); i++)
    {
      double place[3];
      ant_place_exact (at[i].body, 0, place);
      g_assert_cmpfloat_with_epsilon (apart_km (place, origin) / ANT_AU_KM, at[i].au, 1e-9);
    }
}

/* Sun-Earth distances, au, of DE405, at 0 h TT. */
static void
the_sun_is_as_far_as_de405_says (void)
{
  static const struct
  {
    int year, month, day;
    double au;
  } at[] = { { 2003, 1, 4, 0.983320464 },  { 2003, 7, 4, 1.016728072 }, { 2012, 6, 6, 1.014733448 },
             { 2019, 11, 11, 0.990184374 }, { 2024, 1, 3, 0.983306996 }, { 2024, 7, 5, 1.016725349 } };
  const double origin[3] = { 0 };
  for (gsize i = 0; i < G_N_ELEMENTS (at); i++)
    {
      double place[3], jd1, jd2;
      ant_time_from_calendar (ANT_SCALE_TT, at[i].year, at[i].month, at[i].day, 0, 0, 0, &jd1, &jd2);
      ant_place_exact (ANT_BODY_EARTH, jd1 - ANT_J2000_JD + jd2, place);
      g_assert_cmpfloat_with_epsilon (apart_km (place, origin) / ANT_AU_KM, at[i].au, 5 / ANT_AU_KM);
    }
}

/* The margin of the search of events, 3', rests on it. */
static void
rough_places_are_right_to_a_minute_from_the_earth (void)
{
  double worst = 0;
  for (AntBody body = ANT_BODY_MERCURY; body <= ANT_BODY_MOON; body++)
    for (double tt_d = ANT_SKY_FIRST_TT_D; tt_d < ANT_SKY_LAST_TT_D; tt_d += 1234.567)
      {
        double rough[2][3], exact[2][3], dot = 0, size[2] = { 0 };
        ant_place_rough (ANT_BODY_EARTH, tt_d, rough[0]);
        ant_place_exact (ANT_BODY_EARTH, tt_d, exact[0]);
        ant_place_rough (body, tt_d, rough[1]);
        ant_place_exact (body, tt_d, exact[1]);
        for (int axis = 0; axis < 3; axis++)
          {
            double a = rough[1][axis] - rough[0][axis], b = exact[1][axis] - exact[0][axis];
            dot += a * b;
            size[0] += a * a;
            size[1] += b * b;
          }
        worst = fmax (worst, acos (fmin (1, dot / sqrt (size[0] * size[1]))) / ARCSEC);
      }
  g_test_message ("worst %.0f arcsec", worst);
  g_assert_cmpfloat (worst, <, 60);
}

static void
radii_are_those_of_the_almanac_and_of_the_iau (void)
{
  AntRadii almanac = ant_radii (ANT_RADII_ALMANAC), iau = ant_radii (ANT_RADII_IAU);
  /* 15'59.63" at 1 au: IMCCE canon of transits; 3.36" and 8.41": what reproduces Espenak's catalogues. */
  g_assert_cmpfloat_with_epsilon (almanac.sun_km / ANT_AU_KM, sin (959.63 * ARCSEC), 1e-12);
  g_assert_cmpfloat_with_epsilon (almanac.body_km[ANT_BODY_MERCURY], 2436.9, 0.05);
  g_assert_cmpfloat_with_epsilon (almanac.body_km[ANT_BODY_VENUS], 6099.5, 0.05);
  g_assert_cmpfloat_with_epsilon (almanac.body_km[ANT_BODY_MOON], 1738.09, 0.01);
  /* IAU 2015 resolution B3; Archinal et al. 2018, Celest. Mech. Dyn. Astr. 130, 22 (from memory). */
  g_assert_cmpfloat (iau.sun_km, ==, 695700);
  g_assert_cmpfloat_with_epsilon (asin (iau.sun_km / ANT_AU_KM) / ARCSEC, 959.2312, 1e-4);
  g_assert_cmpfloat (iau.body_km[ANT_BODY_MERCURY], ==, 2439.4);
  g_assert_cmpfloat (iau.body_km[ANT_BODY_VENUS], ==, 6051.8);
  g_assert_cmpfloat (iau.body_km[ANT_BODY_EARTH], ==, 6378.1);
}

/* The constants that the sky rests on: IAU 2012 B2, IAU 2015 B3, SI; Carrington's 25.38 d seen from the Earth. */
static void
constants_are_those_of_the_standards (void)
{
  g_assert_cmpfloat (ANT_AU_KM, ==, 149597870.7);
  g_assert_cmpfloat (ANT_TSI_W_M2, ==, 1361);
  g_assert_cmpfloat_with_epsilon (ANT_AU_KM / ANT_LIGHT_KM_S, 499.0047838361564, 1e-10);
  g_assert_cmpfloat_with_epsilon (4 * ANT_PI * ANT_AU_KM * ANT_AU_KM * 1e6 * ANT_TSI_W_M2 / 3.828e26, 1, 2e-4);
  g_assert_cmpfloat_with_epsilon (ANT_SYNODIC_ROTATION_D, 27.2753, 1e-4);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/sky/places/exact-places-are-those-of-de405", exact_places_are_those_of_de405);
  g_test_add_func ("/sky/places/distances-at-j2000-are-those-of-vsop87", distances_at_j2000_are_those_of_vsop87);
  g_test_add_func ("/sky/places/the-sun-is-as-far-as-de405-says", the_sun_is_as_far_as_de405_says);
  g_test_add_func ("/sky/places/rough-places-are-right-to-a-minute-from-the-earth",
                   rough_places_are_right_to_a_minute_from_the_earth);
  g_test_add_func ("/sky/places/radii-are-those-of-the-almanac-and-of-the-iau", radii_are_those_of_the_almanac_and_of_the_iau);
  g_test_add_func ("/sky/places/constants-are-those-of-the-standards", constants_are_those_of_the_standards);
  return g_test_run ();
}
