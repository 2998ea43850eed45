/* plain-text.h - numbers and lengths of time as sentences for people write them, the same in every locale. */
#pragma once

#include <glib.h>

#define ANT_N_NUMBER_TEXT 32

/* printf of one double by one format such as "%.6g"; returns text. */
char *ant_number_text (char text[ANT_N_NUMBER_TEXT], const char *format, double number);
/* A length of time in the unit that suits it: "50 s", "29.4 min", "1 h", "27.3 d". Caller frees. */
char *ant_length_text (double length_d);
