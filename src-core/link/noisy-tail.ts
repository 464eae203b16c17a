import { gaussianTail } from './gaussian';
import type { EvenDensity } from './isi-density';

/** Beyond this many sigmas a normal variable has nothing to say: 1e-23. */
const widest = 10;
/** Sums below this are not formed, as what `widest` leaves out, 1e-23, would show in them: the logarithm goes on as a parabola. */
const lowestSum = 1e-20;

/** Probabilities of an even density plus Gaussian noise. */
export interface NoisyTail {
  /** Natural logarithm of the probability of more than x bins; finite to any depth. */
  readonly logAbove: (bins: number) => number;
  /** rms of the noise convolved, bins, excess of the binning taken off. */
  readonly sigmaBins: number;
  readonly density: EvenDensity;
}

/**
 * Tail of an even density with normal noise added: Σ p[i] Q((x - i)/σ), terms non-negative, at whole bins, in between straight in the logarithm
 * (an error of (bin/σ)²/8: 0.05 % for σ of 16 bins). Without noise half of what lies exactly at x counts. Below 1e-20 the logarithm goes
 * on with its slope and a Gaussian's curvature: such depths count for nothing themselves, but from phase to phase the logarithm must
 * stay smooth to be interpolated.
 */
export function noisyTail(density: EvenDensity, noiseBins: number): NoisyTail {
  const { half, excessVariance } = density;
  const sigmaBins = Math.sqrt(Math.max(0, noiseBins ** 2 - excessVariance));
  const reach = Math.max(1, Math.ceil(widest * sigmaBins));
  const Q = new Float64Array(reach + 1);
  for (let k = 0; k <= reach; k++) Q[k] = k === 0 ? 0.5 : sigmaBins > 0 ? gaussianTail(k / sigmaBins) : 0;
  const size = half.length;
  // probability of i bins or more
  const beyond = new Float64Array(size + 1);
  for (let i = size - 1; i >= 0; i--) beyond[i] = beyond[i + 1] + half[i];

  const above = (k: number): number => {
    // noise alone carries bins below k over it, and bins just above k back
    let sum = k + reach + 1 < size ? beyond[k + reach + 1] : 0;
    const furthest = Math.min(size - 1, k + reach);
    for (let i = k + 1; i <= furthest; i++) sum += half[i] * (1 - Q[i - k]);
    for (let i = Math.max(0, k - reach); i <= Math.min(k, size - 1); i++) sum += half[i] * Q[k - i];
    // the mirrored bins -i, i > 0
    for (let i = 1; i <= Math.min(size - 1, reach - k); i++) sum += half[i] * Q[k + i];
    return sum;
  };
  let last: { readonly at: number; readonly log: number; readonly slope: number } | undefined;
  /** Where sums end, and how the logarithm falls there. */
  const end = () => {
    if (last) return last;
    let [low, high] = [0, size + reach];
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (above(middle) > lowestSum) low = middle;
      else high = middle;
    }
    const log = Math.log(above(low));
    last = { at: low, log, slope: low > 0 ? Math.min(0, log - Math.log(above(low - 1))) : 0 };
    return last;
  };
  const logAt = (k: number) => {
    const probability = k < size + reach ? above(k) : 0;
    if (probability > lowestSum) return Math.log(probability);
    const { at, log, slope } = end();
    const on = k - at;
    return log + slope * on - (on * on) / (2 * Math.max(1, sigmaBins * sigmaBins));
  };
  const logAbove = (bins: number): number => {
    if (bins < 0) return Math.log1p(-Math.exp(logAbove(-bins)));
    const k = Math.floor(bins);
    const share = bins - k;
    return (1 - share) * logAt(k) + share * logAt(k + 1);
  };
  return { logAbove, sigmaBins, density };
}
