/* fuzz-analysis.c - any bytes are either an analysis that can be written and read again, or one sentence of refusal. */
#include "data/analysis-text.h"
#include "data/error.h"

#include <stdlib.h>
#include <string.h>

#include "fuzz-door.h"

/* A broken promise must stop the fuzzer, in every build. */
static void
promise (gboolean kept)
{
  if (!kept)
    abort ();
}

static AntAnalysis *
read_once (const char *text, gsize n)
{
  g_autoptr (GError) error = NULL;
  g_autofree char *newer = NULL;
  AntAnalysis *analysis = ant_analysis_parse ("/any/where.antumbra", text, n, &newer, &error);
  promise ((analysis != NULL) != (error != NULL));
  if (error)
    promise (error->domain == ANT_ERROR && !strchr (error->message, '\n') && g_utf8_validate (error->message, -1, NULL));
  return analysis;
}

int
LLVMFuzzerTestOneInput (const uint8_t *bytes, size_t n)
{
  g_autoptr (AntAnalysis) analysis = read_once ((const char *) bytes, n);
  if (!analysis)
    return 0;
  g_autofree char *text = ant_analysis_to_text (analysis, "/any/where.antumbra");
  g_autoptr (AntAnalysis) again = read_once (text, strlen (text));
  promise (again != NULL);
  g_autofree char *twice = ant_analysis_to_text (again, "/any/where.antumbra");
  promise (strcmp (text, twice) == 0);
  return 0;
}
