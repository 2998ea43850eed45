/* table-record.c - choosing the value, flagging fills and cleaning errors, every assumption aloud. */
#include "readers/table-record.h"

#include <float.h>
#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/error.h"
#include "readers/fill-values.h"

#define MOST_ODD_FRACTION 0.05  /* more odd lines than this are no slip */
#define MOST_NO_TIME_FRACTION 0.5
#define BACKWARDS_FRACTION 0.95
#define GREATEST_VALUE 1e30
#define LEAST_VALUE 1e-30

static const char *
unit_name (double unit_d)
{
  static const struct
  {
    double days;
    const char *name;
  } units[] = { { 365.25, N_("years of 365.25 d") }, { 1.0, N_("days") }, { 1.0 / 24.0, N_("hours") }, { 1.0 / 1440.0, N_("minutes") },
                { 1.0 / 86400.0, N_("seconds") } };
  for (gsize i = 0; i < G_N_ELEMENTS (units); i++)
    if (fabs (unit_d / units[i].days - 1.0) < 1e-9)
      return _(units[i].name);
  return _("units");
}

/* Caller frees. */
static char *
style_text (const AntTimeForm *form)
{
  char epoch[40];
  switch (form->style)
    {
    case ANT_STAMP_DAYS:
      if (!form->epoch_known)
        return g_strdup_printf (_("%s from an origin that is not known"), unit_name (form->unit_d));
      if (ant_time_text (form->scale, form->epoch_jd1, form->epoch_jd2, 6, sizeof epoch, epoch) != ANT_OK)
        g_snprintf (epoch, sizeof epoch, "JD %.7f", form->epoch_jd1 + form->epoch_jd2);
      return g_strdup_printf (_("%s since %s"), unit_name (form->unit_d), epoch);
    case ANT_STAMP_JD:
      return g_strdup (form->offset == 0.0 ? _("Julian date") : form->offset == 2400000.5 ? _("modified Julian date")
                       : _("Julian date less an offset"));
    case ANT_STAMP_UNIX: return g_strdup (_("Unix seconds"));
    case ANT_STAMP_ISO: return g_strdup (_("ISO 8601 dates"));
    case ANT_STAMP_YMD: return g_strdup (_("dates YYYYMMDD"));
    case ANT_STAMP_YEAR_DAY: return g_strdup (_("year and day of year"));
    case ANT_STAMP_DECIMAL_YEAR: return g_strdup (_("decimal years"));
    }
  return g_strdup ("");
}

void
ant_table_record_say_time (const AntTableLayout *layout, const AntTimeForm *form, AntRecord *record)
{
  g_autoptr (GString) names = g_string_new (NULL);
  g_autofree char *style = style_text (form);
  for (guint i = 0; i < form->n_parts; i++)
    g_string_append_printf (names, "%s%s", i ? " + " : "", layout->columns[form->columns[i]].label);
  record->time_name = g_strdup (names->str);
  ant_record_say (record, _("Time is %s, read as %s."), record->time_name, style);
  if (form->has_date)
    {
      char date[40] = "";
      ant_time_text (ANT_SCALE_TAI, form->date_jd, 0.0, 0, sizeof date, date);
      ant_record_say (record, _("The date, %.10s, stands in the header."), date);
    }
  double offset = form->offset + form->offset_rest;
  if (form->style == ANT_STAMP_JD && offset != 0.0)
    ant_record_say (record, _("JD is the record's number plus %.*f."), offset == floor (offset) ? 0 : 4, offset);
  const AntTableColumn *column = &layout->columns[form->columns[0]];
  if (form->style == ANT_STAMP_DAYS && !form->epoch_known && column->least > 30000.0 && column->greatest < 80000.0)
    ant_record_say (record, _("The times look like modified Julian dates, but nothing says so; --time-format mjd takes them so."));
}

/* Lines that do not fit are a slip if few, another format if many. */
static gboolean
accept_widths (const AntTableRows *rows, const AntTableLayout *layout, AntRecord *record, GError **error)
{
  gsize n_lines = rows->n + rows->n_other_width;
  if (rows->n_other_width > MOST_ODD_FRACTION * n_lines)
    return ant_record_refuse (record, error, _("line %u: found %u columns, expected %u; so in %zu of %zu lines"),
                              rows->first_other_width, rows->other_width, layout->n_columns, rows->n_other_width, n_lines);
  if (rows->n_other_width > 0)
    ant_record_say (record, _("%zu lines with another number of columns are left out, the first is line %u."),
                    rows->n_other_width, rows->first_other_width);
  return TRUE;
}

static gboolean
accept_rows (const AntTableRows *rows, const AntTableLayout *layout, AntRecord *record, GError **error)
{
  g_autofree char *first = ant_record_row_text (record, layout->first_row);
  g_autofree char *no_time = ant_record_row_text (record, rows->first_no_time);
  g_autofree char *text = ant_record_row_text (record, rows->first_text_value);
  if (rows->n < 2)
    return ant_record_refuse (record, error, _("%s: found one row of data, expected a record of many"), first);
  if (rows->n_no_time > MOST_NO_TIME_FRACTION * rows->n)
    return ant_record_refuse (record, error, _("%s: found “%s” in %s, expected a time; so in %zu of %zu rows"), no_time,
                              rows->no_time_text, record->time_name, rows->n_no_time, rows->n);
  if (rows->n_text_values > MOST_ODD_FRACTION * rows->n)
    return ant_record_refuse (record, error, _("%s: found “%s” in the value column, expected a number; so in %zu of %zu rows"),
                              text, rows->text_value, rows->n_text_values, rows->n);
  if (rows->n_no_time > 0)
    ant_record_say (record, _("%zu rows have no readable time, the first is %s (“%s”)."), rows->n_no_time, no_time,
                    rows->no_time_text);
  if (rows->n_text_values > 0)
    ant_record_say (record, _("%zu values are words and count as missing, the first is “%s” in %s."), rows->n_text_values,
                    rows->text_value, text);
  if (rows->n_no_quality > 0)
    ant_record_say (record, _("%zu qualities are no whole numbers and count as bad (-1)."), rows->n_no_quality);
  return TRUE;
}

static gboolean
refuse_backwards (const AntTableRows *rows, const AntRecord *record, GError **error)
{
  gsize up = 0, down = 0;
  double last_d = (double) NAN;
  guint32 line = 0;
  for (gsize i = 0; i < rows->n; i++)
    {
      up += rows->time_d[i] > last_d;
      down += rows->time_d[i] < last_d;
      if (down == 1 && line == 0)
        line = rows->line[i];
      if (!isnan (rows->time_d[i]))
        last_d = rows->time_d[i];
    }
  if (down == 0 || down < BACKWARDS_FRACTION * (up + down))
    return TRUE;
  g_autofree char *place = ant_record_row_text (record, line);
  return ant_record_refuse (record, error, _("%s: found times that run backwards throughout, expected them to grow"), place);
}

static gsize
count_good (const double *value, gsize n, const GArray *fills, gboolean *varies)
{
  gsize good = 0;
  double first = (double) NAN;
  *varies = FALSE;
  for (gsize i = 0; i < n; i++)
    if (!isnan (value[i]) && (fills->len == 0 || !ant_fill_is (fills, value[i])))
      {
        if (good++ == 0)
          first = value[i];
        *varies |= value[i] != first;
      }
  return good;
}

/* The first candidate with more than half good values that vary; where none varies, the first with good values. A chosen
 * column needs no majority. Returns its index; *fills are its fills. */
static int
choose_value (const AntTableRows *rows, const AntValueColumns *columns, gboolean by_user, const GArray *stated, GArray **fills)
{
  int constant = -1;
  for (guint i = 0; i < columns->n_values; i++)
    {
      gboolean varies;
      g_autoptr (GArray) found = ant_fill_judge (rows->values[i], rows->n, stated);
      gsize good = count_good (rows->values[i], rows->n, found, &varies);
      if (by_user ? good > 0 : 2 * good > rows->n && varies)
        {
          *fills = g_steal_pointer (&found);
          return (int) i;
        }
      if (2 * good > rows->n && constant < 0)
        constant = (int) i;
    }
  if (constant >= 0)
    *fills = ant_fill_judge (rows->values[constant], rows->n, stated);
  return constant;
}

/* Numbers that no irradiance can be: better to stop than to carry them along. */
static gboolean
check_values (const AntRecord *record, GError **error)
{
  for (gsize i = 0; i < record->n_rows; i++)
    {
      double size = fabs (record->value[i]);
      if (isnan (size) || (size <= GREATEST_VALUE && (size >= LEAST_VALUE || size == 0.0)))
        continue;
      g_autofree char *place = ant_record_row_text (record, record->line[i]);
      return ant_record_refuse (record, error, _("%s: found %g in %s, expected an irradiance between %g and %g in size"), place,
                                record->value[i], record->value_name, LEAST_VALUE, GREATEST_VALUE);
    }
  return TRUE;
}

static void
flag_rows (AntRecord *record, const GArray *fills)
{
  gsize n_missing = 0;
  record->flags = g_new0 (guint16, record->n_rows);
  for (gsize i = 0; i < record->n_rows; i++)
    {
      if (isnan (record->time_d[i]))
        record->flags[i] |= ANT_FLAG_NO_TIME;
      gboolean missing = isnan (record->value[i]);
      n_missing += missing;
      if (missing || (fills->len > 0 && ant_fill_is (fills, record->value[i])))
        {
          record->flags[i] |= ANT_FLAG_FILL;
          record->value[i] = (double) NAN;
        }
    }
  if (n_missing > 0)
    ant_record_say (record, _("%zu values are empty or not numbers."), n_missing);
  for (guint i = 0; i < fills->len; i++)
    {
      const AntFill *fill = &g_array_index (fills, AntFill, i);
      ant_record_say (record, fill->stated ? _("%zu values are the stated fill value %.10g.")
                                           : _("%zu values are %.10g, far from all others: taken as fill."),
                      fill->count, fill->value);
    }
}

/* Errors that are no errors are unknown. */
static void
clean_errors (AntRecord *record)
{
  gsize n_bad = 0;
  for (gsize i = 0; record->error && i < record->n_rows; i++)
    if (!(record->error[i] > 0.0) || record->error[i] > GREATEST_VALUE)
      {
        n_bad += !(record->flags[i] & ANT_FLAG_FILL);
        record->error[i] = (double) NAN;
      }
  if (n_bad > 0)
    ant_record_say (record, _("%zu values have no positive error."), n_bad);
}

static void
take_rows (AntTableRows *rows, int value, AntRecord *record)
{
  record->n_rows = rows->n;
  record->time_d = g_renew (double, g_steal_pointer (&rows->time_d), rows->n);
  record->value = g_renew (double, g_steal_pointer (&rows->values[value]), rows->n);
  record->line = g_renew (guint32, g_steal_pointer (&rows->line), rows->n);
  if (rows->error)
    record->error = g_renew (double, g_steal_pointer (&rows->error), rows->n);
  if (rows->quality)
    record->quality = g_renew (gint64, g_steal_pointer (&rows->quality), rows->n);
}

/* Kept unless it is empty. */
static void
add_column (AntRecord *record, const AntTableLayout *layout, guint c, float *value, const GArray *stated)
{
  g_autofree char *unit = ant_value_columns_own_unit (&layout->columns[c]);
  ant_fill_clear (value, record->n_rows, stated);
  AntColumn *column = ant_column_new (layout->columns[c].label, unit, value, record->n_rows);
  if (column->n_missing < record->n_rows)
    g_ptr_array_add (record->columns, column);
  else
    ant_column_free (column);
}

static float *
narrow_values (const double *value, gsize n)
{
  float *narrow = g_new (float, n);
  for (gsize i = 0; i < n; i++)
    narrow[i] = fabs (value[i]) <= (double) FLT_MAX ? (float) value[i] : NAN;
  return narrow;
}

/* The other columns of numbers in the file's order: candidates that were not taken, and those that were none. */
static void
take_columns (AntTableRows *rows, const AntTableLayout *layout, const AntValueColumns *columns, int value, const GArray *stated,
              AntRecord *record)
{
  guint next_value = 0, next_further = 0;
  for (guint c = 0; c < layout->n_columns; c++)
    if (next_value < columns->n_values && columns->values[next_value] == c)
      {
        double *values = rows->values[next_value++];
        if ((int) next_value - 1 != value)
          add_column (record, layout, c, narrow_values (values, record->n_rows), stated);
      }
    else if (next_further < columns->n_further && columns->further[next_further] == c)
      {
        float *values = g_renew (float, g_steal_pointer (&rows->further[next_further++]), record->n_rows);
        add_column (record, layout, c, values, stated);
      }
  if (columns->n_left_out > 0)
    ant_record_say (record, _("Of the further columns %u are kept, %u are left out."), record->columns->len, columns->n_left_out);
}

/* " (column 3)" behind a name that is not just that. */
static char *
named_place (const AntTableLayout *layout, guint column)
{
  return *layout->columns[column].name ? g_strdup_printf (_(" (column %u)"), column + 1) : g_strdup ("");
}

static void
name_columns (const AntTableLayout *layout, const AntValueColumns *columns, guint value, AntRecord *record)
{
  record->value_name = g_strdup (layout->columns[value].label);
  record->value_unit = ant_value_columns_unit (layout, value);
  g_autofree char *place = named_place (layout, value);
  ant_record_say (record, _("Value is %s%s, in %s."), record->value_name, place,
                  record->value_unit ? record->value_unit : _("a unit that is not named"));
  record->value_remark = g_strdup (layout->columns[value].remark);
  if (layout->columns[value].remark)
    ant_record_say (record, _("The header says of it: %s"), layout->columns[value].remark);
  if (columns->error >= 0)
    {
      record->error_name = g_strdup (layout->columns[columns->error].label);
      g_autofree char *at = named_place (layout, (guint) columns->error);
      ant_record_say (record, _("Its 1-sigma error is %s%s."), record->error_name, at);
    }
  else
    ant_record_say (record, _("No column of errors is told by its name."));
  if (columns->quality >= 0)
    {
      record->quality_name = g_strdup (layout->columns[columns->quality].label);
      g_autofree char *at = named_place (layout, (guint) columns->quality);
      ant_record_say (record, columns->interleaved ? _("Values alternate with flags; quality is %s%s, which follows the value.")
                                                   : _("Quality is %s%s."),
                      record->quality_name, at);
    }
}

gboolean
ant_table_record_fill (AntTableRows *rows, const AntTableLayout *layout, const AntTimeForm *form,
                       const AntValueColumns *columns, const AntReadingChoices *choices, AntRecord *record, GError **error)
{
  g_autoptr (GArray) stated = ant_fill_stated (layout->header);
  g_autoptr (GArray) fills = NULL;
  if (choices && choices->fill_values)
    g_array_append_vals (stated, choices->fill_values->data, choices->fill_values->len);
  if (!accept_widths (rows, layout, record, error) || !accept_rows (rows, layout, record, error)
      || !refuse_backwards (rows, record, error))
    return FALSE;
  int value = choose_value (rows, columns, choices && choices->value_column, stated, &fills);
  if (value < 0)
    {
      g_autofree char *first = ant_record_row_text (record, layout->first_row);
      return ant_record_refuse (record, error,
                                _("%s: found no values in %s but missing ones in half the rows or more, expected irradiances"),
                                first, layout->columns[columns->values[0]].label);
    }
  take_rows (rows, value, record);
  take_columns (rows, layout, columns, value, stated, record);
  name_columns (layout, columns, columns->values[value], record);
  flag_rows (record, fills);
  clean_errors (record);
  ant_time_form_reference (form, &record->time);
  return check_values (record, error);
}
