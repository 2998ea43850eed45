/* rival-start.h - where on its parameters each rival shape is tried first, given the dip that the search found. */
#pragma once

#include "search/dip.h"
#include "verdict/rival-curve.h"

#define ANT_RIVAL_STARTS 96

/* parameter [ANT_RIVAL_STARTS] out; returns how many. */
size_t ant_rival_starts (AntRivalKind kind, const AntDip *dip, AntLimbDarkening ld,
                         double parameter[][ANT_RIVAL_PARAMETERS]);
