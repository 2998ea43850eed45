/* time-columns.c - telling the time columns of a table by name and content. */
#include "readers/time-columns.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "data/error.h"
#include "readers/text-names.h"
#include "readers/time-header.h"
#include "readers/time-parts.h"

#define JD_MOST 3.0e6
#define MJD_ZERO_JD 2400000.5

static const char *const jd_words[] = { "jd", "jdn", "bjd", "hjd", NULL };
static const char *const mjd_words[] = { "mjd", NULL };
static const char *const unix_words[] = { "unix", "epoch", "posix", "timestamp", "time", NULL };
static const char *const year_words[] = { "year", "yr", "yyyy", "dec", "decimal", "decyear", NULL };
static const char *const digit_clock_words[] = { "hhmm", "hhmmss", NULL };
static const char *const spread_words[] = { "std", "stdev", "stddev", "err", "error", "unc", "uncertainty", "sigma", "exposure", NULL };

static gboolean
is_monotone (const AntTableColumn *column)
{
  guint steps = column->n_up + column->n_down;
  return steps == 0 ? column->n_numbers == 1 : 10 * MAX (column->n_up, column->n_down) >= 9 * steps;
}

static void
add_part (AntTimeForm *form, AntTimePart part, guint column)
{
  form->parts[form->n_parts] = part;
  form->columns[form->n_parts++] = column;
}

static void
set_number (AntTimeForm *form, AntStampStyle style, double offset, double unit_d, guint column)
{
  form->style = style;
  form->offset = offset;
  form->unit_d = unit_d;
  add_part (form, style == ANT_STAMP_DECIMAL_YEAR ? ANT_PART_DECIMAL_YEAR : ANT_PART_NUMBER, column);
}

/* Numbers that count from somewhere: the unit by the column's name or unit. */
static double
unit_of_days (const AntTableColumn *column)
{
  static const char *const unit_seconds[] = { "s", "sec", "secs", "second", "seconds", NULL };
  static const char *const unit_hours[] = { "h", "hr", "hrs", "hour", "hours", NULL };
  AntTableColumn unit = { .name = column->unit ? column->unit : column->name };
  if (ant_table_column_has_word (&unit, unit_seconds))
    return 1.0 / ANT_SECONDS_PER_DAY;
  return ant_table_column_has_word (&unit, unit_hours) ? 1.0 / ANT_HOURS_PER_DAY : 1.0;
}

static gboolean
form_of_numbers (const AntTableLayout *layout, guint c, AntTimeForm *form)
{
  const AntTableColumn *column = &layout->columns[c];
  gboolean named = ant_table_column_has_word (column, ant_time_words) || ant_table_column_has_word (column, year_words);
  double offset;
  if (ant_table_column_has_word (column, spread_words))
    return FALSE;
  if (ant_time_parts_find (layout, c, form))
    return TRUE;
  if (ant_table_column_mostly (column, column->n_ymd))
    {
      form->style = ANT_STAMP_YMD;
      add_part (form, ANT_PART_YMD, c);
      if (ant_table_column_mostly (column, column->n_whole))
        ant_time_parts_add_clocks (layout, c + 1, form);
    }
  else if (!is_monotone (column))
    return FALSE;
  else if (layout->has_epoch && named)
    set_number (form, ANT_STAMP_DAYS, 0.0, unit_of_days (column), c);
  else if (ant_table_column_mostly (column, column->n_jd) && unit_of_days (column) == 1.0)
    set_number (form, ANT_STAMP_JD, 0.0, 1.0, c);
  else if (ant_table_column_has_word (column, mjd_words) && column->greatest < 1e6)
    set_number (form, ANT_STAMP_JD, MJD_ZERO_JD, 1.0, c);
  else if (column->greatest < 1e6 && ant_time_header_jd_offset (layout, column, &offset))
    set_number (form, ANT_STAMP_JD, offset, 1.0, c);
  else if (ant_table_column_has_word (column, unix_words) && column->least > 1e8 && column->greatest < 1e10)
    set_number (form, ANT_STAMP_UNIX, 0.0, 1.0, c);
  else if (ant_table_column_has_word (column, year_words) && column->least > 1600.0 && column->greatest < 2400.0)
    set_number (form, ANT_STAMP_DECIMAL_YEAR, 0.0, 1.0, c);
  else if ((named && !ant_table_column_has_word (column, digit_clock_words)) || (!*column->name && c == 0 && column->n_padded == 0))
    set_number (form, ANT_STAMP_DAYS, 0.0, unit_of_days (column), c);
  else
    return FALSE;
  return TRUE;
}

/* The form that the column begins, if it is a time by its contents and name. */
static gboolean
form_at (const AntTableLayout *layout, guint c, AntTimeForm *form)
{
  const AntTableColumn *column = &layout->columns[c];
  *form = (AntTimeForm) ANT_TIME_FORM_INIT;
  if (ant_table_column_mostly (column, column->n_iso_time + column->n_iso_date))
    {
      form->style = ANT_STAMP_ISO;
      add_part (form, ANT_PART_ISO, c);
      if (column->n_iso_time == 0)
        ant_time_parts_add_clocks (layout, c + 1, form);
      return TRUE;
    }
  return ant_table_column_mostly (column, column->n_numbers) && form_of_numbers (layout, c, form);
}

gboolean
ant_time_columns_alike (const AntTableLayout *layout, guint c)
{
  AntTimeForm form;
  const AntTableColumn *column = &layout->columns[c];
  if (*column->name)
    return form_at (layout, c, &form) || ant_table_column_has_word (column, jd_words);
  return ant_table_column_mostly (column, column->n_clock) || ant_table_column_mostly (column, column->n_ymd)
         || (ant_table_column_mostly (column, column->n_padded) && ant_table_column_mostly (column, column->n_clock_digits));
}

/* The first time-like column; where that is a decimal year, which keeps time worst, a JD if there is one. */
static gboolean
recognise (const AntTableLayout *layout, AntRecord *record, AntTimeForm *form)
{
  AntTimeForm other;
  for (guint c = 0; c < layout->n_columns; c++)
    {
      if (!form_at (layout, c, form))
        continue;
      for (guint d = c + 1; form->style == ANT_STAMP_DECIMAL_YEAR && d < layout->n_columns; d++)
        if (form_at (layout, d, &other) && other.style == ANT_STAMP_JD)
          {
            ant_record_say (record, _("Of the times, %s is taken before the decimal years of %s: it keeps time better."),
                            layout->columns[d].label, layout->columns[c].label);
            *form = other;
          }
      return TRUE;
    }
  *form = (AntTimeForm) ANT_TIME_FORM_INIT;
  return ant_time_parts_in_header (layout, form);
}

static int
named_column (const AntTableLayout *layout, const char *name, GError **error)
{
  int c = ant_table_layout_column (layout, name);
  if (c < 0)
    ant_table_layout_no_column (layout, name, error);
  return c;
}

/* "1+2" or a name. */
static gboolean
chosen_columns (const AntTableLayout *layout, const char *text, AntTimeForm *form, GError **error)
{
  if (ant_table_layout_column (layout, text) >= 0)
    {
      add_part (form, ANT_PART_NUMBER, (guint) ant_table_layout_column (layout, text));
      return TRUE;
    }
  g_auto (GStrv) names = g_strsplit (text, "+", ANT_MOST_TIME_PARTS + 1);
  if (g_strv_length (names) > ANT_MOST_TIME_PARTS)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("time=%s: found more than %d columns"), text, ANT_MOST_TIME_PARTS);
      return FALSE;
    }
  for (guint i = 0; names[i]; i++)
    {
      int c = named_column (layout, g_strstrip (names[i]), error);
      if (c < 0)
        return FALSE;
      add_part (form, ANT_PART_NUMBER, (guint) c);
    }
  return TRUE;
}

/* What the further columns of a chosen time hold. */
static void
further_parts (const AntTableLayout *layout, AntTimeForm *form, guint from)
{
  for (guint i = from; i < form->n_parts; i++)
    if (!ant_time_parts_clock (&layout->columns[form->columns[i]], &form->parts[i]))
      form->parts[i] = i == from ? ANT_PART_HOUR : i == from + 1 ? ANT_PART_MINUTE : ANT_PART_SECOND;
}

static gboolean
set_format (const AntTableLayout *layout, const char *format, AntTimeForm *form, GError **error)
{
  static const struct
  {
    const char *name;
    AntStampStyle style;
    double offset, unit_d;
    AntTimePart part, second;
  } formats[] = {
    { "jd", ANT_STAMP_JD, 0.0, 1.0, ANT_PART_NUMBER },
    { "mjd", ANT_STAMP_JD, MJD_ZERO_JD, 1.0, ANT_PART_NUMBER },
    { "iso", ANT_STAMP_ISO, 0.0, 1.0, ANT_PART_ISO },
    { "ymd", ANT_STAMP_YMD, 0.0, 1.0, ANT_PART_YMD },
    { "unix", ANT_STAMP_UNIX, 0.0, 1.0, ANT_PART_NUMBER },
    { "year-day", ANT_STAMP_YEAR_DAY, 0.0, 1.0, ANT_PART_YEAR, ANT_PART_DAY_OF_YEAR },
    { "year-month-day", ANT_STAMP_YMD, 0.0, 1.0, ANT_PART_YEAR, ANT_PART_MONTH },
    { "decimal-year", ANT_STAMP_DECIMAL_YEAR, 0.0, 1.0, ANT_PART_DECIMAL_YEAR },
    { "days", ANT_STAMP_DAYS, 0.0, 1.0, ANT_PART_NUMBER },
    { "hours", ANT_STAMP_DAYS, 0.0, 1.0 / ANT_HOURS_PER_DAY, ANT_PART_NUMBER },
    { "seconds", ANT_STAMP_DAYS, 0.0, 1.0 / ANT_SECONDS_PER_DAY, ANT_PART_NUMBER },
  };
  char *end;
  double offset = g_ascii_strncasecmp (format, "jd-", 3) ? (double) NAN : g_ascii_strtod (format + 3, &end);
  if (offset > 0.0 && offset < JD_MOST && *end == 0)
    {
      form->style = ANT_STAMP_JD;
      form->offset = offset;
      form->parts[0] = ANT_PART_NUMBER;
      return TRUE;
    }
  for (gsize i = 0; i < G_N_ELEMENTS (formats); i++)
    if (!g_ascii_strcasecmp (formats[i].name, format))
      {
        form->style = formats[i].style;
        form->offset = formats[i].offset;
        form->unit_d = formats[i].unit_d;
        form->parts[0] = formats[i].part;
        form->parts[1] = formats[i].second;
        if (formats[i].second == ANT_PART_MONTH)
          form->parts[2] = ANT_PART_DAY;
        further_parts (layout, form, ant_time_form_date_parts (form));
        return TRUE;
      }
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
               _("“%s” is no time format; expected jd, mjd, jd-OFFSET, iso, ymd, unix, year-day, year-month-day, "
                 "decimal-year, days, hours or seconds"),
               format);
  return FALSE;
}

/* A format without columns: the first column that could hold it. */
static gboolean
column_for_format (const AntTableLayout *layout, const char *format, AntTimeForm *form)
{
  AntTimeForm found;
  gboolean text = !g_ascii_strcasecmp (format, "iso");
  for (guint c = 0; c < layout->n_columns; c++)
    if (form_at (layout, c, &found))
      {
        for (guint i = 0; i < found.n_parts; i++)
          add_part (form, ANT_PART_NUMBER, found.columns[i]);
        return TRUE;
      }
  for (guint c = 0; c < layout->n_columns; c++)
    if (ant_table_column_mostly (&layout->columns[c], text ? layout->columns[c].n_text : layout->columns[c].n_numbers))
      {
        add_part (form, ANT_PART_NUMBER, c);
        return TRUE;
      }
  return FALSE;
}

/* Columns chosen without a format: what the first one begins, over just these columns. */
static void
form_of_chosen (const AntTableLayout *layout, AntTimeForm *form)
{
  AntTimeForm chosen = *form, found;
  if (!form_at (layout, chosen.columns[0], &found))
    set_number (&found, ANT_STAMP_DAYS, 0.0, unit_of_days (&layout->columns[chosen.columns[0]]), chosen.columns[0]);
  *form = found;
  form->n_parts = chosen.n_parts;
  memcpy (form->columns, chosen.columns, sizeof form->columns);
  further_parts (layout, form, MAX (ant_time_form_date_parts (form), 1));
}

static gboolean
no_time (const char *path, const AntTableLayout *layout, GError **error)
{
  g_autoptr (GString) names = g_string_new (NULL);
  g_autofree char *place = ant_table_layout_place (layout);
  for (guint c = 0; c < MIN (layout->n_columns, 8); c++)
    g_string_append_printf (names, "%s%s", c ? ", " : "", layout->columns[c].label);
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
               _("%s: %s: found columns %s%s, expected one that looks like a time; name it with --column time=…"), path,
               place, names->str, layout->n_columns > 8 ? ", …" : "");
  return FALSE;
}

gboolean
ant_time_columns_find (const AntTableLayout *layout, const AntReadingChoices *choices, AntRecord *record, AntTimeForm *form,
                       GError **error)
{
  const char *columns = choices ? choices->time_column : NULL, *format = choices ? choices->time_format : NULL;
  *form = (AntTimeForm) ANT_TIME_FORM_INIT;
  if (columns && !chosen_columns (layout, columns, form, error))
    return FALSE;
  if (!columns && (format ? !column_for_format (layout, format, form) : !recognise (layout, record, form)))
    return no_time (record->path, layout, error);
  if (format && !set_format (layout, format, form, error))
    return FALSE;
  if (columns && !format)
    form_of_chosen (layout, form);
  if (form->n_parts < ant_time_form_date_parts (form))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                   _("%s: a year needs its day, or month and day: --column time=YEAR+DAY or time=YEAR+MONTH+DAY"), record->path);
      return FALSE;
    }
  return ant_time_header_scale (layout, choices, record, form, error) && ant_time_header_origin (choices, record, form, error);
}
