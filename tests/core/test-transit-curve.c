/* test-transit-curve.c - the loss of light against rings, closed forms and laws; crossings by round trip. */
#include <glib.h>
#include <math.h>
#include "core/random.h"
#include "core/transit-curve.h"
#include "core/units.h"

typedef struct
{
  double k, z;
  AntLimbDarkening ld;
  double flux;
} Row;

/* Source: 30-digit quadrature of the integral of Mandel & Agol 2002 (eq. 2 with the quadratic law), 18 digits kept. */
static const Row rows[] = {
  { 0.1, 0.0, { 0, 0 }, 0.990000000000000000 },
  { 0.1, 0.0, { 0.4, 0.25 }, 0.987890954716766367 },
  { 0.1, 0.5, { 0, 0 }, 0.990000000000000000 },
  { 0.1, 0.5, { 0.4, 0.25 }, 0.988604498522421404 },
  { 0.1, 0.1, { 0.4, 0.25 }, 0.987915612136254688 },
  { 0.1, 0.9, { 0.4, 0.25 }, 0.991803712203310493 },
  { 0.1, 0.95, { 0, 0 }, 0.992026638408246629 },
  { 0.1, 0.95, { 0.4, 0.25 }, 0.994001442745288141 },
  { 0.1, 1.0, { 0, 0 }, 0.995106129842558545 },
  { 0.1, 1.0, { 0.4, 0.25 }, 0.996614350099846779 },
  { 0.1, 1.05, { 0, 0 }, 0.998111435632934805 },
  { 0.1, 1.05, { 0.4, 0.25 }, 0.998835874319163490 },
  { 0.1, 1.09, { 0.4, 0.25 }, 0.999908371284244234 },
  { 0.1, 1.1, { 0.4, 0.25 }, 1.00000000000000000 },
  { 0.5, 0.5, { 0.4, 0.25 }, 0.731983581180019720 },
  { 0.5, 0.5, { 0, 0 }, 0.750000000000000000 },
  { 0.5, 0.25, { 0.4, 0.25 }, 0.710713625208253376 },
  { 0.5, 0.7, { 0.4, 0.25 }, 0.792408925313346791 },
  { 0.2, 0.15, { 1.0, 0.0 }, 0.941297196220707923 },
  { 0.2, 0.85, { 1.0, 0.0 }, 0.972027842759839640 },
  { 0.2, 0.85, { 0.0, 1.0 }, 0.967760979471319518 },
  { 1.0, 0.5, { 0.4, 0.25 }, 0.283310792974568103 },
  { 1.5, 0.7, { 0.4, 0.25 }, 0.0606555865392537693 },
  { 2.0, 1.2, { 0.4, 0.25 }, 0.0529351987530900733 },
  { 0.00916789, 0.0, { 0, 0 }, 0.999915949792947900 },
  { 0.00916789, 0.0, { 0.4, 0.19 }, 0.999899341915462190 },
  { 0.00916789, 0.3, { 0.4, 0.19 }, 0.999901237228909619 },
  { 0.00916789, 0.9999, { 0.4, 0.19 }, 0.999975897741698460 },
  { 0.00916789, 1.003, { 0.4, 0.19 }, 0.999986325196077426 },
  { 0.030554, 0.6631, { 0.4, 0.19 }, 0.999008151566758674 },
  { 0.030554, 0.6631, { 0, 0 }, 0.999066453084000000 },
  { 0.030554, 0.985, { 0.4, 0.19 }, 0.999510141311778286 },
  { 0.0063544, 0.33517, { 0.4, 0.19 }, 0.999952792461084545 },
  { 0.0051349, 0.07834, { 0.4, 0.19 }, 0.999968461477122636 },
  { 0.0051226, 0.99253, { 0.4, 0.19 }, 0.999984262263447075 },
  { 0.0051226, 0.9975, { 0.4, 0.19 }, 0.999988238005539430 },
};

static const AntLimbDarkening even = { 0, 0 };

/* The part of a circle of radius r round the Sun's centre that the dark disc covers, 0..1. */
static long double
covered_part (long double k, long double z, long double r)
{
  const long double cosine = (r * r + z * z - k * k) / (2 * r * z);

  return cosine >= 1 ? 0 : cosine <= -1 ? 1 : acosl (cosine) / acosl (-1);
}

/* Light of the rings from r0 to r1 by the midpoint rule. The mesh is so dense at both ends (Sidi's, where it starts as
 * x^3) that the square roots there do no harm. */
static long double
slow_rings (long double k, long double z, AntLimbDarkening ld, long double r0, long double r1)
{
  const int n = 2000;
  const long double turn = 2 * acosl (-1);
  long double total = 0;

  for (int i = 0; i < n; i++)
    {
      const long double x = (i + 0.5L) / n;
      const long double r = r0 + (r1 - r0) * (x - sinl (turn * x) / turn);
      const long double mu = sqrtl (fmaxl (0, 1 - r * r));
      const long double intensity = 1 - ld.u1 * (1 - mu) - ld.u2 * (1 - mu) * (1 - mu);

      total += 2 * r * intensity * covered_part (k, z, r) * (r1 - r0) * (1 - cosl (turn * x)) / n;
    }
  return r1 > r0 ? total : 0;
}

/* The slow twin: the definition, ring by ring, in long double because the arc cosine of a small disc eats digits. */
static double
slow_loss (double radius, double distance, AntLimbDarkening ld)
{
  const long double k = radius, z = distance;
  const long double whole = fminl (1, fmaxl (0, k - z)); /* rings covered all round */
  const long double first = fminl (1, fabsl (z - k)), last = fminl (1, z + k);
  const long double light = slow_rings (k, z, ld, 0, whole) + slow_rings (k, z, ld, first, last);

  return (double)(light / (1 - (long double)ld.u1 / 3 - (long double)ld.u2 / 6));
}

static double
draw_between (AntRandom *random, double low, double high)
{
  return low + (high - low) * ant_random_uniform (random);
}

/* A law that is nowhere negative and nowhere brighter than the centre. */
static AntLimbDarkening
draw_law (AntRandom *random)
{
  AntLimbDarkening ld;

  do
    ld = (AntLimbDarkening){ draw_between (random, 0, 2), draw_between (random, -1, 1) };
  while (ld.u1 + ld.u2 > 1 || ld.u1 + 2 * ld.u2 < 0);
  return ld;
}

static void
fluxes_of_the_published_integral_to_18_digits (void)
{
  for (gsize i = 0; i < G_N_ELEMENTS (rows); i++)
    {
      const double loss = ant_transit_loss (rows[i].k, rows[i].z, rows[i].ld);

      g_assert_cmpfloat (fabs (1 - loss - rows[i].flux), <=, 3e-13);
    }
}

static void
random_discs_agree_with_rings (void)
{
  AntRandom random;

  ant_random_seed (&random, 1, 0);
  for (int i = 0; i < 1000; i++)
    {
      const double k = i % 3 ? draw_between (&random, 0.01, 1) : draw_between (&random, 1, 4);
      const double z = draw_between (&random, fmax (0, k - 1), 1 + k);
      const AntLimbDarkening ld = draw_law (&random);

      g_assert_cmpfloat (fabs (ant_transit_loss (k, z, ld) - slow_loss (k, z, ld)), <, 1e-12 * fmin (1, k * k));
    }
}

/* To the depth of the small disc itself, the limb included. The twin is good to some 1e-12 there. */
static void
small_discs_keep_their_digits (void)
{
  static const double radii[] = { 1e-4, 5e-4, 0.0049, 0.0306 };
  AntRandom random;

  ant_random_seed (&random, 2, 0);
  for (gsize i = 0; i < G_N_ELEMENTS (radii); i++)
    for (int j = 0; j < 100; j++)
      {
        const double k = radii[i];
        const double z = j % 2 ? draw_between (&random, 1 - k, 1 + k) : draw_between (&random, 2 * k, 1);
        const double expected = slow_loss (k, z, ANT_LIMB_DARKENING_SUN);

        g_assert_cmpfloat (fabs (ant_transit_loss (k, z, ANT_LIMB_DARKENING_SUN) - expected), <, 1e-11 * k * k);
      }
}

/* At the centre the loss is a closed form: the light within r < k. */
static void
central_disc_takes_the_light_within_its_radius (void)
{
  AntRandom random;

  ant_random_seed (&random, 3, 0);
  for (int i = 0; i < 1000; i++)
    {
      const double k = pow (10, draw_between (&random, -7, 0));
      const AntLimbDarkening ld = draw_law (&random);
      /* int 0..k 2 r I dr; (1 - (1-k^2)^(3/2)) 2/3 written without the difference */
      const double k2 = k * k, m = sqrt (1 - k2);
      const double mu_part = 2.0 / 3 * k2 * (1 + m + m * m) / (1 + m);
      const double light = (1 - ld.u1 - ld.u2) * k2 + (ld.u1 + 2 * ld.u2) * mu_part - ld.u2 * (k2 - k2 * k2 / 2);
      const double expected = light / (1 - ld.u1 / 3 - ld.u2 / 6);

      g_assert_cmpfloat (fabs (ant_transit_loss (k, 0, ld) - expected), <, 1e-13 * k2);
    }
}

/* The area common to two circles as two segments; source: any table of plane figures. */
static void
even_sun_loses_the_area_of_the_overlap (void)
{
  AntRandom random;

  ant_random_seed (&random, 4, 0);
  for (int i = 0; i < 2000; i++)
    {
      const double k = draw_between (&random, 0.01, 3);
      const double z = draw_between (&random, fabs (1 - k), 1 + k);
      const double p = acos ((z * z + k * k - 1) / (2 * z * k)), q = acos ((z * z + 1 - k * k) / (2 * z));
      const double area = k * k * (p - sin (p) * cos (p)) + q - sin (q) * cos (q);

      g_assert_cmpfloat (fabs (ant_transit_loss (k, z, even) - area / ANT_PI), <, 1e-13 * fmax (1, k * k));
      if (k < 1)
        g_assert_cmpfloat (fabs (ant_transit_loss (k, 0.999 * (1 - k), even) / (k * k) - 1), <, 1e-15);
    }
}

/* k^2 I(mu) / <I>, the curvature of the law over the disc being of the next order, k^2. */
static void
small_disc_loses_its_area_times_the_local_light (void)
{
  for (double k = 1e-6; k < 1.1e-3; k *= 10)
    for (double z = 0; z < 0.95; z += 0.05)
      {
        const AntLimbDarkening ld = ANT_LIMB_DARKENING_SUN;
        const double dark = 1 - sqrt (1 - z * z);
        const double rule = k * k * (1 - ld.u1 * dark - ld.u2 * dark * dark) / (1 - ld.u1 / 3 - ld.u2 / 6);

        g_assert_cmpfloat (fabs (ant_transit_loss (k, z, ld) / rule - 1), <, 20 * k * k + 1e-9);
      }
}

/* A hair to either side of the three places where the formula or the geometry changes. */
static void
contacts_and_centre_passage_are_continuous (void)
{
  static const double radii[] = { 1e-4, 0.00915, 0.1, 0.4999, 0.5, 0.5001, 0.97, 1, 1.03, 2.5 };

  for (gsize i = 0; i < G_N_ELEMENTS (radii); i++)
    {
      const double k = radii[i], places[] = { k, fabs (1 - k), 1 + k };

      for (gsize j = 0; j < G_N_ELEMENTS (places); j++)
        {
          const double hair = 1e-12 * k, z = places[j];
          const double here = ant_transit_loss (k, z, ANT_LIMB_DARKENING_SUN);
          const double before = ant_transit_loss (k, fmax (0, z - hair), ANT_LIMB_DARKENING_SUN);
          const double after = ant_transit_loss (k, z + hair, ANT_LIMB_DARKENING_SUN);

          g_assert_cmpfloat (fabs (here - before), <, 3e-12 * fmin (1, k * k) + 1e-15);
          g_assert_cmpfloat (fabs (here - after), <, 3e-12 * fmin (1, k * k) + 1e-15);
        }
    }
}

/* Outward steps of a thousandth of k never make the loss grow, nor fall by more than its steepest slope allows. */
static void
loss_falls_smoothly_from_centre_to_limb (void)
{
  static const double radii[] = { 0.001, 0.0306, 0.3, 0.9, 1.02 };

  for (gsize i = 0; i < G_N_ELEMENTS (radii); i++)
    {
      const double k = radii[i], step = k * 1e-3;
      double before = ant_transit_loss (k, fmax (0, 1 - 2 * k), ANT_LIMB_DARKENING_SUN);

      for (double z = fmax (0, 1 - 2 * k) + step; z < 1 + 1.1 * k; z += step)
        {
          const double loss = ant_transit_loss (k, z, ANT_LIMB_DARKENING_SUN);

          g_assert_cmpfloat (loss, <=, before + 1e-13 * k * k);
          g_assert_cmpfloat (before - loss, <, 2e-3 * k * fmin (1, k) + 1e-15);
          before = loss;
        }
    }
}

static void
full_cover_takes_all_and_none_takes_nothing (void)
{
  g_assert_cmpfloat (ant_transit_loss (1.02, 0.02, ANT_LIMB_DARKENING_SUN), ==, 1);
  g_assert_cmpfloat (ant_transit_loss (1.05, 0.01, ANT_LIMB_DARKENING_SUN), ==, 1);
  g_assert_cmpfloat (fabs (ant_transit_loss (1, 0, ANT_LIMB_DARKENING_SUN) - 1), <, 1e-15);
  g_assert_cmpfloat (ant_transit_loss (40, 39.0, ANT_LIMB_DARKENING_SUN), ==, 1);
  g_assert_cmpfloat (ant_transit_loss (0, 0.3, ANT_LIMB_DARKENING_SUN), ==, 0);
  g_assert_cmpfloat (ant_transit_loss (0.1, 1.1, ANT_LIMB_DARKENING_SUN), ==, 0);
  g_assert_cmpfloat (ant_transit_loss (3, 1e9, ANT_LIMB_DARKENING_SUN), ==, 0);
  g_assert_true (isnan (ant_transit_loss (0.1, (double)NAN, ANT_LIMB_DARKENING_SUN)));
  g_assert_true (isnan (ant_transit_loss ((double)NAN, 0.1, ANT_LIMB_DARKENING_SUN)));
}

/* A huge body's edge is a straight line: half the Sun at z = k, whatever the limb darkening. */
static void
edge_of_a_huge_body_through_the_centre_halves_the_sun (void)
{
  for (double k = 1e3; k < 2e5; k *= 10)
    g_assert_cmpfloat (fabs (ant_transit_loss (k, k, ANT_LIMB_DARKENING_SUN) - 0.5), <, 1 / k);
}

static AntCrossing
draw_crossing (AntRandom *random)
{
  const double k = pow (10, draw_between (random, -4, 0.2));

  return (AntCrossing){ k, draw_between (random, 0, 1 + k), draw_between (random, 0.01, 1) };
}

static void
centre_distance_is_impact_at_middle_and_contact_at_the_ends (void)
{
  AntRandom random;

  ant_random_seed (&random, 5, 0);
  for (int i = 0; i < 1000; i++)
    {
      const AntCrossing crossing = draw_crossing (&random);
      const double k = crossing.radius_ratio, b = crossing.impact, half_d = 0.5 * crossing.t14_d;
      const double z = ant_crossing_separation (&crossing, half_d / 3);

      g_assert_cmpfloat (fabs (ant_crossing_separation (&crossing, 0) - b), <=, 1e-15);
      g_assert_cmpfloat (fabs (ant_crossing_separation (&crossing, -half_d) - (1 + k)), <, 1e-14);
      /* uniform speed: a third of the way out, a ninth of the square of the half chord */
      g_assert_cmpfloat (fabs (z * z - b * b - ((1 + k) * (1 + k) - b * b) / 9), <, 1e-14);
    }
}

static void
crossing_is_symmetric_and_ends_at_its_contacts (void)
{
  AntRandom random;

  ant_random_seed (&random, 6, 0);
  for (int i = 0; i < 300; i++)
    {
      const AntCrossing crossing = draw_crossing (&random);
      const double half_d = 0.5 * crossing.t14_d;

      for (int j = 0; j < 17; j++)
        {
          const double t = half_d * j / 17;
          const double loss = ant_crossing_loss (&crossing, ANT_LIMB_DARKENING_SUN, t);

          g_assert_cmpfloat (loss, ==, ant_crossing_loss (&crossing, ANT_LIMB_DARKENING_SUN, -t));
          g_assert_cmpfloat (loss, >, 0);
        }
      g_assert_cmpfloat (ant_crossing_loss (&crossing, ANT_LIMB_DARKENING_SUN, half_d), ==, 0);
      g_assert_cmpfloat (ant_crossing_loss (&crossing, ANT_LIMB_DARKENING_SUN, -1.01 * half_d), ==, 0);
    }
}

static void
contact_two_is_one_ingress_after_contact_one (void)
{
  AntRandom random;

  ant_random_seed (&random, 7, 0);
  for (int i = 0; i < 1000; i++)
    {
      AntCrossing crossing = draw_crossing (&random);
      const double ingress_d = ant_crossing_ingress_d (&crossing);

      if (crossing.radius_ratio + crossing.impact >= 1)
        g_assert_cmpfloat (ingress_d, ==, 0.5 * crossing.t14_d);
      else
        g_assert_cmpfloat (
            fabs (ant_crossing_separation (&crossing, -0.5 * crossing.t14_d + ingress_d) - (1 - crossing.radius_ratio)),
            <, 1e-14);
    }
}

static void
radius_and_ingress_time_are_inverse (void)
{
  AntRandom random;

  ant_random_seed (&random, 8, 0);
  for (int i = 0; i < 2000; i++)
    {
      const double b = i % 4 ? draw_between (&random, 0, 0.99) : 1 - pow (10, draw_between (&random, -6, -2));
      const double k = (1 - b) * (i % 5 ? pow (10, draw_between (&random, -6, 0)) : 1);
      const AntCrossing crossing = { k, b, 0.3 };
      const double ingress_d = ant_crossing_ingress_d (&crossing);
      const double back = ant_crossing_radius_for_ingress (b, 0.3, ingress_d);

      g_assert_cmpfloat (fabs (back - k), <, 1e-7 * k);
      if (k < 0.9 * (1 - b))
        g_assert_cmpfloat (fabs (back - k), <, 1e-9 * k);
    }
}

static void
impossible_ingress_times_have_no_radius (void)
{
  g_assert_true (isnan (ant_crossing_radius_for_ingress (0.2, 0.3, 0)));
  g_assert_true (isnan (ant_crossing_radius_for_ingress (0.2, 0.3, 0.16)));
  g_assert_true (isnan (ant_crossing_radius_for_ingress (0.2, 0.3, -0.01)));
  g_assert_true (isnan (ant_crossing_radius_for_ingress (1, 0.3, 0.15)));
  g_assert_true (isnan (ant_crossing_radius_for_ingress (-0.1, 0.3, 0.01)));
}

static void
radius_and_depth_are_inverse (void)
{
  AntRandom random;

  ant_random_seed (&random, 9, 0);
  for (int i = 0; i < 1000; i++)
    {
      const AntLimbDarkening ld = draw_law (&random);
      const double b = draw_between (&random, 0, 1.5);
      const double depth = pow (10, draw_between (&random, -8, -0.01));
      const double k = ant_crossing_radius_for_depth (b, ld, depth);

      g_assert_cmpfloat (fabs (ant_transit_loss (k, b, ld) / depth - 1), <, 1e-9);
    }
  g_assert_true (isnan (ant_crossing_radius_for_depth (0.3, even, 0)));
  g_assert_true (isnan (ant_crossing_radius_for_depth (0.3, even, 1)));
  g_assert_true (isnan (ant_crossing_radius_for_depth (-0.3, even, 0.1)));
}

/* Mercury-like and Venus-like discs at the Sun's centre: 1.20 times the radius ratio squared, to first order in k. */
static void
central_planet_is_a_fifth_deeper_than_its_area (void)
{
  const AntLimbDarkening sun = ANT_LIMB_DARKENING_SUN;
  const double mean = 1 - sun.u1 / 3 - sun.u2 / 6;

  g_assert_cmpfloat (fabs (ant_transit_loss (0.005, 0, sun) / (0.005 * 0.005) - 1 / mean), <, 1e-5);
  g_assert_cmpfloat (fabs (1 / mean - 1.20), <, 0.005);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/core/transit-curve/fluxes-of-the-published-integral-to-18-digits",
                   fluxes_of_the_published_integral_to_18_digits);
  g_test_add_func ("/core/transit-curve/random-discs-agree-with-rings", random_discs_agree_with_rings);
  g_test_add_func ("/core/transit-curve/small-discs-keep-their-digits", small_discs_keep_their_digits);
  g_test_add_func ("/core/transit-curve/central-disc-takes-the-light-within-its-radius",
                   central_disc_takes_the_light_within_its_radius);
  g_test_add_func ("/core/transit-curve/even-sun-loses-the-area-of-the-overlap",
                   even_sun_loses_the_area_of_the_overlap);
  g_test_add_func ("/core/transit-curve/small-disc-loses-its-area-times-the-local-light",
                   small_disc_loses_its_area_times_the_local_light);
  g_test_add_func ("/core/transit-curve/contacts-and-centre-passage-are-continuous",
                   contacts_and_centre_passage_are_continuous);
  g_test_add_func ("/core/transit-curve/loss-falls-smoothly-from-centre-to-limb",
                   loss_falls_smoothly_from_centre_to_limb);
  g_test_add_func ("/core/transit-curve/full-cover-takes-all-and-none-takes-nothing",
                   full_cover_takes_all_and_none_takes_nothing);
  g_test_add_func ("/core/transit-curve/edge-of-a-huge-body-through-the-centre-halves-the-sun",
                   edge_of_a_huge_body_through_the_centre_halves_the_sun);
  g_test_add_func ("/core/transit-curve/centre-distance-is-impact-at-middle-and-contact-at-the-ends",
                   centre_distance_is_impact_at_middle_and_contact_at_the_ends);
  g_test_add_func ("/core/transit-curve/crossing-is-symmetric-and-ends-at-its-contacts",
                   crossing_is_symmetric_and_ends_at_its_contacts);
  g_test_add_func ("/core/transit-curve/contact-two-is-one-ingress-after-contact-one",
                   contact_two_is_one_ingress_after_contact_one);
  g_test_add_func ("/core/transit-curve/radius-and-ingress-time-are-inverse", radius_and_ingress_time_are_inverse);
  g_test_add_func ("/core/transit-curve/impossible-ingress-times-have-no-radius",
                   impossible_ingress_times_have_no_radius);
  g_test_add_func ("/core/transit-curve/radius-and-depth-are-inverse", radius_and_depth_are_inverse);
  g_test_add_func ("/core/transit-curve/central-planet-is-a-fifth-deeper-than-its-area",
                   central_planet_is_a_fifth_deeper_than_its_area);
  return g_test_run ();
}
