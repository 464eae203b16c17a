import type { Dimension, Quantity, QuantitySpec } from '../../schemas/format/types';
import { commaProblem, decimalComma } from './comma';
import { judged } from './judge';
import { capital, type Outcome, problem, type QuantityProblem, quoted } from './problem';
import { readAt } from './read-at';
import { readTolerance } from './read-tolerance';
import { type Cursor, isAtEnd, type NumberToken, scanNumber, scanUnit, skipSpace } from './scan';
import { wantedUnit } from './unit-problems';
import { inSi, type Unit, wantedAny } from './units';

export interface QuantityContext {
  /** Half the symbol rate, where it is known: lets a fix write the frequency in place of `nyquist`. */
  readonly nyquistHz?: number;
}

export interface QuantityReading {
  readonly quantity?: Quantity;
  readonly problem?: QuantityProblem;
}

/** No quantity is longer; what is beyond is not looked at. */
export const LONGEST = 500;

/**
 * Reads `100 ohm ± 8% (3 sigma) @ 12.9 GHz` as the key's specification wants it. One pass; a long text is refused unread.
 * @param text as YAML gave it: a number where the text is one
 * @returns the quantity in SI units, or what is wrong, in words, its range in the text, and fixes that each give the whole
 *   text; an implausible size gives quantity and problem. Never throws; no number that is not finite passes.
 * @example readQuantity('42 mm ± 2 mm', { dimensions: ['length'] }).quantity  // value 0.042, plus 0.002, minus 0.002
 */
export function readQuantity(
  text: string | number,
  spec: QuantitySpec,
  context: QuantityContext = {},
): QuantityReading {
  const written = String(text);
  if (written.length > LONGEST)
    return problem('not-a-quantity', 'This text is too long for a quantity.', 0, written.length);
  const comma = decimalComma(written);
  if (comma >= 0) return commaProblem(written, comma);
  const cursor: Cursor = { text: written, at: 0 };
  const head = readHead(cursor, spec);
  if ('problem' in head) return head;
  const { start, unit, dimension, value, end } = head.ok;
  const tolerance = readTolerance(cursor, spec, { value, unit, dimension });
  if ('problem' in tolerance) return tolerance;
  const at = readAt(cursor, spec, context, start);
  if ('problem' in at) return at;
  skipSpace(cursor);
  if (!isAtEnd(cursor)) return trailing(cursor, spec, end);
  const quantity: Quantity = {
    value,
    dimension,
    text: written.trim(),
    unit: unit?.text ?? '',
    ...tolerance.ok,
    ...(at.ok !== undefined && { at: at.ok }),
  };
  return judged(quantity, spec, start, end);
}

/** The number and its unit. */
interface Head {
  readonly start: number;
  readonly end: number;
  readonly unit: Unit | undefined;
  readonly dimension: Dimension;
  readonly value: number;
}

function readHead(cursor: Cursor, spec: QuantitySpec): Outcome<Head> {
  const number = scanNumber(cursor);
  if (!number) return notAQuantity(cursor.text, spec);
  const token = scanUnit(cursor);
  const unit = wantedUnit(cursor.text, token, number, spec);
  if ('problem' in unit) return unit;
  const value = unit.ok ? inSi(number.text, unit.ok) : Number(number.text);
  const { start } = number;
  if (!Number.isFinite(value) || (value === 0 && !isZero(number))) {
    const piece = quoted(cursor.text.slice(start, number.end));
    return problem('out-of-range', `${piece} is beyond what a number can hold.`, start, number.end);
  }
  return {
    ok: {
      start,
      end: token.text === '' ? number.end : token.end,
      unit: unit.ok,
      dimension: unit.ok?.dimension ?? 'ratio',
      value,
    },
  };
}

/** Whether zero was written, and not a number too small to hold. */
function isZero({ text }: NumberToken): boolean {
  for (const letter of text) {
    if (letter === 'e') return true;
    if (letter >= '1' && letter <= '9') return false;
  }
  return true;
}

function notAQuantity(text: string, spec: QuantitySpec): { problem: QuantityProblem } {
  const trimmed = text.trim();
  const wantedHere = `${capital(wantedAny(spec.dimensions))} is wanted, as \`${quantityExample(spec)}\``;
  if (trimmed === '') return problem('empty', `${wantedHere}.`, 0, text.length);
  const start = text.indexOf(trimmed);
  return problem('not-a-quantity', `${wantedHere}; ${quoted(trimmed)} is none.`, start, start + trimmed.length);
}

const sizes: Readonly<Record<Dimension, string>> = {
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

/** @param unitEnd where the unit ends: a tolerance belongs there */
function trailing({ text, at }: Cursor, spec: QuantitySpec, unitEnd: number): { problem: QuantityProblem } {
  const end = text.trimEnd().length;
  const rest = text.slice(at, end);
  if (spec.list && rest.startsWith(',')) {
    const fix = { title: 'Put it in brackets', text: `[${text.trim()}]`, safe: true };
    return problem('trailing', 'Several points are written as a list in brackets.', at, end, [fix]);
  }
  if (rest.startsWith('±') || rest.startsWith('+/-')) {
    const moved = `${text.slice(0, unitEnd)} ${rest}${text.slice(unitEnd, at).trimEnd()}`;
    const fix = { title: `Write ${quoted(moved)}`, text: moved, safe: true };
    return problem('tolerance', 'The tolerance stands before the frequency.', at, end, [fix]);
  }
  const fix = { title: `Remove ${quoted(rest)}`, text: text.slice(0, at).trimEnd() };
  return problem('trailing', `${quoted(rest)} behind the quantity is not understood.`, at, end, [fix]);
}
