/* column-chooser.c - the window of choices about reading. */
#include "gui/column-chooser.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/record-words.h"
#include "gui/reading-memory.h"
#include "jobs/preview-task.h"

#define PAUSE_MS 200 /* after the last key before the effect is worked out */

/* A choice is a word of AntReadingChoices (the fills aside): typed, or taken from a list. */
typedef enum { TYPED, COLUMNS, COLUMNS_OR_NONE, WORDS } ChoiceKind;

typedef struct
{
  const char *word; /* its name in ant_reading_word_table; NULL: the fill values */
  const char *label, *hint; /* the hint stands in a field that is typed into */
  ChoiceKind kind;
  const char *words; /* WORDS: with blanks between */
  const char *format; /* files that it is for; NULL: all */
} Choice;

static const Choice choice_table[] = {
  { "time_column", N_("Time"), N_("found by the reader; or columns, such as 1+2"), TYPED, NULL, NULL },
  { "value_column", N_("Value"), NULL, COLUMNS, NULL, NULL },
  { "time_format", N_("Written as"), NULL, WORDS, "jd mjd iso ymd unix year-day year-month-day decimal-year days hours seconds", NULL },
  { "error_column", N_("Error"), NULL, COLUMNS_OR_NONE, NULL, NULL },
  { "time_scale", N_("Time scale"), NULL, WORDS, "UTC TAI TT TDB GPS Unix unknown", NULL },
  { "quality_column", N_("Quality"), NULL, COLUMNS_OR_NONE, NULL, NULL },
  { "time_zone", N_("Local clock"), N_("hours ahead of UTC, such as +01:00"), TYPED, NULL, NULL },
  { NULL, N_("Fill values"), N_("besides the usual ones: -99, 0"), TYPED, NULL, NULL },
  { "epoch", N_("Counted from"), N_("a time such as 2000-01-01T12:00:00"), TYPED, NULL, NULL },
  { "hdu", N_("Table"), N_("an HDU by name or number"), TYPED, NULL, "FITS" },
  { "index", N_("Index"), N_("along further dimensions: wavelength=3"), TYPED, NULL, "NetCDF" },
};
#define N_CHOICES G_N_ELEMENTS (choice_table)

struct _AntColumnChooser
{
  GtkWindow parent_instance;

  /* From the template */
  GtkWidget *lines_frame;
  GtkTextView *lines;
  GtkGrid *choices;
  GtkLabel *effect;
  GtkWidget *accept;
  GtkCheckButton *remember;

  /* Owned */
  AntDesk *desk;
  AntChoosePurpose purpose;
  char *path, *kind; /* the kind once the file was looked at */
  AntReadingChoices first; /* what to begin with, until then */
  GCancellable *stop;
  guint pause;

  GtkWidget *labels[N_CHOICES], *fields[N_CHOICES]; /* of the grid */
  gboolean has_columns, filling;
};

G_DEFINE_FINAL_TYPE (AntColumnChooser, ant_column_chooser, GTK_TYPE_WINDOW)

static void begin_preview (AntColumnChooser *self);

static char **
word_in (AntReadingChoices *choices, const Choice *choice)
{
  for (gsize i = 0; i < ant_n_reading_words; i++)
    if (choice->word && g_str_equal (ant_reading_word_table[i].name, choice->word))
      return ant_reading_choices_word (choices, &ant_reading_word_table[i]);
  return NULL;
}

/* What stands in a field; NULL: left to the reader. Caller frees. */
static char *
field_text (AntColumnChooser *self, gsize i)
{
  if (choice_table[i].kind == TYPED)
    {
      char *text = g_strstrip (g_strdup (gtk_editable_get_text (GTK_EDITABLE (self->fields[i]))));
      if (*text)
        return text;
      g_free (text);
      return NULL;
    }
  GtkDropDown *list = GTK_DROP_DOWN (self->fields[i]);
  guint selected = gtk_drop_down_get_selected (list);
  if (selected == 0 || selected == GTK_INVALID_LIST_POSITION)
    return NULL;
  if (choice_table[i].kind == COLUMNS_OR_NONE && selected == 1)
    return g_strdup ("none");
  if (choice_table[i].kind != WORDS)
    {
      /* By number: names may stand twice. */
      guint first = choice_table[i].kind == COLUMNS ? 1 : 2;
      return self->has_columns ? g_strdup_printf ("%u", selected - first + 1)
                               : g_strdup (gtk_string_object_get_string (gtk_drop_down_get_selected_item (list)));
    }
  return g_strdup (gtk_string_object_get_string (gtk_drop_down_get_selected_item (list)));
}

static gboolean
collect (AntColumnChooser *self, AntReadingChoices *choices, GError **error)
{
  *choices = (AntReadingChoices) { 0 };
  for (gsize i = 0; i < N_CHOICES; i++)
    {
      g_autofree char *text = gtk_widget_get_visible (self->fields[i]) ? field_text (self, i) : NULL;
      char **word = word_in (choices, &choice_table[i]);
      if (word)
        *word = g_steal_pointer (&text);
      else if (text && !ant_reading_choices_parse_fills (choices, text, error))
        {
          ant_reading_choices_clear (choices);
          return FALSE;
        }
    }
  return TRUE;
}

static gboolean
pause_over_cb (gpointer data)
{
  AntColumnChooser *self = data;
  self->pause = 0;
  begin_preview (self);
  return G_SOURCE_REMOVE;
}

static void
changed_cb (AntColumnChooser *self)
{
  if (self->filling)
    return;
  g_clear_handle_id (&self->pause, g_source_remove);
  self->pause = g_timeout_add (PAUSE_MS, pause_over_cb, self);
}

static GtkStringList *
list_of (const Choice *choice, const GPtrArray *columns)
{
  GtkStringList *list = gtk_string_list_new (NULL);
  gtk_string_list_append (list, _("found by the reader"));
  if (choice->kind == COLUMNS_OR_NONE)
    gtk_string_list_append (list, _("none"));
  g_auto (GStrv) words = choice->kind == WORDS ? g_strsplit (choice->words, " ", -1) : NULL;
  for (char **word = words; word && *word; word++)
    gtk_string_list_append (list, *word);
  for (guint i = 0; choice->kind != WORDS && columns && i < columns->len; i++)
    gtk_string_list_append (list, g_ptr_array_index (columns, i));
  return list;
}

/* The place of a choice in its list: a word, or a column by name or number. 0 if it is not there. */
static guint
place_in (const Choice *choice, const char *text, GListModel *list)
{
  guint first = choice->kind == COLUMNS_OR_NONE ? 2 : 1, n = g_list_model_get_n_items (list);
  if (choice->kind == COLUMNS_OR_NONE && g_str_equal (text, "none"))
    return 1;
  for (guint i = first; i < n; i++)
    {
      g_autoptr (GtkStringObject) item = g_list_model_get_item (list, i);
      if (g_ascii_strcasecmp (gtk_string_object_get_string (item), text) == 0)
        return i;
    }
  guint64 number = g_ascii_strtoull (text, NULL, 10);
  return choice->kind != WORDS && number >= 1 && number + first <= n ? (guint) number + first - 1 : 0;
}

/* Show what is chosen already. */
static void
fill_fields (AntColumnChooser *self, const AntReadingChoices *choices)
{
  AntReadingChoices copy;
  ant_reading_choices_copy (choices, &copy);
  self->filling = TRUE;
  for (gsize i = 0; i < N_CHOICES; i++)
    {
      char **word = word_in (&copy, &choice_table[i]);
      g_autofree char *fills = word ? NULL : ant_reading_choices_fills_text (choices);
      const char *text = word ? *word : fills;
      if (choice_table[i].kind == TYPED)
        gtk_editable_set_text (GTK_EDITABLE (self->fields[i]), text ? text : "");
      else if (text)
        gtk_drop_down_set_selected (GTK_DROP_DOWN (self->fields[i]),
                                    place_in (&choice_table[i], text, gtk_drop_down_get_model (GTK_DROP_DOWN (self->fields[i]))));
    }
  self->filling = FALSE;
  ant_reading_choices_clear (&copy);
}

static GtkWidget *
field_new (AntColumnChooser *self, const Choice *choice)
{
  GtkWidget *field;
  if (choice->kind == TYPED)
    {
      field = gtk_entry_new ();
      gtk_entry_set_placeholder_text (GTK_ENTRY (field), _ (choice->hint));
      gtk_entry_set_activates_default (GTK_ENTRY (field), TRUE);
      g_signal_connect_swapped (field, "changed", G_CALLBACK (changed_cb), self);
    }
  else
    {
      field = gtk_drop_down_new (G_LIST_MODEL (list_of (choice, NULL)), NULL);
      g_signal_connect_swapped (field, "notify::selected", G_CALLBACK (changed_cb), self);
    }
  gtk_widget_set_hexpand (field, TRUE);
  return field;
}

/* Two choices a row: times on the left, columns on the right. */
static void
add_fields (AntColumnChooser *self)
{
  for (gsize i = 0; i < N_CHOICES; i++)
    {
      const Choice *choice = &choice_table[i];
      int column = (int) (i % 2) * 2, row = (int) i / 2;
      self->labels[i] = gtk_label_new (_ (choice->label));
      self->fields[i] = field_new (self, choice);
      gtk_label_set_xalign (GTK_LABEL (self->labels[i]), 1);
      gtk_widget_add_css_class (self->labels[i], "dim-label");
      gtk_accessible_update_property (GTK_ACCESSIBLE (self->fields[i]), GTK_ACCESSIBLE_PROPERTY_LABEL, _ (choice->label), -1);
      gtk_grid_attach (self->choices, self->labels[i], column, row, 1, 1);
      gtk_grid_attach (self->choices, self->fields[i], column + 1, row, 1, 1);
    }
}

/* The columns of formats that only reading tells. */
static GPtrArray *
columns_of_record (const AntRecord *record)
{
  GPtrArray *columns = g_ptr_array_new_with_free_func (g_free);
  g_ptr_array_add (columns, g_strdup (record->value_name));
  if (record->error_name)
    g_ptr_array_add (columns, g_strdup (record->error_name));
  if (record->quality_name)
    g_ptr_array_add (columns, g_strdup (record->quality_name));
  for (guint i = 0; i < record->columns->len; i++)
    g_ptr_array_add (columns, g_strdup (((AntColumn *) g_ptr_array_index (record->columns, i))->name));
  return columns;
}

/* Once: the lists of columns, the first lines, and which fields make sense for this format. */
static void
take_look (AntColumnChooser *self, const AntPreview *preview)
{
  const AntFileLook *look = preview->look;
  if (self->kind)
    return;
  g_autoptr (GPtrArray) read = look->columns->len == 0 && preview->record ? columns_of_record (preview->record) : NULL;
  g_autoptr (GString) text = g_string_new (NULL);
  self->kind = g_strdup (look->kind);
  self->has_columns = look->columns->len > 0;
  self->filling = TRUE;
  for (gsize i = 0; i < N_CHOICES; i++)
    {
      gboolean fits = !choice_table[i].format || g_strcmp0 (choice_table[i].format, look->format) == 0;
      gtk_widget_set_visible (self->labels[i], fits);
      gtk_widget_set_visible (self->fields[i], fits);
      if (choice_table[i].kind == COLUMNS || choice_table[i].kind == COLUMNS_OR_NONE)
        {
          g_autoptr (GtkStringList) list = list_of (&choice_table[i], read ? read : look->columns);
          gtk_drop_down_set_model (GTK_DROP_DOWN (self->fields[i]), G_LIST_MODEL (list));
        }
    }
  self->filling = FALSE;
  fill_fields (self, &self->first);
  for (guint i = 0; i < look->lines->len; i++)
    g_string_append_printf (text, "%s%s", i ? "\n" : "", (const char *) g_ptr_array_index (look->lines, i));
  gtk_text_buffer_set_text (gtk_text_view_get_buffer (self->lines), text->str, -1);
  gtk_widget_set_visible (self->lines_frame, look->lines->len > 0);
}

static void
show_effect (AntColumnChooser *self, const AntPreview *preview, const char *refusal)
{
  g_autoptr (GString) text = g_string_new (refusal);
  const AntRecord *record = preview ? preview->record : NULL;
  if (record)
    {
      g_autofree char *first = ant_preview_words (record, preview->partial);
      g_string_append (text, first);
      for (guint i = 0; i < record->said->len; i++)
        g_string_append_printf (text, "\n%s", (const char *) g_ptr_array_index (record->said, i));
    }
  gtk_label_set_text (self->effect, text->str);
  gtk_widget_set_sensitive (self->accept, record != NULL);
  if (record)
    gtk_widget_remove_css_class (GTK_WIDGET (self->effect), "error");
  else
    gtk_widget_add_css_class (GTK_WIDGET (self->effect), "error");
}

static void
previewed_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntColumnChooser) self = data;
  g_autoptr (GError) error = NULL;
  g_autoptr (AntPreview) preview = ant_preview_task_finish (result, &error);
  if (g_task_get_cancellable (G_TASK (result)) != self->stop)
    return; /* overtaken, or the window is closed */
  if (preview)
    take_look (self, preview);
  show_effect (self, preview, preview ? preview->refusal : error->message);
}

static void
begin_preview (AntColumnChooser *self)
{
  AntReadingChoices choices;
  g_autoptr (GError) error = NULL;
  if (self->stop)
    g_cancellable_cancel (self->stop);
  g_clear_object (&self->stop);
  if (!self->kind)
    ant_reading_choices_copy (&self->first, &choices);
  else if (!collect (self, &choices, &error))
    {
      show_effect (self, NULL, error->message);
      return;
    }
  self->stop = g_cancellable_new ();
  ant_preview_task_async (self->path, &choices, self->stop, previewed_cb, g_object_ref (self));
  ant_reading_choices_clear (&choices);
}

static void
cancel_cb (AntColumnChooser *self)
{
  gtk_window_close (GTK_WINDOW (self));
}

static void
accept_cb (AntColumnChooser *self)
{
  AntReadingChoices choices;
  if (!collect (self, &choices, NULL))
    return;
  if (self->kind && gtk_check_button_get_active (self->remember))
    ant_reading_memory_keep (self->kind, &choices);
  if (self->purpose == ANT_CHOOSE_WITNESS)
    ant_desk_open_witness_as (self->desk, self->path, &choices);
  else
    ant_desk_open_as (self->desk, self->path, &choices);
  ant_reading_choices_clear (&choices);
  gtk_window_close (GTK_WINDOW (self));
}

static void
ant_column_chooser_dispose (GObject *object)
{
  AntColumnChooser *self = ANT_COLUMN_CHOOSER (object);
  g_clear_handle_id (&self->pause, g_source_remove);
  if (self->stop)
    g_cancellable_cancel (self->stop);
  g_clear_object (&self->stop);
  g_clear_object (&self->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_COLUMN_CHOOSER);
  G_OBJECT_CLASS (ant_column_chooser_parent_class)->dispose (object);
}

static void
ant_column_chooser_finalize (GObject *object)
{
  AntColumnChooser *self = ANT_COLUMN_CHOOSER (object);
  g_free (self->path);
  g_free (self->kind);
  ant_reading_choices_clear (&self->first);
  G_OBJECT_CLASS (ant_column_chooser_parent_class)->finalize (object);
}

static void
ant_column_chooser_class_init (AntColumnChooserClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_column_chooser_dispose;
  G_OBJECT_CLASS (klass)->finalize = ant_column_chooser_finalize;
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/column-chooser.ui");
  gtk_widget_class_bind_template_child (widget_class, AntColumnChooser, lines_frame);
  gtk_widget_class_bind_template_child (widget_class, AntColumnChooser, lines);
  gtk_widget_class_bind_template_child (widget_class, AntColumnChooser, choices);
  gtk_widget_class_bind_template_child (widget_class, AntColumnChooser, effect);
  gtk_widget_class_bind_template_child (widget_class, AntColumnChooser, accept);
  gtk_widget_class_bind_template_child (widget_class, AntColumnChooser, remember);
  gtk_widget_class_bind_template_callback (widget_class, cancel_cb);
  gtk_widget_class_bind_template_callback (widget_class, accept_cb);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Escape, 0, "window.close", NULL);
}

static void
ant_column_chooser_init (AntColumnChooser *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  add_fields (self);
}

GtkWidget *
ant_column_chooser_new (GtkWindow *parent, AntDesk *desk, const char *path, const AntReadingChoices *choices, AntChoosePurpose purpose)
{
  AntColumnChooser *self = g_object_new (ANT_TYPE_COLUMN_CHOOSER, "transient-for", parent, NULL);
  self->desk = g_object_ref (desk);
  self->path = g_strdup (path);
  self->purpose = purpose;
  g_autofree char *name = g_filename_display_basename (path);
  g_autofree char *title = g_strdup_printf (_("Columns and Times of %s"), name);
  gtk_window_set_title (GTK_WINDOW (self), title);
  ant_reading_choices_copy (choices, &self->first);
  fill_fields (self, choices);
  begin_preview (self);
  return GTK_WIDGET (self);
}
