/* settings-options.c - the options --set and --settings. */
#include "cli/settings-options.h"

#include <glib/gi18n.h>

void
ant_settings_options_add (GOptionContext *context, AntSettingsOptions *options)
{
  const GOptionEntry entries[] = {
    { "set", 0, 0, G_OPTION_ARG_STRING_ARRAY, &options->set, N_("change a setting; may be given again"), N_("KEY=VALUE") },
    { "settings", 0, 0, G_OPTION_ARG_FILENAME, &options->file, N_("take settings from a key file"), N_("FILE") },
    { NULL }
  };
  g_option_context_add_main_entries (context, entries, NULL);
}

gboolean
ant_settings_options_add_to (const AntSettingsOptions *options, AntSettings *settings, GError **error)
{
  if (options->file && !ant_settings_load (settings, options->file, error))
    return FALSE;
  for (char **set = options->set; set && *set; set++)
    if (!ant_settings_assign (settings, *set, error))
      return g_prefix_error (error, "--set: "), FALSE;
  return TRUE;
}

gboolean
ant_settings_options_apply (const AntSettingsOptions *options, AntSettings *settings, GError **error)
{
  ant_settings_init (settings);
  return ant_settings_options_add_to (options, settings, error);
}

void
ant_settings_options_clear (AntSettingsOptions *options)
{
  g_clear_pointer (&options->file, g_free);
  g_clear_pointer (&options->set, g_strfreev);
}
