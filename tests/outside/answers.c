/* answers.c - answers questions about numbers, one a line on standard input, with the program's own functions: the scripts
 * beside it hold the answers against general libraries. Doubles are written so that they read back to the bit.
 *
 *   robust Q VALUES...                    median, 1.4826 MAD, quantile Q, biweight location (6), scale (9), midvariance (9)
 *   spectrum STEP VALUES...               bins_per_octave 6: frequency, power, independent ordinates of every bin
 *   convert FROM TO JD1 JD2               the instant in another scale, two numbers
 *   calendar SCALE Y M D H MIN S          its JD, two numbers
 *   number TEXT                           its value and how many characters it took; "none"
 *   record PATH HDU VALUE                 scale and JD (two numbers) of time 0, then elapsed days and value of every row;
 *                                         "-" for what the reader is to find
 *   gls WHITE STEP PARTS (KIND RMS TIME QUALITY)... FIRST LENGTH VALUES...
 *                                         box of unit depth at FIRST: energy, moment; ln likelihood of the values
 *   train N PERIOD MID DURATION (PLACE VALUE ERROR)...
 *                                         a train of boxes on N places in white noise: depth, its error, SNR
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include "core/robust.h"
#include "noise/spectrum.h"
#include "noise/whitener.h"
#include "readers/number-cursor.h"
#include "search/repeat-train.h"
#include "readers/reader.h"
#include "sky/time-scale.h"

static char *cursor; /* in the line that is being answered */

static const char *
next_word (void)
{
  char *word = strtok_r (NULL, " \n", &cursor);
  return word ? word : "";
}

static double
next_number (void)
{
  return strtod (next_word (), NULL);
}

/* The rest of the line as numbers. */
static double *
rest (size_t *n)
{
  size_t room = 16;
  double *value = malloc (room * sizeof *value);
  *n = 0;
  for (const char *word = next_word (); *word; word = next_word ())
    {
      if (*n == room)
        value = realloc (value, (room *= 2) * sizeof *value);
      value[(*n)++] = strtod (word, NULL);
    }
  return value;
}

static AntSeries
as_series (double step_d, size_t n, const double *value)
{
  float *ppm = malloc (n * sizeof *ppm);
  for (size_t i = 0; i < n; i++)
    ppm[i] = (float) value[i];
  return (AntSeries){ .n = n, .step_d = step_d, .value_ppm = ppm };
}

static void
answer_robust (void)
{
  size_t n;
  double q = next_number (), *value = rest (&n), *work = malloc ((n + 1) * sizeof *work);
  printf ("%.17g %.17g %.17g", ant_median (n, value, work), ant_mad_sigma (n, value, work), ant_quantile (n, value, q, work));
  printf (" %.17g %.17g %.17g\n", ant_biweight_location (n, value, 6, work), ant_biweight_scale (n, value, 9, work),
          ant_biweight_midvariance (n, value, 9, work));
  free (value);
  free (work);
}

static void
answer_spectrum (void)
{
  size_t n;
  double step_d = next_number (), *value = rest (&n);
  AntSeries series = as_series (step_d, n, value);
  AntSpectrum *spectrum = ant_spectrum_new (&series, 6, NULL);
  for (size_t b = 0; spectrum && b < ant_spectrum_bins (spectrum); b++)
    printf ("%s%.17g %.17g %.17g", b ? " " : "", ant_spectrum_frequency_cd (spectrum)[b], ant_spectrum_power (spectrum)[b],
            ant_spectrum_ordinates (spectrum)[b]);
  printf ("\n");
  ant_spectrum_free (spectrum);
  free ((void *) (size_t) series.value_ppm);
  free (value);
}

static void
answer_convert (void)
{
  AntTimeScale from = ant_time_scale_from_name (next_word ()), to = ant_time_scale_from_name (next_word ());
  double jd1 = next_number (), jd2 = next_number (), out1, out2;
  if (ant_time_convert (from, jd1, jd2, to, &out1, &out2))
    printf ("refused\n");
  else
    printf ("%.17g %.17g\n", out1, out2);
}

static void
answer_calendar (void)
{
  AntTimeScale scale = ant_time_scale_from_name (next_word ());
  int field[5];
  double jd1, jd2;
  for (int i = 0; i < 5; i++)
    field[i] = (int) next_number ();
  double second = next_number ();
  if (ant_time_from_calendar (scale, field[0], field[1], field[2], field[3], field[4], second, &jd1, &jd2))
    printf ("refused\n");
  else
    printf ("%.17g %.17g\n", jd1, jd2);
}

static void
answer_number (void)
{
  char text[2000];
  double value;
  snprintf (text, sizeof text, "%s\n", next_word ());
  const char *end = ant_number_read (text, &value);
  if (end)
    printf ("%a %d\n", value, (int) (end - text));
  else
    printf ("none\n");
}

static void
answer_gls (void)
{
  AntNoiseModel model = { .error_scale = 1 };
  model.white_ppm = next_number ();
  double step_d = next_number (), energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES], likelihood;
  model.n_parts = (size_t) next_number ();
  for (size_t i = 0; i < model.n_parts; i++)
    {
      model.part[i].kind = strcmp (next_word (), "oscillator") ? ANT_EXPONENTIAL : ANT_OSCILLATOR;
      model.part[i].rms_ppm = next_number ();
      model.part[i].time_d = next_number ();
      model.part[i].quality = next_number ();
    }
  ptrdiff_t first = (ptrdiff_t) next_number ();
  size_t length = (size_t) next_number (), n;
  double *value = rest (&n), *z = malloc (n * sizeof *z), *box = malloc (length * ANT_LANES * sizeof *box);
  AntSeries series = as_series (step_d, n, value);
  AntStatus status;
  AntWhitener *whitener = ant_whitener_new (&model, &series, &status);
  for (size_t j = 0; j < length * ANT_LANES; j++)
    box[j] = -1;
  if (whitener && !ant_whitener_solve (whitener, series.value_ppm, z) && !ant_noise_log_likelihood (&model, &series, &likelihood))
    {
      ant_whitener_energies (whitener, z, first, length, box, energy, moment, weight);
      printf ("%.17g %.17g %.17g\n", energy[0], moment[0], likelihood);
    }
  else
    printf ("refused\n");
  ant_whitener_free (whitener);
  free ((void *) (size_t) series.value_ppm);
  free (value);
  free (z);
  free (box);
}

static void
answer_record (void)
{
  AntReadingChoices choices = { 0 };
  const char *path = next_word (), *hdu = next_word (), *value = next_word ();
  if (strcmp (hdu, "-"))
    choices.hdu = g_strdup (hdu);
  if (strcmp (value, "-"))
    choices.value_column = g_strdup (value);
  AntRecord *record = ant_reader_open (path, &choices, NULL, NULL);
  if (record)
    printf ("%s %.17g %.17g", ant_time_scale_name (record->time.scale), record->time.origin_jd1, record->time.origin_jd2);
  else
    printf ("refused");
  for (gsize i = 0; record && i < record->n_rows; i++)
    printf (" %.17g %.17g", record->time_d[i], record->value[i]);
  printf ("\n");
  ant_record_unref (record);
  ant_reading_choices_clear (&choices);
}

static void
answer_train (void)
{
  size_t n = (size_t) next_number (), count;
  double period = next_number (), mid = next_number (), duration = next_number (), *value = rest (&count);
  AntTrainTrial trial = { .period = period, .mid = mid, .duration = duration };
  float *ppm = malloc (n * sizeof *ppm);
  double *weight = calloc (n, sizeof *weight);
  for (size_t i = 0; i < n; i++)
    ppm[i] = NAN;
  for (size_t k = 0; k + 2 < count; k += 3)
    {
      ppm[(size_t) value[k]] = (float) value[k + 1];
      weight[(size_t) value[k]] = 1 / (value[k + 2] * value[k + 2]);
    }
  AntSeries series = { .n = n, .step_d = 1, .value_ppm = ppm };
  AntRepeatBox box;
  AntTrainSums sums;
  if (ant_repeat_box_init (&box, &series, weight))
    printf ("none\n");
  else
    {
      AntRepeatTrain train = { .box = &box, .n = n };
      ant_repeat_train_sums (&train, &trial, &sums);
      printf ("%.17g %.17g %.17g\n", sums.depth, sums.depth / sums.snr, sums.snr);
      ant_repeat_box_clear (&box);
    }
  free (ppm);
  free (weight);
  free (value);
}

int
main (void)
{
  static const struct
  {
    const char *word;
    void (*answer) (void);
  } questions[] = { { "robust", answer_robust },     { "spectrum", answer_spectrum }, { "convert", answer_convert },
                    { "calendar", answer_calendar }, { "number", answer_number },     { "gls", answer_gls },
                    { "record", answer_record },     { "train", answer_train } };
  char *line = NULL;
  size_t room = 0;
  while (getline (&line, &room, stdin) > 0)
    {
      const char *word = strtok_r (line, " \n", &cursor);
      size_t i = 0, n = sizeof questions / sizeof *questions;
      while (i < n && (!word || strcmp (questions[i].word, word)))
        i++;
      if (i == n)
        return 2;
      questions[i].answer ();
    }
  free (line);
  return 0;
}
