/* fuzz-fits-reader.c - any bytes behind the first card of a FITS file are a record that keeps its promises, or one sentence. */
#include <string.h>

#include "reader-door.h"

int
LLVMFuzzerTestOneInput (const uint8_t *bytes, size_t n)
{
  static const char first[] = "SIMPLE  =                    T";
  char value[] = "2", time[] = "1", hdu[] = "1";
  const AntReadingChoices chosen = { .time_column = time, .value_column = value, .hdu = hdu };
  g_autofree uint8_t *copy = g_malloc0 (n + 1);
  memcpy (copy, bytes, n);
  memcpy (copy, first, n < strlen (first) ? n : strlen (first)); /* without it the text reader has the file */
  ant_reader_door (copy, n, NULL);
  ant_reader_door (copy, n, &chosen);
  return 0;
}
