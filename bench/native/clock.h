// Two clocks around a loop: of the wall, and of the processor, which does not count the time of others on a busy machine.
#pragma once
#include <time.h>

static double secondsOf(clockid_t clock) {
  struct timespec t;
  clock_gettime(clock, &t);
  return t.tv_sec + 1e-9 * t.tv_nsec;
}
