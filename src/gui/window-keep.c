/* window-keep.c - the window's part in keeping the work: save and undo, what an earlier run left, a record that was not
 * found, and the question before work is lost. */
#include <glib/gi18n.h>

#include "data/analysis-text.h"
#include "gui/file-prompt.h"
#include "gui/preferences.h"
#include "gui/window-private.h"
#include "jobs/tables-task.h"
#include "writers/analysis-file.h"

/* Saving */

static char *
suggested_name (AntWindow *self)
{
  g_autofree char *name = ant_desk_get_name (self->desk);
  char *dot = name ? strrchr (name, '.') : NULL;
  if (dot && dot > name)
    *dot = '\0';
  return g_strconcat (name ? name : _("analysis"), ANT_ANALYSIS_SUFFIX, NULL);
}

static void
save_as_cb (const char *path, gpointer data)
{
  g_autoptr (AntWindow) self = data;
  if (!path)
    {
      ant_window_stay (self);
      return;
    }
  g_autofree char *named = ant_analysis_is_name (path) ? g_strdup (path) : g_strconcat (path, ANT_ANALYSIS_SUFFIX, NULL);
  if (!g_str_equal (named, path) && g_file_test (named, G_FILE_TEST_EXISTS))
    {
      g_autofree char *sentence = g_strdup_printf (_("%s: exists already; expected a new name"), named);
      ant_window_stay (self);
      ant_window_complain (self, sentence);
      return;
    }
  ant_preferences_add_recent (named);
  ant_desk_save (self->desk, named);
}

void
ant_window_save_as (AntWindow *self)
{
  g_autofree char *name = suggested_name (self);
  ant_file_prompt_save (GTK_WINDOW (self), _("Save the Analysis"), name, save_as_cb, g_object_ref (self));
}

void
ant_window_save (AntWindow *self)
{
  if (ant_analysis_get_path (ant_desk_get_analysis (self->desk)))
    ant_desk_save (self->desk, NULL);
  else
    ant_window_save_as (self);
}

/* Tables */

static void
tables_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntWindow) self = data;
  g_autoptr (GError) error = NULL;
  if (!ant_tables_task_finish (result, &error))
    ant_window_complain (self, error->message);
  if (g_application_get_default ())
    g_application_release (g_application_get_default ());
}

void
ant_window_save_tables_into (AntWindow *self, const char *folder, gboolean replace)
{
  const AntAnalysis *analysis = ant_desk_get_analysis (self->desk);
  if (!ant_analysis_get_results (analysis))
    return;
  if (g_application_get_default ()) /* it stays until the tables are whole, even if its windows are closed */
    g_application_hold (g_application_get_default ());
  g_autoptr (GPtrArray) comparisons = ant_desk_get_comparisons (self->desk);
  ant_tables_task_async (folder, ant_analysis_snapshot (analysis), comparisons, replace, tables_cb, g_object_ref (self));
}

static void
replace_cb (GtkDialog *dialog, int response, AntWindow *self)
{
  if (response == GTK_RESPONSE_ACCEPT)
    ant_window_save_tables_into (self, g_object_get_data (G_OBJECT (dialog), "folder"), TRUE);
  gtk_window_destroy (GTK_WINDOW (dialog));
}

static void
folder_cb (const char *folder, gpointer data)
{
  g_autoptr (AntWindow) self = data;
  if (!folder)
    return;
  g_autoptr (GPtrArray) comparisons = ant_desk_get_comparisons (self->desk);
  if (!ant_tables_would_replace (folder, comparisons->len))
    {
      ant_window_save_tables_into (self, folder, FALSE);
      return;
    }
  GtkWidget *dialog = gtk_message_dialog_new (GTK_WINDOW (self), GTK_DIALOG_MODAL | GTK_DIALOG_DESTROY_WITH_PARENT, GTK_MESSAGE_QUESTION,
                                              GTK_BUTTONS_NONE, _("Replace the tables in %s?"), folder);
  gtk_dialog_add_buttons (GTK_DIALOG (dialog), _("_Cancel"), GTK_RESPONSE_CANCEL, _("_Replace"), GTK_RESPONSE_ACCEPT, NULL);
  g_object_set_data_full (G_OBJECT (dialog), "folder", g_strdup (folder), g_free);
  g_signal_connect_object (dialog, "response", G_CALLBACK (replace_cb), self, 0);
  gtk_window_present (GTK_WINDOW (dialog));
}

void
ant_window_save_tables (AntWindow *self)
{
  ant_file_prompt_folder (GTK_WINDOW (self), _("Save the Tables into a Folder"), folder_cb, g_object_ref (self));
}

/* Leaving the analysis: closing the window, or opening another */

static void
go (AntWindow *self)
{
  g_autofree char *path = g_steal_pointer (&self->going_to);
  self->leave_when_saved = FALSE;
  if (path)
    {
      gtk_info_bar_set_revealed (self->banner, FALSE);
      ant_desk_open (self->desk, path);
      return;
    }
  self->may_close = TRUE;
  gtk_window_close (GTK_WINDOW (self));
}

void
ant_window_stay (AntWindow *self)
{
  self->leave_when_saved = FALSE;
  g_clear_pointer (&self->going_to, g_free);
}

/* Once the question is gone: it must not outlive its window. */
static gboolean
go_cb (gpointer data)
{
  g_autoptr (AntWindow) self = data;
  go (self);
  return G_SOURCE_REMOVE;
}

static void
leave_cb (GtkDialog *dialog, int response, AntWindow *self)
{
  self->asking = FALSE;
  gtk_window_destroy (GTK_WINDOW (dialog));
  if (response == GTK_RESPONSE_ACCEPT)
    {
      self->leave_when_saved = TRUE;
      ant_window_save (self);
    }
  else if (response == GTK_RESPONSE_REJECT)
    {
      ant_desk_forget_unsaved (self->desk);
      g_idle_add_full (G_PRIORITY_DEFAULT, go_cb, g_object_ref (self), NULL);
    }
  else
    ant_window_stay (self);
}

static void
ask (AntWindow *self)
{
  g_autofree char *name = ant_desk_get_name (self->desk);
  GtkWidget *dialog = gtk_message_dialog_new (GTK_WINDOW (self), GTK_DIALOG_MODAL | GTK_DIALOG_DESTROY_WITH_PARENT, GTK_MESSAGE_QUESTION,
                                              GTK_BUTTONS_NONE, _("Save the work on %s?"), name ? name : _("this record"));
  gtk_message_dialog_format_secondary_text (GTK_MESSAGE_DIALOG (dialog), "%s",
                                            _("Verdicts, notes, masks and settings since the last saving would be lost."));
  gtk_dialog_add_buttons (GTK_DIALOG (dialog), _("_Do Not Save"), GTK_RESPONSE_REJECT, _("_Cancel"), GTK_RESPONSE_CANCEL, _("_Save"),
                          GTK_RESPONSE_ACCEPT, NULL);
  gtk_dialog_set_default_response (GTK_DIALOG (dialog), GTK_RESPONSE_ACCEPT);
  g_signal_connect_object (dialog, "response", G_CALLBACK (leave_cb), self, 0);
  gtk_window_present (GTK_WINDOW (dialog));
}

gboolean
ant_window_leave (AntWindow *self, const char *path)
{
  if (!path && self->may_close)
    return TRUE;
  char *copy = g_strdup (path);
  g_free (self->going_to);
  self->going_to = copy;
  if (!ant_analysis_would_lose (ant_desk_get_analysis (self->desk)))
    {
      ant_desk_forget_unsaved (self->desk);
      if (!path)
        return TRUE;
      go (self);
      return TRUE;
    }
  if (ant_desk_is_saving (self->desk))
    {
      self->leave_when_saved = TRUE;
      return FALSE;
    }
  if (!self->asking)
    ask (self);
  self->asking = TRUE;
  return FALSE;
}

/* What is offered */

void
ant_window_accept_offer (AntWindow *self)
{
  if (ant_desk_get_left_behind (self->desk))
    ant_desk_take_left_behind (self->desk, TRUE);
  else
    ant_window_find_record (self);
}

void
ant_window_decline_offer (AntWindow *self)
{
  ant_desk_take_left_behind (self->desk, FALSE);
}

static void
found_cb (const char *path, gpointer data)
{
  g_autoptr (AntWindow) self = data;
  if (path)
    ant_desk_locate (self->desk, path);
}

void
ant_window_find_record (AntWindow *self)
{
  ant_file_prompt_open (GTK_WINDOW (self), _("Where Is the Record?"), found_cb, g_object_ref (self));
}

static void
show_offer (AntWindow *self)
{
  const char *left = ant_desk_get_left_behind (self->desk);
  gboolean lost = ant_desk_lacks_record (self->desk) && ant_desk_get_busy (self->desk) == ANT_BUSY_NO;
  g_autofree char *text = NULL;
  if (left)
    {
      g_autofree char *time = ant_file_time_words (left);
      text = g_strdup_printf (_("Work of %s was not saved before the program ended. Bring it back?"), time);
    }
  else if (lost)
    text = g_strdup_printf (_("The record of this analysis is not where it was: %s"),
                            ant_analysis_get_record_path (ant_desk_get_analysis (self->desk)));
  gtk_label_set_text (self->offer_text, text ? text : "");
  gtk_button_set_label (self->offer_yes, left ? _("_Bring Back") : _("_Find the Record…"));
  gtk_widget_set_visible (GTK_WIDGET (self->offer_no), left != NULL);
  gtk_info_bar_set_revealed (self->offer, text != NULL);
}

/* The names of the changes in the menu */
static void
show_steps (AntWindow *self)
{
  const AntAnalysis *analysis = ant_desk_get_analysis (self->desk);
  const char *undo = ant_analysis_undo_name (analysis), *redo = ant_analysis_redo_name (analysis);
  g_autofree char *undo_label = undo ? g_strdup_printf (_("_Undo: %s"), undo) : g_strdup (_("_Undo"));
  g_autofree char *redo_label = redo ? g_strdup_printf (_("_Redo: %s"), redo) : g_strdup (_("_Redo"));
  g_menu_remove_all (self->edit_section);
  g_menu_append (self->edit_section, undo_label, "win.undo");
  g_menu_append (self->edit_section, redo_label, "win.redo");
}

void
ant_window_show_kept (AntWindow *self)
{
  show_steps (self);
  show_offer (self);
  if (!self->leave_when_saved || ant_desk_is_saving (self->desk))
    return;
  if (!ant_analysis_is_changed (ant_desk_get_analysis (self->desk)))
    go (self);
  else
    ant_window_stay (self);
}
