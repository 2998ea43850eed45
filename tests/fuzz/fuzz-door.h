/* fuzz-door.h - what libFuzzer and the replay call. */
#pragma once

#include <stddef.h>
#include <stdint.h>

int LLVMFuzzerTestOneInput (const uint8_t *bytes, size_t n);
