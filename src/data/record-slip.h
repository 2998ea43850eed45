/* record-slip.h - stamps that wander slowly against a record's even grid, as those brought to the barycentre do: how far they are from
 * it, and times found on the grid told by the stamps again. */
#pragma once

#include "data/cadence.h"
#include "data/row-order.h"
#include "search/dip.h"

/* Rows have places. Fills record->slip_d if some times lie a quarter step or more from the grid and neighbours wander together;
 * else it stays NULL. Inside the data room only. */
void ant_record_find_slip (AntRecord *record, const AntRowOrder *order, const AntCadence *cadence);
/* How much later than the grid's time the stamps around it are, days; 0 where the record keeps step. */
double ant_record_slip (const AntRecord *record, double grid_d);
/* A dip that was measured on the grid, by the stamps: its middle, and its length where the clock changes during it. */
void ant_record_unslip (const AntRecord *record, size_t n, AntDip *dip);
