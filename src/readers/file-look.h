/* file-look.h - a file before it is read: its format, its columns and first lines, and which files are of its kind. */
#pragma once

#include <gio/gio.h>

typedef struct
{
  const char *format; /* "text", "FITS", ...; static */
  GPtrArray *columns; /* char*: labels in their order; empty where only reading tells them */
  GPtrArray *lines;   /* char*: the first lines of a text as they stand */
  /* The same for files of one series: the columns' names, or the name of the file without its digits. */
  char *kind;
} AntFileLook;

/* Reads no more than the first lines. NULL with one sentence. */
AntFileLook *ant_file_look_new (const char *path, GError **error);
void ant_file_look_free (AntFileLook *look); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntFileLook, ant_file_look_free)
