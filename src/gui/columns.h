/* columns.h - three children side by side as the width allows; those that do not fit wait behind the one in front, and
 * a switch above brings them there.
 *
 * Wide: all. Narrower: the first, and the one in front. Narrow: the one in front alone. The property "titles" names them
 * for the switch: "List|Chart|Dip". */
#pragma once

#include <gtk/gtk.h>

#define ANT_TYPE_COLUMNS (ant_columns_get_type ())
G_DECLARE_FINAL_TYPE (AntColumns, ant_columns, ANT, COLUMNS, GtkWidget)

/* Children come from the template, in order. */
guint ant_columns_get_shown (AntColumns *self);
void ant_columns_set_front (AntColumns *self, guint front);
