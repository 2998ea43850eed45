/* desk-private.h - inside of the desk, shared by its files. */
#pragma once

#include "core/units.h"
#include "gui/desk.h"

#define ANT_MOST_VIEWS 64
#define ANT_USUAL_SNR_D (6 / ANT_HOURS_PER_DAY) /* dips whose SNR is followed until one is selected */

struct _AntDesk
{
  GObject parent_instance;

  /* Owned: what is on the desk */
  AntLayers *layers;
  AntAnalysis *analysis;   /* never NULL */
  AntScanResults *results; /* the analysis's, borrowed; NULL while there are none */
  GListStore *items;
  AntTreatment *read_with; /* that the layers are made with; NULL without layers */

  /* Owned: what is being opened */
  AntAnalysis *incoming;        /* takes the place of the present one; NULL: that stays */
  AntTreatment *opening_with, *scanning_with;

  /* Keeping */
  gboolean saving, keeping, keep_failed;
  guint keep_timer, number;     /* of the desk, for unsaved work without a file */
  guint64 kept_revision;        /* that unsaved work was last written at */
  char *left_behind, *left_behind_of; /* unsaved work of an earlier run, and the file it belongs to (NULL: none) */
  char *recovering;             /* such work that is being opened; NULL: none is */

  /* Owned: work that is going on */
  AntBusy busy;
  GCancellable *stop;
  char *opening;
  char *refused; /* the record that was asked for last, until it is read; NULL: none */
  AntTaskProgress progress;

  /* Owned: selection and its picture for the plots */
  AntDipItem *selected;
  GArray *marks;        /* of AntDipMark */
  GPtrArray *mark_items; /* borrowed from items */

  /* The view and the views before and after it */
  AntView view;
  AntSpan past[ANT_MOST_VIEWS];
  gsize n_past, now;     /* past[now] is the present one */
  gint64 view_changed_us;

  double pointer_d;
  AntSpan span;          /* NaN: none */
  AntDragPurpose purpose;
  GArray *mask_spans;    /* of AntSpan: the analysis's masks, for the plots */

  /* The dip SNR of one duration */
  gboolean snr_shown;
  double snr_choice_d;      /* 0: the selected dip's */
  double snr_wanted_d;      /* of what is computed, or was last */
  AntSnrStrip *snr;         /* owned; NULL: none yet */
  GCancellable *snr_stop;   /* owned; NULL: nothing is being computed */
  double snr_done;

  /* What is folded */
  AntFold fold;             /* period 0: nothing */
  gsize repeat;             /* that it is of, or ANT_NO_DIP */
  AntFoldData *fold_data;   /* owned; NULL: not yet asked for */

  /* The sky over the record */
  AntObserverChoice *observer; /* owned */
  AntSkyList *sky;          /* owned; NULL: none yet */
  char *sky_said;           /* owned */
  GCancellable *sky_stop;   /* owned; NULL: nothing is being worked out */
  gboolean sky_wanted;      /* somebody has looked */
  gsize sky_selected;
  GArray *ticks;            /* of double: predicted contacts */

  /* Witnesses, and columns that are shown */
  GPtrArray *witnesses;             /* owned; what desk-witness.c holds of each */
  AntWitnessLook witness_look;
  GPtrArray *shown_columns;         /* owned; what desk-columns.c holds of each */

  AntDepthUnit unit;
  int average;
  guint shown;
  char *filter; /* owned; "": everything */
};

void ant_desk_tell (AntDesk *self, AntDeskChange what);
void ant_desk_fail (AntDesk *self, const char *sentence);
/* Something of the analysis has changed: bring the items and what is kept in step, then tell `what`. */
void ant_desk_changed (AntDesk *self, AntDeskChange what);
/* Put another analysis onto the desk, taken over; layers NULL: its record was not found. */
void ant_desk_adopt (AntDesk *self, AntAnalysis *analysis, AntLayers *layers);
/* Items of what was found, judged; asked ones stay. */
void ant_desk_make_items (AntDesk *self);
void ant_desk_clear_items (AntDesk *self);
/* Work has a cancellable of its own; whoever is not the present one has been overtaken (FALSE). */
GCancellable *ant_desk_begin (AntDesk *self, AntBusy busy);
gboolean ant_desk_end (AntDesk *self, GAsyncResult *result);
void ant_desk_start_scan (AntDesk *self, AntLayers *layers);
void ant_desk_follow_reading (AntDesk *self); /* the record anew if it was read by other choices than those of now */
void ant_desk_read_for_scan (AntDesk *self); /* the record with the present treatment, then scan it */
void ant_desk_open_analysis (AntDesk *self, const char *path);
/* What has been read is unsaved work of an earlier run: give it its place. */
void ant_desk_place_recovered (AntDesk *self);
void ant_desk_judge_items (AntDesk *self);
void ant_desk_keep_soon (AntDesk *self);
/* Look whether an earlier run left unsaved work beside the file; keep the changes from here on. */
void ant_desk_begin_keeping (AntDesk *self);
void ant_desk_stop_keeping (AntDesk *self);
/* Marks from items; needed after items, judgements or what is shown have changed. */
void ant_desk_make_marks (AntDesk *self);
/* The record is another: begin its views anew. */
void ant_desk_begin_views (AntDesk *self);
/* Compute the dip SNR that is wanted now, if it is not there; drop what belongs to other results. */
void ant_desk_follow_snr (AntDesk *self);
void ant_desk_drop_snr (AntDesk *self);
/* Nothing is folded; fold on the strongest repeat, if there is one. */
void ant_desk_drop_fold (AntDesk *self);
void ant_desk_begin_fold (AntDesk *self);
/* Hold the witnesses that the analysis names, and compare anew where record or settings are others than they were compared with.
 * TRUE if they are others than before. */
gboolean ant_desk_follow_witnesses (AntDesk *self);
/* The treatment's witnesses are those of ant_desk_get_comparisons now, in the same order. */
void ant_desk_name_compared (AntDesk *self, AntTreatment *treatment);
void ant_desk_held_witness_free (gpointer held);
/* Columns of the same names again, of the record that is there now. */
void ant_desk_follow_columns (AntDesk *self);
void ant_desk_shown_column_free (gpointer shown);
void ant_desk_bring_into_view (AntDesk *self, const AntDip *dip);
/* Work out the sky over the record anew. */
void ant_desk_follow_sky (AntDesk *self);
gboolean ant_desk_observer_differs (AntDesk *self); /* the analysis names another than the desk has */
void ant_desk_drop_sky (AntDesk *self);
AntSpan ant_desk_whole (AntDesk *self);
