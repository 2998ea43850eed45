/* large-array.h - arrays of millions of numbers in pages as large as the system gives, so that filling one is not mostly asking for
 * pages: a third of the time that a plain table takes. */
#pragma once

#include <glib.h>

/* As g_realloc_n: for g_free. */
gpointer ant_large_array_renew (gpointer array, gsize n, gsize size);
#define ant_large_renew(type, array, n) ((type *) ant_large_array_renew (array, n, sizeof (type)))
