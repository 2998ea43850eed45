/* sky-list.h - everything the sky has over one record for one observer, ready to be listed and drawn. Made off the main loop,
 * then immutable and counted, so that a window may show it while the next is made. */
#pragma once

#include <gio/gio.h>
#include "data/observer-choice.h"
#include "data/settings.h"
#include "data/sighting.h"
#include "jobs/layers.h"
#include "plot/dip-closeup.h"
#include "plot/sun-disc.h"

#define ANT_SKY_PATH_POINTS 129

/* What is drawn of one event; arrays inside. */
typedef struct
{
  double east[ANT_SKY_PATH_POINTS], north[ANT_SKY_PATH_POINTS];
  AntSunDisc disc;       /* points into the two above */
  AntSkyCurve curve;
} AntSkyPicture;

typedef struct
{
  AntObserverChoice *choice; /* owned reference */
  double origin_tt_d;        /* TT of the record's time 0 */
  gboolean measured;
  gsize n;
  AntSighting *sighting;     /* [n] by time */
  AntSkyPicture **picture;   /* [n] NULL for the Earth's shadow */
  gint ref_count;
} AntSkyList;

/* Seconds, if it is to measure. NULL with one sentence; G_IO_ERROR_CANCELLED if stopped. */
AntSkyList *ant_sky_list_new (const AntRecord *record, AntObserverChoice *choice, const AntSettings *settings, gboolean measure,
                              GCancellable *cancellable, GError **error);
AntSkyList *ant_sky_list_ref (AntSkyList *list);
void ant_sky_list_unref (AntSkyList *list); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntSkyList, ant_sky_list_unref)

/* The same on a thread; the callback comes on the caller's main context. */
void ant_sky_list_async (AntRecord *record, AntObserverChoice *choice, const AntSettings *settings, gboolean measure,
                         GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data);
AntSkyList *ant_sky_list_finish (GAsyncResult *result, GError **error);

/* The surroundings of an event in the record, with the predicted curve and, if it was measured, that of the measured depth. */
typedef struct
{
  AntDipCloseup closeup; /* its arrays belong to this struct */
  AntShapeLine shape[2];
  double *points, *curve;
} AntSkyCloseup;

AntSkyCloseup *ant_sky_closeup_new (const AntSkyList *list, gsize index, const AntLayers *layers);
void ant_sky_closeup_free (AntSkyCloseup *closeup); /* NULL is fine */
