/* text-names.h - column names and units out of a text table's header. */
#pragma once

#include "readers/table-layout.h"

/* Name every column from the line above the data, a comment of as many words, or lines such as "3rd col: TSI (W/m2)". */
void ant_text_name_columns (AntTableLayout *layout);
/* At most n bytes of text as valid UTF-8 without control characters. Caller frees. */
char *ant_text_excerpt (const char *start, const char *end, gsize n);
/* "W/m2" for its many spellings, "ppm", "relative"; NULL for what is none of them. */
const char *ant_text_known_unit (const char *text);

/* Words that name a time, for ant_table_column_has_word. */
extern const char *const ant_time_words[];
