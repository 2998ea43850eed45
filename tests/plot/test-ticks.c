/* test-ticks.c - laws of every axis, whatever its range: labels ascend, stand apart in the true font, lie within, and
 * there are enough of them to read a value by. */
#include "plot/ticks.h"
#include <glib.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "canvas.h"
#include "core/random.h"
#include "plot/number-text.h"
#include "plot/pen.h"
#include "plot/time-ticks.h"

typedef struct
{
  AntCanvas canvas;
  AntTheme theme;
  AntPen pen;
} Desk;

static double
width_of (void *data, const char *label, int strong)
{
  return ant_pen_measure (data, label, strong ? ANT_TEXT_STRONG : ANT_TEXT_LABEL).width;
}

static void
desk_open (Desk *desk)
{
  desk->canvas = ant_canvas_new (10, 10);
  ant_theme_init (&desk->theme, ANT_THEME_LIGHT);
  ant_pen_begin (&desk->pen, desk->canvas.cr, &desk->theme, 1);
}

static void
desk_close (Desk *desk)
{
  ant_pen_end (&desk->pen);
  ant_canvas_clear (&desk->canvas);
}

static void
assert_lawful (const AntTicks *ticks, double from, double to, int is_log, const AntRuler *ruler, size_t least)
{
  double edge = -ruler->before_px - 1e-6;
  g_assert_cmpuint (ticks->n, <=, ANT_MAX_TICKS);
  g_assert_cmpuint (ticks->n_labelled, >=, least);
  for (size_t i = 0; i < ticks->n; i++)
    {
      double value = ticks->tick[i].value, slack = is_log ? 1e-6 * value : 1e-6 * (to - from);
      g_assert_true (value >= from - slack && value <= to + slack);
      g_assert_true ((ticks->tick[i].label[0] != '\0') == (i < ticks->n_labelled));
    }
  for (size_t i = 0; i < ticks->n_labelled; i++)
    {
      const AntTick *tick = &ticks->tick[i];
      double fraction = is_log ? log (tick->value / from) / log (to / from) : (tick->value - from) / (to - from);
      double at = fraction * ruler->length_px, half = ruler->measure (ruler->data, tick->label, tick->strong) / 2;
      g_assert_cmpfloat (at - half, >=, edge);
      g_assert_cmpfloat (at + half, <=, ruler->length_px + ruler->after_px + 1e-6);
      edge = at + half + ruler->gap_px - 1e-6;
      if (i > 0)
        g_assert_cmpfloat (tick->value, >, tick[-1].value);
    }
}

static void
linear_labels_never_touch (void)
{
  Desk desk;
  AntTicks ticks;
  AntRandom random;
  desk_open (&desk);
  ant_random_seed (&random, 9, 1);
  for (int try = 0; try < 400; try++)
    {
      double range = pow (10, 14 * ant_random_uniform (&random) - 7);
      double from = range * 20 * (ant_random_uniform (&random) - 0.5);
      AntRuler ruler = { 150 + 1200 * ant_random_uniform (&random), 14, 8, 14, width_of, &desk.pen };
      ant_ticks_linear (from, from + range, &ruler, &ticks);
      assert_lawful (&ticks, from, from + range, FALSE, &ruler, ruler.length_px > 300 ? 2 : 0);
    }
  desk_close (&desk);
}

static void
linear_labels_say_their_value (void)
{
  Desk desk;
  AntTicks ticks;
  desk_open (&desk);
  AntRuler ruler = { 900, 14, 8, 14, width_of, &desk.pen };
  for (double range = 1e-5; range < 1e5; range *= 3.7)
    {
      ant_ticks_linear (-0.3 * range, 0.7 * range, &ruler, &ticks);
      for (size_t i = 0; i < ticks.n_labelled; i++)
        {
          GString *plain = g_string_new (ticks.tick[i].label);
          g_string_replace (plain, ANT_MINUS, "-", 0);
          g_string_replace (plain, ANT_THIN_SPACE, "", 0);
          g_assert_cmpfloat_with_epsilon (g_ascii_strtod (plain->str, NULL), ticks.tick[i].value, 1e-9 * range);
          g_string_free (plain, TRUE);
        }
    }
  desk_close (&desk);
}

static void
a_range_below_the_digits_of_its_place_ends (void)
{
  Desk desk;
  AntTicks ticks;
  desk_open (&desk);
  AntRuler ruler = { 900, 14, 8, 14, width_of, &desk.pen };
  ant_ticks_linear (1e18, 1e18 + 512, &ruler, &ticks);
  g_assert_cmpuint (ticks.n, <=, ANT_MAX_TICKS);
  desk_close (&desk);
}

static void
log_labels_never_touch (void)
{
  Desk desk;
  AntTicks ticks;
  AntRandom random;
  desk_open (&desk);
  ant_random_seed (&random, 10, 1);
  for (int try = 0; try < 400; try++)
    {
      double from = pow (10, 12 * ant_random_uniform (&random) - 6), decades = 0.4 + 9 * ant_random_uniform (&random);
      double to = from * pow (10, decades);
      AntRuler ruler = { 200 + 1000 * ant_random_uniform (&random), 14, 8, 14, width_of, &desk.pen };
      ant_ticks_log (from, to, &ruler, &ticks);
      assert_lawful (&ticks, from, to, TRUE, &ruler, ruler.length_px > 400 && decades > 1 ? 2 : 0);
    }
  desk_close (&desk);
}

static AntTimeReference
reference_at (AntTimeScale scale, int year, int month, int day)
{
  AntTimeReference time = { .scale = scale, .origin_known = TRUE };
  g_assert_cmpint (ant_time_from_calendar (scale ? scale : ANT_SCALE_TT, year, month, day, 0, 0, 0, &time.origin_jd1,
                                           &time.origin_jd2), ==, ANT_OK);
  return time;
}

static void
time_labels_never_touch (void)
{
  Desk desk;
  AntTicks ticks;
  AntRandom random;
  desk_open (&desk);
  ant_random_seed (&random, 11, 1);
  AntTimeReference time = reference_at (ANT_SCALE_UTC, 1996, 2, 27);
  for (int try = 0; try < 400; try++)
    {
      double range = pow (10, -4 + 9 * ant_random_uniform (&random)); /* 9 s to 270 yr */
      double from = 12000 * ant_random_uniform (&random);
      AntRuler ruler = { 300 + 1200 * ant_random_uniform (&random), 16, 6, 16, width_of, &desk.pen };
      ant_ticks_time (&time, from, from + range, &ruler, &ticks);
      assert_lawful (&ticks, from, from + range, FALSE, &ruler, ruler.length_px > 500 ? 2 : 1);
    }
  desk_close (&desk);
}

/* The calendar field below the step must be at its beginning. */
static void
assert_round (const AntTimeReference *time, const AntTick *tick)
{
  double jd1, jd2, second;
  int year, month, day, hour, minute;
  g_assert_cmpint (ant_time_after (ANT_SCALE_UTC, time->origin_jd1, time->origin_jd2, tick->value, &jd1, &jd2), ==,
                   ANT_OK);
  ant_time_to_calendar (ANT_SCALE_UTC, jd1, jd2, 3, &year, &month, &day, &hour, &minute, &second);
  char text[64];
  if (strchr (tick->label, ':'))
    g_snprintf (text, sizeof text,
                strlen (strrchr (tick->label, ' ') ? strrchr (tick->label, ' ') + 1 : tick->label) > 5
                    ? "%02d:%02d:%02d"
                    : "%02d:%02d",
                hour, minute, (int) lround (second));
  else
    {
      static const char *const names[] = { "Jan", "Feb", "Mar", "Apr", "May", "Jun",
                                           "Jul", "Aug", "Sep", "Oct", "Nov", "Dec" };
      g_assert_cmpint (hour * 3600 + minute * 60 + (int) lround (second), ==, 0);
      if (strchr (tick->label, ' '))
        g_snprintf (text, sizeof text, "%s %d", names[month - 1], day);
      else
        {
          g_assert_cmpint (day, ==, 1);
          if (g_ascii_isdigit (tick->label[0]))
            {
              g_assert_cmpint (month, ==, 1);
              g_snprintf (text, sizeof text, "%d", year);
            }
          else
            g_strlcpy (text, names[month - 1], sizeof text);
        }
    }
  g_assert_true (g_str_has_suffix (tick->label, text));
}

static void
time_labels_are_true_instants (void)
{
  Desk desk;
  AntTicks ticks;
  desk_open (&desk);
  AntRuler ruler = { 900, 16, 6, 16, width_of, &desk.pen };
  AntTimeReference time = reference_at (ANT_SCALE_UTC, 2016, 12, 20); /* a leap second ends that year */
  for (double range = 1e-3; range < 3e4; range *= 1.9)
    for (double from = 0; from < 14; from += 3.37)
      {
        ant_ticks_time (&time, from, from + range, &ruler, &ticks);
        for (size_t i = 0; i < ticks.n_labelled; i++)
          assert_round (&time, &ticks.tick[i]);
      }
  desk_close (&desk);
}

static void
a_leap_second_moves_what_follows (void)
{
  Desk desk;
  AntTicks ticks;
  desk_open (&desk);
  AntRuler ruler = { 900, 16, 6, 16, width_of, &desk.pen };
  AntTimeReference time = reference_at (ANT_SCALE_UTC, 2016, 12, 31);
  ant_ticks_time (&time, 0.5, 1.5, &ruler, &ticks);
  gboolean seen = FALSE;
  for (size_t i = 0; i < ticks.n_labelled; i++)
    if (ticks.tick[i].strong)
      {
        g_assert_cmpfloat_with_epsilon (ticks.tick[i].value * 86400, 86401, 1e-4);
        seen = TRUE;
      }
  g_assert_true (seen);
  desk_close (&desk);
}

static void
other_scales_are_shown_as_utc (void)
{
  Desk desk;
  AntTicks ticks;
  desk_open (&desk);
  AntRuler ruler = { 900, 16, 6, 16, width_of, &desk.pen };
  AntTimeReference time = reference_at (ANT_SCALE_TAI, 2020, 6, 1); /* UTC was 37 s behind */
  ant_ticks_time (&time, -1, 1, &ruler, &ticks);
  gboolean seen = FALSE;
  for (size_t i = 0; i < ticks.n_labelled; i++)
    if (ticks.tick[i].strong && fabs (ticks.tick[i].value) < 0.1)
      {
        g_assert_cmpfloat_with_epsilon (ticks.tick[i].value * 86400, 37, 1e-3);
        seen = TRUE;
      }
  g_assert_true (seen);
  g_assert_nonnull (strstr (ticks.context, "UTC"));
  desk_close (&desk);
}

static void
an_unknown_scale_is_not_called_utc (void)
{
  Desk desk;
  AntTicks ticks;
  desk_open (&desk);
  AntRuler ruler = { 900, 16, 6, 16, width_of, &desk.pen };
  AntTimeReference time = reference_at (ANT_SCALE_UNKNOWN, 2020, 6, 1);
  ant_ticks_time (&time, 0, 20, &ruler, &ticks);
  g_assert_cmpstr (ticks.context, ==, "2020");
  g_assert_cmpuint (ticks.n_labelled, >, 2);
  desk_close (&desk);
}

static void
no_origin_means_days (void)
{
  Desk desk;
  AntTicks ticks;
  desk_open (&desk);
  AntRuler ruler = { 900, 16, 6, 16, width_of, &desk.pen };
  ant_ticks_time (NULL, 0, 40, &ruler, &ticks);
  g_assert_cmpstr (ticks.context, ==, "days");
  g_assert_cmpstr (ticks.tick[0].label, ==, "0");
  desk_close (&desk);
}

static void
within_a_day_the_day_is_named (void)
{
  Desk desk;
  AntTicks ticks;
  desk_open (&desk);
  AntRuler ruler = { 900, 16, 6, 16, width_of, &desk.pen };
  AntTimeReference time = reference_at (ANT_SCALE_UTC, 2041, 3, 3);
  for (double from = 11.05; from < 11.6; from += 0.0173)
    {
      gboolean named = FALSE;
      ant_ticks_time (&time, from, from + 0.3, &ruler, &ticks);
      for (size_t i = 0; i < ticks.n_labelled; i++)
        named |= strstr (ticks.tick[i].label, "Mar 14") != NULL;
      g_assert_true (named);
    }
  desk_close (&desk);
}

static void
a_readout_is_as_fine_as_asked (void)
{
  char text[64];
  AntTimeReference time = reference_at (ANT_SCALE_UTC, 2041, 3, 14);
  double at = (7 * 3600 + 12 * 60 + 5.25) / 86400;
  ant_time_label (&time, at, 1, sizeof text, text);
  g_assert_cmpstr (text, ==, "2041 Mar 14");
  ant_time_label (&time, at, 0.01, sizeof text, text);
  g_assert_cmpstr (text, ==, "2041 Mar 14 07:12");
  ant_time_label (&time, at, 1e-4, sizeof text, text);
  g_assert_cmpstr (text, ==, "2041 Mar 14 07:12:05");
  ant_time_label (NULL, 3.14159, 0.01, sizeof text, text);
  g_assert_cmpstr (text, ==, "3.14 d");
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/ticks/linear-labels-never-touch", linear_labels_never_touch);
  g_test_add_func ("/plot/ticks/linear-labels-say-their-value", linear_labels_say_their_value);
  g_test_add_func ("/plot/ticks/a-range-below-the-digits-of-its-place-ends",
                   a_range_below_the_digits_of_its_place_ends);
  g_test_add_func ("/plot/ticks/log-labels-never-touch", log_labels_never_touch);
  g_test_add_func ("/plot/ticks/time-labels-never-touch", time_labels_never_touch);
  g_test_add_func ("/plot/ticks/time-labels-are-true-instants", time_labels_are_true_instants);
  g_test_add_func ("/plot/ticks/a-leap-second-moves-what-follows", a_leap_second_moves_what_follows);
  g_test_add_func ("/plot/ticks/other-scales-are-shown-as-utc", other_scales_are_shown_as_utc);
  g_test_add_func ("/plot/ticks/an-unknown-scale-is-not-called-utc", an_unknown_scale_is_not_called_utc);
  g_test_add_func ("/plot/ticks/no-origin-means-days", no_origin_means_days);
  g_test_add_func ("/plot/ticks/within-a-day-the-day-is-named", within_a_day_the_day_is_named);
  g_test_add_func ("/plot/ticks/a-readout-is-as-fine-as-asked", a_readout_is_as_fine_as_asked);
  return g_test_run ();
}
