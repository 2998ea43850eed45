/* simd.h - the one macro that asks for several builds of a hot loop, chosen at start by the processor.
 * The loops stay plain C; contraction is off everywhere, so every build gives the same digits.
 * Only gcc without ThreadSanitizer links such functions reliably; elsewhere the macro means nothing. ANT_NO_SIMD turns it
 * off, for the test that the digits do not change. */
#pragma once

/* Four or eight doubles that are worked on together, element by element: a compiler extension that gcc and clang share and
 * that falls apart into whatever registers the processor has. Never passed to or returned from a function that is not inlined. */
typedef double AntFour __attribute__ ((vector_size (32)));
typedef double AntEight __attribute__ ((vector_size (64)));

#if defined(__GNUC__) && !defined(__clang__) && defined(__x86_64__) && !defined(__SANITIZE_THREAD__) && !defined(ANT_NO_SIMD)
#define ANT_SIMD __attribute__ ((target_clones ("arch=x86-64-v4", "arch=x86-64-v3", "default")))
#else
#define ANT_SIMD
#endif
