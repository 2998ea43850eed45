/* treatment.h - all that decides, with the bytes of a record, what a scan of it gives: how it is read, the settings, the
 * limits and the spans left out. For one thread; a copy may go to another. */
#pragma once

#include <glib.h>
#include "core/span.h"
#include "data/reading-choices.h"
#include "data/settings.h"
#include "data/witness.h"

typedef enum
{
  ANT_MASK_HAND,     /* masked by the analyst, in the window: flag `hand` */
  ANT_MASK_EXCLUDED, /* from a list of spans (--exclude): flag `excluded` */
  ANT_N_MASK_KINDS
} AntMaskKind;

typedef struct
{
  AntSpan span;
  AntMaskKind kind;
  char *reason; /* in the analyst's words; may be "" */
} AntMask;

typedef struct
{
  AntReadingChoices reading;
  char *good;          /* qualities that are good, as of --good; NULL: only 0 */
  char *observer;      /* who took the record, as of --observer; NULL: nobody said */
  AntSettings settings;
  double from_d, to_d; /* limits, elapsed days; NaN: none */
  GPtrArray *masks;    /* of AntMask, by start */
  GPtrArray *witnesses; /* of AntWitness, at most ANT_MOST_WITNESSES: evidence for the verdicts */
} AntTreatment;

AntTreatment *ant_treatment_new (void); /* every default */
AntTreatment *ant_treatment_copy (const AntTreatment *treatment);
void ant_treatment_free (AntTreatment *treatment); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntTreatment, ant_treatment_free)

/* A span is left out; empty ones (end before start) are not added. The reason is copied. */
void ant_treatment_mask (AntTreatment *treatment, AntSpan span, AntMaskKind kind, const char *reason);
/* Nothing inside the span is masked any more: masks are cut where they reach out of it. FALSE if none was inside. */
gboolean ant_treatment_unmask (AntTreatment *treatment, AntSpan span);
/* The place of its file among the witnesses, -1 if it is none of them. */
int ant_treatment_find_witness (const AntTreatment *treatment, const AntWitness *witness);
/* Every time moves by shift_d: the record's origin has moved the other way. */
void ant_treatment_shift (AntTreatment *treatment, double shift_d);

/* Whether both give the same results of the same bytes (the number of threads does not matter). */
gboolean ant_treatment_same (const AntTreatment *one, const AntTreatment *other);
/* Whether both lay the same grid: a record need not be read again. */
gboolean ant_treatment_same_grid (const AntTreatment *one, const AntTreatment *other);

/* The grid's options but for the observer, who is to be looked up by name; clear them. FALSE with one sentence if `good` makes no sense, and nothing to clear. */
gboolean ant_treatment_grid (const AntTreatment *treatment, AntGridOptions *grid, GError **error);
void ant_grid_options_clear (AntGridOptions *grid);
/* "0,2": the good ones; "0x10042": bits that must be clear. FALSE with one sentence that begins with `name`. */
gboolean ant_grid_options_parse_good (AntGridOptions *grid, const char *name, const char *text, GError **error);
