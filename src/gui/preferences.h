/* preferences.h - what the window remembers from one day to the next: records opened, its size, the settings panel. A
 * key file in the user's configuration folder; one that cannot be read or written is no reason to trouble anybody. */
#pragma once

#include <glib.h>

#define ANT_MOST_RECENT 8

/* Paths of records opened before, latest first; those that are gone are left out. Caller frees (g_strfreev). */
char **ant_preferences_recent (void);
void ant_preferences_add_recent (const char *path);

void ant_preferences_get_size (int *width, int *height); /* unchanged if none was kept */
void ant_preferences_set_size (int width, int height);
gboolean ant_preferences_get_settings_shown (void);
void ant_preferences_set_settings_shown (gboolean shown);
