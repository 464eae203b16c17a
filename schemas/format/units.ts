import type { Dimension } from './quantity';

export interface Unit {
  /** As it is written. */
  readonly text: string;
  readonly dimension: Dimension;
  /** Power of ten that leads to the SI unit, exact. */
  readonly exponent: number;
  /** What the power of ten leaves: 25.4 for `mil`. */
  readonly factor?: number;
}

const units = (
  dimension: Dimension,
  ...rows: readonly (readonly [text: string, exponent: number, factor?: number])[]
): Unit[] =>
  rows.map(([text, exponent, factor]) => ({ text, dimension, exponent, ...(factor !== undefined && { factor }) }));

/** Every unit, each dimension's smallest first. The only table. `%` is a tolerance's only; UI, dB and degC stay what they are. */
export const unitTable: readonly Unit[] = [
  ...units('length', ['nm', -9], ['um', -6], ['mil', -6, 25.4], ['mm', -3], ['cm', -2], ['in', -3, 25.4], ['m', 0]),
  ...units('time', ['fs', -15], ['ps', -12], ['ns', -9], ['us', -6]),
  ...units('frequency', ['Hz', 0], ['kHz', 3], ['MHz', 6], ['GHz', 9]),
  ...units('impedance', ['mohm', -3], ['ohm', 0], ['kohm', 3]),
  ...units('capacitance', ['fF', -15], ['pF', -12], ['nF', -9], ['uF', -6]),
  ...units('inductance', ['pH', -12], ['nH', -9], ['uH', -6]),
  ...units('voltage', ['uV', -6], ['mV', -3], ['V', 0]),
  ...units('loss', ['dB', 0]),
  ...units('lossPerLength', ['dB/m', 0], ['dB/in', 3, 1 / 25.4], ['dB/cm', 2], ['dB/mm', 3]),
  ...units('delayPerLength', ['ns/m', -9], ['ps/in', -9, 1 / 25.4], ['ps/mm', -9]),
  ...units('velocity', ['m/s', 0], ['c', 0, 299792458]),
  ...units('bitRate', ['b/s', 0], ['Mb/s', 6], ['Gb/s', 9]),
  ...units('conductivity', ['S/m', 0], ['MS/m', 6]),
  ...units('temperature', ['degC', 0]),
  ...units('unitInterval', ['UI', 0]),
];

/** How a message calls what is wanted, with and without its article. */
export const dimensionNouns: Readonly<Record<Dimension, readonly [article: string, noun: string]>> = {
  length: ['a', 'length'],
  time: ['a', 'time'],
  frequency: ['a', 'frequency'],
  impedance: ['an', 'impedance'],
  capacitance: ['a', 'capacitance'],
  inductance: ['an', 'inductance'],
  voltage: ['a', 'voltage'],
  loss: ['a', 'loss in dB'],
  lossPerLength: ['a', 'loss per length'],
  delayPerLength: ['a', 'delay per length'],
  velocity: ['a', 'velocity'],
  bitRate: ['a', 'bit rate'],
  conductivity: ['a', 'conductivity'],
  temperature: ['a', 'temperature'],
  unitInterval: ['a', 'part of the unit interval'],
  ratio: ['a', 'number without unit'],
};
