/* text-slices.c - reading, slicing and hashing of batches; the rows of a slice are table-rows.c's. */
#include "readers/text-slices.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"

#define SLICE (512 * 1024)
#define MOST_SLICES 16
#define BATCH (SLICE * MOST_SLICES) /* bytes in flight: memory does not grow with the file */
#define PADDING 8                   /* bytes behind the text that numbers may look at */
#define FIRST_BATCH SLICE           /* a short file needs no more room */

typedef struct
{
  AntRowParser *parser;
  AntTableRows rows;
  const char *start, *end;
  AntRowsFault fault;
} Slice;

typedef struct
{
  AntByteSource *source;
  const AntValueColumns *columns;
  gboolean hashes;       /* here, as one more slice of the batch */
  char *buffer;          /* [room + 1 + PADDING] */
  gsize room, filled;    /* of the buffer; the bytes read so far */
  gsize n_hashed;        /* bytes at its start that are hashed already */
  gsize n_taken;         /* bytes of whole lines before the buffer */
  gboolean at_end, foreseen;
  Slice slices[MOST_SLICES];
  gsize n_slices;
} Batch;

static const char *
title (void *work, size_t stage)
{
  return "reading rows";
}

static size_t
count (void *work, size_t stage)
{
  const Batch *batch = work;
  return batch->n_slices + (batch->hashes ? 1 : 0);
}

/* The hash goes first: it cannot be shared out. */
static AntStatus
run_slice (void *work, size_t stage, size_t number)
{
  Batch *batch = work;
  if (batch->hashes && number == 0)
    {
      ant_byte_source_hash (batch->source, batch->buffer + batch->n_hashed, batch->filled - batch->n_hashed);
      return ANT_OK;
    }
  Slice *slice = &batch->slices[number - (batch->hashes ? 1 : 0)];
  slice->fault = ant_table_rows_parse (&slice->rows, slice->parser, slice->start, slice->end);
  return ANT_OK;
}

static AntStatus
finish (void *work, size_t stage)
{
  return ANT_OK;
}

static const AntStages stages = { .n_stages = 1, .title = title, .count = count, .run_slice = run_slice, .finish = finish };

/* Fill the buffer; the last line of the file may lack its end. */
static gboolean
fill (Batch *batch, GCancellable *cancellable, GError **error)
{
  while (!batch->at_end && batch->filled < batch->room)
    {
      if (g_cancellable_set_error_if_cancelled (cancellable, error))
        return FALSE;
      gssize got = ant_byte_source_read (batch->source, batch->buffer + batch->filled, MIN (batch->room - batch->filled, (gsize) SLICE), error);
      if (got < 0)
        return FALSE;
      batch->filled += (gsize) got;
      batch->at_end = got == 0;
    }
  return TRUE;
}

/* Cut at the line ends next to multiples of SLICE. Returns how many bytes the slices hold: whole lines only. */
static gsize
cut_slices (Batch *batch)
{
  const char *start = batch->buffer, *end = batch->buffer + batch->filled;
  const char *last = start && batch->filled ? memrchr (start, '\n', batch->filled) : NULL;
  end = last ? last + 1 : start;
  for (batch->n_slices = 0; start < end; batch->n_slices++)
    {
      Slice *slice = &batch->slices[batch->n_slices];
      const char *newline = end - start > SLICE ? memchr (start + SLICE, '\n', (gsize) (end - start - SLICE)) : NULL;
      slice->start = start;
      start = slice->end = newline ? newline + 1 : end;
    }
  return (gsize) (end - batch->buffer);
}

static gboolean
refuse (const Batch *batch, AntRowsFault fault, guint32 line, GError **error)
{
  const char *name = ant_byte_source_name (batch->source);
  if (fault == ANT_ROWS_NUL)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: line %u: found a NUL byte, expected text"), name, line);
  else
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: line %u: found a line longer than %d bytes, expected a row of a table"), name,
                 line, ANT_LONGEST_LINE);
  return FALSE;
}

static gboolean
run_batch (Batch *batch, const AntSliceRunner *runner, GCancellable *cancellable, GError **error)
{
  AntStatus status = ANT_OK;
  if (runner && batch->n_slices > 1)
    status = runner->run (&stages, batch, cancellable, runner->data);
  else
    for (gsize i = 0; i < count (batch, 0); i++)
      run_slice (batch, 0, i);
  if (status == ANT_STOPPED && g_cancellable_set_error_if_cancelled (cancellable, error))
    return FALSE;
  return ant_status_to_error (status, _("reading rows"), error);
}

/* The rows of the slices in their order, up to the first fault. */
static gboolean
gather (Batch *batch, AntTableRows *rows, GError **error)
{
  for (gsize i = 0; i < batch->n_slices; i++)
    {
      Slice *slice = &batch->slices[i];
      if (rows->n_lines > G_MAXUINT32 - 1 - slice->rows.n_lines)
        return refuse (batch, ANT_ROWS_LONG_LINE, G_MAXUINT32, error);
      ant_table_rows_append (rows, &slice->rows, batch->columns);
      if (slice->fault != ANT_ROWS_GOOD)
        return refuse (batch, slice->fault, rows->n_lines + 1, error);
    }
  return TRUE;
}

/* The rows of a plain file, by its size and the first of them: arrays that grow a piece at a time are moved again and again. */
static void
foresee (Batch *batch, AntTableRows *rows)
{
  gsize size = ant_byte_source_is_packed (batch->source) ? 0 : ant_byte_source_file_size (batch->source);
  if (!batch->foreseen && rows->n > 0 && size > batch->n_taken)
    ant_table_rows_expect (rows, batch->columns, (gsize) (1.02 * (double) rows->n * ((double) size / (double) batch->n_taken)));
  batch->foreseen = TRUE;
}

/* Keep what is behind the last line end, and make the buffer as large as batches are. */
static gboolean
go_on (Batch *batch, gsize used, const AntTableRows *rows, GError **error)
{
  gsize rest = batch->filled - used;
  if (rest > ANT_LONGEST_LINE)
    return refuse (batch, memchr (batch->buffer + used, 0, rest) ? ANT_ROWS_NUL : ANT_ROWS_LONG_LINE, rows->n_lines + 1, error);
  memmove (batch->buffer, batch->buffer + used, rest);
  batch->filled = batch->n_hashed = rest;
  if (!batch->at_end && batch->room < BATCH)
    {
      batch->room = BATCH;
      batch->buffer = g_renew (char, batch->buffer, batch->room + 1 + PADDING);
    }
  return TRUE;
}

static gboolean
read_batches (Batch *batch, AntTableRows *rows, AntTimeForm *form, const AntSliceRunner *runner, GCancellable *cancellable,
              GError **error)
{
  for (gboolean done = FALSE; !done;)
    {
      if (!fill (batch, cancellable, error))
        return FALSE;
      done = batch->at_end;
      gsize n_read = batch->filled;
      if (batch->at_end && batch->filled > 0 && batch->buffer[batch->filled - 1] != '\n')
        batch->buffer[batch->filled++] = '\n';
      gsize used = cut_slices (batch);
      if (!form->started)
        ant_row_parser_start_form (batch->slices[0].parser, batch->buffer, batch->buffer + used, form);
      for (gsize i = 0; i < batch->n_slices; i++)
        ant_row_parser_set_form (batch->slices[i].parser, form);
      gsize with_end = batch->filled;
      batch->filled = n_read; /* the newline that was added is no byte of the file */
      if (!run_batch (batch, runner, cancellable, error) || !gather (batch, rows, error))
        return FALSE;
      batch->filled = with_end;
      batch->n_taken += used;
      if (!done)
        foresee (batch, rows);
      if (!done && !go_on (batch, used, rows, error))
        return FALSE;
    }
  return TRUE;
}

gboolean
ant_text_slices_read (AntTableRows *rows, AntLineSource *lines, const AntTableLayout *layout, AntTimeForm *form,
                      const AntValueColumns *columns, const AntSliceRunner *runner, GError **error)
{
  Batch batch = { .source = lines->source, .columns = columns, .room = MAX (lines->filled, FIRST_BATCH), .at_end = lines->at_end };
  const char *start, *end;
  while (lines->line + 1 < layout->first_row)
    if (ant_line_source_next (lines, &start, &end, error) != 1)
      return FALSE; /* cannot be: the layout has seen them */
  batch.filled = batch.n_hashed = lines->filled - lines->at;
  batch.buffer = g_malloc0 (batch.room + 1 + PADDING);
  memcpy (batch.buffer, lines->buffer + lines->at, batch.filled);
  batch.hashes = ant_byte_source_leave_hashing (lines->source);
  rows->n_lines = lines->line;
  for (gsize i = 0; i < MOST_SLICES; i++)
    batch.slices[i].parser = ant_row_parser_new (layout, form, columns);
  gboolean good = read_batches (&batch, rows, form, runner, lines->cancellable, error);
  for (gsize i = 0; i < MOST_SLICES; i++)
    {
      ant_row_parser_free (batch.slices[i].parser);
      ant_table_rows_clear (&batch.slices[i].rows);
    }
  g_free (batch.buffer);
  return good;
}
