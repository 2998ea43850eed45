/* csv.h - the pieces of a comma-separated table: quoted fields, numbers that know no locale, comment lines. */
#pragma once

#include <glib.h>
#include "data/record.h"

/* Append a field as it is, or in quotes with quotes doubled if it holds a comma, a quote or a line end (RFC 4180), or
 * begins like a comment. */
void ant_csv_text (GString *table, const char *text);
/* Append a number by one printf format of a double; nothing if it is not finite. */
void ant_csv_number (GString *table, const char *format, double number);
/* Append "# " and a formatted line; line ends inside become blanks. */
void ant_csv_comment (GString *table, const char *format, ...) G_GNUC_PRINTF (2, 3);
/* The comment lines that open every table: what it is, program and version, record, SHA-256, time scale and place. The
 * same record gives the same bytes: no date of writing. */
void ant_csv_preamble (GString *table, const char *title, const AntRecord *record);
