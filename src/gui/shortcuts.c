/* shortcuts.c - the table of keys, and the window that shows it. */
#include <glib/gi18n.h>

#include "gui/shortcuts.h"

#define FILES N_("Records and results")
#define SEARCH N_("Search")
#define VIEW N_("View")
#define DIPS N_("Dips")
#define GENERAL N_("General")

const AntShortcut ant_shortcut_table[] = {
  { "win.open", N_("Open a record or an analysis"), FILES, { "<Control>o" } },
  { "win.reload", N_("Read the record again"), FILES, { "<Control>r" } },
  { "win.columns", N_("Choose columns, times and fill values"), FILES, { "<Control><Shift>r" } },
  { "win.save", N_("Save the analysis"), FILES, { "<Control>s" } },
  { "win.save-as", N_("Save the analysis under another name"), FILES, { "<Control><Shift>a" } },
  { "win.save-tables", N_("Save all tables into a folder"), FILES, { "<Control><Alt>s" } },
  { "win.find-record", N_("Say where the record of the analysis is now"), FILES, { "<Control><Alt>o" } },
  { "win.undo", N_("Undo the last change"), FILES, { "<Control>z" } },
  { "win.redo", N_("Do it again"), FILES, { "<Control><Shift>z", "<Control>y" } },
  { "win.save-list", N_("Save the list of dips as CSV, FITS or VOTable"), FILES, { "<Control>e" } },
  { "win.save-flags", N_("Save the flags of left-out rows as CSV or FITS"), FILES, { "<Control><Shift>e" } },
  { "win.save-series", N_("Save the detrended series as CSV or FITS"), FILES, { "<Control><Alt>e" } },
  { "win.save-report", N_("Save the report as PDF"), FILES, { "<Control>p" } },
  { "win.open-witness", N_("Open a witness, another instrument's record"), FILES, { "<Control><Shift>o" } },
  { "win.close-witness", N_("Close the witness"), FILES, { "<Control><Shift>i" } },
  { "app.new-window", N_("New window"), FILES, { "<Control>n" } },
  { "win.close", N_("Close the window"), FILES, { "<Control>w" } },
  { "app.quit", N_("Quit"), FILES, { "<Control>q" } },

  { "win.scan", N_("Scan for dips"), SEARCH, { "<Control>Return", "F5" } },
  { "win.stop", N_("Stop what is running"), SEARCH, { "<Control>period" } },
  { "win.measure", N_("Measure a dip: drag across it"), SEARCH, { "<Control>m" } },
  { "win.mask", N_("Leave out a span: drag across it"), SEARCH, { "<Control>k" } },
  { "win.unmask", N_("Use a span again that was left out"), SEARCH, { "<Control><Shift>k" } },
  { "win.settings", N_("Settings of the search"), SEARCH, { "F9" } },
  { "win.reset-settings", N_("All settings back to default"), SEARCH, { "<Control><Shift>F9" } },

  { "win.view-in", N_("Closer"), VIEW, { "<Control>plus", "<Control>equal" } },
  { "win.view-out", N_("Farther"), VIEW, { "<Control>minus" } },
  { "win.view-whole", N_("The whole record"), VIEW, { "<Control>0" } },
  { "win.view-selected", N_("The drawn span, or the selected dip and its surroundings"), VIEW, { "<Control>j" } },
  { "win.view-earlier", N_("Earlier"), VIEW, { "<Control>Left" } },
  { "win.view-later", N_("Later"), VIEW, { "<Control>Right" } },
  { "win.view-back", N_("Back to the view before"), VIEW, { "<Alt>Left" } },
  { "win.view-forward", N_("Forward again"), VIEW, { "<Alt>Right" } },
  { "win.own-unit", N_("Between ppm and the record's own unit"), VIEW, { "<Control>u" } },
  { "win.next-average", N_("Longer averages over the samples, then none"), VIEW, { "<Control>g" } },
  { "win.snr", N_("The dip SNR against time"), VIEW, { "<Control>d" } },
  { "win.next-witness-look", N_("Witness, ratio or difference"), VIEW, { "<Control>i" } },
  { "win.next-snr-duration", N_("That of longer dips"), VIEW, { "<Control><Shift>d" } },
  { "win.page::record", N_("Page Record"), VIEW, { "<Alt>1" } },
  { "win.page::noise", N_("Page Noise"), VIEW, { "<Alt>2" } },
  { "win.page::dips", N_("Page Dips"), VIEW, { "<Alt>3" } },
  { "win.page::repeats", N_("Page Repeats"), VIEW, { "<Alt>4" } },
  { "win.page::sky", N_("Page Sky"), VIEW, { "<Alt>5" } },
  { "win.page::instrument", N_("Page Instrument"), VIEW, { "<Alt>6" } },

  { "win.next-dip", N_("Next dip"), DIPS, { "<Alt>Down" } },
  { "win.previous-dip", N_("Previous dip"), DIPS, { "<Alt>Up" } },
  { "win.filter", N_("Filter the list"), DIPS, { "<Control>f" } },
  { "win.note", N_("Write a note"), DIPS, { "<Control>t" } },
  { "win.copy-dip", N_("Copy the numbers of the dip with their units"), DIPS, { "<Control><Shift>c" } },
  { "win.verdict::undecided", N_("Verdict: undecided"), DIPS, { "<Control><Alt>0" } },
  { "win.verdict::planet", N_("Verdict: planet"), DIPS, { "<Control><Alt>1" } },
  { "win.verdict::planet-shaped", N_("Verdict: planet-shaped"), DIPS, { "<Control><Alt>2" } },
  { "win.verdict::spot", N_("Verdict: spot"), DIPS, { "<Control><Alt>3" } },
  { "win.verdict::eclipse", N_("Verdict: eclipse"), DIPS, { "<Control><Alt>4" } },
  { "win.verdict::instrument", N_("Verdict: instrument"), DIPS, { "<Control><Alt>5" } },
  { "win.verdict::noise", N_("Verdict: noise"), DIPS, { "<Control><Alt>6" } },

  { "win.shortcuts", N_("Keyboard shortcuts"), GENERAL, { "<Control>question", "F1" } },
};
const gsize ant_n_shortcuts = G_N_ELEMENTS (ant_shortcut_table);

/* Keys of single widgets, for the window of shortcuts only. */
static const AntShortcut on_plots[] = {
  { NULL, N_("Closer, farther, the whole"), N_("On a strip"), { "plus", "minus", "Home" } },
  { NULL, N_("Earlier, later"), N_("On a strip"), { "Left", "Right" } },
  { NULL, N_("Next dip, previous dip"), N_("On a strip"), { "n", "p" } },
  { NULL, N_("Begin or widen a span, narrow it"), N_("On a strip"), { "<Shift>Right", "<Shift>Left" } },
  { NULL, N_("Measure the dip in the span, forget the span"), N_("On a strip"), { "Return", "Escape" } },
  { NULL, N_("Leave out the span, use it again"), N_("On a strip"), { "m", "u" } },
  { NULL, N_("Save the figure as PNG, SVG or PDF"), N_("On a plot"), { "<Control><Shift>s" } },
  { NULL, N_("Copy the figure"), N_("On a plot"), { "<Control>c" } },
  { NULL, N_("Menu of the plot"), N_("On a plot"), { "<Shift>F10", "Menu" } },
  { NULL, N_("Back to the default"), N_("On a setting"), { "<Control>r" } },
};

void
ant_shortcuts_install (GtkApplication *application)
{
  for (gsize i = 0; i < ant_n_shortcuts; i++)
    {
      const char *keys[G_N_ELEMENTS (ant_shortcut_table[i].keys) + 1] = { NULL };
      for (gsize k = 0; k < G_N_ELEMENTS (ant_shortcut_table[i].keys); k++)
        keys[k] = ant_shortcut_table[i].keys[k];
      gtk_application_set_accels_for_action (application, ant_shortcut_table[i].action, keys);
    }
}

static void
append_shortcut (GString *ui, const AntShortcut *shortcut)
{
  GString *keys = g_string_new (NULL);
  for (gsize k = 0; k < G_N_ELEMENTS (shortcut->keys) && shortcut->keys[k]; k++)
    g_string_append_printf (keys, "%s%s", k > 0 ? " " : "", shortcut->keys[k]);
  g_autofree char *part
      = g_markup_printf_escaped ("<child><object class='GtkShortcutsShortcut'><property name='title'>%s</property>"
                                 "<property name='accelerator'>%s</property></object></child>",
                                 _ (shortcut->title), keys->str);
  g_string_append (ui, part);
  g_string_free (keys, TRUE);
}

static void
append_groups (GString *ui, gsize n, const AntShortcut *table)
{
  for (gsize i = 0; i < n; i++)
    {
      if (i == 0 || !g_str_equal (table[i].group, table[i - 1].group))
        {
          g_autofree char *head = g_markup_printf_escaped (
              "<child><object class='GtkShortcutsGroup'><property name='title'>%s</property>", _ (table[i].group));
          g_string_append (ui, head);
        }
      append_shortcut (ui, &table[i]);
      if (i + 1 == n || !g_str_equal (table[i].group, table[i + 1].group))
        g_string_append (ui, "</object></child>");
    }
}

/* GTK 4.8 makes the window only from a description; so the table is put into one. */
GtkWidget *
ant_shortcuts_window_new (void)
{
  GString *ui = g_string_new ("<interface><object class='GtkShortcutsWindow' id='window'>");
  g_autofree char *head =
      g_markup_printf_escaped ("<property name='title'>%s</property><property name='modal'>1</property>"
                               "<child><object class='GtkShortcutsSection'>"
                               "<property name='section-name'>all</property>"
                               "<property name='max-height'>14</property>",
                               _("Keyboard Shortcuts"));
  g_string_append (ui, head);
  append_groups (ui, ant_n_shortcuts, ant_shortcut_table);
  append_groups (ui, G_N_ELEMENTS (on_plots), on_plots);
  g_string_append (ui, "</object></child></object></interface>");
  g_autoptr (GtkBuilder) builder = gtk_builder_new_from_string (ui->str, (gssize) ui->len);
  GtkWidget *window = GTK_WIDGET (gtk_builder_get_object (builder, "window"));
  g_string_free (ui, TRUE);
  return window;
}
