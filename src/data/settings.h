/* settings.h - every number a user may set, in one struct and one table.
 * The table (key, unit, default, range, help) feeds the command's --set, `settings`, the manual, the window and the tests. The numeric rooms'
 * own option structs are members; the table fills them by offset. */
#pragma once

#include <glib.h>
#include "data/record.h"
#include "search/template-bank.h"

typedef struct
{
  AntGridOptions grid;     /* number fields only are in the table */
  AntBankOptions bank;
  double threshold_snr;           /* 0 = from false_alarms_per_year */
  double false_alarms_per_year;
  double chunk_days;              /* 0 = 90 below a 10-min cadence, else 180 */
  double chunk_overlap_days;
  double rotation_window_d;
  double rotation_harmonics;
  double line_period_h, line_harmonics; /* 0 = no line */
  double seed;
} AntSettings;

typedef struct
{
  const char *key;   /* "duration-max" */
  const char *unit;  /* "h", "ppm", "" */
  double fallback, minimum, maximum;
  gsize offset;      /* of a double in AntSettings */
  const char *group; /* heading in the window and the manual, N_() marked */
  const char *help;  /* one sentence, N_() marked */
} AntSetting;

extern const AntSetting ant_setting_table[];
extern const gsize ant_n_settings;

void ant_settings_init (AntSettings *settings); /* every default */
const AntSetting *ant_setting_find (const char *key);
double ant_setting_get (const AntSetting *setting, const AntSettings *settings);
/* FALSE with one sentence (key, value, range) if the value is not a number in range. */
gboolean ant_setting_set_text (const AntSetting *setting, AntSettings *settings, const char *text, GError **error);
/* "key=value" as of --set. */
gboolean ant_settings_assign (AntSettings *settings, const char *assignment, GError **error);
/* A key file with a group [settings]. */
gboolean ant_settings_load (AntSettings *settings, const char *path, GError **error);
