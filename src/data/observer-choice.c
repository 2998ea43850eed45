/* observer-choice.c - observers made from what a person says, refused with the reason where they cannot be. */
#include "data/observer-choice.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/error.h"
#include "sky/places.h"
#include "sky/time-scale.h"

static AntObserverChoice *
choice_new (AntObserverKind kind, const char *text)
{
  AntObserverChoice *choice = g_new0 (AntObserverChoice, 1);
  choice->ref_count = 1;
  choice->observer.kind = kind;
  choice->text = g_strdup (text);
  return choice;
}

AntObserverChoice *
ant_observer_choice_new_earth (void)
{
  return choice_new (ANT_OBSERVER_EARTH, "earth");
}

AntObserverChoice *
ant_observer_choice_new_l1 (void)
{
  return choice_new (ANT_OBSERVER_L1, "l1");
}

static gboolean
parse_site (const char *numbers, double value[3])
{
  g_auto (GStrv) parts = g_strsplit (numbers, ",", -1);
  if (g_strv_length (parts) != 3)
    return FALSE;
  for (int i = 0; i < 3; i++)
    {
      char *end;
      value[i] = g_ascii_strtod (g_strstrip (parts[i]), &end);
      if (end == parts[i] || *end || !isfinite (value[i]))
        return FALSE;
    }
  return TRUE;
}

AntObserverChoice *
ant_observer_choice_new_site (const char *numbers, GError **error)
{
  double value[3];
  if (!parse_site (numbers, value))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                   _("site: found “%s”, expected longitude east and latitude in degrees and height in metres, as site:10.5,47.2,120"),
                   numbers);
      return NULL;
    }
  g_autofree char *text = g_strconcat ("site:", numbers, NULL);
  g_autoptr (AntObserverChoice) choice = choice_new (ANT_OBSERVER_SITE, text);
  choice->observer.longitude_deg = value[0];
  choice->observer.latitude_deg = value[1];
  choice->observer.height_m = value[2];
  switch (ant_observer_check (&choice->observer, NULL, NULL))
    {
    case ANT_OBSERVER_GOOD: return g_steal_pointer (&choice);
    case ANT_OBSERVER_UNDERGROUND:
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                   _("site: %.0f m is inside the Earth, expected a height from -500 m to 100 km"), value[2]);
      return NULL;
    case ANT_OBSERVER_TOO_HIGH:
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                   _("site: %.0f m is no height of a site, expected -500 m to 100 km; give an orbit as a table of positions"), value[2]);
      return NULL;
    default:
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                   _("site: found longitude %g and latitude %g, expected -180 to 360 and -90 to 90 degrees"), value[0], value[1]);
      return NULL;
    }
}

/* What is wrong with a row, after "line 12: ". Caller frees. */
static char *
fault_words (AntObserverFault fault, const AntPositionTable *table, gsize row, double value)
{
  char from[40] = "";
  switch (fault)
    {
    case ANT_OBSERVER_NOT_RISING:
      return g_strdup (_("its time is not later than that of the row before"));
    case ANT_OBSERVER_INSIDE_EARTH:
      if (!(value > 0))
        return g_strdup (_("the position is not three numbers, expected km from the Earth's centre"));
      return g_strdup_printf (_("the position is %.4g km from the Earth's centre, inside the Earth; expected km, are these thousands of km?"),
                              value);
    case ANT_OBSERVER_TOO_FAR:
      return g_strdup_printf (_("the position is %.4g km from the Earth's centre, expected up to 3 million km; are these metres?"), value);
    case ANT_OBSERVER_HOLE:
      ant_time_text (ANT_SCALE_TT, ANT_J2000_JD, table->time_tt_d[row - 1], 0, sizeof from, from);
      return g_strdup_printf (_("a hole of %.4g h before it, from %s TT; expected even steps"), value * ANT_HOURS_PER_DAY, from);
    default:
      return g_strdup_printf (_("its neighbours put it %.3g km elsewhere: the rows are too far apart to tell positions between them, or this one is wrong"),
                              value);
    }
}

AntObserverChoice *
ant_observer_choice_new_table (const char *path, AntFrame frame, gsize n, double *time_tt_d, double *x_km, double *y_km,
                               double *z_km, const guint *line, GError **error)
{
  g_autoptr (AntObserverChoice) choice = choice_new (ANT_OBSERVER_TABLE, path);
  gsize row;
  double value;
  choice->observer.table = (AntPositionTable){ n, time_tt_d, x_km, y_km, z_km, frame };
  AntObserverFault fault = ant_observer_check (&choice->observer, &row, &value);
  if (fault == ANT_OBSERVER_GOOD)
    return g_steal_pointer (&choice);
  if (fault == ANT_OBSERVER_TOO_FEW)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found %zu positions, expected two or more"), path, n);
  else
    {
      g_autofree char *words = fault_words (fault, &choice->observer.table, row, value);
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: line %u: %s"), path, line[row], words);
    }
  return NULL;
}

AntObserverChoice *
ant_observer_choice_ref (AntObserverChoice *choice)
{
  g_atomic_int_inc (&choice->ref_count);
  return choice;
}

static void
free_column (const double *column)
{
  g_free ((gpointer) (guintptr) column); /* the numeric room sees it as constant */
}

void
ant_observer_choice_unref (AntObserverChoice *choice)
{
  if (!choice || !g_atomic_int_dec_and_test (&choice->ref_count))
    return;
  free_column (choice->observer.table.time_tt_d);
  free_column (choice->observer.table.x_km);
  free_column (choice->observer.table.y_km);
  free_column (choice->observer.table.z_km);
  g_free (choice->text);
  g_free (choice);
}

char *
ant_observer_choice_words (const AntObserverChoice *choice)
{
  const AntObserver *observer = &choice->observer;
  switch (observer->kind)
    {
    case ANT_OBSERVER_SITE:
      return g_strdup_printf (_("the site at %.4f° east, %.4f° north, %.0f m"), observer->longitude_deg, observer->latitude_deg,
                              observer->height_m);
    case ANT_OBSERVER_TABLE:
      {
        g_autofree char *name = g_path_get_basename (choice->text);
        return g_strdup_printf (_("the positions of %s"), name);
      }
    case ANT_OBSERVER_L1: return g_strdup (_("somebody near L1"));
    case ANT_OBSERVER_EARTH: break;
    }
  return g_strdup (_("the centre of the Earth"));
}
