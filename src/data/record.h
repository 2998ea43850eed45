/* record.h - an irradiance record: the rows as read, why each is in or out, and the grid the numbers are worked on.
 *
 * A reader fills the rows (ant_record_new ... ); ant_record_make_grid judges every row, sets flags and lays the good
 * ones on a uniform grid. Plain reference-counted data: immutable once gridded, shared freely between threads. */
#pragma once

#include <glib.h>
#include "data/column.h"
#include "data/time-reference.h"
#include "core/span.h"
#include "noise/series.h"
#include "sky/observer.h"

/* Why a row is left out (bits; 0 = used). ANT_FLAG_SPIKE alone still means searched. */
typedef enum
{
  ANT_FLAG_FILL = 1 << 0,      /* fill value, empty or not a number */
  ANT_FLAG_QUALITY = 1 << 1,   /* the record's own quality says bad */
  ANT_FLAG_DUPLICATE = 1 << 2, /* a second row at the time of an earlier one */
  ANT_FLAG_HAND = 1 << 3,      /* masked by the analyst */
  ANT_FLAG_EXCLUDED = 1 << 4,  /* inside an excluded span, or outside --from/--to */
  ANT_FLAG_DARK = 1 << 5,      /* dark or covered: far from the running median (eclipse, night, shutter) */
  ANT_FLAG_SPIKE = 1 << 6,     /* isolated outlier: out of the noise fit, still searched */
  ANT_FLAG_NO_TIME = 1 << 7,   /* its time cannot be read */
} AntFlag;
#define ANT_N_FLAGS 8
const char *ant_flag_name (unsigned bit_index);        /* "fill", "quality" ... */
const char *ant_flag_description (unsigned bit_index); /* one translated sentence */

/* Where irradiances stand: as the instrument saw them, or as they would be 1 au from the Sun. */
typedef enum { ANT_DISTANCE_UNKNOWN, ANT_DISTANCE_OBSERVER, ANT_DISTANCE_ONE_AU } AntDistance;
/* What is to be made of that; values of the setting distance. */
typedef enum { ANT_DISTANCE_AS_IS, ANT_DISTANCE_TO_ONE_AU, ANT_DISTANCE_TO_OBSERVER } AntDistanceWish;

typedef enum { ANT_AT_UNKNOWN, ANT_AT_START, ANT_AT_MIDDLE, ANT_AT_END } AntStampPlace;

typedef struct
{
  /* The rows as read; arrays [n_rows], owned; error and quality may be NULL. */
  gsize n_rows;
  double *time_d;   /* elapsed days from time.origin, as stamped; NaN where unreadable */
  double *value;    /* in value_unit; NaN where fill */
  double *error;    /* 1 sigma in value_unit */
  gint64 *quality;  /* the file's own flags */
  guint32 *line;    /* line or row number in the file, from 1 */
  guint16 *flags;   /* AntFlag bits */

  char *path;       /* as given; "-" for standard input */
  char *sha256;     /* of the bytes as stored */
  char *format;     /* "text", "FITS", ... */
  char *part;       /* which part of the file, "HDU 1 (FLUXES)"; NULL where the file is one table of text lines */
  char *time_name, *value_name, *error_name, *quality_name; /* column names or "column 3"; NULL if absent */
  char *value_unit; /* "W/m2", "relative", or NULL if unknown */
  char *value_remark; /* what the file says of the value beside its name, or NULL */
  AntTimeReference time;
  GPtrArray *columns; /* AntColumn*: the file's other numbers, in its order; empty if there are none */
  GPtrArray *said;  /* char*: what the reader and the grid assumed or found, one sentence each */

  /* Set by ant_record_make_grid. */
  double median;        /* value that 0 ppm stands for */
  AntDistance distance; /* where the values stand now */
  double swing, swing_sigma; /* so much of the yearly swing of 6.9 % by the Earth's distance was in them as read: 1 at the
                                observer's distance, 0 at 1 au; NaN where it cannot be told */
  double cadence_d;     /* fitted slope of time against index */
  double exposure_d;    /* boxcar of one sample */
  gboolean exposure_known;
  AntStampPlace stamp;  /* what the stamps mark; unknown counts as middle */
  AntSeries series;     /* arrays owned by the record; times are middles of exposures */
  gint64 *place;        /* [n_rows] grid place of each row, -1 if it has none */
  float *slip_d;        /* [series.n] stamp less grid time where stamps wander slowly off the grid (record-slip.h); else NULL */
  GArray *dark_spans;   /* of AntSpan: dark or covered */
  GArray *gaps;         /* of AntSpan: runs of missing places longer than one */
  gint ref_count;
} AntRecord;

AntRecord *ant_record_new (void);          /* ref_count 1 */
AntRecord *ant_record_ref (AntRecord *record);
void ant_record_unref (AntRecord *record); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntRecord, ant_record_unref)
/* Add a sentence to what was said. Takes a printf format. */
void ant_record_say (AntRecord *record, const char *format, ...) G_GNUC_PRINTF (2, 3);

/* What record->line counts: "line 7" of a text, "row 7" of other tables; "lines 7 to 9". Caller frees. */
char *ant_record_row_text (const AntRecord *record, guint32 line);
char *ant_record_rows_text (const AntRecord *record, guint32 first, guint32 last);
/* Set *error (ANT_ERROR_READ) to "path: sentence", or "path: part: sentence"; returns FALSE. */
gboolean ant_record_refuse (const AntRecord *record, GError **error, const char *format, ...) G_GNUC_PRINTF (3, 4);

typedef struct
{
  double dark_fraction;     /* 0.01: farther than this from the running 5-day median is dark or covered */
  double exposure_d;        /* 0 = unknown: the cadence is used */
  AntStampPlace stamp;
  double cadence_d;         /* 0 = found from the times */
  gboolean quality_is_list; /* good_values holds the good ones; else good = (quality & good_mask) == 0 */
  GArray *good_values;      /* of gint64, or NULL: only 0 is good */
  gint64 good_mask;         /* 0 with good_values NULL: good = 0 */
  double distance;          /* an AntDistanceWish */
  double no_doppler;        /* nonzero: convert by the distance alone */
  const AntObserver *observer; /* whose distance; borrowed; NULL: the Earth's centre */
  double from_d, to_d;      /* scan limits, elapsed days; NaN = none */
  GArray *excluded;         /* of AntSpan, or NULL */
  GArray *masked;           /* the same, masked by the analyst */
} AntGridOptions;
#define ANT_GRID_OPTIONS_INIT { .dark_fraction = 0.01, .from_d = NAN, .to_d = NAN }

/* Judge the rows and lay the grid; see docs/data.md for the rules. FALSE with one sentence: fewer than 50 good samples,
 * a constant record, a median that is not the record's usual level (half of it night, say), a cadence that cannot be
 * found. Everything assumed or found is added to `said`. */
gboolean ant_record_make_grid (AntRecord *record, const AntGridOptions *options, GError **error);
/* A further column on the record's grid: means of the rows that share a place, NaN where there is none. The row's flags do not
 * matter: temperatures go on in the dark. Allocated [series.n]; the caller frees. The record must be gridded. */
float *ant_record_column_on_grid (const AntRecord *record, const AntColumn *column);
/* Its name without the folder, "-" for standard input: what tables say, wherever it lies. Caller frees. */
char *ant_record_name (const AntRecord *record);
/* Value on the record's own scale for a level in ppm. */
double ant_record_value (const AntRecord *record, double ppm);
