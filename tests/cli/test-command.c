/* test-command.c - antumbra-cli as a program: verbs, help, exit codes. Its path is in ANT_CLI. */
#include <gio/gio.h>
#include <string.h>

#include "cli/verbs.h"
#include "data/settings.h"

typedef struct
{
  int code;
  char *out, *err;
} Answer;

static void
answer_clear (Answer *answer)
{
  g_free (answer->out);
  g_free (answer->err);
}
G_DEFINE_AUTO_CLEANUP_CLEAR_FUNC (Answer, answer_clear)

/* Run the command with up to three arguments. */
static Answer
ask (const char *first, const char *second, const char *third)
{
  const char *arguments[] = { g_getenv ("ANT_CLI"), first, second, third, NULL };
  g_autoptr (GError) error = NULL;
  g_autoptr (GSubprocess) child
      = g_subprocess_newv (arguments, G_SUBPROCESS_FLAGS_STDOUT_PIPE | G_SUBPROCESS_FLAGS_STDERR_PIPE, &error);
  g_assert_no_error (error);
  Answer answer = { 0 };
  g_subprocess_communicate_utf8 (child, NULL, NULL, &answer.out, &answer.err, &error);
  g_assert_no_error (error);
  g_assert_true (g_subprocess_get_if_exited (child));
  answer.code = g_subprocess_get_exit_status (child);
  return answer;
}

static void
assert_refused (const Answer *answer, int code, const char *part)
{
  g_assert_cmpint (answer->code, ==, code);
  g_assert_cmpstr (answer->out, ==, "");
  g_assert_true (g_str_has_prefix (answer->err, "antumbra-cli: "));
  g_assert_true (strchr (answer->err, '\n') == answer->err + strlen (answer->err) - 1);
  g_assert_nonnull (strstr (answer->err, part));
}

static void
help_names_every_verb (void)
{
  g_auto (Answer) answer = ask ("--help", NULL, NULL);
  g_assert_cmpint (answer.code, ==, 0);
  for (gsize i = 0; i < ant_n_verbs; i++)
    g_assert_nonnull (strstr (answer.out, ant_verb_table[i].name));
}

static void
every_verb_has_help (void)
{
  for (gsize i = 0; i < ant_n_verbs; i++)
    {
      g_auto (Answer) answer = ask (ant_verb_table[i].name, "--help", NULL);
      g_assert_cmpint (answer.code, ==, 0);
      g_autofree char *program = g_strdup_printf ("antumbra-cli %s", ant_verb_table[i].name);
      g_assert_nonnull (strstr (answer.out, program));
    }
}

static void
every_verb_refuses_an_unknown_option (void)
{
  for (gsize i = 0; i < ant_n_verbs; i++)
    {
      g_auto (Answer) answer = ask (ant_verb_table[i].name, "--no-such-option", NULL);
      assert_refused (&answer, 2, "--no-such-option");
    }
}

static void
an_unknown_verb_is_a_usage_error (void)
{
  g_auto (Answer) near = ask ("setings", NULL, NULL);
  assert_refused (&near, 2, "“settings”");
  g_auto (Answer) far = ask ("xyzzy", NULL, NULL);
  assert_refused (&far, 2, "xyzzy");
  g_auto (Answer) none = ask (NULL, NULL, NULL);
  assert_refused (&none, 2, "verb");
}

static void
settings_lists_the_whole_table (void)
{
  g_auto (Answer) answer = ask ("settings", NULL, NULL);
  g_assert_cmpint (answer.code, ==, 0);
  for (gsize i = 0; i < ant_n_settings; i++)
    g_assert_nonnull (strstr (answer.out, ant_setting_table[i].key));
}

static void
settings_shows_what_was_changed (void)
{
  g_auto (Answer) answer = ask ("settings", "--keys", "--set=edge=17.25");
  g_assert_cmpint (answer.code, ==, 0);
  g_assert_nonnull (strstr (answer.out, "\nedge=17.25\n"));
}

static void
a_bad_setting_is_a_usage_error (void)
{
  g_auto (Answer) answer = ask ("settings", "--set", "edge=1e9");
  assert_refused (&answer, 2, "1 to 720 min");
}

static void
a_missing_settings_file_cannot_be_read (void)
{
  g_auto (Answer) answer = ask ("settings", "--settings", "no/such/file");
  assert_refused (&answer, 3, "no/such/file");
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/cli/command/help-names-every-verb", help_names_every_verb);
  g_test_add_func ("/cli/command/every-verb-has-help", every_verb_has_help);
  g_test_add_func ("/cli/command/every-verb-refuses-an-unknown-option", every_verb_refuses_an_unknown_option);
  g_test_add_func ("/cli/command/an-unknown-verb-is-a-usage-error", an_unknown_verb_is_a_usage_error);
  g_test_add_func ("/cli/command/settings-lists-the-whole-table", settings_lists_the_whole_table);
  g_test_add_func ("/cli/command/settings-shows-what-was-changed", settings_shows_what_was_changed);
  g_test_add_func ("/cli/command/a-bad-setting-is-a-usage-error", a_bad_setting_is_a_usage_error);
  g_test_add_func ("/cli/command/a-missing-settings-file-cannot-be-read", a_missing_settings_file_cannot_be_read);
  return g_test_run ();
}
