/* test-dip-words.c - numbers of dips as people read them. */
#include "data/dip-words.h"

#include <math.h>

#include "rows.h"

/* At a TSI of 1361 W/m2, 1000 +- 13 ppm deep. */
static const AntDip dip = { .mid_d = 3, .duration_d = 0.25, .edge_d = 0.01, .depth_ppm = 1000.4, .depth_sigma_ppm = 13,
                            .mean_depth_ppm = 870, .radius_ratio = 0.03, .snr = 77, .first_snr = 30, .expected_false = NAN,
                            .coverage = 0.914, .edges = ANT_EDGES_BOTH };

static AntRecord *
record (void)
{
  AntRecord *made = test_rows (500, 0, 1 / 144.0);
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  test_grid (made, &options);
  return made;
}

static void
depth_has_its_unit_and_as_many_figures_as_it_deserves (void)
{
  g_autoptr (AntRecord) rows = record ();
  g_free (rows->value_unit);
  rows->value_unit = g_strdup ("W/m2");
  g_autofree char *ppm = ant_depth_words (rows, &dip, ANT_DEPTH_PPM), *own = ant_depth_words (rows, &dip, ANT_DEPTH_W_M2);
  g_assert_cmpstr (ppm, ==, "1000 ± 13 ppm");
  g_assert_cmpstr (own, ==, "1.362 ± 0.018 W/m²");
}

static void
a_record_without_a_unit_tells_ppm (void)
{
  g_autoptr (AntRecord) rows = record ();
  g_clear_pointer (&rows->value_unit, g_free);
  g_autofree char *own = ant_depth_words (rows, &dip, ANT_DEPTH_W_M2);
  g_assert_cmpstr (own, ==, "1000 ± 13 ppm");
}

static void
a_negative_number_has_a_true_minus_and_zero_has_none (void)
{
  g_autofree char *minus = ant_number_words (-12.34, 1), *zero = ant_number_words (-0.04, 1);
  g_assert_cmpstr (minus, ==, "\342\210\22212.3");
  g_assert_cmpstr (zero, ==, "0.0");
}

static void
lengths_take_the_unit_that_people_would (void)
{
  const struct
  {
    double length_d;
    const char *words;
  } known[] = { { 41.6, "41.6 d" }, { 0.26, "6.24 h" }, { 31 / 1440.0, "31 min" }, { 60 / 86400.0, "60 s" } };
  for (gsize i = 0; i < G_N_ELEMENTS (known); i++)
    {
      g_autofree char *words = ant_length_words (known[i].length_d);
      g_assert_cmpstr (words, ==, known[i].words);
    }
}

/* 0.03 solar radii of 695 700 km; 6378.1 km to an Earth radius (IAU 2015 resolution B3). */
static void
a_depth_is_told_as_a_planet (void)
{
  g_autofree char *words = ant_radius_words (&dip);
  g_assert_cmpstr (words, ==, "20900 km, 3.27 Earth radii");
}

static void
facts_are_copied_as_lines_with_tabs (void)
{
  g_autoptr (AntRecord) rows = record ();
  g_autoptr (GPtrArray) facts = ant_dip_facts (rows, &dip, 1020, ANT_DEPTH_PPM);
  g_autofree char *text = ant_facts_text (facts);
  g_assert_nonnull (strstr (text, "Depth\t1000 ± 13 ppm\n"));
  g_assert_nonnull (strstr (text, "Excluded at 95 %\tdeeper than 1020.0 ppm\n"));
  g_assert_nonnull (strstr (text, "Observed\t91 %, ingress and egress seen\n"));
  g_assert_null (strstr (text, "By chance"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/dip-words/depth-has-its-unit-and-as-many-figures-as-it-deserves", depth_has_its_unit_and_as_many_figures_as_it_deserves);
  g_test_add_func ("/data/dip-words/a-record-without-a-unit-tells-ppm", a_record_without_a_unit_tells_ppm);
  g_test_add_func ("/data/dip-words/a-negative-number-has-a-true-minus-and-zero-has-none", a_negative_number_has_a_true_minus_and_zero_has_none);
  g_test_add_func ("/data/dip-words/lengths-take-the-unit-that-people-would", lengths_take_the_unit_that_people_would);
  g_test_add_func ("/data/dip-words/a-depth-is-told-as-a-planet", a_depth_is_told_as_a_planet);
  g_test_add_func ("/data/dip-words/facts-are-copied-as-lines-with-tabs", facts_are_copied_as_lines_with_tabs);
  return g_test_run ();
}
