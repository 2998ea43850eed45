/* judgement.c - the analyst's word on each dip. */
#include "data/judgement.h"

#include <glib/gi18n.h>
#include <math.h>

typedef struct
{
  double mid_d, duration_d;
  AntDipClass class;
  char *note;
} Judgement;

struct _AntJudgements
{
  GPtrArray *given; /* of Judgement */
};

static const char *const class_names[] = { "undecided", "planet",     "planet-shaped", "spot",
                                           "eclipse",   "instrument", "noise",         "flare" };
static const char *const class_titles[] = { N_("undecided"), N_("planet"),     N_("planet-shaped"), N_("spot"),
                                            N_("eclipse"),   N_("instrument"), N_("noise"),         N_("flare") };
G_STATIC_ASSERT (G_N_ELEMENTS (class_names) == ANT_N_CLASSES && G_N_ELEMENTS (class_titles) == ANT_N_CLASSES);

const char *
ant_dip_class_name (AntDipClass class)
{
  return class_names[class];
}

const char *
ant_dip_class_title (AntDipClass class)
{
  return _ (class_titles[class]);
}

gboolean
ant_dip_class_parse (const char *name, AntDipClass *class)
{
  for (guint i = 0; i < ANT_N_CLASSES; i++)
    if (g_str_equal (class_names[i], name))
      return *class = (AntDipClass) i, TRUE;
  return FALSE;
}

static void
judgement_free (gpointer data)
{
  Judgement *judgement = data;
  g_free (judgement->note);
  g_free (judgement);
}

AntJudgements *
ant_judgements_new (void)
{
  AntJudgements *judgements = g_new0 (AntJudgements, 1);
  judgements->given = g_ptr_array_new_with_free_func (judgement_free);
  return judgements;
}

void
ant_judgements_free (AntJudgements *judgements)
{
  if (!judgements)
    return;
  g_ptr_array_unref (judgements->given);
  g_free (judgements);
}

static int
by_time (gconstpointer a, gconstpointer b)
{
  const Judgement *one = *(Judgement *const *) a, *other = *(Judgement *const *) b;
  return (one->mid_d > other->mid_d) - (one->mid_d < other->mid_d);
}

static Judgement *
add (AntJudgements *judgements, double mid_d, double duration_d, AntDipClass class, const char *note)
{
  Judgement *one = g_new (Judgement, 1);
  *one = (Judgement) { mid_d, duration_d, class, g_strdup (note) };
  g_ptr_array_add (judgements->given, one);
  return one;
}

void
ant_judgements_add (AntJudgements *judgements, const AntJudgement *judgement)
{
  add (judgements, judgement->mid_d, judgement->duration_d, judgement->class, judgement->note);
  g_ptr_array_sort (judgements->given, by_time);
}

AntJudgements *
ant_judgements_copy (const AntJudgements *judgements)
{
  AntJudgements *copy = ant_judgements_new ();
  for (guint i = 0; i < judgements->given->len; i++)
    {
      const Judgement *one = g_ptr_array_index (judgements->given, i);
      add (copy, one->mid_d, one->duration_d, one->class, one->note);
    }
  return copy;
}

gsize
ant_judgements_count (const AntJudgements *judgements)
{
  return judgements->given->len;
}

AntJudgement
ant_judgements_get (const AntJudgements *judgements, gsize i)
{
  const Judgement *one = g_ptr_array_index (judgements->given, i);
  return (AntJudgement) { one->mid_d, one->duration_d, one->class, one->note };
}

void
ant_judgements_shift (AntJudgements *judgements, double shift_d)
{
  for (guint i = 0; i < judgements->given->len; i++)
    ((Judgement *) g_ptr_array_index (judgements->given, i))->mid_d += shift_d;
}

gboolean
ant_judgement_is_of (const AntJudgement *judgement, double mid_d, double duration_d)
{
  return fabs (judgement->mid_d - mid_d) < 0.5 * fmax (judgement->duration_d, duration_d);
}

/* The nearest of those that mean the same dip. */
static Judgement *
find (const AntJudgements *judgements, double mid_d, double duration_d)
{
  Judgement *nearest = NULL;
  for (guint i = 0; i < judgements->given->len; i++)
    {
      Judgement *one = g_ptr_array_index (judgements->given, i);
      AntJudgement given = { one->mid_d, one->duration_d, one->class, one->note };
      if (ant_judgement_is_of (&given, mid_d, duration_d)
          && (!nearest || fabs (one->mid_d - mid_d) < fabs (nearest->mid_d - mid_d)))
        nearest = one;
    }
  return nearest;
}

AntDipClass
ant_judgements_class (const AntJudgements *judgements, double mid_d, double duration_d)
{
  const Judgement *judgement = find (judgements, mid_d, duration_d);
  return judgement ? judgement->class : ANT_CLASS_UNDECIDED;
}

const char *
ant_judgements_note (const AntJudgements *judgements, double mid_d, double duration_d)
{
  const Judgement *judgement = find (judgements, mid_d, duration_d);
  return judgement ? judgement->note : "";
}

static Judgement *
find_or_add (AntJudgements *judgements, double mid_d, double duration_d)
{
  Judgement *judgement = find (judgements, mid_d, duration_d);
  if (judgement)
    return judgement;
  judgement = add (judgements, mid_d, duration_d, ANT_CLASS_UNDECIDED, "");
  g_ptr_array_sort (judgements->given, by_time);
  return judgement;
}

/* What says nothing is not kept. */
static void
drop_if_empty (AntJudgements *judgements, Judgement *judgement)
{
  if (judgement->class == ANT_CLASS_UNDECIDED && !*judgement->note)
    g_ptr_array_remove (judgements->given, judgement);
}

void
ant_judgements_set_class (AntJudgements *judgements, double mid_d, double duration_d, AntDipClass class)
{
  Judgement *judgement = find_or_add (judgements, mid_d, duration_d);
  judgement->class = class;
  drop_if_empty (judgements, judgement);
}

void
ant_judgements_set_note (AntJudgements *judgements, double mid_d, double duration_d, const char *note)
{
  Judgement *judgement = find_or_add (judgements, mid_d, duration_d);
  char *copy = g_strdup (note); /* it may be the one that is freed */
  g_free (judgement->note);
  judgement->note = copy;
  drop_if_empty (judgements, judgement);
}
