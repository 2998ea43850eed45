/* treatment-text.h - a treatment and judgements as parts of an analysis file. Inside the data room only. */
#pragma once

#include <json-glib/json-glib.h>
#include "data/judgement.h"
#include "data/treatment.h"

/* path: of the file it is for; witnesses are named from its folder. What is made is the caller's. Reading gives NULL with one sentence that names what was found and expected. */
JsonObject *ant_treatment_to_json (const AntTreatment *treatment, const char *path);
AntTreatment *ant_treatment_from_json (JsonObject *object, const char *path, GError **error);
/* Whether a key of its "settings" is one that this program knows. */
gboolean ant_treatment_knows_setting (const char *key);

JsonArray *ant_judgements_to_json (const AntJudgements *judgements);
/* `parent`.judgements */
AntJudgements *ant_judgements_from_json (JsonObject *parent, GError **error);
