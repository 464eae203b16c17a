import type { Dimension } from '../../schemas/format/types';
import { dimensionNouns, type Unit, unitTable } from '../../schemas/format/units';

export type { Unit };
export { unitTable };

/** Units by what may be written: with `u` also µ (U+00B5) and μ (U+03BC), with `ohm` also Ω (U+03A9, U+2126). */
const byText = new Map<string, Unit>();
for (const unit of unitTable) for (const text of spellings(unit.text)) byText.set(text, unit);

function spellings(text: string): string[] {
  if (text.startsWith('u')) return [text, `\u00b5${text.slice(1)}`, `\u03bc${text.slice(1)}`];
  if (text.endsWith('ohm')) return [text, text.replace('ohm', '\u03a9'), text.replace('ohm', '\u2126')];
  return [text];
}

/** What people write for a unit, in lower case; each has one fix. */
const habits = new Map<string, string>([
  ['mils', 'mil'],
  ['thou', 'mil'],
  ['inch', 'in'],
  ['inches', 'in'],
  ['"', 'in'],
  ['micron', 'um'],
  ['microns', 'um'],
  ['meter', 'm'],
  ['meters', 'm'],
  ['metre', 'm'],
  ['metres', 'm'],
  ['ohms', 'ohm'],
  ['milliohm', 'mohm'],
  ['milliohms', 'mohm'],
  ['gbps', 'Gb/s'],
  ['gbit/s', 'Gb/s'],
  ['gb/sec', 'Gb/s'],
  ['gt/s', 'Gb/s'],
  ['mbps', 'Mb/s'],
  ['mbit/s', 'Mb/s'],
  ['bps', 'b/s'],
  ['bit/s', 'b/s'],
  ['\u00b0c', 'degC'],
  ['c', 'degC'],
  ['deg c', 'degC'],
  ['degrees', 'degC'],
  ['\u2103', 'degC'],
  ['deg', 'degC'],
  ['celsius', 'degC'],
  ['db/inch', 'dB/in'],
  ['db/meter', 'dB/m'],
  ['ps/inch', 'ps/in'],
  ['mvpp', 'mV'],
  ['vpp', 'V'],
  ['mvrms', 'mV'],
  ['mv rms', 'mV'],
  ['uipp', 'UI'],
  ['dbm', 'dB'],
  ['psec', 'ps'],
  ['nsec', 'ns'],
  ['ghz.', 'GHz'],
  ['psrms', 'ps'],
]); // prettier-ignore

export const unitNamed = (text: string): Unit | undefined => byText.get(text);

export const unitsOf = (dimension: Dimension): readonly Unit[] =>
  unitTable.filter((unit) => unit.dimension === dimension);

/** `a length`, `an impedance` */
export const wanted = (dimension: Dimension): string => dimensionNouns[dimension].join(' ');

/** `a length or a time` */
export const wantedAny = (dimensions: readonly Dimension[]): string => dimensions.map(wanted).join(' or ');

/** Units that differ from `text` in their case only, those of `dimensions` first. */
export function sameButCase(text: string, dimensions: readonly Dimension[]): Unit[] {
  const lower = text.toLowerCase();
  const found = [...byText].filter(([spelling]) => spelling.toLowerCase() === lower).map(([, unit]) => unit);
  const fitting = found.filter((unit) => dimensions.includes(unit.dimension));
  return [...new Set(fitting.length > 0 ? fitting : found)];
}

export function habitOf(text: string, dimensions: readonly Dimension[]): Unit | undefined {
  const unit = byText.get(habits.get(text.toLowerCase()) ?? '');
  return unit && dimensions.includes(unit.dimension) ? unit : undefined;
}

/** The number in the SI unit; a decimal text with a power-of-ten unit gives the nearest double, so `0.11 mm` equals `110 um`. */
export function inSi(numberText: string, unit: Unit): number {
  const value = Number(shiftExponent(numberText, unit.exponent));
  return unit.factor === undefined ? value : value * unit.factor;
}

function shiftExponent(numberText: string, by: number): string {
  const at = Math.max(numberText.indexOf('e'), numberText.indexOf('E'));
  if (at < 0) return `${numberText}e${by}`;
  return `${numberText.slice(0, at)}e${Number(numberText.slice(at + 1)) + by}`;
}
