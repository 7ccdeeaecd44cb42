// The twin of the packet loop in one dimension (src/transport/flights.ts), operation for operation: a point star
// in spherical shells, the same random numbers, the same tally.
// flights MEDIUM TALLY SEED PACKETS WARMUP: writes the tally as doubles and prints the times of the loop.
#include "clock.h"
#include "medium.h"
#include <math.h>
#include <stdbool.h>
#include <stdint.h>
#include <string.h>

static inline double larger(double a, double b) { return a > b ? a : b; }
static inline double smaller(double a, double b) { return a < b ? a : b; }

enum { FLIGHT_BINS = 64, LOOKUP = 1 << 16 };
static const double ROULETTE_BELOW = 1e-3, SURVIVAL = 0.1, GOLDEN = 0.6180339887498949;

// Alea, the generator of Johannes Baagoe, seeded by a hash of a text, as the package seedrandom has it.
static double s0, s1, s2, carry, hash;

static double mash(const char *text) {
  for (; *text; text++) {
    hash += (unsigned char)*text;
    double h = 0.02519603282416938 * hash;
    hash = (uint32_t)(uint64_t)h;
    h -= hash;
    h *= hash;
    hash = (uint32_t)(uint64_t)h;
    h -= hash;
    hash += h * 0x1p32;
  }
  return (uint32_t)(uint64_t)hash * 0x1p-32;
}

static void seed(const char *text) {
  hash = 0xefc8249du;
  carry = 1;
  s0 = mash(" ");
  s1 = mash(" ");
  s2 = mash(" ");
  double *states[] = {&s0, &s1, &s2};
  for (int i = 0; i < 3; i++) {
    *states[i] -= mash(text);
    if (*states[i] < 0) *states[i] += 1;
  }
}

static inline double uniform(void) {
  const double t = 2091639 * s0 + carry * 0x1p-32;
  s0 = s1;
  s1 = s2;
  carry = (int32_t)t;
  s2 = t - carry;
  return s2 + 0x1p-33;
}

static uint8_t binOfCosine[LOOKUP + 1];

static void makeLookup(void) {
  for (int i = 0; i <= LOOKUP; i++) {
    const double cosine = smaller(1, -1 + 2 * (i + 0.5) / LOOKUP);
    binOfCosine[i] = smaller(FLIGHT_BINS - 1, floor(sqrt(0.5 * (1 - cosine)) * FLIGHT_BINS));
  }
}

static inline double sampleHenyeyGreenstein(double g, double u) {
  const double s = 2 * u - 1, b = 1 + g * s;
  const double cosine = ((2 + g * s) * s * (1 + g * g) + g * (3 - g * g)) / (2 * b * b);
  return smaller(1, larger(-1, cosine));
}

// Adds a segment to the tally, at a point drawn along it.
#define TALLY(step)                                                                                                            \
  do {                                                                                                                         \
    along += GOLDEN;                                                                                                           \
    along -= (int)along;                                                                                                       \
    const double at = s + along * (step);                                                                                      \
    tally[cell * FLIGHT_BINS + binOfCosine[(int)((at / sqrt(b2 + at * at) + 1) * (LOOKUP / 2))]] += weight * (step);           \
  } while (0)

static void tallyFlights(const Medium *m, int packets, double *tally) {
  const double *extinction = m->extinction, *radii = m->r, *depths = m->opticalDepth;
  const double g = m->asymmetry[0], scale = 1.0 / packets;
  const int cells = m->cells;
  double *squares = malloc((cells + 1) * sizeof(double)), *albedo = malloc(cells * sizeof(double));
  for (int i = 0; i <= cells; i++) squares[i] = radii[i] * radii[i];
  for (int i = 0; i < cells; i++) albedo[i] = extinction[i] > 0 ? m->scattering[i] / extinction[i] : 0;
  memset(tally, 0, (size_t)cells * FLIGHT_BINS * sizeof(double));
  for (int n = 0; n < packets; n++) {
    uniform(); // chooses the source, of which there is one
    const double first = -log1p(uniform() * expm1(-depths[cells]));
    int cell = 0, high = cells;
    while (high - cell > 1) {
      const int middle = (cell + high) >> 1;
      if (depths[middle] <= first) cell = middle;
      else high = middle;
    }
    const double share = smaller(1, (first - depths[cell]) / (depths[cell + 1] - depths[cell]));
    const double radius = radii[cell] + share * (radii[cell + 1] - radii[cell]);
    double weight = m->removed * scale * albedo[cell];
    double mu = sampleHenyeyGreenstein(g, uniform());
    const double least = ROULETTE_BELOW * weight;
    double s = radius * mu;
    double b2 = radius * radius * (1 - mu * mu);
    double remaining = -log(uniform());
    double along = uniform();
    while (weight > 0) {
      double opacity = 0;
      bool collides = false;
      while (s < 0) {
        const double below = squares[cell] - b2;
        const bool inwards = below > 0;
        const double wall = inwards ? -sqrt(below) : sqrt(larger(0, squares[cell + 1] - b2));
        const double step = larger(0, wall - s);
        opacity = extinction[cell];
        const double depth = step * opacity;
        collides = depth >= remaining;
        if (collides) break;
        TALLY(step);
        remaining -= depth;
        s += step;
        cell += inwards ? -1 : 1;
        if (cell == cells) goto left;
      }
      while (!collides) {
        const double step = larger(0, sqrt(larger(0, squares[cell + 1] - b2)) - s);
        opacity = extinction[cell];
        const double depth = step * opacity;
        collides = depth >= remaining;
        if (collides) break;
        TALLY(step);
        remaining -= depth;
        s += step;
        cell++;
        if (cell == cells) goto left;
      }
      const double step = remaining / opacity;
      TALLY(step);
      weight *= albedo[cell];
      if (weight < least) weight = uniform() < SURVIVAL ? weight / SURVIVAL : 0;
      s += step;
      const double r2 = b2 + s * s;
      const double r = sqrt(r2);
      const double before = smaller(1, larger(-1, s / r));
      const double turn = sampleHenyeyGreenstein(g, uniform());
      const double across = sqrt((1 - before * before) * (1 - turn * turn));
      mu = smaller(1, larger(-1, before * turn + across * cos(2 * M_PI * uniform())));
      s = r * mu;
      b2 = r2 * (1 - mu * mu);
      remaining = -log(uniform());
    }
  left:;
  }
  free(squares);
  free(albedo);
}

int main(int argc, char **argv) {
  if (argc != 6) {
    fprintf(stderr, "flights MEDIUM TALLY SEED PACKETS WARMUP\n");
    return 2;
  }
  const Medium m = readMedium(argv[1]);
  const size_t size = (size_t)m.cells * FLIGHT_BINS;
  double *tally = malloc(size * sizeof(double));
  makeLookup();
  seed("warm-up");
  tallyFlights(&m, atoi(argv[5]), tally);
  seed(argv[3]);
  const double wall = secondsOf(CLOCK_MONOTONIC), cpu = secondsOf(CLOCK_PROCESS_CPUTIME_ID);
  tallyFlights(&m, atoi(argv[4]), tally);
  printf("{\"wallSeconds\": %.9f, \"cpuSeconds\": %.9f}\n", secondsOf(CLOCK_MONOTONIC) - wall,
         secondsOf(CLOCK_PROCESS_CPUTIME_ID) - cpu);
  FILE *file = fopen(argv[2], "wb");
  if (!file || fwrite(tally, sizeof(double), size, file) != size || fclose(file)) {
    perror(argv[2]);
    return 2;
  }
  return 0;
}
