/* labels.h - words beside marks and curves that never cover each other: each tries a few places and takes the first
 * that is free. */
#pragma once

#include "plot/pen.h"

#define ANT_MOST_TAKEN 1024

typedef struct
{
  AntBox within;       /* nothing is placed outside */
  size_t n;
  AntBox taken[ANT_MOST_TAKEN];
} AntLabelField;

typedef struct
{
  double x, y, align_x, align_y; /* as ant_pen_text */
} AntAnchor;

void ant_labels_begin (AntLabelField *field, const AntBox *within);
/* Keep a box free of labels. */
void ant_labels_block (AntLabelField *field, const AntBox *box);
/* Keep a curve free: n points, NaN in y where it breaks. */
void ant_labels_block_curve (AntLabelField *field, size_t n, const double *x, const double *y);
/* Find room for something of a size at the first free anchor and keep it; 0 if there is none. */
int ant_labels_reserve (AntLabelField *field, AntTextSize size, size_t n, const AntAnchor *anchor, AntBox *box);
/* Draw text in the present colour at the first free anchor; 0 if there is none and nothing was drawn. */
int ant_labels_place (AntLabelField *field, AntPen *pen, const char *text, AntTextStyle style, size_t n,
                      const AntAnchor *anchor);
