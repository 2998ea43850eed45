/* progress.h - how far a run is, on standard error: one line redrawn on a terminal, plain lines where forced. */
#pragma once

#include "jobs/pool.h"

typedef struct AntProgressLine AntProgressLine;

/* Shows nothing where standard error is no terminal and lines are not forced (--progress). */
AntProgressLine *ant_progress_line_new (gboolean forced);
/* An AntProgressFunc; data is the AntProgressLine. */
void ant_progress_line_show (const AntProgress *progress, gpointer line);
/* Wipe what is on the terminal's line, and free. NULL is fine. */
void ant_progress_line_end (AntProgressLine *line);

/* "stage 2 of 6, searching for dips: 42 %, 120/s, 35 s left": of this stage; rate and time left stand only where half a
 * second of it has shown them. Caller frees. */
char *ant_progress_text (const AntProgress *progress);
