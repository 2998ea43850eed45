/* test-solar-limb.c - the Sun's limb against a published row, and how it goes with wavelength. */
#include <glib.h>
#include <math.h>
#include "core/solar-limb.h"

/* Cox 2000 at 550 nm: I = 0.30 + 0.93 mu - 0.23 mu^2. */
static void
test_green (void)
{
  AntLimbDarkening ld = ant_solar_limb (550);
  for (double mu = 0; mu <= 1; mu += 0.1)
    {
      double ours = 1 - ld.u1 * (1 - mu) - ld.u2 * (1 - mu) * (1 - mu);
      g_assert_cmpfloat_with_epsilon (ours, 0.30 + 0.93 * mu - 0.23 * mu * mu, 1e-9);
    }
}

/* The redder, the flatter the disc; and it never shines less than nothing at the limb. */
static void
test_redder_is_flatter (void)
{
  double before = 0;
  for (double nm = 420; nm < 12000; nm *= 1.1)
    {
      AntLimbDarkening ld = ant_solar_limb (nm);
      double mean = 1 - ld.u1 / 3 - ld.u2 / 6; /* over the disc, of the centre's */
      g_assert_cmpfloat (mean, >=, before - 0.002);
      g_assert_cmpfloat (1 - ld.u1 - ld.u2, >, 0);
      before = mean;
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/core/solar-limb/green-light-as-published", test_green);
  g_test_add_func ("/core/solar-limb/the-redder-the-flatter", test_redder_is_flatter);
  return g_test_run ();
}
