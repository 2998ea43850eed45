/* desk-keep.c - changes of the analysis, and how they are kept: saved, kept aside unsaved, offered back after a crash. */
#include "gui/desk-private.h"

#include <glib/gi18n.h>
#include <glib/gstdio.h>
#include <string.h>

#include "data/analysis-text.h"
#include "jobs/save-task.h"
#include "writers/analysis-file.h"

#define KEEP_AFTER_S 3

/* Changes */

void
ant_desk_changed (AntDesk *self, AntDeskChange what)
{
  ant_desk_keep_soon (self);
  ant_desk_tell (self, what | ANT_DESK_KEPT);
}

/* The sky goes by the observer, the radii and the limb darkening. */
static void
settings_changed (AntDesk *self, const AntSettings *was, AntDeskChange what)
{
  const AntSettings *now = ant_desk_get_settings (self);
  gboolean another_sky = was->radii != now->radii || was->bank.limb_darkening.u1 != now->bank.limb_darkening.u1
                         || was->bank.limb_darkening.u2 != now->bank.limb_darkening.u2
                         || ant_desk_observer_differs (self);
  if (another_sky)
    ant_desk_follow_sky (self);
  ant_desk_changed (self, what | ANT_DESK_SETTINGS | (another_sky ? ANT_DESK_SKY : 0));
}

gboolean
ant_desk_set_setting (AntDesk *self, const AntSetting *setting, const char *text, GError **error)
{
  AntSettings was = *ant_desk_get_settings (self);
  guint64 before = ant_analysis_get_revision (self->analysis);
  if (!ant_analysis_set_setting (self->analysis, setting, text, error))
    return FALSE;
  if (ant_analysis_get_revision (self->analysis) != before)
    settings_changed (self, &was, 0);
  return TRUE;
}

void
ant_desk_reset_settings (AntDesk *self)
{
  AntSettings was = *ant_desk_get_settings (self);
  ant_analysis_reset_settings (self->analysis);
  settings_changed (self, &was, 0);
}

void
ant_desk_change (AntDesk *self, const char *name, AntTreatment *treatment)
{
  AntSettings was = *ant_desk_get_settings (self);
  ant_analysis_treat (self->analysis, name, treatment);
  settings_changed (self, &was, ANT_DESK_MASKS);
}

static void
judged (AntDesk *self)
{
  ant_desk_judge_items (self);
  ant_desk_make_marks (self);
  ant_desk_changed (self, ANT_DESK_JUDGEMENT);
}

/* "dip 3": as the names of changes have it. */
static char *
selected_name (AntDesk *self)
{
  char *title = ant_dip_item_title (self->selected);
  title[0] = g_ascii_tolower (title[0]);
  return title;
}

void
ant_desk_judge (AntDesk *self, AntDipClass class)
{
  if (!self->selected || ant_dip_item_get_class (self->selected) == class)
    return;
  const AntDip *dip = ant_dip_item_get_dip (self->selected);
  g_autofree char *name = selected_name (self);
  ant_analysis_judge (self->analysis, name, dip->mid_d, dip->duration_d, class);
  judged (self);
}

void
ant_desk_note (AntDesk *self, const char *note)
{
  if (!self->selected || g_str_equal (ant_dip_item_get_note (self->selected), note))
    return;
  const AntDip *dip = ant_dip_item_get_dip (self->selected);
  g_autofree char *name = selected_name (self);
  ant_analysis_note (self->analysis, name, dip->mid_d, dip->duration_d, note);
  judged (self);
}

gsize
ant_desk_get_masks (AntDesk *self, const AntSpan **spans)
{
  const GPtrArray *masks = ant_analysis_get_treatment (self->analysis)->masks;
  g_array_set_size (self->mask_spans, 0);
  for (guint i = 0; i < masks->len; i++)
    g_array_append_val (self->mask_spans, ((const AntMask *) g_ptr_array_index (masks, i))->span);
  *spans = &g_array_index (self->mask_spans, AntSpan, 0);
  return masks->len;
}

void
ant_desk_mask (AntDesk *self, const AntSpan *span)
{
  ant_analysis_mask (self->analysis, *span, "");
  ant_desk_changed (self, ANT_DESK_MASKS);
}

void
ant_desk_set_mask_reason (AntDesk *self, guint i, const char *reason)
{
  guint64 before = ant_analysis_get_revision (self->analysis);
  ant_analysis_set_reason (self->analysis, i, reason);
  if (ant_analysis_get_revision (self->analysis) != before)
    ant_desk_changed (self, ANT_DESK_MASKS);
}

void
ant_desk_unmask (AntDesk *self, const AntSpan *span)
{
  if (ant_analysis_unmask (self->analysis, *span))
    ant_desk_changed (self, ANT_DESK_MASKS);
}

static gboolean
step (AntDesk *self, gboolean (*go) (AntAnalysis *analysis))
{
  AntSettings was = *ant_desk_get_settings (self);
  if (!go (self->analysis))
    return FALSE;
  ant_desk_judge_items (self);
  ant_desk_make_marks (self);
  settings_changed (self, &was, ANT_DESK_MASKS | ANT_DESK_JUDGEMENT);
  ant_desk_follow_reading (self);
  return TRUE;
}

gboolean
ant_desk_undo (AntDesk *self)
{
  return step (self, ant_analysis_undo);
}

gboolean
ant_desk_redo (AntDesk *self)
{
  return step (self, ant_analysis_redo);
}

/* Writing: a snapshot goes to a thread. */

typedef struct
{
  AntAnalysis *analysis;
  char *path; /* the text is for */
} Snapshot;

static void
snapshot_free (gpointer data)
{
  Snapshot *snapshot = data;
  ant_analysis_free (snapshot->analysis);
  g_free (snapshot->path);
  g_free (snapshot);
}

static GBytes *
make_text (gconstpointer data, GError **error)
{
  const Snapshot *snapshot = data;
  char *text = ant_analysis_to_text (snapshot->analysis, snapshot->path);
  return g_bytes_new_take (text, strlen (text));
}

static void
write_snapshot (AntDesk *self, const char *path, GAsyncReadyCallback callback, gpointer data)
{
  Snapshot *snapshot = g_new0 (Snapshot, 1);
  *snapshot = (Snapshot) { ant_analysis_snapshot (self->analysis), g_strdup (path) };
  ant_save_task_async (path, make_text, snapshot, snapshot_free, callback, data);
}

/* Saving */

typedef struct
{
  AntDesk *desk;
  char *path;
  const AntAnalysis *analysis; /* compared only: another may be on the desk by then */
  guint64 revision;
} Saving;

static void
saved_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autofree Saving *saving = data;
  g_autoptr (AntDesk) self = saving->desk;
  g_autofree char *path = saving->path;
  g_autoptr (GError) error = NULL;
  gboolean good = ant_save_task_finish (result, &error);
  self->saving = FALSE;
  if (good && saving->analysis == self->analysis)
    {
      ant_desk_forget_unsaved (self);
      ant_analysis_set_path (self->analysis, path);
      if (ant_analysis_get_revision (self->analysis) == saving->revision)
        ant_analysis_set_saved (self->analysis);
      else
        ant_desk_keep_soon (self);
    }
  ant_desk_tell (self, ANT_DESK_KEPT);
  if (!good)
    ant_desk_fail (self, error->message);
}

void
ant_desk_save (AntDesk *self, const char *path)
{
  if (!path)
    path = ant_analysis_get_path (self->analysis);
  if (!path || self->saving)
    return;
  Saving *saving = g_new0 (Saving, 1);
  *saving = (Saving) { g_object_ref (self), g_canonicalize_filename (path, NULL), self->analysis,
                       ant_analysis_get_revision (self->analysis) };
  self->saving = TRUE;
  write_snapshot (self, saving->path, saved_cb, saving);
  ant_desk_tell (self, ANT_DESK_KEPT);
}

gboolean
ant_desk_is_saving (AntDesk *self)
{
  return self->saving;
}

/* Unsaved work */

static char *
unsaved_path (AntDesk *self)
{
  return ant_unsaved_path (ant_analysis_get_path (self->analysis), self->number);
}

static void
kept_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  self->keeping = FALSE;
  if (ant_save_task_finish (result, &error))
    self->keep_failed = FALSE;
  else if (!self->keep_failed)
    {
      self->keep_failed = TRUE; /* said once; the work is still in memory */
      ant_desk_fail (self, error->message);
    }
  if (!ant_analysis_is_changed (self->analysis))
    ant_desk_forget_unsaved (self); /* saved meanwhile */
  else
    ant_desk_keep_soon (self);
}

static gboolean
keep_cb (gpointer data)
{
  AntDesk *self = data;
  self->keep_timer = 0;
  if (self->keeping || self->saving || !ant_analysis_would_lose (self->analysis))
    return G_SOURCE_REMOVE;
  g_autofree char *path = unsaved_path (self);
  if (!ant_unsaved_make_folder (path))
    return G_SOURCE_REMOVE;
  self->keeping = TRUE;
  self->kept_revision = ant_analysis_get_revision (self->analysis);
  write_snapshot (self, path, kept_cb, g_object_ref (self));
  return G_SOURCE_REMOVE;
}

void
ant_desk_keep_soon (AntDesk *self)
{
  if (!self->keep_timer && ant_analysis_get_revision (self->analysis) != self->kept_revision)
    self->keep_timer = g_timeout_add_seconds (KEEP_AFTER_S, keep_cb, self);
}

void
ant_desk_forget_unsaved (AntDesk *self)
{
  g_autofree char *path = unsaved_path (self);
  g_clear_handle_id (&self->keep_timer, g_source_remove);
  self->kept_revision = ant_analysis_get_revision (self->analysis);
  ant_unsaved_remove (path);
}

/* What an earlier run left is put out of the way of what this one will keep, until the user has decided. */
void
ant_desk_begin_keeping (AntDesk *self)
{
  const char *path = ant_analysis_get_path (self->analysis);
  self->kept_revision = ant_analysis_get_revision (self->analysis);
  if (ant_analysis_is_changed (self->analysis))
    self->kept_revision--; /* recovered: it is kept from the first */
  if (!path || ant_analysis_is_changed (self->analysis))
    return;
  g_autofree char *unsaved = ant_unsaved_path (path, 0), *earlier = g_strconcat (unsaved, "-earlier", NULL);
  g_rename (unsaved, earlier);
  g_clear_pointer (&self->left_behind, g_free);
  g_clear_pointer (&self->left_behind_of, g_free);
  if (!g_file_test (earlier, G_FILE_TEST_IS_REGULAR))
    return;
  self->left_behind = g_steal_pointer (&earlier);
  self->left_behind_of = g_strdup (path);
}

void
ant_desk_stop_keeping (AntDesk *self)
{
  g_clear_handle_id (&self->keep_timer, g_source_remove);
}

/* What an earlier run left */

const char *
ant_desk_get_left_behind (AntDesk *self)
{
  return self->left_behind;
}

void
ant_desk_offer_left_behind (AntDesk *self, const char *path)
{
  g_free (self->left_behind);
  self->left_behind = g_strdup (path);
  g_clear_pointer (&self->left_behind_of, g_free);
  ant_desk_tell (self, ANT_DESK_KEPT);
}

void
ant_desk_take_left_behind (AntDesk *self, gboolean wanted)
{
  g_autofree char *path = g_steal_pointer (&self->left_behind);
  if (!path)
    return;
  if (wanted)
    {
      ant_desk_open_analysis (self, path);
      g_free (self->recovering);
      self->recovering = g_steal_pointer (&path);
      return;
    }
  ant_unsaved_remove (path);
  ant_desk_tell (self, ANT_DESK_KEPT);
}

/* It becomes this desk's own unsaved work. */
void
ant_desk_place_recovered (AntDesk *self)
{
  g_autofree char *path = g_steal_pointer (&self->recovering);
  if (!path)
    return;
  g_autofree char *own = ant_unsaved_path (self->left_behind_of, self->number);
  g_rename (path, own);
  ant_analysis_set_path (self->incoming, self->left_behind_of);
  ant_analysis_set_unsaved (self->incoming);
  g_clear_pointer (&self->left_behind_of, g_free);
}
