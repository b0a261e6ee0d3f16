/* The reference voice by hand, for comparison: plain loops over one sample after another at
 * 4 x 48 kHz, decimated by a plain FIR filter and written as float32.
 *
 * Simpler maths than the library's: the saw's step is corrected by a two-point polynomial at the
 * source only, the bias pin is a clamped resistor law with a fixed drop of 0.6 V, one-pole steps
 * hold their input between samples.
 *
 * usage: reference-voice SECONDS OUTPUT; prints ns per oversampled sample, rms and peak in volts.
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>

enum { OVERSAMPLE = 4, RATE = 48000, TAPS = 187, CHUNK = 4096 };

static double thread_seconds(void) {
  struct timespec t;
  clock_gettime(CLOCK_THREAD_CPUTIME_ID, &t);
  return t.tv_sec + 1e-9 * t.tv_nsec;
}

/* Kaiser-windowed low-pass, 24 kHz at 192 kHz, 120 dB. */
static double bessel_i0(double x) {
  double term = 1, sum = 1;
  for (int k = 1; term > 1e-17 * sum; k++) { term *= x * x / (4.0 * k * k); sum += term; }
  return sum;
}

static void design(double *h) {
  const double beta = 12.265, fc = 24000.0 / (RATE * OVERSAMPLE);
  double sum = 0;
  for (int i = 0; i < TAPS; i++) {
    double t = i - (TAPS - 1) / 2.0, x = 2 * t / (TAPS - 1);
    double sinc = t == 0 ? 2 * fc : sin(2 * M_PI * fc * t) / (M_PI * t);
    h[i] = sinc * bessel_i0(beta * sqrt(1 - x * x)) / bessel_i0(beta);
    sum += h[i];
  }
  for (int i = 0; i < TAPS; i++) h[i] /= sum;
}

static double poly_blep(double phase, double step) {
  if (phase < step) { double x = phase / step; return x + x - x * x - 1; }
  if (phase > 1 - step) { double x = (phase - 1) / step; return x * x + x + x + 1; }
  return 0;
}

int main(int argc, char **argv) {
  const double seconds = argc > 1 ? atof(argv[1]) : 10, fs = (double)RATE * OVERSAMPLE, h = 1 / fs;
  FILE *out = fopen(argc > 2 ? argv[2] : "/dev/null", "wb");
  if (!out) return 2;
  const long samples = (long)(seconds * fs);
  const double vt = 1.380649e-23 * 298.15 / 1.602176634e-19;
  const double ln100 = log(100), attack = exp(-h * log(1.3 / 0.3) / 5e-3), decay = exp(-h * ln100 / 80e-3),
               release = exp(-h * ln100 / 120e-3);
  const double rc = exp(-h / (10e3 * 1e-9)), ac = exp(-h / (100e3 * 330e-9));
  static double taps[TAPS], line[CHUNK + TAPS];
  static float block[CHUNK / OVERSAMPLE];
  design(taps);

  double slow = 0, phase = 0, swing = 0, level = 0, load = 0, held = 0, square = 0, peak = 0;
  int stage = 0;
  long count = 0;
  const double start = thread_seconds();
  for (long base = 0; base < samples; base += CHUNK) {
    for (int i = 0; i < CHUNK; i++) {
      /* 0.3 Hz triangle of 20 mV on the pitch of a 440 Hz saw of +-5 V */
      slow += 0.3 * h; if (slow >= 1) slow -= 1;
      double triangle = slow < 0.25 ? 4 * slow : slow < 0.75 ? 2 - 4 * slow : 4 * slow - 4;
      double step = 440 * exp2(0.02 * triangle) * h;
      phase += step; if (phase >= 1) phase -= 1;
      double saw = 5 * (2 * phase - 1 - poly_blep(phase, step));
      double drive = saw * 0.01;
      /* gate 0.6 s in 1 s; attack aimed at 1.3, decay to 60 %, release */
      double time = (double)(base + i) * h;
      int gate = time - floor(time) < 0.6;
      if (!gate) stage = 0; else if (stage == 0) stage = 1;
      double target = stage == 1 ? 1.3 : stage == 2 ? 0.6 : 0;
      double keep = stage == 1 ? attack : stage == 2 ? decay : release;
      level = target + (level - target) * keep;
      if (stage == 1 && level >= 1) { level = 1; stage = 2; }
      double contour = -12 + 10 * level;
      /* 5 Hz LFO, 1.5 V around -10.5 V */
      swing += 5 * h; if (swing >= 1) swing -= 1;
      double lfo = -10.5 + 1.5 * sin(2 * M_PI * swing);
      /* both through 120 k into the pin, 0.6 V above the rail */
      double bias = (contour + 11.4) / 120e3 + (lfo + 11.4) / 120e3;
      bias = bias < 0 ? 0 : bias > 1e-3 ? 1e-3 : bias;
      double current = bias * tanh((drive + 0.5e-3) / (2 * vt));
      /* 10 k || 1 nF within 1 V of the rails, then 330 nF into 100 k */
      load = current * 10e3 + (load - current * 10e3) * rc;
      load = load < -11 ? -11 : load > 11 ? 11 : load;
      held = load + (held - load) * ac;
      line[TAPS - 1 + i] = load - held;
    }
    for (int i = 0; i < CHUNK / OVERSAMPLE; i++) {
      double sum = 0;
      const double *x = line + OVERSAMPLE * i;
      for (int k = 0; k < TAPS; k++) sum += taps[k] * x[k];
      block[i] = (float)sum;
      square += sum * sum; if (fabs(sum) > peak) peak = fabs(sum);
      count++;
    }
    for (int k = 0; k < TAPS - 1; k++) line[k] = line[CHUNK + k];
    fwrite(block, sizeof(float), CHUNK / OVERSAMPLE, out);
  }
  fclose(out);
  const double spent = thread_seconds() - start;
  printf("{\"nsPerSample\": %.3f, \"rms\": %.6f, \"peak\": %.6f}\n", 1e9 * spent / (count * OVERSAMPLE),
         sqrt(square / count), peak);
  return 0;
}
