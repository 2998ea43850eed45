/* sky-page.c - the page Sky: who watched, the list of events, the selected one on the Sun and on the record. */
#include "gui/sky-page.h"

#include <glib/gi18n.h>

#include "data/sky-words.h"
#include "gui/columns.h"
#include "gui/event-view.h"
#include "gui/fact-list.h"
#include "gui/file-prompt.h"
#include "gui/sun-view.h"

struct _AntSkyPage
{
  GtkWidget parent_instance;

  /* From the template */
  GtkStack *stack;
  AntColumns *columns;
  GtkLabel *reason, *count, *title, *caution;
  GtkDropDown *observer;
  GtkEntry *site;
  GtkListView *list;
  AntSunView *sun;
  AntEventView *event;
  AntFactList *facts;

  /* Owned */
  AntDesk *desk;
  GtkSingleSelection *selection;
  const AntSkyList *listed; /* whose words are in the list; only compared */
  gboolean filling;         /* the controls follow the desk, not the user */
};

G_DEFINE_FINAL_TYPE (AntSkyPage, ant_sky_page, GTK_TYPE_WIDGET)

/* "2004-06-08 08:19  Venus before the Sun" over what the record shows. */
static char *
row_text (const AntSkyList *sky, const AntSighting *sighting)
{
  g_autofree char *time = ant_sky_time_text (sighting->event.greatest_tt_d, sighting->event.uncertain);
  g_autofree char *words = sky->measured ? ant_sighting_words (sighting) : g_strdup_printf (_("%.*f ppm deep"), sighting->event.depth_ppm < 1000 ? 1 : 0, sighting->event.depth_ppm);
  return g_strdup_printf ("%s  %s%s\n%s", time, ant_sky_event_title (&sighting->event),
                          sighting->event.possible ? _(" (possible)") : "", words);
}

static void
list_events (AntSkyPage *self, const AntSkyList *sky)
{
  g_autoptr (GtkStringList) rows = gtk_string_list_new (NULL);
  for (gsize i = 0; sky && i < sky->n; i++)
    {
      g_autofree char *text = row_text (sky, &sky->sighting[i]);
      gtk_string_list_append (rows, text);
    }
  gtk_single_selection_set_model (self->selection, G_LIST_MODEL (rows));
  self->listed = sky;
}

static void
show_count (AntSkyPage *self, const AntSkyList *sky)
{
  g_autofree char *text = g_strdup_printf (g_dngettext (NULL, "%zu event", "%zu events", sky->n), sky->n);
  g_autofree char *busy = ant_desk_is_watching (self->desk) ? g_strdup_printf (_("%s, being measured"), text) : NULL;
  gtk_label_set_text (self->count, busy ? busy : text);
}

static void
show_selected (AntSkyPage *self, const AntSkyList *sky)
{
  gsize selected = ant_desk_get_sky_selected (self->desk);
  gboolean any = sky && selected < sky->n;
  g_autoptr (GPtrArray) facts = any ? ant_sighting_facts (&sky->sighting[selected]) : NULL;
  gtk_label_set_text (self->title, any ? ant_sky_event_title (&sky->sighting[selected].event) : _("Nothing crossed the Sun"));
  ant_fact_list_set_facts (self->facts, facts);
  if (any && gtk_single_selection_get_selected (self->selection) != selected)
    gtk_single_selection_set_selected (self->selection, (guint) selected);
}

static void
show_observer (AntSkyPage *self)
{
  const AntObserverChoice *choice = ant_desk_get_observer (self->desk);
  g_autofree char *words = ant_observer_choice_words (choice);
  gtk_drop_down_set_selected (self->observer, choice->observer.kind);
  gtk_widget_set_visible (GTK_WIDGET (self->site), choice->observer.kind == ANT_OBSERVER_SITE);
  if (choice->observer.kind == ANT_OBSERVER_SITE)
    gtk_editable_set_text (GTK_EDITABLE (self->site), choice->text + strlen ("site:"));
  gtk_widget_set_tooltip_text (GTK_WIDGET (self->observer), words);
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntSkyPage *self)
{
  const AntSkyList *sky = ant_desk_get_sky (desk);
  const char *said = ant_desk_get_sky_said (desk);
  if (!(what & (ANT_DESK_RECORD | ANT_DESK_SKY)))
    return;
  self->filling = TRUE;
  gtk_stack_set_visible_child_name (self->stack, sky ? "sky" : "empty");
  gtk_label_set_text (self->reason, said ? said : ant_desk_get_record (desk) ? _("Working out what crossed the Sun…")
                                                                            : _("Open a record to see what crossed the Sun while it was taken."));
  show_observer (self);
  if (sky != self->listed)
    list_events (self, sky);
  if (sky)
    {
      show_count (self, sky);
      show_selected (self, sky);
    }
  self->filling = FALSE;
}

static void
selected_cb (AntSkyPage *self)
{
  guint selected = gtk_single_selection_get_selected (self->selection);
  if (!self->filling && selected != GTK_INVALID_LIST_POSITION)
    ant_desk_select_sky (self->desk, selected);
}

static void
table_chosen_cb (const char *path, gpointer data)
{
  g_autoptr (AntSkyPage) self = data;
  if (path && self->desk)
    ant_desk_set_observer (self->desk, path);
  else if (self->desk)
    desk_changed_cb (self->desk, ANT_DESK_SKY, self); /* back to what it was */
}

static void
observer_chosen_cb (AntSkyPage *self)
{
  if (self->filling || !self->desk)
    return;
  AntObserverKind kind = gtk_drop_down_get_selected (self->observer);
  gtk_widget_set_visible (GTK_WIDGET (self->site), kind == ANT_OBSERVER_SITE);
  if (kind == ANT_OBSERVER_SITE)
    gtk_widget_grab_focus (GTK_WIDGET (self->site));
  else if (kind == ANT_OBSERVER_TABLE)
    ant_file_prompt_open (GTK_WINDOW (gtk_widget_get_root (GTK_WIDGET (self))), _("Open a Table of Positions"), table_chosen_cb,
                          g_object_ref (self));
  else
    ant_desk_set_observer (self->desk, kind == ANT_OBSERVER_L1 ? "l1" : "earth");
}

static void
site_given_cb (AntSkyPage *self)
{
  g_autofree char *text = g_strconcat ("site:", gtk_editable_get_text (GTK_EDITABLE (self->site)), NULL);
  ant_desk_set_observer (self->desk, text);
}

static void
set_up_row_cb (GtkSignalListItemFactory *factory, GtkListItem *item)
{
  GtkWidget *label = gtk_label_new (NULL);
  gtk_label_set_xalign (GTK_LABEL (label), 0);
  gtk_label_set_wrap (GTK_LABEL (label), TRUE);
  gtk_list_item_set_child (item, label);
}

static void
bind_row_cb (GtkSignalListItemFactory *factory, GtkListItem *item)
{
  const char *text = gtk_string_object_get_string (GTK_STRING_OBJECT (gtk_list_item_get_item (item)));
  gtk_label_set_text (GTK_LABEL (gtk_list_item_get_child (item)), text);
}

/* Only who looks at the page waits for the measurements. */
static void
ant_sky_page_map (GtkWidget *widget)
{
  AntSkyPage *self = ANT_SKY_PAGE (widget);
  GTK_WIDGET_CLASS (ant_sky_page_parent_class)->map (widget);
  if (self->desk)
    ant_desk_measure_sky (self->desk);
}

void
ant_sky_page_set_desk (AntSkyPage *self, AntDesk *desk)
{
  g_set_object (&self->desk, desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->sun), desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->event), desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

static void
ant_sky_page_dispose (GObject *object)
{
  g_clear_object (&ANT_SKY_PAGE (object)->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_SKY_PAGE);
  G_OBJECT_CLASS (ant_sky_page_parent_class)->dispose (object);
}

static void
ant_sky_page_class_init (AntSkyPageClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_sky_page_dispose;
  widget_class->map = ant_sky_page_map;
  g_type_ensure (ANT_TYPE_COLUMNS);
  g_type_ensure (ANT_TYPE_EVENT_VIEW);
  g_type_ensure (ANT_TYPE_FACT_LIST);
  g_type_ensure (ANT_TYPE_SUN_VIEW);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/sky-page.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, stack);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, columns);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, reason);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, count);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, title);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, caution);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, observer);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, site);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, list);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, sun);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, event);
  gtk_widget_class_bind_template_child (widget_class, AntSkyPage, facts);
  gtk_widget_class_bind_template_callback (widget_class, observer_chosen_cb);
  gtk_widget_class_bind_template_callback (widget_class, site_given_cb);
}

static void
ant_sky_page_init (AntSkyPage *self)
{
  self->filling = TRUE;
  gtk_widget_init_template (GTK_WIDGET (self));
  gtk_label_set_text (self->caution, ant_sky_caution ());
  const char *const kinds[] = { [ANT_OBSERVER_EARTH] = _("Seen from the Earth's centre"), [ANT_OBSERVER_SITE] = _("Seen from a site…"),
                                [ANT_OBSERVER_TABLE] = _("Seen from listed positions…"), [ANT_OBSERVER_L1] = _("Seen from near L1"), NULL };
  g_autoptr (GtkStringList) names = gtk_string_list_new (kinds);
  gtk_drop_down_set_model (self->observer, G_LIST_MODEL (names));
  g_autoptr (GtkListItemFactory) factory = gtk_signal_list_item_factory_new ();
  g_signal_connect (factory, "setup", G_CALLBACK (set_up_row_cb), NULL);
  g_signal_connect (factory, "bind", G_CALLBACK (bind_row_cb), NULL);
  gtk_list_view_set_factory (self->list, factory);
  self->selection = gtk_single_selection_new (NULL);
  g_signal_connect_swapped (self->selection, "notify::selected", G_CALLBACK (selected_cb), self);
  gtk_list_view_set_model (self->list, GTK_SELECTION_MODEL (self->selection));
  g_object_unref (self->selection); /* the list has it now, and lives as long as the page */
  self->filling = FALSE;
}
