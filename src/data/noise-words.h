/* noise-words.h - a scan's noise in words: what the model of a piece consists of, and how well it holds. */
#pragma once

#include "data/dip-words.h"
#include "data/scan-results.h"

/* One fact for each part: its rms and its time; then white noise. Caller unrefs. */
GPtrArray *ant_noise_part_facts (const AntNoiseModel *model);
/* Innovations, spikes, refits, chance and what the scan said. */
GPtrArray *ant_noise_health_facts (const AntScanResults *results, gsize chunk);
/* "Piece 2: 2041-03-03 to 2041-06-01". Caller frees. */
char *ant_noise_chunk_title (const AntScanResults *results, gsize chunk);
/* "3 dips above SNR 5.1 · 0.02 expected by chance · mirror 0"; "incomplete · ..." after a stop. Caller frees. */
char *ant_scan_headline (const AntScanResults *results);
