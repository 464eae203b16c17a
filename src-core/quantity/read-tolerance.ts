import type { Dimension, QuantitySpec } from '../../schemas/format/types';
import { type Outcome, problem, quoted, replaced } from './problem';
import { type Cursor, type NumberToken, scanNumber, scanUnit, skipSpace, take, type UnitToken } from './scan';
import { unknownUnit } from './unit-problems';
import { inSi, type Unit, unitNamed, wanted } from './units';

export interface Tolerance {
  readonly plus: number;
  readonly minus: number;
  readonly threeSigma: boolean;
}

/** The quantity that the tolerance belongs to. */
interface Nominal {
  readonly value: number;
  readonly unit: Unit | undefined;
  readonly dimension: Dimension;
}

const NONE: Tolerance = { plus: 0, minus: 0, threeSigma: false };

/** `± 8%`, `+/- 12 um`, `+0.1/-0.05 mm`, each with `(3 sigma)` or without; or nothing. */
export function readTolerance(cursor: Cursor, spec: QuantitySpec, nominal: Nominal): Outcome<Tolerance> {
  const { text } = cursor;
  skipSpace(cursor);
  const start = cursor.at;
  const sign = take(cursor, '±', '+/-', '+/\u2212', '+-');
  const read = sign
    ? readEven(cursor, nominal, start, sign)
    : startsSides(text, start)
      ? readSides(cursor, nominal, start)
      : undefined;
  if (!read) return sigmaAlone(cursor);
  if ('problem' in read) return read;
  const threeSigma = readSigma(cursor);
  if ('problem' in threeSigma) return threeSigma;
  if (spec.tolerance === false) {
    const piece = quoted(text.slice(start, cursor.at).trimEnd());
    const fixed = `${text.slice(0, start).trimEnd()}${text.slice(cursor.at)}`;
    return problem('tolerance-not-allowed', `No tolerance is written here: remove ${piece}.`, start, cursor.at, [
      { title: `Remove ${piece}`, text: fixed },
    ]);
  }
  return { ok: { ...read.ok, threeSigma: threeSigma.ok } };
}

const startsSides = (text: string, at: number) => text[at] === '+' || text[at] === '-' || text[at] === '\u2212';

/** The same either way. */
function readEven(cursor: Cursor, nominal: Nominal, start: number, sign: string): Outcome<Tolerance> {
  const { text } = cursor;
  const number = scanNumber(cursor);
  if (!number)
    return problem(
      'tolerance',
      `Behind \`${sign}\` stands the tolerance, as \`± 8%\` or with a unit.`,
      start,
      start + sign.length,
    );
  if (sign === '+-')
    return problem('tolerance', 'A tolerance is written `±` or `+/-`.', start, start + 2, [
      { title: 'Write `±`', text: replaced(text, start, start + 2, '±'), safe: true },
    ]);
  if (number.signed) {
    return problem('tolerance', 'A tolerance is written without a sign of its own.', number.start, number.end, [
      { title: 'Remove the sign', text: replaced(text, number.start, number.start + 1, '') },
    ]);
  }
  const size = sizeOf(text, number, scanUnit(cursor), nominal);
  return 'problem' in size ? size : { ok: { ...NONE, plus: size.ok, minus: size.ok } };
}

/** Plus and minus apart, in either order; the unit behind the second counts for both. */
function readSides(cursor: Cursor, nominal: Nominal, start: number): Outcome<Tolerance> {
  const { text } = cursor;
  const first = scanNumber(cursor);
  if (!first) return problem('tolerance', 'A tolerance is written `± 8%` or `+0.1/-0.05 mm`.', start, start + 1);
  const firstUnit = scanUnit(cursor);
  const slash = take(cursor, '/');
  const second = slash ? scanNumber(cursor) : undefined;
  const secondUnit = second && scanUnit(cursor);
  const upwards = text[first.start] === '+';
  if (!second || !secondUnit) return oneSide(text, first, firstUnit, upwards, start);
  if (!second.signed || (text[second.start] === '+') === upwards) {
    return problem(
      'tolerance',
      'A tolerance of two sides has one `+` and one `-`, as `+0.1/-0.05 mm`.',
      start,
      cursor.at,
    );
  }
  const one = sizeOf(text, first, firstUnit.text === '' ? secondUnit : firstUnit, nominal);
  if ('problem' in one) return one;
  const other = sizeOf(text, second, secondUnit.text === '' ? firstUnit : secondUnit, nominal);
  if ('problem' in other) return other;
  return { ok: upwards ? { ...NONE, plus: one.ok, minus: other.ok } : { ...NONE, plus: other.ok, minus: one.ok } };
}

function oneSide(
  text: string,
  number: NumberToken,
  unit: UnitToken,
  upwards: boolean,
  start: number,
): Outcome<Tolerance> {
  const size = text.slice(number.start + 1, number.end);
  const both = upwards ? `+${size}/-0` : `+0/-${size}`;
  const written = `${both}${unit.text === '' ? '' : ` ${unit.text}`}`;
  return problem('tolerance', `A tolerance has two sides: write ${quoted(written)}, or \`±\`.`, start, unit.end, [
    { title: `Write ${quoted(written)}`, text: replaced(text, start, unit.end, written) },
  ]);
}

/** In the unit of the nominal value, never negative. */
function sizeOf(
  text: string,
  number: NumberToken,
  token: UnitToken,
  { value, unit, dimension }: Nominal,
): Outcome<number> {
  const digits = number.text.replace('-', '');
  const size = token.text === '%' ? Math.abs(value) * Number(`${digits}e-2`) : absolute(digits, token, unit, dimension);
  if (size === undefined) {
    const other = unitNamed(token.text);
    if (!other) return unknownUnit(text, token, dimension === 'ratio' ? [] : [dimension]);
    return problem(
      'dimension',
      `The tolerance of ${wanted(dimension)} is in its own unit or in %; ${quoted(token.text)} is that of ${wanted(other.dimension)}.`,
      token.start,
      token.end,
    );
  }
  if (!Number.isFinite(size))
    return problem('out-of-range', 'The tolerance is beyond what a number can hold.', number.start, number.end);
  return { ok: size };
}

function absolute(
  digits: string,
  token: UnitToken,
  inherited: Unit | undefined,
  dimension: Dimension,
): number | undefined {
  if (token.text === '') return inherited ? inSi(digits, inherited) : Number(digits);
  const own = unitNamed(token.text);
  return own && own.dimension === dimension ? inSi(digits, own) : undefined;
}

/** `(3 sigma)` or nothing. */
function readSigma(cursor: Cursor): Outcome<boolean> {
  const { text } = cursor;
  skipSpace(cursor);
  const start = cursor.at;
  if (!take(cursor, '(')) return { ok: false };
  const number = scanNumber(cursor);
  const word = take(cursor, 'sigma', 'σ');
  const close = take(cursor, ')');
  if (number && Number(number.text) === 3 && word && close) return { ok: true };
  const closing = text.indexOf(')', start);
  const end = closing < 0 ? text.length : closing + 1;
  return problem(
    'tolerance',
    'Behind a tolerance only `(3 sigma)` may stand: it makes the tolerance three standard deviations of a normal.',
    start,
    end,
    [
      { title: 'Write `(3 sigma)`', text: replaced(text, start, end, '(3 sigma)') },
      { title: 'Make it a hard bound', text: replaced(text, start, end, '').trimEnd() },
    ],
  );
}

function sigmaAlone(cursor: Cursor): Outcome<Tolerance> {
  if (cursor.text[cursor.at] !== '(') return { ok: NONE };
  const closing = cursor.text.indexOf(')', cursor.at);
  const end = closing < 0 ? cursor.text.length : closing + 1;
  return problem(
    'tolerance',
    `${quoted(cursor.text.slice(cursor.at, end))} stands behind a tolerance only, as \`± 8% (3 sigma)\`.`,
    cursor.at,
    end,
    [{ title: 'Remove it', text: replaced(cursor.text, cursor.at, end, '').trimEnd() }],
  );
}
