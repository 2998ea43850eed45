/* main.c - antumbra-cli: readies the libraries, finds the verb, hands over. */
#include <errno.h>
#include <fftw3.h>
#include <glib/gi18n.h>
#include <gsl/gsl_errno.h>
#include <locale.h>
#include <stdio.h>

#include "cli/exit-code.h"
#include "cli/verbs.h"
#include "config.h"
#include "data/near-word.h"

static void
ready_libraries (void)
{
  setlocale (LC_ALL, "");
  if (!g_get_charset (NULL))
    setlocale (LC_CTYPE, "C.UTF-8"); /* else every quotation mark printed on a bare machine would be a question mark */
  bindtextdomain (ANT_GETTEXT_DOMAIN, ANT_LOCALE_DIR);
  bind_textdomain_codeset (ANT_GETTEXT_DOMAIN, "UTF-8");
  textdomain (ANT_GETTEXT_DOMAIN);
  gsl_set_error_handler_off (); /* its default ends the program */
  fftw_make_planner_thread_safe ();
}

static int
unknown_verb (const char *name)
{
  g_autofree const char **names = g_new0 (const char *, ant_n_verbs + 1);
  for (gsize i = 0; i < ant_n_verbs; i++)
    names[i] = ant_verb_table[i].name;
  const char *near = ant_near_word (name, names);
  if (near)
    return ant_cli_fail_usage (_("there is no verb “%s”; the nearest is “%s”"), name, near);
  return ant_cli_fail_usage (_("there is no verb “%s”; --help lists them"), name);
}

static int
run (int argc, char **argv)
{
  if (argc < 2)
    return ant_cli_fail_usage (_("a verb is missing; --help lists them"));
  if (g_str_equal (argv[1], "--help") || g_str_equal (argv[1], "-h"))
    {
      g_autofree char *help = ant_verbs_help ();
      g_print ("%s", help);
      return ANT_EXIT_DONE;
    }
  if (g_str_equal (argv[1], "--version"))
    {
      g_print ("antumbra-cli %s\n", ANT_VERSION);
      return ANT_EXIT_DONE;
    }
  const AntVerb *verb = ant_verb_find (argv[1]);
  if (!verb)
    return unknown_verb (argv[1]);
  g_autofree char *program = g_strdup_printf ("antumbra-cli %s", verb->name);
  g_set_prgname (program);
  return verb->run (argc - 1, argv + 1);
}

int
main (int argc, char **argv)
{
  ready_libraries ();
  int code = run (argc, argv);
  if (fflush (stdout) == 0 && !ferror (stdout))
    return code;
  if (code != ANT_EXIT_DONE)
    return code;
  g_printerr (_("antumbra-cli: standard output: %s\n"), g_strerror (errno));
  return ANT_EXIT_WRITE;
}
