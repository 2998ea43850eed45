/* masks.h - spans that are left out, hatched over whatever lies there. */
#pragma once

#include "core/span.h"
#include "plot/pen.h"

/* Within the area; view: x in the spans' days. */
void ant_masks_paint (AntPen *pen, const AntBox *area, const AntView *view, size_t n, const AntSpan *mask);
