/* dip-item.c - a row of the list of dips. */
#include "gui/dip-item.h"

#include <glib/gi18n.h>

#include "data/verdict-words.h"

struct _AntDipItem
{
  GObject parent_instance;
  AntDipKind kind;
  guint number;
  AntDip dip;
  double upper_limit_ppm;
  AntVerdict *verdict; /* owned, or NULL */
  AntDipClass class;
  char *note;
};

enum
{
  PROP_0,
  PROP_JUDGEMENT,
  N_PROPS
};
static GParamSpec *properties[N_PROPS];

G_DEFINE_FINAL_TYPE (AntDipItem, ant_dip_item, G_TYPE_OBJECT)

AntDipItem *
ant_dip_item_new (AntDipKind kind, guint number, const AntDip *dip, double upper_limit_ppm)
{
  AntDipItem *self = g_object_new (ANT_TYPE_DIP_ITEM, NULL);
  self->kind = kind;
  self->number = number;
  self->dip = *dip;
  self->upper_limit_ppm = upper_limit_ppm;
  return self;
}

AntDipKind
ant_dip_item_get_kind (AntDipItem *self)
{
  return self->kind;
}

guint
ant_dip_item_get_number (AntDipItem *self)
{
  return self->number;
}

const AntDip *
ant_dip_item_get_dip (AntDipItem *self)
{
  return &self->dip;
}

double
ant_dip_item_get_upper_limit_ppm (AntDipItem *self)
{
  return self->upper_limit_ppm;
}

void
ant_dip_item_set_verdict (AntDipItem *self, const AntVerdict *verdict)
{
  g_free (self->verdict);
  self->verdict = g_memdup2 (verdict, verdict ? sizeof *verdict : 0);
}

const AntVerdict *
ant_dip_item_get_verdict (AntDipItem *self)
{
  return self->verdict;
}

AntDipClass
ant_dip_item_get_shown_class (AntDipItem *self)
{
  return self->class == ANT_CLASS_UNDECIDED && self->verdict ? ant_verdict_class (self->verdict) : self->class;
}

AntDipClass
ant_dip_item_get_class (AntDipItem *self)
{
  return self->class;
}

const char *
ant_dip_item_get_note (AntDipItem *self)
{
  return self->note;
}

void
ant_dip_item_judge (AntDipItem *self, AntDipClass class, const char *note)
{
  if (self->class == class && g_str_equal (self->note, note))
    return;
  self->class = class;
  g_free (self->note);
  self->note = g_strdup (note);
  g_object_notify_by_pspec (G_OBJECT (self), properties[PROP_JUDGEMENT]);
}

GPtrArray *
ant_dip_item_facts (AntDipItem *self, const AntRecord *record, AntDepthUnit unit)
{
  return self->kind == ANT_KIND_PASSAGE ? ant_passage_facts (record, &self->dip, unit)
                                        : ant_dip_facts (record, &self->dip, self->upper_limit_ppm, unit);
}

char *
ant_dip_item_title (AntDipItem *self)
{
  switch (self->kind)
    {
    case ANT_KIND_BRIGHTENING:
      return g_strdup_printf (_("Brightening %u"), self->number);
    case ANT_KIND_ASKED:
      return g_strdup_printf (_("Asked dip %u"), self->number);
    case ANT_KIND_PASSAGE:
      return g_strdup_printf (_("Passage %u"), self->number);
    case ANT_KIND_DIP:
    default:
      return g_strdup_printf (_("Dip %u"), self->number);
    }
}

const char *
ant_dip_item_sign (AntDipItem *self)
{
  return self->kind == ANT_KIND_BRIGHTENING ? "+" : self->kind == ANT_KIND_ASKED ? "?" : "";
}

char *
ant_dip_item_label (AntDipItem *self)
{
  return g_strdup_printf ("%s%u", ant_dip_item_sign (self), self->number);
}

AntDipLook
ant_dip_item_look (AntDipItem *self)
{
  return ant_dip_look_of (ant_dip_item_get_shown_class (self));
}

static void
ant_dip_item_finalize (GObject *object)
{
  g_free (ANT_DIP_ITEM (object)->verdict);
  g_free (ANT_DIP_ITEM (object)->note);
  G_OBJECT_CLASS (ant_dip_item_parent_class)->finalize (object);
}

static void
ant_dip_item_get_property (GObject *object, guint id, GValue *value, GParamSpec *pspec)
{
  g_value_set_int (value, (int) ANT_DIP_ITEM (object)->class);
}

static void
ant_dip_item_class_init (AntDipItemClass *klass)
{
  GObjectClass *object_class = G_OBJECT_CLASS (klass);
  object_class->finalize = ant_dip_item_finalize;
  object_class->get_property = ant_dip_item_get_property;
  properties[PROP_JUDGEMENT] = g_param_spec_int ("judgement", NULL, NULL, 0, ANT_N_CLASSES - 1, 0,
                                                 G_PARAM_READABLE | G_PARAM_EXPLICIT_NOTIFY | G_PARAM_STATIC_STRINGS);
  g_object_class_install_properties (object_class, N_PROPS, properties);
}

static void
ant_dip_item_init (AntDipItem *self)
{
  self->note = g_strdup ("");
}
