import FFT from 'fft.js';

interface Plan {
  readonly fft: FFT;
  /** e^{+j 2π i / samples} for i below half of the samples, re and im in turn. */
  readonly turns: Float64Array;
  readonly folded: Float64Array;
}

/** By number of samples; a handful exist, since all are powers of two. */
const plans = new Map<number, Plan>();

function planFor(samples: number): Plan {
  const known = plans.get(samples);
  if (known) return known;
  const half = samples / 2;
  const turns = new Float64Array(samples);
  for (let i = 0; i < half; i++) {
    turns[2 * i] = Math.cos((2 * Math.PI * i) / samples);
    turns[2 * i + 1] = Math.sin((2 * Math.PI * i) / samples);
  }
  const plan = { fft: new FFT(half), turns, folded: new Float64Array(samples) };
  plans.set(samples, plan);
  return plan;
}

/**
 * Real samples of a two-sided Fourier sum, x[n] = Σ X[i] e^{+j 2π i n / samples} over positive and negative i, without division.
 * Times the frequency step it is the sampled inverse Fourier integral of a spectrum in units per hertz.
 * @param spectrum re and im in turn of the frequencies 0 … at most samples/2; what is not given is zero. The imaginary parts of
 *   the first and of the one at samples/2 are ignored.
 * @param samples a power of two, at least 4
 * Source: the real sequence as even and odd samples of a complex one of half the length, any textbook of the FFT.
 */
export function inverseReal(spectrum: Float64Array, samples: number): Float64Array {
  const { fft, turns, folded } = planFor(samples);
  const half = samples / 2;
  const given = spectrum.length / 2;
  const last = given > half ? spectrum[2 * half] : 0;
  folded[0] = half * (spectrum[0] + last);
  folded[1] = half * (spectrum[0] - last);
  for (let i = 1; i < half; i++) {
    const there = i < given;
    const mirrored = half - i < given;
    const aRe = there ? spectrum[2 * i] : 0;
    const aIm = there ? spectrum[2 * i + 1] : 0;
    const bRe = mirrored ? spectrum[2 * (half - i)] : 0;
    const bIm = mirrored ? -spectrum[2 * (half - i) + 1] : 0;
    const differenceRe = aRe - bRe;
    const differenceIm = aIm - bIm;
    const cos = turns[2 * i];
    const sin = turns[2 * i + 1];
    // + j e^{jθ} (a - b): fft.js divides by its size, hence the factor
    folded[2 * i] = half * (aRe + bRe - differenceRe * sin - differenceIm * cos);
    folded[2 * i + 1] = half * (aIm + bIm + differenceRe * cos - differenceIm * sin);
  }
  const out = new Float64Array(samples);
  fft.inverseTransform(out, folded);
  return out;
}
