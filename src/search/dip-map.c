/* dip-map.c - evaluate every template at every epoch, and pick the peaks. */
#include "search/dip-map.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/robust.h"

static AntStatus
reserve (AntFamilyMap *map, const AntFamily *family, size_t n)
{
  size_t longest = 0, shortest = family->member[0].length;
  for (size_t b = 0; b < family->n_members / ANT_LANES; b++)
    longest = family->block_length[b] > longest ? family->block_length[b] : longest;
  map->first_start = -(ptrdiff_t) (longest * 7 / 10);
  map->n_starts = (n + longest * 7 / 10 - shortest * 3 / 10) / family->stride + 1;
  size_t cells = map->n_starts * family->n_members;
  map->snr = calloc (cells, sizeof *map->snr);
  map->sigma_ppm = malloc (cells * sizeof *map->sigma_ppm);
  return map->snr && map->sigma_ppm ? ANT_OK : ANT_NO_MEMORY;
}

/* Sum of each shape, in units of which the covered part is judged. */
static void
full_weights (const AntFamily *family, double *weight)
{
  for (size_t m = 0; m < family->n_members; m++)
    {
      weight[m] = 0;
      for (size_t j = 0; j < family->block_length[m / ANT_LANES]; j++)
        weight[m] += family->shape[m / ANT_LANES][j * ANT_LANES + m % ANT_LANES];
    }
}

static AntStatus
evaluate (AntFamilyMap *map, const AntFamily *family, const AntWhitener *whitener, const double *z, const double *full,
          double least_coverage, const AntStop *stop)
{
  double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  for (size_t i = 0; i < map->n_starts && !ant_stop_asked (stop); i++)
    for (size_t b = 0; b < family->n_members / ANT_LANES; b++)
      {
        float *snr = map->snr + i * family->n_members + b * ANT_LANES;
        float *sigma = map->sigma_ppm + i * family->n_members + b * ANT_LANES;
        ant_whitener_energies (whitener, z, map->first_start + (ptrdiff_t) (i * family->stride), family->block_length[b],
                               family->shape[b], energy, moment, weight);
        for (size_t l = 0; l < ANT_LANES; l++)
          {
            double whole = full[b * ANT_LANES + l];
            int good = whole < 0 && weight[l] / whole >= least_coverage && energy[l] > 0;
            snr[l] = good ? (float) (moment[l] / sqrt (energy[l])) : 0;
            sigma[l] = good ? (float) (1 / sqrt (energy[l])) : NAN;
          }
      }
  return ant_stop_asked (stop) ? ANT_STOPPED : ANT_OK;
}

AntDipMap *
ant_dip_map_new (const AntTemplateBank *bank, const AntWhitener *whitener, const double *z, double least_coverage,
                 const AntStop *stop, AntStatus *status)
{
  AntDipMap *map = calloc (1, sizeof *map);
  *status = map ? ANT_OK : ANT_NO_MEMORY;
  if (!map)
    return NULL;
  map->bank = bank;
  for (size_t f = 0; f < bank->n_families && !*status; f++)
    {
      const AntFamily *family = &bank->family[f];
      double *full = malloc (family->n_members * sizeof *full);
      *status = full ? reserve (&map->family[f], family, ant_whitener_n (whitener)) : ANT_NO_MEMORY;
      if (!*status)
        {
          full_weights (family, full);
          *status = evaluate (&map->family[f], family, whitener, z, full, least_coverage, stop);
        }
      free (full);
    }
  if (*status)
    {
      ant_dip_map_free (map);
      return NULL;
    }
  return map;
}

void
ant_dip_map_free (AntDipMap *map)
{
  if (!map)
    return;
  for (int f = 0; f < 2; f++)
    {
      free (map->family[f].snr);
      free (map->family[f].sigma_ppm);
    }
  free (map);
}

double
ant_dip_map_centre (const AntDipMap *map, size_t family, size_t start, size_t member)
{
  return (double) map->family[family].first_start + (double) (start * map->bank->family[family].stride)
         + map->bank->family[family].member[member].centre;
}

int
ant_peaks_clash (const AntPeak *a, const AntPeak *b, double step_d)
{
  double apart_d = fabs (a->centre - b->centre) * step_d;
  return apart_d < 1.5 * a->duration_d || apart_d < 0.5 * (a->duration_d + b->duration_d);
}

static int
stronger_first (const void *a, const void *b)
{
  double left = fabs (((const AntPeak *) a)->snr), right = fabs (((const AntPeak *) b)->snr);
  if (left != right)
    return left > right ? -1 : 1;
  double first = ((const AntPeak *) a)->centre, second = ((const AntPeak *) b)->centre;
  return (first > second) - (first < second);
}

/* Every cell at or above the cut, in a growing list; NULL and *n = -1 when memory is out. */
static AntPeak *
cells_above (const AntDipMap *map, int sign, double cut, size_t *n)
{
  size_t room = 256;
  AntPeak *cell = malloc (room * sizeof *cell);
  *n = 0;
  for (size_t f = 0; f < map->bank->n_families && cell; f++)
    {
      const AntFamily *family = &map->bank->family[f];
      for (size_t i = 0; i < map->family[f].n_starts * family->n_members && cell; i++)
        {
          double snr = (double) map->family[f].snr[i];
          if (sign * snr < cut)
            continue;
          if (*n == room)
            {
              AntPeak *more = realloc (cell, (room *= 2) * sizeof *cell);
              if (!more)
                free (cell);
              cell = more;
              if (!cell)
                break;
            }
          size_t member = i % family->n_members;
          cell[(*n)++] = (AntPeak){ .snr = snr, .family = (unsigned char) f, .member = member,
                                    .centre = ant_dip_map_centre (map, f, i / family->n_members, member),
                                    .duration_d = family->member[member].duration_d,
                                    .edge_d = family->member[member].edge_d };
        }
    }
  return cell;
}

static int
clashes_with_any (const AntPeak *cell, size_t n, const AntPeak *peak, double step_d)
{
  for (size_t i = 0; i < n; i++)
    if (ant_peaks_clash (&peak[i], cell, step_d))
      return 1;
  return 0;
}

size_t
ant_dip_map_peaks (const AntDipMap *map, int sign, double cut, size_t n_avoid, const AntPeak *avoid, size_t room,
                   AntPeak *peak)
{
  size_t n_cells, found = 0;
  AntPeak *cell = cells_above (map, sign, cut, &n_cells);
  if (!cell)
    return (size_t) -1;
  qsort (cell, n_cells, sizeof *cell, stronger_first);
  for (size_t i = 0; i < n_cells && found < room; i++)
    if (!clashes_with_any (&cell[i], n_avoid, avoid, map->bank->step_d)
        && !clashes_with_any (&cell[i], found, peak, map->bank->step_d))
      peak[found++] = cell[i];
  free (cell);
  return found;
}

/* Gather SNR and sigma of one member over the starts that count. Returns how many. */
static size_t
gather (const AntDipMap *map, size_t member, double from, double to, size_t n_avoid, const AntPeak *avoid, double *snr,
        double *sigma)
{
  const AntFamily *family = &map->bank->family[0];
  size_t n = 0;
  for (size_t i = 0; i < map->family[0].n_starts; i++)
    {
      size_t cell = i * family->n_members + member;
      AntPeak here = { .centre = ant_dip_map_centre (map, 0, i, member), .duration_d = family->member[member].duration_d };
      if (isnan (map->family[0].sigma_ppm[cell]) || here.centre < from || here.centre >= to
          || clashes_with_any (&here, n_avoid, avoid, map->bank->step_d))
        continue;
      snr[n] = (double) map->family[0].snr[cell];
      sigma[n++] = (double) map->family[0].sigma_ppm[cell];
    }
  return n;
}

size_t
ant_dip_map_floor (const AntDipMap *map, double from, double to, size_t n_avoid, const AntPeak *avoid, size_t room,
                   AntFloorPoint *point)
{
  const AntFamily *family = &map->bank->family[0];
  size_t n_points = 0, starts = map->family[0].n_starts;
  double *snr = malloc (2 * starts * sizeof *snr);
  for (size_t m = 0; snr && m < family->n_members && family->member[m].length && n_points < room; m++)
    {
      if (m && family->member[m].duration_d == family->member[m - 1].duration_d)
        continue; /* another phase of the same duration */
      size_t n = gather (map, m, from, to, n_avoid, avoid, snr, snr + starts);
      double sum = 0, squares = 0;
      for (size_t i = 0; i < n; i++)
        {
          sum += snr[i];
          squares += snr[i] * snr[i];
        }
      point[n_points++] = (AntFloorPoint){ .duration_d = family->member[m].duration_d, .starts = n,
                                           .snr_mean = n ? sum / (double) n : NAN,
                                           .snr_sd = n ? sqrt (squares / (double) n) : NAN,
                                           .sigma_ppm = ant_median (n, snr + starts, snr + starts) };
    }
  free (snr);
  return n_points;
}
