/* test-sky-job.c - the sky over a record: its own time, the lane held, a predicted crossing measured without bias. */
#include <math.h>

#include "core/units.h"
#include "jobs/sky-job.h"
#include "mercury.h"
#include "models.h"

#define STEP_D (300 / ANT_SECONDS_PER_DAY)
#define N ((gsize) (12 / STEP_D))
#define MID_D 6.13
#define SEEDS 24

/* A record of 12 days with the crossing of 2019-11-11 in it, greatest at MID_D of its own time. */
static AntRecord *
record_with_mercury (unsigned long seed, double ideal_snr, double *depth_ppm)
{
  AntRecord *record = ant_record_new ();
  double loss[200];
  float *value = g_new (float, N);
  ptrdiff_t first;
  record->series = ant_study_record ('A', ANT_MASK_L1, N, STEP_D, seed, value);
  record->exposure_d = record->cadence_d = STEP_D;
  record->path = g_strdup ("drawn.txt");
  gsize n = ant_study_mercury (&record->series, MID_D, &first, G_N_ELEMENTS (loss), loss);
  *depth_ppm = ant_study_depth_of_snr ('A', &record->series, first, n, loss, ideal_snr);
  for (gsize i = 0; i < n; i++)
    value[(gsize) first + i] -= (float) (*depth_ppm * loss[i]);
  /* 2019-11-11T15:20:57.27 TT is MID_D: time 0 is 2019-11-05T12:12:33.1 UTC. */
  record->time.scale = ANT_SCALE_TT;
  record->time.origin_known = TRUE;
  record->time.origin_jd1 = 2458799;
  record->time.origin_jd2 = (15 + 20 / 60.0 + 57.27 / 3600) / 24 - 0.5 - MID_D;
  return record;
}

typedef struct
{
  AntSettings settings;
  AntObserverChoice *choice;
} Fixture;

static void
set_up (Fixture *f, gconstpointer unused)
{
  ant_settings_init (&f->settings);
  f->choice = ant_observer_choice_new_earth ();
}

static void
tear_down (Fixture *f, gconstpointer unused)
{
  ant_observer_choice_unref (f->choice);
}

static AntSighting
only_sighting (Fixture *f, const AntRecord *record)
{
  g_autoptr (GError) error = NULL;
  g_autoptr (GArray) sightings = ant_sky_job_sightings (record, f->choice, &f->settings, NULL, &error);
  g_assert_no_error (error);
  g_assert_cmpuint (sightings->len, ==, 1);
  return g_array_index (sightings, AntSighting, 0);
}

static void
events_come_in_the_records_own_time (Fixture *f, gconstpointer unused)
{
  double depth_ppm;
  g_autoptr (AntRecord) record = record_with_mercury (1, 4, &depth_ppm);
  AntSighting sighting = only_sighting (f, record);
  g_assert_cmpint (sighting.event.body, ==, ANT_BODY_MERCURY);
  g_assert_cmpfloat_with_epsilon ((sighting.greatest_d - MID_D) * ANT_SECONDS_PER_DAY, 0, 1);
  /* Contacts I and IV by DE405, 12:36:36.35 and 18:05:23.43 TT, as seconds from the greatest phase. */
  g_assert_cmpfloat_with_epsilon ((sighting.contact_d[ANT_CONTACT_1] - MID_D) * ANT_SECONDS_PER_DAY, -9860.92, 1);
  g_assert_cmpfloat_with_epsilon ((sighting.contact_d[ANT_CONTACT_4] - MID_D) * ANT_SECONDS_PER_DAY, 9866.16, 1);
  g_assert_cmpint (sighting.shown, ==, ANT_SHOWN_UNKNOWN);
}

/* The quick form of study-crossing: within what 24 records of ideal SNR 4 tell. */
static void
a_faint_crossing_is_measured_without_bias (Fixture *f, gconstpointer unused)
{
  double sum = 0, squares = 0;
  unsigned measured = 0;
  for (unsigned long seed = 0; measured < SEEDS; seed++)
    {
      double depth_ppm;
      g_autoptr (AntRecord) record = record_with_mercury (82000 + seed, 4, &depth_ppm);
      g_autoptr (GError) error = NULL;
      AntSighting sighting = only_sighting (f, record);
      g_assert_true (ant_sky_job_measure (record, f->choice, &f->settings, &sighting, &error));
      g_assert_cmpuint (seed, <, 2 * SEEDS);
      if (sighting.shown == ANT_SHOWN_GAP)
        continue;
      double pull = (sighting.measured.depth_ppm - depth_ppm) / sighting.measured.sigma_ppm;
      sum += pull / SEEDS;
      squares += pull * pull / SEEDS;
      measured++;
    }
  g_test_message ("mean pull %.2f, scatter %.2f", sum, sqrt (squares));
  g_assert_cmpfloat_with_epsilon (sum, 0, 3 / sqrt (SEEDS));
  g_assert_cmpfloat_with_epsilon (sqrt (squares), 1, 3 / sqrt (2.0 * SEEDS));
}

static void
a_record_without_origin_is_refused (Fixture *f, gconstpointer unused)
{
  double depth_ppm;
  g_autoptr (AntRecord) record = record_with_mercury (1, 4, &depth_ppm);
  g_autoptr (GError) error = NULL;
  record->time.origin_known = FALSE;
  g_assert_null (ant_sky_job_sightings (record, f->choice, &f->settings, NULL, &error));
  g_assert_nonnull (strstr (error->message, "origin"));
}

static void
a_prediction_can_be_stopped (Fixture *f, gconstpointer unused)
{
  g_autoptr (GCancellable) stop = g_cancellable_new ();
  g_autoptr (GError) error = NULL;
  g_cancellable_cancel (stop);
  g_assert_null (ant_sky_job_predict (f->choice, &f->settings, 0, 36525, stop, &error));
  g_assert_error (error, G_IO_ERROR, G_IO_ERROR_CANCELLED);
}

static gpointer
predict_a_year (gpointer data)
{
  Fixture *f = data;
  return ant_sky_job_predict (f->choice, &f->settings, 7000, 7365, NULL, NULL);
}

/* libnova remembers its last answers: without the lane two threads would mix theirs. */
static void
threads_get_the_same_answers (Fixture *f, gconstpointer unused)
{
  GThread *thread[4];
  g_autoptr (GArray) alone = predict_a_year (f);
  for (gsize i = 0; i < G_N_ELEMENTS (thread); i++)
    thread[i] = g_thread_new ("sky", predict_a_year, f);
  for (gsize i = 0; i < G_N_ELEMENTS (thread); i++)
    {
      g_autoptr (GArray) events = g_thread_join (thread[i]);
      g_assert_cmpuint (events->len, ==, alone->len);
      for (guint k = 0; k < events->len; k++)
        {
          const AntSkyEvent *one = &g_array_index (events, AntSkyEvent, k), *other = &g_array_index (alone, AntSkyEvent, k);
          g_assert_cmpfloat (one->greatest_tt_d, ==, other->greatest_tt_d);
          g_assert_cmpfloat (one->depth_ppm, ==, other->depth_ppm);
        }
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(name, function) g_test_add ("/jobs/sky-job/" name, Fixture, NULL, set_up, function, tear_down)
  TEST ("events-come-in-the-records-own-time", events_come_in_the_records_own_time);
  TEST ("a-faint-crossing-is-measured-without-bias", a_faint_crossing_is_measured_without_bias);
  TEST ("a-record-without-origin-is-refused", a_record_without_origin_is_refused);
  TEST ("a-prediction-can-be-stopped", a_prediction_can_be_stopped);
  TEST ("threads-get-the-same-answers", threads_get_the_same_answers);
  return g_test_run ();
}
