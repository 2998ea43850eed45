/* reading.h - short ways for the reader's tests to read a text and to look at what was said. */
#pragma once

#include <math.h>
#include <string.h>

#include "data/error.h"
#include "readers/reader.h"

static inline AntRecord *
read_with (const char *text, const AntReadingChoices *choices)
{
  g_autoptr (GError) error = NULL;
  AntRecord *record = ant_reader_read_bytes ("trial.txt", text, strlen (text), choices, &error);
  g_assert_no_error (error);
  g_assert_nonnull (record);
  return record;
}

static inline AntRecord *
read_text (const char *text)
{
  return read_with (text, NULL);
}

/* A sentence with these words was said. */
static inline gboolean
was_said (const AntRecord *record, const char *words)
{
  for (guint i = 0; i < record->said->len; i++)
    if (strstr (g_ptr_array_index (record->said, i), words))
      return TRUE;
  return FALSE;
}

static inline guint
count_flag (const AntRecord *record, AntFlag flag)
{
  guint n = 0;
  for (gsize i = 0; i < record->n_rows; i++)
    n += (record->flags[i] & flag) != 0;
  return n;
}
