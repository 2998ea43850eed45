/* preview-task.h - how a file would be read with these choices, on its first part, without holding up the main loop. */
#pragma once

#include <gio/gio.h>
#include "data/record.h"
#include "data/reading-choices.h"
#include "readers/file-look.h"

typedef struct
{
  AntFileLook *look;
  AntRecord *record; /* its rows are read, no grid laid; NULL if it is refused */
  char *refusal;     /* the sentence, or NULL */
  gboolean partial;  /* only the first part of the file was read */
} AntPreview;
void ant_preview_free (AntPreview *preview); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntPreview, ant_preview_free)

/* Everything given is copied. The callback runs in the caller's context. */
void ant_preview_task_async (const char *path, const AntReadingChoices *choices, GCancellable *cancellable,
                             GAsyncReadyCallback callback, gpointer data);
/* NULL with one sentence for a file that cannot be looked at. */
AntPreview *ant_preview_task_finish (GAsyncResult *result, GError **error);
