/* analysis.c - the parts of an analysis, and the stacks of changes between their states. */
#include "data/analysis-private.h"

#include <glib/gi18n.h>
#include <math.h>
#include <stdlib.h>

#define ONE_MOVEMENT_US (2 * G_USEC_PER_SEC) /* changes of one thing within this are one change */

/* A value that many may hold and none may change. */
typedef struct _AntPart
{
  gpointer value;
  GDestroyNotify free;
} Part;

/* A step between two states: it holds the one that is not present. */
typedef struct
{
  char *name;
  char *about; /* what it changes: steps of one hand movement are about the same */
  Part *treatment, *judgements;
  guint64 state, serial;
  AntAnalysisEvent *event; /* owned while it is undone; else it is in the history */
} Change;

static Part *
part_new (gpointer value, GDestroyNotify free_value)
{
  Part *part = g_atomic_rc_box_new (Part);
  *part = (Part) { value, free_value };
  return part;
}

static void
part_clear (gpointer data)
{
  Part *part = data;
  part->free (part->value);
}

static void
part_unref (Part *part)
{
  g_atomic_rc_box_release_full (part, part_clear);
}

static Part *
treatment_part (AntTreatment *treatment)
{
  return part_new (treatment, (GDestroyNotify) ant_treatment_free);
}

static Part *
judgements_part (AntJudgements *judgements)
{
  return part_new (judgements, (GDestroyNotify) ant_judgements_free);
}

void
ant_analysis_event_free (gpointer data)
{
  AntAnalysisEvent *event = data;
  if (!event)
    return;
  g_free (event->time);
  g_free (event->who);
  g_free (event->what);
  g_free (event);
}

static void
change_free (gpointer data)
{
  Change *change = data;
  g_free (change->name);
  g_free (change->about);
  part_unref (change->treatment);
  part_unref (change->judgements);
  ant_analysis_event_free (change->event);
  g_free (change);
}

AntAnalysis *
ant_analysis_new (void)
{
  AntAnalysis *analysis = g_new0 (AntAnalysis, 1);
  analysis->origin_jd = NAN;
  analysis->treatment = treatment_part (ant_treatment_new ());
  analysis->judgements = judgements_part (ant_judgements_new ());
  analysis->done = g_ptr_array_new_with_free_func (change_free);
  analysis->undone = g_ptr_array_new_with_free_func (change_free);
  analysis->history = g_ptr_array_new_with_free_func (ant_analysis_event_free);
  return analysis;
}

void
ant_analysis_free (AntAnalysis *analysis)
{
  if (!analysis)
    return;
  g_ptr_array_unref (analysis->done);
  g_ptr_array_unref (analysis->undone);
  g_ptr_array_unref (analysis->history);
  part_unref (analysis->treatment);
  part_unref (analysis->judgements);
  ant_treatment_free (analysis->scanned_with);
  ant_scan_results_unref (analysis->results);
  g_clear_pointer (&analysis->read, json_object_unref);
  g_free (analysis->path);
  g_free (analysis->record_path);
  g_free (analysis->record_sha256);
  g_free (analysis);
}

AntAnalysis *
ant_analysis_snapshot (const AntAnalysis *analysis)
{
  AntAnalysis *copy = ant_analysis_new ();
  part_unref (copy->treatment);
  part_unref (copy->judgements);
  copy->treatment = g_atomic_rc_box_acquire (analysis->treatment);
  copy->judgements = g_atomic_rc_box_acquire (analysis->judgements);
  for (guint i = 0; i < analysis->history->len; i++)
    {
      const AntAnalysisEvent *event = g_ptr_array_index (analysis->history, i);
      AntAnalysisEvent *own = g_new0 (AntAnalysisEvent, 1);
      *own = (AntAnalysisEvent) { g_strdup (event->time), g_strdup (event->who), g_strdup (event->what), event->serial };
      g_ptr_array_add (copy->history, own);
    }
  ant_analysis_set_path (copy, analysis->path);
  ant_analysis_set_record (copy, analysis->record_path, analysis->record_sha256, analysis->origin_jd);
  copy->results = analysis->results ? ant_scan_results_ref (analysis->results) : NULL;
  copy->scanned_with = analysis->scanned_with ? ant_treatment_copy (analysis->scanned_with) : NULL;
  copy->read = analysis->read ? json_object_ref (analysis->read) : NULL;
  copy->results_read = analysis->results_read;
  return copy;
}

void
ant_analysis_fill (AntAnalysis *analysis, AntTreatment *treatment, AntJudgements *judgements, GPtrArray *history)
{
  part_unref (analysis->treatment);
  part_unref (analysis->judgements);
  g_ptr_array_unref (analysis->history);
  analysis->treatment = treatment_part (treatment);
  analysis->judgements = judgements_part (judgements);
  analysis->history = history;
}

const char *
ant_analysis_get_path (const AntAnalysis *analysis)
{
  return analysis->path;
}

void
ant_analysis_set_path (AntAnalysis *analysis, const char *path)
{
  char *copy = g_strdup (path);
  g_free (analysis->path);
  analysis->path = copy;
}

const char *
ant_analysis_get_record_path (const AntAnalysis *analysis)
{
  return analysis->record_path;
}

const char *
ant_analysis_get_record_sha256 (const AntAnalysis *analysis)
{
  return analysis->record_sha256;
}

double
ant_analysis_get_origin_jd (const AntAnalysis *analysis)
{
  return analysis->origin_jd;
}

const AntTreatment *
ant_analysis_get_treatment (const AntAnalysis *analysis)
{
  return analysis->treatment->value;
}

const AntJudgements *
ant_analysis_get_judgements (const AntAnalysis *analysis)
{
  return analysis->judgements->value;
}

const GPtrArray *
ant_analysis_get_history (const AntAnalysis *analysis)
{
  return analysis->history;
}

/* What happened, and when. With SOURCE_DATE_EPOCH in the environment the same work gives the same bytes. */
static AntAnalysisEvent *
event_new (AntAnalysis *analysis, const char *what)
{
  const char *epoch = g_getenv ("SOURCE_DATE_EPOCH");
  g_autoptr (GDateTime) now =
      epoch ? g_date_time_new_from_unix_utc (g_ascii_strtoll (epoch, NULL, 10)) : g_date_time_new_now_utc ();
  AntAnalysisEvent *event = g_new0 (AntAnalysisEvent, 1);
  *event = (AntAnalysisEvent) { now ? g_date_time_format (now, "%Y-%m-%dT%H:%M:%SZ") : g_strdup (""),
                                g_filename_display_name (g_get_user_name ()), g_strdup (what), ++analysis->serial };
  return event;
}

static int
by_serial (gconstpointer a, gconstpointer b)
{
  const AntAnalysisEvent *one = *(AntAnalysisEvent *const *) a, *other = *(AntAnalysisEvent *const *) b;
  return (one->serial > other->serial) - (one->serial < other->serial);
}

static void
tell (AntAnalysis *analysis, AntAnalysisEvent *event)
{
  g_ptr_array_add (analysis->history, event);
  g_ptr_array_sort (analysis->history, by_serial);
}

/* The event of a change, out of the history. */
static AntAnalysisEvent *
take_back (AntAnalysis *analysis, guint64 serial)
{
  for (guint i = analysis->history->len; i > 0; i--)
    {
      const AntAnalysisEvent *event = g_ptr_array_index (analysis->history, i - 1);
      if (event->serial == serial)
        return g_ptr_array_steal_index (analysis->history, i - 1);
    }
  return NULL;
}

/* Something that cannot be undone has happened. */
static void
note_other (AntAnalysis *analysis, const char *what)
{
  if (what)
    tell (analysis, event_new (analysis, what));
  analysis->others++;
  analysis->revision++;
}

/* Changes */

static gboolean
is_same_movement (const AntAnalysis *analysis, const char *about)
{
  const Change *last = analysis->done->len ? g_ptr_array_index (analysis->done, analysis->done->len - 1) : NULL;
  return last && about && g_strcmp0 (last->about, about) == 0 && analysis->undone->len == 0
         && last->serial == analysis->serial && analysis->state != analysis->saved_state
         && g_get_monotonic_time () - analysis->changed_us < ONE_MOVEMENT_US;
}

/* Put new parts (NULL: as it is) in the place of the present ones. */
static void
change (AntAnalysis *analysis, const char *name, const char *about, Part *treatment, Part *judgements)
{
  if (is_same_movement (analysis, about))
    {
      /* The step before leads to here instead; the state in between is forgotten. */
      g_clear_pointer (treatment ? &analysis->treatment : &analysis->judgements, part_unref);
      ant_analysis_event_free (take_back (analysis, analysis->serial));
      ((Change *) g_ptr_array_index (analysis->done, analysis->done->len - 1))->serial = analysis->serial + 1;
    }
  else
    {
      Change *step = g_new0 (Change, 1);
      *step = (Change) { g_strdup (name), g_strdup (about), analysis->treatment, analysis->judgements, analysis->state,
                         analysis->serial + 1, NULL };
      if (treatment)
        g_atomic_rc_box_acquire (analysis->judgements);
      else
        g_atomic_rc_box_acquire (analysis->treatment);
      g_ptr_array_add (analysis->done, step);
      if (analysis->done->len > ANT_MOST_UNDONE)
        g_ptr_array_remove_index (analysis->done, 0);
    }
  if (treatment)
    analysis->treatment = treatment;
  else
    analysis->judgements = judgements;
  g_ptr_array_set_size (analysis->undone, 0);
  tell (analysis, event_new (analysis, name));
  analysis->state = analysis->serial;
  analysis->changed_us = g_get_monotonic_time ();
  analysis->revision++;
}

void
ant_analysis_begin_with (AntAnalysis *analysis, const AntSettings *settings)
{
  AntTreatment *treatment = ant_treatment_new ();
  treatment->settings = *settings;
  part_unref (analysis->treatment);
  analysis->treatment = treatment_part (treatment);
}

void
ant_analysis_begin_reading (AntAnalysis *analysis, const AntReadingChoices *reading)
{
  AntTreatment *treatment = ant_treatment_copy (ant_analysis_get_treatment (analysis));
  ant_reading_choices_clear (&treatment->reading);
  ant_reading_choices_copy (reading, &treatment->reading);
  part_unref (analysis->treatment);
  analysis->treatment = treatment_part (treatment);
}

void
ant_analysis_treat (AntAnalysis *analysis, const char *name, AntTreatment *treatment)
{
  change (analysis, name, NULL, treatment_part (treatment), NULL);
}

gboolean
ant_analysis_set_setting (AntAnalysis *analysis, const AntSetting *setting, const char *text, GError **error)
{
  const AntTreatment *present = ant_analysis_get_treatment (analysis);
  g_autoptr (AntTreatment) treatment = ant_treatment_copy (present);
  if (!ant_setting_set_text (setting, &treatment->settings, text, error))
    return FALSE;
  if (ant_setting_get (setting, &treatment->settings) == ant_setting_get (setting, &present->settings))
    return TRUE;
  g_autofree char *name = g_strdup_printf (_("Set %s"), setting->key);
  change (analysis, name, setting->key, treatment_part (g_steal_pointer (&treatment)), NULL);
  return TRUE;
}

void
ant_analysis_reset_settings (AntAnalysis *analysis)
{
  const AntTreatment *present = ant_analysis_get_treatment (analysis);
  g_autoptr (AntTreatment) treatment = ant_treatment_copy (present);
  ant_settings_init (&treatment->settings);
  for (gsize i = 0; i < ant_n_settings; i++)
    if (ant_setting_get (&ant_setting_table[i], &treatment->settings)
        != ant_setting_get (&ant_setting_table[i], &present->settings))
      {
        ant_analysis_treat (analysis, _("Reset all settings"), g_steal_pointer (&treatment));
        return;
      }
}

void
ant_analysis_mask (AntAnalysis *analysis, AntSpan span, const char *reason)
{
  if (!(span.end_d >= span.start_d))
    return;
  AntTreatment *treatment = ant_treatment_copy (ant_analysis_get_treatment (analysis));
  ant_treatment_mask (treatment, span, ANT_MASK_HAND, reason);
  ant_analysis_treat (analysis, _("Mask a span"), treatment);
}

void
ant_analysis_set_reason (AntAnalysis *analysis, guint i, const char *reason)
{
  g_autoptr (AntTreatment) treatment = ant_treatment_copy (ant_analysis_get_treatment (analysis));
  AntMask *mask = i < treatment->masks->len ? g_ptr_array_index (treatment->masks, i) : NULL;
  if (!mask || g_str_equal (mask->reason, reason))
    return;
  g_free (mask->reason);
  mask->reason = g_strdup (reason);
  ant_analysis_treat (analysis, _("Reason of a mask"), g_steal_pointer (&treatment));
}

gboolean
ant_analysis_unmask (AntAnalysis *analysis, AntSpan span)
{
  AntTreatment *treatment = ant_treatment_copy (ant_analysis_get_treatment (analysis));
  gboolean found = ant_treatment_unmask (treatment, span);
  if (found)
    ant_analysis_treat (analysis, _("Unmask a span"), treatment);
  else
    ant_treatment_free (treatment);
  return found;
}

gboolean
ant_analysis_add_witness (AntAnalysis *analysis, const AntWitness *witness)
{
  const AntTreatment *present = ant_analysis_get_treatment (analysis);
  if (present->witnesses->len >= ANT_MOST_WITNESSES || ant_treatment_find_witness (present, witness) >= 0)
    return FALSE;
  AntTreatment *treatment = ant_treatment_copy (present);
  g_autofree char *file = ant_witness_name (witness), *name = g_strdup_printf (_("Witness %s"), file);
  g_ptr_array_add (treatment->witnesses, ant_witness_copy (witness));
  ant_analysis_treat (analysis, name, treatment);
  return TRUE;
}

void
ant_analysis_remove_witness (AntAnalysis *analysis, guint i)
{
  AntTreatment *treatment = ant_treatment_copy (ant_analysis_get_treatment (analysis));
  if (i >= treatment->witnesses->len)
    {
      ant_treatment_free (treatment);
      return;
    }
  g_autofree char *file = ant_witness_name (g_ptr_array_index (treatment->witnesses, i));
  g_autofree char *name = g_strdup_printf (_("Without witness %s"), file);
  g_ptr_array_remove_index (treatment->witnesses, i);
  ant_analysis_treat (analysis, name, treatment);
}

gboolean
ant_analysis_update_witness (AntAnalysis *analysis, const AntWitness *witness)
{
  const AntTreatment *present = ant_analysis_get_treatment (analysis);
  int at = ant_treatment_find_witness (present, witness);
  if (at < 0 || ant_witness_same (g_ptr_array_index (present->witnesses, (guint) at), witness))
    return FALSE;
  AntTreatment *treatment = ant_treatment_copy (present);
  AntWitness *own = g_ptr_array_index (treatment->witnesses, (guint) at);
  g_autofree char *file = ant_witness_name (witness), *name = g_strdup_printf (_("Other bytes of witness %s"), file);
  g_free (own->sha256);
  own->sha256 = g_strdup (witness->sha256);
  ant_analysis_treat (analysis, name, treatment);
  return TRUE;
}

void
ant_analysis_judge (AntAnalysis *analysis, const char *dip, double mid_d, double duration_d, AntDipClass class)
{
  if (ant_judgements_class (ant_analysis_get_judgements (analysis), mid_d, duration_d) == class)
    return;
  AntJudgements *judgements = ant_judgements_copy (ant_analysis_get_judgements (analysis));
  ant_judgements_set_class (judgements, mid_d, duration_d, class);
  g_autofree char *name = g_strdup_printf (_("Verdict of %s"), dip);
  change (analysis, name, NULL, NULL, judgements_part (judgements));
}

void
ant_analysis_note (AntAnalysis *analysis, const char *dip, double mid_d, double duration_d, const char *note)
{
  if (g_str_equal (ant_judgements_note (ant_analysis_get_judgements (analysis), mid_d, duration_d), note))
    return;
  AntJudgements *judgements = ant_judgements_copy (ant_analysis_get_judgements (analysis));
  ant_judgements_set_note (judgements, mid_d, duration_d, note);
  g_autofree char *name = g_strdup_printf (_("Note on %s"), dip);
  change (analysis, name, name, NULL, judgements_part (judgements));
}

/* Undo and redo */

static const char *
name_of_last (const GPtrArray *stack)
{
  return stack->len ? ((const Change *) g_ptr_array_index (stack, stack->len - 1))->name : NULL;
}

const char *
ant_analysis_undo_name (const AntAnalysis *analysis)
{
  return name_of_last (analysis->done);
}

const char *
ant_analysis_redo_name (const AntAnalysis *analysis)
{
  return name_of_last (analysis->undone);
}

/* The present and the other side of the latest step of `from` change places; the step moves to `to`. */
static Change *
step_over (AntAnalysis *analysis, GPtrArray *from, GPtrArray *to)
{
  Change *step = g_ptr_array_steal_index (from, from->len - 1);
  Part *treatment = analysis->treatment, *judgements = analysis->judgements;
  guint64 state = analysis->state;
  analysis->treatment = step->treatment;
  analysis->judgements = step->judgements;
  analysis->state = step->state;
  step->treatment = treatment;
  step->judgements = judgements;
  step->state = state;
  g_ptr_array_add (to, step);
  analysis->revision++;
  return step;
}

gboolean
ant_analysis_undo (AntAnalysis *analysis)
{
  if (analysis->done->len == 0)
    return FALSE;
  Change *step = step_over (analysis, analysis->done, analysis->undone);
  step->event = take_back (analysis, step->serial);
  return TRUE;
}

gboolean
ant_analysis_redo (AntAnalysis *analysis)
{
  if (analysis->undone->len == 0)
    return FALSE;
  Change *step = step_over (analysis, analysis->undone, analysis->done);
  tell (analysis, g_steal_pointer (&step->event));
  return TRUE;
}

/* What was saved */

gboolean
ant_analysis_is_changed (const AntAnalysis *analysis)
{
  return analysis->state != analysis->saved_state || analysis->others != analysis->saved_others;
}

void
ant_analysis_set_saved (AntAnalysis *analysis)
{
  analysis->saved_state = analysis->state;
  analysis->saved_others = analysis->others;
}

void
ant_analysis_set_unsaved (AntAnalysis *analysis)
{
  analysis->recovered = TRUE;
  note_other (analysis, NULL);
}

gboolean
ant_analysis_would_lose (const AntAnalysis *analysis)
{
  if (analysis->path || analysis->recovered)
    return ant_analysis_is_changed (analysis);
  return analysis->state != analysis->saved_state
         && (ant_judgements_count (ant_analysis_get_judgements (analysis)) > 0
             || ant_analysis_get_treatment (analysis)->masks->len > 0);
}

guint64
ant_analysis_get_revision (const AntAnalysis *analysis)
{
  return analysis->revision;
}

/* The record and what was found in it */

AntScanResults *
ant_analysis_get_results (const AntAnalysis *analysis)
{
  return analysis->results && analysis->results->record ? analysis->results : NULL;
}

AntScanResults *
ant_analysis_get_found (const AntAnalysis *analysis)
{
  return analysis->results;
}

const AntTreatment *
ant_analysis_get_scanned_with (const AntAnalysis *analysis)
{
  return analysis->scanned_with;
}

gboolean
ant_analysis_is_stale (const AntAnalysis *analysis)
{
  return analysis->results && !ant_treatment_same (ant_analysis_get_treatment (analysis), analysis->scanned_with);
}

static void
forget_results (AntAnalysis *analysis)
{
  g_clear_pointer (&analysis->results, ant_scan_results_unref);
  g_clear_pointer (&analysis->scanned_with, ant_treatment_free);
}

void
ant_analysis_set_results (AntAnalysis *analysis, AntScanResults *results, const AntTreatment *scanned_with)
{
  AntScanResults *held = ant_scan_results_ref (results);
  AntTreatment *treatment = ant_treatment_copy (scanned_with);
  forget_results (analysis);
  analysis->results = held;
  analysis->scanned_with = treatment;
  g_autofree char *what =
      g_strdup_printf (_("Scan; dips found: %zu"), results->n_dips);
  note_other (analysis, what);
}

void
ant_analysis_drop_results (AntAnalysis *analysis)
{
  if (!analysis->results)
    return;
  forget_results (analysis);
  note_other (analysis, NULL);
}

void
ant_analysis_set_record (AntAnalysis *analysis, const char *path, const char *sha256, double origin_jd)
{
  char *own_path = g_strdup (path), *own_sha256 = g_strdup (sha256);
  g_free (analysis->record_path);
  g_free (analysis->record_sha256);
  analysis->record_path = own_path;
  analysis->record_sha256 = own_sha256;
  analysis->origin_jd = origin_jd;
}

/* The bytes are others: what was found in the old ones is void, and times are counted from another origin perhaps. */
static void
follow_record (AntAnalysis *analysis, double origin_jd)
{
  double shift_d = analysis->origin_jd - origin_jd;
  if (isfinite (shift_d) && shift_d != 0)
    {
      AntTreatment *treatment = ant_treatment_copy (ant_analysis_get_treatment (analysis));
      AntJudgements *judgements = ant_judgements_copy (ant_analysis_get_judgements (analysis));
      ant_treatment_shift (treatment, shift_d);
      ant_judgements_shift (judgements, shift_d);
      part_unref (analysis->treatment);
      part_unref (analysis->judgements);
      analysis->treatment = treatment_part (treatment);
      analysis->judgements = judgements_part (judgements);
      g_ptr_array_set_size (analysis->done, 0); /* they lead to times of the old origin */
      g_ptr_array_set_size (analysis->undone, 0);
    }
  forget_results (analysis);
}

char *
ant_analysis_take_record (AntAnalysis *analysis, AntRecord *record)
{
  double origin_jd = ant_time_reference_jd (&record->time, 0);
  g_autofree char *name = ant_record_name (record);
  g_autofree char *path = g_str_equal (record->path, "-") ? g_strdup ("-") : g_canonicalize_filename (record->path, NULL);
  gboolean fresh = !analysis->record_path;
  gboolean same = !fresh && g_strcmp0 (analysis->record_sha256, record->sha256) == 0;
  gboolean moved = !fresh && g_strcmp0 (analysis->record_path, path) != 0;
  char *sentence = NULL;
  if (!fresh && !same)
    {
      sentence = g_strdup_printf (_("%s: the bytes are not those that the analysis was made of. Verdicts, notes and masks are kept by their times; scan again"), name);
      follow_record (analysis, origin_jd);
    }
  else if (analysis->results && !analysis->results->record && !ant_scan_results_join (analysis->results, record))
    {
      sentence = g_strdup_printf (_("%s: what the analysis tells does not fit the record and is left out; scan again"), name);
      forget_results (analysis);
    }
  ant_analysis_set_record (analysis, path, record->sha256, origin_jd);
  g_autofree char *what = sentence || moved ? g_strdup_printf (_("Record is now %s"), name) : NULL;
  if (what)
    note_other (analysis, what);
  return sentence;
}

static gboolean
is_found (const AntScanResults *results, const AntJudgement *given)
{
  for (gsize i = 0; i < results->n_dips + results->n_brightenings; i++)
    {
      const AntDip *dip = i < results->n_dips ? &results->dip[i] : &results->brightening[i - results->n_dips];
      if (ant_judgement_is_of (given, dip->mid_d, dip->duration_d))
        return TRUE;
    }
  return FALSE;
}

void
ant_analysis_count_carried (const AntAnalysis *analysis, gsize *n_given, gsize *n_lost)
{
  const AntJudgements *judgements = ant_analysis_get_judgements (analysis);
  *n_given = ant_judgements_count (judgements);
  *n_lost = 0;
  for (gsize i = 0; analysis->results && i < *n_given; i++)
    {
      AntJudgement given = ant_judgements_get (judgements, i);
      *n_lost += !is_found (analysis->results, &given);
    }
}

char *
ant_analysis_carried_words (const AntAnalysis *analysis)
{
  gsize n_given, n_lost;
  ant_analysis_count_carried (analysis, &n_given, &n_lost);
  if (n_given == 0)
    return NULL;
  g_autofree char *carried = g_strdup_printf (_("Verdicts and notes carried over: %zu"), n_given - n_lost);
  return n_lost ? g_strdup_printf (_("%s; kept of dips that are no longer found: %zu"), carried, n_lost)
                : g_steal_pointer (&carried);
}
