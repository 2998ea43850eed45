/* desk-private.h - inside of the desk, shared by its three files. */
#pragma once

#include "gui/desk.h"

#define ANT_MOST_VIEWS 64

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
void ant_desk_bring_into_view (AntDesk *self, const AntDip *dip);
AntSpan ant_desk_whole (AntDesk *self);
