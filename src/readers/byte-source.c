/* byte-source.c - files, standard input and memory as one stream of plain bytes. */
#include "readers/byte-source.h"

#include <errno.h>
#include <fcntl.h>
#include <glib/gi18n.h>
#include <nettle/sha2.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>
#include <zlib.h>

#include "data/error.h"

#define PACKED_BLOCK (64 * 1024)
#define BLOCK (256 * 1024)
/* Written records pack 3 to 20 fold. What unpacks further than this, beyond a first allowance, is no record. */
#define MOST_UNPACK_RATIO 200
#define UNPACK_ALLOWANCE (64 * 1024 * 1024)

struct _AntByteSource
{
  char *name;
  int fd; /* -1 for memory */
  const guint8 *bytes;
  gsize n_bytes, at, file_size;
  struct sha256_ctx sha256; /* GLib's own sum takes longer than reading the rows */
  guint64 n_stored, n_unpacked;

  guint8 head[2]; /* read to tell gzip, not yet handed out */
  gsize n_head;
  gboolean hash_is_left; /* to the reader */
  gboolean is_file, looked, packed, member_open, at_end;
  z_stream inflater;
  guint8 *block;

  guint8 peeked[1024]; /* unpacked, not yet handed out */
  gsize peeked_at, n_peeked;
};

static AntByteSource *
new_source (const char *name, int fd)
{
  AntByteSource *source = g_new0 (AntByteSource, 1);
  source->name = g_strdup (name);
  source->fd = fd;
  sha256_init (&source->sha256);
  return source;
}

AntByteSource *
ant_byte_source_open (const char *path, GError **error)
{
  struct stat status;
  if (!strcmp (path, "-"))
    return new_source (_("standard input"), dup (STDIN_FILENO));
  int fd = open (path, O_RDONLY | O_CLOEXEC);
  if (fd < 0)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: cannot be opened: %s"), path, g_strerror (errno));
      return NULL;
    }
  if (fstat (fd, &status) != 0)
    status.st_mode = 0;
  if (S_ISDIR (status.st_mode))
    {
      close (fd);
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found a folder, expected a file with a record"), path);
      return NULL;
    }
  AntByteSource *source = new_source (path, fd);
  source->is_file = S_ISREG (status.st_mode);
  source->file_size = source->is_file ? (gsize) status.st_size : 0;
  return source;
}

AntByteSource *
ant_byte_source_new_bytes (const char *name, const void *bytes, gsize n)
{
  AntByteSource *source = new_source (name, -1);
  source->bytes = bytes;
  source->n_bytes = n;
  return source;
}

void
ant_byte_source_free (AntByteSource *source)
{
  if (!source)
    return;
  if (source->fd >= 0)
    close (source->fd);
  if (source->packed)
    inflateEnd (&source->inflater);
  g_free (source->block);
  g_free (source->name);
  g_free (source);
}

const char *
ant_byte_source_name (const AntByteSource *source)
{
  return source->name;
}

gboolean
ant_byte_source_is_packed (const AntByteSource *source)
{
  return source->packed;
}

char *
ant_byte_source_sha256 (AntByteSource *source)
{
  guint8 digest[SHA256_DIGEST_SIZE];
  GString *hex = g_string_new (NULL);
  sha256_digest (&source->sha256, sizeof digest, digest);
  for (gsize i = 0; i < sizeof digest; i++)
    g_string_append_printf (hex, "%02x", digest[i]);
  return g_string_free (hex, FALSE);
}

/* The next stored bytes, hashed. */
static gssize
read_stored (AntByteSource *source, guint8 *buffer, gsize n, GError **error)
{
  gssize got;
  if (source->bytes || source->fd < 0)
    {
      got = (gssize) MIN (n, source->n_bytes - source->at);
      if (got > 0)
        memcpy (buffer, source->bytes + source->at, (gsize) got);
      source->at += (gsize) got;
    }
  else
    do
      got = read (source->fd, buffer, n);
    while (got < 0 && errno == EINTR);
  if (got < 0)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: cannot be read on: %s"), source->name, g_strerror (errno));
      return -1;
    }
  if (!source->hash_is_left)
    sha256_update (&source->sha256, (gsize) got, buffer);
  source->n_stored += (guint64) got;
  return got;
}

/* Two bytes tell gzip. A pipe may hand them over one by one. */
static gboolean
look_at_head (AntByteSource *source, GError **error)
{
  source->looked = TRUE;
  while (source->n_head < 2)
    {
      gssize got = read_stored (source, source->head + source->n_head, 2 - source->n_head, error);
      if (got < 0)
        return FALSE;
      if (got == 0)
        return TRUE;
      source->n_head += (gsize) got;
    }
  if (source->head[0] != 0x1f || source->head[1] != 0x8b)
    return TRUE;
  source->block = g_malloc (PACKED_BLOCK);
  memcpy (source->block, source->head, 2);
  source->inflater.next_in = source->block;
  source->inflater.avail_in = 2;
  source->n_head = 0;
  source->packed = source->member_open = inflateInit2 (&source->inflater, 15 + 16) == Z_OK;
  return source->packed;
}

static gssize
unpack_error (AntByteSource *source, const char *found, GError **error)
{
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found %s after %zu bytes, expected a whole gzip file"),
               source->name, found, (gsize) source->n_stored - source->inflater.avail_in);
  return -1;
}

/* More packed bytes where none are left. FALSE on error; at_end is set where there are none. */
static gboolean
refill (AntByteSource *source, GError **error)
{
  if (source->inflater.avail_in > 0 || source->at_end)
    return TRUE;
  gssize got = read_stored (source, source->block, PACKED_BLOCK, error);
  source->inflater.next_in = source->block;
  source->inflater.avail_in = (uInt) MAX (got, 0);
  source->at_end = got == 0;
  return got >= 0;
}

/* Between members: the next one, or the end. Zero bytes after the last member are padding, as gzip itself takes them. */
static gboolean
open_next_member (AntByteSource *source, GError **error)
{
  while (refill (source, error))
    {
      while (source->inflater.avail_in > 0 && *source->inflater.next_in == 0)
        {
          source->inflater.next_in++;
          source->inflater.avail_in--;
        }
      if (source->inflater.avail_in > 0)
        source->member_open = inflateReset (&source->inflater) == Z_OK;
      if (source->inflater.avail_in > 0 || source->at_end)
        return TRUE;
    }
  return FALSE;
}

static gssize
read_unpacked (AntByteSource *source, void *buffer, gsize n, GError **error)
{
  source->inflater.next_out = buffer;
  source->inflater.avail_out = (uInt) MIN (n, 1u << 30);
  uInt asked = source->inflater.avail_out;
  while (source->inflater.avail_out == asked)
    {
      if (!source->member_open && !open_next_member (source, error))
        return -1;
      if (!refill (source, error))
        return -1;
      if (source->at_end && source->inflater.avail_in == 0)
        return source->member_open ? unpack_error (source, _("the end"), error) : 0;
      int outcome = inflate (&source->inflater, Z_NO_FLUSH);
      if (outcome == Z_STREAM_END)
        source->member_open = FALSE;
      else if (outcome != Z_OK && outcome != Z_BUF_ERROR)
        return unpack_error (source, _("damage"), error);
    }
  gsize got = asked - source->inflater.avail_out;
  source->n_unpacked += got;
  if (source->n_unpacked > UNPACK_ALLOWANCE && source->n_unpacked / MOST_UNPACK_RATIO > source->n_stored)
    return unpack_error (source, _("more than 200 times the packed size"), error);
  return (gssize) got;
}

static gssize
read_plain (AntByteSource *source, void *buffer, gsize n, GError **error)
{
  if (!source->looked && !look_at_head (source, error))
    return -1;
  if (source->packed)
    return read_unpacked (source, buffer, n, error);
  if (source->n_head == 0)
    return read_stored (source, buffer, n, error);
  gsize got = MIN (n, source->n_head);
  memcpy (buffer, source->head, got);
  memmove (source->head, source->head + got, source->n_head - got);
  source->n_head -= got;
  return (gssize) got;
}

const guint8 *
ant_byte_source_peek (AntByteSource *source, gsize *found, GError **error)
{
  while (source->n_peeked < sizeof source->peeked)
    {
      gssize got = read_plain (source, source->peeked + source->n_peeked, sizeof source->peeked - source->n_peeked, error);
      if (got < 0)
        return NULL;
      if (got == 0)
        break;
      source->n_peeked += (gsize) got;
    }
  *found = source->n_peeked;
  return source->peeked;
}

gssize
ant_byte_source_read (AntByteSource *source, void *buffer, gsize n, GError **error)
{
  gsize waiting = source->n_peeked - source->peeked_at;
  if (waiting == 0)
    return read_plain (source, buffer, n, error);
  n = MIN (n, waiting);
  memcpy (buffer, source->peeked + source->peeked_at, n);
  source->peeked_at += n;
  return (gssize) n;
}

gboolean
ant_byte_source_leave_hashing (AntByteSource *source)
{
  source->hash_is_left = !source->packed;
  return source->hash_is_left;
}

void
ant_byte_source_hash (AntByteSource *source, const void *bytes, gsize n)
{
  sha256_update (&source->sha256, n, bytes);
}

gboolean
ant_byte_source_drain (AntByteSource *source, gsize *n, GCancellable *cancellable, GError **error)
{
  g_autofree char *buffer = g_malloc (BLOCK);
  gssize got = 1;
  for (*n = 0; got > 0; *n += (gsize) MAX (got, 0))
    {
      if (g_cancellable_set_error_if_cancelled (cancellable, error))
        return FALSE;
      got = ant_byte_source_read (source, buffer, BLOCK, error);
    }
  return got == 0;
}

void *
ant_byte_source_take (AntByteSource *source, gsize *n, GCancellable *cancellable, GError **error)
{
  gsize room = BLOCK;
  char *bytes = g_malloc (room);
  gssize got = 1;
  for (*n = 0; got > 0; *n += (gsize) MAX (got, 0))
    {
      if (*n == room)
        bytes = g_realloc (bytes, room *= 2);
      got = g_cancellable_set_error_if_cancelled (cancellable, error)
                ? -1
                : ant_byte_source_read (source, bytes + *n, MIN (room - *n, (gsize) BLOCK), error);
    }
  if (got == 0)
    return bytes;
  g_free (bytes);
  return NULL;
}

const char *
ant_byte_source_path (const AntByteSource *source)
{
  return source->is_file && !source->packed ? source->name : NULL;
}

gsize
ant_byte_source_file_size (const AntByteSource *source)
{
  return source->file_size;
}
