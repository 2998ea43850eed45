/* progress-part.c - several runs of the pool told as one. */
#include "jobs/progress-part.h"

void
ant_progress_part_next (AntProgressPart *part, gsize n_stages)
{
  part->n_before += n_stages;
  part->before_s = part->now_s;
}

void
ant_progress_part_show (const AntProgress *progress, gpointer data)
{
  AntProgressPart *part = data;
  AntProgress whole = *progress;
  whole.stage += part->n_before;
  whole.n_stages = part->n_stages;
  whole.elapsed_s += part->before_s;
  part->now_s = whole.elapsed_s;
  if (part->progress)
    part->progress (&whole, part->data);
}
