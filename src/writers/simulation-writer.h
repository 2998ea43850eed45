/* simulation-writer.h - a simulated record as text, and the truth about it as a table. */
#pragma once

#include <stdio.h>
#include "data/recipe.h"

/* Comment lines with units, then time_utc,irradiance[,uncertainty],flag: one row per observed sample, flag 0 = good.
 * recipe->scenario.seed is the seed that was used. The stream keeps errors (ferror). */
void ant_simulation_write_record (const AntRecipe *recipe, const AntSimulated *simulated, FILE *stream);

/* One row per crossing, disc passage of a spot group (of 5 ppm or more), flare, step, warm-up and spike that touches
 * the record, by time: kind, name, start, mid and end as UTC and JD(UTC), duration_h, depth_ppm (greatest, before
 * exposure smearing; negative: brighter), mean_depth_ppm (over contacts I to IV), radius_ratio, impact, coverage
 * (observed fraction of start..end). The recipe stands above it as comments. */
void ant_simulation_write_truth (const AntRecipe *recipe, const AntSimulated *simulated, FILE *stream);
