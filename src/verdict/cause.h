/* cause.h - what can be behind an event. */
#pragma once

typedef enum
{
  ANT_CAUSE_PLANET,        /* a crossing whose body is known (target Sun), or any crossing (target star) */
  ANT_CAUSE_PLANET_SHAPED, /* shaped like one, no body known: target Sun only */
  ANT_CAUSE_SPOT,
  ANT_CAUSE_ECLIPSE,
  ANT_CAUSE_FLARE,         /* brightenings only */
  ANT_CAUSE_INSTRUMENT,
  ANT_CAUSE_NOISE,
  ANT_N_CAUSES,
} AntCause;
