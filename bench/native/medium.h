// Dust and a point star at one wavelength, read from a file of doubles: see bench/medium-file.ts, which writes it.
#pragma once
#include <stdio.h>
#include <stdlib.h>

typedef struct {
  int nr, nt, laws, cells;
  // Squared radius of a star at the centre, cm2; 0 for a point.
  double luminosity, removed, starRadius2;
  const double *r, *cosTheta, *extinction, *asymmetry, *scattering, *emitted, *opticalDepth;
} Medium;

static Medium readMedium(const char *path) {
  FILE *file = fopen(path, "rb");
  if (!file) {
    perror(path);
    exit(2);
  }
  fseek(file, 0, SEEK_END);
  const size_t bytes = ftell(file);
  rewind(file);
  double *data = malloc(bytes);
  if (fread(data, 1, bytes, file) != bytes) {
    fprintf(stderr, "%s: cut short\n", path);
    exit(2);
  }
  fclose(file);
  Medium m = {.nr = data[0], .nt = data[1], .laws = data[2], .cells = data[3], .luminosity = data[4], .removed = data[5],
              .starRadius2 = data[6]};
  const double *at = data + 7;
  m.r = at, at += m.nr + 1;
  m.cosTheta = at, at += m.nt + 1;
  m.extinction = at, at += m.cells;
  m.asymmetry = at, at += m.laws;
  m.scattering = at, at += (size_t)m.laws * m.cells;
  m.emitted = at, at += m.cells;
  m.opticalDepth = at, at += (size_t)m.nt * (m.nr + 1);
  if ((size_t)(at - data) * sizeof(double) != bytes) {
    fprintf(stderr, "%s: %zu bytes are too many or too few\n", path, bytes);
    exit(2);
  }
  return m;
}
