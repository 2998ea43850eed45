/* witness.h - a second record on the same Sun, as an analysis names it. */
#pragma once

#include "data/reading-choices.h"

#define ANT_MOST_WITNESSES 4

typedef struct
{
  char *path;   /* absolute */
  char *sha256; /* of the bytes that were compared; NULL: not read yet */
  AntReadingChoices reading;
} AntWitness;

/* Copies all of it; sha256 and reading (nothing chosen) may be NULL. */
AntWitness *ant_witness_new (const char *path, const char *sha256, const AntReadingChoices *reading);
AntWitness *ant_witness_copy (const AntWitness *witness);
void ant_witness_free (AntWitness *witness); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntWitness, ant_witness_free)
/* The same file read in the same way; the same bytes too. */
gboolean ant_witness_same_file (const AntWitness *one, const AntWitness *other);
gboolean ant_witness_same (const AntWitness *one, const AntWitness *other);
/* Its file's name without the folder, for people. Caller frees. */
char *ant_witness_name (const AntWitness *witness);
