/* status.c - the phrases of status.h. */
#include "core/status.h"

const char *
ant_status_text (AntStatus status)
{
  switch (status)
    {
    case ANT_OK: return "done";
    case ANT_BAD_ARGUMENT: return "a value is outside its range";
    case ANT_NO_DATA: return "too few observed samples";
    case ANT_NOT_POSITIVE: return "a variance is not positive";
    case ANT_NO_MEMORY: return "not enough memory";
    case ANT_NOT_CONVERGED: return "the fit did not settle";
    case ANT_STOPPED: return "stopped";
    }
  return "unknown status";
}
