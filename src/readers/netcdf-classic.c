/* netcdf-classic.c - walk the header: dimensions, attributes, variables with their place and size. */
#include "readers/netcdf-classic.h"

#include <string.h>

#define TAG_DIMENSION 10
#define TAG_VARIABLE 11
#define TAG_ATTRIBUTE 12
#define MOST_DIMENSIONS 65536
#define MOST_RANK 1024

typedef struct
{
  const guint8 *bytes;
  gsize n, at;
  guint version;        /* 1, 2 or 5 */
  AntClassic state;
  guint64 *dimension;   /* [n_dimensions]; 0 is the record dimension */
  guint64 n_dimensions;
} Header;

typedef struct
{
  guint64 begin, size; /* of one record, or of all there is */
  gboolean in_records;
} Place;

static void
damaged (Header *header)
{
  if (header->state == ANT_CLASSIC_WHOLE)
    header->state = ANT_CLASSIC_DAMAGED;
}

static guint64
take (Header *header, guint width)
{
  guint64 number = 0;
  if (header->state != ANT_CLASSIC_WHOLE)
    return 0;
  if (header->n - header->at < width)
    {
      header->state = ANT_CLASSIC_LONGER;
      return 0;
    }
  for (guint i = 0; i < width; i++)
    number = number << 8 | header->bytes[header->at++];
  return number;
}

/* Counts and lengths: 8 bytes in CDF-5, 4 elsewhere, and never negative. */
static guint64
take_count (Header *header)
{
  guint width = header->version == 5 ? 8 : 4;
  guint64 count = take (header, width);
  if (count >> (8 * width - 1))
    damaged (header);
  return header->state == ANT_CLASSIC_WHOLE ? count : 0;
}

static void
skip (Header *header, guint64 count, guint64 width)
{
  guint64 bytes;
  if (header->state != ANT_CLASSIC_WHOLE)
    return;
  if (__builtin_mul_overflow (count, width, &bytes) || bytes > G_MAXINT64)
    {
      damaged (header);
      return;
    }
  bytes = (bytes + 3) & ~(guint64) 3;
  if (bytes > header->n - header->at)
    header->state = ANT_CLASSIC_LONGER;
  else
    header->at += bytes;
}

static guint64
type_width (Header *header, guint64 type)
{
  static const guint8 widths[] = { 0, 1, 1, 2, 4, 4, 8, 1, 2, 4, 8, 8 };
  guint most = header->version == 5 ? 11 : 6;
  if (type < 1 || type > most)
    {
      damaged (header);
      return 0;
    }
  return widths[type];
}

/* The tag of a list and how many are in it; none where the list is absent. */
static guint64
take_list (Header *header, guint64 tag)
{
  guint64 found = take (header, 4), count = take_count (header);
  if (found != tag && (found != 0 || count != 0))
    damaged (header);
  return header->state == ANT_CLASSIC_WHOLE ? count : 0;
}

static void
skip_attributes (Header *header)
{
  guint64 n = take_list (header, TAG_ATTRIBUTE);
  for (guint64 i = 0; i < n && header->state == ANT_CLASSIC_WHOLE; i++)
    {
      skip (header, take_count (header), 1);
      guint64 width = type_width (header, take (header, 4));
      skip (header, take_count (header), width);
    }
}

static void
take_dimensions (Header *header)
{
  guint64 n = take_list (header, TAG_DIMENSION);
  if (n > MOST_DIMENSIONS)
    damaged (header);
  if (header->state != ANT_CLASSIC_WHOLE)
    return;
  header->dimension = g_new0 (guint64, n + 1);
  header->n_dimensions = n;
  for (guint64 i = 0; i < n && header->state == ANT_CLASSIC_WHOLE; i++)
    {
      skip (header, take_count (header), 1);
      header->dimension[i] = take_count (header);
    }
}

static Place
take_variable (Header *header)
{
  Place place = { .size = 1 };
  skip (header, take_count (header), 1);
  guint64 rank = take_count (header);
  if (rank > MOST_RANK)
    damaged (header);
  for (guint64 d = 0; d < rank && header->state == ANT_CLASSIC_WHOLE; d++)
    {
      guint64 id = take_count (header);
      if (id >= header->n_dimensions)
        {
          damaged (header);
          break;
        }
      if (header->dimension[id] == 0 && d == 0)
        place.in_records = TRUE;
      else if (__builtin_mul_overflow (place.size, header->dimension[id], &place.size))
        damaged (header);
    }
  skip_attributes (header);
  guint64 width = type_width (header, take (header, 4));
  take_count (header); /* its size, which cannot hold the great ones */
  place.begin = take (header, header->version == 1 ? 4 : 8);
  if (__builtin_mul_overflow (place.size, width, &place.size) || place.size > G_MAXINT64 || place.begin > G_MAXINT64)
    damaged (header);
  return place;
}

/* Records follow one another with those of all variables in turn, each padded to 4 bytes unless there is but one. */
static guint64
needed_bytes (Header *header, const GArray *places, guint64 n_records, gboolean streamed)
{
  guint64 needed = header->at, record = 0, n_in_records = 0, only = 0;
  for (guint i = 0; i < places->len; i++)
    {
      const Place *place = &g_array_index (places, Place, i);
      if (place->in_records && (__builtin_add_overflow (record, (place->size + 3) & ~(guint64) 3, &record)))
        damaged (header);
      n_in_records += place->in_records;
      only = place->in_records ? place->size : only;
    }
  record = n_in_records == 1 ? only : record;
  for (guint i = 0; i < places->len; i++)
    {
      const Place *place = &g_array_index (places, Place, i);
      guint64 end, before = 0;
      if (place->in_records && (streamed || n_records == 0))
        continue;
      if ((place->in_records && __builtin_mul_overflow (n_records - 1, record, &before))
          || __builtin_add_overflow (place->begin, place->size, &end) || __builtin_add_overflow (end, before, &end))
        damaged (header);
      else
        needed = MAX (needed, end);
    }
  return needed;
}

AntClassic
ant_netcdf_classic_length (const guint8 *bytes, gsize n, guint64 *needed)
{
  *needed = 0;
  if (n < 4 || memcmp (bytes, "CDF", 3) || (bytes[3] != 1 && bytes[3] != 2 && bytes[3] != 5))
    return ANT_CLASSIC_OTHER;
  Header header = { .bytes = bytes, .n = n, .at = 4, .version = bytes[3], .state = ANT_CLASSIC_WHOLE };
  g_autoptr (GArray) places = g_array_new (FALSE, FALSE, sizeof (Place));
  guint width = header.version == 5 ? 8 : 4;
  guint64 n_records = take (&header, width);
  gboolean streamed = n_records == (width == 8 ? G_MAXUINT64 : G_MAXUINT32);
  take_dimensions (&header);
  skip_attributes (&header);
  guint64 n_variables = take_list (&header, TAG_VARIABLE);
  for (guint64 i = 0; i < n_variables && header.state == ANT_CLASSIC_WHOLE; i++)
    {
      Place place = take_variable (&header);
      g_array_append_val (places, place);
    }
  *needed = header.at;
  if (header.state == ANT_CLASSIC_WHOLE)
    {
      guint64 end = needed_bytes (&header, places, n_records, streamed);
      *needed = header.state == ANT_CLASSIC_WHOLE ? end : *needed;
    }
  g_free (header.dimension);
  return header.state;
}
