/* result-files.c - the tables of a scan, one after the other. */
#include "writers/result-files.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"
#include "writers/dip-table.h"
#include "writers/flags-table.h"
#include "writers/passage-table.h"
#include "writers/repeat-table.h"
#include "writers/scan-tables.h"
#include "writers/series-table.h"
#include "writers/witness-table.h"

static const struct
{
  const char *stem;
  gboolean is_series, votable;
} tables[ANT_N_RESULT_TABLES] = {
  [ANT_RESULT_DIPS] = { "dips", FALSE, TRUE },
  [ANT_RESULT_BRIGHTENINGS] = { "brightenings", FALSE, TRUE },
  [ANT_RESULT_PASSAGES] = { "passages", FALSE, TRUE },
  [ANT_RESULT_REPEATS] = { "repeats", FALSE, TRUE },
  [ANT_RESULT_PERIODS] = { "periods", FALSE, FALSE },
  [ANT_RESULT_SERIES] = { "series", TRUE, FALSE },
};

/* In CSV only: they tell of the noise model, piece by piece. */
static const struct
{
  const char *name;
  GString *(*text) (const AntScanResults *results);
} texts[] = {
  { "floor.csv", ant_floor_table_text },
  { "spectrum.csv", ant_spectrum_table_text },
  { "chunks.csv", ant_chunks_table_text },
};

gboolean
ant_result_choice_parse (AntResultChoice *choice, const char *text, GError **error)
{
  g_auto (GStrv) words = g_strsplit (*text ? text : " ", ",", -1);
  for (char **word = words; *word; word++)
    {
      gboolean fits = g_strcmp0 (*word, ant_table_format_name (ANT_TABLE_FITS)) == 0;
      gboolean votable = g_strcmp0 (*word, ant_table_format_name (ANT_TABLE_VOTABLE)) == 0;
      if (!fits && !votable)
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("“%s” is no further format of tables; expected fits, votable or both with a comma between"),
                       *word);
          return FALSE;
        }
      choice->fits |= fits;
      choice->votable |= votable;
    }
  return TRUE;
}

static gboolean
wanted (const AntResultChoice *choice, AntResultTable which, AntTableFormat format)
{
  if (tables[which].is_series && !choice->series)
    return FALSE;
  return format == ANT_TABLE_CSV || (format == ANT_TABLE_FITS && choice->fits)
         || (format == ANT_TABLE_VOTABLE && choice->votable && tables[which].votable);
}

static char *
file_name (AntResultTable which, AntTableFormat format)
{
  return g_strconcat (tables[which].stem, ant_table_ending (format), NULL);
}

static char *
witness_name (guint i)
{
  return g_strdup_printf ("witness-%u.csv", i + 1);
}

char **
ant_result_file_names (const AntResultChoice *choice)
{
  GStrvBuilder *names = g_strv_builder_new ();
  for (AntResultTable which = 0; which < ANT_N_RESULT_TABLES; which++)
    for (AntTableFormat format = 0; format < ANT_N_TABLE_FORMATS; format++)
      if (wanted (choice, which, format))
        {
          g_autofree char *name = file_name (which, format);
          g_strv_builder_add (names, name);
        }
  for (gsize i = 0; i < G_N_ELEMENTS (texts); i++)
    g_strv_builder_add (names, texts[i].name);
  g_strv_builder_add (names, "flags.csv");
  if (choice->fits)
    g_strv_builder_add (names, "flags.fits");
  for (guint i = 0; i < choice->witnesses; i++)
    {
      g_autofree char *name = witness_name (i);
      g_strv_builder_add (names, name);
    }
  g_strv_builder_add (names, ANT_ANALYSIS_FILE_NAME);
  char **all = g_strv_builder_end (names);
  g_strv_builder_unref (names);
  return all;
}

static AntTable *
list_table (const AntScanResults *results, const AntJudgements *judgements, gboolean brightenings)
{
  AntDipList list = ant_scan_results_list (results, brightenings);
  list.judgements = judgements;
  return ant_dip_table_new (results->record, &list);
}

AntTable *
ant_result_table_new (AntResultTable which, const AntScanResults *results, const AntJudgements *judgements)
{
  switch (which)
    {
    case ANT_RESULT_DIPS: return list_table (results, judgements, FALSE);
    case ANT_RESULT_BRIGHTENINGS: return list_table (results, judgements, TRUE);
    case ANT_RESULT_PASSAGES: return ant_passage_table_new (results);
    case ANT_RESULT_REPEATS: return ant_repeat_table_new (results);
    case ANT_RESULT_PERIODS: return ant_period_table_new (results);
    case ANT_RESULT_SERIES: return ant_series_table_new (results);
    case ANT_N_RESULT_TABLES: break;
    }
  g_return_val_if_reached (NULL);
}

static gboolean
add_table (AntOutputDir *dir, const AntTable *table, AntTableFormat format, const char *name, GError **error)
{
  g_autoptr (GBytes) bytes = ant_table_bytes (table, format, error);
  gsize size;
  const char *contents = bytes ? g_bytes_get_data (bytes, &size) : NULL;
  return bytes && ant_output_dir_add (dir, name, contents, size, error);
}

static gboolean
add_text (AntOutputDir *dir, GString *text, const char *name, GError **error)
{
  gboolean good = ant_output_dir_add (dir, name, text->str, text->len, error);
  g_string_free (text, TRUE);
  return good;
}

static gboolean
add_flags (AntOutputDir *dir, const AntScanResults *results, const AntResultChoice *choice, GError **error)
{
  if (!add_text (dir, ant_flags_table_text (results->record, results->flags), "flags.csv", error))
    return FALSE;
  g_autoptr (AntTable) mask = choice->fits ? ant_mask_table_new (results->record, results->flags) : NULL;
  return !mask || add_table (dir, mask, ANT_TABLE_FITS, "flags.fits", error);
}

static gboolean
add_witnesses (AntOutputDir *dir, const GPtrArray *comparisons, GError **error)
{
  for (guint i = 0; comparisons && i < comparisons->len; i++)
    {
      g_autofree char *name = witness_name (i);
      if (!add_text (dir, ant_witness_table_text (g_ptr_array_index (comparisons, i)), name, error))
        return FALSE;
    }
  return TRUE;
}

gboolean
ant_result_files_add (AntOutputDir *dir, const AntFindings *findings, const AntResultChoice *choice, GError **error)
{
  const AntScanResults *results = findings->results;
  const char *analysis = findings->analysis;
  for (AntResultTable which = 0; which < ANT_N_RESULT_TABLES; which++)
    {
      if (!wanted (choice, which, ANT_TABLE_CSV))
        continue;
      g_autoptr (AntTable) table = ant_result_table_new (which, results, findings->judgements);
      for (AntTableFormat format = 0; table && format < ANT_N_TABLE_FORMATS; format++)
        {
          g_autofree char *name = file_name (which, format);
          if (wanted (choice, which, format) && !add_table (dir, table, format, name, error))
            return FALSE;
        }
    }
  for (gsize i = 0; i < G_N_ELEMENTS (texts); i++)
    if (!add_text (dir, texts[i].text (results), texts[i].name, error))
      return FALSE;
  return add_flags (dir, results, choice, error) && add_witnesses (dir, findings->comparisons, error)
         && (!analysis || ant_output_dir_add (dir, ANT_ANALYSIS_FILE_NAME, analysis, strlen (analysis), error));
}
