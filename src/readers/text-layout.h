/* text-layout.h - how a text table is laid out: its separator, where its data begin, its column names, and what each column
 * holds, judged on the first lines of the file. */
#pragma once

#include "readers/table-layout.h"

#define ANT_SAMPLE_BYTES (512 * 1024)

/* Judge the sample: n bytes of whole lines and a readable byte after them. NULL with one sentence if it holds no table. */
AntTableLayout *ant_text_layout_find (const char *name, const char *sample, gsize n, GError **error);
