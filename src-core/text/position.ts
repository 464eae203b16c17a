/** Line and character from 0, characters in UTF-16 units. Lines end with LF, CR LF or CR, as editors have it. */
export interface Position {
  readonly line: number;
  readonly character: number;
}

/** Positions are asked for many times in a row in one text: the starts of its lines are kept until another one comes. */
let last: { readonly text: string; readonly starts: readonly number[] } = { text: '', starts: [0] };

function lineStartsOf(text: string): readonly number[] {
  if (last.text === text) return last.starts;
  const starts = [0];
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    if (code === 13 && text.charCodeAt(i + 1) === 10) i++;
    if (code === 10 || code === 13) starts.push(i + 1);
  }
  last = { text, starts };
  return starts;
}

/** Where an offset stands; one outside the text is moved to its nearer end. */
export function positionAt(text: string, offset: number): Position {
  const starts = lineStartsOf(text);
  const inside = Math.max(0, Math.min(offset, text.length));
  let low = 0;
  let high = starts.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (starts[middle] <= inside) low = middle;
    else high = middle - 1;
  }
  return { line: low, character: inside - starts[low] };
}

/** The offset of a position; one beyond its line's end is moved to the next line's start, one beyond the text to its end. */
export function offsetAt(text: string, { line, character }: Position): number {
  const starts = lineStartsOf(text);
  if (line < 0) return 0;
  if (line >= starts.length) return text.length;
  const end = line + 1 < starts.length ? starts[line + 1] : text.length;
  return Math.max(starts[line], Math.min(starts[line] + character, end));
}
