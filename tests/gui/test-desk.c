/* test-desk.c - views, selection and spans, without a window. */
#include <math.h>
#include <string.h>

#include "support.h"

static AntDesk *
desk_with_record (void)
{
  AntDesk *desk = ant_desk_new ();
  ant_desk_open (desk, test_gui_record ());
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_nonnull (ant_desk_get_record (desk));
  return desk;
}

static double
view_length (AntDesk *desk)
{
  return ant_desk_get_view (desk)->to - ant_desk_get_view (desk)->from;
}

static void
zooming_keeps_the_place_under_the_pointer (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  double before = view_length (desk);
  ant_desk_zoom (desk, 4, 5);
  g_assert_cmpfloat_with_epsilon (view_length (desk), before / 4, 1e-9);
  const AntView *view = ant_desk_get_view (desk);
  g_assert_cmpfloat (view->from, <, 5);
  g_assert_cmpfloat (view->to, >, 5);
}

static void
the_view_stays_within_the_record (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  double whole = view_length (desk);
  ant_desk_set_view (desk, -100, 500);
  g_assert_cmpfloat_with_epsilon (view_length (desk), whole, 1e-9);
  ant_desk_set_view (desk, 15, 15.0000001);
  g_assert_cmpfloat_with_epsilon (view_length (desk), 12 / 144.0, 1e-6);
  ant_desk_pan (desk, 1000);
  g_assert_cmpfloat (ant_desk_get_view (desk)->to, <=, 16);
}

static void
one_can_go_back_through_views (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  double whole = view_length (desk);
  g_assert_false (ant_desk_can_go (desk, -1));
  ant_desk_set_view (desk, 2, 4);
  g_assert_true (ant_desk_can_go (desk, -1));
  ant_desk_go (desk, -1);
  g_assert_cmpfloat_with_epsilon (view_length (desk), whole, 1e-9);
  ant_desk_go (desk, 1);
  g_assert_cmpfloat_with_epsilon (view_length (desk), 2, 1e-9);
  g_assert_false (ant_desk_can_go (desk, 1));
}

static void
a_long_drag_is_one_step_back (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  for (int i = 1; i < 100; i++)
    ant_desk_set_view (desk, 0.01 * i, 3 + 0.01 * i);
  ant_desk_go (desk, -1);
  g_assert_false (ant_desk_can_go (desk, -1));
}

static gboolean
has_witness (gpointer desk)
{
  return ant_desk_get_witness (desk) || !ant_desk_get_witness_path (desk);
}

/* The record as its own witness: the ratio is one throughout. */
static void
a_witness_is_compared_and_goes_with_the_record (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  ant_desk_open_witness (desk, test_gui_record ());
  g_assert_null (ant_desk_get_witness (desk));
  test_gui_wait (has_witness, desk, 20);
  const AntWitnessStrips *witness = ant_desk_get_witness (desk);
  g_assert_nonnull (witness);
  g_assert_cmpuint (witness->comparison->n, ==, ant_desk_get_record (desk)->series.n);
  for (gsize i = 0; i < witness->comparison->n; i++)
    g_assert_true (isnan (witness->comparison->ratio_ppm[i]) || fabsf (witness->comparison->ratio_ppm[i]) < 0.01f);
  ant_desk_close_witness (desk);
  g_assert_null (ant_desk_get_witness (desk));
  g_assert_null (ant_desk_get_witness_path (desk));
}

static void
another_drift_compares_anew (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  ant_desk_open_witness (desk, test_gui_record ());
  test_gui_wait (has_witness, desk, 20);
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("witness-drift"), "3", NULL));
  const AntWitnessStrips *before = ant_desk_get_witness (desk);
  for (int i = 0; i < 200 && ant_desk_get_witness (desk) == before; i++)
    g_main_context_iteration (NULL, TRUE);
  g_assert_cmpfloat (ant_desk_get_witness (desk)->comparison->drift_d, ==, 3.0);
  g_assert_false (ant_desk_is_stale (desk));
}

static void
failed_cb (AntDesk *desk, const char *sentence, char **said)
{
  g_free (*said);
  *said = g_strdup (sentence);
}

static void
what_is_no_witness_is_told (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  g_autofree char *said = NULL;
  g_signal_connect (desk, "failed", G_CALLBACK (failed_cb), &said);
  ant_desk_open_witness (desk, "/nowhere/record.csv");
  test_gui_wait (has_witness, desk, 20);
  g_assert_null (ant_desk_get_witness_path (desk));
  g_assert_nonnull (said);
  g_assert_nonnull (strstr (said, "the witness: "));
}

static gboolean
has_item (gpointer desk)
{
  return g_list_model_get_n_items (ant_desk_get_items (desk)) > 0 && test_gui_idle (desk);
}

static void
an_asked_dip_is_measured_and_selected (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  ant_desk_ask (desk, TEST_DIP_D - 3 / 24.0, TEST_DIP_D + 3 / 24.0);
  test_gui_wait (has_item, desk, 60);
  AntDipItem *item = ant_desk_get_selected (desk);
  g_assert_nonnull (item);
  g_assert_cmpint (ant_dip_item_get_kind (item), ==, ANT_KIND_ASKED);
  g_assert_cmpfloat_with_epsilon (ant_dip_item_get_dip (item)->depth_ppm, 900, 90);
  g_assert_cmpfloat (ant_dip_item_get_upper_limit_ppm (item), >, ant_dip_item_get_dip (item)->depth_ppm);
}

static void
selecting_brings_a_dip_into_view (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  ant_desk_ask (desk, TEST_DIP_D - 3 / 24.0, TEST_DIP_D + 3 / 24.0);
  test_gui_wait (has_item, desk, 60);
  ant_desk_select (desk, NULL);
  ant_desk_set_view (desk, 1, 3);
  ant_desk_select_next (desk, 1);
  const AntView *view = ant_desk_get_view (desk);
  g_assert_cmpfloat (view->from, <, TEST_DIP_D - 3 / 24.0);
  g_assert_cmpfloat (view->to, >, TEST_DIP_D + 3 / 24.0);
  g_assert_cmpfloat_with_epsilon (view_length (desk), 2, 1e-9);
  ant_desk_view_selected (desk);
  g_assert_cmpfloat_with_epsilon (view_length (desk), 1, 0.1);
}

static void
the_readout_tells_time_value_and_residual (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  g_autofree char *nothing = ant_desk_readout (desk);
  g_assert_cmpstr (nothing, ==, "");
  ant_desk_set_pointer (desk, 3);
  g_autofree char *text = ant_desk_readout (desk);
  g_assert_nonnull (strstr (text, "W/m²"));
  g_assert_nonnull (strstr (text, "residual"));
}

static void
a_span_grows_by_keys_about_the_middle_of_the_view (void)
{
  g_autoptr (AntDesk) desk = desk_with_record ();
  AntSpan first, second;
  ant_desk_widen_span (desk, 1);
  g_assert_true (ant_desk_get_span (desk, &first));
  ant_desk_widen_span (desk, 3);
  g_assert_true (ant_desk_get_span (desk, &second));
  g_assert_cmpfloat (second.end_d - second.start_d, >, first.end_d - first.start_d);
  g_assert_cmpfloat_with_epsilon ((second.start_d + second.end_d) / 2, 8, 0.1);
  ant_desk_set_span (desk, NULL);
  g_assert_false (ant_desk_get_span (desk, &first));
}

static void
add (void)
{
  g_test_add_func ("/gui/desk/zooming-keeps-the-place-under-the-pointer", zooming_keeps_the_place_under_the_pointer);
  g_test_add_func ("/gui/desk/the-view-stays-within-the-record", the_view_stays_within_the_record);
  g_test_add_func ("/gui/desk/one-can-go-back-through-views", one_can_go_back_through_views);
  g_test_add_func ("/gui/desk/a-long-drag-is-one-step-back", a_long_drag_is_one_step_back);
  g_test_add_func ("/gui/desk/an-asked-dip-is-measured-and-selected", an_asked_dip_is_measured_and_selected);
  g_test_add_func ("/gui/desk/selecting-brings-a-dip-into-view", selecting_brings_a_dip_into_view);
  g_test_add_func ("/gui/desk/the-readout-tells-time-value-and-residual", the_readout_tells_time_value_and_residual);
  g_test_add_func ("/gui/desk/a-span-grows-by-keys-about-the-middle-of-the-view",
                   a_span_grows_by_keys_about_the_middle_of_the_view);
  g_test_add_func ("/gui/desk/a-witness-is-compared-and-goes-with-the-record", a_witness_is_compared_and_goes_with_the_record);
  g_test_add_func ("/gui/desk/another-drift-compares-anew", another_drift_compares_anew);
  g_test_add_func ("/gui/desk/what-is-no-witness-is-told", what_is_no_witness_is_told);
}

int
main (int argc, char **argv)
{
  return test_gui_run (&argc, &argv, add);
}
