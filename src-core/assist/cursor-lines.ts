/** A line of a half-typed text, taken apart without a parser. */
export interface LineParts {
  readonly start: number;
  readonly text: string;
  readonly indent: number;
  readonly blank: boolean;
  /** Columns of the dashes that begin the line. */
  readonly dashes: readonly number[];
  /** Where the content after the dashes begins. */
  readonly column: number;
  readonly key?: string;
  /** Behind the colon. */
  readonly value: string;
  readonly valueColumn: number;
}

const KEY =
  /^((?:"[^"\n]{0,200}"|'[^'\n]{0,200}'|[^\s:#{}[\],&*!|>'"%@`-][^:#{}[\],\n]{0,200}|-[^\s:#{}[\],\n][^:#{}[\],\n]{0,200}))\s*:(?=\s|$)/;

export function partsOf(start: number, text: string): LineParts {
  let column = 0;
  while (text[column] === ' ') column++;
  const indent = column;
  const dashes: number[] = [];
  while (text[column] === '-' && (text[column + 1] === undefined || text[column + 1] === ' ')) {
    dashes.push(column++);
    while (text[column] === ' ') column++;
  }
  const rest = text.slice(column);
  const blank = dashes.length === 0 && (rest === '' || rest.startsWith('#'));
  const match = blank ? null : KEY.exec(rest);
  if (!match) return { start, text, indent, blank, dashes, column, value: rest, valueColumn: column };
  const colon = column + match[0].length;
  return {
    start,
    text,
    indent,
    blank,
    dashes,
    column,
    key: bare(match[1]),
    value: withoutComment(text.slice(colon)).trim(),
    valueColumn: colon,
  };
}

export const bare = (key: string) => (/^(['"]).*\1$/.test(key) ? key.slice(1, -1) : key).trim();
export const withoutComment = (text: string) => {
  const comment = /(^|\s)#/.exec(text);
  return comment ? text.slice(0, comment.index) : text;
};

/** The lines up to the one that holds an offset, whole. */
export function linesBefore(text: string, offset: number): LineParts[] {
  const lines: LineParts[] = [];
  let start = 0;
  for (;;) {
    const end = text.indexOf('\n', start);
    const stop = end === -1 ? text.length : end;
    lines.push(partsOf(start, text.slice(start, text[stop - 1] === '\r' ? stop - 1 : stop)));
    if (offset <= stop || end === -1) return lines;
    start = end + 1;
  }
}

/** The same length, with quoted text blanked, so that brackets and signs in it count for nothing. An open quote runs to the end. */
export function outsideQuotes(text: string): string {
  return text.replace(/"(?:[^"\\]|\\.)*(?:"|$)|(?<=^|[\s[{,:])'[^']*(?:'|$)/g, (quoted) => '_'.repeat(quoted.length));
}

/** Where a word that begins before an offset ends: at the first sign that stops it. */
export const wordEnd = (text: string, offset: number, stops: RegExp): number => {
  let end = offset;
  while (end < text.length && !stops.test(text[end])) end++;
  return end;
};
