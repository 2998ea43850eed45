/* settings.h - every number a user may set, in one struct and one table.
 * The table (key, unit, default, range, help) feeds the command's --set, `settings`, the manual, the window and the
 * tests. The numeric rooms' own option structs are members; the table fills them by offset. */
#pragma once

#include <glib.h>
#include "data/record.h"
#include "search/template-bank.h"
#include "verdict/priors.h"

/* What shines. */
typedef enum
{
  ANT_TARGET_SUN,  /* a planet needs a predicted crossing */
  ANT_TARGET_STAR,
} AntTarget;

typedef struct
{
  AntGridOptions grid; /* number fields only are in the table; take it by ant_settings_grid */
  AntBankOptions bank;
  double stamp;            /* an AntStampPlace */
  double threshold_snr;    /* 0 = from false_alarms_per_year */
  double false_alarms_per_year;
  double surrogates;       /* 0 = the calibrated chance law */
  double chunk_d;          /* 0 = 90 below a 10-min cadence, else 180 */
  double chunk_overlap_d;
  double line_period_h;    /* 0 = no line */
  double line_harmonics;
  double radii;            /* an AntRadiiSet */
  double target;           /* an AntTarget */
  AntCauseRates rates;     /* events of each cause a year */
  double repeats;          /* 1: look for dips that recur */
  double repeat_period_min_d, repeat_period_max_d; /* 0: as long as the record allows */
  double repeat_durations; /* 0: as a crossing takes at each period; 1: duration-min to duration-max at every period */
  double repeat_shortest, repeat_longest; /* in crossing times */
  double repeat_events;
  double repeat_noise;     /* 0: as fitted; 1: white */
  double repeat_false_alarms;
  double rotation_window_d;
  double rotation_harmonics;
  double witness_drift_d;  /* 0 = none */
  double seed;
  double threads;          /* 0 = as many as processors */
  double paper;            /* of the report: 0 A4, 1 letter */
} AntSettings;

typedef enum
{
  ANT_SETTING_REAL,
  ANT_SETTING_WHOLE, /* whole numbers only */
  ANT_SETTING_WORD,  /* one of `words`, kept as its index */
} AntSettingKind;

typedef struct
{
  const char *key;  /* "duration-max" */
  const char *unit; /* "h", "ppm", "" */
  AntSettingKind kind;
  double fallback, minimum, maximum; /* in `unit` */
  double divisor;   /* the double at `offset` is the setting divided by this: 86400 for seconds kept as days */
  gsize offset;     /* of a double in AntSettings */
  const char *const *words; /* ANT_SETTING_WORD: NULL-ended */
  const char *group; /* heading in the window and the manual, N_() marked; rows of a group stand together */
  const char *help;  /* one sentence, N_() marked */
} AntSetting;

extern const AntSetting ant_setting_table[];
extern const gsize ant_n_settings;

void ant_settings_init (AntSettings *settings); /* every default */
/* The grid options with the word settings filled in. */
AntGridOptions ant_settings_grid (const AntSettings *settings);

/* Whether results depend on it: FALSE for how fast, and on what paper. */
gboolean ant_setting_matters (const AntSetting *setting);
const AntSetting *ant_setting_find (const char *key); /* NULL if there is none */
/* Of this key, or NULL with one sentence that offers the nearest key. */
const AntSetting *ant_setting_require (const char *key, GError **error);
double ant_setting_get (const AntSetting *setting, const AntSettings *settings); /* in the setting's unit */
/* A value as a person would type it: shortest form that reads back to 12 digits, or its word. Caller frees. */
char *ant_setting_format (const AntSetting *setting, double value);
/* "0.1 to 96 h" or "unknown, start, middle, end". Caller frees. */
char *ant_setting_range (const AntSetting *setting);

/* All below: FALSE with one sentence (key, value, range) and settings untouched; domain ANT_ERROR, ANT_ERROR_USAGE. */
gboolean ant_setting_set_text (const AntSetting *setting, AntSettings *settings, const char *text, GError **error);
/* "key=value" as of --set. */
gboolean ant_settings_assign (AntSettings *settings, const char *assignment, GError **error);
/* A key file with a group [settings]: all of it or nothing. ANT_ERROR_READ, and the sentence names the file. */
gboolean ant_settings_load (AntSettings *settings, const char *path, GError **error);
/* Every setting as such a key file, help as comments. Caller frees. */
char *ant_settings_to_key_file (const AntSettings *settings);
