/* netcdf-wire.h - what the NetCDF child writes: the one description that it and its parent share.
 *
 * Everything is in the machine's own byte order. A text is a guint32 length and its bytes. Contents: ANT_WIRE_CONTENTS, the
 * dimensions (uint32 count; each a text and a uint64 length), the variables (uint32 count; each a text, uint32 kind, uint32
 * type as the library counts them, uint32 rank, uint32 dimensions [rank], attributes), the file's own attributes, ANT_WIRE_END. Attributes: uint32 count;
 * each a text, uint32 1 and a text, or uint32 0, a uint32 count and so many doubles. Columns: ANT_WIRE_COLUMNS, for each
 * asked column uint64 kind, uint64 count and so many numbers of 8 bytes, ANT_WIRE_END. A child that fails leaves the end
 * out and says why on standard error. */
#pragma once

#define ANT_WIRE_CONTENTS "ANTCONT1"
#define ANT_WIRE_COLUMNS "ANTCOLS1"
#define ANT_WIRE_END "ANTNCEND"
#define ANT_WIRE_MARK 8 /* bytes of each of them */

#define ANT_WIRE_MOST_DIMENSIONS 1024u
#define ANT_WIRE_MOST_VARIABLES 4096u
#define ANT_WIRE_MOST_ATTRIBUTES 256u
#define ANT_WIRE_MOST_RANK 8u
#define ANT_WIRE_MOST_TYPE 12u
#define ANT_WIRE_MOST_TEXT 4096u
#define ANT_WIRE_MOST_NUMBERS 64u

typedef enum
{
  ANT_WIRE_OTHER,   /* text and compounds: named, never read */
  ANT_WIRE_REAL,    /* sent as double; whole numbers of up to 32 bits too */
  ANT_WIRE_INTEGER, /* sent as int64_t: whole numbers of 64 bits (unsigned ones by their bits) */
} AntWireKind;
