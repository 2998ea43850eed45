/* solar-limb.c - a table of limb darkening against wavelength. */
#include "core/solar-limb.h"

#include <math.h>

typedef struct
{
  double nm, u2, v2; /* as in the source */
} Row;

static const Row row[] = {
  { 300, 0.74, 0.20 },   { 320, 0.88, 0.03 },   { 350, 0.98, -0.10 },  { 370, 1.03, -0.16 },  { 380, 0.92, -0.05 },
  { 400, 0.91, -0.05 },  { 450, 0.99, -0.17 },  { 500, 0.97, -0.22 },  { 550, 0.93, -0.23 },  { 600, 0.88, -0.23 },
  { 800, 0.73, -0.22 },  { 1000, 0.64, -0.20 }, { 1500, 0.57, -0.21 }, { 2000, 0.48, -0.18 }, { 3000, 0.35, -0.12 },
  { 5000, 0.22, -0.07 }, { 10000, 0.15, -0.07 },
};
#define N (sizeof row / sizeof *row)

AntLimbDarkening
ant_solar_limb (double wavelength_nm)
{
  size_t i = 1;
  while (i < N - 1 && row[i].nm < wavelength_nm)
    i++;
  double part = fmax (0, fmin (1, (wavelength_nm - row[i - 1].nm) / (row[i].nm - row[i - 1].nm)));
  double u2 = row[i - 1].u2 + part * (row[i].u2 - row[i - 1].u2), v2 = row[i - 1].v2 + part * (row[i].v2 - row[i - 1].v2);
  return (AntLimbDarkening){ u2 + 2 * v2, -v2 };
}
