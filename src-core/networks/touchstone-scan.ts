/** Words of a Touchstone text, one after the other, in one pass over its characters. Comments from `!` to the end of the line are skipped. */
export interface Scanner {
  /** Moves to the next word; false at the end. */
  next(): boolean;
  /** Of the present word. */
  readonly start: number;
  readonly end: number;
  /** Line, from 1. */
  readonly line: number;
  readonly firstOfLine: boolean;
  /** The words left on this line, without comment, and where they end; moves past the line. No more than 64 are given: no line has a use for them. */
  restOfLine(): { readonly words: readonly string[]; readonly end: number };
}

const mostWords = 64;
const newline = 10;
const carriageReturn = 13;
const exclamation = 33;

export function scanTouchstone(text: string): Scanner {
  let position = 0;
  const scanner = { start: 0, end: 0, line: 1, firstOfLine: true };
  let lineHasWord = false;

  /** Skips blanks and comments; over line ends too if `across`. */
  const skip = (across: boolean): boolean => {
    while (position < text.length) {
      const code = text.charCodeAt(position);
      if (code === exclamation) position = lineEnd(text, position);
      else if (code === newline || code === carriageReturn) {
        if (!across) return false;
        if (code === newline || text.charCodeAt(position + 1) !== newline) scanner.line++;
        lineHasWord = false;
        position++;
      } else if (isBlank(code)) position++;
      else return true;
    }
    return false;
  };

  const take = () => {
    scanner.start = position;
    scanner.firstOfLine = !lineHasWord;
    lineHasWord = true;
    while (position < text.length && !endsWord(text.charCodeAt(position))) position++;
    scanner.end = position;
  };

  return Object.assign(scanner, {
    next() {
      if (!skip(true)) return false;
      take();
      return true;
    },
    restOfLine() {
      const words: string[] = [];
      while (words.length < mostWords && skip(false)) {
        take();
        words.push(text.slice(scanner.start, scanner.end));
      }
      position = lineEnd(text, position);
      return { words, end: scanner.end };
    },
  });
}

const isBlank = (code: number) => code <= 32 || code === 0xa0 || code === 0xfeff;
const endsWord = (code: number) => isBlank(code) || code === exclamation;

function lineEnd(text: string, from: number): number {
  let at = from;
  for (; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code === newline || code === carriageReturn) break;
  }
  return at;
}
