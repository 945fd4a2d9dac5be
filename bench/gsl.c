/* Nanoseconds per uniform double of GSL's generators and per coordinate of its quasi-random sequences.
 * Usage: gsl rng NAME DRAWS | gsl qrng NAME DIMENSION POINTS; prints a checksum and seconds. */
#include <gsl/gsl_qrng.h>
#include <gsl/gsl_rng.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

static double seconds(void) {
  struct timespec t;
  clock_gettime(CLOCK_MONOTONIC, &t);
  return t.tv_sec + t.tv_nsec * 1e-9;
}

int main(int argc, char **argv) {
  double sum = 0, start;
  if (argc == 4 && !strcmp(argv[1], "rng")) {
    for (const gsl_rng_type **type = gsl_rng_types_setup(); *type; type++) {
      if (strcmp((*type)->name, argv[2])) continue;
      gsl_rng *rng = gsl_rng_alloc(*type);
      long draws = atol(argv[3]);
      start = seconds();
      for (long i = 0; i < draws; i++) sum += gsl_rng_uniform(rng);
      printf("%.17g %.9f\n", sum, seconds() - start);
      return 0;
    }
  } else if (argc == 5 && !strcmp(argv[1], "qrng")) {
    const gsl_qrng_type *type = !strcmp(argv[2], "sobol") ? gsl_qrng_sobol : !strcmp(argv[2], "halton") ? gsl_qrng_halton : gsl_qrng_niederreiter_2;
    int d = atoi(argv[3]);
    long points = atol(argv[4]);
    gsl_qrng *q = gsl_qrng_alloc(type, d);
    double x[64];
    start = seconds();
    for (long i = 0; i < points; i++) {
      gsl_qrng_get(q, x);
      sum += x[d - 1];
    }
    printf("%.17g %.9f\n", sum, seconds() - start);
    return 0;
  }
  return 2;
}
