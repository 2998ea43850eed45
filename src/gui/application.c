/* application.c - the program. */
#include "gui/application.h"

#include <glib/gi18n.h>

#include "config.h"
#include "gui/shortcuts.h"
#include "gui/style.h"
#include "gui/window.h"
#include "writers/analysis-file.h"

struct _AntApplication
{
  GtkApplication parent_instance;
};

G_DEFINE_FINAL_TYPE (AntApplication, ant_application, GTK_TYPE_APPLICATION)

AntApplication *
ant_application_new (GApplicationFlags flags)
{
  return g_object_new (ANT_TYPE_APPLICATION, "application-id", "org.antumbra.Antumbra", "flags",
                       G_APPLICATION_HANDLES_OPEN | flags, NULL);
}

/* Each window that an empty start opens offers one piece of work that an earlier run left without a file. */
static void
offer_left_behind (GApplication *application)
{
  g_auto (GStrv) left = ant_unsaved_left_behind ();
  for (char **path = left; *path; path++)
    {
      GtkWindow *window = GTK_WINDOW (ant_window_new (GTK_APPLICATION (application)));
      ant_desk_offer_left_behind (ant_window_get_desk (ANT_WINDOW (window)), *path);
      gtk_window_present (window);
    }
}

static void
ant_application_activate (GApplication *application)
{
  GtkWindow *window = gtk_application_get_active_window (GTK_APPLICATION (application));
  if (!window)
    offer_left_behind (application);
  if (!window)
    window = gtk_application_get_active_window (GTK_APPLICATION (application));
  gtk_window_present (window ? window : GTK_WINDOW (ant_window_new (GTK_APPLICATION (application))));
}

/* A record gets the window that has none, else a new one. */
static void
ant_application_open (GApplication *application, GFile **files, int n_files, const char *hint)
{
  for (int i = 0; i < n_files; i++)
    {
      g_autofree char *path = g_file_get_path (files[i]);
      GtkWindow *window = gtk_application_get_active_window (GTK_APPLICATION (application));
      if (!ANT_IS_WINDOW (window) || !ant_window_is_empty (ANT_WINDOW (window)))
        window = GTK_WINDOW (ant_window_new (GTK_APPLICATION (application)));
      gtk_window_present (window);
      if (path)
        ant_window_open (ANT_WINDOW (window), path);
    }
}

static void
new_window (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  gtk_window_present (GTK_WINDOW (ant_window_new (GTK_APPLICATION (data))));
}

static void
about (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  gtk_show_about_dialog (
      gtk_application_get_active_window (GTK_APPLICATION (data)), "program-name", _("Antumbra"), "logo-icon-name",
      "org.antumbra.Antumbra", "version", ANT_VERSION, "comments",
      _("Finds and explains dips in records of solar irradiance.\n\nNever look at the Sun, least of all "
         "through optics, without a certified solar filter made for it."),
      "license-type", GTK_LICENSE_GPL_3_0, NULL);
}

static void
quit (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  g_autoptr (GList) windows = g_list_copy (gtk_application_get_windows (GTK_APPLICATION (data)));
  for (GList *one = windows; one; one = one->next)
    gtk_window_close (one->data);
}

static void
ant_application_startup (GApplication *application)
{
  static const GActionEntry entries[] = { { "new-window", new_window, NULL, NULL, NULL, { 0 } },
                                          { "about", about, NULL, NULL, NULL, { 0 } },
                                          { "quit", quit, NULL, NULL, NULL, { 0 } } };
  G_APPLICATION_CLASS (ant_application_parent_class)->startup (application);
  g_action_map_add_action_entries (G_ACTION_MAP (application), entries, G_N_ELEMENTS (entries), application);
  ant_shortcuts_install (GTK_APPLICATION (application));
  ant_style_install ();
  gtk_window_set_default_icon_name ("org.antumbra.Antumbra");
}

static void
ant_application_class_init (AntApplicationClass *klass)
{
  GApplicationClass *application_class = G_APPLICATION_CLASS (klass);
  application_class->activate = ant_application_activate;
  application_class->open = ant_application_open;
  application_class->startup = ant_application_startup;
}

static void
ant_application_init (AntApplication *self)
{
  g_application_add_main_option (G_APPLICATION (self), "version", 0, 0, G_OPTION_ARG_NONE, _("Show the version"), NULL);
}
