/* style.h - the window's own style sheet and icons. */
#pragma once

/* Put them on the default display, which must be open. Once in each program that shows the window, tests included. */
void ant_style_install (void);
