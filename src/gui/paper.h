/* paper.h - the colours that the desktop's present scheme asks of the plots, and the same paper under all that lies
 * beside them. */
#pragma once

#include <gtk/gtk.h>
#include "plot/theme.h"

/* Dark or light by the colour of the widget's text, so every theme is followed; high contrast by the theme's name. */
AntThemeKind ant_paper_kind (GtkWidget *widget);
/* Give cards and panels the paper of the plots, for as long as the window lives. */
void ant_paper_follow (GtkWidget *window);
