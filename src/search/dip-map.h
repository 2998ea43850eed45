/* dip-map.h - the dip SNR of every template at every epoch of a series, and its peaks.
 *
 * For shape s and z = C^-1 y: num = s'z, den = s'C^-1 s, both exact through gaps; amplitude = -num/den for a negative
 * shape of unit depth is the depth; SNR = num/sqrt(den), positive for dips (matched filter in coloured noise: Kay 1998,
 * Fundamentals of Statistical Signal Processing II, section 4.4; Jenkins 2002, ApJ 575, 493). */
#pragma once

#include <stddef.h>
#include "core/stages.h"
#include "search/template-bank.h"

typedef struct
{
  size_t n_starts;
  ptrdiff_t first_start; /* place of start 0; start i stands at first_start + i * stride */
  float *snr;            /* [n_starts][n_members]; 0 where the template is not covered well enough */
  float *sigma_ppm;      /* [n_starts][n_members] 1-sigma depth; NaN likewise */
} AntFamilyMap;

typedef struct
{
  const AntTemplateBank *bank; /* borrowed */
  AntFamilyMap family[2];
} AntDipMap;

/* Evaluate the bank. z [n of the whitener]: C^-1 y. least_coverage: weighted observed fraction a template needs (0.3).
 * stop may be NULL; once it is asked, NULL is returned soon with ANT_STOPPED. */
AntDipMap *ant_dip_map_new (const AntTemplateBank *bank, const AntWhitener *whitener, const double *z,
                            double least_coverage, const AntStop *stop, AntStatus *status);
void ant_dip_map_free (AntDipMap *map);

typedef struct
{
  double snr;           /* signed: negative for brightenings */
  double centre;        /* middle, in places of the series */
  double duration_d, edge_d;
  unsigned char family;
  size_t member;
} AntPeak;

/* Middle of a template, in places. */
double ant_dip_map_centre (const AntDipMap *map, size_t family, size_t start, size_t member);

/* Peaks of sign*SNR at or above `cut` (sign +1 dips, -1 brightenings), strongest first, no two closer than one duration
 * of the stronger beyond its contacts; none within one duration of an `avoid` peak. Returns how many were found;
 * at most `room` are written. ANT_NO_MEMORY as (size_t)-1. */
size_t ant_dip_map_peaks (const AntDipMap *map, int sign, double cut, size_t n_avoid, const AntPeak *avoid, size_t room,
                          AntPeak *peak);
/* Whether two dips are one event: the middle of b within one duration of a's contacts, or the two overlap. */
int ant_peaks_clash (const AntPeak *a, const AntPeak *b, double step_d);

/* Summary of one duration (over families' first, wide one): standard deviation of the SNR and median sigma over starts
 * whose middle lies in places [from, to) and not within one duration of an avoided peak. */
typedef struct
{
  double duration_d;
  size_t starts;
  double snr_sd, snr_mean;
  double sigma_ppm; /* median; NaN if no start qualifies */
} AntFloorPoint;
/* One point per duration of the wide family; returns how many (<= room). */
size_t ant_dip_map_floor (const AntDipMap *map, double from, double to, size_t n_avoid, const AntPeak *avoid, size_t room,
                          AntFloorPoint *point);
