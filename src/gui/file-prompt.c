/* file-prompt.c - the file dialogs of GTK 4.8. */
#include "gui/file-prompt.h"

#include <glib/gi18n.h>

typedef struct
{
  AntFilePromptFunc callback;
  gpointer data;
} Prompt;

static void
response_cb (GtkNativeDialog *dialog, int response, Prompt *prompt)
{
  g_autoptr (GFile) file
      = response == GTK_RESPONSE_ACCEPT ? gtk_file_chooser_get_file (GTK_FILE_CHOOSER (dialog)) : NULL;
  g_autofree char *path = file ? g_file_get_path (file) : NULL;
  prompt->callback (path, prompt->data);
  g_free (prompt);
  g_object_unref (dialog);
}

static GtkFileChooserNative *
prompt_new (GtkWindow *parent, const char *title, GtkFileChooserAction action, const char *accept,
            AntFilePromptFunc callback, gpointer data)
{
  Prompt *prompt = g_new (Prompt, 1);
  *prompt = (Prompt) { callback, data };
  GtkFileChooserNative *dialog = gtk_file_chooser_native_new (title, parent, action, accept, _("_Cancel"));
  gtk_native_dialog_set_modal (GTK_NATIVE_DIALOG (dialog), TRUE);
  g_signal_connect (dialog, "response", G_CALLBACK (response_cb), prompt);
  return dialog;
}

void
ant_file_prompt_open (GtkWindow *parent, const char *title, AntFilePromptFunc callback, gpointer data)
{
  GtkFileChooserNative *dialog
      = prompt_new (parent, title, GTK_FILE_CHOOSER_ACTION_OPEN, _("_Open"), callback, data);
  gtk_native_dialog_show (GTK_NATIVE_DIALOG (dialog));
}

void
ant_file_prompt_folder (GtkWindow *parent, const char *title, AntFilePromptFunc callback, gpointer data)
{
  GtkFileChooserNative *dialog
      = prompt_new (parent, title, GTK_FILE_CHOOSER_ACTION_SELECT_FOLDER, _("_Save Here"), callback, data);
  gtk_native_dialog_show (GTK_NATIVE_DIALOG (dialog));
}

void
ant_file_prompt_save (GtkWindow *parent, const char *title, const char *suggested, AntFilePromptFunc callback,
                      gpointer data)
{
  GtkFileChooserNative *dialog
      = prompt_new (parent, title, GTK_FILE_CHOOSER_ACTION_SAVE, _("_Save"), callback, data);
  gtk_file_chooser_set_current_name (GTK_FILE_CHOOSER (dialog), suggested);
  gtk_native_dialog_show (GTK_NATIVE_DIALOG (dialog));
}
