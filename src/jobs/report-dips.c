/* report-dips.c - the dips of a report one by one: close-up, numbers, what is said of them. */
#include <glib/gi18n.h>
#include <math.h>

#include "data/dip-words.h"
#include "jobs/closeup-data.h"
#include "jobs/report-private.h"

#define DIPS_A_PAGE 3
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

static void
tell_dip (const AntReport *report, AntPages *pages, gsize i)
{
  const AntScanResults *results = report->results;
  const AntDip *dip = &results->dip[i];
  AntCloseupData *data = ant_closeup_data_new (report->layers, &results->settings, dip);
  Drawing drawing = { &data->closeup, ant_pages_theme (pages) };
  g_autoptr (GPtrArray) facts = ant_dip_facts (results->record, dip, NAN, ANT_DEPTH_PPM);
  g_autofree char *middle = ant_instant_words (results->record, dip->mid_d);
  g_autofree char *title = g_strdup_printf (_("Dip %zu · %s"), i + 1, middle);
  ant_facts_add (facts, _("Verdict"), ant_report_class_title (report, i));
  if (report->word && report->word[i].note && *report->word[i].note)
    ant_facts_add (facts, _("Note"), report->word[i].note);
  double height = floor (ant_pages_share (pages, DIPS_A_PAGE) - HEADING);
  ant_pages_heading (pages, 2, title, height);
  ant_pages_figure_facts (pages, height, paint, &drawing, facts);
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
  for (gsize i = 0; i < report->results->n_dips; i++)
    tell_dip (report, pages, i);
}
