/* dip.c - the words for what a dip's edges show. */
#include "search/dip.h"

const char *
ant_edges_text (AntEdges edges)
{
  static const char *const text[] = { "none", "ingress", "egress", "both" };
  return text[edges];
}
