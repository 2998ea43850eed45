/* sky-words.h - predicted events in words: the same for command, window and report. */
#pragma once

#include <glib.h>
#include "data/dip-words.h"
#include "data/observer-choice.h"
#include "data/sighting.h"

/* "Venus before the Sun". Static, translated. */
const char *ant_sky_event_title (const AntSkyEvent *event);
/* An instant of TT as UTC "2004-06-08T05:13:29.7Z" with tenths of a second, or to the hour ("2004-06-08T05:00:00.0Z") if `hour`;
 * NULL for NaN. Caller frees. */
char *ant_sky_time_iso (double tt_d, gboolean hour);
/* The same for people: "2004-06-08 05:13:29.7", "2004-06-08 05 h"; "-" for NaN. Caller frees. */
char *ant_sky_time_text (double tt_d, gboolean hour);
/* The time of day alone, with "+1" or "-1" where the day is not that of `day_tt_d`. Caller frees. */
char *ant_sky_clock_text (double tt_d, double day_tt_d, gboolean hour);
/* "agrees", "gap" ...: untranslated, for files. Static. */
const char *ant_shown_name (AntShown shown);
/* What the record shows of an event, one sentence without a full stop. Caller frees. */
char *ant_sighting_words (const AntSighting *sighting);
/* What is predicted of an event, as AntFact. Caller unrefs. */
GPtrArray *ant_sighting_facts (const AntSighting *sighting);
/* Never look at the Sun ...: translated, static. */
const char *ant_sky_caution (void);
/* Days of TT from J2000.0 that a person typed: ISO 8601 (UTC unless it says otherwise) or a JD. FALSE with one sentence. */
gboolean ant_sky_time_parse (const char *text, double *tt_d, GError **error);
/* FALSE with one sentence if the span is not within what the theories and the observer's positions cover. */
gboolean ant_sky_span_check (const AntObserverChoice *choice, double from_tt_d, double to_tt_d, GError **error);
