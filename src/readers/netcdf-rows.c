/* netcdf-rows.c - names, units and values of NetCDF variables as a table, its time by the CF conventions where it has them. */
#include "readers/netcdf-rows.h"

#include <float.h>
#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "data/error.h"
#include "readers/cf-time.h"
#include "readers/netcdf-values.h"
#include "readers/table-record.h"
#include "readers/text-names.h"
#include "readers/time-columns.h"

#define SAMPLE 1024      /* rows studied to tell what a column holds */
#define LEAST_SHARED 100000 /* rows that are worth threads */
#define SAME_WIDTH 1e-6  /* relative: intervals of one length */
#define AT_EDGE 0.01     /* of an interval */

typedef struct
{
  const AntNetcdfContents *contents;
  const AntNetcdfColumns *columns;
  AntNetcdfColumn column[ANT_NETCDF_MOST_COLUMNS + 2];
  AntNetcdfPacking packing[ANT_NETCDF_MOST_COLUMNS];
  AntNetcdfTally tally[ANT_NETCDF_MOST_COLUMNS]; /* of those read as values */
  AntTableLayout *layout;
  AntRecord *record;
} Work;

static const AntNetcdfVariable *
variable_of (const Work *work, guint c)
{
  return g_ptr_array_index (work->contents->variables, work->columns->column[c].variable);
}

static const char *
row_name (const Work *work)
{
  const AntNetcdfDimension *rows = g_ptr_array_index (work->contents->dimensions, work->columns->row_dimension);
  return rows->name;
}

static double
value_at (const Work *work, guint c, gsize row)
{
  AntNetcdfTally tally = { 0 };
  return ant_netcdf_unpack (&work->packing[c], ant_netcdf_column_real (&work->column[c], row), &tally);
}

/* What the columns hold, judged on rows spread over the file, as for a table of text. */
static void
study (Work *work)
{
  gsize step = 1 + work->columns->n_rows / SAMPLE;
  for (guint c = 0; c < work->columns->n_columns; c++)
    {
      double previous = (double) NAN;
      for (gsize row = 0; row < work->columns->n_rows; row += step)
        {
          char text[G_ASCII_DTOSTR_BUF_SIZE];
          double value = value_at (work, c, row);
          g_ascii_dtostr (text, sizeof text, value);
          AntCell cell = { text, text + strlen (text), value, isnan (value) ? ANT_CELL_MISSING : ANT_CELL_NUMBER };
          ant_table_column_study (&work->layout->columns[c], &cell, &previous);
        }
    }
}

static void
make_layout (Work *work)
{
  work->layout = ant_table_layout_new (work->columns->n_columns);
  for (guint c = 0; c < work->columns->n_columns; c++)
    {
      const AntNetcdfVariable *variable = variable_of (work, c);
      AntTableColumn *column = &work->layout->columns[c];
      work->packing[c] = ant_netcdf_packing (variable);
      column->name = g_strdup (work->columns->column[c].name);
      column->unit = g_strdup (ant_netcdf_text (variable->attributes, "units"));
      column->remark = g_strdup (ant_netcdf_text (variable->attributes, "long_name"));
    }
  work->layout->place = g_strdup_printf (_("dimension %s"), row_name (work));
  work->record->part = g_strdup (work->layout->place);
  ant_table_layout_label (work->layout);
  study (work);
}

static gboolean
mostly_there (const AntTableColumn *column)
{
  return 2 * column->n_numbers > column->n_cells && column->n_up + column->n_down > 0;
}

/* The name of a column among the blank-separated words that `fits`; NULL if there is none. */
static const char *
ancillary (const Work *work, const AntNetcdfVariable *value, gboolean (*fits) (const AntNetcdfVariable *))
{
  const char *text = ant_netcdf_text (value->attributes, "ancillary_variables");
  g_auto (GStrv) names = g_strsplit (text ? text : "", " ", -1);
  for (guint i = 0; names[i]; i++)
    {
      int found = *names[i] ? ant_table_layout_column (work->layout, names[i]) : -1;
      if (found >= 0 && fits (variable_of (work, (guint) found)))
        return work->layout->columns[found].name;
    }
  return NULL;
}

static gboolean
holds_flags (const AntNetcdfVariable *variable)
{
  return ant_netcdf_text (variable->attributes, "flag_meanings") != NULL;
}

static gboolean
holds_errors (const AntNetcdfVariable *variable)
{
  const char *name = ant_netcdf_text (variable->attributes, "standard_name");
  return name && strstr (name, "standard_error");
}

/* The user's choices, and where those are silent what the file says outright: which column is an irradiance, which others
 * belong to it. Names alone decide the rest. */
static void
complete_choices (const Work *work, AntReadingChoices *choices)
{
  for (guint c = 0; c < work->layout->n_columns && !choices->value_column; c++)
    {
      static const char *const error_words[] = { "error", "err", "sigma", "unc", "uncertainty", "std", "stdev", "sd", "precision",
                                                 "accuracy", "deviation", NULL };
      const AntTableColumn *column = &work->layout->columns[c];
      const char *unit = column->unit ? ant_text_known_unit (column->unit) : NULL;
      if (unit && !strcmp (unit, "W/m2") && mostly_there (column) && !ant_table_column_has_word (column, error_words))
        choices->value_column = g_strdup (column->name);
    }
  int value = choices->value_column ? ant_table_layout_column (work->layout, choices->value_column) : -1;
  if (value < 0)
    return;
  if (!choices->quality_column)
    choices->quality_column = g_strdup (ancillary (work, variable_of (work, (guint) value), holds_flags));
  if (!choices->error_column)
    choices->error_column = g_strdup (ancillary (work, variable_of (work, (guint) value), holds_errors));
}

static gboolean
find_time (const Work *work, const AntReadingChoices *choices, AntCfTime *cf, AntTimeForm *form, GError **error)
{
  if (work->columns->time_column < 0)
    return ant_time_columns_find (work->layout, choices, work->record, form, error);
  const AntNetcdfVariable *time = variable_of (work, (guint) work->columns->time_column);
  *form = (AntTimeForm){ .style = ANT_STAMP_DAYS, .unit_d = 1.0, .n_parts = 1, .columns = { (guint) work->columns->time_column } };
  const char *calendar = ant_netcdf_text (time->attributes, "calendar");
  if (ant_cf_time_parse (ant_netcdf_text (time->attributes, "units"), calendar, ant_netcdf_text (time->attributes, "units_metadata"),
                         choices->time_scale, cf, error))
    return TRUE;
  g_prefix_error (error, "%s: %s: ", work->record->path, time->name);
  return FALSE;
}

static void
read_times (const Work *work, AntCfTime *cf, AntTimeForm *form, AntTableRows *rows)
{
  for (gsize i = 0; i < rows->n; i++)
    {
      if (work->columns->time_column >= 0)
        rows->time_d[i] = ant_cf_time_read (cf, value_at (work, (guint) work->columns->time_column, i));
      else
        {
          AntCell cells[ANT_MOST_TIME_PARTS];
          const AntCell *parts[ANT_MOST_TIME_PARTS];
          char text[ANT_MOST_TIME_PARTS][G_ASCII_DTOSTR_BUF_SIZE];
          for (guint p = 0; p < form->n_parts; p++)
            {
              double value = value_at (work, form->columns[p], i);
              g_ascii_dtostr (text[p], sizeof text[p], value);
              cells[p] = (AntCell){ text[p], text[p] + strlen (text[p]), value, isnan (value) ? ANT_CELL_MISSING : ANT_CELL_NUMBER };
              parts[p] = &cells[p];
            }
          rows->time_d[i] = ant_time_form_read (form, parts);
        }
      rows->line[i] = (guint32) (i + 1);
      if (isnan (rows->time_d[i]) && rows->n_no_time++ == 0)
        {
          rows->first_no_time = rows->line[i];
          rows->no_time_text = g_strdup_printf ("%.10g", ant_netcdf_column_real (&work->column[form->columns[0]], i));
        }
    }
}

/* Doubles with no more than one fill value and nothing to be done to them: most large columns. */
static gboolean
is_plain (const AntNetcdfColumn *column, const AntNetcdfPacking *packing)
{
  return column->kind == ANT_WIRE_REAL && packing->n_fills <= 1 && packing->wrap == 0.0 && !packing->scales && packing->least == -INFINITY
         && packing->greatest == INFINITY;
}

static void
read_values (Work *work, guint c, double *values)
{
  gsize n = work->columns->n_rows;
  AntNetcdfTally tally = { 0 };
  if (is_plain (&work->column[c], &work->packing[c]))
    {
      double fill = work->packing[c].n_fills ? work->packing[c].fill[0] : (double) NAN;
      memcpy (values, work->column[c].at, n * sizeof *values);
      for (gsize i = 0; i < n; i++)
        if (values[i] == fill)
          {
            values[i] = (double) NAN;
            tally.n_fill++;
          }
    }
  else
    for (gsize i = 0; i < n; i++)
      values[i] = ant_netcdf_unpack (&work->packing[c], ant_netcdf_column_real (&work->column[c], i), &tally);
  work->tally[c] = tally;
}

static void
read_further (const Work *work, guint c, float *values)
{
  gsize n = work->columns->n_rows;
  for (gsize i = 0; i < n; i++)
    {
      double value = value_at (work, c, i);
      values[i] = fabs (value) <= (double) FLT_MAX ? (float) value : NAN;
    }
}

static void
read_quality (const Work *work, guint c, AntTableRows *rows)
{
  gsize n = work->columns->n_rows;
  for (gsize i = 0; i < n; i++)
    {
      gboolean whole = work->column[c].kind == ANT_WIRE_INTEGER && !work->packing[c].scales;
      double value = value_at (work, c, i);
      gboolean bad = isnan (value) || value != floor (value) || fabs (value) > 9.2e18;
      rows->quality[i] = bad ? -1 : whole ? ant_netcdf_column_integer (&work->column[c], i) : (gint64) value;
      rows->n_no_quality += bad;
    }
}

/* The columns side by side: first the time, then values, further ones, error and quality. */
typedef struct
{
  Work *work;
  const AntValueColumns *columns;
  AntCfTime *cf;
  AntTimeForm *form;
  AntTableRows *rows;
} Reading;

static const char *
title (void *data, size_t stage)
{
  return "reading rows";
}

static size_t
count (void *data, size_t stage)
{
  const AntValueColumns *columns = ((const Reading *) data)->columns;
  return 1 + columns->n_values + columns->n_further + (columns->error >= 0 ? 1 : 0) + (columns->quality >= 0 ? 1 : 0);
}

static AntStatus
run_slice (void *data, size_t stage, size_t slice)
{
  const Reading *reading = data;
  const AntValueColumns *columns = reading->columns;
  AntTableRows *rows = reading->rows;
  size_t value = slice - 1, further = value - columns->n_values, last = further - columns->n_further;
  if (slice == 0)
    read_times (reading->work, reading->cf, reading->form, rows);
  else if (value < columns->n_values)
    read_values (reading->work, columns->values[value], rows->values[value]);
  else if (further < columns->n_further)
    read_further (reading->work, columns->further[further], rows->further[further]);
  else if (last == 0 && columns->error >= 0)
    read_values (reading->work, (guint) columns->error, rows->error);
  else
    read_quality (reading->work, (guint) columns->quality, rows);
  return ANT_OK;
}

static AntStatus
finish (void *data, size_t stage)
{
  return ANT_OK;
}

static void
read_rows (Reading *reading, const AntSliceRunner *runner)
{
  static const AntStages stages = { .n_stages = 1, .title = title, .count = count, .run_slice = run_slice, .finish = finish };
  AntTableRows *rows = reading->rows;
  ant_table_rows_expect (rows, reading->columns, MAX (reading->work->columns->n_rows, 1));
  rows->n = reading->work->columns->n_rows;
  if (runner && rows->n >= LEAST_SHARED)
    runner->run (&stages, reading, NULL, runner->data);
  else
    for (size_t slice = 0; slice < count (reading, 0); slice++)
      run_slice (reading, 0, slice);
}

static void
say_time (const Work *work, const AntCfTime *cf)
{
  const AntNetcdfVariable *time = variable_of (work, (guint) work->columns->time_column);
  const char *calendar = ant_netcdf_text (time->attributes, "calendar");
  ant_record_say (work->record, _("Time is %s, in %s, calendar %s."), time->name, ant_netcdf_text (time->attributes, "units"),
                  calendar ? calendar : _("standard (none is named)"));
  if (cf->counts_leaps)
    ant_record_say (work->record, _("Its numbers count leap seconds."));
  else if (cf->scale == ANT_SCALE_UTC)
    ant_record_say (work->record, _("Its numbers count days of 86 400 s: leap seconds are left out of them and put back here."));
  else if (cf->scale == ANT_SCALE_UNKNOWN)
    ant_record_say (work->record, _("The file says that its time has no leap seconds, and not which scale it is: --time-scale says it."));
  if (cf->scale_assumed)
    ant_record_say (work->record, _("Nothing says which time scale it is: taken as UTC."));
  if (fabs (cf->unit_s - 365.242198781 * ANT_SECONDS_PER_DAY) < 1.0 || (cf->unit_s > 2e6 && cf->unit_s < 3e6))
    ant_record_say (work->record, _("A year is taken as 365.242198781 days, a month as its twelfth: not those of the calendar."));
}

/* "1360.5" where the variable of a dimension's name has that at the index; "" without one. */
static void
say_index (const Work *work, guint c)
{
  const AntNetcdfVariable *variable = variable_of (work, c);
  const AntNetcdfPick *pick = &work->columns->column[c];
  for (guint d = 0; d < variable->rank; d++)
    {
      const AntNetcdfDimension *dimension = g_ptr_array_index (work->contents->dimensions, variable->dimension[d]);
      if (d != pick->along && dimension->length > 1)
        ant_record_say (work->record, _("Of %s number %zu of %zu along %s."), variable->name, (gsize) pick->index[d] + 1,
                        (gsize) dimension->length, dimension->name);
    }
}

static void
say_value (const Work *work)
{
  int c = ant_table_layout_column (work->layout, work->record->value_name);
  if (c < 0)
    return;
  AntNetcdfTally tally = work->tally[c];
  if (tally.n_fill > 0)
    ant_record_say (work->record, _("Of %s %zu values are its fill or missing value."), work->record->value_name, tally.n_fill);
  if (tally.n_invalid > 0)
    ant_record_say (work->record, _("Of %s %zu values are outside its valid range, %g to %g as stored."), work->record->value_name,
                    tally.n_invalid, work->packing[c].least, work->packing[c].greatest);
  if (work->packing[c].scales)
    ant_record_say (work->record, _("%s is packed: stored numbers times %.10g plus %.10g."), work->record->value_name,
                    work->packing[c].scale, work->packing[c].offset);
  say_index (work, (guint) c);
}

/* One of start, middle and end, if the time's own words name one of them alone. */
static AntStampPlace
stamp_by_words (const char *words)
{
  static const struct
  {
    const char *word;
    AntStampPlace stamp;
  } known[] = { { "start", ANT_AT_START }, { "begin", ANT_AT_START },  { "middle", ANT_AT_MIDDLE }, { "center", ANT_AT_MIDDLE },
                { "centre", ANT_AT_MIDDLE }, { "midpoint", ANT_AT_MIDDLE }, { "end of", ANT_AT_END },  { "stop", ANT_AT_END } };
  AntStampPlace found = ANT_AT_UNKNOWN;
  for (gsize i = 0; words && i < G_N_ELEMENTS (known); i++)
    if (strcasestr (words, known[i].word))
      {
        if (found != ANT_AT_UNKNOWN && found != known[i].stamp)
          return ANT_AT_UNKNOWN;
        found = known[i].stamp;
      }
  return found;
}

/* The edges of the intervals give length and place of the exposures, if all are alike. */
static void
take_bounds (const Work *work, const AntCfTime *cf)
{
  const AntNetcdfColumn *time = &work->column[work->columns->time_column], *edge = &work->column[work->columns->n_columns];
  double width = (double) NAN, place = (double) NAN;
  for (gsize i = 0; i < time->n; i++)
    {
      double start = ant_netcdf_column_real (&edge[0], i), end = ant_netcdf_column_real (&edge[1], i);
      double here = (ant_netcdf_column_real (time, i) - start) / (end - start);
      if (i == 0)
        {
          width = end - start;
          place = here;
        }
      if (!(end > start) || fabs (end - start - width) > SAME_WIDTH * fabs (width) + 1e-3 / cf->unit_s || fabs (here - place) > AT_EDGE)
        {
          ant_record_say (work->record, _("The bounds of the time are not of one length: the exposure stays unknown."));
          return;
        }
    }
  work->record->exposure_d = width * cf->unit_s / ANT_SECONDS_PER_DAY;
  work->record->exposure_known = TRUE;
  work->record->stamp = fabs (place) < AT_EDGE ? ANT_AT_START : fabs (place - 0.5) < AT_EDGE ? ANT_AT_MIDDLE
                        : fabs (place - 1.0) < AT_EDGE ? ANT_AT_END : ANT_AT_UNKNOWN;
  ant_record_say (work->record, _("The bounds of the time give the length of an exposure, and where in it the stamp stands."));
}

static void
take_cf (const Work *work, const AntCfTime *cf)
{
  const AntNetcdfVariable *time = variable_of (work, (guint) work->columns->time_column);
  const char *words = ant_netcdf_text (time->attributes, "long_name");
  ant_cf_time_reference (cf, &work->record->time);
  say_time (work, cf);
  work->record->stamp = stamp_by_words (words);
  if (work->record->stamp != ANT_AT_UNKNOWN)
    ant_record_say (work->record, _("Of its time the file says “%s”."), words);
  if (work->columns->bounds >= 0)
    take_bounds (work, cf);
}

static gboolean
fill (Work *work, const AntReadingChoices *choices, const AntSliceRunner *runner, GError **error)
{
  AntCfTime cf = { 0 };
  AntTimeForm form;
  AntValueColumns columns;
  AntTableRows rows = { 0 };
  if (!find_time (work, choices, &cf, &form, error)
      || !ant_value_columns_find (work->layout, &form, choices, work->record->path, &columns, error))
    return FALSE;
  gboolean by_cf = work->columns->time_column >= 0;
  if (by_cf)
    work->record->time_name = g_strdup (work->layout->columns[form.columns[0]].label);
  else
    ant_table_record_say_time (work->layout, &form, work->record);
  read_rows (&(Reading){ work, &columns, &cf, &form, &rows }, runner);
  gboolean done = ant_table_record_fill (&rows, work->layout, &form, &columns, choices, work->record, error);
  ant_table_rows_clear (&rows);
  if (done && by_cf)
    take_cf (work, &cf);
  if (done)
    say_value (work);
  return done;
}

gboolean
ant_netcdf_rows_fill (const AntNetcdfContents *contents, const AntNetcdfColumns *columns, const guint8 *bytes, gsize n,
                      const AntReadingChoices *choices, const AntSliceRunner *runner, AntRecord *record, GError **error)
{
  g_autofree Work *work = g_new0 (Work, 1);
  gsize counts[ANT_NETCDF_MOST_COLUMNS + 2];
  guint n_columns = columns->n_columns + (columns->bounds >= 0 ? 2 : 0);
  *work = (Work){ .contents = contents, .columns = columns, .record = record };
  for (guint c = 0; c < n_columns; c++)
    counts[c] = columns->n_rows;
  if (!ant_netcdf_columns_parse (bytes, n, n_columns, counts, work->column))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found columns that are not as long as the file says, expected a whole file"),
                   record->path);
      return FALSE;
    }
  AntReadingChoices full;
  static const AntReadingChoices none = { 0 };
  ant_reading_choices_copy (choices ? choices : &none, &full);
  make_layout (work);
  complete_choices (work, &full);
  gboolean done = fill (work, &full, runner, error);
  ant_reading_choices_clear (&full);
  ant_table_layout_free (work->layout);
  return done;
}
