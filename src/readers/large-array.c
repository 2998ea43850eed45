/* large-array.c - memory in large pages. */
#include "readers/large-array.h"

#include <stdint.h>
#include <sys/mman.h>

#define LARGE (8 * 1024 * 1024) /* smaller ones gain nothing */
#define PAGE ((uintptr_t) 2 * 1024 * 1024)

gpointer
ant_large_array_renew (gpointer array, gsize n, gsize size)
{
  gpointer grown = g_realloc_n (array, n, size);
#ifdef MADV_HUGEPAGE
  /* Only a wish: where it is not granted the array is as good, and as slow, as any. */
  uintptr_t start = ((uintptr_t) grown + PAGE - 1) / PAGE * PAGE, end = ((uintptr_t) grown + n * size) / PAGE * PAGE;
  if (n * size >= LARGE && end > start)
    (void) madvise ((gpointer) start, end - start, MADV_HUGEPAGE);
#endif
  return grown;
}
