/* fact-list.h - facts as a quiet table: what it is at the left, what it comes to at the right. */
#pragma once

#include <gtk/gtk.h>

#define ANT_TYPE_FACT_LIST (ant_fact_list_get_type ())
G_DECLARE_FINAL_TYPE (AntFactList, ant_fact_list, ANT, FACT_LIST, GtkWidget)

/* facts: of AntFact (data/dip-words.h), copied; NULL empties the list. */
void ant_fact_list_set_facts (AntFactList *self, const GPtrArray *facts);
