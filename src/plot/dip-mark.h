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
  const char *sign;  /* before the number: "+" of a brightening, "?" of an asked dip; static, or NULL for none */
} AntDipMark;

#define ANT_NO_DIP ((size_t) -1)

/* Sign and number into text [size]. */
void ant_dip_mark_label (const AntDipMark *mark, size_t size, char *text);
/* Shape and colour of a class. */
AntDipLook ant_dip_look_of (AntDipClass class);
