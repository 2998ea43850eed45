/* witness.c - the life of a witness's name. */
#include "data/witness.h"

#include <string.h>

AntWitness *
ant_witness_new (const char *path, const char *sha256, const AntReadingChoices *reading)
{
  AntWitness *witness = g_new0 (AntWitness, 1);
  witness->path = g_canonicalize_filename (path, NULL);
  witness->sha256 = g_strdup (sha256);
  if (reading)
    ant_reading_choices_copy (reading, &witness->reading);
  return witness;
}

AntWitness *
ant_witness_copy (const AntWitness *witness)
{
  return ant_witness_new (witness->path, witness->sha256, &witness->reading);
}

void
ant_witness_free (AntWitness *witness)
{
  if (!witness)
    return;
  ant_reading_choices_clear (&witness->reading);
  g_free (witness->path);
  g_free (witness->sha256);
  g_free (witness);
}

gboolean
ant_witness_same_file (const AntWitness *one, const AntWitness *other)
{
  return strcmp (one->path, other->path) == 0 && ant_reading_choices_same (&one->reading, &other->reading);
}

gboolean
ant_witness_same (const AntWitness *one, const AntWitness *other)
{
  return ant_witness_same_file (one, other) && g_strcmp0 (one->sha256, other->sha256) == 0;
}

char *
ant_witness_name (const AntWitness *witness)
{
  return g_filename_display_basename (witness->path);
}
