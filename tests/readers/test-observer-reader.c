/* test-observer-reader.c - observers as people ask for them: tables read row by row, refused with the line and the reason. */
#include "readers/observer-reader.h"

#include <math.h>
#include <string.h>

#include "core/units.h"
#include "data/error.h"
#include "sky/places.h"
#include "sky/time-scale.h"

static AntObserverChoice *
read_text (const char *text, GError **error)
{
  return ant_observer_read_bytes ("orbit.txt", text, strlen (text), error);
}

static AntObserverChoice *
reads (const char *text)
{
  g_autoptr (GError) error = NULL;
  AntObserverChoice *choice = read_text (text, &error);
  g_assert_no_error (error);
  return choice;
}

static void
words_make_observers (void)
{
  g_autoptr (AntObserverChoice) earth = ant_observer_open ("earth", NULL), l1 = ant_observer_open ("l1", NULL),
                                site = ant_observer_open ("site:-70.4, -24.6,2635", NULL);
  g_assert_cmpint (earth->observer.kind, ==, ANT_OBSERVER_EARTH);
  g_assert_cmpint (l1->observer.kind, ==, ANT_OBSERVER_L1);
  g_assert_cmpint (site->observer.kind, ==, ANT_OBSERVER_SITE);
  g_assert_cmpfloat (site->observer.longitude_deg, ==, -70.4);
  g_assert_cmpfloat (site->observer.latitude_deg, ==, -24.6);
  g_assert_cmpfloat (site->observer.height_m, ==, 2635);
}

/* The same two positions in every dialect. */
static void
dialects_mean_the_same_table (void)
{
  static const char *const same[] = {
    "# frame: GSE\n2003-05-06T00:00:00Z,1540000,-581000,-79551\n2003-05-08T00:00:00Z,1540000,-581000,-79551\n",
    "time x_gse y_gse z_gse\n2003-05-06 00:00:00 1540000 -581000 -79551\n2003-05-08 00:00:00 1540000 -581000 -79551\n",
    "% positions, GSE, km\ntime;x;y;z\n2452765.5;1.54e6;-5.81e5;-79551\n2452767.5;1.54e6;-5.81e5;-79551\n",
    "; axes: gse\r\n52765\t1540000\t-581000\t-79551\r\n\r\n52767\t1540000\t-581000\t-79551\r\n",
    "# frame: GSE\n# scale: TT\n2003-05-06T00:01:04.184,1540000,-581000,-79551\n2003-05-08T00:01:04.184,1540000,-581000,-79551\n",
  };
  for (gsize i = 0; i < G_N_ELEMENTS (same); i++)
    {
      g_test_message ("%s", same[i]);
      g_autoptr (AntObserverChoice) choice = reads (same[i]);
      const AntPositionTable *table = &choice->observer.table;
      g_assert_cmpuint (table->n, ==, 2);
      g_assert_cmpint (table->frame, ==, ANT_FRAME_GSE);
      /* 0 h UTC of 2003-05-06 is 64.184 s later in TT. */
      g_assert_cmpfloat_with_epsilon (table->time_tt_d[0], 2452765.5 + 64.184 / ANT_SECONDS_PER_DAY - ANT_J2000_JD, 1e-9);
      g_assert_cmpfloat_with_epsilon (table->time_tt_d[1] - table->time_tt_d[0], 2, 1e-9);
      g_assert_cmpfloat (table->x_km[1], ==, 1540000);
      g_assert_cmpfloat (table->y_km[1], ==, -581000);
      g_assert_cmpfloat (table->z_km[1], ==, -79551);
    }
}

static void
what_cannot_be_is_refused_in_one_line (void)
{
  static const struct
  {
    const char *text, *said;
  } wrong[] = {
    { "", "two or more" },
    { "# frame: GCRS\n", "two or more" },
    { "# frame: GCRS\n2003-05-06,7000,0,0\n", "two or more" },
    { "2003-05-06,7000,0,0\n2003-05-07,7000,0,0\n", "axes are not named" },
    { "# frame: GCRS\n2003-05-06,7000,0\n2003-05-07,7000,0\n", "line 2: found too few cells" },
    { "# frame: GCRS\n2003-05-06,7000,0,0,0\n", "line 2: found too many cells" },
    { "# frame: GCRS\n2003-05-06,7000,0,0\nsoon,7000,0,0\n", "line 3: found no time" },
    { "# frame: GCRS\n2003-05-06,7000,0,0\n2003-05-07,7000,,0\n", "line 3: found a cell that is no number" },
    { "# frame: GCRS\n2003-05-06,7000,0,0\n2003-05-06,7000,0,0\n", "line 3: its time is not later" },
    { "# frame: GCRS\n2003-05-06,7,0,0\n2003-05-07,7,0,0\n", "line 2: the position is 7 km from the Earth's centre, inside the Earth" },
    { "# frame: GSE\n2003-05-06,1.5e9,0,0\n2003-05-07,1.5e9,0,0\n", "line 2: the position is 1.5e+09 km" },
    { "# frame: GSE\n2003-05-06,1.5e6,0,0\n2003-05-07,1.5e6,0,0\n2003-05-08,1.5e6,0,0\n2003-05-12,1.5e6,0,0\n", "line 5: a hole of 96 h" },
    { "# frame: GCRS\nyesterday 7000 0 0\ntoday 7000 0 0\n", "line 3: found no time" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
    {
      g_autoptr (GError) error = NULL;
      g_assert_null (read_text (wrong[i].text, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
      g_test_message ("%s", error->message);
      g_assert_nonnull (strstr (error->message, wrong[i].said));
      g_assert_true (g_str_has_prefix (error->message, "orbit.txt: "));
      g_assert_null (strchr (error->message, '\n'));
    }
}

static void
sites_that_cannot_be_are_refused (void)
{
  static const char *const wrong[] = { "site:", "site:10", "site:10,20", "site:10,20,x", "site:10,91,0", "site:400,0,0",
                                       "site:10,20,-6000000", "site:10,20,700000", "site:10,20,30,40" };
  for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
    {
      g_autoptr (GError) error = NULL;
      g_assert_null (ant_observer_open (wrong[i], &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
      g_assert_true (g_str_has_prefix (error->message, "site: "));
    }
}

static void
a_missing_table_is_told (void)
{
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_observer_open ("no-such-orbit.txt", &error));
  g_assert_nonnull (strstr (error->message, "no-such-orbit.txt"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/readers/observer-reader/words-make-observers", words_make_observers);
  g_test_add_func ("/readers/observer-reader/dialects-mean-the-same-table", dialects_mean_the_same_table);
  g_test_add_func ("/readers/observer-reader/what-cannot-be-is-refused-in-one-line", what_cannot_be_is_refused_in_one_line);
  g_test_add_func ("/readers/observer-reader/sites-that-cannot-be-are-refused", sites_that_cannot_be_are_refused);
  g_test_add_func ("/readers/observer-reader/a-missing-table-is-told", a_missing_table_is_told);
  return g_test_run ();
}
