/* scan-tables.h - floor.csv, spectrum.csv and chunks.csv: the noise that a scan measured, as tables.
 * Each text is the caller's to free. Chunk 0 stands for the median over all chunks. */
#pragma once

#include "data/scan-results.h"

/* chunk, duration_h, sigma_ppm (1-sigma depth), threshold_ppm, snr_sd (1 if the noise model holds), starts. */
GString *ant_floor_table_text (const AntScanResults *results);
/* chunk, frequency_uhz, measured and model power, and each part of the model, ppm^2/uHz. */
GString *ant_spectrum_table_text (const AntScanResults *results);
/* One row a chunk: its span, how well the model holds, its parameters. */
GString *ant_chunks_table_text (const AntScanResults *results);
