/* test-netcdf-reader.c - NetCDF files of every kind come in as they were written, and what cannot be one table is refused. */
#include "netcdf-making.h"
#include "reading.h"

#include <zlib.h>

static AntRecord *
open_made (const char *path, const AntReadingChoices *choices)
{
  g_autoptr (GError) error = NULL;
  AntRecord *record = ant_reader_open (path, choices, NULL, &error);
  g_assert_no_error (error);
  return record;
}

static void
expect_made (const AntRecord *record)
{
  g_assert_cmpstr (record->format, ==, "NetCDF");
  g_assert_cmpuint (record->n_rows, ==, MADE_ROWS);
  g_assert_cmpuint (strlen (record->sha256), ==, 64);
  g_assert_cmpstr (record->value_unit, ==, "W/m2");
  g_assert_cmpfloat (record->time.origin_jd1, ==, 2462137.5 + 4500.0); /* 2029-01-01 is JD 2462137.5 */
  g_assert_cmpint (record->stamp, ==, ANT_AT_MIDDLE);
  g_assert_true (record->exposure_known);
  g_assert_cmpfloat_with_epsilon (record->exposure_d * 86400.0, 600.0, 1e-4);
  for (int i = 0; i < MADE_ROWS; i++)
    {
      gboolean missing = i % 97 == 0 || i % 101 == 0;
      g_assert_cmpfloat_with_epsilon (record->time_d[i] * 86400.0, (i + 0.5) * 600.0, 1e-6);
      g_assert_cmpint (isnan (record->value[i]), ==, missing);
      g_assert_true (missing || record->value[i] == made_value (i));
      g_assert_cmpfloat (record->error[i], ==, (double) 0.05f);
      g_assert_cmpint (record->quality[i], ==, made_flag (i));
      g_assert_cmpuint (record->line[i], ==, (guint) i + 1);
    }
}

static void
every_kind_of_file_comes_in_whole (void)
{
  static const int kinds[] = { 0, NC_64BIT_OFFSET, NC_64BIT_DATA, NC_NETCDF4 };
  for (gsize i = 0; i < G_N_ELEMENTS (kinds); i++)
    {
      g_autofree char *path = make_netcdf (kinds[i], NULL);
      g_autoptr (AntRecord) record = open_made (path, NULL);
      expect_made (record);
      g_assert_cmpstr (record->value_name, ==, "tsi");
      g_assert_cmpstr (record->error_name, ==, "tsi_uncertainty");
      g_assert_cmpstr (record->quality_name, ==, "state");
      g_assert_true (was_said (record, "7 values are its fill"));
      g_assert_true (was_said (record, "outside its valid range"));
      g_assert_true (was_said (record, "leap seconds are left out of them"));
      g_unlink (path);
    }
}

static void
variables_of_a_group_go_by_its_name (void)
{
  AntReadingChoices choices = { .value_column = g_strdup ("radiometer/tsi") };
  g_autofree char *path = make_netcdf (NC_NETCDF4, "radiometer");
  g_autoptr (AntRecord) record = open_made (path, NULL), named = open_made (path, &choices);
  g_assert_cmpstr (record->value_name, ==, "radiometer/tsi");
  g_assert_cmpstr (named->value_name, ==, "radiometer/tsi");
  g_assert_cmpuint (record->n_rows, ==, MADE_ROWS);
  ant_reading_choices_clear (&choices);
  g_unlink (path);
}

/* From a pipe or packed there is no file to open by name. */
static void
packed_files_come_in_the_same (void)
{
  for (int kind = 0; kind <= NC_NETCDF4; kind += NC_NETCDF4)
    {
      g_autofree char *path = make_netcdf (kind, NULL), *packed = g_strconcat (path, ".gz", NULL), *bytes = NULL;
      gsize n;
      g_assert_true (g_file_get_contents (path, &bytes, &n, NULL));
      gzFile out = gzopen (packed, "wb");
      g_assert_cmpint (gzwrite (out, bytes, (unsigned) n), ==, (int) n);
      gzclose (out);
      g_autoptr (AntRecord) record = open_made (packed, NULL);
      g_autoptr (AntRecord) in_memory = ant_reader_read_bytes ("trial.nc", bytes, n, NULL, NULL);
      expect_made (record);
      g_assert_nonnull (in_memory);
      expect_made (in_memory);
      g_unlink (path);
      g_unlink (packed);
    }
}

static void
one_place_along_a_further_dimension_is_chosen (void)
{
  AntReadingChoices choices = { .value_column = g_strdup ("spectrum"), .index = g_strdup ("band=3") };
  g_autofree char *path = make_netcdf (NC_NETCDF4, NULL);
  g_autoptr (AntRecord) record = open_made (path, &choices);
  for (int i = 0; i < MADE_ROWS; i++)
    g_assert_cmpfloat (record->value[i], ==, (double) made_band (i, 2));
  g_assert_true (was_said (record, "number 3 of 4 along band"));
  ant_reading_choices_clear (&choices);
  g_unlink (path);
}

static void
a_choice_that_is_left_open_or_is_none_is_refused (void)
{
  static const struct
  {
    const char *value, *index, *words;
  } cases[] = {
    { "spectrum", NULL, "--index band=1" },
    { "spectrum", "band=5", "from 1 to 4" },
    { "spectrum", "band=0", "from 1 to 4" },
    { "spectrum", "colour=1", "expected DIMENSION=NUMBER with one of time, nv, band" },
    { "spectrum", "band", "expected DIMENSION=NUMBER" },
    { "moonlight", NULL, "no column “moonlight”" },
  };
  g_autofree char *path = make_netcdf (0, NULL);
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      g_autoptr (GError) error = NULL;
      AntReadingChoices choices = { .value_column = g_strdup (cases[i].value), .index = g_strdup (cases[i].index) };
      g_assert_null (ant_reader_open (path, &choices, NULL, &error));
      g_assert_nonnull (error);
      g_assert_null (strchr (error->message, '\n'));
      if (!strstr (error->message, cases[i].words))
        g_error ("“%s” lacks “%s”", error->message, cases[i].words);
      ant_reading_choices_clear (&choices);
    }
  g_unlink (path);
}

/* A classic file with a bare time: as a table of text would be taken. */
static void
times_without_a_date_to_count_from_go_by_their_names (void)
{
  g_autofree char *path = temporary_path ();
  int file, row, jd, flux;
  made (nc_create (path, NC_CLOBBER, &file));
  made (nc_def_dim (file, "row", 100, &row));
  made (nc_def_var (file, "flux", NC_DOUBLE, 1, &row, &flux));
  made (nc_def_var (file, "JD", NC_DOUBLE, 1, &row, &jd));
  made (nc_enddef (file));
  for (size_t i = 0; i < 100; i++)
    {
      double when = 2462137.5 + 0.25 * (double) i, value = 1.0 + 1e-5 * (double) (i % 7);
      made (nc_put_var1_double (file, jd, &i, &when));
      made (nc_put_var1_double (file, flux, &i, &value));
    }
  made (nc_close (file));
  g_autoptr (AntRecord) record = open_made (path, NULL);
  g_assert_cmpint (record->time.style, ==, ANT_STAMP_JD);
  g_assert_cmpstr (record->value_name, ==, "flux");
  g_assert_cmpfloat (record->time_d[99], ==, 24.75);
  g_unlink (path);
}

static void
a_stopped_reading_ends (void)
{
  g_autofree char *path = make_netcdf (NC_NETCDF4, NULL);
  g_autoptr (GCancellable) cancellable = g_cancellable_new ();
  g_autoptr (GError) error = NULL;
  g_cancellable_cancel (cancellable);
  g_assert_null (ant_reader_open (path, NULL, cancellable, &error));
  g_assert_error (error, G_IO_ERROR, G_IO_ERROR_CANCELLED);
  g_unlink (path);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/readers/netcdf/every-kind-of-file-comes-in-whole", every_kind_of_file_comes_in_whole);
  g_test_add_func ("/readers/netcdf/variables-of-a-group-go-by-its-name", variables_of_a_group_go_by_its_name);
  g_test_add_func ("/readers/netcdf/packed-files-come-in-the-same", packed_files_come_in_the_same);
  g_test_add_func ("/readers/netcdf/one-place-along-a-further-dimension-is-chosen", one_place_along_a_further_dimension_is_chosen);
  g_test_add_func ("/readers/netcdf/a-choice-that-is-left-open-or-is-none-is-refused", a_choice_that_is_left_open_or_is_none_is_refused);
  g_test_add_func ("/readers/netcdf/times-without-a-date-to-count-from-go-by-their-names", times_without_a_date_to_count_from_go_by_their_names);
  g_test_add_func ("/readers/netcdf/a-stopped-reading-ends", a_stopped_reading_ends);
  return g_test_run ();
}
