/* settings-options.h - the options --set and --settings, the same for every verb that takes settings. */
#pragma once

#include "data/settings.h"

typedef struct
{
  char *file;  /* --settings FILE */
  char **set;  /* --set key=value, as often as wanted */
} AntSettingsOptions;

/* Add both options to a context; parsing fills `options` (start it as { 0 }). */
void ant_settings_options_add (GOptionContext *context, AntSettingsOptions *options);
/* The file, then every --set in turn, on top of what `settings` hold; _apply begins with the defaults. FALSE with one
 * sentence. */
gboolean ant_settings_options_add_to (const AntSettingsOptions *options, AntSettings *settings, GError **error);
gboolean ant_settings_options_apply (const AntSettingsOptions *options, AntSettings *settings, GError **error);
void ant_settings_options_clear (AntSettingsOptions *options);
