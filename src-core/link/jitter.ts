/** Sampling times that stand for the jitter's distribution. */
export interface JitterNodes {
  readonly probability: Float64Array;
  /** Columns from the sampling instant, between them. */
  readonly place: Float64Array;
  /** Columns that a sampling time may touch, from and to, both included. */
  readonly reach: readonly [number, number];
}

/** Nodes every 0.75 sigma: trapezoids of a Gaussian are then exact to 1e-15. */
const spacing = 0.75;
const widestSigmas = 9;

/** Latest sampling time that `jitterNodes` holds, UI. */
export const jitterReach = (randomUi: number, deterministicUi: number) => deterministicUi / 2 + widestSigmas * randomUi;

/**
 * Dual-Dirac and random jitter of the sampling instant: half of the time early and half late by half of `deterministicUi`, plus a normal variable.
 * Source: dual-Dirac model, INCITS T11 MJSQ. Check values D-11, D-12.
 */
export function jitterNodes(randomUi: number, deterministicUi: number, columnsPerUi: number): JitterNodes {
  const diracs = deterministicUi > 0 ? [-deterministicUi / 2, deterministicUi / 2] : [0];
  const steps = randomUi > 0 ? Math.round(widestSigmas / spacing) : 0;
  const nodes: { place: number; weight: number }[] = [];
  for (const dirac of diracs) {
    for (let s = -steps; s <= steps; s++) {
      const z = s * spacing;
      nodes.push({ place: (dirac + z * randomUi) * columnsPerUi, weight: Math.exp(-0.5 * z * z) });
    }
  }
  const whole = nodes.reduce((sum, { weight }) => sum + weight, 0);
  const places = nodes.map(({ place }) => Math.floor(place));
  return {
    probability: Float64Array.from(nodes, ({ weight }) => weight / whole),
    place: Float64Array.from(nodes, ({ place }) => place),
    reach: [Math.min(...places) - 1, Math.max(...places) + 2],
  };
}

/**
 * Probability averaged over the jitter, from its logarithm in columns, since it changes by decades from column to column: between two
 * a cubic that overshoots nowhere but where the columns themselves turn. Beyond the first and the last column theirs hold.
 * @param at column of the sampling instant, or a place between columns
 * Source: Fritsch and Butland, SIAM J. Sci. Stat. Comput. 5, 1984, harmonic mean of slopes.
 */
export function jittered(logs: Float64Array, at: number, { probability, place }: JitterNodes): number {
  const last = logs.length - 1;
  let sum = 0;
  for (let i = 0; i < probability.length; i++) {
    const here = at + place[i];
    const c = Math.floor(here);
    const log = c < 0 ? logs[0] : c >= last ? logs[last] : between(logs, c, here - c, last);
    sum += probability[i] * Math.exp(Math.min(log, 0));
  }
  return sum;
}

/** A change of the logarithm from column to column, up to a probability as common as this, that no smooth curve follows: an edge lies between. */
const edge = 8;
const common = -5;
/** Nearly all patterns that can be wrong are: the edge was passed on the way. */
const crossed = -1.2;

/**
 * An edge steeper than the columns are apart. In sigmas a margin falls nearly straight, so it goes on from the deep side as it came there,
 * and meets the other side's probability where it gets to it: a curve through both columns would put every edge at the outer one.
 */
function intoEdge(deep: number, shallow: number, deeper: number, t: number): number {
  const sigmas = (log: number) => Math.sqrt(Math.max(0, -2 * log));
  const [from, to] = [sigmas(deep), sigmas(shallow)];
  const straight = to - from;
  const falling = shallow > crossed ? Math.min(from - sigmas(deeper), straight) : straight;
  const here = Math.max(to, from + falling * t);
  return (-here * here) / 2;
}

function between(logs: Float64Array, c: number, t: number, last: number): number {
  const b = logs[c];
  if (t === 0) return b;
  const d = logs[c + 1];
  if (Math.abs(d - b) > edge && Math.max(b, d) > common) {
    return b < d ? intoEdge(b, d, c > 0 ? logs[c - 1] : b, t) : intoEdge(d, b, c + 2 <= last ? logs[c + 2] : d, 1 - t);
  }
  const rise = d - b;
  const before = c > 0 ? b - logs[c - 1] : rise;
  const after = c + 2 <= last ? logs[c + 2] - d : rise;
  const from = slope(before, rise);
  const to = slope(rise, after);
  const u = 1 - t;
  return b * u * u * (1 + 2 * t) + d * t * t * (1 + 2 * u) + t * u * (u * from - t * to);
}

/** Harmonic mean of two rises of one sign; where they turn, the parabola's slope, no steeper than either. */
function slope(before: number, after: number): number {
  if (before * after > 0) return (2 * before * after) / (before + after);
  const most = Math.min(Math.abs(before), Math.abs(after));
  return Math.max(-most, Math.min(most, (before + after) / 2));
}
