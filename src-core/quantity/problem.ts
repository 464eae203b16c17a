import type { TextRange } from '../text/types';

export type QuantityCode =
  | 'empty'
  | 'not-a-quantity'
  | 'comma-decimal'
  | 'bare-number'
  | 'unit-not-wanted'
  | 'unknown-unit'
  | 'unit-spelling'
  | 'dimension'
  | 'tolerance'
  | 'tolerance-not-allowed'
  | 'at'
  | 'at-missing'
  | 'at-not-allowed'
  | 'nyquist-not-allowed'
  | 'out-of-range'
  | 'implausible'
  | 'band'
  | 'trailing';

export interface QuantityFix {
  readonly title: string;
  /** The whole text, mended. */
  readonly text: string;
  /** Spelling only: what was meant is beyond doubt. */
  readonly safe?: boolean;
}

export interface QuantityProblem {
  readonly code: QuantityCode;
  readonly message: string;
  /** Inside the text. */
  readonly range?: TextRange;
  readonly fixes?: readonly QuantityFix[];
}

/** Longest piece of a text that a message repeats. */
const LONGEST = 40;

/** What a message shows as a space: control characters, and the backquote that encloses the piece. */
const unshown = (letter: string) =>
  letter < ' ' || letter === '`' || letter === '\u007f' || letter === '\u2028' || letter === '\u2029';

/** Without the half of a letter that a cut through a surrogate pair leaves. */
const wholeLetters = (text: string) =>
  text.charCodeAt(text.length - 1) >>> 10 === 0xd800 >>> 10 ? text.slice(0, -1) : text;

/** A piece of text in backquotes, on one line, cut where it is long. */
export function quoted(text: string): string {
  const cut = text.length > LONGEST ? `${wholeLetters(text.slice(0, LONGEST - 1))}…` : text;
  return `\`${[...cut].map((letter) => (unshown(letter) ? ' ' : letter)).join('')}\``;
}

/** What a reader of a part gives: the part, or what is wrong with the whole. */
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

/** The text with one piece exchanged. */
export const replaced = (text: string, start: number, end: number, by: string) =>
  `${text.slice(0, start)}${by}${text.slice(end)}`;

export const capital = (text: string) => `${text.charAt(0).toUpperCase()}${text.slice(1)}`;
