/* sha256.c - SHA-256 blocks by the SHA instructions of x86-64, GChecksum elsewhere. */
#include "readers/sha256.h"

#include <string.h>

#if defined(__x86_64__) && defined(__GNUC__)
#define HAVE_SHA_INSTRUCTIONS 1
#include <cpuid.h>
#include <immintrin.h>
#endif

#define BLOCK 64

struct _AntSha256
{
  GChecksum *checksum; /* where the processor does not help */
  guint32 state[8];
  guint8 rest[BLOCK];
  gsize n_rest;
  guint64 n_bytes;
};

#ifdef HAVE_SHA_INSTRUCTIONS
static const guint32 round_constants[64] = {
  0x428a2f98, 0x71374491, 0xb5c0fbcf, 0xe9b5dba5, 0x3956c25b, 0x59f111f1, 0x923f82a4, 0xab1c5ed5, 0xd807aa98, 0x12835b01,
  0x243185be, 0x550c7dc3, 0x72be5d74, 0x80deb1fe, 0x9bdc06a7, 0xc19bf174, 0xe49b69c1, 0xefbe4786, 0x0fc19dc6, 0x240ca1cc,
  0x2de92c6f, 0x4a7484aa, 0x5cb0a9dc, 0x76f988da, 0x983e5152, 0xa831c66d, 0xb00327c8, 0xbf597fc7, 0xc6e00bf3, 0xd5a79147,
  0x06ca6351, 0x14292967, 0x27b70a85, 0x2e1b2138, 0x4d2c6dfc, 0x53380d13, 0x650a7354, 0x766a0abb, 0x81c2c92e, 0x92722c85,
  0xa2bfe8a1, 0xa81a664b, 0xc24b8b70, 0xc76c51a3, 0xd192e819, 0xd6990624, 0xf40e3585, 0x106aa070, 0x19a4c116, 0x1e376c08,
  0x2748774c, 0x34b0bcb5, 0x391c0cb3, 0x4ed8aa4a, 0x5b9cca4f, 0x682e6ff3, 0x748f82ee, 0x78a5636f, 0x84c87814, 0x8cc70208,
  0x90befffa, 0xa4506ceb, 0xbef9a3f7, 0xc67178f2,
};

static gboolean
processor_helps (void)
{
  unsigned a, b, c, d;
  return __get_cpuid_count (7, 0, &a, &b, &c, &d) && (b & (1u << 29)) && __builtin_cpu_supports ("sse4.1")
         && __builtin_cpu_supports ("ssse3");
}

/* The instructions want the state as ABEF and CDGH and do two rounds at a time; sixteen groups of four rounds. */
__attribute__ ((target ("sha,sse4.1,ssse3"))) static void
add_blocks (guint32 *state, const guint8 *bytes, gsize n_blocks)
{
  const __m128i big_endian = _mm_set_epi64x (0x0c0d0e0f08090a0b, 0x0405060700010203);
  __m128i low = _mm_shuffle_epi32 (_mm_loadu_si128 ((const __m128i *) (const void *) state), 0xb1);
  __m128i high = _mm_shuffle_epi32 (_mm_loadu_si128 ((const __m128i *) (const void *) (state + 4)), 0x1b);
  __m128i abef = _mm_alignr_epi8 (low, high, 8);
  __m128i cdgh = _mm_blend_epi16 (high, low, 0xf0);
  for (; n_blocks > 0; n_blocks--, bytes += BLOCK)
    {
      __m128i before_abef = abef, before_cdgh = cdgh, w[4];
#pragma GCC unroll 16 /* only then do the words stay in registers */
      for (int i = 0; i < 16; i++)
        {
          if (i < 4)
            w[i] = _mm_shuffle_epi8 (_mm_loadu_si128 ((const __m128i *) (const void *) (bytes + 16 * i)), big_endian);
          else
            {
              __m128i next = _mm_alignr_epi8 (w[(i + 3) & 3], w[(i + 2) & 3], 4);
              next = _mm_add_epi32 (_mm_sha256msg1_epu32 (w[i & 3], w[(i + 1) & 3]), next);
              w[i & 3] = _mm_sha256msg2_epu32 (next, w[(i + 3) & 3]);
            }
          __m128i k = _mm_loadu_si128 ((const __m128i *) (const void *) (round_constants + 4 * i));
          __m128i sum = _mm_add_epi32 (w[i & 3], k);
          cdgh = _mm_sha256rnds2_epu32 (cdgh, abef, sum);
          abef = _mm_sha256rnds2_epu32 (abef, cdgh, _mm_shuffle_epi32 (sum, 0x0e));
        }
      abef = _mm_add_epi32 (abef, before_abef);
      cdgh = _mm_add_epi32 (cdgh, before_cdgh);
    }
  low = _mm_shuffle_epi32 (abef, 0x1b);
  high = _mm_shuffle_epi32 (cdgh, 0xb1);
  _mm_storeu_si128 ((__m128i *) (void *) state, _mm_blend_epi16 (low, high, 0xf0));
  _mm_storeu_si128 ((__m128i *) (void *) (state + 4), _mm_alignr_epi8 (high, low, 8));
}
#else
static gboolean
processor_helps (void)
{
  return FALSE;
}

static void
add_blocks (guint32 *state, const guint8 *bytes, gsize n_blocks)
{
}
#endif

AntSha256 *
ant_sha256_new (void)
{
  static const guint32 start[8] = { 0x6a09e667, 0xbb67ae85, 0x3c6ef372, 0xa54ff53a,
                                    0x510e527f, 0x9b05688c, 0x1f83d9ab, 0x5be0cd19 };
  AntSha256 *sha256 = g_new0 (AntSha256, 1);
  if (!processor_helps ())
    sha256->checksum = g_checksum_new (G_CHECKSUM_SHA256);
  memcpy (sha256->state, start, sizeof start);
  return sha256;
}

void
ant_sha256_free (AntSha256 *sha256)
{
  if (!sha256)
    return;
  g_clear_pointer (&sha256->checksum, g_checksum_free);
  g_free (sha256);
}

void
ant_sha256_update (AntSha256 *sha256, const void *data, gsize n)
{
  const guint8 *bytes = data;
  if (sha256->checksum)
    {
      g_checksum_update (sha256->checksum, bytes, (gssize) n);
      return;
    }
  sha256->n_bytes += n;
  if (sha256->n_rest > 0)
    {
      gsize taken = MIN (n, BLOCK - sha256->n_rest);
      memcpy (sha256->rest + sha256->n_rest, bytes, taken);
      sha256->n_rest += taken;
      bytes += taken;
      n -= taken;
      if (sha256->n_rest < BLOCK)
        return;
      add_blocks (sha256->state, sha256->rest, 1);
      sha256->n_rest = 0;
    }
  add_blocks (sha256->state, bytes, n / BLOCK);
  sha256->n_rest = n % BLOCK;
  if (sha256->n_rest > 0)
    memcpy (sha256->rest, bytes + n - sha256->n_rest, sha256->n_rest);
}

char *
ant_sha256_hex (AntSha256 *sha256)
{
  if (sha256->checksum)
    return g_strdup (g_checksum_get_string (sha256->checksum));
  guint64 n_bits = GUINT64_TO_BE (8 * sha256->n_bytes);
  static const guint8 padding[BLOCK] = { 0x80 };
  gsize n_padding = sha256->n_rest < 56 ? 56 - sha256->n_rest : 120 - sha256->n_rest;
  ant_sha256_update (sha256, padding, n_padding);
  ant_sha256_update (sha256, &n_bits, sizeof n_bits);
  GString *hex = g_string_new (NULL);
  for (int i = 0; i < 8; i++)
    g_string_append_printf (hex, "%08x", sha256->state[i]);
  return g_string_free (hex, FALSE);
}
