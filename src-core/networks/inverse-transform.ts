import FFT from 'fft.js';

/**
 * Real samples of a spectrum given from 0 Hz to the highest frequency, both included.
 * @param spectrum re and im in turn of 2^m + 1 frequencies; those of the first and the last are taken as real
 * @returns 2^(m+1) samples whose mean is the first frequency's value over their number
 */
export function inverseTransform(spectrum: Float64Array): Float64Array {
  const samples = spectrum.length - 2;
  const fft = fftOf(samples);
  const whole = new Float64Array(2 * samples);
  whole.set(spectrum);
  whole[1] = 0;
  whole[samples + 1] = 0;
  for (let i = 1; i < samples / 2; i++) {
    whole[2 * (samples - i)] = spectrum[2 * i];
    whole[2 * (samples - i) + 1] = -spectrum[2 * i + 1];
  }
  const out = new Float64Array(2 * samples);
  fft.inverseTransform(out, whole);
  const real = new Float64Array(samples);
  for (let n = 0; n < samples; n++) real[n] = out[2 * n];
  return real;
}

/** Tables of sines by length; a handful of lengths exist, since the grid's are powers of two. */
const plans = new Map<number, FFT>();

export function fftOf(samples: number): FFT {
  let made = plans.get(samples);
  if (!made) plans.set(samples, (made = new FFT(samples)));
  return made;
}
