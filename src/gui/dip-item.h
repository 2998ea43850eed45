/* dip-item.h - one row of the list of dips: a dip, a brightening, an asked dip or a passage, with the analyst's word on it. */
#pragma once

#include <gio/gio.h>
#include "data/dip-words.h"
#include "data/judgement.h"
#include "plot/dip-mark.h"
#include "search/dip.h"
#include "verdict/verdict.h"

typedef enum
{
  ANT_KIND_DIP = 1 << 0,
  ANT_KIND_BRIGHTENING = 1 << 1,
  ANT_KIND_ASKED = 1 << 2,
  ANT_KIND_PASSAGE = 1 << 3, /* its dip is ant_passage_as_dip's; never shown beside the others */
} AntDipKind;

#define ANT_TYPE_DIP_ITEM (ant_dip_item_get_type ())
G_DECLARE_FINAL_TYPE (AntDipItem, ant_dip_item, ANT, DIP_ITEM, GObject)

/* upper_limit_ppm: of an asked dip, else NaN. number: from 1 within its kind. */
AntDipItem *ant_dip_item_new (AntDipKind kind, guint number, const AntDip *dip, double upper_limit_ppm);
AntDipKind ant_dip_item_get_kind (AntDipItem *self);
guint ant_dip_item_get_number (AntDipItem *self);
const AntDip *ant_dip_item_get_dip (AntDipItem *self);
double ant_dip_item_get_upper_limit_ppm (AntDipItem *self);

/* The program's own verdict, copied; NULL where there is none. */
void ant_dip_item_set_verdict (AntDipItem *self, const AntVerdict *verdict);
const AntVerdict *ant_dip_item_get_verdict (AntDipItem *self);
/* What it is shown as: the analyst's word, else the program's. */
AntDipClass ant_dip_item_get_shown_class (AntDipItem *self);

/* The analyst's word. Property "judgement" (int, read) is notified when either changes. */
AntDipClass ant_dip_item_get_class (AntDipItem *self);
const char *ant_dip_item_get_note (AntDipItem *self);
void ant_dip_item_judge (AntDipItem *self, AntDipClass class, const char *note);

/* What is known of it; caller unrefs. */
GPtrArray *ant_dip_item_facts (AntDipItem *self, const AntRecord *record, AntDepthUnit unit);
/* "Dip 3", "Brightening 1", "Asked dip 2". Caller frees. */
char *ant_dip_item_title (AntDipItem *self);
/* The same as short as a list has it: "3", "+1", "?2". Caller frees. */
char *ant_dip_item_label (AntDipItem *self);
const char *ant_dip_item_sign (AntDipItem *self); /* "", "+", "?" */
AntDipLook ant_dip_item_look (AntDipItem *self);
