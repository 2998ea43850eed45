/* desk-witness.c - the witnesses on the desk: those that the analysis names and those that are being opened for it, the look at them,
 * and the quiet work that reads and compares them. */
#include <glib/gi18n.h>

#include "gui/desk-private.h"
#include "gui/reading-memory.h"
#include "readers/file-look.h"

typedef struct
{
  AntWitness *witness;       /* owned */
  AntWitnessStrips *strips;  /* owned; NULL: not read yet, or it could not be */
  GCancellable *stop;        /* owned; NULL: nothing is being read */
  char *problem;             /* owned; why it could not be read */
  const AntRecord *tried;    /* beside which; only compared */
  const AntAnalysis *fresh;  /* that it is being opened for, which does not name it yet; only compared */
} Held;

static void
cancel (Held *held)
{
  if (held->stop)
    g_cancellable_cancel (held->stop);
  g_clear_object (&held->stop);
}

void
ant_desk_held_witness_free (gpointer data)
{
  Held *held = data;
  cancel (held);
  ant_witness_free (held->witness);
  ant_witness_strips_unref (held->strips);
  g_free (held->problem);
  g_free (held);
}

static Held *
held_at (AntDesk *self, guint i)
{
  return i < self->witnesses->len ? g_ptr_array_index (self->witnesses, i) : NULL;
}

guint
ant_desk_count_witnesses (AntDesk *self)
{
  return self->witnesses->len;
}

const AntWitness *
ant_desk_get_witness (AntDesk *self, guint i)
{
  Held *held = held_at (self, i);
  return held ? held->witness : NULL;
}

const AntWitnessStrips *
ant_desk_get_witness_strips (AntDesk *self, guint i)
{
  Held *held = held_at (self, i);
  return held ? held->strips : NULL;
}

const char *
ant_desk_get_witness_problem (AntDesk *self, guint i)
{
  Held *held = held_at (self, i);
  return held ? held->problem : NULL;
}

AntWitnessLook
ant_desk_get_witness_look (AntDesk *self)
{
  return self->witness_look;
}

void
ant_desk_set_witness_look (AntDesk *self, AntWitnessLook look)
{
  self->witness_look = look;
  ant_desk_tell (self, ANT_DESK_WITNESS);
}

GPtrArray *
ant_desk_get_comparisons (AntDesk *self)
{
  GPtrArray *comparisons = g_ptr_array_new_with_free_func ((GDestroyNotify) ant_comparison_unref);
  for (guint i = 0; i < self->witnesses->len; i++)
    if (held_at (self, i)->strips)
      g_ptr_array_add (comparisons, ant_comparison_ref (held_at (self, i)->strips->comparison));
  return comparisons;
}

void
ant_desk_name_compared (AntDesk *self, AntTreatment *treatment)
{
  g_ptr_array_set_size (treatment->witnesses, 0);
  for (guint i = 0; i < self->witnesses->len; i++)
    if (held_at (self, i)->strips)
      g_ptr_array_add (treatment->witnesses, ant_witness_copy (held_at (self, i)->witness));
}

/* Reading */

static void opened_cb (GObject *source, GAsyncResult *result, gpointer data);

static void
start (AntDesk *self, Held *held)
{
  cancel (held);
  g_clear_pointer (&held->problem, g_free);
  held->tried = self->layers->record;
  held->stop = g_cancellable_new ();
  ant_witness_task_async (self->layers->record, held->witness, ant_desk_get_settings (self), held->stop, opened_cb, g_object_ref (self));
}

/* The record was read anew, or another drift is to be taken out. */
static gboolean
is_out_of_date (AntDesk *self, const Held *held)
{
  const AntComparison *comparison = held->strips ? held->strips->comparison : NULL;
  if (held->stop || (!comparison && held->tried == self->layers->record))
    return held->tried != self->layers->record;
  return !comparison || comparison->record != self->layers->record || comparison->drift_d != ant_desk_get_settings (self)->witness_drift_d;
}

/* It has been read: the analysis learns of it, or of its new bytes. */
static void
note_read (AntDesk *self, Held *held)
{
  const char *sha256 = held->strips->comparison->witness->sha256;
  gboolean fresh = held->fresh == self->analysis;
  gboolean others = held->witness->sha256 && g_strcmp0 (held->witness->sha256, sha256) != 0;
  AntDeskChange what = ANT_DESK_WITNESS;
  g_free (held->witness->sha256);
  held->witness->sha256 = g_strdup (sha256);
  held->fresh = NULL;
  if (fresh && ant_analysis_add_witness (self->analysis, held->witness))
    what |= ANT_DESK_SETTINGS;
  else if (!fresh && ant_analysis_update_witness (self->analysis, held->witness))
    what |= ANT_DESK_SETTINGS;
  if (others)
    {
      g_autofree char *name = ant_witness_name (held->witness);
      g_autofree char *sentence = g_strdup_printf (_("%s: the bytes of this witness are not those that the analysis was made with; scan again"), name);
      ant_desk_fail (self, sentence);
    }
  if (what & ANT_DESK_SETTINGS)
    ant_desk_changed (self, what);
  else
    ant_desk_tell (self, what);
}

static void
opened_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  AntWitnessStrips *strips = ant_witness_task_finish (result, &error);
  Held *held = NULL;
  for (guint i = 0; i < self->witnesses->len; i++)
    if (held_at (self, i)->stop == g_task_get_cancellable (G_TASK (result)))
      held = held_at (self, i);
  if (!held)
    {
      ant_witness_strips_unref (strips); /* overtaken */
      return;
    }
  g_clear_object (&held->stop);
  if (strips)
    {
      ant_witness_strips_unref (held->strips);
      held->strips = strips;
      if (is_out_of_date (self, held))
        start (self, held); /* another drift was asked for meanwhile */
      note_read (self, held);
      return;
    }
  held->problem = g_strdup (error->message);
  ant_desk_tell (self, ANT_DESK_WITNESS);
  ant_desk_fail (self, error->message);
}

static Held *
hold (AntDesk *self, const AntWitness *witness, const AntAnalysis *fresh)
{
  Held *held = g_new0 (Held, 1);
  held->witness = ant_witness_copy (witness);
  held->fresh = fresh;
  g_ptr_array_add (self->witnesses, held);
  return held;
}

void
ant_desk_open_witness_as (AntDesk *self, const char *path, const AntReadingChoices *reading)
{
  g_autoptr (AntWitness) witness = ant_witness_new (path, NULL, reading);
  if (!self->layers)
    return;
  for (guint i = self->witnesses->len; i-- > 0;)
    if (g_str_equal (held_at (self, i)->witness->path, witness->path))
      {
        if (ant_witness_same_file (held_at (self, i)->witness, witness) && !held_at (self, i)->problem)
          return;
        ant_desk_close_witness (self, i);
      }
  if (self->witnesses->len >= ANT_MOST_WITNESSES)
    {
      g_autofree char *sentence = g_strdup_printf (_("%d witnesses are open, more cannot be: close one first"), ANT_MOST_WITNESSES);
      ant_desk_fail (self, sentence);
      return;
    }
  start (self, hold (self, witness, self->analysis));
  ant_desk_tell (self, ANT_DESK_WITNESS);
}

void
ant_desk_open_witness (AntDesk *self, const char *path)
{
  g_autoptr (AntFileLook) look = g_file_test (path, G_FILE_TEST_IS_REGULAR) ? ant_file_look_new (path, NULL) : NULL;
  AntReadingChoices reading = { 0 };
  if (look)
    ant_reading_memory_recall (look->kind, &reading);
  ant_desk_open_witness_as (self, path, &reading);
  ant_reading_choices_clear (&reading);
}

void
ant_desk_close_witness (AntDesk *self, guint i)
{
  Held *held = held_at (self, i);
  if (!held)
    return;
  int place = ant_treatment_find_witness (ant_analysis_get_treatment (self->analysis), held->witness);
  g_ptr_array_remove_index (self->witnesses, i);
  if (place >= 0)
    {
      ant_analysis_remove_witness (self->analysis, (guint) place);
      ant_desk_changed (self, ANT_DESK_WITNESS | ANT_DESK_SETTINGS);
    }
  else
    ant_desk_tell (self, ANT_DESK_WITNESS);
}

/* Those on the desk are those of the analysis, in its order, then those that are being opened for it. */
static gboolean
hold_those_named (AntDesk *self)
{
  const GPtrArray *named = ant_analysis_get_treatment (self->analysis)->witnesses;
  g_autoptr (GPtrArray) before = self->witnesses;
  gboolean changed = FALSE;
  self->witnesses = g_ptr_array_new_with_free_func (ant_desk_held_witness_free);
  for (guint i = 0; i < named->len; i++)
    {
      guint at = 0;
      while (at < before->len && !ant_witness_same_file (((Held *) g_ptr_array_index (before, at))->witness, g_ptr_array_index (named, i)))
        at++;
      changed |= at != 0;
      if (at < before->len)
        g_ptr_array_add (self->witnesses, g_ptr_array_steal_index (before, at));
      else
        hold (self, g_ptr_array_index (named, i), NULL);
    }
  for (guint i = 0; i < before->len;)
    if (((Held *) g_ptr_array_index (before, i))->fresh == self->analysis)
      g_ptr_array_add (self->witnesses, g_ptr_array_steal_index (before, i));
    else
      i++;
  return changed || before->len > 0;
}

gboolean
ant_desk_follow_witnesses (AntDesk *self)
{
  gboolean changed = hold_those_named (self);
  const AntRecord *record = ant_desk_get_record (self);
  for (guint i = 0; i < self->witnesses->len; i++)
    {
      Held *held = held_at (self, i);
      if (held->strips && (!record || g_strcmp0 (held->strips->comparison->record->sha256, record->sha256) != 0))
        g_clear_pointer (&held->strips, ant_witness_strips_unref);
      if (record && is_out_of_date (self, held))
        start (self, held);
    }
  return changed;
}
