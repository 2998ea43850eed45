/* verdict-text.c - verdicts to JSON and back: the probabilities, the fits of the rivals, the evidence. */
#include "data/verdict-text.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/error.h"
#include "data/json-fields.h"

static const char *const cause_words[]
    = { "planet", "planet-shaped", "spot", "eclipse", "flare", "instrument", "noise", NULL };
static const char *const rival_words[]
    = { "crossing", "trapezoid", "step", "recovery", "thermal", "spike", "spot", "eclipse", "flare", NULL };
static const char *const evidence_words[] = { "chance", "gap", "edges", "scatter", "twin", "speed", "predicted", "eclipsed", "witness",
                                              "bands", "column", "orbit", NULL };
G_STATIC_ASSERT (G_N_ELEMENTS (cause_words) == ANT_N_CAUSES + 1 && G_N_ELEMENTS (rival_words) == ANT_N_RIVALS + 1
                 && G_N_ELEMENTS (evidence_words) == ANT_N_EVIDENCE + 1);

#define REAL(type, member) ANT_JSON_REAL_OF (type, member)
static const AntJsonField verdict_fields[] = {
  REAL (AntVerdict, chi2_of_nothing),
  ANT_JSON_WORD_OF (AntVerdict, shape, cause_words),
  ANT_JSON_WORD_OF (AntVerdict, cause, cause_words),
};
static const AntJsonField rival_fields[] = {
  ANT_JSON_WORD_OF (AntRivalFit, kind, rival_words),
  REAL (AntRivalFit, parameter[0]), REAL (AntRivalFit, parameter[1]), REAL (AntRivalFit, parameter[2]), REAL (AntRivalFit, parameter[3]),
  REAL (AntRivalFit, mean[0]),      REAL (AntRivalFit, mean[1]),      REAL (AntRivalFit, mean[2]),      REAL (AntRivalFit, mean[3]),
  REAL (AntRivalFit, sigma[0]),     REAL (AntRivalFit, sigma[1]),     REAL (AntRivalFit, sigma[2]),     REAL (AntRivalFit, sigma[3]),
  REAL (AntRivalFit, depth_ppm),    REAL (AntRivalFit, depth_sigma_ppm), REAL (AntRivalFit, log_gain),
  REAL (AntRivalFit, log_evidence), REAL (AntRivalFit, chi2),
};
static const AntJsonField evidence_fields[] = {
  ANT_JSON_WORD_OF (AntEvidence, kind, evidence_words),
  REAL (AntEvidence, number[0]), REAL (AntEvidence, number[1]), REAL (AntEvidence, number[2]), REAL (AntEvidence, number[3]),
  REAL (AntEvidence, weight[0]), REAL (AntEvidence, weight[1]), REAL (AntEvidence, weight[2]), REAL (AntEvidence, weight[3]),
  REAL (AntEvidence, weight[4]), REAL (AntEvidence, weight[5]), REAL (AntEvidence, weight[6]),
};
G_STATIC_ASSERT (ANT_N_CAUSES == 7 && ANT_RIVAL_PARAMETERS == 4);
#define TABLE(fields) G_N_ELEMENTS (fields), fields

static JsonObject *
put (const AntVerdict *verdict)
{
  JsonObject *object = json_object_new ();
  AntRivalFit fitted[ANT_N_RIVALS];
  gsize n = 0;
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    if (verdict->rival[kind].fitted)
      fitted[n++] = verdict->rival[kind];
  json_object_set_boolean_member (object, "bright", verdict->sign < 0);
  ant_json_put_fields (object, TABLE (verdict_fields), verdict);
  json_object_set_array_member (object, "probability", ant_json_put_reals (ANT_N_CAUSES, verdict->probability));
  json_object_set_array_member (object, "shape_probability", ant_json_put_reals (ANT_N_CAUSES, verdict->shape_probability));
  json_object_set_array_member (object, "rival_probability", ant_json_put_reals (ANT_N_RIVALS + 1, verdict->rival_probability));
  json_object_set_array_member (object, "rivals", ant_json_put_records (TABLE (rival_fields), n, fitted, sizeof *fitted));
  json_object_set_array_member (object, "evidence",
                                ant_json_put_records (TABLE (evidence_fields), verdict->n_evidence, verdict->evidence, sizeof (AntEvidence)));
  return object;
}

static gboolean
get_rivals (JsonObject *object, AntVerdict *verdict, GError **error)
{
  g_autofree AntRivalFit *rival = NULL;
  gsize n = 0;
  if (!ant_json_get_records (object, "rivals", TABLE (rival_fields), sizeof *rival, ANT_N_RIVALS, &n, (gpointer *) &rival, error))
    return FALSE;
  for (gsize i = 0; i < n; i++)
    {
      verdict->rival[rival[i].kind] = rival[i];
      verdict->rival[rival[i].kind].fitted = 1;
    }
  return TRUE;
}

static gboolean
get_evidence (JsonObject *object, AntVerdict *verdict, GError **error)
{
  g_autofree AntEvidence *evidence = NULL;
  gsize n = 0;
  if (!ant_json_get_records (object, "evidence", TABLE (evidence_fields), sizeof *evidence, ANT_N_EVIDENCE, &n, (gpointer *) &evidence,
                             error))
    return FALSE;
  for (gsize i = 0; i < n; i++)
    ant_verdict_add (verdict, &evidence[i]);
  return TRUE;
}

static gboolean
are_probabilities (gsize n, const double *value)
{
  for (gsize i = 0; i < n; i++)
    if (!(value[i] >= 0 && value[i] <= 1))
      return FALSE;
  return TRUE;
}

static gboolean
get (JsonObject *object, AntVerdict *verdict, GError **error)
{
  *verdict = (AntVerdict) { .sign = json_object_get_boolean_member_with_default (object, "bright", FALSE) ? -1 : 1 };
  if (!ant_json_get_fields (object, TABLE (verdict_fields), verdict, error)
      || !ant_json_get_reals (object, "probability", ANT_N_CAUSES, verdict->probability, error)
      || !ant_json_get_reals (object, "shape_probability", ANT_N_CAUSES, verdict->shape_probability, error)
      || !ant_json_get_reals (object, "rival_probability", ANT_N_RIVALS + 1, verdict->rival_probability, error)
      || !get_rivals (object, verdict, error) || !get_evidence (object, verdict, error))
    return FALSE;
  if (are_probabilities (ANT_N_CAUSES, verdict->probability) && are_probabilities (ANT_N_CAUSES, verdict->shape_probability)
      && are_probabilities (ANT_N_RIVALS + 1, verdict->rival_probability))
    return TRUE;
  g_set_error_literal (error, ANT_ERROR, ANT_ERROR_READ, _("found a probability outside 0 to 1"));
  return FALSE;
}

JsonArray *
ant_verdicts_to_json (gsize n, const AntVerdict *verdict)
{
  JsonArray *array = json_array_new ();
  for (gsize i = 0; i < n; i++)
    json_array_add_object_element (array, put (&verdict[i]));
  return array;
}

gboolean
ant_verdicts_from_json (JsonObject *object, const char *name, gsize n, AntVerdict **verdict, GError **error)
{
  *verdict = NULL;
  if (!json_object_has_member (object, name))
    return TRUE;
  JsonArray *array = ant_json_get_array (object, name, n, error);
  if (!array)
    return FALSE;
  if (json_array_get_length (array) != n)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found %u, expected %zu, one for each event"), name,
                   json_array_get_length (array), n);
      return FALSE;
    }
  g_autofree AntVerdict *list = g_new0 (AntVerdict, MAX (n, 1));
  for (gsize i = 0; i < n; i++)
    {
      JsonObject *element = ant_json_element (array, (guint) i, error);
      if (!element || !get (element, &list[i], error))
        return ant_json_within (error, name, (gint64) i);
    }
  *verdict = g_steal_pointer (&list);
  return TRUE;
}
