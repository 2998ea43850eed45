/* fits-reader.c - a table of a FITS file to the rows of a record. */
#include "readers/fits-reader.h"

#include <float.h>
#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/error.h"
#include "readers/fits-headers.h"
#include "readers/fits-table.h"
#include "readers/fits-time.h"
#include "readers/table-record.h"
#include "readers/text-names.h"
#include "readers/time-columns.h"

#define MOST_NAMED 8

/* The file for CFITSIO: on the disk where it stands plain, not hashed yet; else in memory. */
typedef struct
{
  fitsfile *file;
  void *bytes; /* ours to free, or NULL */
  size_t n_bytes;
  int n_hdus;  /* that are safe to look at */
} Input;

/* Rows are read and the file is hashed at the same time. */
typedef struct
{
  AntByteSource *source; /* to hash, or NULL */
  AntFitsTable *table;
  AntTimeForm *form;
  const AntValueColumns *columns;
  GCancellable *cancellable;
  AntTableRows rows;
  GError *row_error, *hash_error;
} Work;

static gboolean
input_open (Input *input, AntByteSource *source, GCancellable *cancellable, GError **error)
{
  const char *name = ant_byte_source_name (source), *path = ant_byte_source_path (source);
  gsize n = 0;
  int status = 0;
  *input = (Input){ 0 };
  if (path)
    {
      n = ant_byte_source_file_size (source);
      g_autoptr (GMappedFile) map = g_mapped_file_new (path, FALSE, error);
      if (!map || !ant_fits_headers_check (name, g_mapped_file_get_contents (map), g_mapped_file_get_length (map), &input->n_hdus, error))
        return FALSE;
      fits_open_diskfile (&input->file, path, READONLY, &status);
    }
  else
    {
      if (!(input->bytes = ant_byte_source_take (source, &n, cancellable, error)))
        return FALSE;
      if (!ant_fits_headers_check (name, input->bytes, n, &input->n_hdus, error))
        return FALSE;
      input->n_bytes = n;
      fits_open_memfile (&input->file, "memory", READONLY, &input->bytes, &input->n_bytes, 0, NULL, &status);
    }
  input->n_bytes = n;
  return status == 0 || ant_fits_refuse (input->file, name, _("HDU 0"), status, error);
}

static void
input_close (Input *input)
{
  int status = 0;
  if (input->file)
    fits_close_file (input->file, &status);
  fits_clear_errmsg ();
  g_free (input->bytes);
}

/* A table's columns told: what time, value, error and quality are. */
static gboolean
tell_columns (AntFitsTable *table, const AntReadingChoices *choices, AntRecord *record, AntTimeForm *form,
              AntValueColumns *columns, GError **error)
{
  AntReadingChoices with_scale = choices ? *choices : (AntReadingChoices){ 0 };
  g_autofree char *scale = with_scale.time_scale ? NULL : g_strdup (ant_fits_time_scale (table, record));
  if (scale)
    with_scale.time_scale = scale;
  g_free (record->part);
  record->part = g_strdup (table->layout->place);
  ant_fits_time_prepare (table);
  if (!ant_time_columns_find (table->layout, &with_scale, record, form, error))
    return FALSE;
  ant_fits_time_apply (table, choices, record, form);
  return ant_value_columns_find (table->layout, form, choices, table->path, columns, error);
}

static void
forget_said (AntRecord *record)
{
  g_ptr_array_set_size (record->said, 0);
  ant_time_reference_clear (&record->time);
  record->time.own_unit_d = 1.0;
  record->stamp = ANT_AT_UNKNOWN;
  record->exposure_known = FALSE;
  record->exposure_d = 0.0;
}

/* The number of the HDU that a person asked for; -1 with one sentence. */
static int
asked_hdu (fitsfile *file, const char *path, const char *asked, int n_hdus, GError **error)
{
  char *end;
  guint64 number = g_ascii_strtoull (asked, &end, 10);
  if (end != asked && *end == 0 && number < (guint64) n_hdus)
    return (int) number;
  for (int hdu = 0; hdu < n_hdus; hdu++)
    {
      char name[FLEN_VALUE];
      int status = 0;
      if (!fits_movabs_hdu (file, hdu + 1, NULL, &status) && !fits_read_key (file, TSTRING, "EXTNAME", name, NULL, &status)
          && !g_ascii_strcasecmp (name, asked))
        return hdu;
    }
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: no HDU “%s”; expected a name, or a number from 0 to %d"), path, asked,
               n_hdus - 1);
  return -1;
}

static gboolean
no_table (const char *path, GPtrArray *seen, const GError *first, GError **error)
{
  g_autoptr (GString) names = g_string_new (NULL);
  for (guint i = 0; i < MIN (seen->len, MOST_NAMED); i++)
    g_string_append_printf (names, "%s%s", i ? ", " : "", (const char *) g_ptr_array_index (seen, i));
  if (seen->len == 1 && first)
    g_propagate_error (error, g_error_copy (first));
  else if (seen->len == 0)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: HDU 0: found no table in the file, expected one of times and values"), path);
  else
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
                 _("%s: found the tables %s%s, expected one with a column that looks like a time; choose with --hdu and --column"), path,
                 names->str, seen->len > MOST_NAMED ? ", …" : "");
  return FALSE;
}

/* The HDU asked for, else the first table with a time and a value. */
static AntFitsTable *
choose_table (const Input *input, const char *path, const AntReadingChoices *choices, AntRecord *record, AntTimeForm *form,
              AntValueColumns *columns, GError **error)
{
  int status = 0;
  g_autoptr (GPtrArray) seen = g_ptr_array_new_with_free_func (g_free);
  g_autoptr (GError) first = NULL;
  gboolean is_asked = choices && choices->hdu;
  int asked = is_asked ? asked_hdu (input->file, path, choices->hdu, MAX (input->n_hdus, 1), error) : -1;
  if (is_asked && asked < 0)
    return NULL;
  for (int hdu = is_asked ? asked : 0; hdu < (is_asked ? asked + 1 : MAX (input->n_hdus, 1)); hdu++)
    {
      int type = IMAGE_HDU;
      g_autoptr (GError) here = NULL;
      status = 0;
      if (!is_asked && (fits_movabs_hdu (input->file, hdu + 1, &type, &status) || type == IMAGE_HDU))
        continue;
      g_autoptr (AntFitsTable) table = ant_fits_table_open (input->file, path, (gint64) input->n_bytes, hdu, &here);
      forget_said (record);
      if (table && tell_columns (table, choices, record, form, columns, &here) && (is_asked || table->n_samples > 1))
        return g_steal_pointer (&table);
      if (is_asked || g_error_matches (here, ANT_ERROR, ANT_ERROR_USAGE))
        {
          g_propagate_error (error, g_steal_pointer (&here));
          return NULL;
        }
      status = 0;
      fits_movabs_hdu (input->file, hdu + 1, NULL, &status);
      g_ptr_array_add (seen, ant_fits_place (input->file, hdu));
      if (!first && here)
        first = g_steal_pointer (&here);
    }
  no_table (path, seen, first, error);
  return NULL;
}

static void
say_table (const AntFitsTable *table, gboolean packed, gboolean asked, AntRecord *record)
{
  g_autofree char *rows = table->in_cell > 1
                              ? g_strdup_printf (_("%zu samples in vector cells"), (gsize) table->n_samples)
                              : g_strdup_printf (_("%zu rows"), (gsize) table->n_samples);
  g_autofree char *sentence
      = g_strdup_printf (asked ? _("%s was asked for: %s, %u columns%s.") : _("%s is the first table with a time: %s, %u columns%s."),
                         table->layout->place, rows, table->layout->n_columns, packed ? _(", packed by gzip") : "");
  g_ptr_array_insert (record->said, 0, g_steal_pointer (&sentence));
  if (table->left_out->len == 0)
    return;
  g_autoptr (GString) names = g_string_new (NULL);
  for (guint i = 0; i < MIN (table->left_out->len, MOST_NAMED); i++)
    g_string_append_printf (names, "%s%s", i ? ", " : "", (const char *) g_ptr_array_index (table->left_out, i));
  ant_record_say (record, _("Columns that are neither numbers, dates nor series of this length are left out: %s%s."), names->str,
                  table->left_out->len > MOST_NAMED ? ", …" : "");
}

/* One block of the time's parts as cells, numbers or texts. */
typedef struct
{
  gint64 block;
  double *numbers[ANT_MOST_TIME_PARTS];
  char **texts[ANT_MOST_TIME_PARTS];
  AntCell cells[ANT_MOST_TIME_PARTS];
} TimeBlock;

static void
time_block_init (TimeBlock *times, const AntFitsTable *table, const AntTimeForm *form, gint64 block)
{
  *times = (TimeBlock){ .block = block };
  for (guint p = 0; p < form->n_parts; p++)
    {
      const AntFitsSeries *series = &table->series[form->columns[p]];
      if (!series->is_text)
        {
          times->numbers[p] = g_new (double, block);
          continue;
        }
      times->texts[p] = g_new (char *, block);
      times->texts[p][0] = g_malloc0 ((gsize) block * (series->text_width + 1));
      for (gint64 i = 1; i < block; i++)
        times->texts[p][i] = times->texts[p][0] + i * (series->text_width + 1);
    }
}

static void
time_block_clear (TimeBlock *times)
{
  for (guint p = 0; p < ANT_MOST_TIME_PARTS; p++)
    {
      g_free (times->numbers[p]);
      if (times->texts[p])
        g_free (times->texts[p][0]);
      g_free (times->texts[p]);
    }
}

static gboolean
time_block_read (TimeBlock *times, AntFitsTable *table, const AntTimeForm *form, gint64 from, gint64 n, GError **error)
{
  for (guint p = 0; p < form->n_parts; p++)
    if (times->texts[p] ? !ant_fits_table_read_text (table, form->columns[p], from, n, times->texts[p], error)
                        : !ant_fits_table_read (table, form->columns[p], from, n, times->numbers[p], error))
      return FALSE;
  return TRUE;
}

static void
note_no_time (AntTableRows *rows, gint64 row, const TimeBlock *times, gint64 i)
{
  if (rows->n_no_time++ > 0)
    return;
  rows->first_no_time = (guint32) row + 1;
  if (times->texts[0])
    rows->no_time_text = ant_text_excerpt (times->texts[0][i], times->texts[0][i] + strlen (times->texts[0][i]), 40);
  else
    rows->no_time_text = g_strdup_printf ("%g", times->numbers[0][i]);
}

static void
take_times (TimeBlock *times, AntTimeForm *form, gint64 from, gint64 n, AntTableRows *rows)
{
  const AntCell *cells[ANT_MOST_TIME_PARTS];
  for (guint p = 0; p < form->n_parts; p++)
    cells[p] = &times->cells[p];
  for (gint64 i = 0; i < n; i++)
    {
      for (guint p = 0; p < form->n_parts; p++)
        if (times->texts[p])
          ant_cell_next (times->texts[p][i], times->texts[p][i] + strlen (times->texts[p][i]), '\t', &times->cells[p]);
        else
          times->cells[p] = (AntCell){ .number = times->numbers[p][i], .kind = ANT_CELL_NUMBER };
      rows->time_d[from + i] = ant_time_form_read (form, cells);
      rows->line[from + i] = (guint32) (from + i + 1);
      if (isnan (rows->time_d[from + i]))
        note_no_time (rows, from + i, times, i);
    }
}

static gboolean
read_block (AntFitsTable *table, const AntValueColumns *columns, gint64 from, gint64 n, double *scratch, AntTableRows *rows,
            GError **error)
{
  for (guint v = 0; v < columns->n_values; v++)
    if (!ant_fits_table_read (table, columns->values[v], from, n, rows->values[v] + from, error))
      return FALSE;
  for (guint f = 0; f < columns->n_further; f++)
    {
      if (!ant_fits_table_read (table, columns->further[f], from, n, scratch, error))
        return FALSE;
      for (gint64 i = 0; i < n; i++)
        rows->further[f][from + i] = fabs (scratch[i]) <= (double) FLT_MAX ? (float) scratch[i] : NAN;
    }
  if (columns->error >= 0 && !ant_fits_table_read (table, (guint) columns->error, from, n, rows->error + from, error))
    return FALSE;
  return columns->quality < 0
         || ant_fits_table_read_whole (table, (guint) columns->quality, from, n, rows->quality + from, error);
}

static gboolean
read_rows (AntFitsTable *table, AntTimeForm *form, const AntValueColumns *columns, GCancellable *cancellable, AntTableRows *rows,
           GError **error)
{
  TimeBlock times;
  gint64 block = MIN (ant_fits_table_block (table), MAX (table->n_samples, 1));
  g_autofree double *scratch = g_new (double, block);
  gboolean good = TRUE;
  ant_table_rows_expect (rows, columns, MAX ((gsize) table->n_samples, 1));
  rows->n = (gsize) table->n_samples;
  time_block_init (&times, table, form, block);
  for (gint64 from = 0; from < table->n_samples && good; from += block)
    {
      gint64 n = MIN (block, table->n_samples - from);
      good = !g_cancellable_set_error_if_cancelled (cancellable, error)
             && time_block_read (&times, table, form, from, n, error)
             && read_block (table, columns, from, n, scratch, rows, error);
      if (good)
        take_times (&times, form, from, n, rows);
    }
  time_block_clear (&times);
  return good;
}

static const char *
title (void *work, size_t stage)
{
  return "reading rows";
}

static size_t
count (void *work, size_t stage)
{
  return 2;
}

static AntStatus
run_slice (void *data, size_t stage, size_t slice)
{
  Work *work = data;
  gsize n;
  if (slice == 1)
    read_rows (work->table, work->form, work->columns, work->cancellable, &work->rows, &work->row_error);
  else if (work->source)
    ant_byte_source_drain (work->source, &n, work->cancellable, &work->hash_error);
  return ANT_OK;
}

static AntStatus
finish (void *work, size_t stage)
{
  return ANT_OK;
}

static gboolean
read_and_hash (Work *work, const AntSliceRunner *runner, GError **error)
{
  static const AntStages stages = { .n_stages = 1, .title = title, .count = count, .run_slice = run_slice, .finish = finish };
  if (runner && work->source)
    runner->run (&stages, work, NULL, runner->data); /* both slices look at the cancellable themselves */
  else
    for (size_t slice = 0; slice < 2; slice++)
      run_slice (work, 0, slice);
  GError **first = work->row_error ? &work->row_error : &work->hash_error;
  if (*first)
    g_propagate_error (error, g_steal_pointer (first));
  else
    return TRUE;
  g_clear_error (&work->hash_error);
  return FALSE;
}

gboolean
ant_fits_reader_read (AntByteSource *source, const AntReadingChoices *choices, const AntSliceRunner *runner,
                      GCancellable *cancellable, AntRecord *record, GError **error)
{
  Input input;
  AntTimeForm form;
  AntValueColumns columns;
  Work work = { .form = &form, .columns = &columns, .cancellable = cancellable };
  gboolean done = FALSE;
  if (input_open (&input, source, cancellable, error))
    {
      g_autoptr (AntFitsTable) table = choose_table (&input, record->path, choices, record, &form, &columns, error);
      if (table)
        {
          work.table = table;
          work.source = input.bytes ? NULL : source;
          say_table (table, ant_byte_source_is_packed (source), choices && choices->hdu, record);
          ant_table_record_say_time (table->layout, &form, record);
          done = read_and_hash (&work, runner, error)
                 && ant_table_record_fill (&work.rows, table->layout, &form, &columns, choices, record, error);
        }
    }
  ant_table_rows_clear (&work.rows);
  input_close (&input);
  return done;
}
