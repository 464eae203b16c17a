/** A physical line; offsets in the text that is being recovered. */
export interface Line {
  readonly start: number;
  /** Before its line ending. */
  readonly end: number;
  /** Spaces in front. */
  readonly indent: number;
  /** Neither blank nor only a comment. */
  readonly content: boolean;
}

export function scanLines(text: string): Line[] {
  const lines: Line[] = [];
  let start = text.charCodeAt(0) === 0xfeff ? 1 : 0;
  while (start <= text.length) {
    let next = text.indexOf('\n', start);
    if (next === -1) next = text.length;
    const end = next > start && text[next - 1] === '\r' ? next - 1 : next;
    let at = start;
    while (at < end && text[at] === ' ') at++;
    const indent = at - start;
    while (at < end && (text[at] === ' ' || text[at] === '\t')) at++;
    lines.push({ start, end, indent, content: at < end && text[at] !== '#' });
    start = next + 1;
  }
  return lines;
}

export const isDash = (text: string, at: number) => text[at] === '-' && isBreak(text[at + 1]);

export const isBreak = (character: string | undefined) =>
  character === undefined || character === ' ' || character === '\t' || character === '\n' || character === '\r';

export function skipSpaces(text: string, from: number, end: number): number {
  let at = from;
  while (at < end && (text[at] === ' ' || text[at] === '\t')) at++;
  return at;
}

/** Whether nothing but space and comment stands from `from` to the line's end. */
export function onlyComment(text: string, from: number, end: number): boolean {
  const at = skipSpaces(text, from, end);
  return at >= end || (text[at] === '#' && (at > from || isBreak(text[from - 1]) || text[from - 1] === ':'));
}

export interface KeySplit {
  readonly key: string;
  readonly keyStart: number;
  readonly keyEnd: number;
  readonly colon: number;
}

/** Key and colon at the beginning of a line; undefined where there is no `key:` followed by a space or the end. */
export function splitKey(text: string, from: number, end: number): KeySplit | undefined {
  const quote = text[from];
  if (quote === '"' || quote === "'") {
    let close = text.indexOf(quote, from + 1);
    while (close !== -1 && quote === '"' && text[close - 1] === '\\') close = text.indexOf(quote, close + 1);
    if (close === -1 || close >= end) return undefined;
    const colon = skipSpaces(text, close + 1, end);
    if (text[colon] !== ':' || !isBreak(text[colon + 1])) return undefined;
    return { key: text.slice(from + 1, close), keyStart: from, keyEnd: close + 1, colon };
  }
  if (quote === '{' || quote === '[' || quote === '?') return undefined;
  for (let at = from; at < end; at++) {
    const character = text[at];
    if (character === '#' && at > from && isBreak(text[at - 1])) return undefined;
    if (character === ':' && isBreak(text[at + 1])) {
      let keyEnd = at;
      while (keyEnd > from && isBreak(text[keyEnd - 1])) keyEnd--;
      return { key: text.slice(from, keyEnd), keyStart: from, keyEnd, colon: at };
    }
  }
  return undefined;
}

/** End of what stands from `from` on a line, without trailing comment and space. */
export function contentEnd(text: string, from: number, end: number): number {
  let stop = end;
  for (let at = from + 1; at < end; at++) {
    if (text[at] === '#' && isBreak(text[at - 1])) {
      stop = at;
      break;
    }
  }
  while (stop > from && isBreak(text[stop - 1])) stop--;
  return stop;
}
