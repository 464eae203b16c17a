import { lowestLog } from './noisy-tail';

/** Sampling times that stand for the jitter's distribution, as places between columns. */
export interface JitterNodes {
  readonly probability: Float64Array;
  /** Whole columns before the place. */
  readonly column: Int32Array;
  /** Four a node: weights of the columns at column - 1 … column + 2. */
  readonly weights: Float64Array;
  /** Columns that a sampling time may touch, from and to, both included. */
  readonly reach: readonly [number, number];
}

/** Nodes every 0.75 sigma: trapezoids of a Gaussian are then exact to 1e-15. */
const spacing = 0.75;
const widestSigmas = 9;

/**
 * Dual-Dirac and random jitter of the sampling instant: half of the time early and half late by half of `deterministicUi`, plus a normal variable.
 * Source: dual-Dirac model, INCITS T11 MJSQ. Check values D-11, D-12.
 */
export function jitterNodes(randomUi: number, deterministicUi: number, columnsPerUi: number): JitterNodes {
  const diracs = deterministicUi > 0 ? [-deterministicUi / 2, deterministicUi / 2] : [0];
  const steps = randomUi > 0 ? Math.round(widestSigmas / spacing) : 0;
  const places: { place: number; weight: number }[] = [];
  for (const dirac of diracs) {
    for (let s = -steps; s <= steps; s++) {
      const z = s * spacing;
      places.push({ place: (dirac + z * randomUi) * columnsPerUi, weight: Math.exp(-0.5 * z * z) });
    }
  }
  const whole = places.reduce((sum, { weight }) => sum + weight, 0);
  const column = Int32Array.from(places, ({ place }) => Math.floor(place));
  const weights = new Float64Array(4 * places.length);
  places.forEach(({ place }, i) => {
    const t = place - column[i];
    weights.set(
      [
        (-t * (t - 1) * (t - 2)) / 6,
        ((t + 1) * (t - 1) * (t - 2)) / 2,
        (-(t + 1) * t * (t - 2)) / 2,
        ((t + 1) * t * (t - 1)) / 6,
      ],
      4 * i,
    );
  });
  return {
    probability: Float64Array.from(places, ({ weight }) => weight / whole),
    column,
    weights,
    reach: [Math.min(...column) - 1, Math.max(...column) + 2],
  };
}

/**
 * Probability averaged over the jitter, from its logarithm in columns: a cubic through four columns' logarithms, since probabilities change
 * by decades from column to column; straight where one of them is none. Beyond the first and the last column theirs hold.
 */
export function jittered(logs: Float64Array, at: number, { probability, column, weights }: JitterNodes): number {
  const last = logs.length - 1;
  let sum = 0;
  for (let i = 0; i < probability.length; i++) {
    const c = at + column[i];
    const b = logs[c < 0 ? 0 : Math.min(c, last)];
    const d = logs[c + 1 < 0 ? 0 : Math.min(c + 1, last)];
    const a = logs[c < 1 ? 0 : Math.min(c - 1, last)];
    const e = logs[c + 2 < 0 ? 0 : Math.min(c + 2, last)];
    let log: number;
    if (a <= lowestLog || b <= lowestLog || d <= lowestLog || e <= lowestLog) {
      const share = weights[4 * i + 2] + 2 * weights[4 * i + 3] - weights[4 * i];
      log = b + (d - b) * share;
    } else {
      log = weights[4 * i] * a + weights[4 * i + 1] * b + weights[4 * i + 2] * d + weights[4 * i + 3] * e;
    }
    sum += probability[i] * Math.exp(Math.min(log, 0));
  }
  return sum;
}
