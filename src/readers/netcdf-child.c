/* netcdf-child.c - the program that alone touches the NetCDF library: reads standard input's file within limits of memory
 * and time and writes what netcdf-wire.h describes to standard output.
 *
 *   antumbra-netcdf contents SECONDS MEGABYTES
 *   antumbra-netcdf columns SECONDS MEGABYTES VARIABLE:INDEX,INDEX... ...
 *
 * VARIABLE counts as in the contents, from 0; an INDEX is a number from 0, or * for the whole of that dimension. The library
 * and the one below it crash or loop on some damaged files, which is why this is a program of its own. */
#include <errno.h>
#include <netcdf.h>
#include <netcdf_mem.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/mman.h>
#include <sys/resource.h>
#include <sys/stat.h>
#include <unistd.h>

#include "readers/netcdf-wire.h"

#define FILE_PATH "/proc/self/fd/0"
#define MOST_GROUP_DEPTH 8
#define BLOCK 262144 /* numbers read at a time */

#if defined(__has_feature)
#if __has_feature(address_sanitizer)
#define ANT_ADDRESS_SANITIZER
#endif
#endif
#ifdef __SANITIZE_ADDRESS__
#define ANT_ADDRESS_SANITIZER
#endif

typedef struct
{
  int group, id;
  char name[ANT_WIRE_MOST_TEXT + 1];
} Item;

static Item *variables, *dimensions;
static uint32_t n_variables, n_dimensions;

static _Noreturn void
fail (const char *what, const char *why)
{
  fprintf (stderr, "%s: %s", what, why);
  fflush (stderr);
  _exit (1);
}

static void
check (int status, const char *what)
{
  if (status != NC_NOERR)
    fail (what, nc_strerror (status));
}

static void
put (const void *bytes, size_t n)
{
  if (n > 0 && fwrite (bytes, n, 1, stdout) != 1)
    fail ("output", strerror (errno));
}

static void
put_number (uint32_t number)
{
  put (&number, sizeof number);
}

static void
put_long (uint64_t number)
{
  put (&number, sizeof number);
}

static void
put_text (const char *text, size_t n)
{
  n = n < ANT_WIRE_MOST_TEXT ? n : ANT_WIRE_MOST_TEXT;
  put_number ((uint32_t) n);
  put (text, n);
}

/* Memory: the address space; time: of the processor, and as long again of waiting. Under the address sanitizer, which maps
 * terabytes, memory cannot be limited so. */
static void
set_limits (const char *seconds, const char *megabytes)
{
  rlim_t s = (rlim_t) strtoul (seconds, NULL, 10), bytes = (rlim_t) strtoul (megabytes, NULL, 10) << 20;
  struct rlimit time = { s, s + 1 }, memory = { bytes, bytes }, core = { 0, 0 };
  setrlimit (RLIMIT_CPU, &time);
  setrlimit (RLIMIT_CORE, &core);
#ifndef ANT_ADDRESS_SANITIZER
  setrlimit (RLIMIT_AS, &memory);
#endif
  setrlimit (RLIMIT_FSIZE, &memory);
  alarm ((unsigned) (2 * s + 1));
}

static Item *
add_item (Item **items, uint32_t *n, uint32_t most, const char *what)
{
  if (*n == most)
    fail (what, "more than any record has");
  if (!*items && !(*items = calloc (most, sizeof **items)))
    fail (what, strerror (errno));
  return &(*items)[(*n)++];
}

/* "group/name", without the group for those of the file itself. */
static void
full_name (int group, const char *name, char full[ANT_WIRE_MOST_TEXT + 1])
{
  char path[ANT_WIRE_MOST_TEXT + 1] = "";
  size_t n = 0;
  if (nc_inq_grpname_full (group, &n, NULL) == NC_NOERR && n < ANT_WIRE_MOST_TEXT - NC_MAX_NAME - 2)
    nc_inq_grpname_full (group, &n, path);
  const char *shown = path[0] == '/' ? path + 1 : path;
  snprintf (full, ANT_WIRE_MOST_TEXT + 1, "%s%s%s", shown, *shown ? "/" : "", name);
}

/* List variables and dimensions of a group and of those in it. */
static void
walk (int group, int depth)
{
  char name[NC_MAX_NAME + 1];
  int n_dims = 0, n_vars = 0, n_groups = 0, *ids;
  check (nc_inq_dimids (group, &n_dims, NULL, 0), "dimensions");
  check (nc_inq_varids (group, &n_vars, NULL), "variables");
  if (n_dims < 0 || n_vars < 0 || (uint32_t) n_dims > ANT_WIRE_MOST_DIMENSIONS || (uint32_t) n_vars > ANT_WIRE_MOST_VARIABLES)
    fail ("contents", "more than any record has");
  if (!(ids = calloc ((size_t) n_dims + (size_t) n_vars + 1, sizeof *ids)))
    fail ("contents", strerror (errno));
  check (nc_inq_dimids (group, &n_dims, ids, 0), "dimensions");
  for (int i = 0; i < n_dims; i++)
    {
      Item *item = add_item (&dimensions, &n_dimensions, ANT_WIRE_MOST_DIMENSIONS, "dimensions");
      *item = (Item){ .group = group, .id = ids[i] };
      check (nc_inq_dimname (group, ids[i], name), "dimension");
      full_name (group, name, item->name);
    }
  check (nc_inq_varids (group, &n_vars, ids), "variables");
  for (int i = 0; i < n_vars; i++)
    {
      Item *item = add_item (&variables, &n_variables, ANT_WIRE_MOST_VARIABLES, "variables");
      *item = (Item){ .group = group, .id = ids[i] };
      check (nc_inq_varname (group, ids[i], name), "variable");
      full_name (group, name, item->name);
    }
  free (ids);
  if (nc_inq_grps (group, &n_groups, NULL) != NC_NOERR || n_groups <= 0 || depth == MOST_GROUP_DEPTH
      || (uint32_t) n_groups > ANT_WIRE_MOST_VARIABLES)
    return;
  int *groups = calloc ((size_t) n_groups, sizeof *groups);
  if (!groups)
    fail ("groups", strerror (errno));
  check (nc_inq_grps (group, NULL, groups), "groups");
  for (int i = 0; i < n_groups; i++)
    walk (groups[i], depth + 1);
  free (groups);
}

static int
is_number_type (nc_type type)
{
  return type == NC_BYTE || type == NC_UBYTE || type == NC_SHORT || type == NC_USHORT || type == NC_INT || type == NC_UINT
         || type == NC_FLOAT || type == NC_DOUBLE || type == NC_INT64 || type == NC_UINT64;
}

static AntWireKind
kind_of (nc_type type)
{
  if (!is_number_type (type))
    return ANT_WIRE_OTHER;
  return type == NC_INT64 || type == NC_UINT64 ? ANT_WIRE_INTEGER : ANT_WIRE_REAL;
}

/* Text and numbers; of one that is neither, an empty text. */
static void
put_attribute (int group, int variable, int i)
{
  char name[NC_MAX_NAME + 1], text[ANT_WIRE_MOST_TEXT + 1] = "";
  double numbers[ANT_WIRE_MOST_NUMBERS];
  nc_type type;
  size_t n;
  check (nc_inq_attname (group, variable, i, name), "attribute");
  check (nc_inq_att (group, variable, name, &type, &n), name);
  put_text (name, strlen (name));
  if (is_number_type (type) && n <= ANT_WIRE_MOST_NUMBERS)
    {
      check (nc_get_att_double (group, variable, name, numbers), name);
      put_number (0);
      put_number ((uint32_t) n);
      put (numbers, n * sizeof *numbers);
      return;
    }
  put_number (1);
  if (type == NC_CHAR && n <= ANT_WIRE_MOST_TEXT)
    check (nc_get_att_text (group, variable, name, text), name);
  else if (type == NC_STRING && n == 1)
    {
      char *string = NULL;
      check (nc_get_att_string (group, variable, name, &string), name);
      n = string ? strnlen (string, ANT_WIRE_MOST_TEXT) : 0;
      memcpy (text, string ? string : "", n);
      nc_free_string (1, &string);
    }
  else
    n = 0;
  put_text (text, strnlen (text, n));
}

static void
put_attributes (int group, int variable, const char *name)
{
  int n = 0;
  check (variable == NC_GLOBAL ? nc_inq_natts (group, &n) : nc_inq_varnatts (group, variable, &n), name);
  n = n < 0 ? 0 : n > (int) ANT_WIRE_MOST_ATTRIBUTES ? (int) ANT_WIRE_MOST_ATTRIBUTES : n;
  put_number ((uint32_t) n);
  for (int i = 0; i < n; i++)
    put_attribute (group, variable, i);
}

/* Ids of dimensions are the file's own and unique in it. */
static uint32_t
place_of_dimension (int id, const char *variable)
{
  for (uint32_t i = 0; i < n_dimensions; i++)
    if (dimensions[i].id == id)
      return i;
  fail (variable, "has a dimension that the file does not list");
}

static uint32_t
rank_of (const Item *variable, int ids[NC_MAX_VAR_DIMS])
{
  int rank = 0;
  check (nc_inq_varndims (variable->group, variable->id, &rank), variable->name);
  if (rank < 0 || rank > NC_MAX_VAR_DIMS)
    fail (variable->name, "has more dimensions than there can be");
  check (nc_inq_vardimid (variable->group, variable->id, ids), variable->name);
  return (uint32_t) rank;
}

static void
put_variable (const Item *variable)
{
  static int ids[NC_MAX_VAR_DIMS];
  nc_type type;
  check (nc_inq_vartype (variable->group, variable->id, &type), variable->name);
  uint32_t rank = rank_of (variable, ids);
  put_text (variable->name, strlen (variable->name));
  put_number (rank > ANT_WIRE_MOST_RANK ? ANT_WIRE_OTHER : (uint32_t) kind_of (type));
  put_number (type > 0 && (uint32_t) type <= ANT_WIRE_MOST_TYPE ? (uint32_t) type : 0);
  rank = rank > ANT_WIRE_MOST_RANK ? 0 : rank;
  put_number (rank);
  for (uint32_t i = 0; i < rank; i++)
    put_number (place_of_dimension (ids[i], variable->name));
  put_attributes (variable->group, variable->id, variable->name);
}

static void
put_contents (int file)
{
  put (ANT_WIRE_CONTENTS, ANT_WIRE_MARK);
  put_number (n_dimensions);
  for (uint32_t i = 0; i < n_dimensions; i++)
    {
      size_t length;
      check (nc_inq_dimlen (dimensions[i].group, dimensions[i].id, &length), dimensions[i].name);
      put_text (dimensions[i].name, strlen (dimensions[i].name));
      put_long (length);
    }
  put_number (n_variables);
  for (uint32_t i = 0; i < n_variables; i++)
    put_variable (&variables[i]);
  put_attributes (file, NC_GLOBAL, "attributes of the file");
}

/* Where along each dimension the column lies: start and, for the one whole dimension, its place. */
static uint32_t
parse_place (const Item *variable, const char *text, uint32_t rank, size_t *start)
{
  uint32_t along = rank;
  for (uint32_t i = 0; i < rank; i++)
    {
      char *end = NULL;
      start[i] = 0;
      if (*text == '*' && along == rank)
        {
          along = i;
          end = (char *) (uintptr_t) (text + 1);
        }
      else
        start[i] = strtoul (text, &end, 10);
      if (end == text || *end != (i + 1 < rank ? ',' : 0))
        fail (variable->name, "cannot be indexed so");
      text = end + 1;
    }
  return along;
}

static void
put_column (const char *asked)
{
  static int ids[NC_MAX_VAR_DIMS];
  static union { double real[BLOCK]; long long integer[BLOCK]; } block;
  size_t start[ANT_WIRE_MOST_RANK], count[ANT_WIRE_MOST_RANK], length = 1;
  nc_type type;
  char *end;
  unsigned long number = strtoul (asked, &end, 10);
  if (*end != ':' || number >= n_variables)
    fail (asked, "is no column");
  const Item *variable = &variables[number];
  check (nc_inq_vartype (variable->group, variable->id, &type), variable->name);
  uint32_t rank = rank_of (variable, ids);
  if (rank > ANT_WIRE_MOST_RANK || kind_of (type) == ANT_WIRE_OTHER)
    fail (variable->name, "holds no numbers that can be read");
  uint32_t along = rank ? parse_place (variable, end + 1, rank, start) : 0;
  for (uint32_t i = 0; i < rank; i++)
    count[i] = 1;
  if (along < rank)
    check (nc_inq_dimlen (variable->group, ids[along], &length), variable->name);
  put_long (kind_of (type));
  put_long (length);
  for (size_t at = 0; at < length; at += BLOCK)
    {
      size_t n = length - at < BLOCK ? length - at : BLOCK;
      if (along < rank)
        {
          start[along] = at;
          count[along] = n;
        }
      int status = type == NC_UINT64 ? nc_get_vara (variable->group, variable->id, start, count, block.integer)
                   : kind_of (type) == ANT_WIRE_INTEGER
                     ? nc_get_vara_longlong (variable->group, variable->id, start, count, block.integer)
                     : nc_get_vara_double (variable->group, variable->id, start, count, block.real);
      check (status, variable->name);
      put (&block, n * 8);
    }
}

/* The library below follows the path to a name, which a file kept in memory has not: that one is mapped. */
static int
open_input (void)
{
  struct stat status;
  int file = 0;
  if (fstat (STDIN_FILENO, &status) != 0)
    fail ("the file", strerror (errno));
  if (status.st_nlink > 0)
    {
      check (nc_open (FILE_PATH, NC_NOWRITE, &file), "the file");
      return file;
    }
  void *bytes = mmap (NULL, (size_t) status.st_size, PROT_READ, MAP_PRIVATE, STDIN_FILENO, 0);
  if (bytes == MAP_FAILED)
    fail ("the file", strerror (errno));
  check (nc_open_mem ("input", NC_NOWRITE, (size_t) status.st_size, bytes, &file), "the file");
  return file;
}

int
main (int argc, char **argv)
{
  if (argc < 4 || (strcmp (argv[1], "contents") && strcmp (argv[1], "columns")))
    fail ("antumbra-netcdf", "is run by antumbra to read NetCDF files, not by hand");
  set_limits (argv[2], argv[3]);
  int file = open_input ();
  walk (file, 0);
  if (!strcmp (argv[1], "contents"))
    put_contents (file);
  else
    {
      put (ANT_WIRE_COLUMNS, ANT_WIRE_MARK);
      for (int i = 4; i < argc; i++)
        put_column (argv[i]);
    }
  put (ANT_WIRE_END, ANT_WIRE_MARK);
  if (fflush (stdout) != 0)
    fail ("output", strerror (errno));
  _exit (0); /* closing a damaged file has crashed before now, and nothing is left to do */
}
