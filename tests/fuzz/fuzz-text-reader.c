/* fuzz-text-reader.c - any bytes are either a record that keeps its promises or one sentence of refusal. */
#include "reader-door.h"

int
LLVMFuzzerTestOneInput (const uint8_t *bytes, size_t n)
{
  char first[] = "1", both[] = "1+2", second[] = "2", year_day[] = "year-day";
  const AntReadingChoices chosen = { .time_column = first, .value_column = second };
  const AntReadingChoices parts = { .time_column = both, .time_format = year_day };
  ant_reader_door (bytes, n, NULL);
  ant_reader_door (bytes, n, &chosen);
  ant_reader_door (bytes, n, &parts);
  return 0;
}
