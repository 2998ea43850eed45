/* verbs.h - what the command can do: one function per verb, and the table that names them.
 * A verb gets its own arguments with argv[0] the verb, prints its results on standard output and returns an
 * AntExitCode; what it says about an error is one line (exit-code.h). */
#pragma once

#include <glib.h>

typedef struct
{
  const char *name;
  const char *summary; /* N_() marked, without a full stop */
  int (*run) (int argc, char **argv);
} AntVerb;

extern const AntVerb ant_verb_table[];
extern const gsize ant_n_verbs;

/* NULL if there is none of that name. */
const AntVerb *ant_verb_find (const char *name);
/* What --help prints. Caller frees. */
char *ant_verbs_help (void);

int ant_verb_info (int argc, char **argv);
int ant_verb_predict (int argc, char **argv);
int ant_verb_scan (int argc, char **argv);
int ant_verb_settings (int argc, char **argv);
int ant_verb_simulate (int argc, char **argv);
