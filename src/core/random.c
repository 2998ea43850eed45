/* random.c - the generator of random.h. */
#include "core/random.h"

#include <math.h>

static uint64_t
rotate_left (uint64_t x, int bits)
{
  return (x << bits) | (x >> (64 - bits));
}

static uint64_t
splitmix64 (uint64_t *state)
{
  uint64_t z = (*state += 0x9e3779b97f4a7c15u);

  z = (z ^ (z >> 30)) * 0xbf58476d1ce4e5b9u;
  z = (z ^ (z >> 27)) * 0x94d049bb133111ebu;
  return z ^ (z >> 31);
}

void
ant_random_seed (AntRandom *random, uint64_t seed, uint64_t stream)
{
  /* The seed is scrambled before the stream is added: (seed 1, stream 2) and (seed 2, stream 1) must not meet. */
  uint64_t state = splitmix64 (&seed) + stream;

  for (int i = 0; i < 4; i++)
    random->state[i] = splitmix64 (&state);
  random->spare = 0;
  random->has_spare = 0;
}

uint64_t
ant_random_next (AntRandom *random)
{
  uint64_t *s = random->state;
  const uint64_t result = rotate_left (s[1] * 5, 7) * 9;
  const uint64_t t = s[1] << 17;

  s[2] ^= s[0];
  s[3] ^= s[1];
  s[1] ^= s[2];
  s[0] ^= s[3];
  s[2] ^= t;
  s[3] = rotate_left (s[3], 45);
  return result;
}

double
ant_random_uniform (AntRandom *random)
{
  return (double)(ant_random_next (random) >> 11) * 0x1p-53;
}

double
ant_random_normal (AntRandom *random)
{
  double x, y, r2, scale;

  if (random->has_spare)
    {
      random->has_spare = 0;
      return random->spare;
    }
  do
    {
      x = 2 * ant_random_uniform (random) - 1;
      y = 2 * ant_random_uniform (random) - 1;
      r2 = x * x + y * y;
    }
  while (r2 >= 1 || r2 == 0);
  scale = sqrt (-2 * log (r2) / r2);
  random->spare = scale * y;
  random->has_spare = 1;
  return scale * x;
}
