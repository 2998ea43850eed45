/* observer-choice.h - who watched, as a person chose it: once for an analysis. It owns what the observer borrows.
 * Reference-counted, immutable once made, shared freely between threads. */
#pragma once

#include <glib.h>
#include "sky/observer.h"

typedef struct
{
  AntObserver observer; /* checked; its table's arrays are owned */
  char *text;           /* as of --observer: "earth", "l1", "site:LON,LAT,HEIGHT_M" or a table's path */
  gint ref_count;
} AntObserverChoice;

AntObserverChoice *ant_observer_choice_new_earth (void);
AntObserverChoice *ant_observer_choice_new_l1 (void);
/* "LON,LAT,HEIGHT_M": degrees east, degrees north, metres above the ellipsoid. NULL with one sentence. */
AntObserverChoice *ant_observer_choice_new_site (const char *numbers, GError **error);
/* Takes the columns [n] (times in days of TT from J2000.0, km). `line` [n]: where each row stands in the file. NULL with one
 * sentence that names path and line if they cannot be an observer's. */
AntObserverChoice *ant_observer_choice_new_table (const char *path, AntFrame frame, gsize n, double *time_tt_d, double *x_km,
                                                  double *y_km, double *z_km, const guint *line, GError **error);
AntObserverChoice *ant_observer_choice_ref (AntObserverChoice *choice);
void ant_observer_choice_unref (AntObserverChoice *choice); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntObserverChoice, ant_observer_choice_unref)

/* "the centre of the Earth", "positions of orbit.csv": for people. Caller frees. */
char *ant_observer_choice_words (const AntObserverChoice *choice);
