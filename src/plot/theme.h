/* theme.h - every colour, shape and size of the plots, by what it stands for.
 *
 * The palettes are Okabe & Ito's (2008, Color Universal Design), darkened or lightened where needed so that whatever
 * carries meaning stands at least 3:1 against the paper (text 4.5:1; high contrast 4.5:1 and 7:1), and each kind of dip
 * has a shape of its own: nothing rests on colour alone. */
#pragma once

typedef struct
{
  double red, green, blue, alpha;
} AntColour;

typedef enum
{
  ANT_ROLE_PAPER,
  ANT_ROLE_TEXT,
  ANT_ROLE_QUIET,     /* tick labels, captions */
  ANT_ROLE_FRAME,     /* axis lines and tick marks */
  ANT_ROLE_GRID,
  ANT_ROLE_GAP,       /* nothing observed */
  ANT_ROLE_SERIES,    /* samples, standing alone */
  ANT_ROLE_ENVELOPE,  /* samples behind their averages */
  ANT_ROLE_TRACE,     /* averages, the measured thing */
  ANT_ROLE_BAND,      /* their error; translucent */
  ANT_ROLE_CURVE,     /* a fitted curve */
  ANT_ROLE_SHAPE,     /* a rival shape */
  ANT_ROLE_THRESHOLD,
  ANT_ROLE_FLOOR,     /* area below the noise floor */
  ANT_ROLE_SELECTION, /* ring, edge of the view box */
  ANT_ROLE_WASH,      /* behind the selected dip; translucent */
  ANT_N_ROLES,
} AntRole;

/* What a dip is taken for decides its shape and colour. */
typedef enum
{
  ANT_LOOK_UNDECIDED,     /* open diamond */
  ANT_LOOK_PLANET,        /* disc */
  ANT_LOOK_PLANET_SHAPED, /* ring */
  ANT_LOOK_SPOT,          /* triangle on its point */
  ANT_LOOK_ECLIPSE,       /* half disc */
  ANT_LOOK_INSTRUMENT,    /* square */
  ANT_LOOK_NOISE,         /* cross */
  ANT_LOOK_FLARE,         /* triangle on its base */
  ANT_N_LOOKS,
} AntDipLook;

#define ANT_N_COMPONENT_COLOURS 6

typedef struct
{
  AntColour role[ANT_N_ROLES];
  AntColour look[ANT_N_LOOKS];
  AntColour component[ANT_N_COMPONENT_COLOURS]; /* noise components in turn, with dashes of their own */
  const char *font; /* family; borrowed */
  double font_px;   /* of labels; captions are a little smaller */
  double trace_px;  /* width of the lines that matter */
} AntTheme;

typedef enum
{
  ANT_THEME_LIGHT,
  ANT_THEME_DARK,
  ANT_THEME_CONTRAST,
  ANT_THEME_CONTRAST_DARK,
  ANT_N_THEMES,
} AntThemeKind;

/* A theme to start from; font and sizes may be changed in the copy. */
void ant_theme_init (AntTheme *theme, AntThemeKind kind);
/* Contrast of two opaque colours, 1 to 21 (WCAG 2.1, relative luminance). */
double ant_colour_contrast (AntColour a, AntColour b);
