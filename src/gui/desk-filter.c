/* desk-filter.c - which items are shown: by kind, and by words that their class, shape, note, name or time have. */
#include "gui/desk-private.h"

#include <string.h>

#include "data/verdict-words.h"

guint
ant_desk_get_shown (AntDesk *self)
{
  return self->shown;
}

const char *
ant_desk_get_filter (AntDesk *self)
{
  return self->filter;
}

/* Everything of an item that a person may ask for, folded. */
static char *
words_of (AntDesk *self, AntDipItem *item)
{
  const AntVerdict *verdict = ant_dip_item_get_verdict (item);
  AntRivalKind ranking[ANT_N_RIVALS];
  const char *shape = verdict && ant_verdict_ranking (verdict, ranking) > 0 ? ant_rival_title (ranking[0]) : "";
  g_autofree char *title = ant_dip_item_title (item),
                  *middle = ant_instant_words (ant_desk_get_record (self), ant_dip_item_get_dip (item)->mid_d);
  g_autofree char *all = g_strjoin ("\n", title, middle, shape, ant_dip_class_title (ant_dip_item_get_shown_class (item)),
                                    ant_dip_item_get_note (item), NULL);
  return g_utf8_casefold (all, -1);
}

gboolean
ant_desk_keeps (AntDesk *self, AntDipItem *item)
{
  if (!(ant_dip_item_get_kind (item) & self->shown))
    return FALSE;
  if (*self->filter == '\0' || !ant_desk_get_record (self))
    return TRUE;
  g_autofree char *wanted = g_utf8_casefold (self->filter, -1), *words = words_of (self, item);
  return strstr (words, wanted) != NULL;
}

/* What is no longer shown is no longer selected. */
static void
show_again (AntDesk *self, AntDeskChange what)
{
  ant_desk_make_marks (self);
  if (self->selected && !ant_desk_keeps (self, self->selected))
    {
      g_clear_object (&self->selected);
      what |= ANT_DESK_SELECTION;
    }
  ant_desk_tell (self, what);
}

void
ant_desk_set_shown (AntDesk *self, guint kinds)
{
  self->shown = kinds;
  show_again (self, ANT_DESK_LOOK | ANT_DESK_SELECTION);
}

void
ant_desk_set_filter (AntDesk *self, const char *words)
{
  if (g_str_equal (self->filter, words))
    return;
  g_free (self->filter);
  self->filter = g_strdup (words);
  show_again (self, ANT_DESK_LOOK);
}
