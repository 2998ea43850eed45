/* sky-list.c - predict, draw and measure all events over a record; a thread for it. */
#include "jobs/sky-list.h"

#include "data/time-reference.h"
#include "jobs/sky-job.h"

static void
picture_free (AntSkyPicture *picture)
{
  if (!picture)
    return;
  ant_sky_curve_clear (&picture->curve);
  g_free (picture);
}

static AntSkyPicture *
picture_new (const AntObserverChoice *choice, const AntSettings *settings, const AntSkyEvent *event, GError **error)
{
  AntSkyPicture *picture = g_new0 (AntSkyPicture, 1);
  AntSunDisc *disc = &picture->disc;
  *disc = (AntSunDisc) { .n = ANT_SKY_PATH_POINTS, .east = picture->east, .north = picture->north,
                         .radius_ratio = event->radius_ratio, .uncertain = event->uncertain };
  double span_d = event->end_tt_d - event->start_tt_d;
  for (int i = 0; i < ANT_SUN_DISC_MARKS; i++)
    {
      double at = i < ANT_N_CONTACTS ? event->contact_tt_d[i] : event->greatest_tt_d;
      disc->mark[i] = (at - event->start_tt_d) / span_d;
    }
  if (ant_sky_job_path (choice, settings, event, ANT_SKY_PATH_POINTS, picture->east, picture->north, error)
      && ant_sky_job_curve (choice, settings, event, &picture->curve, error))
    return picture;
  picture_free (picture);
  return NULL;
}

/* Draw and measure each in turn. */
static gboolean
fill (AntSkyList *list, const AntRecord *record, const AntSettings *settings, gboolean measure, GCancellable *cancellable,
      GError **error)
{
  for (gsize i = 0; i < list->n; i++)
    {
      AntSighting *sighting = &list->sighting[i];
      if (g_cancellable_set_error_if_cancelled (cancellable, error))
        return FALSE;
      if (sighting->event.kind != ANT_SKY_SHADOW
          && !(list->picture[i] = picture_new (list->choice, settings, &sighting->event, error)))
        return FALSE;
      if (measure && !ant_sky_job_measure (record, list->choice, settings, sighting, error))
        return FALSE;
    }
  return TRUE;
}

AntSkyList *
ant_sky_list_new (const AntRecord *record, AntObserverChoice *choice, const AntSettings *settings, gboolean measure,
                  GCancellable *cancellable, GError **error)
{
  g_autoptr (GArray) sightings = ant_sky_job_sightings (record, choice, settings, cancellable, error);
  if (!sightings)
    return NULL;
  g_autoptr (AntSkyList) list = g_new0 (AntSkyList, 1);
  list->ref_count = 1;
  list->choice = ant_observer_choice_ref (choice);
  list->origin_tt_d = ant_time_reference_tt_origin (&record->time);
  list->measured = measure;
  list->n = sightings->len;
  list->picture = g_new0 (AntSkyPicture *, list->n);
  list->sighting = (AntSighting *) (gpointer) g_array_free (g_steal_pointer (&sightings), FALSE);
  return fill (list, record, settings, measure, cancellable, error) ? g_steal_pointer (&list) : NULL;
}

AntSkyList *
ant_sky_list_ref (AntSkyList *list)
{
  g_atomic_int_inc (&list->ref_count);
  return list;
}

void
ant_sky_list_unref (AntSkyList *list)
{
  if (!list || !g_atomic_int_dec_and_test (&list->ref_count))
    return;
  for (gsize i = 0; i < list->n; i++)
    picture_free (list->picture[i]);
  g_free (list->picture);
  g_free (list->sighting);
  ant_observer_choice_unref (list->choice);
  g_free (list);
}

typedef struct
{
  AntRecord *record;
  AntObserverChoice *choice;
  AntSettings settings;
  gboolean measure;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;
  ant_record_unref (order->record);
  ant_observer_choice_unref (order->choice);
  g_free (order);
}

static gpointer
run (gpointer data)
{
  g_autoptr (GTask) task = data;
  Order *order = g_task_get_task_data (task);
  GError *error = NULL;
  AntSkyList *list = ant_sky_list_new (order->record, order->choice, &order->settings, order->measure,
                                       g_task_get_cancellable (task), &error);
  if (list)
    g_task_return_pointer (task, list, (GDestroyNotify) ant_sky_list_unref);
  else
    g_task_return_error (task, error);
  return NULL;
}

void
ant_sky_list_async (AntRecord *record, AntObserverChoice *choice, const AntSettings *settings, gboolean measure,
                    GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  Order *order = g_new0 (Order, 1);
  *order = (Order) { ant_record_ref (record), ant_observer_choice_ref (choice), *settings, measure };
  g_task_set_source_tag (task, ant_sky_list_async);
  g_task_set_task_data (task, order, order_free);
  g_thread_unref (g_thread_new ("sky", run, task));
}

AntSkyList *
ant_sky_list_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}
