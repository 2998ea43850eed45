/* event-view.c - a predicted event on the record. */
#include "gui/event-view.h"

#include <glib/gi18n.h>

#include "data/sky-words.h"

struct _AntEventView
{
  AntPlotView parent_instance;
  AntSkyCloseup *closeup; /* of the selected event, or NULL */
};

G_DEFINE_FINAL_TYPE (AntEventView, ant_event_view, ANT_TYPE_PLOT_VIEW)

static void
ant_event_view_desk_changed (AntPlotView *plot, AntDeskChange what)
{
  AntEventView *self = ANT_EVENT_VIEW (plot);
  AntDesk *desk = ant_plot_view_get_desk (plot);
  const AntSkyList *sky = ant_desk_get_sky (desk);
  gsize selected = ant_desk_get_sky_selected (desk);
  if (!(what & (ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_SKY)))
    return;
  g_clear_pointer (&self->closeup, ant_sky_closeup_free);
  if (sky && selected < sky->n && ant_desk_get_layers (desk))
    self->closeup = ant_sky_closeup_new (sky, selected, ant_desk_get_layers (desk));
}

static void
ant_event_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  AntEventView *self = ANT_EVENT_VIEW (plot);
  if (!self->closeup || self->closeup->closeup.n == 0)
    {
      ant_pen_remark (cr, box, _("The record around the event is drawn here"), theme, scale);
      return;
    }
  AntView view;
  ant_dip_closeup_view (&self->closeup->closeup, &view);
  ant_dip_closeup_paint (cr, box, &self->closeup->closeup, &view, theme, scale);
}

static char *
ant_event_view_describe (AntPlotView *plot)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  const AntSkyList *sky = ant_desk_get_sky (desk);
  gsize selected = ant_desk_get_sky_selected (desk);
  if (!sky || selected >= sky->n)
    return g_strdup (_("No event is selected"));
  g_autofree char *words = ant_sighting_words (&sky->sighting[selected]);
  return g_strdup_printf (_("The record around %s with the predicted curve over it; %s"),
                          ant_sky_event_title (&sky->sighting[selected].event), words);
}

static void
ant_event_view_finalize (GObject *object)
{
  ant_sky_closeup_free (ANT_EVENT_VIEW (object)->closeup);
  G_OBJECT_CLASS (ant_event_view_parent_class)->finalize (object);
}

static void
ant_event_view_class_init (AntEventViewClass *klass)
{
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  G_OBJECT_CLASS (klass)->finalize = ant_event_view_finalize;
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_SKY;
  plot_class->paint = ant_event_view_paint;
  plot_class->describe = ant_event_view_describe;
  plot_class->desk_changed = ant_event_view_desk_changed;
}

static void
ant_event_view_init (AntEventView *self)
{
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("Predicted event"));
}
