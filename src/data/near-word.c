/* near-word.c - the word that someone probably meant. */
#include "data/near-word.h"

#include <glib.h>
#include <string.h>

/* Longer input is no slip of the fingers. */
#define LONGEST 64

static gsize
changes_between (const char *a, const char *b)
{
  gsize row[LONGEST + 1], n = strlen (b);
  for (gsize j = 0; j <= n; j++)
    row[j] = j;
  for (gsize i = 0; a[i]; i++)
    {
      gsize diagonal = row[0];
      row[0] = i + 1;
      for (gsize j = 1; j <= n; j++)
        {
          gsize swapped = diagonal + (a[i] != b[j - 1]);
          diagonal = row[j];
          row[j] = MIN (swapped, MIN (row[j], row[j - 1]) + 1);
        }
    }
  return row[n];
}

const char *
ant_near_word (const char *word, const char *const *words)
{
  const char *nearest = NULL;
  gsize least = 0;
  if (strlen (word) > LONGEST)
    return NULL;
  for (; *words; words++)
    {
      gsize length = strlen (*words);
      if (length > LONGEST)
        continue;
      gsize changes = changes_between (word, *words);
      if (changes * 3 <= MAX (length, 3) && (!nearest || changes < least))
        {
          nearest = *words;
          least = changes;
        }
    }
  return nearest;
}
