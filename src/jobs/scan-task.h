/* scan-task.h - a scan, or an asked dip, without holding up the main loop. */
#pragma once

#include <gio/gio.h>
#include "data/observer-choice.h"
#include "data/scan-results.h"
#include "jobs/layers.h"
#include "jobs/progress-relay.h"

typedef struct
{
  AntScanResults *results;
  AntLayers *layers;      /* the record again, with the found dips masked in its rotation curve; those that were given if
                             the scan was stopped */
} AntScanOutcome;
void ant_scan_outcome_free (AntScanOutcome *outcome);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntScanOutcome, ant_scan_outcome_free)

/* comparisons: of AntComparison, what the verdicts have of other instruments, or NULL; those beside another reading of the record
 * are made anew of `witnesses` (of AntWitness, in the same order).
 * progress is called in the caller's context, about ten times a second, never after the callback began; `data` goes to
 * both. The task keeps references to layers and choice (NULL: nobody knows who took the record) and a copy of the settings. */
void ant_scan_task_async (AntLayers *layers, const AntSettings *settings, AntObserverChoice *choice,
                          const GPtrArray *witnesses, const GPtrArray *comparisons, GCancellable *cancellable,
                          AntTaskProgressFunc progress, GAsyncReadyCallback callback, gpointer data);
/* What a stopped scan found before is kept (reach of its results below ANT_SCAN_COMPLETE). NULL with one sentence;
 * G_IO_ERROR_CANCELLED if it was stopped before it found anything. */
AntScanOutcome *ant_scan_task_finish (GAsyncResult *result, GError **error);

typedef struct
{
  AntDip dip;
  double upper_limit_ppm; /* one-sided 95 % limit of its depth */
  AntVerdict verdict;
} AntAskedDip;

/* Measure the dip that would stand at mid_d for duration_d, contact I to IV, and judge it. The rest as for a scan. */
void ant_ask_task_async (AntLayers *layers, const AntSettings *settings, AntObserverChoice *choice, const GPtrArray *witnesses,
                         const GPtrArray *comparisons, double mid_d, double duration_d,
                         GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data);
/* NULL with one sentence; else the caller frees by g_free. */
AntAskedDip *ant_ask_task_finish (GAsyncResult *result, GError **error);
