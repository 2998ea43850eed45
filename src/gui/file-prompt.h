/* file-prompt.h - ask for a file; one place to change when the toolkit's dialogs do. */
#pragma once

#include <gtk/gtk.h>

/* path: the chosen one, or NULL if the user changed their mind; called exactly once, on the main loop. */
typedef void (*AntFilePromptFunc) (const char *path, gpointer data);

void ant_file_prompt_open (GtkWindow *parent, const char *title, AntFilePromptFunc callback, gpointer data);
void ant_file_prompt_folder (GtkWindow *parent, const char *title, AntFilePromptFunc callback, gpointer data);
/* suggested: a name without folder. The dialog itself asks before it replaces a file. */
void ant_file_prompt_save (GtkWindow *parent, const char *title, const char *suggested, AntFilePromptFunc callback,
                           gpointer data);
