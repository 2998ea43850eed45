/* study-verdict.c - what verdicts are worth: records with events of known cause sent through the whole search and judged.
 * Arguments: first seed, records, cadence in seconds. Record r has noise model A, B or C and the L1 or the low-orbit mask in turn.
 * Target star, rates as the events are planted. One line per judged dip:
 *   model mask truth SNR edges shape P(each cause of shape) cause P(cause) P(each rival) middle length expected_false
 *   and what the shape is called (7: undecided) */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include "jobs/pool.h"
#include "population.h"
#include "search/scan.h"
#include "verdict/verdict-work.h"

#define THRESHOLD 4.7 /* low, so that noise is among what is judged */
#define NEAR_D 0.25 /* a dip that begins or ends this near an event is of its making */

/* Rates that the planted shares amount to, over the whole range of depths that the priors allow. */
static AntCauseRates
planted_rates (double snr_low, double snr_high)
{
  double per_year = 365.25 * ANT_POPULATION_EVENTS / ANT_POPULATION_DAYS
                    * log (ANT_PRIOR_DEPTH_HIGH_PPM / ANT_PRIOR_DEPTH_LOW_PPM) / log (snr_high / snr_low);
  AntCauseRates rates = { { 0 } };
  const double *share = ant_truth_share;
  rates.per_year[ANT_CAUSE_PLANET] = per_year * share[ANT_TRUTH_CROSSING];
  rates.per_year[ANT_CAUSE_SPOT] = per_year * share[ANT_TRUTH_SPOT];
  rates.per_year[ANT_CAUSE_ECLIPSE] = per_year * share[ANT_TRUTH_ECLIPSE];
  rates.per_year[ANT_CAUSE_INSTRUMENT] = per_year * (share[ANT_TRUTH_STEP] + share[ANT_TRUTH_RECOVERY] + share[ANT_TRUTH_SPIKE]
                                                     + share[ANT_TRUTH_THERMAL] + share[ANT_TRUTH_GAP_EDGE]);
  rates.per_year[ANT_CAUSE_FLARE] = 1;
  rates.per_year[ANT_CAUSE_PLANET_SHAPED] = 1;
  return rates;
}

/* What made a dip: the event that it lies on. */
static AntTruth
truth_of (const AntDip *dip, const AntPlantedEvent *event)
{
  for (size_t k = 0; k < ANT_POPULATION_EVENTS; k++)
    {
      int contacts = event[k].truth == ANT_TRUTH_CROSSING || event[k].truth == ANT_TRUTH_ECLIPSE;
      double reach_d = 0.5 * dip->duration_d + (contacts ? 0 : NEAR_D);
      if (dip->mid_d > event[k].from_d - reach_d && dip->mid_d < event[k].to_d + reach_d)
        return event[k].truth;
    }
  return ANT_TRUTH_NOISE;
}

static void
print_verdict (char model, AntMask mask, AntTruth truth, const AntDip *dip, const AntVerdict *verdict)
{
  printf ("%c %s %s %.3f %s %d", model, mask == ANT_MASK_L1 ? "l1" : "low-orbit", truth == ANT_TRUTH_GAP_EDGE ? "gap-edge" : ant_truth_name[truth],
          dip->snr, ant_edges_text (dip->edges), verdict->shape);
  for (int cause = 0; cause < ANT_N_CAUSES; cause++)
    printf (" %.4f", verdict->shape_probability[cause]);
  printf (" %d", verdict->cause);
  for (int cause = 0; cause < ANT_N_CAUSES; cause++)
    printf (" %.4f", verdict->probability[cause]);
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    printf (" %.2f:%.2f", verdict->rival[kind].log_gain, verdict->rival[kind].log_evidence);
  printf (" %.3f %.2f %.4f", dip->mid_d, dip->duration_d * 24, dip->expected_false);
  printf (" %d", ant_verdict_named (verdict, verdict->shape, verdict->shape_probability[verdict->shape]));
  printf ("\n");
  fflush (stdout);
}

int
main (int argc, char **argv)
{
  if (argc < 4)
    return 2;
  unsigned long seed = strtoul (argv[1], NULL, 10);
  size_t records = (size_t) atol (argv[2]);
  double step_d = atof (argv[3]) / 86400, snr_low = 7, snr_high = 100;
  size_t n = (size_t) (ANT_POPULATION_DAYS / step_d);
  float *value = malloc (n * sizeof *value);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  options.threshold_snr = THRESHOLD;
  for (size_t r = 0; r < records; r++)
    {
      AntStatus status;
      AntPlantedEvent event[ANT_POPULATION_EVENTS];
      char model = "ABC"[r % 3];
      AntMask mask = r / 3 % 2 ? ANT_MASK_LOW_ORBIT : ANT_MASK_L1;
      AntSeries series = ant_population_record (model, mask, n, step_d, seed + r, snr_low, snr_high, value, event);
      AntScan *scan = ant_scan_new (&series, &options, &status);
      if (!scan || ant_pool_run (ant_scan_stages (), scan, 1, NULL, NULL, NULL))
        return 1;
      AntVerdictInput input = { .series = &series, .exposure_d = step_d, .limb_darkening = ANT_LIMB_DARKENING_SUN,
                                .options = { .target_star = 1, .rates = planted_rates (snr_low, snr_high) } };
      input.n_chunks = ant_scan_chunks (scan, &input.chunk);
      input.n_dips = ant_scan_dips (scan, &input.dip);
      input.n_brightenings = ant_scan_brightenings (scan, &input.brightening);
      AntVerdictWork *work = ant_verdict_work_new (&input, &status);
      if (!work || ant_pool_run (ant_verdict_work_stages (), work, 1, NULL, NULL, NULL))
        return 1;
      for (size_t i = 0; i < input.n_dips; i++)
        print_verdict (model, mask, truth_of (&input.dip[i], event), &input.dip[i], &ant_verdict_work_dips (work)[i]);
      ant_verdict_work_free (work);
      ant_scan_free (scan);
    }
  free (value);
  return 0;
}
