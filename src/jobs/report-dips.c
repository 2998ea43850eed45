/* report-dips.c - the dips of a report one by one: close-up, numbers, what is said of them. */
#include <glib/gi18n.h>
#include <math.h>

#include "data/dip-words.h"
#include "data/verdict-words.h"
#include "jobs/closeup-data.h"
#include "jobs/report-private.h"

#define DIPS_A_PAGE 3
#define JUDGED_A_PAGE 2 /* with their evidence */
#define MOST_EVIDENCE 7
#define CLOSEUP_LEAST 150
#define HEADING 30 /* with the air around it */

typedef struct
{
  const AntDipCloseup *closeup;
  const AntTheme *theme;
} Drawing;

static void
paint (cairo_t *cr, const AntBox *box, double scale, gpointer data)
{
  const Drawing *drawing = data;
  AntView view;
  if (drawing->closeup->n == 0)
    return;
  ant_dip_closeup_view (drawing->closeup, &view);
  ant_dip_closeup_paint (cr, box, drawing->closeup, &view, drawing->theme, scale);
}

/* The heaviest pieces of evidence, and a number for each: cells of two columns. NULL if no verdict was made. */
static GPtrArray *
evidence_of (const AntScanResults *results, gsize dip)
{
  if (!results->dip_verdict)
    return NULL;
  g_autoptr (GPtrArray) lines = ant_verdict_lines (&results->dip_verdict[dip]);
  GPtrArray *cells = g_ptr_array_new_with_free_func (g_free);
  for (guint i = 0; i < MIN (lines->len, MOST_EVIDENCE); i++)
    {
      const AntEvidenceLine *line = g_ptr_array_index (lines, i);
      g_autofree char *weight = ant_number_words (line->weight, 1);
      g_ptr_array_add (cells, g_strconcat (line->weight > 0 ? "+" : "", weight, NULL));
      g_ptr_array_add (cells, g_strdup (line->text));
    }
  return cells;
}

static void
tell_verdict (const AntReport *report, gsize i, GPtrArray *facts)
{
  g_autofree char *verdict = ant_report_verdict_words (report, i);
  ant_facts_add (facts, _("Verdict"), verdict);
  if (report->results->dip_verdict)
    {
      const AntVerdict *made = &report->results->dip_verdict[i];
      g_autofree char *probability = ant_probability_words (ant_verdict_shape_probability (made));
      g_autofree char *shape = g_strdup_printf ("%s, %s", ant_dip_class_title (ant_verdict_shape_class (made)), probability);
      ant_facts_add (facts, _("By shape alone"), shape);
    }
  if (report->word && report->word[i].note && *report->word[i].note)
    ant_facts_add (facts, _("Note"), report->word[i].note);
}

static void
tell_dip (const AntReport *report, AntPages *pages, gsize i)
{
  const AntPagesColumn columns[] = { { _("ln odds"), 1 }, { _("Evidence"), 0 } };
  const AntScanResults *results = report->results;
  const AntDip *dip = &results->dip[i];
  AntCloseupData *data = ant_closeup_data_new (report->layers, &results->settings, dip,
                                               results->dip_verdict ? &results->dip_verdict[i] : NULL);
  Drawing drawing = { &data->closeup, ant_pages_theme (pages) };
  g_autoptr (GPtrArray) facts = ant_dip_facts (results->record, dip, NAN, ANT_DEPTH_PPM), evidence = evidence_of (results, i);
  g_autofree char *middle = ant_instant_words (results->record, dip->mid_d);
  g_autofree char *title = g_strdup_printf (_("Dip %zu · %s"), i + 1, middle);
  gsize n_evidence = evidence ? evidence->len / 2 : 0;
  const char *const *cells = n_evidence ? (const char *const *) evidence->pdata : NULL;
  double below = n_evidence ? ant_pages_table_height (pages, ANT_PAGES_SMALL, 2, columns, n_evidence, cells) : 0;
  double most = ant_pages_share (pages, n_evidence ? JUDGED_A_PAGE : DIPS_A_PAGE) - HEADING - below;
  double height = floor (ant_pages_fit (pages, HEADING + below, CLOSEUP_LEAST, most));
  tell_verdict (report, i, facts);
  ant_pages_heading (pages, 2, title, height + below);
  ant_pages_figure_facts (pages, height, paint, &drawing, facts);
  if (n_evidence)
    ant_pages_table (pages, ANT_PAGES_SMALL, 2, columns, n_evidence, cells);
  ant_closeup_data_free (data);
}

void
ant_report_dips (const AntReport *report, AntPages *pages)
{
  if (report->results->n_dips == 0)
    return;
  ant_pages_heading (pages, 1, _("The dips one by one"), ant_pages_share (pages, DIPS_A_PAGE) + 50);
  ant_pages_text (pages, ANT_PAGES_QUIET,
                  _("Length: contact I to IV of the fitted crossing. Depth: its greatest depth before the exposure smears it, of the undimmed "
                    "level at that time; mean depth: its average over contact I to IV; radius ratio: that of the dark disc whose crossing is that deep. "
                    "Observed: how much of the dip the record covers, weighted by its shape."));
  if (report->results->dip_verdict)
    ant_pages_text (pages, ANT_PAGES_QUIET,
                    _("Verdicts are the program's, with their probability, unless they are said to be the analyst's. ln odds: what a piece of evidence "
                      "speaks for the verdict over the likeliest other cause; 2.3 is ten to one."));
  for (gsize i = 0; i < report->results->n_dips; i++)
    tell_dip (report, pages, i);
}
