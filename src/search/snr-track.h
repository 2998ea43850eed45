/* snr-track.h - the dip SNR of one duration against time, for looking at: under the noise models that a scan has fitted to
 * its chunks, the matched filter of one template along the record (search/dip-map.h).
 *
 * Nothing is subtracted: a dip stands at about its final SNR, and its surroundings are pulled up or down by it. An epoch
 * belongs to the chunk whose own part it lies in, as in the scan.
 *
 * Run by driving ant_snr_track_stages () (core/stages.h) with the track as work. */
#pragma once

#include "core/stages.h"
#include "search/chunk.h"
#include "search/template-bank.h"

typedef struct _AntSnrTrack AntSnrTrack;

/* Of dips of one duration, contact I to IV; the bank's own durations are not used. The series' arrays and the chunks are
 * borrowed and must outlive the track. */
AntSnrTrack *ant_snr_track_new (const AntSeries *series, const AntBankOptions *bank, double least_coverage,
                                double duration_d, size_t n_chunks, const AntChunk *chunk, AntStatus *status);
void ant_snr_track_free (AntSnrTrack *track); /* NULL is fine */
const AntStages *ant_snr_track_stages (void);
/* [series->n] SNR of the dip with its middle at each place, read between middles half an edge apart; NaN where too little
 * of it is observed. Valid after the last stage. */
const float *ant_snr_track_snr (const AntSnrTrack *track);
