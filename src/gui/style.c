/* style.c - the window's own style sheet and icons. */
#include "gui/style.h"

#include <gtk/gtk.h>

void
ant_style_install (void)
{
  GdkDisplay *display = gdk_display_get_default ();
  g_autoptr (GtkCssProvider) style = gtk_css_provider_new ();
  gtk_icon_theme_add_resource_path (gtk_icon_theme_get_for_display (display), "/org/antumbra/Antumbra/icons");
  gtk_css_provider_load_from_resource (style, "/org/antumbra/Antumbra/style.css");
  gtk_style_context_add_provider_for_display (display, GTK_STYLE_PROVIDER (style), GTK_STYLE_PROVIDER_PRIORITY_APPLICATION);
}
