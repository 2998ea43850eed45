/* witness-table.c - a comparison as a table of numbers. */
#include "writers/witness-table.h"

#include <math.h>

#include "writers/number-table.h"

static double *
widen (const float *value, gsize n)
{
  double *wide = g_new (double, n);
  for (gsize i = 0; i < n; i++)
    wide[i] = (double) value[i];
  return wide;
}

GString *
ant_witness_table_text (const AntComparison *self)
{
  g_autoptr (GPtrArray) words = ant_comparison_words (self);
  g_autofree char *who = g_strdup_printf ("witness: %s, SHA-256 %s", self->witness->path, self->witness->sha256);
  g_ptr_array_insert (words, 0, g_steal_pointer (&who));
  g_ptr_array_add (words, NULL);
  g_autofree double *jd = g_new (double, self->n), *elapsed = g_new (double, self->n);
  for (gsize i = 0; i < self->n; i++)
    {
      elapsed[i] = self->start_d + (double) i * self->step_d;
      jd[i] = ant_time_reference_jd (&self->record->time, elapsed[i]);
    }
  g_autofree double *record = widen (self->record_ppm, self->n), *witness = widen (self->witness_ppm, self->n);
  g_autofree double *ratio = widen (self->ratio_ppm, self->n), *difference = widen (self->difference_ppm, self->n);
  const AntNumberColumn columns[] = { { "mid_jd", jd, "%.7f" },           { "elapsed_d", elapsed, "%.7f" },
                                      { "record_ppm", record, "%.3f" },   { "witness_ppm", witness, "%.3f" },
                                      { "ratio_ppm", ratio, "%.3f" },     { "difference_ppm", difference, "%.3f" } };
  return ant_number_table_text (self->record, "record beside its witness", (const char *const *) words->pdata, G_N_ELEMENTS (columns),
                                columns, self->n);
}
