/* plain-text.c - numbers and lengths of time as sentences for people write them. */
#include "data/plain-text.h"
#include <glib/gi18n.h>
#include <math.h>
#include "core/units.h"

char *
ant_number_text (char text[ANT_N_NUMBER_TEXT], const char *format, double number)
{
  return g_ascii_formatd (text, ANT_N_NUMBER_TEXT, format, number);
}

char *
ant_length_text (double length_d)
{
  char text[ANT_N_NUMBER_TEXT];
  double seconds = fabs (length_d) * ANT_SECONDS_PER_DAY;
  if (seconds < 120.0)
    return g_strdup_printf (_("%s s"), ant_number_text (text, "%.6g", length_d * ANT_SECONDS_PER_DAY));
  if (seconds < 3599.0)
    return g_strdup_printf (_("%s min"), ant_number_text (text, "%.6g", length_d * ANT_MINUTES_PER_DAY));
  if (seconds < 0.999 * ANT_SECONDS_PER_DAY)
    return g_strdup_printf (_("%s h"), ant_number_text (text, "%.6g", length_d * ANT_HOURS_PER_DAY));
  return g_strdup_printf (_("%s d"), ant_number_text (text, "%.6g", length_d));
}
