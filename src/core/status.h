/* status.h - how every numeric function reports its outcome. No text is formed here: data/error.h turns a status
 * into a sentence for people. */
#pragma once

typedef enum
{
  ANT_OK = 0,
  ANT_BAD_ARGUMENT,  /* a number outside its stated range */
  ANT_NO_DATA,       /* too few observed samples for the question */
  ANT_NOT_POSITIVE,  /* a matrix or a variance that must be positive is not */
  ANT_NO_MEMORY,
  ANT_NOT_CONVERGED, /* the best point found is returned, but the search had not settled */
  ANT_STOPPED,       /* asked to stop between two slices; partial results stand */
} AntStatus;

/* A short plain English phrase for logs and tests; never NULL. */
const char *ant_status_text (AntStatus status);
