import { lineEnd, lineStart } from './syntax';
import type { TextRange } from './types';

/**
 * What goes with a pair or an entry when it is removed: between brackets one comma and the space beside it; else its lines,
 * where it stands alone on them, comment at the end of the line and line ending included.
 */
export function removalRange(text: string, range: TextRange, flow: boolean): TextRange {
  return flow ? withComma(text, range) : withLines(text, range);
}

function withComma(text: string, { start, end }: TextRange): TextRange {
  let after = end;
  while (after < text.length && /\s/.test(text[after])) after++;
  if (text[after] === ',') {
    after++;
    while (after < text.length && (text[after] === ' ' || text[after] === '\t')) after++;
    return { start, end: after };
  }
  let before = start;
  while (before > 0 && /\s/.test(text[before - 1])) before--;
  return text[before - 1] === ',' ? { start: before - 1, end } : { start, end };
}

function withLines(text: string, { start, end }: TextRange): TextRange {
  const first = lineStart(text, start);
  const indentation = text.slice(first, start);
  // Trailing newlines belong to a block scalar's range.
  const contentEnd = end > start && text[end - 1] === '\n' ? end - 1 : end;
  const last = lineEnd(text, contentEnd);
  const rest = text.slice(contentEnd, last).trim();
  if (indentation.replace('\ufeff', '').trim() !== '' || (rest !== '' && !rest.startsWith('#'))) return { start, end };
  const begin = text.charCodeAt(first) === 0xfeff ? first + 1 : first;
  const next = text.indexOf('\n', last);
  if (next !== -1) return { start: begin, end: next + 1 };
  // The last line has no ending of its own: the one before it goes.
  if (begin > 0 && text[begin - 1] === '\n')
    return { start: text[begin - 2] === '\r' ? begin - 2 : begin - 1, end: text.length };
  return { start: begin, end: text.length };
}
