/* test-damage.c - damaged FITS and text files: cut off, with bits turned, with headers that lie, packed in packed. Each is refused
 * in one line that names the HDU, the row or the line, or it is a record that keeps its promises; memory stays bounded. */
#include <gio/gio.h>
#include <sys/resource.h>

#include "core/random.h"
#include "fits-making.h"
#include "reading.h"

#define N 200
#define MOST_MEMORY_KB (300 * 1024)

typedef struct
{
  const char *name;
  guint n_refused, n_read;
} Tally;

static void
try_reading (Tally *tally, const char *what, const guint8 *bytes, gsize n)
{
  g_autoptr (GError) error = NULL;
  g_autoptr (AntRecord) record = ant_reader_read_bytes (tally->name, bytes, n, NULL, &error);
  g_assert_true ((record != NULL) != (error != NULL));
  if (record)
    {
      tally->n_read++;
      for (gsize i = 0; i < record->n_rows; i++)
        g_assert_true (isnan (record->value[i]) == ((record->flags[i] & ANT_FLAG_FILL) != 0) && !isinf (record->time_d[i]));
      return;
    }
  tally->n_refused++;
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_null (strchr (error->message, '\n'));
  g_assert_true (g_str_has_prefix (error->message, tally->name));
  if (!strstr (error->message, "HDU ") && !strstr (error->message, "line ") && !strstr (error->message, "row ")
      && !strstr (error->message, "gzip") && !strstr (error->message, "no line of data"))
    g_error ("%s: “%s” names no place", what, error->message);
}

static void
end (const Tally *tally, guint fewest)
{
  struct rusage usage;
  getrusage (RUSAGE_SELF, &usage);
  g_test_message ("%s: %u refused, %u read, %ld KiB at most", tally->name, tally->n_refused, tally->n_read, usage.ru_maxrss);
  g_assert_cmpuint (tally->n_refused, >=, fewest);
#ifndef __SANITIZE_ADDRESS__
  g_assert_cmpint (usage.ru_maxrss, <, MOST_MEMORY_KB);
#endif
}

static guint8 *
sound_fits (gsize *n)
{
  const char *const names[] = { "TIME", "RATE", "ERROR", "QUALITY" }, *const forms[] = { "1D", "1D", "1E", "1J" };
  const char *const units[] = { "s", "W/m2", "W/m2", "" };
  double time[N], rate[N], error[N], quality[N];
  Making making;
  for (int i = 0; i < N; i++)
    {
      time[i] = 60.0 * i;
      rate[i] = 1361.0 + 0.01 * (i % 17);
      error[i] = 0.1;
      quality[i] = i % 19 == 0;
    }
  making_start (&making);
  making_table (&making, "RATES", BINARY_TBL, N, 4, names, forms, units);
  making_numbers (&making, 1, N, time);
  making_numbers (&making, 2, N, rate);
  making_numbers (&making, 3, N, error);
  making_numbers (&making, 4, N, quality);
  making_text_key (&making, "TIMESYS", "TT");
  making_number_key (&making, "MJDREF", 58849.0);
  return making_end (&making, n);
}

static void
fits_cut_off_is_refused (void)
{
  Tally tally = { "cut.fits", 0, 0 };
  gsize n;
  g_autofree guint8 *bytes = sound_fits (&n);
  gsize n_data = 2880 + 2880 + N * 24; /* what follows is padding */
  for (int i = 0; i < 60; i++)
    {
      gsize cut = 30 + (n_data - 30) * (gsize) i / 60;
      g_autofree guint8 *copy = g_memdup2 (bytes, cut);
      try_reading (&tally, "cut", copy, cut);
    }
  end (&tally, 60);
}

static void
fits_headers_that_lie_are_found_out (void)
{
  static const struct
  {
    const char *key;
    gboolean is_text;
  } cards[] = { { "XTENSION", TRUE }, { "BITPIX", FALSE }, { "NAXIS", FALSE }, { "NAXIS1", FALSE }, { "NAXIS2", FALSE },
                { "PCOUNT", FALSE }, { "GCOUNT", FALSE }, { "TFIELDS", FALSE }, { "TFORM1", TRUE }, { "TFORM2", TRUE } };
  static const char *const lies[] = { "-1", "0", "3", "9999", "2147483648", "9223372036854775807", "99999999999999999999", "1E300",
                                      "'99999999D'", "'1PD(9)'", "'-4D'", "'0D'", "'BINTABLE'", "'IMAGE'", "T", "garbage", "" };
  Tally tally = { "lies.fits", 0, 0 };
  gsize n;
  g_autofree guint8 *bytes = sound_fits (&n);
  for (gsize c = 0; c < G_N_ELEMENTS (cards); c++)
    for (gsize l = 0; l < G_N_ELEMENTS (lies); l++)
      {
        g_autofree guint8 *copy = g_memdup2 (bytes, n);
        g_autofree char *start = g_strdup_printf ("%-8s=", cards[c].key), *card = g_strdup_printf ("%-8s= %20s", cards[c].key, lies[l]);
        for (gsize at = 2880; at < 5760; at += 80)
          if (!memcmp (copy + at, start, 9))
            {
              memset (copy + at, ' ', 80);
              memcpy (copy + at, card, strlen (card));
            }
        try_reading (&tally, card, copy, n);
      }
  end (&tally, 50);
}

static void
turned_bits_do_no_harm (void)
{
  Tally fits = { "bits.fits", 0, 0 };
  AntRandom random;
  gsize n;
  g_autofree guint8 *bytes = sound_fits (&n);
  ant_random_seed (&random, 3, 0);
  for (int trial = 0; trial < 400; trial++)
    {
      g_autofree guint8 *copy = g_memdup2 (bytes, n);
      int n_turned = 1 + trial % 8;
      gsize limit = trial % 2 ? n : 5760; /* every other trial in the headers alone */
      for (int i = 0; i < n_turned; i++)
        copy[30 + (gsize) (ant_random_uniform (&random) * (double) (limit - 31))] ^= (guint8) (1 << trial % 8);
      try_reading (&fits, "bits", copy, n);
    }
  end (&fits, 50);
}

static guint8 *
pack (const guint8 *bytes, gsize n, gsize *n_packed)
{
  g_autoptr (GConverter) packer = G_CONVERTER (g_zlib_compressor_new (G_ZLIB_COMPRESSOR_FORMAT_GZIP, 1));
  gsize n_read, room = n + 1000;
  guint8 *packed = g_malloc (room);
  g_assert_cmpint (g_converter_convert (packer, bytes, n, packed, room, G_CONVERTER_INPUT_AT_END, &n_read, n_packed, NULL), ==,
                   G_CONVERTER_FINISHED);
  return packed;
}

static void
packed_in_packed_is_refused (void)
{
  Tally tally = { "deep.gz", 0, 0 };
  gsize n, n_zeros = 80 << 20;
  g_autofree guint8 *bytes = sound_fits (&n);
  for (int depth = 0; depth < 20; depth++)
    {
      gsize n_packed;
      guint8 *packed = pack (bytes, n, &n_packed);
      if (depth > 0)
        try_reading (&tally, "packed in packed", packed, n_packed);
      for (gsize part = 1; part < 4; part++) /* and cut off */
        try_reading (&tally, "packed and cut", packed, n_packed * part / 4);
      g_free (bytes);
      bytes = packed;
      n = n_packed;
    }
  /* A bomb behind the first card of a FITS file. */
  g_autofree guint8 *bomb = g_malloc0 (n_zeros);
  memcpy (bomb, "SIMPLE  =                    T", 30);
  gsize n_bomb;
  g_autofree guint8 *packed = pack (bomb, n_zeros, &n_bomb);
  g_clear_pointer (&bomb, g_free);
  try_reading (&tally, "bomb", packed, n_bomb);
  g_assert_cmpuint (tally.n_refused, >=, 70);
}

static void
damaged_text_is_refused_or_read_without_harm (void)
{
  Tally tally = { "damaged.txt", 0, 0 };
  AntRandom random;
  g_autoptr (GString) text = g_string_new ("JD,value,error,flag\n");
  ant_random_seed (&random, 4, 0);
  for (int i = 0; i < N; i++)
    g_string_append_printf (text, "%.6f,%.4f,0.1,%d\n", 2466000.5 + i / 1440.0, 1361.0 + 0.01 * (i % 17), i % 19 == 0);
#define BAD(text) { text, sizeof (text) - 1 }
  static const struct { const char *bytes; gssize n; } bad[]
      = { BAD ("1e999"), BAD ("-1e999"), BAD ("1e-300"), BAD ("9e40"), BAD ("inf"), BAD ("\xff\xfe"), BAD ("\0001"), BAD ("x"),
          BAD ("1,2"), BAD ("1;2"), BAD ("") };
  for (gsize b = 0; b < G_N_ELEMENTS (bad); b++)
    for (int where = 0; where < 6; where++)
      {
        /* In one row, or in every other one; for the time, or for the value. */
        g_autoptr (GString) copy = g_string_new ("JD,value,error,flag\n");
        for (int i = 0; i < N; i++)
          {
            gboolean here = where < 2 ? i == 100 : where < 4 ? i % 2 : TRUE;
            if (here && where % 2)
              g_string_append_len (copy, bad[b].bytes, bad[b].n);
            else
              g_string_append_printf (copy, "%.6f", 2466000.5 + i / 1440.0);
            g_string_append_c (copy, ',');
            if (here && !(where % 2))
              g_string_append_len (copy, bad[b].bytes, bad[b].n);
            else
              g_string_append_printf (copy, "%.4f", 1361.0 + 0.01 * (i % 17));
            g_string_append_printf (copy, ",0.1,%d\n", i % 19 == 0);
          }
        try_reading (&tally, bad[b].bytes, (guint8 *) copy->str, copy->len);
      }
  for (gsize cut = 1; cut < text->len; cut += text->len / 40)
    try_reading (&tally, "cut", (guint8 *) text->str, cut);
  for (int trial = 0; trial < 200; trial++)
    {
      g_autofree char *copy = g_memdup2 (text->str, text->len);
      for (int i = 0; i < 1 + trial; i++)
        copy[(gsize) (ant_random_uniform (&random) * (double) text->len)] ^= (char) (1 << trial % 8);
      try_reading (&tally, "bits", (guint8 *) copy, text->len);
    }
  end (&tally, 50);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/readers/damage/fits-cut-off-is-refused", fits_cut_off_is_refused);
  g_test_add_func ("/readers/damage/fits-headers-that-lie-are-found-out", fits_headers_that_lie_are_found_out);
  g_test_add_func ("/readers/damage/turned-bits-do-no-harm", turned_bits_do_no_harm);
  g_test_add_func ("/readers/damage/damaged-text-is-refused-or-read-without-harm", damaged_text_is_refused_or_read_without_harm);
  g_test_add_func ("/readers/damage/packed-in-packed-is-refused", packed_in_packed_is_refused);
  return g_test_run ();
}
