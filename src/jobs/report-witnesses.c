/* report-witnesses.c - what other instruments had of the same Sun: how each compares with the record, and the ratio. */
#include <glib/gi18n.h>

#include "data/dip-words.h"
#include "jobs/report-private.h"
#include "plot/strip.h"

#define STRIP_HEIGHT 130
#define HEADING 90 /* above the strip: heading and a few lines */

typedef struct
{
  const AntComparison *comparison;
  AntPyramid *pyramid;
  const AntTheme *theme;
} Drawing;

static void
paint_ratio (cairo_t *cr, const AntBox *box, double scale, gpointer data)
{
  const Drawing *drawing = data;
  const AntComparison *comparison = drawing->comparison;
  g_autofree char *step = ant_length_words (comparison->step_d), *drift = ant_length_words (comparison->drift_d);
  g_autofree char *caption = comparison->drift_d > 0 ? g_strdup_printf (_("averages of %s, running median of %s taken out"), step, drift)
                                                     : g_strdup_printf (_("averages of %s"), step);
  AntStrip strip = ANT_STRIP_INIT;
  strip.title = _("Record over witness, ppm");
  strip.caption = caption;
  strip.time = &comparison->record->time;
  strip.start_d = comparison->start_d;
  strip.step_d = comparison->step_d;
  strip.pyramid = drawing->pyramid;
  strip.time_axis = TRUE;
  AntView view = { .from = comparison->start_d, .to = comparison->start_d + (double) comparison->n * comparison->step_d, .low = -100, .high = 100 };
  ant_view_fit_y (&view, strip.pyramid, strip.start_d, strip.step_d);
  ant_strip_paint (cr, box, &strip, &view, drawing->theme, scale);
}

static void
tell_witness (const AntComparison *comparison, guint i, AntPages *pages)
{
  g_autofree char *name = ant_report_record_name (comparison->witness);
  g_autofree char *title = g_strdup_printf (_("Witness %u · %s"), i + 1, name);
  g_autofree char *sum = g_strdup_printf (_("SHA-256 of the file: %s."), comparison->witness->sha256);
  g_autoptr (GPtrArray) words = ant_comparison_words (comparison);
  Drawing drawing = { comparison, ant_pyramid_new (comparison->n, comparison->ratio_ppm), ant_pages_theme (pages) };
  ant_pages_heading (pages, 2, title, HEADING + STRIP_HEIGHT);
  for (guint k = 0; k < words->len; k++)
    ant_pages_item (pages, g_ptr_array_index (words, k));
  ant_pages_item (pages, sum);
  ant_pages_figure (pages, STRIP_HEIGHT, paint_ratio, &drawing);
  ant_pyramid_free (drawing.pyramid);
}

void
ant_report_witnesses (const AntReport *report, AntPages *pages)
{
  if (!report->comparisons || report->comparisons->len == 0)
    return;
  ant_pages_heading (pages, 1, _("Witnesses"), HEADING + STRIP_HEIGHT);
  ant_pages_text (pages, ANT_PAGES_BODY,
                  _("What another instrument saw at the same time tells the Sun from the instrument: a dip of the Sun is in both, so it is not in "
                    "their ratio."));
  for (guint i = 0; i < report->comparisons->len; i++)
    tell_witness (g_ptr_array_index (report->comparisons, i), i, pages);
}
