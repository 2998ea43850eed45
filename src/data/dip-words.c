/* dip-words.c - a dip in words. */
#include "data/dip-words.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "core/units.h"

#define MINUS "\342\210\222"

void
ant_fact_free (gpointer data)
{
  AntFact *fact = data;
  g_free (fact->label);
  g_free (fact->value);
  g_free (fact);
}

void
ant_facts_add (GPtrArray *facts, const char *label, const char *value)
{
  AntFact *fact = g_new0 (AntFact, 1);
  *fact = (AntFact) { g_strdup (label), g_strdup (value) };
  g_ptr_array_add (facts, fact);
}

void
ant_facts_add_format (GPtrArray *facts, const char *label, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_autofree char *value = g_strdup_vprintf (format, arguments);
  va_end (arguments);
  ant_facts_add (facts, label, value);
}

static void
add_taking (GPtrArray *facts, const char *label, char *value)
{
  ant_facts_add (facts, label, value);
  g_free (value);
}

char *
ant_number_words (double value, int decimals)
{
  g_autofree char *plain = g_strdup_printf ("%.*f", decimals, fabs (value));
  return g_strconcat (value < 0 && strpbrk (plain, "123456789") ? MINUS : "", plain, NULL);
}

char *
ant_length_words (double length_d)
{
  double hours = length_d * ANT_HOURS_PER_DAY;
  if (hours >= 100)
    return g_strdup_printf (_("%.1f d"), length_d);
  if (hours >= 1)
    return g_strdup_printf (_("%.2f h"), hours);
  if (hours * 60 >= 5)
    return g_strdup_printf (_("%.0f min"), hours * 60);
  return g_strdup_printf (_("%.4g s"), length_d * ANT_SECONDS_PER_DAY);
}

char *
ant_instant_words (const AntRecord *record, double time_d)
{
  char *utc = ant_time_reference_utc_text (&record->time, time_d, 0);
  if (strlen (utc) < 16)
    {
      g_free (utc);
      return ant_time_reference_own_text (&record->time, time_d);
    }
  utc[10] = ' ';
  utc[16] = '\0';
  return utc;
}

static gboolean
in_one_year (const AntRecord *record)
{
  const AntSeries *series = &record->series;
  g_autofree char *first = ant_instant_words (record, series->start_d);
  g_autofree char *last = ant_instant_words (record, ant_series_time (series, (double) series->n - 1));
  return strncmp (first, last, 5) == 0;
}

char *
ant_instant_short (const AntRecord *record, double time_d)
{
  static const char *const months[] = { N_("Jan"), N_("Feb"), N_("Mar"), N_("Apr"), N_("May"), N_("Jun"),
                                        N_("Jul"), N_("Aug"), N_("Sep"), N_("Oct"), N_("Nov"), N_("Dec") };
  char *full = ant_instant_words (record, time_d);
  if (strlen (full) != 16 || full[4] != '-' || full[10] != ' ' || !in_one_year (record))
    return full;
  gsize month = (gsize) ((full[5] - '0') * 10 + full[6] - '0' - 1) % G_N_ELEMENTS (months);
  char *text = g_strdup_printf ("%s %s", _ (months[month]), full + 8);
  g_free (full);
  return text;
}

/* Decimals that leave two figures of the uncertainty. */
static int
decimals_for (double sigma)
{
  return sigma > 0 ? CLAMP (1 - (int) floor (log10 (sigma)), 0, 6) : 1;
}

char *
ant_depth_figures (const AntRecord *record, const AntDip *dip, AntDepthUnit unit)
{
  gboolean own = unit == ANT_DEPTH_W_M2;
  double per = own ? record->median * ANT_PPM : 1;
  int decimals = own ? decimals_for (dip->depth_sigma_ppm * per) : dip->depth_sigma_ppm < 10;
  g_autofree char *depth = ant_number_words (dip->depth_ppm * per, decimals);
  g_autofree char *sigma = ant_number_words (dip->depth_sigma_ppm * per, decimals);
  return g_strdup_printf ("%s ± %s", depth, sigma);
}

const char *
ant_depth_unit_name (const AntRecord *record, AntDepthUnit unit)
{
  if (unit == ANT_DEPTH_PPM || !record->value_unit)
    return "ppm";
  return g_str_equal (record->value_unit, "W/m2") ? "W/m²" : record->value_unit;
}

char *
ant_depth_words (const AntRecord *record, const AntDip *dip, AntDepthUnit unit)
{
  g_autofree char *figures = ant_depth_figures (record, dip, record->value_unit ? unit : ANT_DEPTH_PPM);
  return g_strdup_printf ("%s %s", figures, ant_depth_unit_name (record, unit));
}

char *
ant_span_words (const AntRecord *record, const AntDip *dip)
{
  g_autofree char *start = ant_instant_words (record, dip->mid_d - dip->duration_d / 2);
  g_autofree char *end = ant_instant_words (record, dip->mid_d + dip->duration_d / 2);
  gboolean utc = strlen (start) == 16 && start[10] == ' ';
  gboolean same_day = utc && strncmp (start, end, 10) == 0;
  return g_strdup_printf (utc ? _("%s to %s UTC") : _("%s to %s"), start, same_day ? end + 11 : end);
}

char *
ant_chance_words (double expected_false)
{
  if (isnan (expected_false))
    return g_strdup ("");
  if (expected_false < 1e-9)
    return g_strdup ("< 1e-9");
  return g_strdup_printf (expected_false < 0.001 ? "%.0e" : "%.2g", expected_false);
}

char *
ant_radius_words (const AntDip *dip)
{
  if (!(dip->radius_ratio > 0))
    return g_strdup (_("none"));
  double km = dip->radius_ratio * ANT_SUN_RADIUS_KM;
  double rounding = pow (10, floor (log10 (km)) - 2);
  return g_strdup_printf (_("%.0f km, %.2f Earth radii"), round (km / rounding) * rounding, km / ANT_EARTH_RADIUS_KM);
}

static const char *
edges_words (AntEdges edges)
{
  static const char *const words[] = { [ANT_EDGES_NONE] = N_("neither"),
                                       [ANT_EDGES_INGRESS] = N_("ingress only"),
                                       [ANT_EDGES_EGRESS] = N_("egress only"),
                                       [ANT_EDGES_BOTH] = N_("ingress and egress") };
  return _ (words[edges]);
}

GPtrArray *
ant_dip_facts (const AntRecord *record, const AntDip *dip, double upper_limit_ppm, AntDepthUnit unit)
{
  GPtrArray *facts = g_ptr_array_new_with_free_func (ant_fact_free);
  g_autofree char *exact = ant_time_reference_utc_text (&record->time, dip->mid_d, 0);
  g_autofree char *middle = ant_instant_words (record, dip->mid_d), *length = ant_length_words (dip->duration_d);
  add_taking (facts, dip->depth_ppm < 0 ? _("Height") : _("Depth"), ant_depth_words (record, dip, unit));
  add_taking (facts, _("SNR"), dip->first_snr == 0 || isnan (dip->first_snr)
                                   ? g_strdup_printf ("%.1f", dip->snr)
                                   : g_strdup_printf (_("%.1f (%.1f on the first pass)"), dip->snr, dip->first_snr));
  if (!isnan (upper_limit_ppm))
    add_taking (facts, _("Excluded at 95 %"), g_strdup_printf (_("deeper than %.1f ppm"), upper_limit_ppm));
  if (!isnan (dip->expected_false))
    add_taking (facts, _("By chance"), ant_chance_words (dip->expected_false));
  if (dip->depth_ppm > 0)
    {
      add_taking (facts, _("As a planet"), ant_radius_words (dip));
      add_taking (facts, _("Radius ratio"), g_strdup_printf (_("%.4f of the Sun's"), dip->radius_ratio));
    }
  add_taking (facts, _("Middle"), g_strconcat (middle, *exact ? " UTC" : "", NULL));
  add_taking (facts, _("Contacts I to IV"),
              g_strdup_printf (_("%s, ingress %.0f min"), length, dip->edge_d * ANT_MINUTES_PER_DAY));
  add_taking (facts, _("Mean depth"), g_strdup_printf (_("%.1f ppm"), dip->mean_depth_ppm));
  add_taking (facts, _("Observed"),
              g_strdup_printf (_("%.0f %%, %s seen"), 100 * dip->coverage, edges_words (dip->edges)));
  return facts;
}

char *
ant_passage_width_words (const AntDip *passage)
{
  return g_strdup_printf (_("%.1f d"), passage->duration_d);
}

GPtrArray *
ant_passage_facts (const AntRecord *record, const AntDip *passage, AntDepthUnit unit)
{
  GPtrArray *facts = g_ptr_array_new_with_free_func (ant_fact_free);
  add_taking (facts, _("Depth"), ant_depth_words (record, passage, unit));
  add_taking (facts, _("Middle"), ant_instant_words (record, passage->mid_d));
  add_taking (facts, _("Width"), g_strdup_printf (_("%.1f d at half depth"), passage->duration_d));
  add_taking (facts, _("Observed"), g_strdup_printf ("%.0f %%", 100 * passage->coverage));
  add_taking (facts, _("No claim"), g_strdup (_("minima of this width are the Sun's own: spot groups above all")));
  return facts;
}

char *
ant_facts_text (const GPtrArray *facts)
{
  GString *text = g_string_new (NULL);
  for (guint i = 0; i < facts->len; i++)
    {
      const AntFact *fact = g_ptr_array_index (facts, i);
      g_string_append_printf (text, "%s\t%s\n", fact->label, fact->value);
    }
  return g_string_free (text, FALSE);
}
