// Brute-force peel-off images of a point star and glowing dust in spherical or axisymmetric cells: every emission by dust and every
// scattering sends its light, dimmed by the cells on the way, to one camera (Yusef-Zadeh, Morris & White 1984, ApJ 278, 186).
// Analog flights, albedo as a weight. Starlight that is not scattered is left out.
// peel MEDIUM IMAGES INCLINATION HALF PIXELS PACKETS FORCED SEED: inclination in degrees, half the field in cm; FORCED 1 makes the first
// scattering of starlight certain. Writes GROUPS images one after another (erg/s/Hz/sr in a pixel, each a full estimate) and prints the times.
#include "clock.h"
#include "medium.h"
#include <math.h>
#include <stdbool.h>
#include <stdint.h>

enum { GROUPS = 16 };
static const double ROULETTE_BELOW = 1e-3, SURVIVAL = 0.1, OPAQUE = 80;

// xoshiro256+ 1.0 of Blackman & Vigna (2018), public domain, started by splitmix64.
static uint64_t state[4];

static void seed(uint64_t x) {
  for (int i = 0; i < 4; i++) {
    uint64_t z = x += 0x9e3779b97f4a7c15u;
    z = (z ^ z >> 30) * 0xbf58476d1ce4e5b9u;
    z = (z ^ z >> 27) * 0x94d049bb133111ebu;
    state[i] = z ^ z >> 31;
  }
}

static inline double uniform(void) {
  const uint64_t sum = state[0] + state[3], t = state[1] << 17;
  state[2] ^= state[0], state[3] ^= state[1], state[1] ^= state[2], state[0] ^= state[3];
  state[2] ^= t;
  state[3] = state[3] << 45 | state[3] >> 19;
  return ((sum >> 11) + 0.5) * 0x1p-53;
}

static Medium m;
static double *r2, *cos2;

// A ray: a point, a unit vector and the cell (shell ir, cone it; shell 0 is not divided).
typedef struct {
  double x, y, z, ux, uy, uz;
  int ir, it;
} Ray;

static inline int cellOf(const Ray *p) { return p->ir == 0 ? 0 : 1 + (p->ir - 1) * m.nt + p->it; }

static int coneOf(double mu) {
  int low = 0, high = m.nt;
  while (high - low > 1) {
    const int middle = (low + high) >> 1;
    if (m.cosTheta[middle] >= mu) low = middle;
    else high = middle;
  }
  return low;
}

// Path to the nearest wall ahead of the cell; *next says which: 0 inner, 1 outer sphere, 2 upper, 3 lower cone.
static inline double toWall(const Ray *p, int *next) {
  const double b = p->x * p->ux + p->y * p->uy + p->z * p->uz;
  const double rr = p->x * p->x + p->y * p->y + p->z * p->z;
  double best;
  const double inner = b * b - rr + r2[p->ir];
  if (b < 0 && inner > 0 && p->ir > 0) {
    best = -b - sqrt(inner);
    *next = 0;
  } else {
    const double outer = b * b - rr + r2[p->ir + 1];
    best = outer > 0 ? -b + sqrt(outer) : 0;
    *next = 1;
  }
  if (p->ir > 0 && m.nt > 1) {
    for (int side = 0; side < 2; side++) {
      const int k = p->it + side;
      if (k == 0 || k == m.nt) continue;
      // On the cone z^2 = c^2 r^2 with z of the sign of c: the smallest positive root that leaves the cell.
      const double c = m.cosTheta[k], c2 = cos2[k];
      const double qa = p->uz * p->uz - c2, qb = p->z * p->uz - c2 * b, qc = p->z * p->z - c2 * rr;
      // The midplane is a cone of one root, which rounding must not take away.
      const double d = c == 0 ? 0 : qb * qb - qa * qc;
      if (c != 0 ? d <= 0 : qa == 0) continue;
      const double root = sqrt(d), q = qb > 0 ? -qb - root : -qb + root;
      const double t[2] = {q / qa, qc / q};
      for (int i = 0; i < 2; i++) {
        if (!(t[i] > 0 && t[i] < best)) continue;
        const double z = p->z + t[i] * p->uz;
        if (c != 0 && z * c < 0) continue;
        // Leaving means that the cosine rises through the upper cone or falls through the lower one.
        const double rate = p->uz * (rr + 2 * b * t[i] + t[i] * t[i]) - z * (b + t[i]);
        if (side == 0 ? rate <= 0 : rate >= 0) continue;
        best = t[i];
        *next = 2 + side;
      }
    }
  }
  return best > 0 ? best : 0;
}

// Moves over a wall; false when the ray has left the cells.
static inline bool cross(Ray *p, double step, int wall) {
  p->x += step * p->ux, p->y += step * p->uy, p->z += step * p->uz;
  switch (wall) {
  case 0: p->ir--; return true;
  case 1:
    if (++p->ir == m.nr) return false;
    if (p->ir == 1) p->it = coneOf(p->z / sqrt(p->x * p->x + p->y * p->y + p->z * p->z));
    return true;
  case 2: p->it--; return true;
  default: p->it++; return true;
  }
}

static double depthAhead(Ray p) {
  double depth = 0;
  int wall;
  for (;;) {
    const double step = toWall(&p, &wall);
    depth += step * m.extinction[cellOf(&p)];
    if (depth > OPAQUE || !cross(&p, step, wall)) return depth;
  }
}

static double nx, nz, half, g;
static int pixels;

static void peel(const Ray *at, double weight, bool scattered, double *image) {
  // The picture: its horizontal axis is y of the scene, its vertical one the projected z axis.
  const int column = floor((at->y + half) / (2 * half) * pixels);
  const int row = floor((at->z * nx - at->x * nz + half) / (2 * half) * pixels);
  if (column < 0 || column >= pixels || row < 0 || row >= pixels) return;
  const double a = 1 + g * g - 2 * g * (at->ux * nx + at->uz * nz);
  const double law = (scattered ? (1 - g * g) / (a * sqrt(a)) : 1) / (4 * M_PI);
  Ray sight = *at;
  sight.ux = nx, sight.uy = 0, sight.uz = nz;
  image[row * pixels + column] += weight * law * exp(-depthAhead(sight));
}

static void scatter(Ray *p) {
  const double u = 2 * uniform() - 1, f = (1 - g * g) / (1 + g * u);
  const double mu = fabs(g) < 1e-6 ? u : fmin(1, fmax(-1, (1 + g * g - f * f) / (2 * g)));
  const double sine = sqrt(1 - mu * mu), azimuth = 2 * M_PI * uniform();
  const double a = sine * cos(azimuth), b = sine * sin(azimuth), h = sqrt(p->ux * p->ux + p->uy * p->uy);
  const double ux = p->ux, uy = p->uy, uz = p->uz;
  if (h < 1e-9) {
    p->ux = a, p->uy = b, p->uz = uz > 0 ? mu : -mu;
    return;
  }
  p->ux = mu * ux + (a * ux * uz - b * uy) / h;
  p->uy = mu * uy + (a * uy * uz + b * ux) / h;
  p->uz = mu * uz - a * h;
  const double norm = 1 / sqrt(p->ux * p->ux + p->uy * p->uy + p->uz * p->uz);
  p->ux *= norm, p->uy *= norm, p->uz *= norm;
}

// Running sum of what the cells emit.
static double *glow, starlight;

// A point drawn evenly in the volume of a cell drawn by what it emits.
static void placeInDust(Ray *p) {
  const double u = uniform() * glow[m.cells - 1];
  int cell = 0, high = m.cells - 1;
  while (cell < high) {
    const int middle = (cell + high) >> 1;
    if (glow[middle] > u) high = middle;
    else cell = middle + 1;
  }
  p->ir = cell == 0 ? 0 : 1 + (cell - 1) / m.nt;
  p->it = cell == 0 ? 0 : (cell - 1) % m.nt;
  const double a = m.r[p->ir], b = m.r[p->ir + 1];
  const double radius = cbrt(a * a * a + uniform() * (b * b * b - a * a * a));
  const double low = cell == 0 ? -1 : m.cosTheta[p->it + 1], top = cell == 0 ? 1 : m.cosTheta[p->it];
  const double mu = low + uniform() * (top - low), azimuth = 2 * M_PI * uniform();
  p->x = radius * sqrt(1 - mu * mu) * cos(azimuth);
  p->y = radius * sqrt(1 - mu * mu) * sin(azimuth);
  p->z = radius * mu;
}

static void followPacket(double power, bool forced, double *image) {
  const double mu = 2 * uniform() - 1, sine = sqrt(1 - mu * mu), azimuth = 2 * M_PI * uniform();
  Ray p = {0, 0, 0, sine * cos(azimuth), sine * sin(azimuth), mu, 0, 0};
  double weight = power, first = power, remaining;
  const bool fromStar = uniform() * (starlight + glow[m.cells - 1]) < starlight;
  if (!fromStar) {
    placeInDust(&p);
    peel(&p, weight, false, image);
  }
  if (fromStar && forced) {
    const double caught = -expm1(-depthAhead(p));
    first = weight *= caught;
    if (!(weight > 0)) return;
    remaining = -log1p(-uniform() * caught);
  } else remaining = -log(uniform());
  for (;;) {
    int wall;
    const double step = toWall(&p, &wall);
    const int cell = cellOf(&p);
    const double depth = step * m.extinction[cell];
    if (depth < remaining) {
      remaining -= depth;
      if (!cross(&p, step, wall)) return;
      continue;
    }
    const double part = remaining / m.extinction[cell];
    p.x += part * p.ux, p.y += part * p.uy, p.z += part * p.uz;
    weight *= m.scattering[cell] / m.extinction[cell];
    peel(&p, weight, true, image);
    if (weight < ROULETTE_BELOW * first) {
      if (uniform() >= SURVIVAL) return;
      weight /= SURVIVAL;
    }
    scatter(&p);
    remaining = -log(uniform());
  }
}

int main(int argc, char **argv) {
  if (argc != 9) {
    fprintf(stderr, "peel MEDIUM IMAGES INCLINATION HALF PIXELS PACKETS FORCED SEED\n");
    return 2;
  }
  m = readMedium(argv[1]);
  g = m.asymmetry[0];
  const double inclination = atof(argv[3]) * M_PI / 180;
  nx = sin(inclination), nz = cos(inclination);
  half = atof(argv[4]);
  pixels = atoi(argv[5]);
  const int each = (int)(atof(argv[6]) / GROUPS), forced = atoi(argv[7]);
  r2 = malloc((m.nr + 1) * sizeof(double));
  for (int i = 0; i <= m.nr; i++) r2[i] = m.r[i] * m.r[i];
  cos2 = malloc((m.nt + 1) * sizeof(double));
  for (int i = 0; i <= m.nt; i++) cos2[i] = m.cosTheta[i] * m.cosTheta[i];
  const size_t size = (size_t)GROUPS * pixels * pixels;
  double *images = calloc(size, sizeof(double));
  glow = malloc(m.cells * sizeof(double));
  double sum = 0;
  for (int i = 0; i < m.cells; i++) glow[i] = sum += m.emitted[i];
  starlight = m.luminosity;
  const double power = (starlight + sum) / each;
  for (int warm = 1; warm >= 0; warm--) {
    for (size_t i = 0; i < size; i++) images[i] = 0;
    seed(atoi(argv[8]) + warm * 1000);
    const double wall = secondsOf(CLOCK_MONOTONIC), cpu = secondsOf(CLOCK_PROCESS_CPUTIME_ID);
    for (int group = 0; group < GROUPS; group++)
      for (int n = 0; n < (warm ? each / 50 : each); n++) followPacket(power, forced, images + (size_t)group * pixels * pixels);
    if (!warm)
      printf("{\"wallSeconds\": %.9f, \"cpuSeconds\": %.9f}\n", secondsOf(CLOCK_MONOTONIC) - wall,
             secondsOf(CLOCK_PROCESS_CPUTIME_ID) - cpu);
  }
  FILE *file = fopen(argv[2], "wb");
  if (!file || fwrite(images, sizeof(double), size, file) != size || fclose(file)) {
    perror(argv[2]);
    return 2;
  }
  return 0;
}
