/* template-bank.c - the families of crossing shapes that the search looks for. */
#include "search/template-bank.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/units.h"

#define LONGEST_EDGE 0.4 /* of T14: a crossing shorter than its edges allow is a round dip, not a spike */

typedef struct
{
  const AntBankOptions *options;
  double step_d, exposure_d, edge_d;
  int phases;
  size_t n_durations;
  double first_h; /* shortest duration */
} Plan;

static Plan
plan_family (const AntBankOptions *options, double step_d, double edge_h)
{
  Plan plan = { .options = options, .step_d = step_d };
  plan.exposure_d = options->exposure_d > 0 ? options->exposure_d : step_d;
  plan.edge_d = fmax (edge_h / ANT_HOURS_PER_DAY, step_d);
  plan.phases = step_d >= plan.edge_d ? 4 : step_d > 0.5 * plan.edge_d ? 2 : 1;
  double shortest_h = fmax (options->duration_min_h, step_d * ANT_HOURS_PER_DAY); /* shorter ones look all the same */
  plan.first_h = options->duration_min_h;
  while (plan.first_h < shortest_h && plan.first_h + options->duration_step_h <= options->duration_max_h + 1e-9)
    plan.first_h += options->duration_step_h;
  plan.n_durations = (size_t) floor ((options->duration_max_h - plan.first_h) / options->duration_step_h + 1e-9) + 1;
  return plan;
}

static double
member_edge_d (const Plan *plan, double duration_d)
{
  return fmin (plan->edge_d, LONGEST_EDGE * duration_d);
}

static AntStatus
reserve (AntFamily *family, const Plan *plan)
{
  size_t used = plan->n_durations * (size_t) plan->phases, blocks = (used + ANT_LANES - 1) / ANT_LANES;
  family->n_members = blocks * ANT_LANES;
  family->member = calloc (family->n_members, sizeof *family->member);
  family->shape = calloc (blocks, sizeof *family->shape);
  family->block_length = calloc (blocks, sizeof *family->block_length);
  return family->member && family->shape && family->block_length ? ANT_OK : ANT_NO_MEMORY;
}

/* Where the members of a family stand, before any shape is drawn. */
static void
lay_members (AntFamily *family, const Plan *plan)
{
  for (size_t m = 0; m < plan->n_durations * (size_t) plan->phases; m++)
    {
      AntMember *member = &family->member[m];
      size_t phase = m % (size_t) plan->phases;
      member->duration_d = (plan->first_h + plan->options->duration_step_h * (double) (m / (size_t) plan->phases))
                           / ANT_HOURS_PER_DAY;
      member->edge_d = member_edge_d (plan, member->duration_d);
      double reach = 0.5 * (member->duration_d + plan->exposure_d) / plan->step_d;
      member->centre = ceil (reach) + (double) phase / plan->phases;
      member->length = (size_t) floor (member->centre + reach) + 1;
      size_t *block = &family->block_length[m / ANT_LANES];
      *block = member->length > *block ? member->length : *block;
    }
}

static AntStatus
draw_members (AntFamily *family, const Plan *plan)
{
  for (size_t b = 0; b < family->n_members / ANT_LANES; b++)
    {
      family->shape[b] = calloc (family->block_length[b] * ANT_LANES, sizeof (double));
      if (!family->shape[b])
        return ANT_NO_MEMORY;
    }
  for (size_t m = 0; m < family->n_members && family->member[m].length; m++)
    {
      const AntMember *member = &family->member[m];
      AntCrossingShape shape;
      ant_crossing_shape_init (&shape, member->duration_d, member->edge_d, ANT_SHAPE_IMPACT, plan->options->limb_darkening);
      for (size_t j = 0; j < member->length; j++)
        family->shape[m / ANT_LANES][j * ANT_LANES + m % ANT_LANES]
          = -ant_crossing_shape_mean (&shape, ((double) j - member->centre) * plan->step_d, plan->exposure_d);
    }
  return ANT_OK;
}

static AntStatus
make_family (AntFamily *family, const Plan *plan)
{
  AntStatus status = reserve (family, plan);
  if (status)
    return status;
  double stride = 0.5 * plan->edge_d / plan->step_d + 1e-6; /* 10 places must not be 9.999999 */
  family->stride = stride > 1 ? (size_t) stride : 1;
  family->edge_d = plan->edge_d;
  lay_members (family, plan);
  return draw_members (family, plan);
}

AntTemplateBank *
ant_template_bank_new (const AntBankOptions *options, double step_d, AntStatus *status)
{
  AntTemplateBank *bank = calloc (1, sizeof *bank);
  *status = bank ? ANT_OK : ANT_NO_MEMORY;
  if (!bank)
    return NULL;
  if (!(step_d > 0 && options->duration_min_h > 0 && options->duration_step_h > 0
        && options->duration_max_h >= options->duration_min_h && options->edge_h > 0))
    *status = ANT_BAD_ARGUMENT;
  bank->step_d = step_d;
  double edges_h[2] = { options->edge_h, options->sharp_edge_h };
  for (int f = 0; f < 2 && !*status; f++)
    {
      if (f == 1 && !(edges_h[1] > 0 && step_d * ANT_HOURS_PER_DAY < 0.5 * edges_h[1] && edges_h[1] < edges_h[0]))
        continue;
      Plan plan = plan_family (options, step_d, edges_h[f]);
      *status = make_family (&bank->family[bank->n_families++], &plan);
    }
  if (*status)
    {
      ant_template_bank_free (bank);
      return NULL;
    }
  return bank;
}

void
ant_template_bank_free (AntTemplateBank *bank)
{
  if (!bank)
    return;
  for (size_t f = 0; f < bank->n_families; f++)
    {
      AntFamily *family = &bank->family[f];
      for (size_t b = 0; family->shape && b < family->n_members / ANT_LANES; b++)
        free (family->shape[b]);
      free (family->shape);
      free (family->block_length);
      free (family->member);
    }
  free (bank);
}
