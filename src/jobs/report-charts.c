/* report-charts.c - the charts of a report: the time stack of the whole record, spectrum and noise floor. */
#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/noise-words.h"
#include "jobs/report-private.h"
#include "plot/floor-chart.h"
#include "plot/spectrum-chart.h"
#include "plot/strip.h"

#define STACK_HEIGHT 270
#define STACK_LEAST 190
#define STACK_SHARE 0.45 /* of the upper strip: the lower one carries the axis of time */
#define CHART_HEIGHT 206
#define FLOOR_HEIGHT 236
#define FLOOR_LEAST 165
#define HEADING 64 /* a heading, and a few lines beside the figure */
#define AVERAGES_ACROSS 250 /* of which a strip should have at least so many */
#define MOST_REMARKS 12

typedef struct
{
  const AntReport *report;
  const AntTheme *theme;
  AntDipMark *marks;
  gboolean residual; /* of strips */
  gsize chunk;       /* of the spectrum */
} Drawing;

/* The dips as plots mark them; brightenings are no dips. */
static AntDipMark *
marks_of (const AntReport *report)
{
  const AntScanResults *results = report->results;
  AntDipMark *marks = g_new (AntDipMark, results->n_dips + 1);
  for (gsize i = 0; i < results->n_dips; i++)
    {
      const AntDip *dip = &results->dip[i];
      marks[i] = (AntDipMark) { dip->mid_d, dip->duration_d, dip->depth_ppm, (unsigned) i + 1,
                                ant_dip_look_of (ant_report_class (report, i)) };
    }
  return marks;
}

/* The longest averages that still leave enough of them across the strip; -1: the samples do. */
static int
average_for (double span_d)
{
  int best = -1;
  for (int i = 0; i < ANT_N_AVERAGES; i++)
    if (ant_average_lengths_d[i] * AVERAGES_ACROSS < span_d)
      best = i;
  return best;
}

static void
paint_strip (cairo_t *cr, const AntBox *box, double scale, gpointer data)
{
  const Drawing *drawing = data;
  const AntLayers *layers = drawing->report->layers;
  const AntRecord *record = layers->record;
  const AntSeries *series = &record->series;
  double end_d = ant_series_time (series, (double) series->n - 1);
  int average = average_for (end_d - series->start_d);
  AntStrip strip = ANT_STRIP_INIT;
  g_autofree char *title = drawing->residual ? g_strdup (_("Residual, ppm"))
                           : record->value_unit ? g_strdup_printf (_("Irradiance, %s"), ant_depth_unit_name (record, ANT_DEPTH_W_M2))
                                                : g_strdup (_("Irradiance, ppm"));
  strip.title = title;
  strip.caption = drawing->residual ? _("rotation curve taken out, dips numbered") : _("with the rotation curve");
  strip.time = &record->time;
  strip.start_d = series->start_d;
  strip.step_d = series->step_d;
  strip.pyramid = drawing->residual ? layers->residual : layers->values;
  if (average >= 0)
    strip.averages = drawing->residual ? layers->residual_averages[average] : layers->value_averages[average];
  strip.curve = drawing->residual ? NULL : layers->curve_ppm;
  strip.n_dips = drawing->report->results->n_dips;
  strip.dip = drawing->marks;
  strip.brackets = strip.time_axis = drawing->residual;
  if (!drawing->residual && record->value_unit)
    {
      strip.label_zero = record->median;
      strip.label_per = record->median * ANT_PPM;
    }
  AntView view = { .from = series->start_d, .to = end_d, .low = -100, .high = 100 };
  ant_view_fit_y (&view, strip.pyramid, strip.start_d, strip.step_d);
  ant_strip_paint (cr, box, &strip, &view, drawing->theme, scale);
}

void
ant_report_time (const AntReport *report, AntPages *pages)
{
  g_autofree AntDipMark *marks = marks_of (report);
  Drawing drawing = { .report = report, .theme = ant_pages_theme (pages), .marks = marks };
  double height = ant_pages_fit (pages, HEADING, STACK_LEAST, STACK_HEIGHT);
  ant_pages_heading (pages, 1, _("The whole record"), height);
  ant_pages_figure (pages, floor (STACK_SHARE * height), paint_strip, &drawing);
  drawing.residual = TRUE;
  ant_pages_figure (pages, floor ((1 - STACK_SHARE) * height) - 4, paint_strip, &drawing);
  ant_pages_text (pages, ANT_PAGES_QUIET,
                  _("The rotation curve is drawn to guide the eye. The search does not use it: it weighs every dip against the noise model, "
                    "slow parts included."));
}

static void
paint_spectrum (cairo_t *cr, const AntBox *box, double scale, gpointer data)
{
  const Drawing *drawing = data;
  const AntChunk *chunk = &drawing->report->results->chunk[drawing->chunk];
  double step_d = drawing->report->results->record->series.step_d;
  AntSpectrumChart chart = { .n = chunk->n_bins, .frequency_cd = chunk->frequency_cd, .power = chunk->power_unmasked, .model = &chunk->model,
                             .white_psd = ant_noise_white_psd (chunk->model.white_ppm * chunk->model.white_ppm, step_d) };
  AntView view;
  ant_spectrum_chart_view (&chart, &view);
  ant_spectrum_chart_paint (cr, box, &chart, &view, drawing->theme, scale);
}

static void
paint_floor (cairo_t *cr, const AntBox *box, double scale, gpointer data)
{
  const Drawing *drawing = data;
  const AntScanResults *results = drawing->report->results;
  AntFloorChart chart = { .n_floor = results->n_floor, .floor = results->floor, .threshold_snr = results->threshold_snr,
                          .n_dips = results->n_dips, .dip = drawing->marks, .selected = ANT_NO_DIP };
  AntView view;
  ant_floor_chart_view (&chart, &view);
  ant_floor_chart_paint (cr, box, &chart, &view, drawing->theme, scale);
}

/* The piece with the most samples stands for all of them. */
static gsize
fullest_chunk (const AntScanResults *results)
{
  gsize best = 0;
  for (gsize i = 1; i < results->n_chunks; i++)
    if (results->chunk[i].health.observed > results->chunk[best].health.observed)
      best = i;
  return best;
}

static void
tell_remarks (const AntScanResults *results, AntPages *pages)
{
  for (guint i = 0; i < MIN (results->said->len, MOST_REMARKS); i++)
    {
      g_autofree char *sentence = g_strdup_printf ("%s.", (const char *) g_ptr_array_index (results->said, i));
      ant_pages_item (pages, sentence);
    }
  if (results->said->len > MOST_REMARKS)
    {
      g_autofree char *more = g_strdup_printf (_("And %u more remarks on the noise of single pieces: see chunks.csv."), results->said->len - MOST_REMARKS);
      ant_pages_item (pages, more);
    }
}

static void
tell_model (const AntReport *report, AntPages *pages, Drawing *drawing)
{
  const AntScanResults *results = report->results;
  drawing->chunk = fullest_chunk (results);
  const AntChunk *chunk = &results->chunk[drawing->chunk];
  g_autoptr (GPtrArray) facts = ant_noise_part_facts (&chunk->model);
  g_autofree char *errors = g_strdup_printf (_("%.3f of their stated size (1 if the model holds)"), chunk->health.innovation_rms);
  g_autofree char *neighbours = g_strdup_printf (_("correlated by %.3f (0 if the model holds)"), chunk->health.lag1);
  ant_facts_add (facts, _("Forecast errors"), errors);
  ant_facts_add (facts, _("Neighbours"), neighbours);
  if (results->n_chunks > 1)
    {
      g_autofree char *piece = ant_noise_chunk_title (results, drawing->chunk);
      g_autofree char *text = g_strdup_printf (_("The record was cut into %zu pieces with a noise model each. %s, which has the most samples, is shown; "
                                                 "chunks.csv and spectrum.csv have them all."), results->n_chunks, piece);
      ant_pages_text (pages, ANT_PAGES_BODY, text);
    }
  ant_pages_figure_facts (pages, CHART_HEIGHT, paint_spectrum, drawing, facts);
  tell_remarks (results, pages);
}

static void
tell_floor (const AntScanResults *results, AntPages *pages)
{
  g_autofree char *text = g_strdup_printf (_("The noise floor is the depth of a crossing that is 1 sigma; a dip is listed from %.2f times that depth, "
                                             "the threshold. What lies below the threshold would have been missed."), results->threshold_snr);
  ant_pages_text (pages, ANT_PAGES_BODY, text);
}

void
ant_report_noise (const AntReport *report, AntPages *pages)
{
  const AntScanResults *results = report->results;
  g_autofree AntDipMark *marks = marks_of (report);
  Drawing drawing = { .report = report, .theme = ant_pages_theme (pages), .marks = marks };
  if (results->n_chunks == 0)
    return;
  ant_pages_heading (pages, 1, _("The noise"), CHART_HEIGHT + 40);
  tell_model (report, pages, &drawing);
  double height = ant_pages_fit (pages, HEADING, FLOOR_LEAST, FLOOR_HEIGHT);
  ant_pages_heading (pages, 2, _("What would have been missed"), height + 30);
  tell_floor (results, pages);
  ant_pages_figure (pages, floor (height), paint_floor, &drawing);
}
