/* verb-settings.c - `antumbra-cli settings`: the table of settings for people, for programs and as a key file. */
#include <glib/gi18n.h>
#include <json-glib/json-glib.h>
#include <string.h>

#include "cli/exit-code.h"
#include "cli/settings-options.h"
#include "cli/verbs.h"

static void
print_table (const AntSettings *settings)
{
  const char *group = "";
  for (gsize i = 0; i < ant_n_settings; i++)
    {
      const AntSetting *setting = &ant_setting_table[i];
      g_autofree char *value = ant_setting_format (setting, ant_setting_get (setting, settings));
      g_autofree char *range = ant_setting_range (setting);
      if (strcmp (group, setting->group) != 0)
        g_print ("%s%s\n", i ? "\n" : "", _(setting->group));
      group = setting->group;
      g_print ("  %-22s %12s %-4s (%s)\n      %s\n", setting->key, value, setting->unit, range, _(setting->help));
    }
}

static void
add_setting (JsonBuilder *json, const AntSetting *setting, const AntSettings *settings)
{
  json_builder_begin_object (json);
  json_builder_add_string_value (json_builder_set_member_name (json, "key"), setting->key);
  json_builder_add_string_value (json_builder_set_member_name (json, "unit"), setting->unit);
  if (setting->kind == ANT_SETTING_WORD)
    {
      gsize value = (gsize) ant_setting_get (setting, settings);
      json_builder_add_string_value (json_builder_set_member_name (json, "value"), setting->words[value]);
      json_builder_add_string_value (json_builder_set_member_name (json, "default"),
                                     setting->words[(gsize) setting->fallback]);
      json_builder_begin_array (json_builder_set_member_name (json, "words"));
      for (gsize i = 0; setting->words[i]; i++)
        json_builder_add_string_value (json, setting->words[i]);
      json_builder_end_array (json);
    }
  else
    {
      json_builder_add_double_value (json_builder_set_member_name (json, "value"), ant_setting_get (setting, settings));
      json_builder_add_double_value (json_builder_set_member_name (json, "default"), setting->fallback);
      json_builder_add_double_value (json_builder_set_member_name (json, "minimum"), setting->minimum);
      json_builder_add_double_value (json_builder_set_member_name (json, "maximum"), setting->maximum);
    }
  json_builder_add_string_value (json_builder_set_member_name (json, "group"), setting->group);
  json_builder_add_string_value (json_builder_set_member_name (json, "help"), setting->help);
  json_builder_end_object (json);
}

static void
print_json (const AntSettings *settings)
{
  g_autoptr (JsonBuilder) json = json_builder_new ();
  json_builder_begin_array (json);
  for (gsize i = 0; i < ant_n_settings; i++)
    add_setting (json, &ant_setting_table[i], settings);
  json_builder_end_array (json);
  g_autoptr (JsonNode) root = json_builder_get_root (json);
  g_autofree char *text = json_to_string (root, TRUE);
  g_print ("%s\n", text);
}

int
ant_verb_settings (int argc, char **argv)
{
  gboolean as_json = FALSE, as_keys = FALSE;
  AntSettingsOptions options = { 0 };
  const GOptionEntry entries[] = {
    { "json", 0, 0, G_OPTION_ARG_NONE, &as_json, N_("print JSON"), NULL },
    { "keys", 0, 0, G_OPTION_ARG_NONE, &as_keys, N_("print a key file, as --settings takes it"), NULL },
    { NULL }
  };
  g_autoptr (GOptionContext) context = g_option_context_new (NULL);
  g_option_context_set_summary (context, _("Prints every setting with its value, unit, range and meaning."));
  g_option_context_add_main_entries (context, entries, NULL);
  ant_settings_options_add (context, &options);

  g_autoptr (GError) error = NULL;
  AntSettings settings;
  int code = ANT_EXIT_DONE;
  if (!g_option_context_parse (context, &argc, &argv, &error) || !ant_settings_options_apply (&options, &settings, &error))
    code = ant_cli_fail (error);
  else if (argc > 1)
    code = ant_cli_fail_usage (_("settings: found “%s”, expected options only"), argv[1]);
  else if (as_json && as_keys)
    code = ant_cli_fail_usage (_("settings: found both --json and --keys, expected one of them"));
  else if (as_json)
    print_json (&settings);
  else if (as_keys)
    {
      g_autofree char *text = ant_settings_to_key_file (&settings);
      g_print ("%s", text);
    }
  else
    print_table (&settings);
  ant_settings_options_clear (&options);
  return code;
}
