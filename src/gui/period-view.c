/* period-view.c - the chart of periods. */
#include "gui/period-view.h"

#include <glib/gi18n.h>
#include <math.h>

#include "plot/period-chart.h"

struct _AntPeriodView
{
  AntPlotView parent_instance;
};

G_DEFINE_FINAL_TYPE (AntPeriodView, ant_period_view, ANT_TYPE_PLOT_VIEW)

typedef struct
{
  AntPeriodChart chart;
  double repeat_d[ANT_MOST_REPEATS], repeat_snr[ANT_MOST_REPEATS], alias_d[ANT_REPEAT_ALIASES];
} Filled;

static gboolean
fill (AntPlotView *plot, Filled *filled)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  const AntScanResults *results = desk ? ant_desk_get_results (desk) : NULL;
  if (!results || !results->repeats.searched)
    return FALSE;
  const AntRepeatResults *repeats = &results->repeats;
  const AntFold *fold = ant_desk_get_fold (desk);
  gsize selected = ant_desk_get_repeat (desk);
  for (gsize i = 0; i < repeats->n; i++)
    {
      filled->repeat_d[i] = repeats->repeat[i].period_d;
      filled->repeat_snr[i] = repeats->repeat[i].snr;
    }
  for (gsize k = 0; selected < repeats->n && k < ANT_REPEAT_ALIASES; k++)
    filled->alias_d[k] = repeats->repeat[selected].alias[k].period_d;
  filled->chart = (AntPeriodChart) { .n = repeats->n_periods, .period_d = repeats->period_d, .snr = repeats->period_snr,
                                     .from_d = repeats->period_min_d, .to_d = repeats->period_max_d,
                                     .threshold_snr = repeats->threshold_snr, .n_repeats = repeats->n,
                                     .repeat_d = filled->repeat_d, .repeat_snr = filled->repeat_snr,
                                     .chosen_d = fold ? fold->period_d : NAN, .alias_d = filled->alias_d,
                                     .n_aliases = selected < repeats->n ? ANT_REPEAT_ALIASES : 0 };
  return TRUE;
}

static void
ant_period_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  Filled filled;
  AntView view;
  if (!fill (plot, &filled))
    return;
  ant_period_chart_view (&filled.chart, &view);
  ant_period_chart_paint (cr, box, &filled.chart, &view, theme, scale);
}

static char *
ant_period_view_describe (AntPlotView *plot)
{
  Filled filled;
  if (!fill (plot, &filled))
    return g_strdup (_("Nothing to show before a search for repeats"));
  return g_strdup_printf (_("SNR against period from %.3g to %.4g days, threshold %.2f, %zu repeats above it"), filled.chart.from_d,
                          filled.chart.to_d, filled.chart.threshold_snr, filled.chart.n_repeats);
}

static void
pressed_cb (GtkGestureClick *gesture, int n_press, double x, double y, AntPlotView *plot)
{
  Filled filled;
  AntView view;
  gtk_widget_grab_focus (GTK_WIDGET (plot));
  if (!fill (plot, &filled))
    return;
  AntBox box = ant_plot_view_box (plot);
  ant_period_chart_view (&filled.chart, &view);
  double period_d = ant_period_chart_at (&box, &filled.chart, &view, ant_plot_view_theme (plot), x, y);
  for (gsize i = 0; i < filled.chart.n_repeats; i++)
    if (filled.repeat_d[i] == period_d)
      {
        ant_desk_select_repeat (ant_plot_view_get_desk (plot), i);
        return;
      }
  ant_desk_fold_on (ant_plot_view_get_desk (plot), period_d);
}

static void
nudge_action (GtkWidget *widget, const char *name, GVariant *parameter)
{
  ant_desk_nudge_fold (ant_plot_view_get_desk (ANT_PLOT_VIEW (widget)), g_str_equal (name, "period.longer") ? 1 : -1);
}

static void
ant_period_view_class_init (AntPeriodViewClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_FOLD;
  plot_class->paint = ant_period_view_paint;
  plot_class->describe = ant_period_view_describe;
  gtk_widget_class_install_action (widget_class, "period.longer", NULL, nudge_action);
  gtk_widget_class_install_action (widget_class, "period.shorter", NULL, nudge_action);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Right, 0, "period.longer", NULL);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Left, 0, "period.shorter", NULL);
}

static void
ant_period_view_init (AntPeriodView *self)
{
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("Periods"));
  GtkGesture *click = gtk_gesture_click_new ();
  g_signal_connect (click, "pressed", G_CALLBACK (pressed_cb), self);
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (click));
}
