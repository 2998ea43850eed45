/* witness-options.c - witnesses by the command. */
#include "cli/witness-options.h"

#include <glib/gi18n.h>

#include "data/error.h"
#include "jobs/witness-job.h"

void
ant_witness_options_add (GOptionContext *context, AntWitnessOptions *options)
{
  const GOptionEntry entries[] = {
    { "witness", 0, 0, G_OPTION_ARG_FILENAME_ARRAY, &options->files,
      N_("compare with another instrument's record, its columns perhaps behind ::; up to four times"), N_("FILE[::COLUMNS]") },
    { NULL }
  };
  g_option_context_add_main_entries (context, entries, NULL);
}

void
ant_witness_options_clear (AntWitnessOptions *options)
{
  g_clear_pointer (&options->files, g_strfreev);
}

gboolean
ant_witness_options_add_to (const AntWitnessOptions *options, GPtrArray *witnesses, GError **error)
{
  guint n = options->files ? g_strv_length (options->files) : 0;
  if (n + witnesses->len > ANT_MOST_WITNESSES)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("--witness: found %u files, expected %d at most"), n + witnesses->len, ANT_MOST_WITNESSES);
      return FALSE;
    }
  for (guint i = 0; i < n; i++)
    {
      AntWitness *witness = ant_witness_parse (options->files[i], error);
      if (!witness)
        return FALSE;
      g_ptr_array_add (witnesses, witness);
    }
  return TRUE;
}

GPtrArray *
ant_witnesses_open (GPtrArray *witnesses, AntRecord *record, const AntSettings *settings, GCancellable *cancellable, GError **error)
{
  g_autoptr (GPtrArray) comparisons = g_ptr_array_new_with_free_func ((GDestroyNotify) ant_comparison_unref);
  for (guint i = 0; i < witnesses->len; i++)
    {
      AntWitness *witness = g_ptr_array_index (witnesses, i);
      AntComparison *comparison = ant_witness_job_open (record, witness, settings, cancellable, error);
      if (!comparison)
        return NULL;
      g_ptr_array_add (comparisons, comparison);
      if (witness->sha256 && g_strcmp0 (witness->sha256, comparison->witness->sha256) != 0)
        g_printerr (_("antumbra-cli: %s: the bytes of this witness are not those that the analysis was made with\n"), witness->path);
      g_free (witness->sha256);
      witness->sha256 = g_strdup (comparison->witness->sha256);
    }
  return g_steal_pointer (&comparisons);
}

void
ant_witnesses_print (const GPtrArray *comparisons)
{
  for (guint i = 0; i < comparisons->len; i++)
    {
      const AntComparison *comparison = g_ptr_array_index (comparisons, i);
      g_autoptr (GPtrArray) words = ant_comparison_words (comparison);
      g_print (_("Witness %u, %s:\n"), i + 1, comparison->witness->path);
      for (guint k = 0; k < words->len; k++)
        g_print ("  - %s\n", (const char *) g_ptr_array_index (words, k));
    }
}

void
ant_witnesses_print_dip (const GPtrArray *comparisons, const AntSettings *settings, const AntDip *dip)
{
  for (guint i = 0; i < comparisons->len; i++)
    {
      const AntComparison *comparison = g_ptr_array_index (comparisons, i);
      AntWitnessFact fact;
      ant_witness_job_fact (comparison, settings, dip, &fact);
      if (fact.looking)
        g_print (_("Witness %u, %s: depth %.4g +- %.3g ppm.\n"), i + 1, comparison->witness->path, fact.depth_ppm, fact.sigma_ppm);
      else
        g_print (_("Witness %u, %s: not looking then.\n"), i + 1, comparison->witness->path);
    }
}
