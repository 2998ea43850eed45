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
/* Those that were asked for, onto an array of AntWitness. FALSE with one sentence: more than ANT_MOST_WITNESSES in all. */
gboolean ant_witness_options_add_to (const AntWitnessOptions *options, GPtrArray *witnesses, GError **error);
/* An array of AntComparison of an array of AntWitness, which learn their sums; a file whose bytes are others than they were is told
 * on standard error. NULL with one sentence. */
GPtrArray *ant_witnesses_open (GPtrArray *witnesses, AntRecord *record, const AntSettings *settings, GCancellable *cancellable,
                               GError **error);
/* What each witness shows of a dip of the record, for people, on standard output. */
void ant_witnesses_print_dip (const GPtrArray *comparisons, const AntSettings *settings, const AntDip *dip);
/* What the comparisons came to, likewise. */
void ant_witnesses_print (const GPtrArray *comparisons);
