/* The four benchmark integrands in C, as a careful engineer would write them: blocks of 512 points, one coordinate after
 * the other, loops that gcc vectorises. Generators: xoshiro256++ (Blackman & Vigna 2021) and Sobol' in Gray-code order with
 * direction integers read from a file. Usage: peer WORKLOAD xoshiro|sobol POINTS DIRECTIONS; prints estimate and seconds. */
#include <math.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

enum { BLOCK = 512, MAXD = 64 };
static double x[MAXD][BLOCK], f[BLOCK];

static uint64_t s[4] = {0x9e3779b97f4a7c15u, 0xbf58476d1ce4e5b9u, 0x94d049bb133111ebu, 0x2545f4914f6cdd1du};
static inline uint64_t rotl(uint64_t v, int k) { return v << k | v >> (64 - k); }
static inline uint64_t next64(void) {
  uint64_t r = rotl(s[0] + s[3], 23) + s[0], t = s[1] << 17;
  s[2] ^= s[0]; s[3] ^= s[1]; s[1] ^= s[2]; s[0] ^= s[3]; s[2] ^= t; s[3] = rotl(s[3], 45);
  return r;
}
static void fill_xoshiro(int d, int n) {
  for (int i = 0; i < n; i++)
    for (int j = 0; j < d; j++) x[j][i] = ((double)(next64() >> 12) + 0.5) * 0x1p-52;
}

static uint32_t mt[624];
static int used = 624;
static void mt_seed(uint32_t seed) {
  mt[0] = seed;
  for (uint32_t i = 1; i < 624; i++) mt[i] = 1812433253u * (mt[i - 1] ^ mt[i - 1] >> 30) + i;
}
static inline uint32_t mix(uint32_t high, uint32_t low) {
  uint32_t y = (high & 0x80000000u) | (low & 0x7fffffffu);
  return y >> 1 ^ (-(low & 1u) & 0x9908b0dfu);
}
static void mt_twist(void) {
  for (int i = 0; i < 227; i++) mt[i] = mt[i + 397] ^ mix(mt[i], mt[i + 1]);
  for (int i = 227; i < 623; i++) mt[i] = mt[i - 227] ^ mix(mt[i], mt[i + 1]);
  mt[623] = mt[396] ^ mix(mt[623], mt[0]);
  used = 0;
}
static inline uint32_t next32(void) {
  if (used == 624) mt_twist();
  uint32_t y = mt[used++];
  y ^= y >> 11;
  y ^= y << 7 & 0x9d2c5680u;
  y ^= y << 15 & 0xefc60000u;
  return y ^ y >> 18;
}
static void fill_mt(int d, int n) {
  for (int i = 0; i < n; i++)
    for (int j = 0; j < d; j++) x[j][i] = ((double)next32() + 0.5) * 0x1p-32;
}

static uint64_t direction[MAXD][52], state[MAXD], count;
static void fill_sobol(int d, int n) {
  for (int j = 0; j < d; j++) {
    uint64_t v = state[j];
    for (int i = 0; i < n; i++) {
      x[j][i] = ((double)v + 0.5) * 0x1p-52;
      v ^= direction[j][__builtin_ctzll(count + i + 1)];
    }
    state[j] = v;
  }
  count += n;
}

/* AS 241, PPND16 (Wichura 1988). */
static inline double quantile(double p) {
  double q = p - 0.5;
  if (fabs(q) <= 0.425) {
    double r = 0.180625 - q * q;
    return q * (((((((2509.0809287301226727 * r + 33430.575583588128105) * r + 67265.770927008700853) * r + 45921.953931549871457) * r + 13731.693765509461125) * r + 1971.5909503065514427) * r + 133.14166789178437745) * r + 3.387132872796366608) /
           (((((((5226.495278852545925 * r + 28729.085735721942674) * r + 39307.89580009271061) * r + 21213.794301586595867) * r + 5394.1960214247511077) * r + 687.1870074920579083) * r + 42.313330701600911252) * r + 1.0);
  }
  double r = sqrt(-log(q < 0 ? p : 1 - p)), y;
  if (r <= 5) {
    r -= 1.6;
    y = (((((((7.7454501427834140764e-4 * r + 0.0227238449892691845833) * r + 0.24178072517745061177) * r + 1.27045825245236838258) * r + 3.64784832476320460504) * r + 5.7694972214606914055) * r + 4.6303378461565452959) * r + 1.42343711074968357734) /
        (((((((1.05075007164441684324e-9 * r + 5.475938084995344946e-4) * r + 0.0151986665636164571966) * r + 0.14810397642748007459) * r + 0.68976733498510000455) * r + 1.6763848301838038494) * r + 2.05319162663775882187) * r + 1.0);
  } else {
    r -= 5;
    y = (((((((2.01033439929228813265e-7 * r + 2.71155556874348757815e-5) * r + 0.0012426609473880784386) * r + 0.026532189526576123093) * r + 0.29656057182850489123) * r + 1.7848265399172913358) * r + 5.4637849111641143699) * r + 6.6579046435011037772) /
        (((((((2.04426310338993978564e-15 * r + 1.4215117583164458887e-7) * r + 1.8463183175100546818e-5) * r + 7.868691311456132591e-4) * r + 0.0148753612908506148525) * r + 0.13692988092273580531) * r + 0.59983220655588793769) * r + 1.0);
  }
  return q < 0 ? -y : y;
}

static void peak(int n) {
  double sum[BLOCK] = {0};
  for (int j = 0; j < 8; j++) {
    double c = 0.6 + 0.1 * j, w = 0.3 + 0.05 * j;
    for (int i = 0; i < n; i++) sum[i] += c * c * (x[j][i] - w) * (x[j][i] - w);
  }
  for (int i = 0; i < n; i++) f[i] = exp(-sum[i]);
}
static void product(int n) {
  for (int i = 0; i < n; i++) f[i] = 1;
  for (int j = 0; j < 16; j++) {
    double a = 0.5 * (j + 1);
    for (int i = 0; i < n; i++) f[i] *= (fabs(4 * x[j][i] - 2) + a) / (1 + a);
  }
}
static void path(int n) {
  double run[BLOCK] = {0}, sum[BLOCK] = {0};
  for (int j = 0; j < 64; j++) {
    for (int i = 0; i < n; i++) x[j][i] = quantile(x[j][i]);
    for (int i = 0; i < n; i++) {
      run[i] += (0.05 - 0.02) / 64 + 0.025 * x[j][i];
      sum[i] += exp(run[i]);
    }
  }
  for (int i = 0; i < n; i++) f[i] = fmax(100 * sum[i] / 64 - 100, 0);
}
static void wave(int n) {
  double sum[BLOCK] = {0};
  for (int j = 0; j < 10; j++) {
    double c = 0.9 / (1 + 0.1 * j);
    for (int i = 0; i < n; i++) sum[i] += c * x[j][i];
  }
  for (int i = 0; i < n; i++) f[i] = cos(2 * M_PI * 0.3 + sum[i]);
}

int main(int argc, char **argv) {
  if (argc < 5) return 2;
  const char *name = argv[1];
  void (*fill)(int, int) = !strcmp(argv[2], "sobol") ? fill_sobol : !strcmp(argv[2], "mt19937") ? fill_mt : fill_xoshiro;
  mt_seed(5489);
  long n = atol(argv[3]);
  int d = !strcmp(name, "peak") ? 8 : !strcmp(name, "product") ? 16 : !strcmp(name, "path") ? 64 : 10;
  void (*evaluate)(int) = !strcmp(name, "peak") ? peak : !strcmp(name, "product") ? product : !strcmp(name, "path") ? path : wave;
  FILE *file = fopen(argv[4], "rb");
  if (!file || fread(direction, 8, sizeof direction / 8, file) != sizeof direction / 8) return 2;
  fclose(file);
  struct timespec a, b;
  clock_gettime(CLOCK_MONOTONIC, &a);
  double total = 0;
  for (long begin = 0; begin < n; begin += BLOCK) {
    int size = n - begin < BLOCK ? (int)(n - begin) : BLOCK;
    fill(d, size);
    evaluate(size);
    double sum = 0;
    for (int i = 0; i < size; i++) sum += f[i];
    total += sum;
  }
  clock_gettime(CLOCK_MONOTONIC, &b);
  printf("%.17g %.9f\n", total / n, (b.tv_sec - a.tv_sec) + (b.tv_nsec - a.tv_nsec) * 1e-9);
  return 0;
}
