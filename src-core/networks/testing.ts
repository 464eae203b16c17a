import type { Network, NetworkContext, TwoPort } from './types';

/** A complex number. */
export type Complex = readonly [re: number, im: number];

export const times = (a: Complex, b: Complex): Complex => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
export const plus = (a: Complex, b: Complex): Complex => [a[0] + b[0], a[1] + b[1]];
export const scaled = (a: Complex, by: number): Complex => [a[0] * by, a[1] * by];
export const over = (a: Complex, b: Complex): Complex => {
  const square = b[0] ** 2 + b[1] ** 2;
  return [(a[0] * b[0] + a[1] * b[1]) / square, (a[1] * b[0] - a[0] * b[1]) / square];
};

/** A chain matrix A, B, C, D. */
export type Abcd = readonly [Complex, Complex, Complex, Complex];

export const seriesOhms = (z: Complex): Abcd => [[1, 0], z, [0, 0], [1, 0]];
export const shuntSiemens = (y: Complex): Abcd => [[1, 0], [0, 0], y, [1, 0]];

/** A line of real impedance: phase in radians, loss in nepers. */
export function lineOf(ohms: number, radians: number, nepers = 0): Abcd {
  const cosh: Complex = [Math.cosh(nepers) * Math.cos(radians), Math.sinh(nepers) * Math.sin(radians)];
  const sinh: Complex = [Math.sinh(nepers) * Math.cos(radians), Math.cosh(nepers) * Math.sin(radians)];
  return [cosh, scaled(sinh, ohms), scaled(sinh, 1 / ohms), cosh];
}

export const cascadeAbcd = ([a, b, c, d]: Abcd, [e, f, g, h]: Abcd): Abcd => [
  plus(times(a, e), times(b, g)),
  plus(times(a, f), times(b, h)),
  plus(times(c, e), times(d, g)),
  plus(times(c, f), times(d, h)),
];

/**
 * One frequency's S11, S12, S21, S22 of a chain matrix, re and im.
 * Source: Pozar, Microwave Engineering, table 4.2; check values section 3.
 */
export function scatteringOf([a, b, c, d]: Abcd, referenceOhms: number): TwoPort {
  const [bn, cn] = [scaled(b, 1 / referenceOhms), scaled(c, referenceOhms)];
  const sum = plus(plus(a, bn), plus(cn, d));
  const determinant = plus(times(a, d), scaled(times(b, c), -1));
  const s11 = over(plus(plus(a, bn), scaled(plus(cn, d), -1)), sum);
  const s22 = over(plus(plus(scaled(a, -1), bn), plus(scaled(cn, -1), d)), sum);
  return Float64Array.of(...s11, ...scaled(over(determinant, sum), 2), ...over([2, 0], sum), ...s22);
}

/** A two-port at each of some frequencies. */
export function twoPortOf(
  frequencies: Float64Array,
  at: (frequencyHz: number) => Abcd,
  referenceOhms: number,
): TwoPort {
  const out: TwoPort = new Float64Array(8 * frequencies.length);
  for (let i = 0; i < frequencies.length; i++) out.set(scatteringOf(at(frequencies[i]), referenceOhms), 8 * i);
  return out;
}

export const contextOf = (frequencies: Float64Array, more: Partial<NetworkContext> = {}): NetworkContext => ({
  frequencies,
  referenceOhms: 100,
  singleEnded: false,
  ...more,
});

/** Evenly spaced, both ends included. */
export const linspace = (from: number, to: number, points: number) =>
  Float64Array.from({ length: points }, (_, i) => from + ((to - from) * i) / Math.max(1, points - 1));

/** Largest difference of two arrays. */
export function farthest(a: Float64Array, b: Float64Array): number {
  if (a.length !== b.length) return Number.POSITIVE_INFINITY;
  let most = 0;
  for (let i = 0; i < a.length; i++) most = Math.max(most, Math.abs(a[i] - b[i]));
  return most;
}

export const magnitude = (s: Float64Array, at: number) => Math.hypot(s[at], s[at + 1]);

export const equalLegs = (leg: TwoPort): Network => ({ differential: leg, common: leg });
