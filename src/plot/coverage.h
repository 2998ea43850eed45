/* coverage.h - private to plot/: shapes as bytes of coverage, one for each pixel of the device.
 *
 * Where a figure is made of pixels, thousands of boxes and segments cost far less this way than as a path of cairo's.
 * Coordinates are pixels of the device from the context's origin, y downwards. Shapes are united, so that what overlaps
 * is no darker. */
#pragma once

#include <cairo.h>

typedef struct _AntCoverage
{
  int left, top, width, height; /* where the sheet lies */
  int stride;
  unsigned char *byte;
  int seen_left, seen_top, seen_right, seen_foot; /* what was drawn on, of the sheet's own columns and rows */
  cairo_surface_t *surface;
} AntCoverage;

/* Whether the context's target is made of pixels. */
int ant_coverage_suits (cairo_t *cr);
/* A sheet over what is not clipped away. Owned by the caller: ant_coverage_fill ends it. */
AntCoverage *ant_coverage_new (cairo_t *cr, double scale);
/* Lay the present source on the context through the sheet, and free it. */
void ant_coverage_fill (AntCoverage *coverage, cairo_t *cr, double scale);

/* One column of pixels from top to foot; a pixel at an end is covered in part. */
void ant_coverage_column (AntCoverage *coverage, int column, double top, double foot);
/* The pixels between edges of pixels. */
void ant_coverage_box (AntCoverage *coverage, int left, int top, int right, int foot);
/* A segment of a line with round ends; a dot where both ends are one. */
void ant_coverage_segment (AntCoverage *coverage, double x0, double y0, double x1, double y1, double radius);
