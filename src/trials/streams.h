/* streams.h - which stream of random numbers each ingredient of a simulated record draws from, so that adding or
 * changing one ingredient leaves the draws of all others as they were. */
#pragma once

typedef enum
{
  ANT_STREAM_WHITE = 1,
  ANT_STREAM_SPOTS,
  ANT_STREAM_SPIKES,
  ANT_STREAM_DROPPED,
  ANT_STREAM_DAILY_GAPS,
  ANT_STREAM_SHORT_GAPS,
  ANT_STREAM_LONG_GAPS,
  ANT_STREAM_NOISE_PARTS = 100, /* + index of the part */
} AntStream;
