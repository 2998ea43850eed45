/* config-file.h - the key files in the user's config folder. */
#pragma once

#include <glib.h>

/* `name` is the file's, as "window.ini". What cannot be read is empty; caller unrefs. */
GKeyFile *ant_config_load (const char *name);
/* What cannot be written is told to the debugging log only: the program works on without it. */
void ant_config_save (GKeyFile *file, const char *name);
