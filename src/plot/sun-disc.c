/* sun-disc.c - the disc, the chord, the body at its contacts. */
#include "plot/sun-disc.h"

#include <glib.h>
#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "plot/labels.h"

#define LEAST_BODY_PX 1.6
#define MARGIN_LINES 1.8 /* round the drawing, in lines of text, for labels */

/* From solar radii to the box. */
typedef struct
{
  double x, y, radius; /* of the Sun, pixels */
} Place;

static double
x_of (const Place *place, double east)
{
  return place->x - place->radius * east;
}

static double
y_of (const Place *place, double north)
{
  return place->y - place->radius * north;
}

/* The Sun and, where it is nearly as large as the Sun, the body too fit into the box. */
static Place
fit (const AntBox *box, const AntSunDisc *disc, const AntTheme *theme)
{
  double left = 1, right = 1, up = 1, down = 1, k = MIN (disc->radius_ratio, 3);
  for (size_t i = 0; i < disc->n; i++)
    {
      left = MAX (left, disc->east[i] + k);
      right = MAX (right, k - disc->east[i]);
      up = MAX (up, disc->north[i] + k);
      down = MAX (down, k - disc->north[i]);
    }
  double margin = MARGIN_LINES * theme->font_px, width = MAX (1, box->width - 2 * margin), height = MAX (1, box->height - 2 * margin);
  double radius = MIN (width / (left + right), height / (up + down));
  return (Place) { box->x + box->width / 2 + radius * (left - right) / 2, box->y + box->height / 2 + radius * (up - down) / 2, radius };
}

static void
circle (AntPen *pen, double x, double y, double radius)
{
  cairo_new_sub_path (pen->cr);
  cairo_arc (pen->cr, x, y, radius, 0, ANT_TAU);
}

/* Bright in the middle, the limb a little darker, as the Sun is. */
static void
draw_sun (AntPen *pen, const Place *place)
{
  AntColour glow = pen->theme->look[ANT_LOOK_FLARE], paper = pen->theme->role[ANT_ROLE_PAPER];
  cairo_pattern_t *fill = cairo_pattern_create_radial (place->x, place->y, 0, place->x, place->y, place->radius);
  for (int i = 0; i <= 8; i++)
    {
      double r = i / 8.0, part = 0.16 + 0.16 * (1 - sqrt (1 - r * r));
      cairo_pattern_add_color_stop_rgb (fill, r, paper.red + part * (glow.red - paper.red),
                                        paper.green + part * (glow.green - paper.green), paper.blue + part * (glow.blue - paper.blue));
    }
  circle (pen, place->x, place->y, place->radius);
  cairo_set_source (pen->cr, fill);
  cairo_fill_preserve (pen->cr);
  cairo_pattern_destroy (fill);
  ant_pen_colour (pen, ANT_ROLE_FRAME);
  cairo_set_line_width (pen->cr, 1.2);
  cairo_stroke (pen->cr);
}

static void
draw_way (AntPen *pen, const Place *place, const AntSunDisc *disc)
{
  static const double dashes[] = { 5, 4 };
  cairo_save (pen->cr);
  ant_pen_colour (pen, ANT_ROLE_CURVE);
  cairo_set_line_width (pen->cr, pen->theme->trace_px);
  if (disc->uncertain)
    cairo_set_dash (pen->cr, dashes, 2, 0);
  cairo_new_path (pen->cr);
  for (size_t i = 0; i < disc->n; i++)
    cairo_line_to (pen->cr, x_of (place, disc->east[i]), y_of (place, disc->north[i]));
  cairo_stroke (pen->cr);
  cairo_restore (pen->cr);
}

/* Where the body is at a part of its way. */
static void
body_at (const AntSunDisc *disc, double part, double *east, double *north)
{
  double at = CLAMP (part, 0, 1) * (double) (disc->n - 1);
  size_t i = MIN ((size_t) at, disc->n - 2);
  double rest = at - (double) i;
  *east = disc->east[i] + rest * (disc->east[i + 1] - disc->east[i]);
  *north = disc->north[i] + rest * (disc->north[i + 1] - disc->north[i]);
}

/* The body at one mark: an outline at contacts, filled at the greatest phase; its number beside it, away from the middle. */
static void
draw_mark (AntPen *pen, const Place *place, const AntSunDisc *disc, int mark, AntLabelField *field)
{
  static const char *const names[ANT_SUN_DISC_MARKS] = { "I", "II", "III", "IV", NULL };
  double east, north;
  if (!isfinite (disc->mark[mark]))
    return;
  body_at (disc, disc->mark[mark], &east, &north);
  double x = x_of (place, east), y = y_of (place, north), radius = MAX (disc->radius_ratio * place->radius, LEAST_BODY_PX);
  circle (pen, x, y, radius);
  ant_pen_colour (pen, ANT_ROLE_TEXT);
  cairo_set_line_width (pen->cr, 1.2);
  if (!names[mark])
    cairo_fill (pen->cr);
  else
    {
      cairo_stroke (pen->cr);
      double off = MIN (radius, 8) + 4, side = x < place->x ? 0 : 1;
      const AntAnchor anchor[] = { { x, y - off, 0.5, 1 }, { x, y + off, 0.5, 0 }, { x + (side > 0 ? off : -off), y, 1 - side, 0.5 },
                                   { x + (side > 0 ? -off : off), y, side, 0.5 } };
      ant_labels_place (field, pen, names[mark], ANT_TEXT_SMALL, G_N_ELEMENTS (anchor), anchor);
    }
}

static void
draw_directions (AntPen *pen, const AntBox *box, const Place *place)
{
  ant_pen_colour (pen, ANT_ROLE_QUIET);
  ant_pen_text (pen, _("N"), ANT_TEXT_SMALL, place->x, MAX (box->y + 2, place->y - place->radius - 3), 0.5,
                place->y - place->radius - 3 > box->y + pen->theme->font_px ? 1 : 0);
  ant_pen_text (pen, _("E"), ANT_TEXT_SMALL, MAX (box->x + 2, place->x - place->radius - 4), place->y,
                place->x - place->radius - 4 > box->x + pen->theme->font_px ? 1 : 0, 0.5);
}

void
ant_sun_disc_paint (cairo_t *cr, const AntBox *box, const AntSunDisc *disc, const AntTheme *theme, double scale)
{
  AntPen pen;
  Place place = fit (box, disc, theme);
  g_autofree AntLabelField *field = g_new (AntLabelField, 1);
  ant_pen_begin (&pen, cr, theme, scale);
  ant_pen_colour (&pen, ANT_ROLE_PAPER);
  ant_pen_fill_box (&pen, box);
  ant_pen_clip (&pen, box);
  draw_sun (&pen, &place);
  draw_directions (&pen, box, &place);
  draw_way (&pen, &place, disc);
  ant_labels_begin (field, box);
  for (int mark = 0; mark < ANT_SUN_DISC_MARKS; mark++)
    draw_mark (&pen, &place, disc, mark, field);
  cairo_restore (cr);
  ant_pen_end (&pen);
}
