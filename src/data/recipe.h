/* recipe.h - the description of a simulated record as a key file, and the way from it to a scenario.
 * Groups and keys are those of recipe-keys.h; anything else in the file is refused. */
#pragma once

#include <glib.h>
#include "data/record.h"
#include "data/recipe-keys.h"
#include "trials/simulate.h"

/* One group of the file. */
typedef struct
{
  AntRecipeGroupIndex group;
  char *name;                        /* "" for groups that come once */
  double value[ANT_MAX_RECIPE_KEYS]; /* by the key's place; the fallback where the file says nothing */
} AntRecipeItem;

typedef struct
{
  char *path;
  char *title;           /* what the record calls itself, "" if nothing */
  GPtrArray *items;      /* of AntRecipeItem, as in the file */
  AntTimeReference time; /* UTC; its origin is the start of the first exposure */
  AntStampPlace stamp;
  double uncertainty_ppm;
  int decimals;
  AntScenario scenario;  /* its arrays are the recipe's */
  GArray *gaps, *groups, *planets, *steps, *flares, *swings, *spikes;
  /* Names of the planets, spot groups, ... in the scenario's order; of char*, borrowed from the items. */
  GPtrArray *group_names, *planet_names, *step_names, *flare_names, *swing_names, *spike_names;
} AntRecipe;

/* NULL with one sentence that names file, group and key, what was found and what was expected (ANT_ERROR_READ). */
AntRecipe *ant_recipe_load (const char *path, GError **error);
/* The same from memory; `path` is used for messages only. */
AntRecipe *ant_recipe_parse (const char *path, const char *text, gsize length, GError **error);
void ant_recipe_free (AntRecipe *recipe);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntRecipe, ant_recipe_free)

/* Draw with another seed: a whole number as text. FALSE with one sentence (ANT_ERROR_USAGE). */
gboolean ant_recipe_set_seed (AntRecipe *recipe, const char *text, GError **error);
/* The recipe as a key file with every key that has a value, defaults too. Caller frees. */
char *ant_recipe_to_text (const AntRecipe *recipe);

/* Fill the scenario from the items (recipe-scenario.c); part of reading. */
gboolean ant_recipe_make_scenario (AntRecipe *recipe, GError **error);
