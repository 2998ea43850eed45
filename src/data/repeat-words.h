/* repeat-words.h - repeats in words: titles, facts, and periods that are typed. */
#pragma once

#include "data/dip-words.h"
#include "data/repeat-results.h"

/* "1 · every 2.20471 d · SNR 84". Caller frees. */
char *ant_repeat_title (const AntRepeatResults *results, gsize repeat);
/* One sentence: how many, the threshold, what noise and brightenings show, whether the search was stopped. Caller frees. */
char *ant_repeat_summary (const AntRepeatResults *results);
/* What there is to know of one; none for a number beyond the list. Caller unrefs. */
GPtrArray *ant_repeat_facts (const AntRepeatResults *results, gsize repeat);
/* A period as it can be typed again, and back; FALSE for what is no number above 0. Caller frees. */
char *ant_repeat_period_text (double period_d);
gboolean ant_repeat_period_parse (const char *text, double *period_d);
