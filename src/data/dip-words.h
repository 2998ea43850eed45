/* dip-words.h - a dip's numbers as people read and copy them: with their units, as exact as they deserve. */
#pragma once

#include <glib.h>
#include "data/record.h"
#include "search/dip.h"

typedef enum
{
  ANT_DEPTH_PPM,
  ANT_DEPTH_W_M2, /* the record's own unit, where it is an irradiance */
} AntDepthUnit;

/* A label and a value, both translated; used wherever facts are listed. */
typedef struct
{
  char *label, *value;
} AntFact;
void ant_fact_free (gpointer fact); /* a GDestroyNotify */
/* Both are copied. */
void ant_facts_add (GPtrArray *facts, const char *label, const char *value);
void ant_facts_add_format (GPtrArray *facts, const char *label, const char *format, ...) G_GNUC_PRINTF (3, 4);

/* All texts are the caller's to free. */
char *ant_number_words (double value, int decimals);           /* a true minus sign */
char *ant_length_words (double length_d);                      /* "6.30 h", "41.6 d", "60 s" */
char *ant_instant_words (const AntRecord *record,
                         double time_d); /* "2041-03-14 07:12" in UTC if known, else its own number */
/* The same for a list: "Mar 14 07:12", the year left out where the whole record lies in it. */
char *ant_instant_short (const AntRecord *record, double time_d);
char *ant_depth_words (const AntRecord *record, const AntDip *dip, AntDepthUnit unit); /* "1021 ± 13 ppm" */
char *ant_depth_figures (const AntRecord *record, const AntDip *dip, AntDepthUnit unit); /* without the unit */
const char *ant_depth_unit_name (const AntRecord *record, AntDepthUnit unit);           /* "ppm", "W/m²"; borrowed */
char *ant_span_words (const AntRecord *record, const AntDip *dip); /* "2041-03-14 04:03 to 10:21 UTC" */
char *ant_chance_words (double expected_false);                /* "0.02", "1e-7", "" if not known */
/* The planet whose crossing is that deep: "20600 km, 3.22 Earth radii". */
char *ant_radius_words (const AntDip *dip);

/* Everything about a dip, as AntFact. upper_limit_ppm NaN: the dip was found, not asked for. Caller unrefs. */
GPtrArray *ant_dip_facts (const AntRecord *record, const AntDip *dip, double upper_limit_ppm, AntDepthUnit unit);
/* Likewise about a passage (ant_passage_as_dip). */
char *ant_passage_width_words (const AntDip *passage); /* "5.4 d" */
GPtrArray *ant_passage_facts (const AntRecord *record, const AntDip *passage, AntDepthUnit unit);
/* Facts as lines "label<tab>value", for the clipboard. */
char *ant_facts_text (const GPtrArray *facts);
