/* main.c - antumbra, the window: readies the libraries and runs the application. */
#include <fftw3.h>
#include <glib/gi18n.h>
#include <gsl/gsl_errno.h>
#include <locale.h>

#include "config.h"
#include "gui/application.h"

static int
options_cb (GApplication *application, GVariantDict *options, gpointer data)
{
  if (!g_variant_dict_contains (options, "version"))
    return -1;
  g_print ("antumbra %s\n", ANT_VERSION);
  return 0;
}

int
main (int argc, char **argv)
{
  setlocale (LC_ALL, "");
  bindtextdomain (ANT_GETTEXT_DOMAIN, ANT_LOCALE_DIR);
  bind_textdomain_codeset (ANT_GETTEXT_DOMAIN, "UTF-8");
  textdomain (ANT_GETTEXT_DOMAIN);
  gsl_set_error_handler_off (); /* its default ends the program */
  fftw_make_planner_thread_safe ();
  g_autoptr (AntApplication) application = ant_application_new (G_APPLICATION_DEFAULT_FLAGS);
  g_signal_connect (application, "handle-local-options", G_CALLBACK (options_cb), NULL);
  return g_application_run (G_APPLICATION (application), argc, argv);
}
