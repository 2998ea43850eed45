/* verdict-words.c - verdicts in words. */
#include "data/verdict-words.h"

#include <glib/gi18n.h>
#include <math.h>
#include <stdlib.h>

#include "core/units.h"
#include "data/dip-words.h"

AntDipClass
ant_cause_class (AntCause cause)
{
  static const AntDipClass class[ANT_N_CAUSES] = {
    [ANT_CAUSE_PLANET] = ANT_CLASS_PLANET,   [ANT_CAUSE_PLANET_SHAPED] = ANT_CLASS_PLANET_SHAPED,
    [ANT_CAUSE_SPOT] = ANT_CLASS_SPOT,       [ANT_CAUSE_ECLIPSE] = ANT_CLASS_ECLIPSE,
    [ANT_CAUSE_FLARE] = ANT_CLASS_FLARE,     [ANT_CAUSE_INSTRUMENT] = ANT_CLASS_INSTRUMENT,
    [ANT_CAUSE_NOISE] = ANT_CLASS_NOISE,
  };
  return class[cause];
}

double
ant_verdict_probability (const AntVerdict *verdict)
{
  return verdict->probability[verdict->cause];
}

double
ant_verdict_shape_probability (const AntVerdict *verdict)
{
  return verdict->shape_probability[verdict->shape];
}

AntDipClass
ant_verdict_class (const AntVerdict *verdict)
{
  AntCause named = ant_verdict_named (verdict, verdict->cause, ant_verdict_probability (verdict));
  return named == ANT_N_CAUSES ? ANT_CLASS_UNDECIDED : ant_cause_class (named);
}

AntDipClass
ant_verdict_shape_class (const AntVerdict *verdict)
{
  AntCause named = ant_verdict_named (verdict, verdict->shape, ant_verdict_shape_probability (verdict));
  return named == ANT_N_CAUSES ? ANT_CLASS_UNDECIDED : ant_cause_class (named);
}

char *
ant_probability_words (double probability)
{
  if (probability > 0.999)
    return g_strdup ("> 99.9 %");
  if (probability < 0.001)
    return g_strdup ("< 0.1 %");
  return g_strdup_printf (probability > 0.99 || probability < 0.1 ? "%.1f %%" : "%.0f %%", 100 * probability);
}

char *
ant_class_words (AntDipClass analyst, const AntVerdict *verdict)
{
  if (analyst != ANT_CLASS_UNDECIDED || !verdict)
    return g_strdup (ant_dip_class_title (analyst));
  g_autofree char *likely = ant_probability_words (ant_verdict_probability (verdict));
  AntDipClass class = ant_verdict_class (verdict);
  return class == ANT_CLASS_UNDECIDED ? g_strdup (ant_dip_class_title (class)) : g_strdup_printf ("%s %s", ant_dip_class_title (class), likely);
}

/* What the fit of a crossing gives, where that is what the event looks like. */
static void
add_crossing (const AntVerdict *verdict, GPtrArray *facts)
{
  const AntRivalFit *fit = &verdict->rival[ANT_RIVAL_CROSSING];
  if (!fit->fitted || !(verdict->shape_probability[ANT_CAUSE_PLANET] >= 0.1))
    return;
  g_autofree char *text
      = g_strdup_printf (_("radius ratio %.4f ± %.4f, impact %.2f ± %.2f, contact I to IV %.2f ± %.2f h"), fit->mean[3],
                         fit->mean[3] * fit->sigma[3], fit->mean[2], fit->sigma[2], fit->mean[1] * ANT_HOURS_PER_DAY,
                         fit->mean[1] * fit->sigma[1] * ANT_HOURS_PER_DAY);
  ant_facts_add (facts, _("As a crossing"), text);
}

void
ant_verdict_facts (const AntVerdict *verdict, GPtrArray *facts)
{
  g_autofree char *likely = ant_probability_words (ant_verdict_probability (verdict));
  g_autofree char *shape_likely = ant_probability_words (ant_verdict_shape_probability (verdict));
  g_autofree char *class = g_strdup_printf ("%s, %s", ant_dip_class_title (ant_cause_class (verdict->cause)), likely);
  g_autofree char *shape = g_strdup_printf ("%s, %s", ant_dip_class_title (ant_cause_class (verdict->shape)), shape_likely);
  ant_facts_add (facts, _("Taken for"), class);
  ant_facts_add (facts, _("By shape alone"), shape);
  add_crossing (verdict, facts);
}

const char *
ant_rival_title (AntRivalKind kind)
{
  static const char *const title[ANT_N_RIVALS] = {
    [ANT_RIVAL_CROSSING] = N_("crossing"),
    [ANT_RIVAL_TRAPEZOID] = N_("flat-bottomed dip"),
    [ANT_RIVAL_STEP] = N_("step"),
    [ANT_RIVAL_RECOVERY] = N_("step that recovers"),
    [ANT_RIVAL_THERMAL] = N_("gradual fall that recovers"),
    [ANT_RIVAL_SPIKE] = N_("spike"),
    [ANT_RIVAL_SPOT] = N_("passing spot"),
    [ANT_RIVAL_ECLIPSE] = N_("eclipse"),
    [ANT_RIVAL_FLARE] = N_("flare"),
  };
  return _ (title[kind]);
}

gsize
ant_verdict_ranking (const AntVerdict *verdict, AntRivalKind ranking[ANT_N_RIVALS])
{
  gsize n = 0;
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    {
      if (!verdict->rival[kind].fitted)
        continue;
      gsize at = n++;
      for (; at > 0 && verdict->rival_probability[ranking[at - 1]] < verdict->rival_probability[kind]; at--)
        ranking[at] = ranking[at - 1];
      ranking[at] = (AntRivalKind) kind;
    }
  return n;
}

/* A body's crossing, known or not. */
static gboolean
is_crossing (AntCause cause)
{
  return cause == ANT_CAUSE_PLANET || cause == ANT_CAUSE_PLANET_SHAPED;
}

/* The likeliest cause of another kind: weights are against it. */
static AntCause
runner_up (const AntVerdict *verdict)
{
  AntCause second = verdict->cause == ANT_CAUSE_INSTRUMENT ? ANT_CAUSE_NOISE : ANT_CAUSE_INSTRUMENT;
  for (int cause = 0; cause < ANT_N_CAUSES; cause++)
    if (cause != (int) verdict->cause && !(is_crossing ((AntCause) cause) && is_crossing (verdict->cause))
        && verdict->probability[cause] > verdict->probability[second])
      second = (AntCause) cause;
  return second;
}

static double
weight_of (const AntVerdict *verdict, const AntEvidence *evidence)
{
  if (evidence->kind == ANT_EVIDENCE_CHANCE) /* against noise, whoever is second */
    return (verdict->cause == ANT_CAUSE_NOISE ? 1 : -1) * evidence->weight[ANT_CAUSE_NOISE];
  return evidence->weight[verdict->cause] - evidence->weight[runner_up (verdict)];
}

static char *
gap_sentence (const AntEvidence *evidence)
{
  if (isnan (evidence->number[0]))
    return g_strdup (_("Its onset is not at a gap"));
  if (evidence->number[0] <= 0)
    return g_strdup_printf (_("Its onset lies in a gap; %.0f %% of the record's time is as near one"), 100 * evidence->number[1]);
  return g_strdup_printf (_("Its onset is %.0f min after a gap; %.0f %% of the record's time is as near one"),
                          evidence->number[0], 100 * evidence->number[1]);
}

static char *
edges_sentence (const AntEvidence *evidence)
{
  gboolean ingress = evidence->number[0] > 0, egress = evidence->number[1] > 0;
  return g_strdup (ingress && egress ? _("Both its start and its end were observed")
                   : ingress         ? _("Only its start was observed")
                   : egress          ? _("Only its end was observed")
                                     : _("Neither its start nor its end was observed"));
}

static char *
twin_sentence (const AntEvidence *evidence)
{
  if (isnan (evidence->number[0]))
    return g_strdup (_("No event of the other sign is near"));
  return g_strdup_printf (_("An event of the other sign, SNR %.1f, is %.1f h away; by chance in %.0f %% of cases"),
                          fabs (evidence->number[1]), evidence->number[0], 100 * evidence->number[2]);
}

static char *
predicted_sentence (const AntEvidence *evidence)
{
  if (!(evidence->number[3] > 0))
    return g_strdup (_("No almanac could be asked: the time scale or the observer is not known"));
  if (isnan (evidence->number[0]))
    return g_strdup (_("No crossing is predicted then"));
  g_autofree char *off = ant_number_words (evidence->number[0], 1);
  return g_strdup_printf (_("A crossing is predicted, %.1f ppm deep and %.2f h long; the dip's middle is %s min from it"),
                          evidence->number[1], evidence->number[2], off);
}

static char *
witness_sentence (const AntEvidence *evidence)
{
  if (!(evidence->number[3] > 0))
    return g_strdup (_("The witness has no data then"));
  g_autofree char *depth = ant_number_words (evidence->number[0], 1), *shared = ant_number_words (evidence->number[2], 2);
  return g_strdup_printf (_("The witness shows %s ± %.1f ppm with this shape; the two records' noise is correlated by %s"), depth,
                          evidence->number[1], shared);
}

static char *
sentence (const AntEvidence *evidence)
{
  const double *number = evidence->number;
  switch (evidence->kind)
    {
    case ANT_EVIDENCE_CHANCE:
      if (isnan (number[0])) /* asked about: there was no search that chance could have helped */
        return NULL;
      {
        g_autofree char *expected = ant_chance_words (number[0]);
        return g_strdup_printf (_("Noise alone would show %s dips as strong in this record"), expected);
      }
    case ANT_EVIDENCE_GAP:
      return gap_sentence (evidence);
    case ANT_EVIDENCE_EDGES:
      return edges_sentence (evidence);
    case ANT_EVIDENCE_LOCAL_NOISE:
      return isnan (number[0]) ? NULL : g_strdup_printf (_("The scatter around it is %.2f times the noise model's"), number[0]);
    case ANT_EVIDENCE_TWIN:
      return twin_sentence (evidence);
    case ANT_EVIDENCE_CHORD:
      return g_strdup_printf (_("As a crossing: a disc of %.4f radii moving at %.0f km/s before a star as large as the Sun"), number[1],
                              number[0]);
    case ANT_EVIDENCE_PREDICTED:
      return predicted_sentence (evidence);
    case ANT_EVIDENCE_ECLIPSED:
      if (!(number[3] > 0))
        return NULL;
      return isnan (number[0]) ? g_strdup (_("No eclipse is predicted then"))
                               : g_strdup_printf (_("An eclipse is predicted, its middle %.0f min away"), fabs (number[0]));
    case ANT_EVIDENCE_WITNESS:
      return witness_sentence (evidence);
    case ANT_EVIDENCE_BANDS:
      return g_strdup_printf (_("The two bands' depths have the ratio %.3f ± %.3f; a crossing would give %.3f"), number[0], number[1],
                              number[2]);
    case ANT_EVIDENCE_COLUMN:
      return g_strdup_printf (_("Housekeeping moves with it, %.1f sigma from not at all"), fabs (number[0]));
    case ANT_EVIDENCE_ORBIT:
      return g_strdup_printf (_("It begins at phase %.2f of the orbit; that the record's events crowd so has chance %.2g"), number[0],
                              number[1]);
    default:
      return NULL;
    }
}

char *
ant_weight_words (double weight)
{
  if (fabs (weight) < 0.05)
    return g_strdup ("0");
  g_autofree char *number = ant_number_words (weight, fabs (weight) < 10 ? 1 : 0);
  return g_strconcat (weight > 0 ? "+" : "", number, NULL);
}

static void
line_free (gpointer data)
{
  AntEvidenceLine *line = data;
  g_free (line->text);
  g_free (line);
}

static void
add_line (GPtrArray *lines, char *text, double weight)
{
  AntEvidenceLine *line = g_new (AntEvidenceLine, 1);
  *line = (AntEvidenceLine) { text, weight };
  g_ptr_array_add (lines, line);
}

static int
by_weight (gconstpointer a, gconstpointer b)
{
  double left = fabs ((*(AntEvidenceLine *const *) a)->weight), right = fabs ((*(AntEvidenceLine *const *) b)->weight);
  return (left < right) - (left > right);
}

/* The shapes: the best against the best of another cause. */
static void
add_shapes (GPtrArray *lines, const AntVerdict *verdict)
{
  AntRivalKind ranking[ANT_N_RIVALS];
  gsize n = ant_verdict_ranking (verdict, ranking);
  if (n == 0)
    return;
  const AntRivalPrior *best = ant_rival_prior (ranking[0]);
  int bright = verdict->sign < 0;
  for (gsize i = 1; i < n; i++)
    if (ant_rival_prior (ranking[i])->cause[bright] != best->cause[bright])
      {
        double weight = log (MAX (verdict->rival_probability[ranking[0]], 1e-300) / MAX (verdict->rival_probability[ranking[i]], 1e-300));
        gboolean own = best->cause[bright] == verdict->cause || (is_crossing (best->cause[bright]) && is_crossing (verdict->cause));
        add_line (lines,
                  g_strdup_printf (_("Its shape is that of a %s rather than a %s, chi² %.2f against %.2f per sample"),
                                   ant_rival_title (ranking[0]), ant_rival_title (ranking[i]), verdict->rival[ranking[0]].chi2,
                                   verdict->rival[ranking[i]].chi2),
                  own ? weight : -weight);
        return;
      }
}

GPtrArray *
ant_verdict_lines (const AntVerdict *verdict)
{
  GPtrArray *lines = g_ptr_array_new_with_free_func (line_free);
  add_shapes (lines, verdict);
  for (gsize i = 0; i < verdict->n_evidence; i++)
    {
      char *text = sentence (&verdict->evidence[i]);
      if (text)
        add_line (lines, text, weight_of (verdict, &verdict->evidence[i]));
    }
  g_ptr_array_sort (lines, by_weight);
  return lines;
}

static const char *const short_name[ANT_N_EVIDENCE] = {
  [ANT_EVIDENCE_CHANCE] = "chance",       [ANT_EVIDENCE_GAP] = "gap",           [ANT_EVIDENCE_EDGES] = "edges",
  [ANT_EVIDENCE_LOCAL_NOISE] = "scatter", [ANT_EVIDENCE_TWIN] = "twin",         [ANT_EVIDENCE_CHORD] = "speed",
  [ANT_EVIDENCE_PREDICTED] = "predicted", [ANT_EVIDENCE_ECLIPSED] = "eclipsed", [ANT_EVIDENCE_WITNESS] = "witness",
  [ANT_EVIDENCE_BANDS] = "bands",         [ANT_EVIDENCE_COLUMN] = "column",     [ANT_EVIDENCE_ORBIT] = "orbit",
};

/* Heaviest first; places of verdict->evidence. */
static void
sort_evidence (const AntVerdict *verdict, gsize order[ANT_N_EVIDENCE])
{
  for (gsize i = 0; i < verdict->n_evidence; i++)
    {
      double weight = fabs (weight_of (verdict, &verdict->evidence[i]));
      gsize at = i;
      for (; at > 0 && fabs (weight_of (verdict, &verdict->evidence[order[at - 1]])) < weight; at--)
        order[at] = order[at - 1];
      order[at] = i;
    }
}

static void
append_number (GString *text, const char *before, const char *format, double number, const char *after)
{
  char digits[G_ASCII_DTOSTR_BUF_SIZE];
  g_string_append_printf (text, "%s%s%s", before, isnan (number) ? "none" : g_ascii_formatd (digits, sizeof digits, format, number), after);
}

char *
ant_verdict_table_text (const AntVerdict *verdict)
{
  AntRivalKind ranking[ANT_N_RIVALS];
  gsize order[ANT_N_EVIDENCE];
  gsize n = ant_verdict_ranking (verdict, ranking);
  GString *text = g_string_new ("shape");
  for (gsize i = 0; i < n && (i == 0 || verdict->rival_probability[ranking[i]] >= 0.001); i++)
    {
      g_string_append_printf (text, " %s", ant_rival_prior (ranking[i])->name);
      append_number (text, " ", "%.3f", verdict->rival_probability[ranking[i]], "");
    }
  sort_evidence (verdict, order);
  for (gsize i = 0; i < verdict->n_evidence; i++)
    {
      const AntEvidence *evidence = &verdict->evidence[order[i]];
      g_string_append_printf (text, "; %s", short_name[evidence->kind]);
      append_number (text, " ", "%.3g", evidence->number[0], "");
      append_number (text, " (", "%+.1f", weight_of (verdict, evidence), ")");
    }
  return g_string_free (text, FALSE);
}
