/* progress-relay.h - a worker's progress told on the loop that waits for it: the worker writes under a lock, the loop reads
 * ten times a second. However fast the worker is, the loop is never flooded. */
#pragma once

#include <gio/gio.h>
#include "jobs/pool.h"

typedef struct
{
  const char *title;      /* of the stage, untranslated; NULL until the first has begun */
  gsize stage, n_stages;  /* from 0 */
  double fraction;        /* of the whole, every stage counting alike, 0..1 */
  double stage_left_s;    /* until this stage's end at its pace so far; NaN while unknown */
} AntTaskProgress;
typedef void (*AntTaskProgressFunc) (const AntTaskProgress *progress, gpointer data);

typedef struct _AntProgressRelay AntProgressRelay;

/* Tell func in the caller's context until the task is completed, never after its callback began. func NULL: nobody is
 * told. Free it with the task's data. */
AntProgressRelay *ant_progress_relay_new (GTask *task, AntTaskProgressFunc func, gpointer data);
void ant_progress_relay_free (AntProgressRelay *relay);
/* An AntProgressFunc for the worker; data is the relay. */
void ant_progress_relay_note (const AntProgress *progress, gpointer relay);
