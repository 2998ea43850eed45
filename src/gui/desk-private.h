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
  AntScanResults *results;
  GListStore *items;
  AntJudgements *judgements;
  AntSettings settings;
  AntSettings read_with, opening_with; /* those the present record, and the one being opened, are read with */

  /* Owned: work that is going on */
  AntBusy busy;
  GCancellable *stop;
  char *opening;
  gboolean scan_after; /* the record is read again for a scan */
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
  gboolean measuring;

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

  /* The witness */
  char *witness_path, *witness_of;  /* owned; its file, and that of the record it was opened beside; NULL: none */
  AntWitnessStrips *witness;        /* owned; NULL: none yet */
  GCancellable *witness_stop;       /* owned; NULL: nothing is being read */
  AntWitnessLook witness_look;

  AntDepthUnit unit;
  int average;
  guint shown;
};

void ant_desk_tell (AntDesk *self, AntDeskChange what);
void ant_desk_fail (AntDesk *self, const char *sentence);
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
/* Compare anew, or close the witness, where record or settings are others than it was compared with. */
void ant_desk_follow_witness (AntDesk *self);
void ant_desk_bring_into_view (AntDesk *self, const AntDip *dip);
/* Work out the sky over the record anew. */
void ant_desk_follow_sky (AntDesk *self);
void ant_desk_drop_sky (AntDesk *self);
AntSpan ant_desk_whole (AntDesk *self);
