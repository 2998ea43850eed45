/* settings-panel.c - the settings panel. */
#include "gui/settings-panel.h"

#include <glib/gi18n.h>

#include "gui/settings-row.h"

struct _AntSettingsPanel
{
  GtkWidget parent_instance;

  /* From the template */
  GtkWidget *content;
  GtkBox *list;
};

G_DEFINE_FINAL_TYPE (AntSettingsPanel, ant_settings_panel, GTK_TYPE_WIDGET)

void
ant_settings_panel_set_desk (AntSettingsPanel *self, AntDesk *desk)
{
  const char *group = "";
  for (gsize i = 0; i < ant_n_settings; i++)
    {
      const AntSetting *setting = &ant_setting_table[i];
      if (!g_str_equal (setting->group, group))
        {
          GtkWidget *heading = gtk_label_new (_ (setting->group));
          gtk_label_set_xalign (GTK_LABEL (heading), 0);
          gtk_widget_add_css_class (heading, "heading");
          gtk_box_append (self->list, heading);
          group = setting->group;
        }
      gtk_box_append (self->list, ant_settings_row_new (desk, setting));
    }
}

void
ant_settings_panel_focus (AntSettingsPanel *self)
{
  gtk_widget_child_focus (GTK_WIDGET (self->list), GTK_DIR_TAB_FORWARD);
}

static void
ant_settings_panel_dispose (GObject *object)
{
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_SETTINGS_PANEL);
  G_OBJECT_CLASS (ant_settings_panel_parent_class)->dispose (object);
}

static void
ant_settings_panel_class_init (AntSettingsPanelClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_settings_panel_dispose;
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/settings-panel.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_set_css_name (widget_class, "settingspanel");
  gtk_widget_class_bind_template_child (widget_class, AntSettingsPanel, content);
  gtk_widget_class_bind_template_child (widget_class, AntSettingsPanel, list);
}

static void
ant_settings_panel_init (AntSettingsPanel *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
}
