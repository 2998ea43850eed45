/* dip-mark.c - how a dip looks. */
#include "plot/dip-mark.h"
#include <stdio.h>

void
ant_dip_mark_label (const AntDipMark *mark, size_t size, char *text)
{
  snprintf (text, size, "%s%u", mark->sign ? mark->sign : "", mark->number);
}

AntDipLook
ant_dip_look_of (AntDipClass class)
{
  static const AntDipLook looks[ANT_N_CLASSES] = {
    [ANT_CLASS_UNDECIDED] = ANT_LOOK_UNDECIDED, [ANT_CLASS_PLANET] = ANT_LOOK_PLANET,
    [ANT_CLASS_PLANET_SHAPED] = ANT_LOOK_PLANET_SHAPED, [ANT_CLASS_SPOT] = ANT_LOOK_SPOT,
    [ANT_CLASS_ECLIPSE] = ANT_LOOK_ECLIPSE, [ANT_CLASS_INSTRUMENT] = ANT_LOOK_INSTRUMENT,
    [ANT_CLASS_NOISE] = ANT_LOOK_NOISE,     [ANT_CLASS_FLARE] = ANT_LOOK_UNDECIDED,
  };
  return looks[class];
}
