/* progress-part.h - several runs of the pool told as one: each is a part of the whole. */
#pragma once

#include "jobs/pool.h"

typedef struct
{
  AntProgressFunc progress; /* may be NULL */
  gpointer data;
  gsize n_stages;           /* of all runs together */
  /* Kept by the functions; 0 at first: */
  gsize n_before;           /* stages of the runs that have ended */
  double before_s, now_s;   /* time of those, and with the present one */
} AntProgressPart;

/* The next run begins, after one of n_stages. */
void ant_progress_part_next (AntProgressPart *part, gsize n_stages);
/* An AntProgressFunc whose data is an AntProgressPart. */
void ant_progress_part_show (const AntProgress *progress, gpointer part);
