/* reader-door.h - one input through the registry of readers: a record that keeps its promises, or one sentence. */
#pragma once

#include <math.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

#include "data/error.h"
#include "fuzz-door.h"
#include "readers/reader.h"

/* A broken promise must stop the fuzzer, in every build. */
static inline void
promise (gboolean kept)
{
  if (!kept)
    abort ();
}

static inline void
check_record (const AntRecord *record)
{
  promise (record->n_rows >= 2 && record->time_name && record->value_name && record->sha256);
  for (gsize i = 0; i < record->n_rows; i++)
    {
      promise (isnan (record->time_d[i]) == ((record->flags[i] & ANT_FLAG_NO_TIME) != 0));
      promise (isnan (record->value[i]) == ((record->flags[i] & ANT_FLAG_FILL) != 0));
      promise (!isinf (record->time_d[i]) && !isinf (record->value[i]));
      promise (!record->error || isnan (record->error[i]) || record->error[i] > 0.0);
      promise (record->line[i] > (i ? record->line[i - 1] : 0));
    }
  for (guint i = 0; i < record->said->len; i++)
    promise (g_utf8_validate (g_ptr_array_index (record->said, i), -1, NULL));
  for (gsize i = 0; i < record->n_rows; i += record->n_rows - 1)
    {
      g_autofree char *own = ant_time_reference_own_text (&record->time, record->time_d[i]);
      g_autofree char *utc = ant_time_reference_utc_text (&record->time, record->time_d[i], 3);
      promise (own && utc);
    }
}

static inline void
ant_reader_door (const uint8_t *bytes, size_t n, const AntReadingChoices *choices)
{
  g_autoptr (GError) error = NULL;
  g_autoptr (AntRecord) record = ant_reader_read_bytes ("any", bytes, n, choices, &error);
  promise ((record != NULL) != (error != NULL));
  if (record)
    check_record (record);
  else
    promise (error->domain == ANT_ERROR && !strchr (error->message, '\n') && g_utf8_validate (error->message, -1, NULL));
}
