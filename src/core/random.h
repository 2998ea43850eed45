/* random.h - reproducible random numbers: the same seed gives the same integers and uniforms on every machine, and the
 * same normals up to the last digit of the C library's logarithm.
 * xoshiro256** (Blackman & Vigna 2018), seeded by splitmix64; normals by the polar method (Marsaglia & Bray 1964).
 * Each generator is its own state: one per thread or slice, never shared. */
#pragma once

#include <stdint.h>

typedef struct
{
  uint64_t state[4];
  double spare;
  int has_spare;
} AntRandom;

/* Start a generator. Different `stream` values with one seed are independent for all practical purposes. */
void ant_random_seed (AntRandom *random, uint64_t seed, uint64_t stream);
uint64_t ant_random_next (AntRandom *random);
double ant_random_uniform (AntRandom *random); /* 0 <= u < 1, 53 bits */
double ant_random_normal (AntRandom *random);  /* mean 0, variance 1 */
