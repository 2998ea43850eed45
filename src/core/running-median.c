/* running-median.c - the sliding median of running-median.h, by two heaps that meet at the median.
 *
 * The lower half of the window is kept under its greatest value, the upper half over its least. Both are heaps with the
 * least key on top: the lower one holds the values with their sign turned. Every sample of the window knows its place,
 * so the one that leaves is found at once and, as a rule, simply replaced by the one that enters. */
#include "core/running-median.h"

#include <math.h>
#include <stdint.h>
#include <stdlib.h>

typedef struct
{
  float key;
  uint32_t slot; /* index of the sample modulo the width of the window */
} Node;

typedef struct
{
  Node *node;
  uint32_t count;
  float sign;    /* key = sign * value */
  uint32_t side; /* 0 lower, 1 upper */
} Heap;

#define NOWHERE UINT32_MAX

typedef struct
{
  Heap half[2];
  uint32_t *place; /* of each slot: 2 * index in its heap + side, or NOWHERE for a gap */
} Window;

static void
put (Window *window, Heap *heap, uint32_t index, Node node)
{
  heap->node[index] = node;
  window->place[node.slot] = 2 * index + heap->side;
}

/* Put `node` into the hole at `index`, moving the hole up or down to where the node belongs. */
static void
settle (Window *window, Heap *heap, uint32_t index, Node node)
{
  while (index > 0 && heap->node[(index - 1) / 2].key > node.key)
    {
      put (window, heap, index, heap->node[(index - 1) / 2]);
      index = (index - 1) / 2;
    }
  for (;;)
    {
      uint32_t child = 2 * index + 1;

      if (child + 1 < heap->count && heap->node[child + 1].key < heap->node[child].key)
        child++;
      if (child >= heap->count || heap->node[child].key >= node.key)
        break;
      put (window, heap, index, heap->node[child]);
      index = child;
    }
  put (window, heap, index, node);
}

static void
push (Window *window, Heap *heap, Node node)
{
  heap->count++;
  settle (window, heap, heap->count - 1, node);
}

static Node
take (Window *window, Heap *heap, uint32_t index)
{
  const Node taken = heap->node[index];

  heap->count--;
  if (index < heap->count)
    settle (window, heap, index, heap->node[heap->count]);
  window->place[taken.slot] = NOWHERE;
  return taken;
}

/* The same sample as seen from the other half. */
static Node
turned (Node node)
{
  return (Node){ -node.key, node.slot };
}

/* Keep the halves equal, or the lower one longer by one. */
static void
balance (Window *window)
{
  Heap *lower = &window->half[0], *upper = &window->half[1];

  if (lower->count > upper->count + 1)
    push (window, upper, turned (take (window, lower, 0)));
  else if (lower->count < upper->count)
    push (window, lower, turned (take (window, upper, 0)));
}

static void
enter (Window *window, uint32_t slot, float value)
{
  Heap *lower = &window->half[0];
  Heap *heap = lower->count == 0 || value <= -lower->node[0].key ? lower : &window->half[1];

  push (window, heap, (Node){ heap->sign * value, slot });
  balance (window);
}

static void
leave (Window *window, uint32_t slot)
{
  const uint32_t place = window->place[slot];

  if (place == NOWHERE)
    return;
  take (window, &window->half[place % 2], place / 2);
  balance (window);
}

/* leave and enter at once: the halves keep their lengths, at most one sample changes sides. */
static void
replace (Window *window, uint32_t slot, float value)
{
  const uint32_t place = window->place[slot];
  Heap *own = &window->half[place % 2], *other = &window->half[1 - place % 2];
  const Node node = { own->sign * value, slot };

  if (other->count == 0 || node.key >= -other->node[0].key)
    settle (window, own, place / 2, node);
  else
    {
      settle (window, own, place / 2, turned (other->node[0]));
      settle (window, other, 0, turned (node));
    }
}

static float
middle (const Window *window)
{
  const Heap *lower = &window->half[0], *upper = &window->half[1];

  if (lower->count == 0)
    return NAN;
  if (lower->count > upper->count)
    return -lower->node[0].key;
  return (float)(0.5 * ((double)upper->node[0].key - (double)lower->node[0].key));
}

/* The window holds samples i - half_width .. i + half_width in `width` slots: the one that enters at the front takes
 * the slot of the one that leaves at the back, unless the record is shorter than the window and none enters any more.
 */
static void
slide (Window *window, size_t n, const float *value, size_t half_width, uint32_t width, float *median)
{
  uint32_t slot_in = 0, slot_out = 0;

  for (size_t j = 0; j < half_width && j < n; j++, slot_in++)
    if (isfinite (value[j]))
      enter (window, slot_in, value[j]);
  for (size_t i = 0; i < n; i++)
    {
      const int leaves = i > half_width;
      const int enters = i + half_width < n && isfinite (value[i + half_width]);

      if (enters && leaves && window->place[slot_in] != NOWHERE)
        replace (window, slot_in, value[i + half_width]);
      else
        {
          if (leaves)
            leave (window, slot_out);
          if (enters)
            enter (window, slot_in, value[i + half_width]);
        }
      median[i] = middle (window);
      slot_in = slot_in + 1 < width ? slot_in + 1 : 0;
      if (leaves)
        slot_out = slot_out + 1 < width ? slot_out + 1 : 0;
    }
}

AntStatus
ant_running_median (size_t n, const float *value, size_t half_width, float *median)
{
  const size_t half = half_width < n ? half_width : n;
  const size_t width = 2 * half + 1 < n ? 2 * half + 1 : n;
  Window window = { { { NULL, 0, -1.0f, 0 }, { NULL, 0, 1.0f, 1 } }, NULL };
  AntStatus status = ANT_NO_MEMORY;

  if (n == 0)
    return ANT_OK;
  if (width > INT32_MAX)
    return ANT_BAD_ARGUMENT;
  /* While samples come in alone one half may hold one more than its share. */
  window.half[0].node = malloc ((width / 2 + 2) * sizeof (Node));
  window.half[1].node = malloc ((width / 2 + 2) * sizeof (Node));
  window.place = malloc (width * sizeof *window.place);
  if (window.half[0].node && window.half[1].node && window.place)
    {
      for (size_t slot = 0; slot < width; slot++)
        window.place[slot] = NOWHERE;
      slide (&window, n, value, half, (uint32_t)width, median);
      status = ANT_OK;
    }
  free (window.half[0].node);
  free (window.half[1].node);
  free (window.place);
  return status;
}
