/* desk.h - what one window works on: an analysis and its record, what is selected and seen. Every widget of the
 * window looks at it and is told by one signal when it changes:
 *
 *   "changed" (AntDeskChange what)   several bits at once where several things changed
 *   "failed" (const char *sentence)  something asked for could not be done
 *
 * Long work runs in jobs/; the desk only starts and stops it. For the main loop alone. */
#pragma once

#include "data/analysis.h"
#include "data/dip-words.h"
#include "gui/dip-item.h"
#include "jobs/column-strip.h"
#include "jobs/fold-data.h"
#include "jobs/layers.h"
#include "jobs/observer-task.h"
#include "jobs/scan-task.h"
#include "jobs/sky-list.h"
#include "jobs/snr-task.h"
#include "jobs/witness-task.h"
#include "plot/view.h"

typedef enum
{
  ANT_DESK_RECORD = 1 << 0,    /* another record, or none */
  ANT_DESK_RESULTS = 1 << 1,   /* the items */
  ANT_DESK_SELECTION = 1 << 2,
  ANT_DESK_VIEW = 1 << 3,      /* time range in view */
  ANT_DESK_SETTINGS = 1 << 4,
  ANT_DESK_JUDGEMENT = 1 << 5,
  ANT_DESK_BUSY = 1 << 6,      /* work began, went on or ended */
  ANT_DESK_POINTER = 1 << 7,   /* time under the pointer, or span being drawn */
  ANT_DESK_LOOK = 1 << 8,      /* units, averages, which kinds are shown */
  ANT_DESK_SNR = 1 << 9,       /* the dip SNR against time: shown or not, of which duration, computed */
  ANT_DESK_MASKS = 1 << 10,    /* spans that are left out */
  ANT_DESK_KEPT = 1 << 11,     /* the analysis: whether it is saved, where, what can be undone */
  ANT_DESK_FOLD = 1 << 12,     /* the period that is folded */
  ANT_DESK_WITNESS = 1 << 13,  /* the witnesses: more, fewer, read, or another look at them */
  ANT_DESK_COLUMNS = 1 << 15,  /* which further columns are shown, and their strips */
  ANT_DESK_SKY = 1 << 14,      /* who watched, what crossed the Sun, which of it is selected */
} AntDeskChange;
#define ANT_DESK_EVERYTHING ((AntDeskChange) 0xffff)

typedef enum
{
  ANT_BUSY_NO,
  ANT_BUSY_OPENING,
  ANT_BUSY_SCANNING,
  ANT_BUSY_ASKING,
  ANT_BUSY_STOPPING, /* the scan was asked to end and gathers what it has found */
} AntBusy;

#define ANT_TYPE_DESK (ant_desk_get_type ())
G_DECLARE_FINAL_TYPE (AntDesk, ant_desk, ANT, DESK, GObject)

AntDesk *ant_desk_new (void);

/* Work. Each abandons what was running before. Results of an earlier scan stay until a new one is complete, or was stopped
 * no earlier than it. */
void ant_desk_open (AntDesk *self, const char *path); /* a record, for a new analysis; or an analysis file */
/* A record with these choices about reading: for a new analysis, or, if it is the present one's, as a change of that. */
void ant_desk_open_as (AntDesk *self, const char *path, const AntReadingChoices *reading);
const char *ant_desk_get_refused (AntDesk *self); /* the record asked for last, if it could not be read; else NULL */
void ant_desk_reload (AntDesk *self); /* the record again */
void ant_desk_locate (AntDesk *self, const char *path); /* the record of the analysis is there now */
void ant_desk_scan (AntDesk *self); /* reads the record again first if the settings of its grid have changed */
void ant_desk_ask (AntDesk *self, double from_d, double to_d); /* measure the dip that fills this span */
void ant_desk_stop (AntDesk *self);    /* what a scan has found so far is kept */
void ant_desk_abandon (AntDesk *self); /* it is not */
AntBusy ant_desk_get_busy (AntDesk *self);
const char *ant_desk_get_opening (AntDesk *self);         /* path being read, or NULL */
const AntTaskProgress *ant_desk_get_progress (AntDesk *self); /* of the scan */

/* The record and what was found; NULL while there is none. Borrowed. */
const AntLayers *ant_desk_get_layers (AntDesk *self);
const AntRecord *ant_desk_get_record (AntDesk *self);
const AntScanResults *ant_desk_get_results (AntDesk *self);
gboolean ant_desk_is_stale (AntDesk *self); /* the settings differ from those of the results */
GListModel *ant_desk_get_items (AntDesk *self); /* of AntDipItem */

/* The analysis; change it only by the functions below. Borrowed until another is opened. */
const AntAnalysis *ant_desk_get_analysis (AntDesk *self);
/* "larkspur.antumbra", or the record's name as long as there is no file; NULL if there is neither. Caller frees. */
char *ant_desk_get_name (AntDesk *self);
gboolean ant_desk_lacks_record (AntDesk *self); /* the analysis is about a record that was not found */
gboolean ant_desk_undo (AntDesk *self);
gboolean ant_desk_redo (AntDesk *self);
/* Hand masks take effect with the next scan. */
gsize ant_desk_get_masks (AntDesk *self, const AntSpan **spans); /* all that are left out; until the next change */
void ant_desk_mask (AntDesk *self, const AntSpan *span);
void ant_desk_set_mask_reason (AntDesk *self, guint i, const char *reason);
void ant_desk_unmask (AntDesk *self, const AntSpan *span);
void ant_desk_change (AntDesk *self, const char *name, AntTreatment *treatment); /* takes it over */

/* Keeping. Saving is done off the main loop: ANT_DESK_KEPT tells of success, "failed" of failure. path NULL: where it is
 * kept already. */
void ant_desk_save (AntDesk *self, const char *path);
gboolean ant_desk_is_saving (AntDesk *self);
/* Unsaved changes are kept beside the file some seconds later. Work that an earlier run left unsaved, found beside the
 * file that was opened or offered by the caller (untitled): its path, or NULL. */
const char *ant_desk_get_left_behind (AntDesk *self);
void ant_desk_offer_left_behind (AntDesk *self, const char *unsaved_path);
void ant_desk_take_left_behind (AntDesk *self, gboolean wanted); /* open it, or throw it away */
void ant_desk_forget_unsaved (AntDesk *self); /* the user lets changes go */

/* The settings. A change is told only if the value differs. */
const AntSettings *ant_desk_get_settings (AntDesk *self);
gboolean ant_desk_set_setting (AntDesk *self, const AntSetting *setting, const char *text, GError **error);
void ant_desk_reset_settings (AntDesk *self);

/* Selection: NULL for none. Selecting brings the dip into view. */
AntDipItem *ant_desk_get_selected (AntDesk *self);
void ant_desk_select (AntDesk *self, AntDipItem *item);
void ant_desk_select_next (AntDesk *self, int step); /* +1 or -1, by time, among the shown ones */
void ant_desk_judge (AntDesk *self, AntDipClass class); /* the selected dip */
void ant_desk_note (AntDesk *self, const char *note);

/* Shown dips as the plots want them, parallel arrays; marks live until the next change. */
gsize ant_desk_get_marks (AntDesk *self, const AntDipMark **marks);
gsize ant_desk_get_selected_mark (AntDesk *self); /* index or ANT_NO_DIP */
void ant_desk_select_mark (AntDesk *self, gsize index);

/* The time range in view, days from the origin of the record. y is not used. */
const AntView *ant_desk_get_view (AntDesk *self);
void ant_desk_set_view (AntDesk *self, double from_d, double to_d);
void ant_desk_zoom (AntDesk *self, double factor, double at_d);
void ant_desk_pan (AntDesk *self, double fraction);
void ant_desk_view_whole (AntDesk *self);
void ant_desk_view_selected (AntDesk *self); /* the span that was drawn, else the selected dip and its surroundings */
gboolean ant_desk_can_go (AntDesk *self, int step);
void ant_desk_go (AntDesk *self, int step); /* -1 back, +1 forward through views */

/* Pointer and span. */
double ant_desk_get_pointer (AntDesk *self); /* days, NaN: not over a strip */
void ant_desk_set_pointer (AntDesk *self, double time_d);
gboolean ant_desk_get_span (AntDesk *self, AntSpan *span);
void ant_desk_set_span (AntDesk *self, const AntSpan *span); /* NULL: none */
void ant_desk_widen_span (AntDesk *self, int steps); /* about the middle of the view, for keys */
/* What the next drag on a strip is for. */
typedef enum
{
  ANT_DRAG_VIEW, /* it moves the view */
  ANT_DRAG_MEASURE,
  ANT_DRAG_MASK,
  ANT_DRAG_UNMASK,
} AntDragPurpose;
AntDragPurpose ant_desk_get_purpose (AntDesk *self);
void ant_desk_set_purpose (AntDesk *self, AntDragPurpose purpose);
/* Do with the span that was drawn what it was drawn for; without a purpose it is measured. */
void ant_desk_use_span (AntDesk *self);
/* "2041-03-14 07:12 · 1360.52 W/m² · residual −871 ppm" for the pointer, "" for none. Caller frees. */
char *ant_desk_readout (AntDesk *self);

/* Ways of looking. */
AntDepthUnit ant_desk_get_unit (AntDesk *self);
void ant_desk_set_unit (AntDesk *self, AntDepthUnit unit);
int ant_desk_get_average (AntDesk *self); /* index of ant_average_lengths_d, or -1: none */
void ant_desk_set_average (AntDesk *self, int average);
guint ant_desk_get_shown (AntDesk *self); /* AntDipKind bits */
void ant_desk_set_shown (AntDesk *self, guint kinds);
/* Of these, list, chart and strips show those that have the words in their class, shape, note, name or time. */
const char *ant_desk_get_filter (AntDesk *self);
void ant_desk_set_filter (AntDesk *self, const char *words); /* "": all */
gboolean ant_desk_keeps (AntDesk *self, AntDipItem *item);

/* The period that the record is folded on: a repeat's, or one that was chosen. NULL: none. */
const AntFold *ant_desk_get_fold (AntDesk *self);
gsize ant_desk_get_repeat (AntDesk *self); /* whose period it is, or ANT_NO_DIP */
const AntFoldData *ant_desk_get_fold_data (AntDesk *self); /* borrowed until the next change; NULL without a fold */
void ant_desk_select_repeat (AntDesk *self, gsize i);
void ant_desk_fold_on (AntDesk *self, double period_d);
void ant_desk_nudge_fold (AntDesk *self, int steps); /* by what the fold just shows */
void ant_desk_view_event (AntDesk *self, gsize i);   /* of the fold */

/* The dip SNR of one duration against time, computed after a scan while it is shown. */
gboolean ant_desk_get_snr_shown (AntDesk *self);
void ant_desk_set_snr_shown (AntDesk *self, gboolean shown);
void ant_desk_set_snr_duration (AntDesk *self, double duration_d); /* 0: that of the selected dip */
double ant_desk_get_snr_duration (AntDesk *self); /* of what is shown, else of what will be */
const AntSnrStrip *ant_desk_get_snr (AntDesk *self);    /* NULL: none yet. Borrowed */
double ant_desk_get_snr_progress (AntDesk *self);       /* 0..1 while it is being computed, else -1 */

/* The sky over the record, predicted as soon as there is one. The observer is chosen once, for all that is done here. */
#define ANT_NO_EVENT ((gsize) -1)
const AntObserverChoice *ant_desk_get_observer (AntDesk *self);
void ant_desk_set_observer (AntDesk *self, const char *text); /* as of --observer; "failed" if it cannot be */
const AntSkyList *ant_desk_get_sky (AntDesk *self);  /* NULL: none yet */
const char *ant_desk_get_sky_said (AntDesk *self);   /* why there is none, or NULL */
gboolean ant_desk_is_watching (AntDesk *self);       /* it is being worked out */
void ant_desk_measure_sky (AntDesk *self);           /* somebody looks: what the record shows of each event is wanted */
gsize ant_desk_get_sky_selected (AntDesk *self);     /* or ANT_NO_EVENT */
void ant_desk_select_sky (AntDesk *self, gsize index); /* brings it into view */
/* Predicted contacts, days, for the time stack; valid until the next change. */
gsize ant_desk_get_ticks (AntDesk *self, const double **tick_d);

/* Witnesses: other instruments' records beside this one, kept in the analysis. What is opened joins it once it has been read; "failed"
 * if it cannot be: then it stays here, with its problem, until it is read in another way or closed. Numbered from 0; strips are NULL until they are made. Borrowed until the next change. */
void ant_desk_open_witness (AntDesk *self, const char *path);
/* With these choices about reading; in the place of the same file read in another way. */
void ant_desk_open_witness_as (AntDesk *self, const char *path, const AntReadingChoices *reading);
void ant_desk_close_witness (AntDesk *self, guint i);
guint ant_desk_count_witnesses (AntDesk *self);
const AntWitness *ant_desk_get_witness (AntDesk *self, guint i); /* NULL: there are not so many */
const AntWitnessStrips *ant_desk_get_witness_strips (AntDesk *self, guint i);
const char *ant_desk_get_witness_problem (AntDesk *self, guint i); /* why it could not be read, or NULL */
AntWitnessLook ant_desk_get_witness_look (AntDesk *self);
void ant_desk_set_witness_look (AntDesk *self, AntWitnessLook look); /* of all */
GPtrArray *ant_desk_get_comparisons (AntDesk *self); /* AntComparison of those that were read; caller unrefs */

/* Further columns of the record (record->columns) as strips, on demand; they stay while a record of columns of these names is there. */
#define ANT_MOST_SHOWN_COLUMNS 4
gboolean ant_desk_is_column_shown (AntDesk *self, guint column);
void ant_desk_show_column (AntDesk *self, guint column, gboolean shown); /* "failed" if there are too many */
guint ant_desk_count_shown_columns (AntDesk *self);
const char *ant_desk_get_shown_column (AntDesk *self, guint i);              /* its name; NULL: there are not so many */
const AntColumnStrip *ant_desk_get_column_strip (AntDesk *self, guint i);    /* NULL: not made yet */
