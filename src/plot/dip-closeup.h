/* dip-closeup.h - one dip from near: its samples or their averages, the shapes that were tried on it, what each of them leaves
 * over, and what a witness shows at the time. */
#pragma once

#include "plot/pen.h"

typedef struct
{
  const char *name;     /* translated; NULL: not named */
  size_t n;
  const double *hours;  /* [n] from the middle, ascending */
  const double *ppm;    /* [n] */
} AntShapeLine;

/* Another record's values at the same time, about their own level beside the dip; the fitted shape is drawn over them. */
struct AntDipCloseupWitness
{
  size_t n;
  const double *hours, *ppm, *error_ppm; /* [n] as below */
};

typedef struct
{
  size_t n;
  const double *hours;     /* [n] from the middle of the dip, ascending */
  const double *ppm;       /* [n] NaN: not observed */
  const double *error_ppm; /* [n] 1 sigma, or NULL; 0 or NaN: none drawn */
  size_t n_shapes;
  const AntShapeLine *shape; /* the first is the fitted one, drawn strongest; what each leaves over is drawn below, where there is room */
  double contact_h[2];     /* contacts I and IV, hours; NaN: not marked */
  const char *title;       /* of the values; NULL: "Residual, ppm" */
  const struct AntDipCloseupWitness *witness; /* the same time in another record; NULL: none */
} AntDipCloseup;

/* x: hours from the middle, y: ppm; linear. Holds points and shapes. */
void ant_dip_closeup_view (const AntDipCloseup *closeup, AntView *view);
void ant_dip_closeup_paint (cairo_t *cr, const AntBox *box, const AntDipCloseup *closeup, const AntView *view,
                            const AntTheme *theme, double scale);

/* The points of a close-up from a residual series (place 0 at start_d): those within half_width_d of mid_d, averaged
 * into the fewest equal bins that leave at most `most` points (1 to n samples each). hours, ppm, error [most] out;
 * error is the standard error of a bin, `sigma_ppm` (NaN: none known) for single samples. Returns how many; 0 if none
 * was observed. */
size_t ant_dip_closeup_points (size_t n, const float *value_ppm, double start_d, double step_d, double mid_d,
                               double half_width_d, double sigma_ppm, size_t most, double *hours, double *ppm,
                               double *error_ppm);
