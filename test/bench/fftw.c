/*
 * Times FFTW's two-dimensional inverse transform in float32, in place, for fft-contenders.mjs.
 *
 *     gcc -O3 -march=native fftw.c -o fftw -lfftw3f -lm     (Debian: libfftw3-dev)
 *     fftw SIZE SECONDS [patient]
 *
 * Prints the median of the CPU time of one transform in microseconds. Plans with FFTW_MEASURE, or FFTW_PATIENT.
 */
#include <fftw3.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

static double cpu_us(void) {
  struct timespec t;
  clock_gettime(CLOCK_THREAD_CPUTIME_ID, &t);
  return t.tv_sec * 1e6 + t.tv_nsec * 1e-3;
}

static int ascending(const void *a, const void *b) {
  double x = *(const double *)a, y = *(const double *)b;
  return (x > y) - (x < y);
}

int main(int argc, char **argv) {
  if (argc < 3) return 64;
  int n = atoi(argv[1]);
  double seconds = atof(argv[2]);
  size_t count = (size_t)n * n;
  fftwf_complex *data = fftwf_malloc(count * sizeof *data);
  fftwf_complex *source = fftwf_malloc(count * sizeof *source);
  unsigned flags = argc > 3 ? FFTW_PATIENT : FFTW_MEASURE;
  fftwf_plan plan = fftwf_plan_dft_2d(n, n, data, data, FFTW_BACKWARD, flags);
  for (size_t i = 0; i < count; i++) {
    source[i][0] = rand() / (float)RAND_MAX - 0.5f;
    source[i][1] = rand() / (float)RAND_MAX - 0.5f;
  }
  static double times[100000];
  int runs = 0;
  double start = cpu_us();
  while (runs < 3 || (cpu_us() - start < seconds * 1e6 && runs < 100000)) {
    memcpy(data, source, count * sizeof *data);
    double before = cpu_us();
    fftwf_execute(plan);
    times[runs++] = cpu_us() - before;
  }
  qsort(times, runs, sizeof *times, ascending);
  printf("%.2f\n", times[runs / 2]);
  return 0;
}
