/* predict-print.h - print predicted events, and what a record shows of them, as a table or as JSON. */
#pragma once

#include "data/observer-choice.h"
#include "data/settings.h"
#include "data/sighting.h"

/* GArray of AntSighting; `measured` says whether a record was looked at. */
void ant_predict_print (const GArray *sightings, const AntObserverChoice *choice, const AntSettings *settings, double from_tt_d,
                        double to_tt_d, gboolean measured);
void ant_predict_print_json (const GArray *sightings, gboolean measured);
