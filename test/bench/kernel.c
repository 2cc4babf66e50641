/*
 * The two pair sums in plain C, for the compiler to vectorise: how fast this machine could be.
 *
 *   kernel segments|rings COUNT REPEATS
 *
 * prints nanoseconds of processor time a pair (median of REPEATS) and a checksum that the bench compares with the kernel's.
 * Elliptic integrals by polynomials in m1 and ln(1/m1) (S. L. Moshier, Methods and Programs for Mathematical Functions, 1989,
 * double precision), which vectorise where a table look-up does not.
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

#define MOST 4096

static double x[MOST], y[MOST], z[MOST], gx[MOST], gy[MOST], gz[MOST], d2[MOST], tx[MOST], ty[MOST], tz[MOST];
static double ux[MOST], uy[MOST], uz[MOST];

/* Park & Miller 1988, as in the bench. */
static double uniform(void) {
  static long long state = 1;
  state = state * 16807 % 2147483647;
  return (double)state / 2147483647;
}

static void segments(int count) {
  for (int i = 0; i < count; i++) {
    double a = 0, b = 0, c = 0;
    const double px = tx[i], py = ty[i], pz = tz[i];
    for (int j = 0; j < count; j++) {
      const double sx = px - x[j], sy = py - y[j], sz = pz - z[j];
      const double square = sx * sx + sy * sy + sz * sz + d2[j];
      const double weight = 1 / (square * sqrt(square));
      a += (gy[j] * sz - gz[j] * sy) * weight;
      b += (gz[j] * sx - gx[j] * sz) * weight;
      c += (gx[j] * sy - gy[j] * sx) * weight;
    }
    ux[i] = a;
    uy[i] = b;
    uz[i] = c;
  }
}

static inline double ellipticK(double m1, double l) {
  double p = 1.37982864606273237150e-4, q = 2.94078955048598507511e-5;
  p = p * m1 + 2.28025724005875567385e-3, q = q * m1 + 9.14184723865917226571e-4;
  p = p * m1 + 7.97404013220415179367e-3, q = q * m1 + 5.94058303753167793257e-3;
  p = p * m1 + 9.85821379021226008714e-3, q = q * m1 + 1.54850516649762399335e-2;
  p = p * m1 + 6.87489687449949877925e-3, q = q * m1 + 2.39089602715924892727e-2;
  p = p * m1 + 6.18901033637687613229e-3, q = q * m1 + 3.01204715227604046988e-2;
  p = p * m1 + 8.79078273952743772254e-3, q = q * m1 + 3.73774314173823228969e-2;
  p = p * m1 + 1.49380448916805252718e-2, q = q * m1 + 4.88280347570998239232e-2;
  p = p * m1 + 3.08851465246711995998e-2, q = q * m1 + 7.03124996963957469739e-2;
  p = p * m1 + 9.65735902811690126535e-2, q = q * m1 + 1.24999999999870820058e-1;
  p = p * m1 + 1.38629436111989062502e0, q = q * m1 + 4.99999999999999999821e-1;
  return p + l * q;
}

static inline double ellipticE(double m1, double l) {
  double p = 1.53552577301013293365e-4, q = 3.27954898576485872656e-5;
  p = p * m1 + 2.50888492163602060990e-3, q = q * m1 + 1.00962792679356715133e-3;
  p = p * m1 + 8.68786816565889628429e-3, q = q * m1 + 6.50609489976927491433e-3;
  p = p * m1 + 1.07350949056076193403e-2, q = q * m1 + 1.68862163993311317300e-2;
  p = p * m1 + 7.77395492516787092951e-3, q = q * m1 + 2.61769742454493659583e-2;
  p = p * m1 + 7.58395289413514708519e-3, q = q * m1 + 3.34833904888224918614e-2;
  p = p * m1 + 1.15688436810574127319e-2, q = q * m1 + 4.27180926518931511717e-2;
  p = p * m1 + 2.18317996015557253103e-2, q = q * m1 + 5.85936634471101055642e-2;
  p = p * m1 + 5.68051945617860553470e-2, q = q * m1 + 9.37499997197644278445e-2;
  p = p * m1 + 4.43147180560990850618e-1, q = q * m1 + 2.49999999999888314361e-1;
  p = p * m1 + 1.00000000000000000299e0;
  return p + l * m1 * q;
}

/* x: position, y: radius, gx: circulation / pi, d2: delta^2. */
static void rings(int count) {
  for (int i = 0; i < count; i++) {
    double a = 0, b = 0;
    const double px = tx[i], r = ty[i];
    for (int j = 0; j < count; j++) {
      const double dx = px - x[j], s = dx * dx + d2[j];
      const double near = s + (r - y[j]) * (r - y[j]), far = s + (r + y[j]) * (r + y[j]);
      const double m1 = near / far, l = -log(m1), q = 1 / sqrt(far);
      const double first = ellipticE(m1, l) * q / near;
      const double second = 0.5 * (0.5 * (near + far) * first - ellipticK(m1, l) * q);
      a += gx[j] * (y[j] * y[j] * first - second);
      b += gx[j] * dx * second;
    }
    ux[i] = a;
    uy[i] = b / r;
  }
}

static double processorTime(void) {
  struct timespec now;
  clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &now);
  return (double)now.tv_sec * 1e9 + (double)now.tv_nsec;
}

static int ascending(const void *a, const void *b) {
  const double difference = *(const double *)a - *(const double *)b;
  return (difference > 0) - (difference < 0);
}

int main(int argc, char **argv) {
  if (argc != 4) return 2;
  const int isRings = strcmp(argv[1], "rings") == 0, count = atoi(argv[2]), repeats = atoi(argv[3]);
  if (count < 1 || count > MOST || repeats < 1 || repeats > 1000) return 2;
  for (int i = 0; i < count; i++) {
    x[i] = uniform(), y[i] = 0.1 + uniform(), z[i] = uniform();
    gx[i] = uniform(), gy[i] = uniform(), gz[i] = uniform();
    d2[i] = 0.01;
    tx[i] = uniform(), ty[i] = 0.1 + uniform(), tz[i] = uniform();
  }
  double times[1000], sum = 0;
  for (int k = -2; k < repeats; k++) {
    const double start = processorTime();
    if (isRings) rings(count);
    else segments(count);
    if (k >= 0) times[k] = (processorTime() - start) / ((double)count * count);
  }
  qsort(times, (size_t)repeats, sizeof(double), ascending);
  for (int i = 0; i < count; i++) sum += ux[i] + uy[i] + (isRings ? 0 : uz[i]);
  printf("%.6f %.15g\n", times[repeats / 2], sum);
  return 0;
}
