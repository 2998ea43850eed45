/* fold-options.h - `info --fold`: the record, or one of its columns, by phase of an orbit or minutes since a gap. */
#pragma once

#include <gio/gio.h>
#include "data/record.h"
#include "data/settings.h"

typedef struct
{
  char *clock;  /* --fold orbit=1.6 (hours), orbit (by the setting line-period), or gap */
  char *column; /* --fold-column NAME: a further column instead of the value */
} AntFoldWish;

void ant_fold_options_add (GOptionContext *context, AntFoldWish *wish);
void ant_fold_options_clear (AntFoldWish *wish);
/* Print the bins as CSV on standard output, what stands out as a comment. Nothing without --fold. FALSE with one sentence. */
gboolean ant_fold_options_print (const AntFoldWish *wish, const AntRecord *record, const AntSettings *settings, GError **error);
