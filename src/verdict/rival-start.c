/* rival-start.c - lattices of starting points: every rival about the dip's contacts, on its own time scales. */
#include "verdict/rival-start.h"

#include <math.h>
#include "core/units.h"

/* Epochs in durations from the dip's middle, then factors of its duration (or plain numbers) for the other parameters. */
typedef struct
{
  size_t n[3];
  double at[3][12];
} Lattice;

static const Lattice lattice[ANT_N_RIVALS] = {
  [ANT_RIVAL_CROSSING] = { { 3, 7, 4 }, { { -0.6, 0, 0.6 }, { 0.7, 0.85, 1, 1.2, 1.5, 2.2, 4 }, { 0.1, 0.5, 0.75, 0.9 } } },
  [ANT_RIVAL_TRAPEZOID] = { { 1, 5, 4 }, { { 0 }, { 0.7, 0.85, 1, 1.2, 1.5 }, { 0.02, 0.1, 0.25, 0.45 } } },
  [ANT_RIVAL_STEP] = { { 12, 1, 1 }, { { -1.2, -0.8, -0.6, -0.5, -0.4, -0.2, 0.2, 0.4, 0.5, 0.6, 0.8, 1.2 }, { 1 }, { 1 } } },
  [ANT_RIVAL_RECOVERY] = { { 8, 6, 1 }, { { -1, -0.7, -0.6, -0.55, -0.5, -0.45, -0.4, -0.2 }, { 0.1, 0.3, 0.7, 1.5, 4, 12 }, { 1 } } },
  [ANT_RIVAL_THERMAL] = { { 6, 4, 4 }, { { -1.2, -0.9, -0.7, -0.55, -0.5, -0.4 }, { 0.03, 0.12, 0.4, 1 }, { 0.2, 0.6, 1.5, 5 } } },
  [ANT_RIVAL_SPIKE] = { { 12, 3, 1 }, { { -0.6, -0.5, -0.4, -0.3, -0.2, -0.1, 0, 0.1, 0.2, 0.3, 0.4, 0.5 }, { 0.03, 0.12, 0.5 }, { 1 } } },
  [ANT_RIVAL_SPOT] = { { 5, 6, 1 }, { { -0.5, -0.2, 0, 0.2, 0.5 }, { 0.3, 0.6, 1, 1.8, 4, 10 }, { 1 } } },
  [ANT_RIVAL_ECLIPSE] = { { 5, 8, 1 }, { { -0.6, -0.1, 0, 0.1, 0.6 }, { 0.7, 0.85, 1, 1.2, 1.5, 2, 2.8, 4 }, { 1 } } },
  [ANT_RIVAL_FLARE] = { { 6, 3, 4 }, { { -0.8, -0.6, -0.5, -0.45, -0.4, -0.3 }, { 0.01, 0.05, 0.2 }, { 0.1, 0.3, 0.8, 2 } } },
};

/* The last numbers of crossing (impact) and trapezoid (edge) are no durations. */
static int
second_is_time (AntRivalKind kind)
{
  return kind == ANT_RIVAL_THERMAL || kind == ANT_RIVAL_FLARE;
}

size_t
ant_rival_starts (AntRivalKind kind, const AntDip *dip, AntLimbDarkening ld, double parameter[][ANT_RIVAL_PARAMETERS])
{
  const Lattice *l = &lattice[kind];
  double duration_d = dip->duration_d, depth = fmin (0.9, fmax (fabs (dip->depth_ppm) * ANT_PPM, 1e-6));
  size_t count = 0;
  for (size_t i = 0; i < l->n[0]; i++)
    for (size_t j = 0; j < l->n[1]; j++)
      for (size_t k = 0; k < l->n[2]; k++)
        {
          double *p = parameter[count++];
          p[0] = dip->mid_d + l->at[0][i] * duration_d;
          p[1] = l->at[1][j] * duration_d;
          p[2] = l->at[2][k] * (second_is_time (kind) ? duration_d : 1);
          p[3] = kind == ANT_RIVAL_CROSSING ? ant_crossing_radius_for_depth (p[2], ld, depth) : 0;
        }
  return count;
}
