/* near-word.h - the word that someone probably meant. */
#pragma once

/* The one of the NULL-ended `words` with the fewest single-letter changes from `word` (Levenshtein 1966), or NULL if
 * none is within a third of its length. Points into `words`. */
const char *ant_near_word (const char *word, const char *const *words);
