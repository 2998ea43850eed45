/* strip-content.c - kinds of strips. */
#include "gui/strip-content.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"

static gboolean
is_column (AntStripKind kind)
{
  return kind >= ANT_STRIP_COLUMN;
}

static gboolean
is_witness (AntStripKind kind)
{
  return kind >= ANT_STRIP_WITNESS && !is_column (kind);
}

/* Which of the columns, or of the witnesses. */
static guint
number_of (AntStripKind kind)
{
  return (guint) kind - (guint) (is_column (kind) ? ANT_STRIP_COLUMN : ANT_STRIP_WITNESS);
}

gboolean
ant_strip_wanted (AntDesk *desk, AntStripKind kind)
{
  if (is_column (kind))
    return ant_desk_get_shown_column (desk, number_of (kind)) != NULL;
  if (is_witness (kind))
    return ant_desk_get_witness (desk, number_of (kind)) && !ant_desk_get_witness_problem (desk, number_of (kind));
  return kind != ANT_STRIP_SNR || ant_desk_get_snr_shown (desk);
}

/* Irradiance is always told in the record's unit, if that is known; the residual in ppm unless asked otherwise. */
static gboolean
in_own_unit (AntDesk *desk, AntStripKind kind)
{
  const AntRecord *record = ant_desk_get_record (desk);
  return record->value_unit
         && (kind == ANT_STRIP_IRRADIANCE
             || (kind == ANT_STRIP_RESIDUAL && ant_desk_get_unit (desk) == ANT_DEPTH_W_M2));
}

char *
ant_strip_title (AntDesk *desk, AntStripKind kind)
{
  const AntRecord *record = ant_desk_get_record (desk);
  if (kind == ANT_STRIP_SNR)
    {
      g_autofree char *length = ant_length_words (ant_desk_get_snr_duration (desk));
      return g_strdup_printf (_("SNR of dips %s long"), length);
    }
  if (is_column (kind))
    {
      const AntColumnStrip *made = ant_desk_get_column_strip (desk, number_of (kind));
      const char *name = ant_desk_get_shown_column (desk, number_of (kind));
      return made ? ant_column_title (made->column) : g_strdup (name ? name : _("Column"));
    }
  static const char *const looks[] = { N_("Witness, ppm"), N_("Record over witness, ppm"), N_("Record less witness, ppm") };
  if (is_witness (kind))
    return g_strdup (_ (looks[ant_desk_get_witness_look (desk)]));
  const char *what = kind == ANT_STRIP_RESIDUAL ? _("Residual") : _("Irradiance");
  if (!record)
    return g_strdup (what);
  AntDepthUnit unit = in_own_unit (desk, kind) ? ANT_DEPTH_W_M2 : ANT_DEPTH_PPM;
  return g_strdup_printf ("%s, %s", what, ant_depth_unit_name (record, unit));
}

static void
fill_snr (AntDesk *desk, AntStrip *strip, gsize size, char *text)
{
  const AntScanResults *results = ant_desk_get_results (desk);
  const AntSnrStrip *snr = ant_desk_get_snr (desk);
  if (snr)
    strip->pyramid = snr->pyramid;
  if (results)
    strip->line = results->threshold_snr;
  double done = ant_desk_get_snr_progress (desk);
  if (!results)
    g_strlcpy (text, _("a scan weighs it"), size);
  else if (done >= 0)
    g_snprintf (text, size, _("computing, %.0f %%"), 100 * done);
  else
    g_snprintf (text, size, _("threshold %.1f"), results->threshold_snr);
  strip->caption = text;
}

static void
fill_column (AntDesk *desk, guint i, AntStrip *strip, gsize size, char *text)
{
  const AntColumnStrip *made = ant_desk_get_column_strip (desk, i);
  if (made)
    strip->pyramid = made->pyramid;
  else
    g_strlcpy (text, _("laying it on the grid"), size);
  strip->caption = text;
}

static void
fill_witness (AntDesk *desk, guint i, AntStrip *strip, gsize size, char *text)
{
  const AntWitnessStrips *witness = ant_desk_get_witness_strips (desk, i);
  g_autofree char *name = ant_witness_name (ant_desk_get_witness (desk, i));
  strip->caption = text;
  if (!witness)
    {
      g_snprintf (text, size, _("reading %s"), name);
      return;
    }
  const AntComparison *comparison = witness->comparison;
  AntWitnessLook look = ant_desk_get_witness_look (desk);
  g_autofree char *step = ant_length_words (comparison->step_d), *drift = ant_length_words (comparison->drift_d);
  strip->pyramid = witness->pyramid[look];
  strip->start_d = comparison->start_d;
  strip->step_d = comparison->step_d;
  if (look != ANT_WITNESS_ITSELF && comparison->drift_d > 0)
    g_snprintf (text, size, _("%s, averages of %s, running median of %s taken out"), name, step, drift);
  else
    g_snprintf (text, size, _("%s, averages of %s"), name, step);
}

static void
fill_series (AntDesk *desk, AntStripKind kind, AntStrip *strip)
{
  const AntLayers *layers = ant_desk_get_layers (desk);
  gboolean residual = kind == ANT_STRIP_RESIDUAL;
  int average = ant_desk_get_average (desk);
  strip->pyramid = residual ? layers->residual : layers->values;
  if (average >= 0)
    strip->averages = residual ? layers->residual_averages[average] : layers->value_averages[average];
  strip->curve = residual ? NULL : layers->curve_ppm;
  strip->brackets = residual == (ant_desk_get_shown (desk) != ANT_KIND_PASSAGE); /* passages are in the curve */
  if (in_own_unit (desk, kind))
    {
      strip->label_zero = residual ? 0 : layers->record->median;
      strip->label_per = layers->record->median * ANT_PPM;
    }
}

void
ant_strip_fill (AntDesk *desk, AntStripKind kind, AntStrip *strip, gsize size, char *text)
{
  const AntRecord *record = ant_desk_get_record (desk);
  *strip = (AntStrip) ANT_STRIP_INIT;
  *text = '\0';
  strip->time = &record->time;
  strip->start_d = record->series.start_d;
  strip->step_d = record->series.step_d;
  strip->n_dips = ant_desk_get_marks (desk, &strip->dip);
  strip->selected = ant_desk_get_selected_mark (desk);
  strip->n_ticks = ant_desk_get_ticks (desk, &strip->tick_d);
  strip->n_masks = ant_desk_get_masks (desk, &strip->mask);
  if (kind == ANT_STRIP_SNR)
    fill_snr (desk, strip, size, text);
  else if (is_column (kind))
    fill_column (desk, number_of (kind), strip, size, text);
  else if (is_witness (kind))
    fill_witness (desk, number_of (kind), strip, size, text);
  else
    fill_series (desk, kind, strip);
}

AntView
ant_strip_range (AntDesk *desk, AntStripKind kind, const AntStrip *strip)
{
  AntView view = *ant_desk_get_view (desk);
  view.low = kind == ANT_STRIP_SNR ? -4 : -100;
  view.high = kind == ANT_STRIP_SNR ? 4 : 100;
  ant_view_fit_y (&view, strip->pyramid, strip->start_d, strip->step_d);
  ant_view_hold_y (&view, strip->line);
  return view;
}

/* Of a column or a witness: dips are not its business. */
static char *
describe_values (AntDesk *desk, AntStripKind kind, const char *from, const char *to)
{
  AntStrip strip;
  char text[128];
  ant_strip_fill (desk, kind, &strip, sizeof text, text);
  const AntView *view = ant_desk_get_view (desk);
  AntExtent extent = { 1, 0 };
  if (strip.pyramid)
    {
      double first = fmax (0, ceil ((view->from - strip.start_d) / strip.step_d));
      double last = fmax (first, floor ((view->to - strip.start_d) / strip.step_d) + 1);
      extent = ant_pyramid_extent (strip.pyramid, (gsize) first, (gsize) last);
    }
  if (extent.low > extent.high)
    return g_strdup_printf (_("From %s to %s; nothing observed"), from, to);
  return g_strdup_printf (_("From %s to %s; values from %.5g to %.5g"), from, to, (double) extent.low, (double) extent.high);
}

char *
ant_strip_describe (AntDesk *desk, AntStripKind kind)
{
  const AntRecord *record = ant_desk_get_record (desk);
  const AntScanResults *results = ant_desk_get_results (desk);
  const AntView *view = ant_desk_get_view (desk);
  const AntDipMark *marks;
  gsize n = ant_desk_get_marks (desk, &marks), seen = 0;
  for (gsize i = 0; i < n; i++)
    seen += marks[i].mid_d >= view->from && marks[i].mid_d <= view->to;
  g_autofree char *from = ant_instant_words (record, view->from), *to = ant_instant_words (record, view->to);
  if (kind >= ANT_STRIP_WITNESS && ant_strip_wanted (desk, kind))
    return describe_values (desk, kind, from, to);
  if (kind == ANT_STRIP_SNR && results)
    return g_strdup_printf (_("From %s to %s; %zu dips in view; threshold %.1f"), from, to, seen,
                            results->threshold_snr);
  return g_strdup_printf (_("From %s to %s; %zu dips in view"), from, to, seen);
}
