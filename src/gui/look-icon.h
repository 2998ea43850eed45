/* look-icon.h - a dip's shape, as the plots draw it, small enough for a row of text. */
#pragma once

#include <gtk/gtk.h>
#include "plot/theme.h"

#define ANT_TYPE_LOOK_ICON (ant_look_icon_get_type ())
G_DECLARE_FINAL_TYPE (AntLookIcon, ant_look_icon, ANT, LOOK_ICON, GtkWidget)

void ant_look_icon_set_look (AntLookIcon *self, AntDipLook look);
