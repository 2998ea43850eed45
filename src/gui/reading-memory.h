/* reading-memory.h - choices about reading, remembered for files of one kind in a key file of the user's configuration folder. */
#pragma once

#include "data/reading-choices.h"

/* What was chosen for files of this kind (ant_file_look_new); FALSE and nothing to clear if nothing was. */
gboolean ant_reading_memory_recall (const char *kind, AntReadingChoices *choices);
/* Choices that are none are forgotten. */
void ant_reading_memory_keep (const char *kind, const AntReadingChoices *choices);
