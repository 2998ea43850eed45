/* dense.h - small dense symmetric positive algebra, row-major n x n, in place. For joint fits of a few shapes
 * and for the slow twins of the tests; O(n^3), no blocking. */
#pragma once

#include <stddef.h>
#include "core/status.h"

/* Lower Cholesky factor of a (upper part left as it was). ANT_NOT_POSITIVE if a pivot is not > 0. */
AntStatus ant_cholesky (size_t n, double *a);
/* Solve L L' x = b with the factor of ant_cholesky; x may be b. */
void ant_cholesky_solve (size_t n, const double *factor, const double *b, double *x);
/* Inverse of the matrix whose factor is given; inverse [n*n], symmetric, not the same array. */
void ant_cholesky_inverse (size_t n, const double *factor, double *inverse);
/* ln of the determinant of the matrix whose factor is given. */
double ant_cholesky_log_det (size_t n, const double *factor);
