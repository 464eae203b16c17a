import type { TwoPort } from '../networks/types';
import { DB_PER_NEPER } from '../physics/constants';
import { wideBandLogarithm } from '../physics/laminate';
import { scatterLine } from '../physics/transmission-line';
import { perGrid } from './per-grid';

/**
 * A line whose loss is declared: loss of the matched line a·√f + b·f over its whole length, in nepers, and its delay at one
 * frequency. The √f part has equal phase (skin effect); the linear part has the ln f dispersion that Kramers and Kronig
 * demand, as a continuum of relaxations from 1 kHz to 100 THz, within 0.1 % of b·f from 1 MHz to 100 GHz.
 * Its impedance is real and the same at all frequencies.
 */
export interface DeclaredLine {
  readonly model: 'declared';
  /** Of one leg. */
  readonly oddOhms: number;
  readonly evenOhms: number;
  readonly alike: boolean;
  /** Phase delay of all of it at `delayHz`, the loss included. */
  readonly delaySeconds: number;
  readonly delayHz: number;
  /** Where the linear part is just b·f. */
  readonly referenceHz: number;
  /** a, Np/√Hz. */
  readonly skinNepers: number;
  /** b, Np/Hz. */
  readonly linearNepers: number;
}

const BAND: readonly [number, number] = [1e3, 1e14];

/** Loss of one point or a list as a and b, the reference frequency with them. Losses in dB over the whole length. */
export interface DeclaredLoss {
  readonly skinNepers: number;
  readonly linearNepers: number;
  readonly referenceHz: number;
}

/** Frequency at which a delay holds where no loss and no `@` say one. */
export const DEFAULT_DELAY_HZ = 10e9;

/**
 * One point is split by the skin share; a list is fitted by least squares of the relative error with a, b ≥ 0. The delay's
 * frequency is the (highest) point's.
 * @param points loss in dB and frequency in Hz, above 0; at least one
 */
export function fitLoss(
  points: readonly { readonly db: number; readonly hz: number }[],
  skinShare: number,
): DeclaredLoss {
  const referenceHz = Math.max(...points.map(({ hz }) => hz));
  if (points.length === 1) {
    const nepers = points[0].db / DB_PER_NEPER;
    return {
      skinNepers: (nepers * skinShare) / Math.sqrt(referenceHz),
      linearNepers: (nepers * (1 - skinShare)) / referenceHz,
      referenceHz,
    };
  }
  // rows √f/y and f/y against 1, so that a small loss at a low frequency counts as much as a large one
  const rows = points.map(({ db, hz }) => {
    const weight = 1 / Math.max(db / DB_PER_NEPER, 1e-12);
    return { a: Math.sqrt(hz / referenceHz) * weight, b: (hz / referenceHz) * weight, y: (db / DB_PER_NEPER) * weight };
  });
  const sum = (f: (row: (typeof rows)[number]) => number) => rows.reduce((total, row) => total + f(row), 0);
  const [aa, ab, bb] = [sum(({ a }) => a * a), sum(({ a, b }) => a * b), sum(({ b }) => b * b)];
  const [ay, by] = [sum(({ a, y }) => a * y), sum(({ b, y }) => b * y)];
  const det = aa * bb - ab * ab;
  let a = det > 1e-12 * aa * bb ? (ay * bb - by * ab) / det : ay / aa;
  let b = det > 1e-12 * aa * bb ? (by * aa - ay * ab) / det : 0;
  // the least squares with both ≥ 0 lies on an edge where the free one does not hold
  if (a < 0) [a, b] = [0, by / bb];
  else if (b < 0) [a, b] = [ay / aa, 0];
  return { skinNepers: a / Math.sqrt(referenceHz), linearNepers: b / referenceHz, referenceHz };
}

/** The dispersive share and the front of the delay; the front never below 0, which would be before its cause. */
function delaysOf({ skinNepers, linearNepers, delaySeconds, delayHz, referenceHz }: DeclaredLine) {
  const [delayRe, , , lossIm] = wideBandLogarithm([delayHz, referenceHz], BAND);
  const spread = linearNepers > 0 ? linearNepers / (-2 * Math.PI * lossIm) : 0;
  const dispersive = spread * delayRe + skinNepers / (2 * Math.PI * Math.sqrt(delayHz));
  return { spread, front: Math.max(0, delaySeconds - dispersive) };
}

/** Attenuation (Np) and phase (rad) of all of the line over frequency: 2n numbers. */
export function declaredWave(line: DeclaredLine, frequencies: Float64Array): Float64Array {
  const { skinNepers } = line;
  const { spread, front } = delaysOf(line);
  const log = perGrid(frequencies, 'declared-logarithm', () => wideBandLogarithm(frequencies, BAND));
  const wave = new Float64Array(log.length);
  for (let i = 0; i < frequencies.length; i++) {
    const omega = 2 * Math.PI * frequencies[i];
    const skin = skinNepers * Math.sqrt(frequencies[i]);
    wave[2 * i] = skin - omega * spread * log[2 * i + 1];
    wave[2 * i + 1] = skin + omega * (front + spread * log[2 * i]);
  }
  return wave;
}

/** Scattering of one mode in the leg's reference; 8 numbers a frequency. */
export function scatterDeclared(
  line: DeclaredLine,
  mode: 'odd' | 'even',
  frequencies: Float64Array,
  reference: number,
): TwoPort {
  const impedance = mode === 'odd' ? line.oddOhms : line.evenOhms;
  const wave = declaredWave(line, frequencies);
  const out: TwoPort = new Float64Array(8 * frequencies.length);
  for (let i = 0; i < frequencies.length; i++) {
    scatterLine(wave[2 * i], wave[2 * i + 1], impedance, 0, reference, out, 8 * i);
  }
  return out;
}

/** Nepers and seconds of phase delay of the matched line at one frequency above 0. */
export function declaredAt(line: DeclaredLine, frequencyHz: number): { nepers: number; delaySeconds: number } {
  const { spread, front } = delaysOf(line);
  const [re, im] = wideBandLogarithm([frequencyHz], BAND);
  const skin = line.skinNepers * Math.sqrt(frequencyHz);
  return {
    nepers: skin - 2 * Math.PI * frequencyHz * spread * im,
    delaySeconds: front + spread * re + skin / (2 * Math.PI * frequencyHz),
  };
}
