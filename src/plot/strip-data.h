/* strip-data.h - private to plot/: samples, averages and curve of a series within an area. */
#pragma once

#include "plot/averages.h"
#include "plot/pen.h"

typedef struct
{
  const AntPyramid *pyramid;
  double start_d, step_d;
  const AntAverages *averages; /* or NULL */
  const float *curve;          /* or NULL */
  AntExtent *column;           /* while it is open: extents by column of pixels; NULL where samples are drawn one by one */
} AntStripData;

/* Ask the pyramid once for all that follows; everything is drawn in between, the gaps first. */
void ant_strip_data_open (AntStripData *data, AntPen *pen, const AntBox *area, const AntView *view);
void ant_strip_data_close (AntStripData *data);

/* Gaps as boxes in the present colour. */
void ant_strip_data_gaps (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view);
/* Extents or samples, in `colour` or, where it is NULL, the colours that suit them. */
void ant_strip_data_samples (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view,
                             const AntColour *colour);
/* Averages with their error; returns the places in a bin, 0 if none were drawn. */
size_t ant_strip_data_averages (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view);
void ant_strip_data_curve (AntPen *pen, const AntBox *area, const AntStripData *data, const AntView *view);
