/* kept-path.h - how an analysis file names other files: from its own folder, so that both can move together. Inside the data room
 * only. */
#pragma once

#include <glib.h>

/* The way from the folder to the path, by .. where they share more than the root; absolute else; a file: URI where it is no UTF-8.
 * What is not absolute ("-", NULL) stays as it is. Caller frees. */
char *ant_kept_path (const char *folder, const char *path);
/* Back: absolute, "-" or NULL. Caller frees. */
char *ant_kept_path_resolve (const char *folder, const char *text);
