/* application.h - the program: windows, the command line, what belongs to no single window. */
#pragma once

#include <gtk/gtk.h>

#define ANT_TYPE_APPLICATION (ant_application_get_type ())
G_DECLARE_FINAL_TYPE (AntApplication, ant_application, ANT, APPLICATION, GtkApplication)

AntApplication *ant_application_new (GApplicationFlags flags);
