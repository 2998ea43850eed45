/* dip-mark.h - one dip as the plots show it. */
#pragma once

#include <stddef.h>
#include "data/judgement.h"
#include "plot/theme.h"

typedef struct
{
  double mid_d;      /* middle, days from the record's origin */
  double duration_d; /* contact I to IV */
  double depth_ppm;
  unsigned number;   /* as the list has it */
  AntDipLook look;
} AntDipMark;

#define ANT_NO_DIP ((size_t) -1)

/* Shape and colour of a class. */
AntDipLook ant_dip_look_of (AntDipClass class);
