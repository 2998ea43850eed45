/* sha256.h - a running SHA-256 (FIPS 180-4), by the processor's own instructions where it has them: GLib's costs more time
 * than reading the numbers does. */
#pragma once

#include <glib.h>

typedef struct _AntSha256 AntSha256;

AntSha256 *ant_sha256_new (void);
void ant_sha256_free (AntSha256 *sha256);
void ant_sha256_update (AntSha256 *sha256, const void *bytes, gsize n);
/* Hexadecimal digest; ends the sum. Caller frees. */
char *ant_sha256_hex (AntSha256 *sha256);
