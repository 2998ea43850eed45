/* column-chooser.h - a window that shows a file's first lines and how they are read, and lets the columns, the writing of times and
 * the fill values be chosen; the effect of each choice is seen at once. */
#pragma once

#include <gtk/gtk.h>

#include "gui/desk.h"

#define ANT_TYPE_COLUMN_CHOOSER (ant_column_chooser_get_type ())
G_DECLARE_FINAL_TYPE (AntColumnChooser, ant_column_chooser, ANT, COLUMN_CHOOSER, GtkWindow)

/* What accepting does with the file: open it as the record, or as a witness beside it. */
typedef enum { ANT_CHOOSE_RECORD, ANT_CHOOSE_WITNESS } AntChoosePurpose;
/* For the file at `path`, beginning with these choices; accepting opens it on the desk. Present the window. */
GtkWidget *ant_column_chooser_new (GtkWindow *parent, AntDesk *desk, const char *path, const AntReadingChoices *choices,
                                   AntChoosePurpose purpose);
