/* witness-table.h - a record beside its witness, bin by bin. */
#pragma once

#include "data/comparison.h"

/* time_jd, own time, averages of both in ppm of their medians, ratio and difference in ppm. Caller frees. */
GString *ant_witness_table_text (const AntComparison *comparison);
