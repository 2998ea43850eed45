/* verb-simulate.c - `antumbra-cli simulate`: a record from a recipe, and the truth beside it. */
#include <glib/gi18n.h>
#include <string.h>

#include "cli/exit-code.h"
#include "cli/verbs.h"
#include "data/error.h"
#include "data/recipe.h"
#include "writers/simulation-writer.h"
#include "writers/whole-file.h"

typedef struct
{
  char *out, *truth, *seed;
  gboolean force;
} Choices;

static void
choices_clear (Choices *choices)
{
  g_free (choices->out);
  g_free (choices->truth);
  g_free (choices->seed);
}
G_DEFINE_AUTO_CLEANUP_CLEAR_FUNC (Choices, choices_clear)

/* "records/larkspur.csv" -> "records/larkspur-truth.csv" */
static char *
truth_beside (const char *out)
{
  const char *name = strrchr (out, '/') ? strrchr (out, '/') + 1 : out;
  const char *dot = strrchr (name, '.');
  gsize stem = dot && dot != name ? (gsize) (dot - out) : strlen (out);
  return g_strdup_printf ("%.*s-truth.csv", (int) stem, out);
}

/* Both files or none: both are on the disk before the first gets its name. */
static gboolean
write_files (const Choices *choices, const AntRecipe *recipe, const AntSimulated *simulated, GError **error)
{
  g_autoptr (AntWholeFile) record = ant_whole_file_open (choices->out, choices->force, error);
  if (!record)
    return FALSE;
  g_autoptr (AntWholeFile) truth = ant_whole_file_open (choices->truth, choices->force, error);
  if (!truth)
    return FALSE;
  ant_simulation_write_record (recipe, simulated, ant_whole_file_stream (record));
  ant_simulation_write_truth (recipe, simulated, ant_whole_file_stream (truth));
  return ant_whole_file_finish (record, error) && ant_whole_file_finish (truth, error)
         && ant_whole_file_commit (g_steal_pointer (&record), error)
         && ant_whole_file_commit (g_steal_pointer (&truth), error);
}

static gboolean
simulate (const Choices *choices, const char *path, GError **error)
{
  AntStatus status;
  g_autoptr (AntRecipe) recipe = ant_recipe_load (path, error);
  if (!recipe || (choices->seed && !ant_recipe_set_seed (recipe, choices->seed, error)))
    return FALSE;
  AntSimulated *simulated = ant_simulate (&recipe->scenario, &status);
  if (!simulated)
    return ant_status_to_error (status, _("simulating the record"), error);
  gboolean written = write_files (choices, recipe, simulated, error);
  ant_simulated_free (simulated);
  return written;
}

int
ant_verb_simulate (int argc, char **argv)
{
  g_auto (Choices) choices = { 0 };
  const GOptionEntry entries[] = {
    { "out", 'o', 0, G_OPTION_ARG_FILENAME, &choices.out, N_("write the record to FILE"), N_("FILE") },
    { "truth", 't', 0, G_OPTION_ARG_FILENAME, &choices.truth,
      N_("write what is in it to FILE (default: beside the record, with “-truth.csv”)"), N_("FILE") },
    { "seed", 's', 0, G_OPTION_ARG_STRING, &choices.seed, N_("draw with this seed, not the recipe's"), N_("N") },
    { "force", 'f', 0, G_OPTION_ARG_NONE, &choices.force, N_("replace files that are there"), NULL },
    { NULL }
  };
  g_autoptr (GOptionContext) context = g_option_context_new (_("RECIPE"));
  g_option_context_set_summary (context,
                                _("Makes a record with known dips, spots, gaps and faults from a recipe (a key file; "
                                   "docs/recipes.md).\nThe same recipe and seed give the same bytes."));
  g_option_context_add_main_entries (context, entries, NULL);

  g_autoptr (GError) error = NULL;
  if (!g_option_context_parse (context, &argc, &argv, &error))
    return ant_cli_fail (error);
  if (argc != 2)
    return ant_cli_fail_usage (_("simulate: found %d recipes, expected one"), argc - 1);
  if (!choices.out)
    return ant_cli_fail_usage (_("simulate: found no --out, expected --out FILE"));
  if (!choices.truth)
    choices.truth = truth_beside (choices.out);
  if (g_str_equal (choices.truth, choices.out))
    return ant_cli_fail_usage (_("simulate: found one name for the record and the truth, expected two"));
  if (!simulate (&choices, argv[1], &error))
    return ant_cli_fail (error);
  return ANT_EXIT_DONE;
}
