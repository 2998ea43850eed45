/* sun-view.c - the drawing of the selected event on the Sun. */
#include "gui/sun-view.h"

#include <glib/gi18n.h>

#include "data/sky-words.h"
#include "plot/pen.h"

struct _AntSunView
{
  AntPlotView parent_instance;
};

G_DEFINE_FINAL_TYPE (AntSunView, ant_sun_view, ANT_TYPE_PLOT_VIEW)

/* What is drawn, or NULL. */
static const AntSkyPicture *
picture_of (AntPlotView *plot)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  const AntSkyList *sky = ant_desk_get_sky (desk);
  gsize selected = ant_desk_get_sky_selected (desk);
  return sky && selected < sky->n ? sky->picture[selected] : NULL;
}

static void
ant_sun_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  const AntSkyPicture *picture = picture_of (plot);
  if (picture)
    ant_sun_disc_paint (cr, box, &picture->disc, theme, scale);
  else
    ant_pen_remark (cr, box, _("What crosses the Sun is drawn here"), theme, scale);
}

static char *
ant_sun_view_describe (AntPlotView *plot)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  if (!picture_of (plot))
    return g_strdup (_("No event is selected"));
  const AntSkyEvent *event = &ant_desk_get_sky (desk)->sighting[ant_desk_get_sky_selected (desk)].event;
  return g_strdup_printf (_("The Sun with north up; %s, least distance %.3f solar radii, %.4f times as large as the Sun"),
                          ant_sky_event_title (event), event->impact, event->radius_ratio);
}

static void
ant_sun_view_class_init (AntSunViewClass *klass)
{
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_SKY;
  plot_class->paint = ant_sun_view_paint;
  plot_class->describe = ant_sun_view_describe;
}

static void
ant_sun_view_init (AntSunView *self)
{
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("The Sun"));
}
