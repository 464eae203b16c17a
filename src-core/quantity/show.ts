import type { Dimension, Quantity } from '../../schemas/format/types';
import { inSi, type Unit, unitNamed } from './units';

/** What stands for a number that is none. */
const UNKNOWN = 'unknown';

/** Units in which a dimension is shown, each from the size (in SI units) on at which it is taken. */
const ladders: Readonly<Partial<Record<Dimension, readonly (readonly [from: number, unit: string])[]>>> = {
  length: [
    [0, 'nm'],
    [1e-7, 'um'],
    [2e-4, 'mm'],
    [1, 'm'],
  ],
  time: [
    [0, 'fs'],
    [1e-13, 'ps'],
    [1e-9, 'ns'],
    [1e-6, 'us'],
  ],
  frequency: [
    [0, 'Hz'],
    [1e3, 'kHz'],
    [1e6, 'MHz'],
    [1e9, 'GHz'],
  ],
  impedance: [
    [0, 'mohm'],
    [1, 'ohm'],
    [1e4, 'kohm'],
  ],
  capacitance: [
    [0, 'fF'],
    [1e-12, 'pF'],
    [1e-9, 'nF'],
    [1e-6, 'uF'],
  ],
  inductance: [
    [0, 'pH'],
    [1e-10, 'nH'],
    [1e-6, 'uH'],
  ],
  voltage: [
    [0, 'uV'],
    [1e-3, 'mV'],
    [1, 'V'],
  ],
  loss: [[0, 'dB']],
  lossPerLength: [
    [0, 'dB/m'],
    [20, 'dB/mm'],
  ],
  delayPerLength: [[0, 'ps/mm']],
  velocity: [
    [0, 'm/s'],
    [3e6, 'c'],
  ],
  bitRate: [
    [0, 'b/s'],
    [1e6, 'Mb/s'],
    [1e9, 'Gb/s'],
  ],
  conductivity: [
    [0, 'S/m'],
    [1e6, 'MS/m'],
  ],
  temperature: [[0, 'degC']],
  unitInterval: [[0, 'UI']],
};

/** Below this many decimals nothing is said of these: 0.001 dB, 0.001 UI. */
const finest: Readonly<Partial<Record<Dimension, number>>> = { loss: 3, unitInterval: 3, temperature: 1 };

function unitFor(size: number, dimension: Dimension): Unit | undefined {
  const ladder = ladders[dimension];
  if (!ladder) return undefined;
  const magnitude = Math.abs(size);
  let chosen = magnitude === 0 ? (usualAtZero[dimension] ?? ladder[0][1]) : ladder[0][1];
  if (magnitude > 0) for (const [from, unit] of ladder) if (magnitude >= from * 0.9995) chosen = unit;
  return unitNamed(chosen);
}

const usualAtZero: Readonly<Partial<Record<Dimension, string>>> = {
  length: 'mm',
  time: 'ps',
  frequency: 'Hz',
  impedance: 'ohm',
  capacitance: 'pF',
  inductance: 'nH',
  voltage: 'mV',
};

const inUnit = (value: number, unit: Unit | undefined) => (unit ? value / inSi('1', unit) : value);

/** Three significant digits, no trailing zeros, a plain minus sign; a power of ten only where digits would be many. */
function digits(value: number, decimals?: number): string {
  if (!Number.isFinite(value)) return UNKNOWN;
  if (value === 0) return '0';
  const rounded = Number(value.toPrecision(3));
  const magnitude = Math.abs(rounded);
  if (decimals !== undefined && magnitude < 100) return plain(Number(rounded.toFixed(decimals)));
  return magnitude >= 1e6 || magnitude < 1e-4 ? rounded.toExponential().replace('e+', 'e') : plain(rounded);
}

const plain = (value: number) => (value === 0 ? '0' : String(value));

const withUnit = (text: string, unit: Unit | undefined) => (unit ? `${text} ${unit.text}` : text);

function inDimension(value: number, dimension: Dimension): string {
  if (!Number.isFinite(value)) return UNKNOWN;
  const unit = unitFor(value, dimension);
  return withUnit(digits(inUnit(value, unit), finest[dimension]), unit);
}

/** Two numbers in one unit: `0.9 to 1.1 mm`; one where both read alike. */
function rangeOf(low: number, high: number, dimension: Dimension): string {
  if (!Number.isFinite(low) || !Number.isFinite(high)) return UNKNOWN;
  const unit = unitFor(Math.max(Math.abs(low), Math.abs(high)), dimension);
  const [from, to] = [low, high].map((value) => digits(inUnit(value, unit), finest[dimension]));
  if (low !== 0 && high / low > 1e4) return `${inDimension(low, dimension)} to ${inDimension(high, dimension)}`;
  return withUnit(from === to ? from : `${from} to ${to}`, unit);
}

/** `1 resonance`, `8,193 points`; `plural` where an s is not enough. */
export function count(amount: number | { readonly length: number }, singular: string, plural = `${singular}s`): string {
  const number = typeof amount === 'number' ? amount : amount.length;
  if (!Number.isFinite(number)) return UNKNOWN;
  return `${number.toLocaleString('en')} ${number === 1 ? singular : plural}`;
}

/** A loss above this is told as such: nobody measures it. */
export const MOST_LOSS_DB = 120;

/** Decibels up to where more of them say nothing; computed zeros would read as a figure. */
const decibels = (most: number) => (value: number) =>
  value > most && Number.isFinite(value) ? `above ${most} dB` : inDimension(value, 'loss');

const of = (dimension: Dimension) => (value: number) => inDimension(value, dimension);

/**
 * Numbers for people, the only way in which one reaches a message or a surface: SI in, engineering units and three significant
 * digits out (`12.9 GHz`, `0.85 mm`, `35 um`, `7.3 ps`). A number that is none reads `unknown`.
 */
export const show = {
  length: of('length'),
  time: of('time'),
  frequency: of('frequency'),
  impedance: of('impedance'),
  capacitance: of('capacitance'),
  inductance: of('inductance'),
  voltage: of('voltage'),
  loss: decibels(MOST_LOSS_DB),
  /** Of what comes back or converts: further below than anyone measures reads `above 60 dB`. */
  returnLoss: decibels(60),
  lossPerLength: of('lossPerLength'),
  delayPerLength: of('delayPerLength'),
  velocity: of('velocity'),
  bitRate: of('bitRate'),
  conductivity: of('conductivity'),
  temperature: of('temperature'),
  unitIntervals: of('unitInterval'),
  /** Without unit: dk, df, quality. */
  ratio: (value: number) => digits(value),
  /** A share of 1: 0.08 gives `8 %`. */
  percent: (share: number) => (Number.isFinite(share) ? `${digits(share * 100, 1)} %` : UNKNOWN),
  /** A bit error ratio: `1e-12`. */
  probability: (value: number) =>
    Number.isFinite(value)
      ? value === 0 || value >= 1e-3
        ? digits(value)
        : Number(value.toPrecision(2)).toExponential().replace('e+', 'e')
      : UNKNOWN,
  count,
  dimension: inDimension,
  rangeOf,
  /** Nominal value with its tolerance: `168 mm ± 2 mm`. */
  quantity: (quantity: Quantity) => {
    const { value, plus, minus, dimension } = quantity;
    const nominal = inDimension(value, dimension);
    if (plus === 0 && minus === 0) return nominal;
    return plus === minus
      ? `${nominal} ± ${inDimension(plus, dimension)}`
      : `${nominal} +${inDimension(plus, dimension)}/-${inDimension(minus, dimension)}`;
  },
} as const;

/** All digits, as a file may hold it: `12.890625 GHz`. For edits; `show` is for people. */
export function exactly(value: number, dimension?: Dimension): string {
  if (!Number.isFinite(value)) return UNKNOWN;
  const unit = dimension && unitFor(value, dimension);
  return withUnit(plain(Number(inUnit(value, unit).toPrecision(12))), unit);
}
