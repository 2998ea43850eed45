/* row-order.c - which rows of a record can be used, in the order of time. */
#include "data/row-order.h"
#include <glib/gi18n.h>
#include <math.h>
#include <string.h>
#include "data/error.h"

#define FEWEST_GOOD 50
#define SAME_TIME_D 1e-9 /* 0.1 ms: the rounding of a JD in one double */

void
ant_row_order_clear (AntRowOrder *order)
{
  g_clear_pointer (&order->row, g_free);
  g_clear_pointer (&order->time_d, g_free);
  order->n = 0;
}

static gboolean
quality_is_good (const AntGridOptions *options, gint64 quality)
{
  if (options->good_values && options->good_values->len > 0)
    {
      for (guint i = 0; i < options->good_values->len; i++)
        if (g_array_index (options->good_values, gint64, i) == quality)
          return TRUE;
      return FALSE;
    }
  if (!options->quality_is_list && options->good_mask != 0)
    return (quality & options->good_mask) == 0;
  return quality == 0;
}

static void
judge_values (AntRecord *record, const AntGridOptions *options)
{
  gsize n_fill = 0, n_no_time = 0, n_bad = 0;
  for (gsize i = 0; i < record->n_rows; i++)
    {
      if (!isfinite (record->value[i]))
        record->flags[i] |= ANT_FLAG_FILL;
      if (!isfinite (record->time_d[i]))
        record->flags[i] |= ANT_FLAG_NO_TIME;
      if (record->quality && !quality_is_good (options, record->quality[i]))
        record->flags[i] |= ANT_FLAG_QUALITY;
      n_fill += (record->flags[i] & ANT_FLAG_FILL) != 0;
      n_no_time += (record->flags[i] & ANT_FLAG_NO_TIME) != 0;
      n_bad += (record->flags[i] & ANT_FLAG_QUALITY) != 0;
    }
  if (n_fill > 0)
    ant_record_say (record, _("Rows with a fill value or no number, left out: %zu of %zu."), n_fill, record->n_rows);
  if (n_no_time > 0)
    ant_record_say (record, _("Rows whose time cannot be read, left out: %zu."), n_no_time);
  if (record->quality)
    {
      const char *name = record->quality_name ? record->quality_name : _("quality");
      g_autofree char *rule = NULL;
      if (options->good_values && options->good_values->len > 0)
        rule = g_strdup (_("good = one of the listed values"));
      else if (!options->quality_is_list && options->good_mask != 0)
        rule = g_strdup_printf (_("good = no bit of 0x%llx set"), (unsigned long long) options->good_mask);
      else
        rule = g_strdup (_("good = 0"));
      ant_record_say (record, _("Quality column \"%s\": %s; rows left out by it: %zu of %zu."), name, rule, n_bad,
                      record->n_rows);
    }
}

static int
compare_rows (gconstpointer a, gconstpointer b, gpointer times)
{
  const double *time_d = times;
  guint32 i = *(const guint32 *) a, j = *(const guint32 *) b;
  if (time_d[i] != time_d[j])
    return time_d[i] < time_d[j] ? -1 : 1;
  return i < j ? -1 : i > j; /* rows of one time stay in the file's order */
}

/* Collect the rows with a time; sort them if some stand before an earlier one. A record that goes back at most of its
 * rows is not disorderly but backwards, and a sign of a misread time column. */
static gboolean
sort_rows (AntRowOrder *order, AntRecord *record, GError **error)
{
  gsize n_back = 0;
  guint32 first_back = 0;
  for (gsize i = 0; i < record->n_rows; i++)
    {
      if (record->flags[i] & ANT_FLAG_NO_TIME)
        continue;
      if (order->n > 0 && record->time_d[i] < record->time_d[order->row[order->n - 1]])
        {
          if (n_back++ == 0)
            first_back = (guint32) i;
        }
      order->row[order->n++] = (guint32) i;
    }
  if (n_back == 0)
    return TRUE;
  g_autofree char *first = ant_record_row_text (record, record->line[first_back]);
  if (n_back * 2 > order->n)
    return ant_record_refuse (record, error,
                              _("%s: the time goes back, and so do %zu of %zu "
                                "rows: expected times that grow"),
                              first, n_back, order->n);
  g_qsort_with_data (order->row, (int) order->n, sizeof (guint32), compare_rows, record->time_d);
  ant_record_say (record, _("The times go back at %zu places, first at %s: the rows were sorted."), n_back, first);
  return TRUE;
}

/* Of rows at one time the first good one is kept. */
static void
drop_duplicates (AntRowOrder *order, AntRecord *record)
{
  gsize n_kept = 0, n_dropped = 0;
  guint32 first_dropped = 0;
  for (gsize i = 0, next; i < order->n; i = next)
    {
      double time_d = record->time_d[order->row[i]];
      gsize keep = i;
      for (next = i + 1; next < order->n && record->time_d[order->row[next]] - time_d <= SAME_TIME_D; next++)
        if (!ant_row_used (record, order->row[keep]) && ant_row_used (record, order->row[next]))
          keep = next;
      for (gsize j = i; j < next; j++)
        if (j != keep)
          {
            record->flags[order->row[j]] |= ANT_FLAG_DUPLICATE;
            if (n_dropped++ == 0)
              first_dropped = order->row[j];
          }
      order->row[n_kept] = order->row[keep];
      order->time_d[n_kept++] = record->time_d[order->row[keep]];
    }
  order->n = n_kept;
  if (n_dropped == 0)
    return;
  g_autofree char *first = ant_record_row_text (record, record->line[first_dropped]);
  ant_record_say (record,
                  _("Rows that repeat the time of another, left out: %zu, first at %s; the first good row of each time "
                    "is kept."),
                  n_dropped, first);
}

gboolean
ant_row_order_make (AntRowOrder *order, AntRecord *record, const AntGridOptions *options, GError **error)
{
  *order = (AntRowOrder){ 0 };
  if (record->n_rows > G_MAXINT)
    return ant_record_refuse (record, error, _("%zu rows: expected at most %d"), record->n_rows, G_MAXINT);
  judge_values (record, options);
  order->row = g_new (guint32, record->n_rows);
  order->time_d = g_new (double, record->n_rows);
  if (!sort_rows (order, record, error))
    return FALSE;
  drop_duplicates (order, record);
  return TRUE;
}

static int
compare_spans (gconstpointer a, gconstpointer b)
{
  double start_a = ((const AntSpan *) a)->start_d, start_b = ((const AntSpan *) b)->start_d;
  return start_a < start_b ? -1 : start_a > start_b;
}

/* Flag the rows inside any of the spans, which may overlap. */
static gsize
flag_inside (const AntRowOrder *order, AntRecord *record, const GArray *of_spans, AntFlag flag)
{
  if (!of_spans)
    return 0;
  g_autoptr (GArray) spans = g_array_new (FALSE, FALSE, sizeof (AntSpan));
  g_array_append_vals (spans, of_spans->data, of_spans->len);
  g_array_sort (spans, compare_spans);
  gsize n_inside = 0;
  guint next = 0;
  double covered_to_d = -HUGE_VAL; /* the farthest end of the spans begun so far */
  for (gsize k = 0; k < order->n; k++)
    {
      double time_d = order->time_d[k];
      for (; next < spans->len && g_array_index (spans, AntSpan, next).start_d <= time_d; next++)
        covered_to_d = fmax (covered_to_d, g_array_index (spans, AntSpan, next).end_d);
      if (time_d > covered_to_d)
        continue;
      record->flags[order->row[k]] |= flag;
      n_inside++;
    }
  return n_inside;
}

void
ant_row_order_judge_spans (const AntRowOrder *order, AntRecord *record, const AntGridOptions *options)
{
  gsize n_outside = 0;
  for (gsize k = 0; k < order->n; k++)
    if (order->time_d[k] < options->from_d || order->time_d[k] > options->to_d) /* NaN limits compare false */
      {
        record->flags[order->row[k]] |= ANT_FLAG_EXCLUDED;
        n_outside++;
      }
  gsize n_excluded = flag_inside (order, record, options->excluded, ANT_FLAG_EXCLUDED);
  gsize n_masked = flag_inside (order, record, options->masked, ANT_FLAG_HAND);
  if (n_outside > 0)
    ant_record_say (record, _("Rows outside the limits of the scan: %zu."), n_outside);
  if (n_excluded > 0)
    ant_record_say (record, _("Rows inside excluded spans: %zu."), n_excluded);
  if (n_masked > 0)
    ant_record_say (record, _("Rows masked by hand: %zu."), n_masked);
}

void
ant_row_order_trim (AntRowOrder *order, const AntRecord *record)
{
  gsize first = 0;
  while (!ant_row_used (record, order->row[first]))
    first++;
  while (!ant_row_used (record, order->row[order->n - 1]))
    order->n--;
  order->n -= first;
  memmove (order->row, order->row + first, order->n * sizeof *order->row);
  memmove (order->time_d, order->time_d + first, order->n * sizeof *order->time_d);
}

gsize
ant_row_order_count_good (const AntRowOrder *order, const AntRecord *record)
{
  gsize count = 0;
  for (gsize k = 0; k < order->n; k++)
    count += ant_row_used (record, order->row[k]);
  return count;
}

gboolean
ant_row_order_require_good (const AntRowOrder *order, const AntRecord *record, GError **error)
{
  gsize n_good = ant_row_order_count_good (order, record);
  if (n_good >= FEWEST_GOOD)
    return TRUE;
  gsize counts[ANT_N_FLAGS] = { 0 };
  for (gsize i = 0; i < record->n_rows; i++)
    for (unsigned bit = 0; bit < ANT_N_FLAGS; bit++)
      counts[bit] += record->flags[i] >> bit & 1;
  g_autoptr (GString) why = g_string_new (NULL);
  for (unsigned bit = 0; bit < ANT_N_FLAGS; bit++)
    if (counts[bit] > 0)
      g_string_append_printf (why, "%s%s %zu", why->len > 0 ? ", " : "", ant_flag_name (bit), counts[bit]);
  return ant_record_refuse (record, error, _("%zu of %zu rows are good%s%s%s: expected at least %d"), n_good,
                            record->n_rows, why->len > 0 ? " (" : "", why->str, why->len > 0 ? ")" : "", FEWEST_GOOD);
}
