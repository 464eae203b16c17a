import type { Dimension, QuantitySpec } from '../../schemas/format/types';
import { nearest } from './nearest';
import { capital, type Outcome, problem, type QuantityFix, type QuantityProblem, quoted, replaced } from './problem';
import type { NumberToken, UnitToken } from './scan';
import { exactly } from './show';
import { habitOf, inSi, sameButCase, type Unit, unitNamed, unitsOf, wanted, wantedAny } from './units';

/** The unit that stands there, if one of the wanted dimensions has it; undefined for a number without unit where that is wanted. */
export function wantedUnit(
  text: string,
  token: UnitToken,
  number: NumberToken,
  spec: QuantitySpec,
): Outcome<Unit | undefined> {
  const { dimensions } = spec;
  if (token.text === '') return dimensions.includes('ratio') ? { ok: undefined } : bareNumber(text, number, spec);
  const unit = unitNamed(token.text);
  if (unit && dimensions.includes(unit.dimension)) return { ok: unit };
  if (dimensions.length === 1 && dimensions[0] === 'ratio') return unitNotWanted(text, token, number);
  const wantedHere = capital(wantedAny(dimensions));
  if (unit) {
    const piece = quoted(text.slice(number.start, token.end));
    return problem(
      'dimension',
      `${wantedHere} is wanted; ${piece} is ${wanted(unit.dimension)}.`,
      number.start,
      token.end,
    );
  }
  if (token.text === '%') {
    return problem('dimension', `${wantedHere} is wanted; \`%\` stands in tolerances only.`, token.start, token.end);
  }
  return unknownUnit(text, token, dimensions);
}

/** A unit that is none: spelt otherwise, by habit, or nearly. Also for the units of tolerances and of `@`. */
export function unknownUnit(
  text: string,
  token: UnitToken,
  dimensions: readonly Dimension[],
): { problem: QuantityProblem } {
  const { start, end } = token;
  const spelling = (unit: Unit, safe: boolean): QuantityFix => ({
    title: `Write \`${unit.text}\``,
    text: replaced(text, start, end, unit.text),
    ...(safe && { safe }),
  });
  const sameLetters = sameButCase(token.text, dimensions);
  const fitting = sameLetters.filter(({ dimension }) => dimensions.includes(dimension));
  const habit = fitting.length === 0 ? habitOf(token.text, dimensions) : undefined;
  if (sameLetters.length > 0 && !habit) {
    const names = sameLetters.map((unit) => `\`${unit.text}\``).join(' or ');
    const message = `Units keep their case, as in SI: ${quoted(token.text)} is written ${names}.`;
    return problem(
      'unit-spelling',
      message,
      start,
      end,
      fitting.map((unit) => spelling(unit, fitting.length === 1)),
    );
  }
  if (habit) {
    return problem('unit-spelling', `${quoted(token.text)} is written \`${habit.text}\`.`, start, end, [
      spelling(habit, true),
    ]);
  }
  const known = dimensions.flatMap(unitsOf);
  const near = nearest(
    token.text,
    known.map((unit) => unit.text),
  ); // prettier-ignore
  const meant = near === undefined ? undefined : unitNamed(near);
  if (meant) {
    return problem('unknown-unit', `${quoted(token.text)} is not a unit; did you mean \`${meant.text}\`?`, start, end, [
      spelling(meant, false),
    ]);
  }
  const choice = known.map((unit) => `\`${unit.text}\``).join(', ');
  const hint = known.length > 0 ? `; ${wantedAny(dimensions)} is in ${choice}.` : ' here.';
  return problem('unknown-unit', `${quoted(token.text)} is not a unit${hint}`, start, end);
}

function unitNotWanted(text: string, token: UnitToken, number: NumberToken): { problem: QuantityProblem } {
  const percent = token.text === '%';
  const plain = percent ? exactly(Number(number.text) / 100) : text.slice(number.start, number.end);
  const piece = quoted(text.slice(number.start, token.end));
  return problem(
    'unit-not-wanted',
    `This is a number without unit: write ${quoted(plain)} in place of ${piece}.`,
    token.start,
    token.end,
    [
      {
        title: `Write ${quoted(plain)}`,
        text: replaced(text, number.start, token.end, plain),
        ...(percent && { safe: true }),
      },
    ],
  );
}

/** Units under which the number would be a sensible size; the usual ones where none would. */
function bareNumber(text: string, number: NumberToken, spec: QuantitySpec): { problem: QuantityProblem } {
  const written = text.slice(number.start, number.end);
  const units = fittingUnits(number.text, spec);
  const fixes = units.map((unit) => withUnit(text, number, unit));
  const names = units.map((unit) => `\`${unit.text}\``);
  const choice = names.length > 1 ? `${names.slice(0, -1).join(', ')} or ${names[names.length - 1]}` : names[0];
  const message = `${capital(wantedAny(spec.dimensions))} needs a unit: ${quoted(written)} could be in ${choice}.`;
  return problem('bare-number', message, number.start, number.end, fixes);
}

/** The fix that puts a unit behind a number without one. */
export function withUnit(text: string, number: NumberToken, unit: Unit): QuantityFix {
  const written = text.slice(number.start, number.end);
  return {
    title: `Write ${quoted(`${written} ${unit.text}`)}`,
    text: replaced(text, number.end, number.end, ` ${unit.text}`),
  };
}

/** Each dimension's units in the order in which they are offered. */
const usual: Readonly<Record<Dimension, readonly string[]>> = {
  length: ['mm', 'um', 'mil', 'in', 'm', 'cm', 'nm'],
  time: ['ps', 'ns', 'fs', 'us'],
  frequency: ['GHz', 'MHz', 'kHz', 'Hz'],
  impedance: ['ohm', 'mohm', 'kohm'],
  capacitance: ['pF', 'fF', 'nF', 'uF'],
  inductance: ['nH', 'pH', 'uH'],
  voltage: ['mV', 'V', 'uV'],
  loss: ['dB'],
  lossPerLength: ['dB/in', 'dB/mm', 'dB/m', 'dB/cm'],
  delayPerLength: ['ps/mm', 'ps/in', 'ns/m'],
  velocity: ['c', 'm/s'],
  bitRate: ['Gb/s', 'Mb/s', 'b/s'],
  conductivity: ['MS/m', 'S/m'],
  temperature: ['degC'],
  unitInterval: ['UI'],
  ratio: [],
};

const MOST_UNITS = 5;

/** Units that make the number plausible; where none does those that make it possible; else the usual ones. At most five. */
export function fittingUnits(
  numberText: string,
  spec: Pick<QuantitySpec, 'dimensions' | 'plausible' | 'valid'>,
): Unit[] {
  const { dimensions, plausible, valid } = spec;
  const units = dimensions.flatMap((dimension) => usual[dimension].map((text) => unitNamed(text)!));
  const within = (range: readonly [number, number] | undefined) =>
    units.filter((unit) => unit.dimension !== dimensions[0] || isWithin(inSi(numberText, unit), range));
  const chosen = [plausible && within(plausible), within(valid), units].find((list) => list && list.length > 0) ?? [];
  return chosen.slice(0, MOST_UNITS);
}

/** Without a range everything is within. */
export const isWithin = (value: number, range: readonly [number, number] | undefined) =>
  range === undefined || (value >= range[0] && value <= range[1]);
