import type { Band, Dimension, Quantity, QuantitySpec } from '../../schemas/format/types';
import { nearest } from './nearest';
import { type QuantityCode, type QuantityFix, type QuantityProblem, quoted } from './problem';
import { readAt } from './read-at';
import { readTolerance } from './read-tolerance';
import {
  type Cursor,
  decimalComma,
  isAtEnd,
  type NumberToken,
  scanNumber,
  scanUnit,
  skipSpace,
  take,
  type UnitToken,
} from './scan';
import { exactly, show } from './show';
import { habitOf, inSi, sameButCase, type Unit, unitNamed, unitsOf, unitTable, wanted, wantedAny } from './units';

export type { QuantityFix, QuantityProblem } from './problem';

export interface QuantityContext {
  /** Half the symbol rate, where it is known. */
  readonly nyquistHz?: number;
}

export interface QuantityReading {
  readonly quantity?: Quantity;
  readonly problem?: QuantityProblem;
}

/** A reading that ends here, with what is wrong; caught at the border of this module's readers. */
export type Outcome<T> = { readonly ok: T } | { readonly problem: QuantityProblem };

export const problem = (
  code: QuantityCode,
  message: string,
  start: number,
  end: number,
  fixes: readonly QuantityFix[] = [],
): { problem: QuantityProblem } => ({
  problem: { code, message, range: { start, end }, ...(fixes.length > 0 && { fixes }) },
});

export const replaced = (text: string, start: number, end: number, by: string) =>
  `${text.slice(0, start)}${by}${text.slice(end)}`;

/**
 * Reads `100 ohm ± 8% (3 sigma) @ 12.9 GHz` as the key's specification wants it.
 * @param text as YAML gave it: a number where the text is one
 * @returns the quantity in SI units, or what is wrong, in words, with fixes that give the whole text; an implausible size gives both
 */
export function readQuantity(
  text: string | number,
  spec: QuantitySpec,
  context: QuantityContext = {},
): QuantityReading {
  const written = String(text);
  const comma = decimalComma(written);
  if (comma >= 0) return commaProblem(written, comma, spec);
  const cursor: Cursor = { text: written, at: 0 };
  const head = readHead(cursor, spec);
  if ('problem' in head) return head;
  const { number, unit, dimension, value, unitEnd } = head.ok;
  const tolerance = readTolerance(cursor, spec, { value, unit, dimension, from: number.start });
  if ('problem' in tolerance) return tolerance;
  const at = readAt(cursor, spec, context, unitEnd);
  if ('problem' in at) return at;
  skipSpace(cursor);
  if (!isAtEnd(cursor)) return trailing(cursor, spec);
  const quantity: Quantity = {
    value,
    dimension,
    text: written.trim(),
    unit: unit?.text ?? '',
    ...tolerance.ok,
    ...(at.ok !== undefined && { at: at.ok }),
  };
  return judged(quantity, spec, number.start, unitEnd);
}

interface Head {
  readonly number: NumberToken;
  readonly unit: Unit | undefined;
  readonly dimension: Dimension;
  readonly value: number;
  readonly unitEnd: number;
}

/** The number and its unit. */
function readHead(cursor: Cursor, spec: QuantitySpec): Outcome<Head> {
  const number = scanNumber(cursor);
  if (!number) return notAQuantity(cursor.text, spec);
  const token = scanUnit(cursor);
  const unit = wantedUnit(cursor.text, token, number, spec);
  if ('problem' in unit) return unit;
  const dimension = unit.ok?.dimension ?? 'ratio';
  const value = unit.ok ? inSi(number.text, unit.ok) : Number(number.text);
  if (!Number.isFinite(value) || (value === 0 && /[1-9]/.test(number.text.slice(0, 400).split('e')[0]))) {
    return problem(
      'out-of-range',
      `${quoted(cursor.text.slice(number.start, number.end))} is beyond what a number can hold.`,
      number.start,
      number.end,
    );
  }
  return { ok: { number, unit: unit.ok, dimension, value, unitEnd: unit.ok ? token.end : number.end } };
}

/** The unit that stands there, if one of the wanted dimensions has it; undefined for a number without unit where that is wanted. */
function wantedUnit(
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
  if (unit) {
    const piece = quoted(text.slice(number.start, token.end));
    return problem(
      'dimension',
      `${capital(wantedAny(dimensions))} is wanted; ${piece} is ${wanted(unit.dimension)}.`,
      number.start,
      token.end,
    );
  }
  if (token.text === '%')
    return problem(
      'dimension',
      `${capital(wantedAny(dimensions))} is wanted; \`%\` stands in tolerances only.`,
      token.start,
      token.end,
    );
  return unknownUnit(text, token, dimensions);
}

/** Also for the units of tolerances and of `@`. */
export function unknownUnit(
  text: string,
  token: UnitToken,
  dimensions: readonly Dimension[],
): { problem: QuantityProblem } {
  const instead = (unit: Unit, safe: boolean): QuantityFix => ({
    title: `Write \`${unit.text}\``,
    text: replaced(text, token.start, token.end, unit.text),
    ...(safe && { safe }),
  });
  const sameLetters = sameButCase(token.text, dimensions);
  if (sameLetters.length > 0) {
    const fitting = sameLetters.filter(({ dimension }) => dimensions.includes(dimension));
    const names = sameLetters.map((unit) => `\`${unit.text}\``).join(' or ');
    return problem(
      'unit-spelling',
      `Units keep their case, as in SI: ${quoted(token.text)} is written ${names}.`,
      token.start,
      token.end,
      fitting.map((unit) => instead(unit, fitting.length === 1)),
    );
  }
  const habit = habitOf(token.text, dimensions);
  if (habit)
    return problem('unit-spelling', `${quoted(token.text)} is written \`${habit.text}\`.`, token.start, token.end, [
      instead(habit, true),
    ]);
  const near = nearest(
    token.text,
    dimensions.flatMap(unitsOf).map((unit) => unit.text),
  );
  const meant = near === undefined ? undefined : unitNamed(near);
  const known = dimensions.flatMap(unitsOf).map((unit) => `\`${unit.text}\``);
  const hint = meant
    ? `; did you mean \`${meant.text}\`?`
    : known.length > 0
      ? `; units of ${wantedAny(dimensions)} are ${known.join(', ')}.`
      : '.';
  return problem(
    'unknown-unit',
    `${quoted(token.text)} is not a unit${hint}`,
    token.start,
    token.end,
    meant ? [instead(meant, false)] : [],
  );
}

function unitNotWanted(text: string, token: UnitToken, number: NumberToken): { problem: QuantityProblem } {
  const share = token.text === '%' ? exactly(Number(`${number.text}e-2`)) : text.slice(number.start, number.end);
  const fixed = replaced(text, number.start, token.end, share);
  return problem(
    'unit-not-wanted',
    `This is a number without unit; write \`${share}\` in place of ${quoted(text.slice(number.start, token.end))}.`,
    token.start,
    token.end,
    [{ title: `Write \`${share}\``, text: fixed, ...(token.text === '%' && { safe: true }) }],
  );
}

/** Units under which the number would be a sensible size; the usual ones where none would. */
function bareNumber(text: string, number: NumberToken, spec: QuantitySpec): { problem: QuantityProblem } {
  const units = fittingUnits(number.text, spec);
  const written = text.slice(number.start, number.end);
  const fixes = units.map(
    (unit): QuantityFix => ({
      title: `Write \`${written} ${unit.text}\``,
      text: replaced(text, number.end, number.end, ` ${unit.text}`),
    }),
  );
  const named = units.map((unit) => `\`${unit.text}\``);
  const choice = named.length > 1 ? `${named.slice(0, -1).join(', ')} or ${named[named.length - 1]}` : named[0];
  return problem(
    'bare-number',
    `${capital(wantedAny(spec.dimensions))} needs a unit: ${quoted(written)} could be in ${choice}.`,
    number.start,
    number.end,
    fixes,
  );
}

/** Offered first, where several fit. */
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

export function fittingUnits(
  numberText: string,
  { dimensions, plausible, valid }: Pick<QuantitySpec, 'dimensions' | 'plausible' | 'valid'>,
): Unit[] {
  const units = dimensions.flatMap((dimension) => usual[dimension].map((text) => unitNamed(text)!));
  const within =
    ([low, high]: readonly [number, number]) =>
    (unit: Unit) => {
      const value = inSi(numberText, unit);
      return unit.dimension !== dimensions[0] || (value >= low && value <= high);
    };
  const plausibleUnits = plausible ? units.filter(within(plausible)) : [];
  const validUnits = valid ? units.filter(within(valid)) : units;
  const chosen = [plausibleUnits, validUnits, units].find((list) => list.length > 0) ?? [];
  return chosen.slice(0, MOST_UNITS);
}

function commaProblem(text: string, at: number, spec: QuantitySpec): { problem: QuantityProblem } {
  let start = at;
  while (start > 0 && isDigitOrPoint(text[start - 1])) start--;
  let end = at + 1;
  while (end < text.length && isDigitOrPoint(text[end])) end++;
  const piece = text.slice(start, end);
  const withPoints = pointsForCommas(text);
  const digitsBehind = end - at - 1;
  const fixes: QuantityFix[] = [
    { title: `Write ${quoted(piece.replace(',', '.'))}`, text: withPoints, safe: digitsBehind !== 3 },
  ];
  if (digitsBehind === 3 && !piece.includes('.'))
    fixes.push({ title: `Write ${quoted(piece.replace(',', ''))}`, text: withoutCommas(text) });
  void spec;
  const thousands = fixes.length > 1 ? '; thousands are written without a separator' : '';
  return problem(
    'comma-decimal',
    `Decimals are written with a point: ${quoted(piece)} is ${quoted(piece.replace(',', '.'))}${thousands}.`,
    start,
    end,
    fixes,
  );
}

const isDigitOrPoint = (letter: string) => (letter >= '0' && letter <= '9') || letter === '.';

function commasBetweenDigits(text: string, by: string): string {
  let result = '';
  let from = 0;
  for (let at = decimalComma(text); at >= 0; ) {
    result += text.slice(from, at) + by;
    from = at + 1;
    const next = decimalComma(text.slice(from - 1 >= 0 ? from : 0));
    at = next < 0 ? -1 : from + next;
  }
  return result + text.slice(from);
}
const pointsForCommas = (text: string) => commasBetweenDigits(text, '.');
const withoutCommas = (text: string) => commasBetweenDigits(text, '');

/**
 * The number that a comma in a flow collection cut in two: `{ dk: 3,37 @ 10 GHz }` reads as `dk: 3` and a key `37 @ 10 GHz`.
 * @param before source of the value before the comma @param after source of the key or item behind it, with no space between
 * @returns what was meant, `3.37 @ 10 GHz`; undefined if these are two things
 */
export function joinedDecimal(before: string, after: string): string | undefined {
  const head = /^[-+]?[0-9]{1,12}$/.exec(before.slice(0, 20));
  return head && before.length <= 20 && after[0] >= '0' && after[0] <= '9' ? `${before}.${after}` : undefined;
}

function notAQuantity(text: string, spec: QuantitySpec): { problem: QuantityProblem } {
  const trimmed = text.trim();
  const example = quantityExample(spec);
  if (trimmed === '')
    return problem('empty', `${capital(wantedAny(spec.dimensions))} is wanted, as \`${example}\`.`, 0, text.length);
  const start = text.indexOf(trimmed);
  return problem(
    'not-a-quantity',
    `${capital(wantedAny(spec.dimensions))} is wanted, as \`${example}\`; ${quoted(trimmed)} is none.`,
    start,
    start + trimmed.length,
  );
}

const sizes: Partial<Record<Dimension, string>> = {
  length: '42 mm',
  time: '12 ps',
  frequency: '12.9 GHz',
  impedance: '100 ohm',
  capacitance: '100 fF',
  inductance: '0.3 nH',
  voltage: '800 mV',
  loss: '9 dB',
  lossPerLength: '0.85 dB/in',
  delayPerLength: '6.9 ps/mm',
  velocity: '0.6 c',
  bitRate: '25.78125 Gb/s',
  conductivity: '58 MS/m',
  temperature: '60 degC',
  unitInterval: '0.35 UI',
  ratio: '3.6',
};

/** A text that the specification takes; the key's own example where there is one. */
export function quantityExample({ dimensions, band, at }: QuantitySpec, examples: readonly unknown[] = []): string {
  if (typeof examples[0] === 'string') return examples[0];
  if (Array.isArray(examples[0])) return `[${examples[0].join(', ')}]`;
  if (band) return '50 MHz to 12 GHz';
  return `${sizes[dimensions[0]]}${at === 'required' ? ' @ 12.9 GHz' : ''}`;
}

function trailing(cursor: Cursor, spec: QuantitySpec): { problem: QuantityProblem } {
  const { text, at } = cursor;
  const end = text.trimEnd().length;
  const rest = text.slice(at, end);
  if (spec.list && rest.startsWith(',')) {
    return problem('trailing', 'Several points are written as a list in brackets.', at, end, [
      { title: 'Put it in brackets', text: `[${text.trim()}]`, safe: true },
    ]);
  }
  return problem('trailing', `${quoted(rest)} behind the quantity is not understood.`, at, end, [
    { title: `Remove ${quoted(rest)}`, text: text.slice(0, at).trimEnd() },
  ]);
}

/** Holds the value and its worst ends against what is possible, the value against what is plausible. */
function judged(quantity: Quantity, spec: QuantitySpec, start: number, end: number): QuantityReading {
  if (quantity.dimension !== spec.dimensions[0]) return { quantity };
  const { value, plus, minus, text, dimension } = quantity;
  const { valid, plausible } = spec;
  const display = (number: number) => show.dimension(number, dimension);
  if (valid && (value < valid[0] || value > valid[1])) {
    const bound = value < valid[0] ? `at least ${display(valid[0])}` : `at most ${display(valid[1])}`;
    return problem('out-of-range', `${quoted(text)} is not possible here: it is ${bound}.`, start, end);
  }
  if (valid && (value - minus < valid[0] || value + plus > valid[1])) {
    const [edge, bound] =
      value - minus < valid[0]
        ? [value - minus, `at least ${display(valid[0])}`]
        : [value + plus, `at most ${display(valid[1])}`];
    return problem(
      'out-of-range',
      `With its tolerance ${quoted(text)} reaches ${display(edge)}; it is ${bound}.`,
      start,
      text.length + start,
    );
  }
  if (plausible && (value < plausible[0] || value > plausible[1])) {
    return {
      quantity,
      ...problem(
        'implausible',
        implausibleMessage(quantity, plausible),
        start,
        end,
        otherUnits(quantity, plausible, start, end),
      ),
    };
  }
  return { quantity };
}

function implausibleMessage({ text, value, dimension }: Quantity, [low, high]: readonly [number, number]): string {
  const usualRange = show.rangeOf(low, high, dimension);
  return `${quoted(text)} is implausibly ${value < low ? 'small' : 'large'}: ${usualRange} is usual here. Is the unit right?`;
}

/** The same number with the units that would make it plausible. */
function otherUnits(
  { text, unit, dimension }: Quantity,
  plausible: readonly [number, number],
  start: number,
  _end: number,
): QuantityFix[] {
  if (unit === '') return [];
  const cursor: Cursor = { text, at: 0 };
  const number = scanNumber(cursor)!;
  const token = scanUnit(cursor);
  void start;
  return fittingUnits(number.text, { dimensions: [dimension], plausible })
    .filter(
      (other) =>
        other.text !== unit && inSi(number.text, other) >= plausible[0] && inSi(number.text, other) <= plausible[1],
    )
    .map((other) => ({
      title: `Write \`${text.slice(number.start, number.end)} ${other.text}\``,
      text: replaced(text, token.start, token.end, other.text),
    }));
}

export const capital = (text: string) => `${text.charAt(0).toUpperCase()}${text.slice(1)}`;

/** `50 MHz to 12 GHz`; the first unit may be left out where it is that of the second. */
export function readBand(text: string | number, spec: QuantitySpec): { band?: Band; problem?: QuantityProblem } {
  const written = String(text);
  const comma = decimalComma(written);
  if (comma >= 0) return commaProblem(written, comma, spec);
  const separator = bandSeparator(written);
  if (!separator) {
    return problem(
      'band',
      `A band is wanted, as \`50 MHz to 12 GHz\`; ${quoted(written.trim())} is none.`,
      0,
      written.length,
    );
  }
  const [start, end, word] = separator;
  if (word !== 'to')
    return problem('band', `A band is written with \`to\`, as \`50 MHz to 12 GHz\`.`, start, end, [
      {
        title: 'Write `to`',
        text: `${written.slice(0, start).trimEnd()} to ${written.slice(end).trimStart()}`,
        safe: true,
      },
    ]);
  const high = shifted(readQuantity(written.slice(end), { ...spec, band: undefined, tolerance: false }), end, written);
  if (!high.quantity) return { problem: high.problem };
  const lowText = written.slice(0, start);
  const bare = scanUnitless(lowText);
  const low = shifted(
    readQuantity(bare ? `${lowText.trimEnd()} ${high.quantity.unit}` : lowText, {
      ...spec,
      band: undefined,
      tolerance: false,
    }),
    0,
    written,
    bare ? undefined : written.slice(start),
  );
  if (!low.quantity) return { problem: low.problem };
  if (low.quantity.value < high.quantity.value)
    return { band: { fromHz: low.quantity.value, toHz: high.quantity.value, text: written.trim() } };
  const swapped = bare ? undefined : `${written.slice(end).trim()} to ${lowText.trim()}`;
  const equal = low.quantity.value === high.quantity.value;
  return problem(
    'band',
    'A band goes from a lower to a higher frequency.',
    0,
    written.length,
    swapped && !equal ? [{ title: `Write ${quoted(swapped)}`, text: swapped, safe: true }] : [],
  );
}

function scanUnitless(text: string): boolean {
  const cursor: Cursor = { text, at: 0 };
  if (!scanNumber(cursor)) return false;
  skipSpace(cursor);
  return isAtEnd(cursor);
}

/** `to` between spaces, or what people write for it. */
function bandSeparator(text: string): readonly [start: number, end: number, word: string] | undefined {
  for (const word of ['to', '..', '–', '—', ' - ', '...', '~']) {
    const at = text.indexOf(word, 1);
    if (at > 0) return [at, at + word.length + (text[at + word.length] === '.' ? 1 : 0), word];
  }
  return undefined;
}

/** A part's problem in terms of the whole text. */
function shifted(reading: QuantityReading, by: number, whole: string, tail?: string): QuantityReading {
  const inner = reading.problem;
  if (!inner) return reading;
  const range = inner.range && {
    start: Math.min(inner.range.start + by, whole.length),
    end: Math.min(inner.range.end + by, whole.length),
  };
  const fixes = inner.fixes?.map((fix) => ({
    ...fix,
    text:
      by > 0 ? `${whole.slice(0, by)}${fix.text.startsWith(' ') ? '' : ' '}${fix.text}` : `${fix.text}${tail ?? ''}`,
  }));
  return {
    ...reading,
    problem: {
      ...inner,
      ...(range && { range }),
      ...(tail === undefined && by === 0 ? { fixes: [] } : fixes && { fixes }),
    },
  };
}

/** Whether the text takes a unit of the table, for whoever lists them. */
export const allUnits = unitTable;
void take;
