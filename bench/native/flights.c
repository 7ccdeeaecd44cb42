// The twin of the packet loop in one dimension (src/kernels/flights), operation for operation: a point star
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

enum { FLIGHT_BINS = 64, STEPS = 4096 };
static const double ROULETTE_BELOW = 0.1, SPLIT_ABOVE = 4, MOST_PARTS = 32, LONGEST = 4;
enum { MOST_WAITING = 1024 };

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

static uint8_t binOfFlight[STEPS + 1];

// Tables of the exponential deviates: see src/math/exponential.ts.
enum { LOG_STEPS = 256 };
static const double LN2 = 0.6931471805599453;
static double reciprocal[LOG_STEPS], rest[LOG_STEPS], power[33];

static void makeTables(void) {
  for (int i = 0; i <= STEPS; i++) {
    const double square = (i + 0.5) / (STEPS / 2) - 1, cosine = copysign(sqrt(fabs(square)), square);
    binOfFlight[i] = smaller(FLIGHT_BINS - 1, floor(sqrt(larger(0, 0.5 * (1 - cosine))) * FLIGHT_BINS));
  }
  for (int i = 0; i < LOG_STEPS; i++) {
    reciprocal[i] = 1 / (1 + (i + 0.5) / LOG_STEPS);
    rest[i] = LN2 + log(reciprocal[i]);
  }
  for (int i = 0; i <= 32; i++) power[i] = ldexp(1, i - 31);
}

static inline double exponential(double u) {
  const double scaled = u * 0x1p32;
  const uint32_t k = (uint64_t)scaled;
  const int zeros = __builtin_clzll((uint64_t)k << 32 | 0x80000000u);
  const int i = (uint32_t)((uint64_t)k << zeros | (1ull << zeros) >> 1) >> 23 & (LOG_STEPS - 1);
  const double d = scaled * power[zeros] * reciprocal[i] - 1;
  return zeros * LN2 + rest[i] - (d - d * d * (1. / 2 - d * (1. / 3)));
}

static inline double cosAzimuth(double u) {
  const double w = u - 0.5, x = w * w, x2 = x * x;
  const double low = 3.14159265353629 - x * 5.167712764624471;
  const double middle = 2.5501633189452115 - x * 0.5992521978037336;
  const double high = 0.08205040171614679 - x * 0.007028386258010294;
  return w * (low + x2 * (middle + x2 * high));
}

static inline double sampleHenyeyGreenstein(double g, double u) {
  const double s = 2 * u - 1, b = 1 + g * s;
  const double cosine = ((2 + g * s) * s * (1 + g * g) + g * (3 - g * g)) / (2 * b * b);
  return smaller(1, larger(-1, cosine));
}

// See src/transport/importance.ts.
static void importanceOf(const Medium *m, double *importance) {
  double above = 0;
  for (int cell = m->cells - 1; cell >= 0; cell--) {
    double h[4], law = 1;
    for (int order = 0; order < 4; order++, law *= m->asymmetry[0])
      h[order] = (2 * order + 1) * (m->extinction[cell] - m->scattering[cell] * law);
    double fades = 0;
    if (h[3] > 0) {
      const double b = h[2] + 9 * h[0] * h[1] / h[3] + 4 * h[0], c = larger(0, h[0] * h[1] * h[2]);
      fades = sqrt(2 * c / (b + sqrt(larger(0, b * b - 36 * c / h[3]))));
    }
    const double depth = smaller(m->extinction[cell], fades) * (m->r[cell + 1] - m->r[cell]);
    importance[cell] = larger(1e-200, exp(-above - 0.5 * depth));
    above += depth;
  }
}

static double meanImportance(const Medium *m, const double *importance) {
  double sum = 0, before = 0;
  for (int cell = 0; cell < m->cells; cell++) {
    const double cumulative = -expm1(-m->opticalDepth[cell + 1]);
    sum += (cumulative - before) * importance[cell];
    before = cumulative;
  }
  return sum / before;
}

// Parts of split packets that wait for their turn.
static struct {
  double s, b2, weight;
  int cell, parts;
  bool straight;
} waiting[MOST_WAITING];

// Adds a segment to the tally, at a point drawn along it.
#define TALLY(step)                                                                                                            \
  do {                                                                                                                         \
    place += 0x9e3779b9u;                                                                                                      \
    const double at = s + place * 0x1p-32 * (step), at2 = at * at;                                                             \
    const int bin = binOfFlight[(int)(STEPS / 2 * SIGNED(at) / (b2 + at2) + STEPS / 2)];                                     \
    tally[cell * FLIGHT_BINS + bin] += weight * (step);                                                                        \
  } while (0)

static void tallyFlights(const Medium *m, int packets, double *tally) {
  const double *extinction = m->extinction, *radii = m->r, *depths = m->opticalDepth;
  const double g = m->asymmetry[0], scale = 1.0 / packets, starRadius2 = m->starRadius2;
  const int cells = m->cells;
  double *squares = malloc((cells + 1) * sizeof(double)), *albedo = malloc(cells * sizeof(double));
  for (int i = 0; i <= cells; i++) squares[i] = radii[i] * radii[i];
  for (int i = 0; i < cells; i++) albedo[i] = extinction[i] > 0 ? m->scattering[i] / extinction[i] : 0;
  double *importance = malloc(cells * sizeof(double));
  importanceOf(m, importance);
  const double worth = m->removed * scale * meanImportance(m, importance);
  const double least = ROULETTE_BELOW * worth, most = SPLIT_ABOVE * worth;
  const double all = depths[cells], caught = -expm1(-all);
  memset(tally, 0, (size_t)cells * FLIGHT_BINS * sizeof(double));
  for (int n = 0; n < packets; n++) {
    uniform(); // chooses the source, of which there is one
    const double u = 2 * uniform();
    const double first = u < 1 ? -log1p(-u * caught) : (u - 1) * all;
    const double favour = 2 / (1 + caught * exp(first) / all);
    int cell = 0, high = cells;
    while (high - cell > 1) {
      const int middle = (cell + high) >> 1;
      if (depths[middle] <= first) cell = middle;
      else high = middle;
    }
    const double share = smaller(1, (first - depths[cell]) / (depths[cell + 1] - depths[cell]));
    const double radius = radii[cell] + share * (radii[cell + 1] - radii[cell]);
    double weight = m->removed * scale * favour * albedo[cell];
    const double mu = sampleHenyeyGreenstein(g, uniform());
    double s = radius * mu;
    double b2 = radius * radius * (1 - mu * mu);
    uint32_t place = uniform() * 0x1p32;
    int held = 0;
    for (;;) {
      double remaining = exponential(uniform());
      bool straight = remaining > LONGEST;
      if (straight) remaining = LONGEST;
      double opacity = 0;
      bool collides = false;
#define SIGNED(at) at * fabs(at)
      while (s < 0) {
        const double below = squares[cell] - b2;
        const bool inwards = below > 0;
        double next = larger(inwards ? -sqrt(below) : sqrt(squares[cell + 1] - b2), s);
        bool ends = false;
        if (b2 < starRadius2) {
          const double star = -sqrt(starRadius2 - b2);
          if (star < next) next = larger(star, s), ends = true;
        }
        const double step = next - s;
        opacity = extinction[cell];
        const double depth = step * opacity;
        collides = depth >= remaining;
        if (collides) break;
        TALLY(step);
        if (ends) goto gone;
        remaining -= depth;
        s = next;
        cell += inwards ? -1 : 1;
        if (cell == cells) goto gone;
      }
#undef SIGNED
#define SIGNED(at) at2
      while (!collides) {
        const double next = larger(sqrt(squares[cell + 1] - b2), s);
        const double step = next - s;
        opacity = extinction[cell];
        const double depth = step * opacity;
        collides = depth >= remaining;
        if (collides) break;
        TALLY(step);
        remaining -= depth;
        s = next;
        cell++;
        if (cell == cells) goto gone;
      }
#undef SIGNED
#define SIGNED(at) at * fabs(at)
      const double step = remaining / opacity;
      TALLY(step);
      s += step;
      if (!straight) weight *= albedo[cell];
      const double here = weight * importance[cell];
      if (here < least) {
        if (uniform() * worth >= here) goto gone;
        weight *= worth / here;
      } else if (here > most && held < MOST_WAITING) {
        const double parts = smaller(MOST_PARTS, floor(here / worth + 0.5));
        weight /= parts;
        waiting[held].s = s, waiting[held].b2 = b2, waiting[held].weight = weight;
        waiting[held].cell = cell, waiting[held].parts = parts - 1;
        waiting[held].straight = straight;
        held++;
      }
      goto scatter;
    gone:
      if (held == 0) break;
      s = waiting[held - 1].s, b2 = waiting[held - 1].b2, weight = waiting[held - 1].weight, cell = waiting[held - 1].cell;
      straight = waiting[held - 1].straight;
      if (--waiting[held - 1].parts == 0) held--;
    scatter:;
      if (straight) continue;
      const double r2 = b2 + s * s;
      const double turn = sampleHenyeyGreenstein(g, uniform());
      s = s * turn + sqrt(b2 * (1 - turn * turn)) * cosAzimuth(uniform());
      b2 = larger(0, r2 - s * s);
    }
  }
  free(squares);
  free(importance);
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
  makeTables();
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
