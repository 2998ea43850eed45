/* time-parts.c - dates and clocks in several columns, by name and by what they can hold. */
#include "readers/time-parts.h"

#include <math.h>
#include <string.h>

#include "core/units.h"
#include "sky/iso-time.h"

static const char *const plain_year_words[] = { "year", "yr", "yyyy", NULL };
static const char *const month_words[] = { "month", "mon", "mo", "mm", NULL };
static const char *const day_words[] = { "day", "dd", "dom", NULL };
static const char *const day_of_year_words[] = { "doy", "yday", "jday", "dayofyear", "ddd", NULL };
static const char *const clock_words[] = { "time", "utc", "ut", "gmt", "clock", "hhmmss", "hhmm", "mst", "est", "pst", "cst", "cet",
                                           "lst", "local", NULL };
static const char *const hhmm_words[] = { "hhmm", NULL };
static const char *const hhmmss_words[] = { "hhmmss", NULL };
static const char *const second_words[] = { "sod", "sec", "second", "seconds", "ss", NULL };
static const char *const minute_words[] = { "minute", "minutes", "min", "mm", NULL };
static const char *const hour_words[] = { "hour", "hours", "hr", "hh", NULL };

static void
add_part (AntTimeForm *form, AntTimePart part, guint column)
{
  form->parts[form->n_parts] = part;
  form->columns[form->n_parts++] = column;
}

/* Whole numbers from least to greatest, but for missing ones. */
static gboolean
is_whole_in (const AntTableColumn *column, double least, double greatest)
{
  return column->n_numbers > 0 && column->n_whole == column->n_numbers && column->n_text == 0 && column->least >= least
         && column->greatest <= greatest;
}

static gboolean
has_name (const AntTableColumn *column, const char *const *words)
{
  return *column->name && ant_table_column_has_word (column, words);
}

gboolean
ant_time_parts_clock (const AntTableColumn *column, AntTimePart *part)
{
  gboolean named = ant_table_column_has_word (column, clock_words), nameless = !*column->name;
  gboolean whole = ant_table_column_mostly (column, column->n_whole) && column->least >= 0.0;
  if (ant_table_column_mostly (column, column->n_clock))
    *part = ANT_PART_CLOCK;
  else if (ant_table_column_mostly (column, column->n_numbers) && column->least >= 0.0
           && ant_table_column_has_word (column, second_words))
    *part = ANT_PART_SECOND;
  else if (!whole)
    return FALSE;
  else if (ant_table_column_has_word (column, minute_words) && column->greatest <= 1440.0)
    *part = ANT_PART_MINUTE;
  else if (ant_table_column_has_word (column, hour_words) && column->greatest <= 24.0)
    *part = ANT_PART_HOUR;
  else if ((has_name (column, hhmmss_words) || ((named || nameless) && column->greatest > 2400.0))
           && ant_table_column_mostly (column, column->n_clock_digits))
    *part = ANT_PART_HHMMSS;
  else if (column->greatest <= 2400.0 && (has_name (column, hhmm_words) || ((named || nameless) && column->greatest > 24.0)))
    *part = ANT_PART_HHMM;
  else
    return FALSE;
  return TRUE;
}

void
ant_time_parts_add_clocks (const AntTableLayout *layout, guint next, AntTimeForm *form)
{
  AntTimePart part, last = ANT_PART_ISO;
  while (next < layout->n_columns && form->n_parts < ANT_MOST_TIME_PARTS && ant_time_parts_clock (&layout->columns[next], &part)
         && (last == ANT_PART_ISO || (last == ANT_PART_HOUR && part == ANT_PART_MINUTE)
             || (last == ANT_PART_MINUTE && part == ANT_PART_SECOND)))
    {
      add_part (form, part, next++);
      last = part;
    }
}

static gboolean
find_named (const AntTableLayout *layout, guint from, const char *const *words, double greatest, guint *found)
{
  for (guint c = from; c < layout->n_columns; c++)
    if (has_name (&layout->columns[c], words) && ant_table_column_mostly (&layout->columns[c], layout->columns[c].n_numbers)
        && layout->columns[c].least >= 1.0 && layout->columns[c].greatest < greatest + 1.0)
      {
        *found = c;
        return TRUE;
      }
  return FALSE;
}

static gboolean
find_by_names (const AntTableLayout *layout, guint year, AntTimeForm *form)
{
  guint month, day;
  if (!has_name (&layout->columns[year], plain_year_words)
      || !ant_table_column_mostly (&layout->columns[year], layout->columns[year].n_whole))
    return FALSE;
  add_part (form, ANT_PART_YEAR, year);
  if (find_named (layout, year + 1, month_words, 12.0, &month) && find_named (layout, month + 1, day_words, 31.0, &day))
    {
      form->style = ANT_STAMP_YMD;
      add_part (form, ANT_PART_MONTH, month);
      add_part (form, ANT_PART_DAY, day);
      ant_time_parts_add_clocks (layout, day + 1, form);
      return TRUE;
    }
  if (find_named (layout, 0, day_of_year_words, 366.0, &day))
    {
      form->style = ANT_STAMP_YEAR_DAY;
      add_part (form, ANT_PART_DAY_OF_YEAR, day);
      ant_time_parts_add_clocks (layout, day + 1, form);
      return TRUE;
    }
  form->n_parts = 0;
  return FALSE;
}

/* Hours of the day with a fraction, right behind a clock: the time once more. They grow with nearly every row. */
static gboolean
repeats_clock (const AntTableColumn *column)
{
  return !*column->name && column->n_text == 0 && column->least >= 0.0 && column->greatest < 24.0 && column->n_whole < column->n_numbers
         && column->n_down * 10 < column->n_up;
}

/* Hour, minute and second of columns without names, by their ranges. */
static void
nameless_clocks (const AntTableLayout *layout, guint next, AntTimeForm *form)
{
  const AntTableColumn *columns = layout->columns;
  if (next + 1 >= layout->n_columns || !is_whole_in (&columns[next], 0.0, 24.0) || !is_whole_in (&columns[next + 1], 0.0, 59.0))
    {
      ant_time_parts_add_clocks (layout, next, form);
      return;
    }
  add_part (form, ANT_PART_HOUR, next);
  add_part (form, ANT_PART_MINUTE, next + 1);
  next += 2;
  /* Seconds begin anew with every minute. */
  if (next < layout->n_columns && form->n_parts < ANT_MOST_TIME_PARTS && columns[next].n_text == 0 && columns[next].least >= 0.0
      && columns[next].greatest < 61.0 && columns[next].n_down > 0 && 2 * columns[next].n_down >= columns[next - 1].n_up)
    add_part (form, ANT_PART_SECOND, next++);
  if (next < layout->n_columns && repeats_clock (&columns[next]))
    form->repeats[1] = (int) next;
}

static gboolean
find_by_ranges (const AntTableLayout *layout, guint year, AntTimeForm *form)
{
  const AntTableColumn *column = &layout->columns[year];
  guint left = layout->n_columns - year;
  if (*column->name || left < 4 || !is_whole_in (column, 1800.0, 2200.0))
    return FALSE;
  gboolean with_day_of_year = left > 5 && is_whole_in (column + 1, 1.0, 366.0) && is_whole_in (column + 2, 1.0, 12.0)
                              && is_whole_in (column + 3, 1.0, 31.0) && is_whole_in (column + 4, 0.0, 24.0);
  gboolean with_month = is_whole_in (column + 1, 1.0, 12.0) && column[2].n_text == 0 && column[2].least >= 1.0 && column[2].greatest < 32.0;
  guint month = year + (with_day_of_year ? 2 : 1);
  add_part (form, ANT_PART_YEAR, year);
  if (with_day_of_year || with_month)
    {
      form->style = ANT_STAMP_YMD;
      form->repeats[0] = with_day_of_year ? (int) year + 1 : -1;
      add_part (form, ANT_PART_MONTH, month);
      add_part (form, ANT_PART_DAY, month + 1);
      nameless_clocks (layout, month + 2, form);
      return TRUE;
    }
  if (column[1].n_text == 0 && column[1].least >= 1.0 && column[1].greatest < 367.0 && column[1].n_up > column[1].n_down)
    {
      form->style = ANT_STAMP_YEAR_DAY;
      add_part (form, ANT_PART_DAY_OF_YEAR, year + 1);
      nameless_clocks (layout, year + 2, form);
      return TRUE;
    }
  form->n_parts = 0;
  return FALSE;
}

gboolean
ant_time_parts_find (const AntTableLayout *layout, guint column, AntTimeForm *form)
{
  return find_by_names (layout, column, form) || find_by_ranges (layout, column, form);
}

/* "2016 162 06 10", "2016 06 10" or "2016 162": numbers that agree on a date. */
static gboolean
date_of_numbers (const AntCell *cells, guint n, double *midnight_jd)
{
  double jd1, jd2, other1, other2;
  for (guint i = 0; i < n; i++)
    if (cells[i].kind != ANT_CELL_NUMBER || cells[i].number != floor (cells[i].number) || cells[i].number > 2200.0)
      return FALSE;
  if (n < 2 || n > 4 || cells[0].number < 1800.0)
    return FALSE;
  int year = (int) cells[0].number;
  if (n == 2 && ant_time_from_day_of_year (ANT_SCALE_TAI, year, cells[1].number, &jd1, &jd2) != ANT_OK)
    return FALSE;
  if (n > 2 && ant_time_from_calendar (ANT_SCALE_TAI, year, (int) cells[n - 2].number, (int) cells[n - 1].number, 0, 0, 0.0, &jd1, &jd2) != ANT_OK)
    return FALSE;
  *midnight_jd = jd1 + jd2;
  return n < 4 || (ant_time_from_day_of_year (ANT_SCALE_TAI, year, cells[1].number, &other1, &other2) == ANT_OK
                   && other1 + other2 == *midnight_jd);
}

/* Of the header's lines without a mark the last that is a date and nothing else. */
static gboolean
date_in_header (const AntTableLayout *layout, double *midnight_jd)
{
  for (guint i = layout->header->len; i-- > 0;)
    {
      const char *line = g_ptr_array_index (layout->header, i), *end = line + strlen (line);
      AntCell cells[5];
      AntIsoTime iso;
      double jd2;
      if (ant_iso_read (line, end, &iso) && !iso.has_time
          && ant_time_from_calendar (ANT_SCALE_TAI, iso.year, iso.month, iso.day, 0, 0, 0.0, midnight_jd, &jd2) == ANT_OK)
        {
          *midnight_jd += jd2;
          return TRUE;
        }
      guint n = ant_cell_split (line, end, ' ', G_N_ELEMENTS (cells), cells);
      if (n < G_N_ELEMENTS (cells) && date_of_numbers (cells, n, midnight_jd))
        return TRUE;
    }
  return FALSE;
}

gboolean
ant_time_parts_in_header (const AntTableLayout *layout, AntTimeForm *form)
{
  AntTimePart part;
  for (guint c = 0; c < layout->n_columns; c++)
    if (*layout->columns[c].name && ant_time_parts_clock (&layout->columns[c], &part) && date_in_header (layout, &form->date_jd))
      {
        form->style = ANT_STAMP_ISO;
        form->has_date = TRUE;
        ant_time_parts_add_clocks (layout, c, form);
        return TRUE;
      }
  return FALSE;
}
