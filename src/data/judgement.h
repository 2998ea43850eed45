/* judgement.h - what the analyst says of dips: a class and a note for each, kept by the dip's place in time so that
 * they outlive a new scan. For one thread. */
#pragma once

#include <glib.h>

typedef enum
{
  ANT_CLASS_UNDECIDED,
  ANT_CLASS_PLANET,        /* a planet's crossing, the body known */
  ANT_CLASS_PLANET_SHAPED, /* shaped like one, no body known */
  ANT_CLASS_SPOT,
  ANT_CLASS_ECLIPSE,
  ANT_CLASS_INSTRUMENT,
  ANT_CLASS_NOISE,
  ANT_CLASS_FLARE,         /* of the Sun: brightenings only */
  ANT_N_CLASSES,
} AntDipClass;

/* "planet-shaped": as tables and actions have it. Static. */
const char *ant_dip_class_name (AntDipClass class);
/* The same for people, translated. */
const char *ant_dip_class_title (AntDipClass class);
/* FALSE if there is no such name. */
gboolean ant_dip_class_parse (const char *name, AntDipClass *class);

typedef struct _AntJudgements AntJudgements;
AntJudgements *ant_judgements_new (void);
void ant_judgements_free (AntJudgements *judgements);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntJudgements, ant_judgements_free)
AntJudgements *ant_judgements_copy (const AntJudgements *judgements);
gsize ant_judgements_count (const AntJudgements *judgements);

typedef struct
{
  double mid_d, duration_d;
  AntDipClass class;
  const char *note;
} AntJudgement;
/* The i-th of them by time; the note is borrowed until the next change. */
AntJudgement ant_judgements_get (const AntJudgements *judgements, gsize i);
/* Add one as it is, beside those that are there (which a set would change if they are near); the note is copied. */
void ant_judgements_add (AntJudgements *judgements, const AntJudgement *judgement);
/* Whether it is of the dip at this middle with this length. */
gboolean ant_judgement_is_of (const AntJudgement *judgement, double mid_d, double duration_d);
/* Every time moves by shift_d: the record's origin has moved the other way. */
void ant_judgements_shift (AntJudgements *judgements, double shift_d);

/* Of the dip at this middle with this length, contact I to IV; two whose middles are nearer than half the longer length
 * are one. Undecided and "" where nothing was said. The note is borrowed until the next change. */
AntDipClass ant_judgements_class (const AntJudgements *judgements, double mid_d, double duration_d);
const char *ant_judgements_note (const AntJudgements *judgements, double mid_d, double duration_d);
void ant_judgements_set_class (AntJudgements *judgements, double mid_d, double duration_d, AntDipClass class);
void ant_judgements_set_note (AntJudgements *judgements, double mid_d, double duration_d, const char *note);
