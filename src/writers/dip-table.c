/* dip-table.c - the columns of dips and brightenings, and what stands above them. */
#include "writers/dip-table.h"

#include <math.h>

#include "core/units.h"
#include "data/verdict-words.h"

typedef struct
{
  const AntRecord *record;
  AntDipList list; /* its arrays are borrowed */
} Rows;

/* Cells: an expression of `rows`, `time` and `dip`. */
#define NUMBER(name, expression)                                                                                       \
  static double name (gconstpointer data, gsize row)                                                                   \
  {                                                                                                                    \
    const Rows *rows = data;                                                                                           \
    G_GNUC_UNUSED const AntTimeReference *time = &rows->record->time;                                                  \
    G_GNUC_UNUSED const AntDip *dip = &rows->list.dip[row];                                                           \
    return expression;                                                                                                 \
  }
#define TEXT(name, expression)                                                                                         \
  static char *name (gconstpointer data, gsize row)                                                                    \
  {                                                                                                                    \
    const Rows *rows = data;                                                                                           \
    G_GNUC_UNUSED const AntTimeReference *time = &rows->record->time;                                                  \
    G_GNUC_UNUSED const AntDip *dip = &rows->list.dip[row];                                                           \
    return expression;                                                                                                 \
  }

NUMBER (number, (double) row + 1)
NUMBER (start_jd, ant_time_reference_jd (time, dip->mid_d - dip->duration_d / 2))
NUMBER (mid_jd, ant_time_reference_jd (time, dip->mid_d))
NUMBER (end_jd, ant_time_reference_jd (time, dip->mid_d + dip->duration_d / 2))
TEXT (mid_time, ant_time_reference_own_text (time, dip->mid_d))
TEXT (mid_utc, ant_time_reference_utc_text (time, dip->mid_d, 0))
NUMBER (duration_h, dip->duration_d * ANT_HOURS_PER_DAY)
NUMBER (depth_ppm, dip->depth_ppm)
NUMBER (depth_sigma_ppm, dip->depth_sigma_ppm)
NUMBER (mean_depth_ppm, dip->mean_depth_ppm)
NUMBER (radius_ratio, dip->radius_ratio)
NUMBER (snr, dip->snr)
NUMBER (first_snr, dip->first_snr)
NUMBER (expected_false, dip->expected_false)
NUMBER (coverage, dip->coverage)
TEXT (edges, g_strdup (ant_edges_text (dip->edges)))
TEXT (class, g_strdup (ant_dip_class_name (rows->list.verdict ? ant_verdict_class (&rows->list.verdict[row]) : ANT_CLASS_UNDECIDED)))
NUMBER (probability, rows->list.verdict ? ant_verdict_probability (&rows->list.verdict[row]) : NAN)
TEXT (evidence, rows->list.verdict ? ant_verdict_table_text (&rows->list.verdict[row]) : g_strdup (""))
TEXT (asked, g_strdup (isnan (rows->list.upper_limit_ppm[row]) ? "" : "asked"))
NUMBER (upper_limit_ppm, rows->list.upper_limit_ppm[row])
TEXT (analyst_class, g_strdup (rows->list.analyst_class ? rows->list.analyst_class[row]
                                : ant_dip_class_name (ant_judgements_class (rows->list.judgements, dip->mid_d, dip->duration_d))))
TEXT (analyst_note, g_strdup (rows->list.analyst_note ? rows->list.analyst_note[row]
                               : ant_judgements_note (rows->list.judgements, dip->mid_d, dip->duration_d)))

#define PPM "10**-6"
static const AntTableColumn columns[] = {
  { "dip", ANT_CELL_WHOLE, NULL, NULL, "meta.id;meta.main", NULL, FALSE, number, NULL },
  { "start_jd", ANT_CELL_REAL, "%.7f", "d", "time.start", "contact I, JD in the record's time scale; empty if the origin of its times is unknown", TRUE,
    start_jd, NULL },
  { "mid_jd", ANT_CELL_REAL, "%.7f", "d", "time.epoch;meta.main", "middle, likewise", TRUE, mid_jd, NULL },
  { "end_jd", ANT_CELL_REAL, "%.7f", "d", "time.end", "contact IV, likewise", TRUE, end_jd, NULL },
  { "mid_time", ANT_CELL_TEXT, NULL, NULL, "time.epoch", "middle as the record writes its times", FALSE, NULL, mid_time },
  { "mid_utc", ANT_CELL_TEXT, NULL, NULL, "time.epoch", "middle in UTC; empty if the time scale is unknown", FALSE, NULL, mid_utc },
  { "duration_h", ANT_CELL_REAL, "%.4f", "h", "time.duration", "contact I to IV of the fitted shape; start and end are these contacts", FALSE,
    duration_h, NULL },
  { "depth_ppm", ANT_CELL_REAL, "%.6g", PPM, "phot.flux.bol;arith.ratio;stat.max",
    "greatest depth of the fitted shape before exposure smearing, relative to the undimmed level at that time", FALSE, depth_ppm, NULL },
  { "depth_sigma_ppm", ANT_CELL_REAL, "%.6g", PPM, "stat.error;phot.flux.bol;arith.ratio;stat.max", "1 sigma of depth_ppm", FALSE,
    depth_sigma_ppm, NULL },
  { "mean_depth_ppm", ANT_CELL_REAL, "%.6g", PPM, "phot.flux.bol;arith.ratio;stat.mean", "average of the fitted shape over contact I to IV", FALSE,
    mean_depth_ppm, NULL },
  { "radius_ratio", ANT_CELL_REAL, "%.6g", NULL, "phys.size.radius;arith.ratio",
    "radius of the dark disc whose crossing is that deep, over the radius of the source", FALSE, radius_ratio, NULL },
  { "snr", ANT_CELL_REAL, "%.4f", NULL, "stat.snr;meta.main",
    "of the fitted shape against the noise, after the dip was masked and the noise refitted", FALSE, snr, NULL },
  { "first_snr", ANT_CELL_REAL, "%.4f", NULL, "stat.snr", "of the best template on the first pass", FALSE, first_snr, NULL },
  { "expected_false", ANT_CELL_REAL, "%.3g", NULL, "meta.number;stat.probability",
    "dips by noise alone expected to reach this snr in this record", FALSE, expected_false, NULL },
  { "coverage", ANT_CELL_REAL, "%.4f", NULL, "stat.filling", "observed fraction of the dip, weighted by its shape", FALSE, coverage, NULL },
  { "edges", ANT_CELL_TEXT, NULL, NULL, "meta.code", "which of ingress and egress were observed: both, ingress, egress, none", FALSE, NULL, edges },
  { "class", ANT_CELL_TEXT, NULL, NULL, "meta.code.class", "what the dip is taken for", FALSE, NULL, class },
  { "probability", ANT_CELL_REAL, "%.4f", NULL, "stat.probability", "of that class; of the likeliest where it is undecided", FALSE, probability, NULL },
  { "evidence", ANT_CELL_TEXT, NULL, NULL, "meta.note", "shapes with their probabilities, then each piece of evidence with its number and, in brackets, the ln odds it gives the class", FALSE, NULL, evidence },
};

static const AntTableColumn asked_columns[] = {
  { "asked", ANT_CELL_TEXT, NULL, NULL, "meta.code", "time and duration were given and nothing was searched", FALSE, NULL, asked },
  { "upper_limit_ppm", ANT_CELL_REAL, "%.6g", PPM, "phot.flux.bol;arith.ratio;stat.max", "depth that is exceeded with a probability of 5 %",
    FALSE, upper_limit_ppm, NULL },
};

static const AntTableColumn analyst_columns[] = {
  { "analyst_class", ANT_CELL_TEXT, NULL, NULL, "meta.code.class", "what the analyst takes it for", FALSE, NULL, analyst_class },
  { "analyst_note", ANT_CELL_TEXT, NULL, NULL, "meta.note", "the analyst's note", FALSE, NULL, analyst_note },
};

static void
tell_search (AntTable *table, const AntDipList *list)
{
  char u1[G_ASCII_DTOSTR_BUF_SIZE], u2[G_ASCII_DTOSTR_BUF_SIZE];
  if (list->incomplete)
    ant_table_note (table, "incomplete: %s", list->incomplete);
  ant_table_note (table, "limb darkening: quadratic %s, %s", g_ascii_formatd (u1, sizeof u1, "%.4g", list->limb_u1),
                  g_ascii_formatd (u2, sizeof u2, "%.4g", list->limb_u2));
  if (list->upper_limit_ppm)
    {
      ant_table_note (table, "asked: snr is not to be held against the threshold of a search");
      if (isnan (list->threshold_snr)) /* there was none */
        return;
    }
  char snr_text[G_ASCII_DTOSTR_BUF_SIZE], false_alarms[G_ASCII_DTOSTR_BUF_SIZE];
  ant_table_note (
      table, "threshold: SNR %s; expected by chance at or above it in this record: %s",
      isfinite (list->threshold_snr) ? g_ascii_formatd (snr_text, sizeof snr_text, "%.3f", list->threshold_snr) : "unknown",
      isfinite (list->false_alarms) ? g_ascii_formatd (false_alarms, sizeof false_alarms, "%.3g", list->false_alarms) : "unknown");
  if (list->n_surrogates)
    ant_table_note (table, "threshold and expected_false: from %zu surrogates of this record, with %zu events of SNR 4 and more",
                    list->n_surrogates, list->n_surrogate_events);
  if (list->mirror_known)
    ant_table_note (table, "mirrored search, durations of 9 h and less: %zu dips and %zu brightenings at or above the threshold",
                    list->n_found, list->n_mirrored);
  if (list->brightenings)
    ant_table_note (table, "brightenings have negative depth and snr");
}

/* Whether the analyst has said anything of one of them. */
static gboolean
is_judged (const AntDipList *list)
{
  for (gsize i = 0; list->judgements && i < list->n; i++)
    if (ant_judgements_class (list->judgements, list->dip[i].mid_d, list->dip[i].duration_d) != ANT_CLASS_UNDECIDED
        || *ant_judgements_note (list->judgements, list->dip[i].mid_d, list->dip[i].duration_d))
      return TRUE;
  return FALSE;
}

AntTable *
ant_dip_table_new (const AntRecord *record, const AntDipList *list)
{
  AntTable *table = list->brightenings ? ant_table_new ("Brightenings", "BRIGHTENINGS", record) : ant_table_new ("Dips", "DIPS", record);
  Rows *rows = g_new (Rows, 1);
  *rows = (Rows) { record, *list };
  tell_search (table, list);
  ant_table_fact_number (table, "LIMB1", list->limb_u1, "linear coefficient of the limb darkening");
  ant_table_fact_number (table, "LIMB2", list->limb_u2, "quadratic coefficient of it");
  ant_table_fact_number (table, "MINSNR", list->threshold_snr, "least snr that is listed");
  ant_table_fact_number (table, "EXPFALSE", list->false_alarms, "dips by noise alone expected from there up");
  ant_table_add_columns (table, G_N_ELEMENTS (columns), columns);
  if (list->upper_limit_ppm)
    ant_table_add_columns (table, G_N_ELEMENTS (asked_columns), asked_columns);
  if (list->analyst_class || is_judged (list))
    ant_table_add_columns (table, G_N_ELEMENTS (analyst_columns), analyst_columns);
  ant_table_set_rows (table, list->n, rows, g_free);
  return table;
}

GString *
ant_dip_table_text (const AntRecord *record, const AntDipList *list)
{
  g_autoptr (AntTable) table = ant_dip_table_new (record, list);
  return ant_table_text (table);
}
