/* fits-headers.c - the headers of a FITS file, walked from one to the next. */
#include "readers/fits-headers.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"

#define BLOCK 2880
#define CARD 80
#define MOST_FIELDS 999
#define MOST_HDUS 1000
#define MOST_AXES 999

typedef struct
{
  gint64 bitpix, n_axes, pcount, gcount, fields; /* -1: not told, or no whole number */
  gboolean is_table;
  guint64 size;   /* product of the axes; 0 without any */
  char wrong[16]; /* the first card with a number that no header has, or "" */
} Header;

/* The whole number of a card "KEY     =     number", -1 for anything else; FALSE if it is of another key. */
static gboolean
card_is (const char *card, const char *key, gint64 *number)
{
  char text[CARD - 9];
  gsize length = strlen (key);
  if (strncmp (card, key, length) != 0 || strspn (card + length, " ") < 8 - length || card[8] != '=')
    return FALSE;
  memcpy (text, card + 10, CARD - 10);
  text[CARD - 10] = 0;
  char *rest;
  *number = g_ascii_strtoll (text, &rest, 10);
  if (rest == text || !strchr (" /", *rest))
    *number = -1;
  return TRUE;
}

static void
take_axis (Header *header, gint64 axis, gint64 length, const char *key)
{
  if (length < 0 && !*header->wrong)
    g_strlcpy (header->wrong, key, sizeof header->wrong);
  if (!g_uint64_checked_mul (&header->size, axis == 1 ? 1 : header->size, (guint64) MAX (length, 0)))
    header->size = G_MAXUINT64;
}

/* A card that is none of the axes. */
static gboolean
take_number (Header *header, const char *card)
{
  return card_is (card, "BITPIX", &header->bitpix) || card_is (card, "NAXIS", &header->n_axes)
         || card_is (card, "PCOUNT", &header->pcount) || card_is (card, "GCOUNT", &header->gcount)
         || card_is (card, "TFIELDS", &header->fields);
}

static void
judge (Header *header)
{
  const char *wrong = ABS (header->bitpix) % 8 || ABS (header->bitpix) > 64 || !header->bitpix ? "BITPIX"
                      : header->n_axes < 0 || header->n_axes > MOST_AXES                       ? "NAXIS"
                      : header->is_table && header->n_axes != 2                                ? "NAXIS"
                      : header->pcount < 0                                                     ? "PCOUNT"
                      : header->gcount < 0                                                     ? "GCOUNT"
                      : header->fields > MOST_FIELDS || (header->is_table && header->fields < 0) ? "TFIELDS"
                                                                                                 : NULL;
  if (wrong && !*header->wrong)
    g_strlcpy (header->wrong, wrong, sizeof header->wrong);
}

/* Read the cards up to END. Returns the bytes they take, 0 if there is no END. */
static gsize
read_header (const char *bytes, gsize n, Header *header)
{
  *header = (Header) { .gcount = 1, .fields = -1 };
  for (gsize at = 0; at + CARD <= n; at += CARD)
    {
      const char *card = bytes + at;
      if (strncmp (card, "END     ", 8) == 0)
        {
          judge (header);
          return at + CARD;
        }
      if (strncmp (card, "XTENSION= '", 11) == 0 && memmem (card + 11, 8, "TABLE", 5))
        header->is_table = TRUE;
      if (take_number (header, card) || strncmp (card, "NAXIS", 5) != 0)
        continue;
      for (gint64 axis = 1, number; axis <= MIN (header->n_axes, MOST_AXES); axis++)
        {
          char key[16];
          g_snprintf (key, sizeof key, "NAXIS%d", (int) axis);
          if (card_is (card, key, &number))
            take_axis (header, axis, number, key);
        }
    }
  return 0;
}

/* Bytes of the data behind a header, or FALSE if no file can hold them. */
static gboolean
data_size (const Header *header, guint64 *size)
{
  *size = 0;
  return header->n_axes == 0
         || (g_uint64_checked_add (size, header->size, (guint64) header->pcount)
             && g_uint64_checked_mul (size, *size, (guint64) header->gcount)
             && g_uint64_checked_mul (size, *size, (guint64) ABS (header->bitpix) / 8));
}

static guint64
blocks (guint64 n)
{
  return (n / BLOCK + (n % BLOCK != 0)) * BLOCK;
}

gboolean
ant_fits_headers_check (const char *name, const char *bytes, gsize n, int *n_hdus, GError **error)
{
  gsize at = 0;
  *n_hdus = 0;
  for (int hdu = 0; n - at >= CARD && hdu < MOST_HDUS; hdu++)
    {
      Header header;
      guint64 data;
      gsize cards = read_header (bytes + at, n - at, &header);
      if (!cards && strncmp (bytes + at, "XTENSION", 8) == 0)
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: HDU %d: its header has no END"), name, hdu);
          return FALSE;
        }
      if (cards && *header.wrong)
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: HDU %d: found a number in %s that no header has"), name, hdu, header.wrong);
          return FALSE;
        }
      *n_hdus += cards && (hdu == 0 || strncmp (bytes + at, "XTENSION", 8) == 0);
      if (!cards || *n_hdus <= hdu || !data_size (&header, &data) || blocks (cards) > n - at || blocks (data) > n - at - blocks (cards))
        break;
      at += blocks (cards) + blocks (data);
    }
  return TRUE;
}
