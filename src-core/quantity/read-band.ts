import type { Band, QuantitySpec } from '../../schemas/format/types';
import { commaProblem, decimalComma } from './comma';
import { problem, type QuantityProblem, quoted } from './problem';
import { LONGEST, readQuantity } from './read';
import { type Cursor, isAtEnd, scanNumber, skipSpace } from './scan';

/** `50 MHz to 12 GHz`; the first unit may be left out where it is that of the second. */
export function readBand(text: string | number, spec: QuantitySpec): { band?: Band; problem?: QuantityProblem } {
  const written = String(text);
  if (written.length > LONGEST) return problem('band', 'This text is too long for a band.', 0, written.length);
  const comma = decimalComma(written);
  if (comma >= 0) return commaProblem(written, comma);
  const separator = separatorOf(written);
  if (!separator) {
    return problem(
      'band',
      `A band is wanted, as \`50 MHz to 12 GHz\`; ${quoted(written.trim())} is none.`,
      0,
      written.length,
    );
  }
  const { start, end } = separator;
  const lowText = written.slice(0, start).trimEnd();
  const highText = written.slice(end).trim();
  if (written.slice(start, end) !== 'to') {
    const fix = { title: 'Write `to`', text: `${lowText.trimStart()} to ${highText}`, safe: true };
    return problem('band', 'A band is written with `to`, as `50 MHz to 12 GHz`.', start, end, [fix]);
  }
  const single: QuantitySpec = { dimensions: spec.dimensions, valid: spec.valid, tolerance: false };
  const high = readQuantity(highText, single);
  if (!high.quantity) return { problem: inside(high.problem!, written, written.indexOf(highText, end), highText) };
  const bare = isBareNumber(lowText);
  const low = readQuantity(bare ? `${lowText} ${high.quantity.unit}` : lowText, single);
  if (!low.quantity) return { problem: inside(low.problem!, written, 0, lowText) };
  if (low.quantity.value < high.quantity.value) {
    return { band: { fromHz: low.quantity.value, toHz: high.quantity.value, text: written.trim() } };
  }
  const swapped = `${highText} to ${lowText.trim()}`;
  const isMended = !bare && low.quantity.value > high.quantity.value;
  const fixes = isMended ? [{ title: `Write ${quoted(swapped)}`, text: swapped, safe: true }] : [];
  return problem('band', 'A band goes from a lower to a higher frequency.', 0, written.length, fixes);
}

function isBareNumber(text: string): boolean {
  const cursor: Cursor = { text, at: 0 };
  if (!scanNumber(cursor)) return false;
  skipSpace(cursor);
  return isAtEnd(cursor);
}

/** `to`, or what people write for it. */
function separatorOf(text: string): { start: number; end: number } | undefined {
  for (const word of ['to', '...', '..', '–', '—', ' - ', '~']) {
    const start = text.indexOf(word, 1);
    if (start > 0) return { start, end: start + word.length };
  }
  return undefined;
}

/** A part's problem in terms of the whole text. */
function inside(part: QuantityProblem, whole: string, at: number, partText: string): QuantityProblem {
  const moved = (offset: number) => Math.min(offset + at, whole.length);
  const { range, fixes } = part;
  return {
    ...part,
    ...(range && { range: { start: moved(range.start), end: moved(range.end) } }),
    ...(fixes && {
      fixes: fixes.map((fix) => ({ ...fix, text: whole.slice(0, at) + fix.text + whole.slice(at + partText.length) })),
    }),
  };
}
