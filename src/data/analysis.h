/* analysis.h - the work on one record that is worth keeping: how it is treated, what was found, what the analyst says of
 * it, and who changed what and when. Undo and redo go through every change of treatment and judgements.
 *
 * Treatment and judgements are two parts that are never changed in place: a change makes a new part, and the one before
 * it goes onto the stack of what can be undone, under the name of the change. So undoing is exact whatever the change
 * was, and a new kind of change needs no undoing of its own. What the scan found is not undone: it is told from the
 * treatment that gave it whether it still holds (ant_analysis_is_stale).
 *
 * No window, no file, no thread: whoever holds it calls it; it may go from one thread to another. */
#pragma once

#include <glib.h>
#include "data/judgement.h"
#include "data/scan-results.h"
#include "data/treatment.h"

#define ANT_MOST_UNDONE 2500 /* changes that can be undone; those before them stay in the history */

typedef struct _AntAnalysis AntAnalysis;
AntAnalysis *ant_analysis_new (void);
void ant_analysis_free (AntAnalysis *analysis); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntAnalysis, ant_analysis_free)

/* As it is now, for another thread to write: shares what is never changed, cannot be undone. */
AntAnalysis *ant_analysis_snapshot (const AntAnalysis *analysis);

/* Where it is kept (absolute); NULL: nowhere yet. */
const char *ant_analysis_get_path (const AntAnalysis *analysis);
void ant_analysis_set_path (AntAnalysis *analysis, const char *path);

/* The record it is about, as files name it: path (absolute, or "-"), SHA-256 of its bytes, JD of its time 0 (NaN: not
 * known). NULL paths: no record yet. */
const char *ant_analysis_get_record_path (const AntAnalysis *analysis);
const char *ant_analysis_get_record_sha256 (const AntAnalysis *analysis);
double ant_analysis_get_origin_jd (const AntAnalysis *analysis);
void ant_analysis_set_record (AntAnalysis *analysis, const char *path, const char *sha256, double origin_jd);
/* A record has been read for it: what was found in these very bytes is joined to it, and NULL returned. If the bytes
 * differ from those the analysis is about, what was found is dropped, times follow the record's origin, and the sentence
 * that says so is returned (caller frees). */
char *ant_analysis_take_record (AntAnalysis *analysis, AntRecord *record);

/* Its parts; borrowed until the next change. */
const AntTreatment *ant_analysis_get_treatment (const AntAnalysis *analysis);
const AntJudgements *ant_analysis_get_judgements (const AntAnalysis *analysis);

/* What was found, NULL if nothing or if its record is not at hand; the same without regard to the record; and the
 * treatment that gave it. */
AntScanResults *ant_analysis_get_results (const AntAnalysis *analysis);
AntScanResults *ant_analysis_get_found (const AntAnalysis *analysis);
const AntTreatment *ant_analysis_get_scanned_with (const AntAnalysis *analysis);
/* A scan of the record with the present treatment has ended; takes a reference. */
void ant_analysis_set_results (AntAnalysis *analysis, AntScanResults *results, const AntTreatment *scanned_with);
void ant_analysis_drop_results (AntAnalysis *analysis);
gboolean ant_analysis_is_stale (const AntAnalysis *analysis); /* the treatment has changed since */
/* Verdicts and notes that the analyst gave, and those of them whose dip is not among the results. */
void ant_analysis_count_carried (const AntAnalysis *analysis, gsize *n_given, gsize *n_lost);
/* The same as a sentence; NULL if nothing was given. Caller frees. */
char *ant_analysis_carried_words (const AntAnalysis *analysis);

/* Of a new one: settings to begin with, which is no change. */
void ant_analysis_begin_with (AntAnalysis *analysis, const AntSettings *settings);
/* The same of how its record is read. */
void ant_analysis_begin_reading (AntAnalysis *analysis, const AntReadingChoices *reading);

/* Changes: each can be undone, and is in the history under its name. What changes nothing is not a change. `dip` names
 * the dip for people, "dip 3". */
gboolean ant_analysis_set_setting (AntAnalysis *analysis, const AntSetting *setting, const char *text, GError **error);
void ant_analysis_reset_settings (AntAnalysis *analysis);
/* Takes the treatment over: any change under a name of the caller's. */
void ant_analysis_treat (AntAnalysis *analysis, const char *name, AntTreatment *treatment);
void ant_analysis_judge (AntAnalysis *analysis, const char *dip, double mid_d, double duration_d, AntDipClass class);
void ant_analysis_note (AntAnalysis *analysis, const char *dip, double mid_d, double duration_d, const char *note);
void ant_analysis_mask (AntAnalysis *analysis, AntSpan span, const char *reason);
/* Why the i-th span is left out. */
void ant_analysis_set_reason (AntAnalysis *analysis, guint i, const char *reason);
gboolean ant_analysis_unmask (AntAnalysis *analysis, AntSpan span); /* FALSE: nothing was masked there */
/* Witnesses: one more (a copy; FALSE if it is among them already or there are ANT_MOST_WITNESSES), or the i-th no more. */
gboolean ant_analysis_add_witness (AntAnalysis *analysis, const AntWitness *witness);
void ant_analysis_remove_witness (AntAnalysis *analysis, guint i);
/* Its file has been read: it has the sum of these bytes now. FALSE if that is known already, or it is none of the witnesses. */
gboolean ant_analysis_update_witness (AntAnalysis *analysis, const AntWitness *witness);

/* Undo and redo. Names are those of the changes, NULL if there is none. */
const char *ant_analysis_undo_name (const AntAnalysis *analysis);
const char *ant_analysis_redo_name (const AntAnalysis *analysis);
gboolean ant_analysis_undo (AntAnalysis *analysis);
gboolean ant_analysis_redo (AntAnalysis *analysis);

/* Who changed what, and when: the changes that stand and the scans, in order. */
typedef struct
{
  char *time; /* UTC, ISO 8601 */
  char *who;  /* the user's name on that machine */
  char *what;
  guint64 serial; /* of this run of the program; 0: read from a file */
} AntAnalysisEvent;
const GPtrArray *ant_analysis_get_history (const AntAnalysis *analysis);

/* Whether it differs from what was last saved or read. */
gboolean ant_analysis_is_changed (const AntAnalysis *analysis);
void ant_analysis_set_saved (AntAnalysis *analysis);
/* As recovered work is: changed until it is saved. */
void ant_analysis_set_unsaved (AntAnalysis *analysis);
/* Whether closing it now would lose what nobody can compute again: any unsaved change of an analysis with a file; of one
 * without a file yet a verdict, a note, a mask, or what was recovered. */
gboolean ant_analysis_would_lose (const AntAnalysis *analysis);
/* Grows with everything that a file would tell; for autosave. */
guint64 ant_analysis_get_revision (const AntAnalysis *analysis);
