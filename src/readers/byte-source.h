/* byte-source.h - the bytes of an input, unpacked if it is gzip, with the SHA-256 of the bytes as stored. */
#pragma once

#include <gio/gio.h>

typedef struct _AntByteSource AntByteSource;

/* "-" is standard input. NULL with one sentence for a directory, a missing or an unreadable file. */
AntByteSource *ant_byte_source_open (const char *path, GError **error);
/* Bytes in memory, borrowed. */
AntByteSource *ant_byte_source_new_bytes (const char *name, const void *bytes, gsize n);
void ant_byte_source_free (AntByteSource *source);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntByteSource, ant_byte_source_free)

/* Up to n (unpacked) bytes into `buffer`. 0 at the end, -1 with an error: a fault of the disk, a damaged or cut-off gzip, or
 * one that unpacks to absurdly more than its size. */
gssize ant_byte_source_read (AntByteSource *source, void *buffer, gsize n, GError **error);
/* The first (unpacked) bytes, up to a kilobyte, without taking them; *found says how many. NULL on error. Call before the first read. */
const guint8 *ant_byte_source_peek (AntByteSource *source, gsize *found, GError **error);
/* From here on the reader hashes the bytes of an unpacked source itself, each once and in order, on whichever thread: TRUE if
 * so. A packed source goes on hashing what is stored. */
gboolean ant_byte_source_leave_hashing (AntByteSource *source);
void ant_byte_source_hash (AntByteSource *source, const void *bytes, gsize n);
/* All that is left: read and hashed but not kept, or taken as one block of memory (the caller frees; NULL on error). *n counts the
 * bytes from the start of the unpacked file. Both end early where cancelled. */
gboolean ant_byte_source_drain (AntByteSource *source, gsize *n, GCancellable *cancellable, GError **error);
void *ant_byte_source_take (AntByteSource *source, gsize *n, GCancellable *cancellable, GError **error);
/* The path of a plain file on disk; NULL for what is packed, in memory or a stream. Call after a peek. */
const char *ant_byte_source_path (const AntByteSource *source);
gsize ant_byte_source_file_size (const AntByteSource *source); /* of that file */
/* The name for people: the path, or "standard input". */
const char *ant_byte_source_name (const AntByteSource *source);
gboolean ant_byte_source_is_packed (const AntByteSource *source);
/* Hexadecimal SHA-256 of all stored bytes; read to the end first, and ask once. Caller frees. */
char *ant_byte_source_sha256 (AntByteSource *source);
