/* span.h - a closed interval of time, in days from the record's own origin. */
#pragma once

typedef struct
{
  double start_d;
  double end_d;
} AntSpan;
