/* settings-row.c - one row of the settings panel. Ctrl+R in it brings back the default. */
#include "gui/settings-row.h"

#include <glib/gi18n.h>

struct _AntSettingsRow
{
  GtkWidget parent_instance;

  /* From the template */
  GtkWidget *content;
  GtkLabel *name, *help, *unit, *fault;
  GtkEntry *entry;
  GtkDropDown *words;
  GtkButton *reset;

  /* Owned */
  AntDesk *desk;

  /* Borrowed from the table */
  const AntSetting *setting;
  gboolean filling, assigning; /* the controls follow the desk; the desk follows the controls */
};

G_DEFINE_FINAL_TYPE (AntSettingsRow, ant_settings_row, GTK_TYPE_WIDGET)

static void
show (AntSettingsRow *self)
{
  double value = ant_setting_get (self->setting, ant_desk_get_settings (self->desk));
  gboolean changed = value != self->setting->fallback;
  g_autofree char *text = ant_setting_format (self->setting, value);
  self->filling = TRUE;
  if (self->setting->kind == ANT_SETTING_WORD)
    gtk_drop_down_set_selected (self->words, (guint) value);
  else if (!self->assigning) /* never under the fingers of who is typing */
    gtk_editable_set_text (GTK_EDITABLE (self->entry), text);
  self->filling = FALSE;
  gtk_widget_set_sensitive (GTK_WIDGET (self->reset), changed);
  gtk_widget_set_opacity (GTK_WIDGET (self->reset), changed ? 1 : 0);
  if (changed)
    gtk_widget_add_css_class (GTK_WIDGET (self), "changed");
  else
    gtk_widget_remove_css_class (GTK_WIDGET (self), "changed");
}

static gboolean
assign (AntSettingsRow *self, const char *text)
{
  g_autoptr (GError) error = NULL;
  self->assigning = TRUE;
  gboolean good = ant_desk_set_setting (self->desk, self->setting, text, &error);
  gtk_label_set_text (self->fault, good ? "" : error->message);
  gtk_widget_set_visible (GTK_WIDGET (self->fault), !good);
  if (good)
    gtk_widget_remove_css_class (GTK_WIDGET (self->entry), "error");
  else
    gtk_widget_add_css_class (GTK_WIDGET (self->entry), "error");
  show (self);
  self->assigning = FALSE;
  return good;
}

static void
typed_cb (AntSettingsRow *self)
{
  if (!self->filling)
    assign (self, gtk_editable_get_text (GTK_EDITABLE (self->entry)));
}

static void
word_chosen_cb (AntSettingsRow *self)
{
  guint chosen = gtk_drop_down_get_selected (self->words);
  if (!self->filling && self->desk && chosen != GTK_INVALID_LIST_POSITION)
    assign (self, self->setting->words[chosen]);
}

static void
reset_action (GtkWidget *widget, const char *name, GVariant *parameter)
{
  AntSettingsRow *self = ANT_SETTINGS_ROW (widget);
  g_autofree char *text = ant_setting_format (self->setting, self->setting->fallback);
  assign (self, text);
  show (self);
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntSettingsRow *self)
{
  if (what & ANT_DESK_SETTINGS)
    show (self);
}

/* "duration-max" is "Duration max" to a reader, and recognisably the command's name. */
static char *
readable (const char *key)
{
  char *text = g_strdelimit (g_strdup (key), "-", ' ');
  text[0] = g_ascii_toupper (text[0]);
  return text;
}

static void
label (AntSettingsRow *self)
{
  const AntSetting *setting = self->setting;
  gboolean word = setting->kind == ANT_SETTING_WORD;
  g_autofree char *name = readable (setting->key), *range = ant_setting_range (setting);
  g_autofree char *fallback = ant_setting_format (setting, setting->fallback);
  g_autofree char *tip =
      g_strdup_printf (_("%s; default %s\nIn the command: --set %s=…"), range, fallback, setting->key);
  gtk_label_set_text (self->name, name);
  gtk_label_set_text (self->help, _ (setting->help));
  gtk_label_set_text (self->unit, setting->unit);
  gtk_widget_set_visible (GTK_WIDGET (self->entry), !word);
  gtk_widget_set_visible (GTK_WIDGET (self->words), word);
  gtk_widget_set_visible (GTK_WIDGET (self->unit), !word);
  gtk_widget_set_tooltip_text (GTK_WIDGET (self), tip);
  GtkWidget *control = word ? GTK_WIDGET (self->words) : GTK_WIDGET (self->entry);
  gtk_accessible_update_property (GTK_ACCESSIBLE (control), GTK_ACCESSIBLE_PROPERTY_LABEL, name,
                                  GTK_ACCESSIBLE_PROPERTY_DESCRIPTION, _ (setting->help), -1);
  g_autofree char *back = g_strdup_printf (_("Default of %s"), name);
  gtk_accessible_update_property (GTK_ACCESSIBLE (self->reset), GTK_ACCESSIBLE_PROPERTY_LABEL, back, -1);
}

GtkWidget *
ant_settings_row_new (AntDesk *desk, const AntSetting *setting)
{
  AntSettingsRow *self = g_object_new (ANT_TYPE_SETTINGS_ROW, NULL);
  self->setting = setting;
  if (setting->kind == ANT_SETTING_WORD)
    {
      g_autoptr (GtkStringList) words = gtk_string_list_new (setting->words);
      self->filling = TRUE;
      gtk_drop_down_set_model (self->words, G_LIST_MODEL (words));
      self->filling = FALSE;
    }
  self->desk = g_object_ref (desk);
  label (self);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  show (self);
  return GTK_WIDGET (self);
}

static void
ant_settings_row_dispose (GObject *object)
{
  AntSettingsRow *self = ANT_SETTINGS_ROW (object);
  self->filling = TRUE;
  g_clear_object (&self->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_SETTINGS_ROW);
  G_OBJECT_CLASS (ant_settings_row_parent_class)->dispose (object);
}

static void
ant_settings_row_class_init (AntSettingsRowClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_settings_row_dispose;
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/settings-row.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_set_css_name (widget_class, "settingsrow");
  gtk_widget_class_install_action (widget_class, "setting.reset", NULL, reset_action);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_r, GDK_CONTROL_MASK, "setting.reset", NULL);
  gtk_widget_class_bind_template_child (widget_class, AntSettingsRow, content);
  gtk_widget_class_bind_template_child (widget_class, AntSettingsRow, name);
  gtk_widget_class_bind_template_child (widget_class, AntSettingsRow, help);
  gtk_widget_class_bind_template_child (widget_class, AntSettingsRow, unit);
  gtk_widget_class_bind_template_child (widget_class, AntSettingsRow, fault);
  gtk_widget_class_bind_template_child (widget_class, AntSettingsRow, entry);
  gtk_widget_class_bind_template_child (widget_class, AntSettingsRow, words);
  gtk_widget_class_bind_template_child (widget_class, AntSettingsRow, reset);
  gtk_widget_class_bind_template_callback (widget_class, typed_cb);
  gtk_widget_class_bind_template_callback (widget_class, word_chosen_cb);
}

static void
ant_settings_row_init (AntSettingsRow *self)
{
  self->filling = TRUE;
  gtk_widget_init_template (GTK_WIDGET (self));
  self->filling = FALSE;
}
