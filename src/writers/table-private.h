/* table-private.h - what the writers of tables share. */
#pragma once

#include "writers/table.h"

/* A real number with its column's digits; "" where it is not known. Into text[size >= 400]. */
const char *ant_table_digits (const AntTableColumn *column, double number, gsize size, char *text);
/* The record's time scale and clock in the words of FITS and of VOTable, which share most; static. */
const char *ant_table_scale_word (const AntRecord *record, const char *unknown);
const char *ant_table_place_word (const AntRecord *record);

GBytes *ant_table_fits (const AntTable *table, GError **error);
GBytes *ant_table_votable (const AntTable *table);
