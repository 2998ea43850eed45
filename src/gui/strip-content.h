/* strip-content.h - what each kind of strip of the time stack shows of the desk: the one place to add another. */
#pragma once

#include "gui/desk.h"
#include "plot/strip.h"

/* From top to bottom. */
typedef enum
{
  ANT_STRIP_IRRADIANCE, /* with its rotation curve; passages bracketed, when they are shown */
  ANT_STRIP_RESIDUAL,   /* what that leaves, dips bracketed */
  ANT_STRIP_SNR,        /* dip SNR of one duration, with the threshold; on demand */
  ANT_STRIP_WITNESS,    /* the first other instrument, or the record over or less it; one for each that is open */
  ANT_STRIP_COLUMN = ANT_STRIP_WITNESS + ANT_MOST_WITNESSES, /* the first further column of the record; one for each that is shown */
  ANT_N_STRIPS = ANT_STRIP_COLUMN + ANT_MOST_SHOWN_COLUMNS,
} AntStripKind;

gboolean ant_strip_wanted (AntDesk *desk, AntStripKind kind);
/* "Residual, ppm". Caller frees. */
char *ant_strip_title (AntDesk *desk, AntStripKind kind);
/* All but title, axis and, where there is nothing to show yet, the pyramid. Borrowed from the desk until its next
 * change; caption: text[size] to write it into. The desk has a record. */
void ant_strip_fill (AntDesk *desk, AntStripKind kind, AntStrip *strip, gsize size, char *text);
/* The time in view, and the range of values that suits it. strip->pyramid is set. */
AntView ant_strip_range (AntDesk *desk, AntStripKind kind, const AntStrip *strip);
/* What is to be seen, in words. Caller frees. */
char *ant_strip_describe (AntDesk *desk, AntStripKind kind);
