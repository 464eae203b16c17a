import type { Grid, TwoPort } from '../networks/types';

/** Port of a two-port that one looks into; the transmitter side is port 1. */
export type End = 'transmitter' | 'receiver';

/** No figure in dB is larger: an amplitude of 0 would be infinite, and 200 dB is far below any noise. */
const MOST_DB = 200;

/** Offsets of S-parameters in the 8 numbers a frequency of a {@link TwoPort}. */
const S11 = 0;
const S21 = 4;
const S22 = 6;
export const reflectionOffset = (end: End) => (end === 'transmitter' ? S11 : S22);

const power = (s: TwoPort, point: number, offset: number) => {
  const re = s[8 * point + offset];
  const im = s[8 * point + offset + 1];
  return re * re + im * im;
};

const attenuationDb = (squared: number) => Math.min(MOST_DB, -10 * Math.log10(Math.max(squared, 1e-30)) + 0);

/** |S| in dB of attenuation at any frequency of the grid, straight in dB between its points. */
function attenuationAt(s: TwoPort, grid: Grid, offset: number, frequencyHz: number): number {
  const exact = Math.min(Math.max(frequencyHz / grid.stepHz, 0), grid.points - 1);
  const below = Math.floor(exact + 1e-9);
  const above = Math.min(below + 1, grid.points - 1);
  const share = Math.max(0, exact - below);
  const low = attenuationDb(power(s, below, offset));
  // A frequency that is a grid point takes its value as it is: a notch beside it must not leak in.
  return share < 1e-9 ? low : low + share * (attenuationDb(power(s, above, offset)) - low);
}

/** Insertion loss, dB ≥ 0 for a passive network. */
export const insertionLossAt = (s: TwoPort, grid: Grid, frequencyHz: number) =>
  attenuationAt(s, grid, S21, frequencyHz);

/** Insertion loss at a point of the data itself. */
export const insertionLossOf = (s: TwoPort, point: number) => attenuationDb(power(s, point, S21));

/** Return loss seen from an end, dB. */
export const returnLossAt = (s: TwoPort, grid: Grid, end: End, frequencyHz: number) =>
  attenuationAt(s, grid, reflectionOffset(end), frequencyHz);

/** Return loss at a point of the data itself. */
export const returnLossOf = (s: TwoPort, end: End, point: number) =>
  attenuationDb(power(s, point, reflectionOffset(end)));

/** What of a band lies above the grid, at equal steps; empty where nothing does. */
export function frequenciesBeyond(grid: Grid, fromHz: number, toHz: number, points = 401): Float64Array {
  const from = Math.max(fromHz, grid.stepHz * (grid.points - 1));
  if (toHz <= from * (1 + 1e-9)) return new Float64Array(0);
  return Float64Array.from({ length: points }, (_, i) => from + ((toHz - from) * i) / (points - 1));
}

/** Both ends of a band and every grid point between them, Hz, ascending; within the grid. */
export function* frequenciesWithin(grid: Grid, fromHz: number, toHz: number): Generator<number> {
  const last = grid.stepHz * (grid.points - 1);
  const end = Math.min(toHz, last);
  if (fromHz > end) return;
  yield fromHz;
  for (let i = Math.floor(fromHz / grid.stepHz + 1e-9) + 1; i * grid.stepHz < end * (1 - 1e-12); i++)
    yield i * grid.stepHz;
  if (end > fromHz) yield end;
}

/** The least return loss from above 0 Hz to `toHz`, seen from either end. */
export function worstReturnLoss(
  s: TwoPort,
  grid: Grid,
  toHz: number,
): { lossDb: number; frequencyHz: number; end: End } {
  let worst = 0;
  let at = 1;
  let offset = S11;
  const last = Math.min(grid.points - 1, Math.floor(toHz / grid.stepHz + 1e-9));
  for (let i = 1; i <= last; i++) {
    for (const candidate of [S11, S22]) {
      const squared = power(s, i, candidate);
      if (squared <= worst) continue;
      worst = squared;
      at = i;
      offset = candidate;
    }
  }
  return {
    lossDb: attenuationDb(worst),
    frequencyHz: at * grid.stepHz,
    end: offset === S11 ? 'transmitter' : 'receiver',
  };
}

/**
 * Phase delay of the transmission at a frequency, seconds: the phase unwrapped from 0 Hz on, after it was turned back by a delay that is
 * known. A grid that holds the response turns by a quarter of a turn a step at most; one that is too coarse needs that delay.
 */
export function phaseDelay(s: TwoPort, grid: Grid, frequencyHz: number, knownSeconds = 0): number {
  const known = 2 * Math.PI * grid.stepHz * knownSeconds;
  const [cos, sin] = [Math.cos(known), Math.sin(known)];
  const last = Math.min(grid.points - 1, Math.max(1, Math.round(frequencyHz / grid.stepHz)));
  let phase = 0;
  for (let i = 1; i <= last; i++) {
    const [a, b, c, d] = [s[8 * i + S21], s[8 * i + S21 + 1], s[8 * i - 8 + S21], s[8 * i - 8 + S21 + 1]];
    const [re, im] = [a * c + b * d, b * c - a * d];
    phase += Math.atan2(im * cos + re * sin, re * cos - im * sin);
  }
  return knownSeconds - phase / (2 * Math.PI * last * grid.stepHz) + 0;
}
