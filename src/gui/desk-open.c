/* desk-open.c - how an analysis and its record come onto the desk: a record for a new analysis, an analysis file and then
 * its record, the record again, or from another place. */
#include "gui/desk-private.h"

#include <glib/gi18n.h>

#include "data/analysis-text.h"
#include "gui/reading-memory.h"
#include "jobs/open-task.h"
#include "readers/file-look.h"

static void
clear_layers (AntDesk *self)
{
  g_clear_pointer (&self->layers, ant_layers_unref);
  g_clear_pointer (&self->read_with, ant_treatment_free);
}

static void
set_layers (AntDesk *self, AntLayers *layers)
{
  g_clear_pointer (&self->refused, g_free);
  clear_layers (self);
  self->layers = layers;
  self->read_with = g_steal_pointer (&self->opening_with);
}

void
ant_desk_adopt (AntDesk *self, AntAnalysis *analysis, AntLayers *layers)
{
  ant_desk_clear_items (self);
  ant_desk_stop_keeping (self);
  ant_analysis_free (self->analysis);
  self->analysis = analysis;
  clear_layers (self);
  if (layers)
    set_layers (self, layers);
  ant_desk_make_items (self);
  ant_desk_begin_views (self);
  ant_desk_begin_keeping (self);
  ant_desk_follow_sky (self);
}

static void
show_incoming (AntDesk *self, AntLayers *layers, const char *problem)
{
  g_autofree char *sentence = layers ? ant_analysis_take_record (self->incoming, layers->record) : NULL;
  ant_desk_adopt (self, g_steal_pointer (&self->incoming), layers);
  ant_desk_tell (self, ANT_DESK_EVERYTHING);
  if (problem || sentence)
    ant_desk_fail (self, problem ? problem : sentence);
}

/* The record of the analysis that is on the desk has been read again. */
static void
show_again (AntDesk *self, AntLayers *layers)
{
  g_autofree char *sentence = ant_analysis_take_record (self->analysis, layers->record);
  gboolean had_record = self->layers != NULL;
  set_layers (self, layers);
  ant_desk_make_items (self);
  if (!had_record)
    ant_desk_begin_views (self);
  ant_desk_follow_sky (self);
  ant_desk_changed (self, ANT_DESK_EVERYTHING);
  if (sentence)
    ant_desk_fail (self, sentence);
}

static void
opened_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  AntLayers *layers = ant_open_task_finish (result, &error);
  if (!ant_desk_end (self, result))
    {
      ant_layers_unref (layers);
      return;
    }
  /* An analysis is worth having without its record; a new one is not. */
  if (self->incoming && (layers || ant_analysis_get_record_path (self->incoming)))
    show_incoming (self, layers, layers ? NULL : error->message);
  else if (layers)
    show_again (self, layers);
  else
    {
      g_clear_pointer (&self->incoming, ant_analysis_free);
      ant_desk_tell (self, ANT_DESK_BUSY);
      ant_desk_fail (self, error->message);
    }
}

static void
read_record (AntDesk *self, const char *path, const AntTreatment *treatment, AntScanResults *results, const char *sha256,
             GAsyncReadyCallback callback)
{
  g_autofree char *kept = g_strdup (path); /* it may be the present record's own */
  g_autoptr (AntTreatment) with = ant_treatment_copy (treatment);
  AntAnalysis *incoming = g_steal_pointer (&self->incoming);
  GCancellable *stop = ant_desk_begin (self, ANT_BUSY_OPENING);
  self->incoming = incoming;
  self->opening = g_steal_pointer (&kept);
  g_clear_pointer (&self->opening_with, ant_treatment_free);
  self->opening_with = g_steal_pointer (&with);
  ant_open_task_async (self->opening, self->opening_with, results, sha256, stop, callback, g_object_ref (self));
  ant_desk_tell (self, ANT_DESK_BUSY);
}

/* As its results were found, so that they fit; as it is treated now, if there are none. */
static void
read_record_of (AntDesk *self, const AntAnalysis *analysis, const char *path)
{
  AntScanResults *results = ant_analysis_get_found (analysis);
  read_record (self, path, results ? ant_analysis_get_scanned_with (analysis) : ant_analysis_get_treatment (analysis), results,
               ant_analysis_get_record_sha256 (analysis), opened_cb);
}

static void
loaded_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  g_autofree char *newer = NULL;
  g_autoptr (AntAnalysis) analysis = ant_load_task_finish (result, &newer, &error);
  if (!ant_desk_end (self, result))
    return;
  if (analysis && ant_analysis_get_record_path (analysis))
    {
      self->incoming = g_steal_pointer (&analysis);
      ant_desk_place_recovered (self);
      read_record_of (self, self->incoming, ant_analysis_get_record_path (self->incoming));
    }
  else
    ant_desk_tell (self, ANT_DESK_BUSY);
  if (analysis)
    ant_desk_fail (self, _("The analysis names no record"));
  else if (error)
    ant_desk_fail (self, error->message);
  else if (newer)
    ant_desk_fail (self, newer);
}

void
ant_desk_open_analysis (AntDesk *self, const char *path)
{
  g_autofree char *whole = g_canonicalize_filename (path, NULL);
  GCancellable *stop = ant_desk_begin (self, ANT_BUSY_OPENING);
  self->opening = g_steal_pointer (&whole);
  ant_load_task_async (self->opening, stop, loaded_cb, g_object_ref (self));
  ant_desk_tell (self, ANT_DESK_BUSY);
}

static void
open_fresh (AntDesk *self, const char *path, const AntReadingChoices *reading)
{
  AntAnalysis *fresh = ant_analysis_new ();
  g_autofree char *asked = g_strdup (path);
  ant_analysis_begin_with (fresh, ant_desk_get_settings (self));
  ant_analysis_begin_reading (fresh, reading);
  g_clear_pointer (&self->incoming, ant_analysis_free);
  self->incoming = fresh;
  g_free (self->refused);
  self->refused = g_steal_pointer (&asked);
  read_record_of (self, fresh, self->refused);
}

void
ant_desk_open (AntDesk *self, const char *path)
{
  g_clear_pointer (&self->recovering, g_free);
  if (ant_analysis_is_name (path))
    {
      ant_desk_open_analysis (self, path);
      return;
    }
  g_autoptr (AntFileLook) look = g_file_test (path, G_FILE_TEST_IS_REGULAR) ? ant_file_look_new (path, NULL) : NULL; /* a pipe is read once */
  AntReadingChoices reading = { 0 };
  if (look)
    ant_reading_memory_recall (look->kind, &reading);
  open_fresh (self, path, &reading);
  ant_reading_choices_clear (&reading);
}

/* What was found was found otherwise. */
static void
read_anew (AntDesk *self)
{
  g_clear_pointer (&self->incoming, ant_analysis_free);
  ant_analysis_drop_results (self->analysis);
  read_record (self, ant_analysis_get_record_path (self->analysis), ant_analysis_get_treatment (self->analysis), NULL, NULL, opened_cb);
}

void
ant_desk_follow_reading (AntDesk *self)
{
  const AntReadingChoices *wanted = &ant_analysis_get_treatment (self->analysis)->reading;
  if (self->layers && !ant_reading_choices_same (&self->read_with->reading, wanted))
    read_anew (self);
}

/* Its masks and verdicts stay. */
static void
read_present_as (AntDesk *self, const AntReadingChoices *reading)
{
  AntTreatment *treatment = ant_treatment_copy (ant_analysis_get_treatment (self->analysis));
  ant_reading_choices_clear (&treatment->reading);
  ant_reading_choices_copy (reading, &treatment->reading);
  ant_analysis_treat (self->analysis, _("how the record is read"), treatment);
  read_anew (self);
}

void
ant_desk_open_as (AntDesk *self, const char *path, const AntReadingChoices *reading)
{
  g_clear_pointer (&self->recovering, g_free);
  if (ant_desk_get_record (self) && g_strcmp0 (path, ant_analysis_get_record_path (self->analysis)) == 0)
    read_present_as (self, reading);
  else
    open_fresh (self, path, reading);
}

const char *
ant_desk_get_refused (AntDesk *self)
{
  return self->busy == ANT_BUSY_NO ? self->refused : NULL;
}

void
ant_desk_reload (AntDesk *self)
{
  const char *path = ant_analysis_get_record_path (self->analysis);
  g_clear_pointer (&self->incoming, ant_analysis_free);
  if (path)
    read_record_of (self, self->analysis, path);
}

void
ant_desk_locate (AntDesk *self, const char *path)
{
  g_clear_pointer (&self->incoming, ant_analysis_free);
  read_record_of (self, self->analysis, path);
}

static void
read_for_scan_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  g_autoptr (AntLayers) layers = ant_open_task_finish (result, &error);
  if (!ant_desk_end (self, result))
    return;
  if (layers)
    {
      ant_desk_start_scan (self, layers);
      return;
    }
  ant_desk_tell (self, ANT_DESK_BUSY);
  ant_desk_fail (self, error->message);
}

void
ant_desk_read_for_scan (AntDesk *self)
{
  g_clear_pointer (&self->incoming, ant_analysis_free);
  read_record (self, ant_analysis_get_record_path (self->analysis), ant_analysis_get_treatment (self->analysis), NULL, NULL,
               read_for_scan_cb);
}
