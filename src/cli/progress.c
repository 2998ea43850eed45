/* progress.c - how far a run is, in one line. */
#include "cli/progress.h"

#include <glib/gi18n.h>
#include <stdio.h>
#include <unistd.h>

/* Plain lines go to logs: few of them. */
#define LINES_EVERY_S 2.0
/* Shorter stages have no rate worth telling. */
#define LEAST_FOR_RATE_S 0.5

struct AntProgressLine
{
  gboolean on_terminal, forced;
  gsize last_stage;   /* of the last plain line; G_MAXSIZE before the first */
  double last_line_s;
};

AntProgressLine *
ant_progress_line_new (gboolean forced)
{
  AntProgressLine *line = g_new0 (AntProgressLine, 1);
  line->forced = forced;
  line->on_terminal = !forced && isatty (STDERR_FILENO);
  line->last_stage = G_MAXSIZE;
  return line;
}

static char *
time_left (double seconds)
{
  if (seconds < 90)
    return g_strdup_printf (_("%.0f s left"), seconds);
  if (seconds < 90 * 60)
    return g_strdup_printf (_("%.0f min left"), seconds / 60);
  return g_strdup_printf (_("%.1f h left"), seconds / 3600);
}

char *
ant_progress_text (const AntProgress *progress)
{
  double share = ant_progress_share (progress);
  GString *text = g_string_new (NULL);
  g_string_printf (text, _("stage %zu of %zu, %s: %.0f %%"), progress->stage + 1,
                   progress->n_stages, progress->title, 100 * share);
  if (progress->stage_s >= LEAST_FOR_RATE_S && progress->done > 0)
    g_string_append_printf (text, ", %.3g/s", (double) progress->done / progress->stage_s);
  if (progress->stage_s >= LEAST_FOR_RATE_S && share > 0 && share < 1)
    {
      g_autofree char *left = time_left (progress->stage_s * (1 - share) / share);
      g_string_append_printf (text, ", %s", left);
    }
  return g_string_free (text, FALSE);
}

void
ant_progress_line_show (const AntProgress *progress, gpointer data)
{
  AntProgressLine *line = data;
  gboolean news = progress->stage != line->last_stage || progress->done == progress->count
                  || progress->elapsed_s - line->last_line_s >= LINES_EVERY_S;
  if (progress->count == 0 || !(line->on_terminal || (line->forced && news)))
    return;
  g_autofree char *text = ant_progress_text (progress);
  if (line->on_terminal)
    g_printerr ("\r%s\033[K", text); /* back to the line's start; erase the rest of an older, longer text */
  else
    g_printerr ("%s\n", text);
  line->last_stage = progress->stage;
  line->last_line_s = progress->elapsed_s;
}

void
ant_progress_line_end (AntProgressLine *line)
{
  if (line && line->on_terminal && line->last_stage != G_MAXSIZE)
    g_printerr ("\r\033[K");
  g_free (line);
}
