/* theme.c - the palettes. */
#include "plot/theme.h"
#include <math.h>
#include <stdint.h>

/* 0xRRGGBBAA by role, look and component. */
typedef struct
{
  uint32_t role[ANT_N_ROLES], look[ANT_N_LOOKS], component[ANT_N_COMPONENT_COLOURS];
} Palette;

static const Palette palettes[ANT_N_THEMES] = {
  [ANT_THEME_LIGHT] = {
    { [ANT_ROLE_PAPER] = 0xffffffff, [ANT_ROLE_TEXT] = 0x22282dff, [ANT_ROLE_QUIET] = 0x676d72ff,
      [ANT_ROLE_FRAME] = 0xa9acadff, [ANT_ROLE_GRID] = 0xeeeeecff, [ANT_ROLE_GAP] = 0xebebe8ff,
      [ANT_ROLE_SERIES] = 0x3d8fc4ff, [ANT_ROLE_ENVELOPE] = 0xa3cde6ff, [ANT_ROLE_TRACE] = 0x0060a0ff,
      [ANT_ROLE_BAND] = 0x0072b248, [ANT_ROLE_CURVE] = 0xd55e00ff, [ANT_ROLE_SHAPE] = 0x676d72ff,
      [ANT_ROLE_THRESHOLD] = 0x22282dff, [ANT_ROLE_FLOOR] = 0xe6e6e2ff, [ANT_ROLE_SELECTION] = 0x0072b2ff,
      [ANT_ROLE_WASH] = 0xd55e0018 },
    { [ANT_LOOK_UNDECIDED] = 0x565c61ff, [ANT_LOOK_PLANET] = 0xd55e00ff, [ANT_LOOK_PLANET_SHAPED] = 0xd55e00ff,
      [ANT_LOOK_SPOT] = 0xb3588eff, [ANT_LOOK_ECLIPSE] = 0x0072b2ff, [ANT_LOOK_INSTRUMENT] = 0x00916aff,
      [ANT_LOOK_NOISE] = 0x7c8287ff, [ANT_LOOK_FLARE] = 0xae7600ff },
    { 0x0072b2ff, 0x00916aff, 0xb3588eff, 0xae7600ff, 0x2b8fc7ff, 0x7c8287ff } },
  [ANT_THEME_DARK] = {
    { [ANT_ROLE_PAPER] = 0x1e1f21ff, [ANT_ROLE_TEXT] = 0xeceae6ff, [ANT_ROLE_QUIET] = 0xa5a6a6ff,
      [ANT_ROLE_FRAME] = 0x6a6c6eff, [ANT_ROLE_GRID] = 0x2b2d2fff, [ANT_ROLE_GAP] = 0x303235ff,
      [ANT_ROLE_SERIES] = 0x56b4e9ff, [ANT_ROLE_ENVELOPE] = 0x2c5d79ff, [ANT_ROLE_TRACE] = 0x7cc8f4ff,
      [ANT_ROLE_BAND] = 0x56b4e950, [ANT_ROLE_CURVE] = 0xf08a3cff, [ANT_ROLE_SHAPE] = 0xa5a6a6ff,
      [ANT_ROLE_THRESHOLD] = 0xeceae6ff, [ANT_ROLE_FLOOR] = 0x33363aff, [ANT_ROLE_SELECTION] = 0x56b4e9ff,
      [ANT_ROLE_WASH] = 0xf08a3c26 },
    { [ANT_LOOK_UNDECIDED] = 0xc4c4c2ff, [ANT_LOOK_PLANET] = 0xf08a3cff, [ANT_LOOK_PLANET_SHAPED] = 0xf08a3cff,
      [ANT_LOOK_SPOT] = 0xcc79a7ff, [ANT_LOOK_ECLIPSE] = 0x56b4e9ff, [ANT_LOOK_INSTRUMENT] = 0x14b88bff,
      [ANT_LOOK_NOISE] = 0x8c8f92ff, [ANT_LOOK_FLARE] = 0xf0e442ff },
    { 0x56b4e9ff, 0x14b88bff, 0xcc79a7ff, 0xe69f00ff, 0x3f94ccff, 0x8c8f92ff } },
  [ANT_THEME_CONTRAST] = {
    { [ANT_ROLE_PAPER] = 0xffffffff, [ANT_ROLE_TEXT] = 0x000000ff, [ANT_ROLE_QUIET] = 0x2b2b2bff,
      [ANT_ROLE_FRAME] = 0x000000ff, [ANT_ROLE_GRID] = 0xd6d6d6ff, [ANT_ROLE_GAP] = 0xd9d9d5ff,
      [ANT_ROLE_SERIES] = 0x005a8fff, [ANT_ROLE_ENVELOPE] = 0x8dbfdeff, [ANT_ROLE_TRACE] = 0x00426bff,
      [ANT_ROLE_BAND] = 0x00426b60, [ANT_ROLE_CURVE] = 0xa34700ff, [ANT_ROLE_SHAPE] = 0x2b2b2bff,
      [ANT_ROLE_THRESHOLD] = 0x000000ff, [ANT_ROLE_FLOOR] = 0xd0d0ccff, [ANT_ROLE_SELECTION] = 0x005a8fff,
      [ANT_ROLE_WASH] = 0xa3470026 },
    { [ANT_LOOK_UNDECIDED] = 0x000000ff, [ANT_LOOK_PLANET] = 0xa34700ff, [ANT_LOOK_PLANET_SHAPED] = 0xa34700ff,
      [ANT_LOOK_SPOT] = 0x96406fff, [ANT_LOOK_ECLIPSE] = 0x005a8fff, [ANT_LOOK_INSTRUMENT] = 0x00694cff,
      [ANT_LOOK_NOISE] = 0x4d4d4dff, [ANT_LOOK_FLARE] = 0x7a5200ff },
    { 0x005a8fff, 0x00694cff, 0x96406fff, 0x7a5200ff, 0x00426bff, 0x4d4d4dff } },
  [ANT_THEME_CONTRAST_DARK] = {
    { [ANT_ROLE_PAPER] = 0x000000ff, [ANT_ROLE_TEXT] = 0xffffffff, [ANT_ROLE_QUIET] = 0xdededeff,
      [ANT_ROLE_FRAME] = 0xffffffff, [ANT_ROLE_GRID] = 0x303030ff, [ANT_ROLE_GAP] = 0x383838ff,
      [ANT_ROLE_SERIES] = 0x7cc8f4ff, [ANT_ROLE_ENVELOPE] = 0x2f6a8cff, [ANT_ROLE_TRACE] = 0xb5e2fcff,
      [ANT_ROLE_BAND] = 0x7cc8f460, [ANT_ROLE_CURVE] = 0xffa35cff, [ANT_ROLE_SHAPE] = 0xdededeff,
      [ANT_ROLE_THRESHOLD] = 0xffffffff, [ANT_ROLE_FLOOR] = 0x3d3d3dff, [ANT_ROLE_SELECTION] = 0x7cc8f4ff,
      [ANT_ROLE_WASH] = 0xffa35c40 },
    { [ANT_LOOK_UNDECIDED] = 0xffffffff, [ANT_LOOK_PLANET] = 0xffa35cff, [ANT_LOOK_PLANET_SHAPED] = 0xffa35cff,
      [ANT_LOOK_SPOT] = 0xeea6cbff, [ANT_LOOK_ECLIPSE] = 0x7cc8f4ff, [ANT_LOOK_INSTRUMENT] = 0x3ddcaeff,
      [ANT_LOOK_NOISE] = 0xbdbdbdff, [ANT_LOOK_FLARE] = 0xf0e442ff },
    { 0x7cc8f4ff, 0x3ddcaeff, 0xeea6cbff, 0xffc04dff, 0xb5e2fcff, 0xbdbdbdff } },
};

static AntColour
unpacked (uint32_t code)
{
  return (AntColour) { (code >> 24) / 255.0, ((code >> 16) & 255) / 255.0, ((code >> 8) & 255) / 255.0,
                       (code & 255) / 255.0 };
}

void
ant_theme_init (AntTheme *theme, AntThemeKind kind)
{
  const Palette *palette = &palettes[kind];
  for (int i = 0; i < ANT_N_ROLES; i++)
    theme->role[i] = unpacked (palette->role[i]);
  for (int i = 0; i < ANT_N_LOOKS; i++)
    theme->look[i] = unpacked (palette->look[i]);
  for (int i = 0; i < ANT_N_COMPONENT_COLOURS; i++)
    theme->component[i] = unpacked (palette->component[i]);
  int strong = kind == ANT_THEME_CONTRAST || kind == ANT_THEME_CONTRAST_DARK;
  theme->font = "Sans";
  theme->font_px = 11;
  theme->trace_px = strong ? 2 : 1.5;
}

static double
linear_light (double channel)
{
  return channel <= 0.03928 ? channel / 12.92 : pow ((channel + 0.055) / 1.055, 2.4);
}

static double
luminance (AntColour c)
{
  return 0.2126 * linear_light (c.red) + 0.7152 * linear_light (c.green) + 0.0722 * linear_light (c.blue);
}

double
ant_colour_contrast (AntColour a, AntColour b)
{
  double la = luminance (a), lb = luminance (b);
  return (fmax (la, lb) + 0.05) / (fmin (la, lb) + 0.05);
}
