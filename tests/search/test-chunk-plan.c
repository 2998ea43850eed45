/* test-chunk-plan.c - the laws of cutting a record: every epoch belongs to one chunk, borders lie well inside. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "search/chunk.h"

#define ROOM 64

typedef struct
{
  AntSeries series;
  float *value;
  size_t n;
  AntChunk *chunk;
} Fixture;

static void
cut (Fixture *f, double days, double step_min, double length_d, double overlap_d, double gap_from_d, double gap_to_d)
{
  double step_d = step_min / ANT_MINUTES_PER_DAY;
  size_t n = (size_t) (days / step_d);
  f->value = g_new0 (float, n);
  for (size_t i = 0; i < n; i++)
    f->value[i] = (double) i * step_d >= gap_from_d && (double) i * step_d < gap_to_d ? NAN : 0;
  f->series = (AntSeries){ .n = n, .step_d = step_d, .value_ppm = f->value };
  AntChunkOptions options = { length_d, overlap_d };
  g_assert_cmpuint (ant_chunks_room (&f->series, &options), <=, ROOM);
  f->chunk = g_new0 (AntChunk, ROOM);
  f->n = ant_chunks_plan (&f->series, &options, ROOM, f->chunk);
  g_assert_cmpuint (f->n, ==, ant_chunks_room (&f->series, &options));
}

static void
uncut (Fixture *f)
{
  g_free (f->value);
  g_free (f->chunk);
}

/* Owned stretches follow one another from before the first place to beyond the last, each inside its chunk, its inner
 * borders at least `margin` places from the chunk's ends. */
static void
check_tiling (const Fixture *f, double margin)
{
  g_assert_cmpfloat (f->chunk[0].own_from, <=, 0);
  g_assert_cmpfloat (f->chunk[f->n - 1].own_to, >=, (double) f->series.n);
  g_assert_cmpuint (f->chunk[0].first, ==, 0);
  g_assert_cmpuint (f->chunk[f->n - 1].first + f->chunk[f->n - 1].n, ==, f->series.n);
  for (size_t i = 0; i < f->n; i++)
    {
      const AntChunk *chunk = &f->chunk[i];
      g_assert_cmpfloat (chunk->own_from, <, chunk->own_to);
      g_assert_cmpuint (chunk->first + chunk->n, <=, f->series.n);
      if (i)
        {
          g_assert_cmpfloat_with_epsilon (chunk->own_from, f->chunk[i - 1].own_to, 1e-6);
          g_assert_cmpfloat (chunk->own_from - (double) chunk->first, >=, margin - 1);
          g_assert_cmpfloat ((double) (f->chunk[i - 1].first + f->chunk[i - 1].n) - chunk->own_from, >=, margin - 1);
        }
    }
}

static void
owned_stretches_tile_the_record (void)
{
  static const double cases[][4] = { { 400, 5, 0, 20 }, { 200, 1.5, 60, 20 }, { 2000, 60, 0, 20 }, { 90, 5, 12, 4 }, { 101, 2, 31, 7 } };
  for (size_t i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      Fixture f;
      cut (&f, cases[i][0], cases[i][1], cases[i][2], cases[i][3], 0, 0);
      g_assert_cmpuint (f.n, >, 1);
      check_tiling (&f, 0.5 * cases[i][3] / f.series.step_d);
      uncut (&f);
    }
}

static void
every_place_belongs_to_just_one_chunk (void)
{
  Fixture f;
  cut (&f, 90, 5, 12, 4, 0, 0);
  for (size_t p = 0; p < f.series.n; p++)
    {
      size_t owners = 0;
      for (size_t i = 0; i < f.n; i++)
        owners += (double) p >= f.chunk[i].own_from && (double) p < f.chunk[i].own_to;
      g_assert_cmpuint (owners, ==, 1);
    }
  uncut (&f);
}

static void
chunks_are_about_as_long_as_the_cadence_asks (void)
{
  static const struct
  {
    double days, step_min, longest_d;
  } cases[] = { { 1000, 5, 90 }, { 1000, 12, 180 }, { 3000, 60, 180 }, { 6000, 1440, 500 } };
  for (size_t i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      Fixture f;
      cut (&f, cases[i].days, cases[i].step_min, 0, 20, 0, 0);
      for (size_t k = 0; k < f.n; k++)
        {
          double length_d = (double) f.chunk[k].n * f.series.step_d;
          g_assert_cmpfloat (length_d, <=, cases[i].longest_d * 1.02);
          g_assert_cmpfloat (length_d, >=, cases[i].longest_d * 0.6);
        }
      uncut (&f);
    }
}

static void
a_record_little_longer_than_a_chunk_is_not_cut (void)
{
  Fixture f;
  cut (&f, 115, 5, 90, 20, 0, 0);
  g_assert_cmpuint (f.n, ==, 1);
  g_assert_cmpuint (f.chunk[0].n, ==, f.series.n);
  uncut (&f);
  cut (&f, 120, 5, 90, 20, 0, 0);
  g_assert_cmpuint (f.n, ==, 2);
  uncut (&f);
}

/* 100 days lost at an hourly cadence: the chunk in the gap must reach out to the data on both sides. */
static void
a_chunk_in_a_long_gap_borrows_from_its_neighbours (void)
{
  Fixture f;
  cut (&f, 400, 60, 60, 20, 140, 300);
  size_t longest = 0;
  for (size_t i = 0; i < f.n; i++)
    {
      AntSeries part = ant_series_part (&f.series, f.chunk[i].first, f.chunk[i].n);
      g_assert_cmpuint (ant_series_observed (&part, 0), >=, 300);
      longest = MAX (longest, f.chunk[i].n);
    }
  g_assert_cmpfloat ((double) longest * f.series.step_d, >, 100);
  check_tiling (&f, 10 / f.series.step_d);
  uncut (&f);
}

static void
too_little_room_is_refused (void)
{
  float value[3000] = { 0 };
  AntSeries series = { .n = 3000, .step_d = 1 / 24.0, .value_ppm = value };
  AntChunk chunk[2];
  AntChunkOptions options = { 30, 10 };
  g_assert_cmpuint (ant_chunks_plan (&series, &options, 2, chunk), ==, (size_t) -1);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add_func ("/search/chunk-plan/" path, function)
  TEST ("owned-stretches-tile-the-record", owned_stretches_tile_the_record);
  TEST ("every-place-belongs-to-just-one-chunk", every_place_belongs_to_just_one_chunk);
  TEST ("chunks-are-about-as-long-as-the-cadence-asks", chunks_are_about_as_long_as_the_cadence_asks);
  TEST ("a-record-little-longer-than-a-chunk-is-not-cut", a_record_little_longer_than_a_chunk_is_not_cut);
  TEST ("a-chunk-in-a-long-gap-borrows-from-its-neighbours", a_chunk_in_a_long_gap_borrows_from_its_neighbours);
  TEST ("too-little-room-is-refused", too_little_room_is_refused);
  return g_test_run ();
}
