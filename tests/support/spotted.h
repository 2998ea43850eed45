/* spotted.h - the slow variation of spots and faculae rotating past, added to a study's record. */
#pragma once

#include <stddef.h>

/* Add about 3000 ppm peak to peak of spots and faculae: groups that emerge, cross the disc and decay, limb passages included. */
void ant_study_add_spots (size_t n, double step_d, unsigned long seed, float *value);
