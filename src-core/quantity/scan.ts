/** A place in a text that only moves forward: each step looks at one character, so that reading stays linear. */
export interface Cursor {
  readonly text: string;
  at: number;
}

export interface NumberToken {
  readonly start: number;
  readonly end: number;
  /** Fit for `Number`: ASCII signs, no spaces. */
  readonly text: string;
  readonly signed: boolean;
}

export interface UnitToken {
  readonly start: number;
  readonly end: number;
  /** '' where there is none. */
  readonly text: string;
}

export const isDigit = (letter: string | undefined) => letter !== undefined && letter >= '0' && letter <= '9';
const isSpace = (letter: string | undefined) =>
  letter === ' ' ||
  letter === '\t' ||
  letter === '\n' ||
  letter === '\r' ||
  letter === '\u00a0' ||
  letter === '\u2009' ||
  letter === '\u202f';
const MINUS = '\u2212';

export function skipSpace(cursor: Cursor) {
  while (isSpace(cursor.text[cursor.at])) cursor.at++;
}

export const isAtEnd = (cursor: Cursor) => cursor.at >= cursor.text.length;

/** Takes the first of `words` that stands here, after spaces. */
export function take(cursor: Cursor, ...words: string[]): string | undefined {
  skipSpace(cursor);
  const word = words.find((one) => cursor.text.startsWith(one, cursor.at));
  if (word) cursor.at += word.length;
  return word;
}

function takeDigits(cursor: Cursor) {
  const start = cursor.at;
  while (isDigit(cursor.text[cursor.at])) cursor.at++;
  return cursor.at - start;
}

/** `-1.5e-3`, `.5`, `5.`; undefined, and nothing taken, where no number stands. */
export function scanNumber(cursor: Cursor): NumberToken | undefined {
  skipSpace(cursor);
  const { text } = cursor;
  const start = cursor.at;
  const sign = text[start] === '-' || text[start] === MINUS ? '-' : text[start] === '+' ? '+' : '';
  if (sign) cursor.at++;
  const digits = cursor.at;
  let count = takeDigits(cursor);
  if (text[cursor.at] === '.') {
    cursor.at++;
    count += takeDigits(cursor);
  }
  if (count === 0) {
    cursor.at = start;
    return undefined;
  }
  const mantissa = text.slice(digits, cursor.at);
  const exponent = scanExponent(cursor);
  return { start, end: cursor.at, text: `${sign === '-' ? '-' : ''}${mantissa}${exponent}`, signed: sign !== '' };
}

/** `e-3`; nothing where the `e` belongs to what follows. */
function scanExponent(cursor: Cursor): string {
  const { text } = cursor;
  const start = cursor.at;
  if (text[start] !== 'e' && text[start] !== 'E') return '';
  const sign = text[start + 1] === '-' || text[start + 1] === '+' || text[start + 1] === MINUS ? 1 : 0;
  if (!isDigit(text[start + 1 + sign])) return '';
  cursor.at = start + 1 + sign;
  const digits = cursor.at;
  takeDigits(cursor);
  return `e${sign && text[start + 1] !== '+' ? '-' : ''}${text.slice(digits, cursor.at)}`;
}

/** What ends a unit: space, sign, digit, bracket, `@`, `±`, `,`. A `/` belongs to it, save before `-` as in `+0.1/-0.05 mm`. */
export function scanUnit(cursor: Cursor): UnitToken {
  skipSpace(cursor);
  const { text } = cursor;
  const start = cursor.at;
  if (text[start] === '%') {
    cursor.at++;
    return { start, end: start + 1, text: '%' };
  }
  while (cursor.at < text.length && !endsUnit(text, cursor.at)) cursor.at++;
  return { start, end: cursor.at, text: text.slice(start, cursor.at) };
}

function endsUnit(text: string, at: number): boolean {
  const letter = text[at];
  if (isSpace(letter) || isDigit(letter) || '@±()+-,;:=%[]{}'.includes(letter) || letter === MINUS) return true;
  if (letter !== '/') return false;
  const next = text[at + 1];
  return next === undefined || next === '-' || next === '+' || next === MINUS || isSpace(next);
}
