/* masks.h - the two ways of looking at the Sun that the studies use: from L1 nearly without a break, and from a low orbit. */
#pragma once

#include "core/random.h"
#include "noise/series.h"

typedef enum { ANT_MASK_L1, ANT_MASK_LOW_ORBIT } AntMask;

/* seen [n] out, 1 = observed.  L1: a few gaps of 5-180 min per 30 d and 0.3 % single drops. Low orbit: 35 of 96 min lost,
 * 1-3 h lost each day, and a gap of 1-4 d each 30 d. */
void ant_mask_make (AntMask mask, size_t n, double step_d, AntRandom *random, unsigned char *seen);
