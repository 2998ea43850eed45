/* test-template-bank.c - which shapes the bank holds at each cadence, and that they are the transit curve's. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "planting.h"
#include "search/template-bank.h"

static AntTemplateBank *
bank_at (double step_min)
{
  AntBankOptions options = ANT_BANK_OPTIONS_INIT;
  AntStatus status;
  AntTemplateBank *bank = ant_template_bank_new (&options, step_min / ANT_MINUTES_PER_DAY, &status);
  g_assert_cmpint (status, ==, ANT_OK);
  return bank;
}

static size_t
members_used (const AntFamily *family)
{
  size_t n = 0;
  while (n < family->n_members && family->member[n].length)
    n++;
  return n;
}

/* Every duration of the family from `first_h` by half hours up to 13 h, each in `phases` equally spaced sub-sample places. */
static void
check_durations (const AntFamily *family, double first_h, size_t phases)
{
  size_t used = members_used (family);
  g_assert_cmpuint (used, ==, ((size_t) ((13 - first_h) / 0.5 + 1.5)) * phases);
  for (size_t m = 0; m < used; m++)
    {
      g_assert_cmpfloat_with_epsilon (family->member[m].duration_d * ANT_HOURS_PER_DAY, first_h + 0.5 * (double) (m / phases), 1e-9);
      double beyond = family->member[m].centre - family->member[m - m % phases].centre;
      g_assert_cmpfloat_with_epsilon (beyond, (double) (m % phases) / (double) phases, 1e-12);
    }
}

static void
durations_and_phases_follow_the_cadence (void)
{
  static const struct
  {
    double step_min, first_h;
    size_t phases, families;
  } wanted[] = {
    { 45 / 60.0, 0.5, 1, 2 }, { 1, 0.5, 1, 2 },   { 2, 0.5, 1, 2 },     { 2.6, 0.5, 1, 1 }, { 5, 0.5, 1, 1 },
    { 12, 0.5, 2, 1 },        { 29.4, 0.5, 4, 1 }, { 60, 1, 4, 1 },   { 120, 2, 4, 1 },   { 1440, 13, 4, 1 },
  };
  for (size_t i = 0; i < G_N_ELEMENTS (wanted); i++)
    {
      AntTemplateBank *bank = bank_at (wanted[i].step_min);
      g_test_message ("cadence %g min", wanted[i].step_min);
      g_assert_cmpuint (bank->n_families, ==, wanted[i].families);
      for (size_t f = 0; f < bank->n_families; f++)
        check_durations (&bank->family[f], wanted[i].first_h, wanted[i].phases);
      ant_template_bank_free (bank);
    }
}

static void
edges_are_no_shorter_than_the_cadence_and_no_longer_than_a_round_dip (void)
{
  const double steps_min[] = { 1, 5, 29.4, 60 };
  for (size_t i = 0; i < G_N_ELEMENTS (steps_min); i++)
    {
      AntTemplateBank *bank = bank_at (steps_min[i]);
      for (size_t f = 0; f < bank->n_families; f++)
        for (size_t m = 0; m < members_used (&bank->family[f]); m++)
          {
            const AntMember *member = &bank->family[f].member[m];
            double edge_min = fmax (f ? 5 : 20, steps_min[i]);
            g_assert_cmpfloat_with_epsilon (member->edge_d,
                                            fmin (edge_min / ANT_MINUTES_PER_DAY, 0.4 * member->duration_d), 1e-12);
          }
      ant_template_bank_free (bank);
    }
}

static void
lanes_are_full_and_padded_with_nothing (void)
{
  const double steps_min[] = { 1, 29.4, 1440 };
  for (size_t i = 0; i < G_N_ELEMENTS (steps_min); i++)
    {
      AntTemplateBank *bank = bank_at (steps_min[i]);
      for (size_t f = 0; f < bank->n_families; f++)
        {
          const AntFamily *family = &bank->family[f];
          g_assert_cmpuint (family->n_members % ANT_LANES, ==, 0);
          g_assert_cmpuint (family->n_members - members_used (family), <, ANT_LANES);
          for (size_t m = 0; m < family->n_members; m++)
            {
              size_t block = m / ANT_LANES;
              g_assert_cmpuint (family->member[m].length, <=, family->block_length[block]);
              for (size_t j = family->member[m].length; j < family->block_length[block]; j++)
                g_assert_cmpfloat (family->shape[block][j * ANT_LANES + m % ANT_LANES], ==, 0);
            }
        }
      ant_template_bank_free (bank);
    }
}

static void
shapes_equal_the_curve_averaged_over_exposures (void)
{
  const double steps_min[] = { 1, 29.4, 60, 1440 };
  double worst = 0;
  for (size_t i = 0; i < G_N_ELEMENTS (steps_min); i++)
    {
      AntTemplateBank *bank = bank_at (steps_min[i]);
      double step_d = bank->step_d;
      for (size_t f = 0; f < bank->n_families; f++)
        for (size_t m = 0; m < members_used (&bank->family[f]); m += 3)
          {
            const AntMember *member = &bank->family[f].member[m];
            Planted planted = { .t14_h = member->duration_d * ANT_HOURS_PER_DAY, .impact = ANT_SHAPE_IMPACT,
                                .ingress_min = member->edge_d * ANT_MINUTES_PER_DAY };
            for (size_t j = 0; j < member->length; j++)
              {
                double drawn = bank->family[f].shape[m / ANT_LANES][j * ANT_LANES + m % ANT_LANES];
                double slow = -planted_mean (&planted, ((double) j - member->centre) * step_d, step_d, steps_min[i] > 100 ? 4000 : 200);
                worst = fmax (worst, fabs (drawn - slow));
              }
          }
      ant_template_bank_free (bank);
    }
  g_test_message ("worst departure %.2g of the depth", worst);
  g_assert_cmpfloat (worst, <, 1e-4);
}

static void
a_longer_exposure_widens_the_shape_and_keeps_its_loss (void)
{
  AntBankOptions options = ANT_BANK_OPTIONS_INIT;
  AntStatus status;
  double step_d = 1 / ANT_MINUTES_PER_DAY;
  AntTemplateBank *plain = ant_template_bank_new (&options, step_d, &status);
  options.exposure_d = 16 * step_d;
  AntTemplateBank *smeared = ant_template_bank_new (&options, step_d, &status);
  const AntFamily *one = &plain->family[0], *other = &smeared->family[0];
  g_assert_cmpuint (other->member[3].length, ==, one->member[3].length + 15);
  double sum = 0, sum_smeared = 0;
  for (size_t j = 0; j < one->member[3].length; j++)
    sum += one->shape[0][j * ANT_LANES + 3];
  for (size_t j = 0; j < other->member[3].length; j++)
    sum_smeared += other->shape[0][j * ANT_LANES + 3];
  g_assert_cmpfloat_with_epsilon (sum_smeared / sum, 1, 1e-4);
  ant_template_bank_free (plain);
  ant_template_bank_free (smeared);
}

static void
starts_step_by_half_an_edge_and_at_least_a_place (void)
{
  static const double steps_min[] = { 1, 5, 29.4 };
  static const size_t strides[][2] = { { 10, 2 }, { 2, 0 }, { 1, 0 } };
  for (size_t i = 0; i < G_N_ELEMENTS (steps_min); i++)
    {
      AntTemplateBank *bank = bank_at (steps_min[i]);
      for (size_t f = 0; f < bank->n_families; f++)
        g_assert_cmpuint (bank->family[f].stride, ==, strides[i][f]);
      ant_template_bank_free (bank);
    }
}

static void
what_has_no_meaning_is_refused (void)
{
  AntBankOptions good = ANT_BANK_OPTIONS_INIT, bad[4] = { good, good, good, good };
  bad[0].duration_min_h = 0;
  bad[1].duration_max_h = 0.25;
  bad[2].duration_step_h = NAN;
  bad[3].edge_h = -1;
  AntStatus status;
  for (size_t i = 0; i < 4; i++)
    {
      g_assert_null (ant_template_bank_new (&bad[i], 1e-3, &status));
      g_assert_cmpint (status, ==, ANT_BAD_ARGUMENT);
    }
  g_assert_null (ant_template_bank_new (&good, 0, &status));
  g_assert_cmpint (status, ==, ANT_BAD_ARGUMENT);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add_func ("/search/template-bank/" path, function)
  TEST ("durations-and-phases-follow-the-cadence", durations_and_phases_follow_the_cadence);
  TEST ("edges-are-no-shorter-than-the-cadence-and-no-longer-than-a-round-dip",
        edges_are_no_shorter_than_the_cadence_and_no_longer_than_a_round_dip);
  TEST ("lanes-are-full-and-padded-with-nothing", lanes_are_full_and_padded_with_nothing);
  TEST ("shapes-equal-the-curve-averaged-over-exposures", shapes_equal_the_curve_averaged_over_exposures);
  TEST ("a-longer-exposure-widens-the-shape-and-keeps-its-loss", a_longer_exposure_widens_the_shape_and_keeps_its_loss);
  TEST ("starts-step-by-half-an-edge-and-at-least-a-place", starts_step_by_half_an_edge_and_at_least_a_place);
  TEST ("what-has-no-meaning-is-refused", what_has_no_meaning_is_refused);
  return g_test_run ();
}
