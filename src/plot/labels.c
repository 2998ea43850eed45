/* labels.c - first free place wins. */
#include "plot/labels.h"
#include <glib.h>
#include <math.h>

#define CURVE_STEP 5 /* px between the boxes that guard a curve */

void
ant_labels_begin (AntLabelField *field, const AntBox *within)
{
  field->within = *within;
  field->n = 0;
}

void
ant_labels_block (AntLabelField *field, const AntBox *box)
{
  if (field->n < ANT_MOST_TAKEN)
    field->taken[field->n++] = *box;
}

void
ant_labels_block_curve (AntLabelField *field, size_t n, const double *x, const double *y)
{
  for (size_t i = 0; i + 1 < n; i++)
    {
      if (isnan (y[i]) || isnan (y[i + 1]))
        continue;
      double length = hypot (x[i + 1] - x[i], y[i + 1] - y[i]);
      int pieces = (int) CLAMP (ceil (length / CURVE_STEP), 1, 200);
      for (int p = 0; p < pieces; p++)
        {
          double t = (p + 0.5) / pieces, px = x[i] + t * (x[i + 1] - x[i]), py = y[i] + t * (y[i + 1] - y[i]);
          AntBox box = { px - CURVE_STEP / 2.0, py - 2, CURVE_STEP, 4 };
          if (field->n > 0 && ant_boxes_meet (&field->taken[field->n - 1], &box) && length < 2)
            continue;
          if (ant_boxes_meet (&field->within, &box))
            ant_labels_block (field, &box);
        }
    }
}

static gboolean
is_free (const AntLabelField *field, const AntBox *box)
{
  if (!ant_box_holds (&field->within, box->x, box->y)
      || !ant_box_holds (&field->within, box->x + box->width, box->y + box->height))
    return FALSE;
  for (size_t i = 0; i < field->n; i++)
    if (ant_boxes_meet (&field->taken[i], box))
      return FALSE;
  return TRUE;
}

int
ant_labels_reserve (AntLabelField *field, AntTextSize size, size_t n, const AntAnchor *anchor, AntBox *box)
{
  for (size_t i = 0; i < n; i++)
    {
      *box = (AntBox) { anchor[i].x - anchor[i].align_x * size.width, anchor[i].y - anchor[i].align_y * size.height,
                        size.width, size.height };
      if (!is_free (field, box))
        continue;
      ant_labels_block (field, box);
      return TRUE;
    }
  return FALSE;
}

int
ant_labels_place (AntLabelField *field, AntPen *pen, const char *text, AntTextStyle style, size_t n,
                  const AntAnchor *anchor)
{
  AntBox box;
  if (!ant_labels_reserve (field, ant_pen_measure (pen, text, style), n, anchor, &box))
    return FALSE;
  ant_pen_text (pen, text, style, box.x, box.y, 0, 0);
  return TRUE;
}
