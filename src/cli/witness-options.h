/* witness-options.h - --witness: other instruments on the same Sun, read and compared. */
#pragma once

#include <gio/gio.h>
#include "data/comparison.h"
#include "data/settings.h"
#include "search/dip.h"

typedef struct
{
  char **files; /* --witness FILE, up to ANT_MOST_WITNESSES times */
} AntWitnessOptions;

void ant_witness_options_add (GOptionContext *context, AntWitnessOptions *options);
void ant_witness_options_clear (AntWitnessOptions *options);
/* "witness-1.csv" ... for those that were asked for. Caller g_strfreevs. */
char **ant_witness_options_names (const AntWitnessOptions *options);
/* An array of AntComparison, empty without --witness. NULL with one sentence. */
GPtrArray *ant_witness_options_open (const AntWitnessOptions *options, AntRecord *record, const AntSettings *settings,
                                     GCancellable *cancellable, GError **error);
/* What each witness shows of a dip of the record, for people, on standard output. */
void ant_witness_options_print_dip (const GPtrArray *comparisons, const AntSettings *settings, const AntDip *dip);
/* What the comparisons came to, likewise. */
void ant_witness_options_print (const GPtrArray *comparisons);
