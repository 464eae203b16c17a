/** A complex number that a kernel writes to, so that loops over frequencies allocate nothing. */
export interface Complex {
  re: number;
  im: number;
}

/** cos(π/8) and cos(3π/8) times two: the poles of a 4th-order Butterworth in pairs. */
const pairs = [2 * Math.cos(Math.PI / 8), 2 * Math.cos((3 * Math.PI) / 8)];

/**
 * 4th-order Butterworth low-pass, |H|² = 1/(1 + (f/bandwidth)^8), 1 at 0 Hz.
 * Its denominator is 1 - 3.414214 x² + x⁴ + j 2.613126 (x - x³), x = f/bandwidth, here as the product of its two pole pairs.
 * Source: IEEE 802.3 Annex 93A, receiver noise filter. Check values S-06, S-07.
 */
export function receiverFilter(frequencyHz: number, bandwidthHz: number, out: Complex): Complex {
  const x = frequencyHz / bandwidthHz;
  const even = 1 - x * x;
  // (1 - x² + j p x)(1 - x² + j q x)
  const re = even * even - pairs[0] * pairs[1] * x * x;
  const im = (pairs[0] + pairs[1]) * x * even;
  const size = re * re + im * im;
  out.re = re / size;
  out.im = -im / size;
  return out;
}

/** A continuous-time equaliser with one zero and any number of poles. */
export interface Ctle {
  readonly dcGainDb: number;
  readonly zeroHz: number;
  readonly polesHz: readonly number[];
}

/** Zero and poles of `ctle: auto`: fb/4; fb/4 and fb. Source: IEEE 802.3 Annex 93A, the values of Table 93-8. */
export const automaticCtle = (symbolRate: number): Omit<Ctle, 'dcGainDb'> => ({
  zeroHz: symbolRate / 4,
  polesHz: [symbolRate / 4, symbolRate],
});

/**
 * (g + j f/zero) / Π (1 + j f/pole), g the DC gain as a ratio.
 * It is linear in g: `dcGain` 1 and `zeroShare` 0 give the part that g multiplies, 0 and 1 the rest.
 * Source: IEEE 802.3 Annex 93A, form of the continuous-time filter. Check values S-08, E-01.
 */
export function ctleResponse(
  frequencyHz: number,
  { zeroHz, polesHz }: Omit<Ctle, 'dcGainDb'>,
  dcGain: number,
  zeroShare: number,
  out: Complex,
): Complex {
  let re = dcGain;
  let im = (zeroShare * frequencyHz) / zeroHz;
  for (const pole of polesHz) {
    const x = frequencyHz / pole;
    const size = 1 + x * x;
    const was = re;
    re = (was + im * x) / size;
    im = (im - was * x) / size;
  }
  out.re = re;
  out.im = im;
  return out;
}

/** dB of amplitudes to a ratio. */
export const ratioOfDb = (db: number) => 10 ** (db / 20);
