/* paper.c - follow the desktop's scheme. */
#include "gui/paper.h"

#include <string.h>

AntThemeKind
ant_paper_kind (GtkWidget *widget)
{
  GdkRGBA text;
  gtk_style_context_get_color (gtk_widget_get_style_context (widget), &text);
  gboolean dark = 0.2126f * text.red + 0.7152f * text.green + 0.0722f * text.blue > 0.5f;
  g_autofree char *name = NULL;
  g_object_get (gtk_widget_get_settings (widget), "gtk-theme-name", &name, NULL);
  const char *forced = g_getenv ("GTK_THEME");
  g_autofree char *folded = g_ascii_strdown (forced ? forced : name ? name : "", -1);
  gboolean contrast = strstr (folded, "highcontrast") || strstr (folded, "-hc");
  return contrast ? (dark ? ANT_THEME_CONTRAST_DARK : ANT_THEME_CONTRAST) : dark ? ANT_THEME_DARK : ANT_THEME_LIGHT;
}

/* A provider that is loaded anew does not reach every widget that has its style already; a new one does. */
static void
apply (GtkWidget *window)
{
  AntTheme theme;
  ant_theme_init (&theme, ant_paper_kind (window));
  AntColour paper = theme.role[ANT_ROLE_PAPER];
  GdkRGBA colour = { (float) paper.red, (float) paper.green, (float) paper.blue, 1 };
  g_autofree char *name = gdk_rgba_to_string (&colour);
  g_autofree char *css = g_strdup_printf (".card, timestack, settingspanel { background-color: %s; }", name);
  GdkDisplay *display = gtk_widget_get_display (window);
  GtkCssProvider *before = g_object_get_data (G_OBJECT (display), "ant-paper"), *provider = gtk_css_provider_new ();
  gtk_css_provider_load_from_data (provider, css, -1);
  if (before)
    gtk_style_context_remove_provider_for_display (display, GTK_STYLE_PROVIDER (before));
  gtk_style_context_add_provider_for_display (display, GTK_STYLE_PROVIDER (provider),
                                              GTK_STYLE_PROVIDER_PRIORITY_APPLICATION);
  g_object_set_data_full (G_OBJECT (display), "ant-paper", provider, g_object_unref);
}

static void
scheme_changed_cb (GtkSettings *settings, GParamSpec *pspec, GtkWidget *window)
{
  apply (window);
}

void
ant_paper_follow (GtkWidget *window)
{
  GtkSettings *settings = gtk_widget_get_settings (window);
  g_signal_connect_object (settings, "notify::gtk-theme-name", G_CALLBACK (scheme_changed_cb), window, G_CONNECT_AFTER);
  g_signal_connect_object (settings, "notify::gtk-application-prefer-dark-theme", G_CALLBACK (scheme_changed_cb),
                           window, G_CONNECT_AFTER);
  apply (window);
}
