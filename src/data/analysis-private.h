/* analysis-private.h - inside of an analysis, shared with its file's form (analysis-text.c). */
#pragma once

#include <json-glib/json-glib.h>
#include "data/analysis.h"

struct _AntAnalysis
{
  char *path;
  char *record_path, *record_sha256;
  double origin_jd;

  /* Counted (g_atomic_rc_box), never changed: an AntTreatment and an AntJudgements, shared with the changes around them. */
  struct _AntPart *treatment, *judgements;
  GPtrArray *done, *undone; /* of Change, latest last */
  GPtrArray *history;       /* of AntAnalysisEvent */

  AntScanResults *results;  /* their record is NULL until it is read */
  AntTreatment *scanned_with;

  guint64 serial;               /* of the latest change or event */
  guint64 state, saved_state;   /* numbers of states of the parts: equal numbers are equal parts */
  guint64 others, saved_others; /* grows with what cannot be undone */
  guint64 revision;
  gboolean recovered;           /* holds unsaved work of an earlier run */
  gint64 changed_us;            /* when the latest change was made, for joining those of one hand movement */

  JsonObject *read;                   /* as read from a file: what this program does not know is written again; or NULL */
  const AntScanResults *results_read; /* those of that file; only compared */
};

/* A new analysis made of what a file told; everything is taken over. */
void ant_analysis_fill (AntAnalysis *analysis, AntTreatment *treatment, AntJudgements *judgements, GPtrArray *history);
void ant_analysis_event_free (gpointer event);
