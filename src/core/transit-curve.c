/* transit-curve.c - the loss of light of transit-curve.h, as one line integral round the dark disc.
 *
 * With m^2 = 1 - r^2 the law is I = c0 + c1 m + c2 m^2. By Green's theorem (as Pal 2012, MNRAS 420, 1630) the integral
 * of I over the covered region is a line integral along its edge; on the solar limb m = 0, so that part is an area, and
 *
 *   pi loss = A + (1/N) int m^2 (c1 / (3 (1 + m)) + c2 / 4) (k^2 - z k cos psi) d psi
 *
 * with A the area covered, N the mean of I over the disc, and psi running round the dark disc where it is inside the
 * Sun, from the direction of the Sun's centre. The first term is the loss of an evenly bright Sun, the second is the
 * limb darkening; nothing of the size of the whole flux is ever subtracted, so a small body keeps its digits. */
#include "core/transit-curve.h"

#include <math.h>
#include "core/units.h"

/* Nodes for a quarter turn, 0 < t < pi/2: sin^2 t, cos^2 t, weight. The integrand is smooth but for a weak branch point
 * close to t = pi/2 when the discs are near inner contact, so the nodes crowd there: 32-point Gauss-Legendre in x with
 * pi/2 - t = (pi/2) x^3. Worst error 3e-13 of k^2 over all k and z; 40-digit arithmetic. */
static const double quarter_turn[][3] = {
  { 9.9999999999999998e-1, 1.6176624689027037e-17, 3.0951257568076867e-8 },
  { 9.999999999996579e-1, 3.4209822120260368e-13, 1.9846609998368461e-6 },
  { 9.9999999992619116e-1, 7.3808841253341847e-11, 1.8572286458346814e-5 },
  { 9.999999970670646e-1, 2.932935399013247e-9, 8.5545093627044986e-5 },
  { 9.9999995211487157e-1, 4.7885128426737836e-8, 2.712309937809455e-4 },
  { 9.9999954962958745e-1, 4.5037041254752845e-7, 6.8161871502128582e-4 },
  { 9.9999709506928904e-1, 2.9049307109595614e-6, 1.4600364039670518e-3 },
  { 9.9998577359590939e-1, 1.422640409060581e-5, 2.7810117816995878e-3 },
  { 9.9994357277262359e-1, 5.6427227376408086e-5, 4.8384931752673325e-3 },
  { 9.9981067289670846e-1, 1.8932710329154164e-4, 7.8292014745911744e-3 },
  { 9.9944589758159234e-1, 5.5410241840766071e-4, 1.1932418467351875e-2 },
  { 9.9855342733523951e-1, 1.4465726647604936e-3, 1.7287947499401323e-2 },
  { 9.96574416649834e-1, 3.4255833501660031e-3, 2.3974267011935259e-2 },
  { 9.9254750405943419e-1, 7.452495940565813e-3, 3.1989007445095571e-2 },
  { 9.8495903321512014e-1, 1.5040966784879862e-2, 4.1233803296627599e-2 },
  { 9.7162809193268206e-1, 2.837190806731794e-2, 5.1505306955775126e-2 },
  { 9.4969948264845419e-1, 5.030051735154581e-2, 6.2493717598654231e-2 },
  { 9.1583865223344194e-1, 8.4161347766558055e-2, 7.3789609979481192e-2 },
  { 8.6671595882396971e-1, 1.3328404117603029e-1, 8.4899189533855935e-2 },
  { 7.9980688785889156e-1, 2.0019311214110844e-1, 9.5267405398625354e-2 },
  { 7.1440392272889946e-1, 2.8559607727110054e-1, 1.0430767932199886e-1 },
  { 6.1255841733554627e-1, 3.8744158266445373e-1, 1.1143641277439069e-1 },
  { 4.9953278742303355e-1, 5.0046721257696645e-1, 1.1610996811617913e-1 },
  { 3.833711545173193e-1, 6.166288454826807e-1, 1.1786152380308995e-1 },
  { 2.734712329781626e-1, 7.265287670218374e-1, 1.1633510629252416e-1 },
  { 1.7849056290303466e-1, 8.2150943709696534e-1, 1.1131421476942692e-1 },
  { 1.0430542778324762e-1, 8.9569457221675238e-1, 1.0274277463761676e-1 },
  { 5.2794821285854622e-2, 9.4720517871414538e-1, 9.0736662535679462e-2 },
  { 2.1871971343696304e-2, 9.781280286563037e-1, 7.5584714473979338e-2 },
  { 6.6393640958543919e-3, 9.9336063590414561e-1, 5.7738990183668205e-2 },
  { 1.1324845132724375e-3, 9.9886751548672756e-1, 3.7795888070311634e-2 },
  { 4.144801671341414e-5, 9.9995855198328659e-1, 1.6491993092557862e-2 },
};

#define N_NODES (sizeof quarter_turn / sizeof *quarter_turn)

/* The limb-darkening part of the integrand, m^2 (root / (1 + m) + square). */
typedef struct
{
  double root;
  double square;
} Darkening;

static double
darkening_at (Darkening law, double m2)
{
  return m2 * (law.root / (1 + sqrt (m2)) + law.square);
}

/* The dark disc lies within the Sun; `room` = 1 - z - k >= 0. psi = 2 t over the whole turn. */
static double
darkening_inside (double k, double z, double room, Darkening law)
{
  const double m2_near = (1 - z + k) * (1 + z - k); /* at the point of the dark disc nearest the Sun's centre */
  const double m2_far = room * (1 + z + k);
  /* The value at psi = pi/2 is taken out and integrated exactly: over a small disc the rest is a small difference. */
  const double middle = darkening_at (law, fmax (0, 1 - z * z - k * k));
  double total = 0;

  for (size_t i = 0; i < N_NODES; i++)
    {
      const double sin2 = quarter_turn[i][0], cos2 = quarter_turn[i][1], weight = quarter_turn[i][2];
      const double m2 = m2_near * cos2 + m2_far * sin2;

      total += weight * (darkening_at (law, m2) - middle) * (k * (k - z) + 2 * z * k * sin2);
    }
  return ANT_TAU * k * k * middle + 4 * total;
}

/* The dark disc lies across the limb; `over` = z + k - 1 > 0. sin (psi/2) = s sin t, with s = sin (psi_limb/2), makes
 * m = sqrt (m2_near) cos t and takes the square root out of the end at the limb. */
static double
darkening_across_limb (double k, double z, double over, Darkening law)
{
  const double m2_near = fmax (0, (1 - z + k) * (1 + z - k));
  const double s2 = m2_near / (4 * z * k);
  const double one_minus_s2 = over * (1 + z + k) / (4 * z * k);
  double total = 0;

  for (size_t i = 0; i < N_NODES; i++)
    {
      const double sin2 = quarter_turn[i][0], cos2 = quarter_turn[i][1], weight = quarter_turn[i][2];
      const double slope = sqrt (s2 * cos2 / (cos2 + one_minus_s2 * sin2)); /* d (psi/2) / dt */

      total += weight * slope * darkening_at (law, m2_near * cos2) * (k * (k - z) + 2 * z * k * s2 * sin2);
    }
  return 4 * total;
}

/* Area common to the unit disc and one of radius k across its limb: two sectors less the kite between the centres. The
 * angles come from the sides by products (Heron), which stay exact where the discs barely touch. */
static double
overlap_area (double k, double z, double over)
{
  const double kite = sqrt (fmax (0, over * (1 - z + k) * (1 + z - k) * (1 + z + k)));
  const double half_angle_at_body = atan2 (kite, k * k + (z - 1) * (z + 1));
  const double half_angle_at_sun = atan2 (kite, 1 + (z - k) * (z + k));

  return k * k * half_angle_at_body + half_angle_at_sun - 0.5 * kite;
}

double
ant_transit_loss (double k, double z, AntLimbDarkening ld)
{
  const double mean = 1 - ld.u1 / 3 - ld.u2 / 6;
  const Darkening law = { (ld.u1 + 2 * ld.u2) / (3 * mean), -ld.u2 / (4 * mean) };
  const double room = 1 - z - k;
  double loss;

  if (k <= 0 || z >= 1 + k)
    return 0;
  if (k >= 1 + z)
    return 1;
  if (room >= 0)
    return k * k + darkening_inside (k, z, room, law) / ANT_PI;
  loss = (overlap_area (k, z, -room) + darkening_across_limb (k, z, -room, law)) / ANT_PI;
  return loss < 0 ? 0 : loss; /* the last bit at contact; a NaN goes through */
}

/* The square of half the chord that the centre of the body runs along between contacts I and IV. */
static double
half_chord2 (double k, double impact)
{
  return fmax (0, (1 + k - impact) * (1 + k + impact));
}

double
ant_crossing_separation (const AntCrossing *crossing, double time_d)
{
  const double along = sqrt (half_chord2 (crossing->radius_ratio, crossing->impact)) * 2 * time_d / crossing->t14_d;

  return sqrt (crossing->impact * crossing->impact + along * along);
}

double
ant_crossing_loss (const AntCrossing *crossing, AntLimbDarkening ld, double time_d)
{
  if (fabs (time_d) >= 0.5 * crossing->t14_d)
    return 0;
  return ant_transit_loss (crossing->radius_ratio, ant_crossing_separation (crossing, time_d), ld);
}

double
ant_crossing_ingress_d (const AntCrossing *crossing)
{
  const double k = crossing->radius_ratio, b = crossing->impact;
  const double outer2 = half_chord2 (k, b);
  const double inner2 = (1 - k - b) * (1 - k + b);

  if (k + b >= 1)
    return 0.5 * crossing->t14_d;
  /* 1 - sqrt (inner2 / outer2), written without the difference: outer2 - inner2 = 4 k. */
  return 0.5 * crossing->t14_d * (4 * k / outer2) / (1 + sqrt (inner2 / outer2));
}

double
ant_crossing_radius_for_ingress (double impact, double t14_d, double ingress_d)
{
  const double x = 1 - 2 * ingress_d / t14_d;            /* T23 / T14 */
  const double less = (2 * ingress_d / t14_d) * (1 + x); /* 1 - x^2 */
  const double more = 1 + x * x;
  const double room = (1 - impact) * (1 + impact);

  if (!(impact >= 0 && impact < 1 && less > 0 && x >= 0))
    return NAN;
  /* The lesser root of (1-k)^2 - b^2 = x^2 ((1+k)^2 - b^2). */
  return less * room / (more + sqrt (more * more - less * less * room));
}

/* Two radii, one on each side of the wanted one, and how far the square root of their loss is from its target. */
typedef struct
{
  double low, f_low;   /* f_low < 0 */
  double high, f_high; /* f_high >= 0 */
} Bracket;

static void
narrow (Bracket *bracket, double k, double f)
{
  if (f < 0)
    {
      bracket->low = k;
      bracket->f_low = f;
    }
  else
    {
      bracket->high = k;
      bracket->f_high = f;
    }
}

double
ant_crossing_radius_for_depth (double impact, AntLimbDarkening ld, double depth)
{
  /* Ridders 1979 (IEEE Trans. Circuits Syst. 26, 979) on the square root of the loss, which is nearly straight in k. */
  const double target = sqrt (depth);
  Bracket bracket = { fmax (0, impact - 1), -target, 1 + impact, 1 - target };
  double k = NAN;

  if (!(impact >= 0 && depth > 0 && depth < 1))
    return NAN;
  for (int round = 0; round < 100; round++)
    {
      const double before = k;
      const double middle = 0.5 * (bracket.low + bracket.high);
      const double f_middle = sqrt (ant_transit_loss (middle, impact, ld)) - target;
      const double spread = sqrt (f_middle * f_middle - bracket.f_low * bracket.f_high);

      k = middle - (middle - bracket.low) * f_middle / spread;
      if (fabs (k - before) <= 1e-14 * k)
        break;
      narrow (&bracket, middle, f_middle);
      narrow (&bracket, k, sqrt (ant_transit_loss (k, impact, ld)) - target);
    }
  return k;
}
