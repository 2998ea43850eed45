/* treatment.c - what decides the results of a scan, apart from the record's bytes. */
#include "data/treatment.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/error.h"

static AntMask *
mask_new (AntSpan span, AntMaskKind kind, const char *reason)
{
  AntMask *mask = g_new0 (AntMask, 1);
  *mask = (AntMask) { span, kind, g_strdup (reason) };
  return mask;
}

static void
mask_free (gpointer data)
{
  AntMask *mask = data;
  g_free (mask->reason);
  g_free (mask);
}

static gpointer
mask_copy (gconstpointer data, gpointer user_data)
{
  const AntMask *mask = data;
  return mask_new (mask->span, mask->kind, mask->reason);
}

static int
by_start (gconstpointer a, gconstpointer b)
{
  const AntMask *one = *(AntMask *const *) a, *other = *(AntMask *const *) b;
  if (one->span.start_d != other->span.start_d)
    return one->span.start_d < other->span.start_d ? -1 : 1;
  return (one->span.end_d > other->span.end_d) - (one->span.end_d < other->span.end_d);
}

AntTreatment *
ant_treatment_new (void)
{
  AntTreatment *treatment = g_new0 (AntTreatment, 1);
  ant_settings_init (&treatment->settings);
  treatment->from_d = treatment->to_d = NAN;
  treatment->masks = g_ptr_array_new_with_free_func (mask_free);
  treatment->witnesses = g_ptr_array_new_with_free_func ((GDestroyNotify) ant_witness_free);
  return treatment;
}

AntTreatment *
ant_treatment_copy (const AntTreatment *treatment)
{
  AntTreatment *copy = g_new0 (AntTreatment, 1);
  *copy = *treatment;
  ant_reading_choices_copy (&treatment->reading, &copy->reading);
  copy->good = g_strdup (treatment->good);
  copy->observer = g_strdup (treatment->observer);
  copy->masks = g_ptr_array_new_with_free_func (mask_free);
  for (guint i = 0; i < treatment->masks->len; i++)
    g_ptr_array_add (copy->masks, mask_copy (g_ptr_array_index (treatment->masks, i), NULL));
  copy->witnesses = g_ptr_array_new_with_free_func ((GDestroyNotify) ant_witness_free);
  for (guint i = 0; i < treatment->witnesses->len; i++)
    g_ptr_array_add (copy->witnesses, ant_witness_copy (g_ptr_array_index (treatment->witnesses, i)));
  return copy;
}

void
ant_treatment_free (AntTreatment *treatment)
{
  if (!treatment)
    return;
  ant_reading_choices_clear (&treatment->reading);
  g_free (treatment->good);
  g_free (treatment->observer);
  g_ptr_array_unref (treatment->masks);
  g_ptr_array_unref (treatment->witnesses);
  g_free (treatment);
}

void
ant_treatment_mask (AntTreatment *treatment, AntSpan span, AntMaskKind kind, const char *reason)
{
  if (!(span.end_d >= span.start_d))
    return;
  g_ptr_array_add (treatment->masks, mask_new (span, kind, reason));
  g_ptr_array_sort (treatment->masks, by_start);
}

gboolean
ant_treatment_unmask (AntTreatment *treatment, AntSpan span)
{
  g_autoptr (GPtrArray) before = g_steal_pointer (&treatment->masks);
  gboolean found = FALSE;
  treatment->masks = g_ptr_array_new_with_free_func (mask_free);
  for (guint i = 0; i < before->len; i++)
    {
      const AntMask *mask = g_ptr_array_index (before, i);
      if (mask->span.end_d < span.start_d || mask->span.start_d > span.end_d)
        {
          ant_treatment_mask (treatment, mask->span, mask->kind, mask->reason);
          continue;
        }
      found = TRUE;
      if (mask->span.start_d < span.start_d)
        ant_treatment_mask (treatment, (AntSpan) { mask->span.start_d, span.start_d }, mask->kind, mask->reason);
      if (mask->span.end_d > span.end_d)
        ant_treatment_mask (treatment, (AntSpan) { span.end_d, mask->span.end_d }, mask->kind, mask->reason);
    }
  return found;
}

int
ant_treatment_find_witness (const AntTreatment *treatment, const AntWitness *witness)
{
  for (guint i = 0; i < treatment->witnesses->len; i++)
    if (ant_witness_same_file (g_ptr_array_index (treatment->witnesses, i), witness))
      return (int) i;
  return -1;
}

void
ant_treatment_shift (AntTreatment *treatment, double shift_d)
{
  treatment->from_d += shift_d;
  treatment->to_d += shift_d;
  for (guint i = 0; i < treatment->masks->len; i++)
    {
      AntMask *mask = g_ptr_array_index (treatment->masks, i);
      mask->span.start_d += shift_d;
      mask->span.end_d += shift_d;
    }
}

static gboolean
same_number (double one, double other)
{
  return one == other || (isnan (one) && isnan (other));
}

static gboolean
same_masks (const GPtrArray *one, const GPtrArray *other)
{
  if (one->len != other->len)
    return FALSE;
  for (guint i = 0; i < one->len; i++)
    {
      const AntMask *a = g_ptr_array_index (one, i), *b = g_ptr_array_index (other, i);
      if (a->span.start_d != b->span.start_d || a->span.end_d != b->span.end_d || a->kind != b->kind)
        return FALSE;
    }
  return TRUE;
}

static gboolean
same_witnesses (const GPtrArray *one, const GPtrArray *other)
{
  if (one->len != other->len)
    return FALSE;
  for (guint i = 0; i < one->len; i++)
    if (!ant_witness_same (g_ptr_array_index (one, i), g_ptr_array_index (other, i)))
      return FALSE;
  return TRUE;
}

/* group NULL: all that can change a result. */
static gboolean
same_settings (const AntSettings *one, const AntSettings *other, const char *group)
{
  for (gsize i = 0; i < ant_n_settings; i++)
    {
      const AntSetting *setting = &ant_setting_table[i];
      if ((!group || g_str_equal (setting->group, group)) && ant_setting_matters (setting)
          && ant_setting_get (setting, one) != ant_setting_get (setting, other))
        return FALSE;
    }
  return TRUE;
}

gboolean
ant_treatment_same_grid (const AntTreatment *one, const AntTreatment *other)
{
  if (one->settings.grid.distance != (double) ANT_DISTANCE_AS_IS && g_strcmp0 (one->observer, other->observer) != 0)
    return FALSE; /* converted by another's distance */
  return same_settings (&one->settings, &other->settings, "Record") && g_strcmp0 (one->good, other->good) == 0
         && ant_reading_choices_same (&one->reading, &other->reading) && same_number (one->from_d, other->from_d)
         && same_number (one->to_d, other->to_d) && same_masks (one->masks, other->masks);
}

gboolean
ant_treatment_same (const AntTreatment *one, const AntTreatment *other)
{
  return same_settings (&one->settings, &other->settings, NULL) && g_strcmp0 (one->observer, other->observer) == 0
         && same_witnesses (one->witnesses, other->witnesses) && ant_treatment_same_grid (one, other);
}

static GArray *
spans_of (const AntTreatment *treatment, AntMaskKind kind)
{
  GArray *spans = g_array_new (FALSE, FALSE, sizeof (AntSpan));
  for (guint i = 0; i < treatment->masks->len; i++)
    {
      const AntMask *mask = g_ptr_array_index (treatment->masks, i);
      if (mask->kind == kind)
        g_array_append_val (spans, mask->span);
    }
  return spans;
}

gboolean
ant_treatment_grid (const AntTreatment *treatment, AntGridOptions *grid, GError **error)
{
  *grid = ant_settings_grid (&treatment->settings);
  if (treatment->good && !ant_grid_options_parse_good (grid, "good", treatment->good, error))
    return FALSE;
  grid->from_d = treatment->from_d;
  grid->to_d = treatment->to_d;
  grid->excluded = spans_of (treatment, ANT_MASK_EXCLUDED);
  grid->masked = spans_of (treatment, ANT_MASK_HAND);
  return TRUE;
}

void
ant_grid_options_clear (AntGridOptions *grid)
{
  g_clear_pointer (&grid->good_values, g_array_unref);
  g_clear_pointer (&grid->excluded, g_array_unref);
  g_clear_pointer (&grid->masked, g_array_unref);
}

static gboolean
parse_good_list (AntGridOptions *grid, const char *name, const char *text, GError **error)
{
  g_autoptr (GArray) values = g_array_new (FALSE, FALSE, sizeof (gint64));
  g_auto (GStrv) parts = g_strsplit (text, ",", -1);
  for (guint i = 0; parts[i]; i++)
    {
      gint64 value;
      if (!g_ascii_string_to_signed (g_strstrip (parts[i]), 10, G_MININT64, G_MAXINT64, &value, NULL))
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: found “%s”, expected whole numbers or a mask 0x…"), name,
                       parts[i]);
          return FALSE;
        }
      g_array_append_val (values, value);
    }
  grid->quality_is_list = TRUE;
  grid->good_values = g_steal_pointer (&values);
  return TRUE;
}

gboolean
ant_grid_options_parse_good (AntGridOptions *grid, const char *name, const char *text, GError **error)
{
  guint64 mask;
  if (g_ascii_strncasecmp (text, "0x", 2) != 0)
    return parse_good_list (grid, name, text, error);
  if (!g_ascii_string_to_unsigned (text + 2, 16, 1, G_MAXUINT64, &mask, NULL))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: found “%s”, expected a mask of up to 64 bits such as 0x10042"),
                   name, text);
      return FALSE;
    }
  grid->good_mask = (gint64) mask;
  return TRUE;
}
