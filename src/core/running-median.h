/* running-median.h - a median that slides along a gridded record and skips gaps (NaN).
 * Two heaps with positions (as Hardle & Steiger 1995, Appl. Stat. 44, 258): O(n log width). */
#pragma once

#include <stddef.h>
#include "core/status.h"

/* median[i] = median of the finite value[j], |i-j| <= half_width (fewer at the ends); NaN if the window is all gap.
 * Even counts give the mean of the middle two, rounded to float. value and median [n], not the same array.
 * Allocates 12 bytes per sample of the window. ANT_NO_MEMORY, or ANT_BAD_ARGUMENT for a window of 2^31 samples. */
AntStatus ant_running_median (size_t n, const float *value, size_t half_width, float *median);
