/* verbs.c - the table of verbs. */
#include "cli/verbs.h"

#include <glib/gi18n.h>

const AntVerb ant_verb_table[] = {
  { "info", N_("tell what is in a record, and what was assumed"), ant_verb_info },
  { "predict", N_("tell what crosses the Sun for an observer, and what a record shows of it"), ant_verb_predict },
  { "scan", N_("search a record for dips, or measure one"), ant_verb_scan },
  { "settings", N_("print the table of settings"), ant_verb_settings },
  { "simulate", N_("make a record from a recipe, with the truth beside it"), ant_verb_simulate },
};
const gsize ant_n_verbs = G_N_ELEMENTS (ant_verb_table);

const AntVerb *
ant_verb_find (const char *name)
{
  for (gsize i = 0; i < ant_n_verbs; i++)
    if (g_str_equal (ant_verb_table[i].name, name))
      return &ant_verb_table[i];
  return NULL;
}

char *
ant_verbs_help (void)
{
  GString *text = g_string_new (_("Usage: antumbra-cli VERB [OPTIONS]\n\n"
                                  "Finds and explains dips in records of solar irradiance.\n\nVerbs:\n"));
  for (gsize i = 0; i < ant_n_verbs; i++)
    g_string_append_printf (text, "  %-12s %s\n", ant_verb_table[i].name, _(ant_verb_table[i].summary));
  g_string_append (text, _("\n“antumbra-cli VERB --help” tells its options; --version tells the version.\n"
                           "Exit codes: 0 done, 2 usage, 3 input cannot be read, 4 cannot write, 5 stopped.\n"));
  return g_string_free (text, FALSE);
}
