/* verdict-words.h - a verdict as people read it: its class, what speaks for it in sentences, and the same in short for
 * tables. */
#pragma once

#include <glib.h>
#include "data/judgement.h"
#include "search/dip.h"
#include "verdict/verdict.h"

/* The class that the likeliest cause gives, undecided where ant_verdict_named names none; likewise of the shape alone. */
AntDipClass ant_verdict_class (const AntVerdict *verdict);
AntDipClass ant_verdict_shape_class (const AntVerdict *verdict);
AntDipClass ant_cause_class (AntCause cause);
/* Of the likeliest cause, and of the likeliest cause of the shape alone. */
double ant_verdict_probability (const AntVerdict *verdict);
double ant_verdict_shape_probability (const AntVerdict *verdict);
/* "97 %", "> 99.9 %", "< 0.1 %". Caller frees. */
char *ant_probability_words (double probability);
/* What a list shows: the analyst's word as it is, the program's with its probability, "planet-shaped 97 %". Caller frees. */
char *ant_class_words (AntDipClass analyst, const AntVerdict *verdict);
/* The program's verdict and the shape's as AntFact (data/dip-words.h), added to facts. */
void ant_verdict_facts (const AntVerdict *verdict, GPtrArray *facts);
/* "crossing", translated. Static. */
const char *ant_rival_title (AntRivalKind kind);

/* One piece of evidence: a sentence and the ln odds that it gives to the class over the likeliest other. */
typedef struct
{
  char *text;
  double weight;
} AntEvidenceLine;

/* "+12.3", "0": for a column of weights. Caller frees. */
char *ant_weight_words (double weight);
/* Of AntEvidenceLine, heaviest first: the shapes, then everything else. Caller unrefs. */
GPtrArray *ant_verdict_lines (const AntVerdict *verdict);
/* For tables, never translated: "shape crossing 0.981 trapezoid 0.012; chance 2.1e-12 (-24.1); gap none (-0.4)".
 * Numbers in brackets are ln odds. Caller frees. */
char *ant_verdict_table_text (const AntVerdict *verdict);
/* The rivals that were fitted, likeliest first: [ANT_N_RIVALS] out; returns how many. */
gsize ant_verdict_ranking (const AntVerdict *verdict, AntRivalKind ranking[ANT_N_RIVALS]);
