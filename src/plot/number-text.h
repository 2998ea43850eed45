/* number-text.h - numbers as people read them on paper: a true minus sign, thousands parted by a thin space. */
#pragma once

#include <stddef.h>

#define ANT_THIN_SPACE "\342\200\211"
#define ANT_MINUS "\342\210\222"

/* Into text[size >= 48] in the decimal style of the locale; thousands are parted from 10 000 up. */
void ant_plot_number_text (double value, int decimals, size_t size, char *text);
/* A power of ten: "0.01" to "1000" in full, beyond as 10 with a raised exponent. */
void ant_power_text (int exponent, size_t size, char *text);
