import { uniformInt } from 'pure-rand/distribution/uniformInt';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';

/** A text that a person or an accident could make of a good one, with what was done. */
export interface Mutation {
  readonly what: string;
  readonly text: string;
  /** Offset in the new text near which the fault lies; undefined where it may be anywhere. */
  readonly at?: number;
}

export function* everyPrefix(text: string, step: number): Iterable<Mutation> {
  for (let length = 0; length < text.length; length += step)
    yield { what: `prefix of ${length}`, text: text.slice(0, length) };
}

/** Two letters of each key changed places. */
export function* everyKeyMisspelt(text: string): Iterable<Mutation> {
  for (const match of text.matchAll(/(?<=^|[\s{,])([a-z][a-z-]*)(?=:(?:\s|$))/gm)) {
    const key = match[1];
    if (key.length < 2) continue;
    const wrong = key[0] === key[1] ? `${key}x` : key[1] + key[0] + key.slice(2);
    yield {
      what: `key \`${key}\` misspelt`,
      text: text.slice(0, match.index) + wrong + text.slice(match.index + key.length),
      at: match.index,
    };
  }
}

export function* everyUnitDropped(text: string): Iterable<Mutation> {
  for (const match of text.matchAll(
    /(?<=\d) ?(?:mm|um|ohm|GHz|MHz|ps\/mm|ps|dB\/mm|dB\/m|dB\/in|dB|mV|V|nF|nH|fF|pF|Gb\/s|ns\/m|UI|mohm|degC)(?=[\s,}\]]|$)/gm,
  )) {
    yield {
      what: `unit \`${match[0].trim()}\` dropped`,
      text: text.slice(0, match.index) + text.slice(match.index + match[0].length),
      at: match.index,
    };
  }
}

function* lines(text: string): Iterable<{ start: number; end: number }> {
  for (let start = 0; start < text.length; ) {
    const newline = text.indexOf('\n', start);
    const end = newline < 0 ? text.length : newline + 1;
    yield { start, end };
    start = end;
  }
}

export function* everyLineDeleted(text: string): Iterable<Mutation> {
  for (const { start, end } of lines(text))
    yield { what: `line at ${start} deleted`, text: text.slice(0, start) + text.slice(end), at: start };
}

export function* everyLineIndentedWrongly(text: string): Iterable<Mutation> {
  for (const { start } of lines(text)) {
    for (const [what, by] of [
      ['one space more', ' '],
      ['a tab', '\t'],
      ['three spaces more', '   '],
    ] as const) {
      yield { what: `line at ${start} with ${what}`, text: text.slice(0, start) + by + text.slice(start), at: start };
    }
    if (text[start] === ' ')
      yield {
        what: `line at ${start} with one space less`,
        text: text.slice(0, start) + text.slice(start + 1),
        at: start,
      };
  }
}

const PIECES = [
  '{',
  '}',
  '[',
  ']',
  ':',
  ': ',
  '- ',
  '#',
  '"',
  "'",
  '\t',
  '\n',
  '\r\n',
  '&a ',
  '*a',
  '<<: *a',
  '!!binary ',
  '|\n',
  '>\n',
  '~',
  '\u0000',
  '\ufeff',
  '😀',
  '\u2028',
  '@',
  '%',
  '±',
  '1e999',
  '__proto__: 1',
  'null',
  '-',
  '...',
  '---\n',
  '0x',
  ',',
  'NaN',
];

/** One random edit: bytes flipped, pieces spliced, lines dropped or doubled. */
export function randomEdit(text: string, random: RandomGenerator): string {
  const pick = (below: number) => uniformInt(random, 0, Math.max(0, below - 1));
  const at = pick(text.length + 1);
  switch (pick(6)) {
    case 0:
      return text.slice(0, at) + PIECES[pick(PIECES.length)] + text.slice(at);
    case 1:
      return text.slice(0, at) + text.slice(Math.min(text.length, at + 1 + pick(12)));
    case 2:
      return text.slice(0, at) + String.fromCharCode(32 + pick(95)) + text.slice(at + 1);
    case 3: {
      const from = pick(text.length);
      const piece = text.slice(from, from + pick(60));
      return text.slice(0, at) + piece + text.slice(at);
    }
    case 4: {
      const start = text.lastIndexOf('\n', at - 1) + 1;
      const newline = text.indexOf('\n', at);
      return text.slice(0, start) + (newline < 0 ? '' : text.slice(newline + 1));
    }
    default: {
      const start = text.lastIndexOf('\n', at - 1) + 1;
      return text.slice(0, start) + ' '.repeat(pick(7)) + text.slice(start);
    }
  }
}
